//! Functional groups that only one record has, in words.

use std::collections::BTreeMap;

use molkin_graph::Limits;

use crate::{Structure, functional_groups};

/// "alcohol in A, ether in B": the groups that one has more often than the other.
pub(super) fn difference(a: &Structure, b: &Structure, limits: &Limits) -> Option<String> {
    let mut surplus: BTreeMap<Vec<u64>, (&str, i32)> = BTreeMap::new();
    for (structure, step) in [(a, 1), (b, -1)] {
        for group in functional_groups(structure, limits).ok()? {
            let name = group.name.unwrap_or("a group without a name");
            surplus.entry(group.certificate).or_insert((name, 0)).1 += step;
        }
    }
    let side = |sign: i32, place: &str| {
        let mut own: BTreeMap<&str, i32> = BTreeMap::new();
        for &(name, count) in surplus.values().filter(|(_, count)| count * sign > 0) {
            *own.entry(name).or_default() += count * sign;
        }
        let words = own.into_iter().map(|(name, count)| match count {
            1 => name.to_owned(),
            _ => format!("{count} × {name}"),
        });
        let words: Vec<String> = words.collect();
        (!words.is_empty()).then(|| format!("{} in {place}", words.join(" and ")))
    };
    let sides: Vec<String> = [side(1, "A"), side(-1, "B")]
        .into_iter()
        .flatten()
        .collect();
    (!sides.is_empty()).then(|| sides.join(", "))
}
