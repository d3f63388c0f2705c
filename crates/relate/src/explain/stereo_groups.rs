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
        let groups = marked.iter().filter_map(|m| m.difference.groups[side]);
        let own: BTreeSet<usize> = groups.map(|(_, number)| number).collect();
        own.into_iter().collect()
    };
    let (first, second) = (numbers(0), numbers(1));
    let (side, tried, settled) = if first.len() <= second.len() {
        (0, first, second)
    } else {
        (1, second, first)
    };
    if tried.len() > MOST_GROUPS {
        return marked.iter().map(|element| element.opposed).collect();
    }
    // The group of an element on either side; past the last for none.
    let place = |element: &Marked| {
        let index = |side: usize, own: &[usize]| {
            let number = element.difference.groups[side].map(|(_, number)| number);
            let at = number.and_then(|number| own.binary_search(&number).ok());
            at.unwrap_or(own.len())
        };
        (index(side, &tried), index(1 - side, &settled))
    };
    let mut surplus = vec![vec![0isize; settled.len() + 1]; tried.len() + 1];
    for element in marked {
        let (own, other) = place(element);
        surplus[own][other] += if element.opposed { 1 } else { -1 };
    }
    let inverted = best_inversions(&surplus);
    let turned = marked.iter().map(|element| {
        let (own, other) = place(element);
        let (of_own, of_other) = &inverted;
        element.opposed ^ of_own[own] ^ of_other[other]
    });
    turned.collect()
}

/// The groups to invert on the side that is tried and on the other. `surplus` says, by groups of both
/// sides with the last for none, by how many more marks are opposed than not. Neighbouring masks differ
/// in one bit (Gray code), so that one group is inverted at a time; of equally good masks the least.
fn best_inversions(surplus: &[Vec<isize>]) -> (Vec<bool>, Vec<bool>) {
    let (tried, others) = (surplus.len() - 1, surplus[0].len());
    let sum = |at: usize| surplus.iter().map(|own| own[at]).sum();
    let mut sums: Vec<isize> = (0..others).map(sum).collect();
    let drawn: isize = sums.iter().sum();
    let mut best = (drawn, 0u32, vec![false; others]);
    for step in 0u32..1 << tried {
        let mask = step ^ (step >> 1);
        if step > 0 {
            let changed = step.trailing_zeros() as usize;
            let sign = if mask >> changed & 1 == 1 { -2 } else { 2 };
            for (sum, own) in sums.iter_mut().zip(&surplus[changed]) {
                *sum += sign * own;
            }
        }
        let ungrouped = sums[others - 1];
        let grouped = sums[..others - 1].iter().map(|sum| -sum.abs());
        let least = ungrouped + grouped.sum::<isize>();
        if least < best.0 || least == best.0 && least < drawn && mask < best.1 {
            let grouped = (0..others).map(|at| at + 1 < others && sums[at] > 0);
            best = (least, mask, grouped.collect());
        }
    }
    let own = (0..=tried).map(|at| at < tried && best.1 >> at & 1 == 1);
    (own.collect(), best.2)
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn groups_are_inverted_where_that_leaves_fewer_opposed() {
        // Two groups on the tried side and one on the other; the last row and column have none.
        let surplus = [vec![3, -1], vec![-2, 0], vec![1, 0]];
        assert_eq!(
            best_inversions(&surplus),
            (vec![false, true, false], vec![true, false])
        );
        assert_eq!(best_inversions(&[vec![2]]), (vec![false], vec![false]));
        assert_eq!(
            best_inversions(&[vec![1], vec![2]]),
            (vec![true, false], vec![false])
        );
    }
}
