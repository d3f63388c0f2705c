//! Functional groups that only one record has, in words.

use std::collections::BTreeMap;

use crate::FunctionalGroup;

/// A group that the table lacks.
const UNNAMED: &str = "a group without a name";

/// "alcohol in A, ether in B": the groups that each has more often than the other. `None` where there
/// are none, or none with a name.
pub(super) fn difference([a, b]: &[Vec<FunctionalGroup>; 2]) -> Option<String> {
    if a.iter().chain(b).all(|group| group.name.is_none()) {
        return None;
    }
    let side = |groups: &[FunctionalGroup], place: &str| {
        let mut own: BTreeMap<&str, usize> = BTreeMap::new();
        for group in groups {
            *own.entry(group.name.unwrap_or(UNNAMED)).or_default() += 1;
        }
        let words = own.into_iter().map(|(name, count)| match count {
            1 => name.to_owned(),
            _ => format!("{count} × {name}"),
        });
        let words: Vec<String> = words.collect();
        (!words.is_empty()).then(|| format!("{} in {place}", words.join(" and ")))
    };
    let sides = [side(a, "A"), side(b, "B")].into_iter().flatten();
    Some(sides.collect::<Vec<_>>().join(", "))
}
