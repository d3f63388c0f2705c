//! What differs in stereo groups, in one sentence: "A is a mixture of both enantiomers (AND group 1),
//! B is one of them."

use std::collections::{BTreeMap, BTreeSet};

use molkin_graph::{GroupKind, Mark, Shape, StereoElement};

use crate::{StereoChange, StereoDifference};

use super::listed;

/// The sentence on elements that belong to a group on either side. `alike` says that nothing but the
/// groups differs. Nothing where no element does.
pub(super) fn sentence(
    differences: &[&StereoDifference],
    elements: &[Vec<StereoElement>; 2],
    alike: bool,
) -> Option<String> {
    if differences.is_empty() {
        return None;
    }
    let groups = [0, 1].map(|side| Groups::of(differences, &elements[side], side));
    let marked_only = [StereoChange::MarkedOnlyInA, StereoChange::MarkedOnlyInB];
    let claims = [0, 1].map(|side| {
        let other = &groups[1 - side];
        match groups[side].in_words() {
            Some(words) => words,
            None if alike && other.0.len() == 1 => "one of them".to_owned(),
            None if differences
                .iter()
                .all(|d| d.change == marked_only[1 - side]) =>
            {
                "open there".to_owned()
            }
            None => "one arrangement, as marked".to_owned(),
        }
    });
    let [a, b] = claims;
    // "One of them" has to come second.
    Some(match groups[0].0.is_empty() {
        true => format!("B is {b}; A is {a}."),
        false => format!("A is {a}; B is {b}."),
    })
}

/// The groups of one side that the differences name: kind and numbers, and whether the group holds
/// every marked centre and axis of the record.
struct Groups(BTreeMap<&'static str, (BTreeSet<usize>, bool)>);

impl Groups {
    fn of(differences: &[&StereoDifference], elements: &[StereoElement], side: usize) -> Self {
        let mut groups: BTreeMap<&'static str, (BTreeSet<usize>, bool)> = BTreeMap::new();
        for (kind, number) in differences.iter().filter_map(|d| d.groups[side]) {
            let whole = elements.iter().all(|element| {
                let inside = element.group == Some((kind, number));
                inside == (element.shape != Shape::DoubleBond) && element.mark != Mark::Absent
            });
            let entry = groups.entry(word(kind)).or_default();
            entry.0.insert(number);
            entry.1 = whole;
        }
        Self(groups)
    }

    fn in_words(&self) -> Option<String> {
        let parts = self.0.iter().map(|(&kind, (numbers, whole))| {
            let names: Vec<String> = numbers.iter().map(|n| (n + 1).to_string()).collect();
            let one = names.len() == 1;
            let plural = if one { "" } else { "s" };
            let name = format!("{kind} group{plural} {}", listed(&names));
            match (kind, one, *whole) {
                ("AND", true, true) => format!("a mixture of both enantiomers ({name})"),
                ("AND", true, false) => format!("a mixture of both arrangements of {name}"),
                ("AND", false, _) => format!("a mixture of all arrangements of {name}"),
                ("OR", true, true) => format!("one of two enantiomers, not said which ({name})"),
                ("OR", ..) => format!("one arrangement of {name}, not said which"),
                (_, true, true) => format!("one of two enantiomers or both ({name})"),
                _ => format!("one arrangement of {name} or several, not said which"),
            }
        });
        let parts: Vec<String> = parts.collect();
        (!parts.is_empty()).then(|| parts.join(", and "))
    }
}

fn word(kind: GroupKind) -> &'static str {
    match kind {
        GroupKind::And => "AND",
        GroupKind::Or => "OR",
        GroupKind::Relative => "relative",
    }
}
