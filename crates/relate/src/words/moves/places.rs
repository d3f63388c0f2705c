//! The trade's word for a place, in brackets behind the atom.

use crate::findings::{Moved, Place};

use super::names::Names;

/// Both places, each with a blank before it; nothing where they read alike.
pub(super) fn pair(names: &Names<'_>, moved: &Moved) -> [String; 2] {
    let [first, second] = moved.seats.each_ref().map(|seat| seat.place.as_ref());
    let words = |side: usize, place: Option<&Place>, again: bool| {
        let own = moved.groups[side].name;
        place.map(|place| word(names, side, place, own, again))
    };
    let both = [words(0, first, false), words(1, second, false)];
    if both[0] == both[1] {
        return [String::new(), String::new()];
    }
    let again = first.zip(second).is_some_and(|(a, b)| same_yardstick(a, b));
    let [first, second] = [both[0].clone(), words(1, second, again)];
    [first, second].map(|words| words.map_or(String::new(), |words| format!(" ({words})")))
}

/// Whether "it" in the second place means what the first place named.
fn same_yardstick(a: &Place, b: &Place) -> bool {
    match (a, b) {
        (Place::OnBenzene { to: one, .. }, Place::OnBenzene { to: other, .. }) => {
            one.name.is_some() && one.name == other.name && one.only && other.only
        }
        (Place::BesideAlike { .. }, Place::BesideAlike { .. })
        | (Place::OnPyridine { .. }, Place::OnPyridine { .. }) => true,
        (
            Place::FromCarbonyl { distance, only, .. },
            Place::FromCarbonyl {
                distance: other,
                only: alone,
                ..
            },
        ) => *only && *alone && *distance > 0 && *other > 0,
        _ => false,
    }
}

fn word(names: &Names<'_>, side: usize, place: &Place, own: Option<&str>, again: bool) -> String {
    const GREEK: [&str; 4] = ["alpha", "beta", "gamma", "delta"];
    let greek = |distance: u8| GREEK[usize::from(distance.clamp(1, 4)) - 1];
    let it = |what: String| if again { "it".to_owned() } else { what };
    match place {
        Place::OnBenzene { distance, to } => {
            let term = ["ortho", "meta", "para"][usize::from((*distance).clamp(1, 3)) - 1];
            let atom = names.atom(side, to.atom);
            let other = match to.name {
                Some(name) if to.only && own == to.name => format!("the other {name}"),
                Some(name) if to.only => format!("the {name}"),
                Some(name) => format!("the {name} {atom}"),
                None => atom,
            };
            format!("{term} to {}", it(other))
        }
        Place::BesideAlike { distance, to } => {
            let term = if *distance == 0 { "geminal" } else { "vicinal" };
            let other = to.name.unwrap_or("one");
            format!("{term} to {}", it(format!("the other {other}")))
        }
        Place::FromCarbonyl { distance: 0, .. } => "the carbonyl carbon".to_owned(),
        Place::FromCarbonyl {
            distance,
            carbonyl,
            only,
        } => {
            let group = if *only {
                "the carbonyl group".to_owned()
            } else {
                format!("the carbonyl group {}", names.atom(side, *carbonyl))
            };
            format!("{} to {}", greek(*distance), it(group))
        }
        Place::OnPyridine { distance, .. } => {
            format!(
                "{} to {}",
                greek(*distance),
                it("the pyridine nitrogen".to_owned())
            )
        }
        Place::OnCarbon { degree } => {
            let degrees = ["primary", "secondary", "tertiary", "quaternary"];
            let degree = degrees[usize::from((*degree).clamp(1, 4)) - 1];
            format!("a {degree} carbon")
        }
    }
}
