//! The trade's words for places, by shortest paths.

use molkin_graph::Element;
use molkin_relate::findings::{Neighbour, Place, Seat, Substituent};

use super::{SubstituentNames, require, walk::Walk};

pub(super) fn check(
    walk: &Walk<'_>,
    names: &SubstituentNames,
    group: &Substituent,
    seat: &Seat,
    place: &Place,
) -> Result<(), String> {
    match place {
        Place::OnBenzene { distance, to } => {
            on_benzene(walk, names, group, seat, usize::from(*distance), to)
        }
        Place::BesideAlike { distance, to } => {
            let near = |atom: u32| walk.has_bond(atom, to.atom);
            let beside = match distance {
                0 => near(seat.atom),
                _ => walk.near(seat.atom).any(near) && !near(seat.atom),
            };
            require(beside && to.name == group.name, "no such neighbour")
        }
        Place::FromCarbonyl {
            distance,
            carbonyl,
            only,
        } => {
            // Over saturated carbons: a nitrogen of a lactam is no way.
            let single = |at: u32| {
                walk.near(at)
                    .all(|to| walk.order((at, to)) == Some(Some(1)))
            };
            let over =
                |at: u32, to: u32| single(at) && walk.is_carbon(to) && !group.atoms.contains(&to);
            let found = walk.distance(seat.atom, *carbonyl, over);
            require(found == Some(usize::from(*distance)), "another distance")?;
            require(is_carbonyl(walk, *carbonyl), "no carbonyl group")?;
            let all = walk.atoms().filter(|&atom| is_carbonyl(walk, atom));
            let count = all.filter(|atom| !group.atoms.contains(atom)).count();
            require((count == 1) == *only, "others count wrong")
        }
        Place::OnPyridine { distance, nitrogen } => {
            let is_nitrogen = walk.element(*nitrogen) == Some(Element::NITROGEN);
            require(is_nitrogen, "no nitrogen")?;
            across(walk, seat.atom, *nitrogen, usize::from(*distance))
        }
        Place::OnCarbon { degree } => {
            let near = walk.near(seat.atom);
            let carbons = near.filter(|&to| walk.is_carbon(to) && !group.atoms.contains(&to));
            require(carbons.count() == usize::from(*degree), "another degree")
        }
    }
}

fn is_carbonyl(walk: &Walk<'_>, atom: u32) -> bool {
    walk.is_carbon(atom)
        && walk.near(atom).any(|to| {
            walk.element(to) == Some(Element::OXYGEN)
                && walk.order((atom, to)) == Some(Some(2))
                && walk.near(to).count() == 1
        })
}

/// The two atoms lie on a ring of six mobile bonds, so many bonds apart.
fn across(walk: &Walk<'_>, from: u32, to: u32, distance: usize) -> Result<(), String> {
    let mobile = |a: u32, b: u32| walk.order((a, b)) == Some(None);
    let shortest = walk.distance(from, to, mobile);
    require(shortest == Some(distance), "another distance on the ring")?;
    // The other way round: without the bonds that start the short one.
    let start = walk
        .near(from)
        .find(|&near| mobile(from, near) && walk.distance(near, to, mobile) == Some(distance - 1));
    let start = start.ok_or("no way")?;
    let other = walk.distance(from, to, |a, b| {
        mobile(a, b) && (a, b) != (from, start) && (distance == 1 || b != start)
    });
    require(
        other == Some(6 - distance) || distance == 3 && other == Some(3),
        "no ring of six",
    )
}

fn on_benzene(
    walk: &Walk<'_>,
    names: &SubstituentNames,
    group: &Substituent,
    seat: &Seat,
    distance: usize,
    to: &Neighbour,
) -> Result<(), String> {
    let mobile = |a: u32, b: u32| walk.order((a, b)) == Some(None);
    require(!group.atoms.contains(&to.atom), "its own atom")?;
    let ring = walk.near(to.atom).filter(|&atom| {
        walk.distance(seat.atom, atom, mobile) == Some(distance)
            && walk.beyond(atom, to.atom).is_some()
    });
    let ring: Vec<u32> = ring.collect();
    let [bearer] = ring[..] else {
        return Err("no such substituent".to_owned());
    };
    across(walk, seat.atom, bearer, distance)?;
    let beyond = walk.beyond(bearer, to.atom).ok_or("not a substituent")?;
    let name = names.of(walk.structure, &beyond, to.atom, bearer);
    require(name.as_deref() == to.name, "another name beside")
}
