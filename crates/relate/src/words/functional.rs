//! Functional groups that only one record has, in words.

use std::collections::BTreeMap;

use molkin_graph::Limits;

use crate::{Structure, functional_groups};

/// A group that the table lacks.
const UNNAMED: &str = "a group without a name";

/// "alcohol in A, ether in B": the groups that one has more often than the other. `None` where there
/// are none, or none with a name.
pub(super) fn difference(a: &Structure, b: &Structure, limits: &Limits) -> Option<String> {
    let mut surplus: BTreeMap<Vec<u64>, (&str, i32)> = BTreeMap::new();
    for (structure, step) in [(a, 1), (b, -1)] {
        for group in functional_groups(structure, limits).ok()? {
            let name = group.name.unwrap_or(UNNAMED);
            surplus.entry(group.certificate).or_insert((name, 0)).1 += step;
        }
    }
    let named = |&(name, count): &(&str, i32)| name != UNNAMED && count != 0;
    if !surplus.values().any(named) {
        return None;
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
    Some(sides.join(", "))
}
