//! Functional groups that only one record has, in words.

use std::collections::BTreeMap;

use crate::FunctionalGroup;

use super::listed;

/// "alcohol in A, ether in B": the groups that each has more often than the other. `None` where there
/// are none, or none with a name.
pub(super) fn difference([a, b]: &[Vec<FunctionalGroup>; 2]) -> Option<String> {
    if a.iter().chain(b).all(|group| group.name.is_none()) {
        return None;
    }
    let sides = [side(a, "A"), side(b, "B")].into_iter().flatten();
    Some(sides.collect::<Vec<_>>().join(", "))
}

fn side(groups: &[FunctionalGroup], place: &str) -> Option<String> {
    let mut named: BTreeMap<&str, usize> = BTreeMap::new();
    for name in groups.iter().filter_map(|group| group.name) {
        *named.entry(name).or_default() += 1;
    }
    let named = named.into_iter().map(|(name, count)| match count {
        1 => name.to_owned(),
        _ => format!("{count} × {name}"),
    });
    let unnamed = groups.iter().filter(|group| group.name.is_none());
    let unnamed = unnamed.map(|group| match group.atoms.len() {
        1 => "an unnamed group of one atom".to_owned(),
        count => format!("an unnamed group of {count} atoms"),
    });
    let words: Vec<String> = named.chain(unnamed).collect();
    (!words.is_empty()).then(|| format!("{} in {place}", listed(&words)))
}
