//! Differences between marks that belong to stereo groups.
//!
//! A mark in a group is relative to the others of its group, so whole groups are inverted on either
//! side until the fewest marks are opposed. What then agrees may still be meant in another way.

use std::collections::{BTreeMap, BTreeSet};

use super::{StereoChange, StereoDifference};

/// An element that both sides mark.
pub(super) struct Marked {
    /// Whether the marks are opposed as drawn.
    pub(super) opposed: bool,
    /// The difference if they stay so.
    pub(super) difference: StereoDifference,
}

/// Groups whose inversions are all tried, on the side that has fewer.
const MOST_GROUPS: usize = 12;

/// The elements that differ. Fewest marks are opposed, unless both sides have more than twelve groups:
/// then groups are left as drawn.
pub(super) fn differences(mut marked: Vec<Marked>) -> Vec<StereoDifference> {
    let opposed = least_opposed(&marked);
    let extent = |side: usize| -> BTreeMap<usize, BTreeSet<usize>> {
        let mut extents: BTreeMap<usize, BTreeSet<usize>> = BTreeMap::new();
        for (at, element) in marked.iter().enumerate() {
            if let Some((_, number)) = element.difference.groups[side] {
                extents.entry(number).or_default().insert(at);
            }
        }
        extents
    };
    let extents = [extent(0), extent(1)];
    let meant = |element: &Marked, side: usize| {
        let (kind, number) = element.difference.groups[side]?;
        Some((kind, extents[side].get(&number)))
    };
    let regrouped: Vec<bool> = marked
        .iter()
        .map(|element| meant(element, 0) != meant(element, 1))
        .collect();
    let changes = opposed.into_iter().zip(regrouped);
    marked
        .drain(..)
        .zip(changes)
        .filter_map(|(element, change)| {
            let change = match change {
                (true, _) => StereoChange::Inverted,
                (false, true) => StereoChange::GroupDiffers,
                (false, false) => return None,
            };
            Some(StereoDifference {
                change,
                ..element.difference
            })
        })
        .collect()
}

/// Which marks stay opposed when groups are inverted so that the fewest are: all inversions on one
/// side, and for each the better one of each group of the other.
fn least_opposed(marked: &[Marked]) -> Vec<bool> {
    let numbers = |side: usize| -> Vec<usize> {
        let own: BTreeSet<usize> = marked
            .iter()
            .filter_map(|element| Some(element.difference.groups[side]?.1))
            .collect();
        own.into_iter().collect()
    };
    let (first, second) = (numbers(0), numbers(1));
    let (tried, settled) = if first.len() <= second.len() {
        ((0, first), 1)
    } else {
        ((1, second), 0)
    };
    let (side, tried) = tried;
    let drawn = || marked.iter().map(|element| element.opposed).collect();
    if tried.len() > MOST_GROUPS {
        return drawn();
    }
    let mut best: Vec<bool> = drawn();
    let count = |opposed: &[bool]| opposed.iter().filter(|&&own| own).count();
    for mask in 0u32..1 << tried.len() {
        let mut opposed: Vec<bool> = drawn();
        for (own, element) in opposed.iter_mut().zip(marked) {
            let group = element.difference.groups[side].map(|(_, number)| number);
            let at = group.and_then(|number| tried.binary_search(&number).ok());
            *own ^= at.is_some_and(|at| mask >> at & 1 == 1);
        }
        invert_majorities(&mut opposed, marked, settled);
        if count(&opposed) < count(&best) {
            best = opposed;
        }
    }
    best
}

/// Inverts each group of one side in which more marks are opposed than not.
fn invert_majorities(opposed: &mut [bool], marked: &[Marked], side: usize) {
    let mut surplus: BTreeMap<usize, isize> = BTreeMap::new();
    for (&own, element) in opposed.iter().zip(marked) {
        if let Some((_, number)) = element.difference.groups[side] {
            *surplus.entry(number).or_default() += if own { 1 } else { -1 };
        }
    }
    for (own, element) in opposed.iter_mut().zip(marked) {
        let turned =
            element.difference.groups[side].is_some_and(|(_, number)| surplus[&number] > 0);
        *own ^= turned;
    }
}
