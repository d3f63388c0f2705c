//! One form for the union of several alternatives.
//!
//! A set of samples is a Boolean function of which stereoisomers are present. An alternative is the
//! union of intervals of sets: from each set that just hits its blocks up to all its stereoisomers.
//! The greatest intervals within a union of intervals are its prime implicants, a property of the
//! function alone; iterated consensus finds them (Quine, Am. Math. Mon. 1955, 62, 627). For each of
//! their upper ends the samples below it are one alternative again.

use std::collections::{BTreeMap, BTreeSet};

use crate::OrderError;

use super::family::{Alternative, Isomers};

/// Intervals that are kept at the most, and pairs that are looked at.
const MOST_INTERVALS: usize = 4_096;
const MOST_PAIRS: usize = 2_000_000;

/// All sets between two.
#[derive(Debug, Clone, PartialEq, Eq, PartialOrd, Ord)]
struct Interval {
    least: Isomers,
    greatest: Isomers,
}

impl Interval {
    fn is_within(&self, other: &Self) -> bool {
        other.least.is_subset(&self.least) && self.greatest.is_subset(&other.greatest)
    }

    /// The interval that two cover together though neither does, where they are apart in one
    /// stereoisomer only.
    fn consensus(&self, other: &Self) -> Option<Self> {
        let mut apart = self.least.difference(&other.greatest);
        let isomer = *apart.next()?;
        if apart.next().is_some() || !other.least.is_subset(&self.greatest) {
            return None;
        }
        let mut least: Isomers = self.least.union(&other.least).copied().collect();
        least.remove(&isomer);
        let mut greatest: Isomers = self
            .greatest
            .intersection(&other.greatest)
            .copied()
            .collect();
        greatest.insert(isomer);
        Some(Self { least, greatest })
    }
}

/// The alternatives in the form that depends on their samples alone.
///
/// # Errors
/// [`OrderError::TooManySamples`] where there are too many intervals.
pub(super) fn united(
    alternatives: BTreeSet<Alternative>,
) -> Result<BTreeSet<Alternative>, OrderError> {
    let mut found = BTreeSet::new();
    for linked in linked(alternatives) {
        found.append(&mut united_linked(linked)?);
    }
    Ok(found)
}

/// Classes of alternatives that are linked by common stereoisomers. No sample is empty, so intervals of
/// different classes neither lie within each other nor have a consensus.
fn linked(alternatives: BTreeSet<Alternative>) -> Vec<BTreeSet<Alternative>> {
    let mut classes: Vec<BTreeSet<Alternative>> = Vec::new();
    let mut class_of: BTreeMap<usize, usize> = BTreeMap::new();
    for alternative in alternatives {
        let met = alternative.all.iter().filter_map(|i| class_of.get(i));
        let met: BTreeSet<usize> = met.copied().collect();
        let into = met.first().copied().unwrap_or(classes.len());
        classes.resize_with(classes.len().max(into + 1), BTreeSet::new);
        for other in met.into_iter().skip(1) {
            let mut moved = std::mem::take(&mut classes[other]);
            let isomers = moved.iter().flat_map(|own| &own.all);
            class_of.extend(isomers.map(|&isomer| (isomer, into)));
            classes[into].append(&mut moved);
        }
        class_of.extend(alternative.all.iter().map(|&isomer| (isomer, into)));
        classes[into].insert(alternative);
    }
    classes
}

fn united_linked(alternatives: BTreeSet<Alternative>) -> Result<BTreeSet<Alternative>, OrderError> {
    if alternatives.len() < 2 {
        return Ok(alternatives);
    }
    let mut intervals: Vec<Interval> = Vec::new();
    for alternative in &alternatives {
        for least in blocker(&alternative.blocks)? {
            let greatest = alternative.all.clone();
            add(&mut intervals, Interval { least, greatest })?;
        }
    }
    close(&mut intervals)?;
    let tops: BTreeSet<&Isomers> = intervals.iter().map(|own| &own.greatest).collect();
    let mut found = BTreeSet::new();
    for top in tops {
        let below = intervals
            .iter()
            .filter(|own| own.least.is_subset(top) && top.is_subset(&own.greatest));
        let least: BTreeSet<Isomers> = below.map(|own| own.least.clone()).collect();
        found.insert(Alternative {
            blocks: blocker(&least)?,
            all: top.clone(),
        });
    }
    Ok(found)
}

/// Adds an interval unless it lies within another; those within it go.
fn add(intervals: &mut Vec<Interval>, new: Interval) -> Result<bool, OrderError> {
    if intervals.iter().any(|own| new.is_within(own)) {
        return Ok(false);
    }
    intervals.retain(|own| !own.is_within(&new));
    intervals.push(new);
    if intervals.len() > MOST_INTERVALS {
        return Err(OrderError::TooManySamples);
    }
    Ok(true)
}

fn close(intervals: &mut Vec<Interval>) -> Result<(), OrderError> {
    let mut pairs = 0;
    loop {
        pairs += intervals.len() * intervals.len();
        if pairs > MOST_PAIRS {
            return Err(OrderError::TooManySamples);
        }
        let mut found = Vec::new();
        for a in intervals.iter() {
            for b in intervals.iter() {
                found.extend(a.consensus(b));
            }
        }
        let mut changed = false;
        for new in found {
            changed |= add(intervals, new)?;
        }
        if !changed {
            return Ok(());
        }
    }
}

/// The minimal sets that hit all of some sets, one set after the other (Berge, Hypergraphs, 1989,
/// chapter 2).
fn blocker(sets: &BTreeSet<Isomers>) -> Result<BTreeSet<Isomers>, OrderError> {
    let mut hitting = BTreeSet::from([Isomers::new()]);
    let mut pairs = 0;
    for set in sets {
        let (mut next, missing): (BTreeSet<Isomers>, BTreeSet<Isomers>) =
            hitting.into_iter().partition(|own| !own.is_disjoint(set));
        let done: Vec<Isomers> = next.iter().cloned().collect();
        for own in missing {
            pairs += set.len() * (1 + done.len());
            if pairs > MOST_PAIRS || next.len() > MOST_INTERVALS {
                return Err(OrderError::TooManySamples);
            }
            for &isomer in set {
                let mut larger = own.clone();
                larger.insert(isomer);
                if !done.iter().any(|other| other.is_subset(&larger)) {
                    next.insert(larger);
                }
            }
        }
        if next.len() > MOST_INTERVALS {
            return Err(OrderError::TooManySamples);
        }
        hitting = next;
    }
    Ok(hitting)
}

#[cfg(test)]
mod tests {
    use super::*;

    fn set(isomers: &[usize]) -> Isomers {
        isomers.iter().copied().collect()
    }

    #[test]
    fn a_stereoisomer_with_or_without_another_is_one_alternative() {
        let alone = Alternative::of(BTreeSet::from([set(&[1])]));
        let both = Alternative::of(BTreeSet::from([set(&[0]), set(&[1])]));
        let united = united(BTreeSet::from([alone, both])).unwrap();
        let expected = Alternative {
            blocks: BTreeSet::from([set(&[1])]),
            all: set(&[0, 1]),
        };
        assert_eq!(united, BTreeSet::from([expected]));
    }

    /// Also where no two intervals have a consensus: what alternatives share may be said by either.
    #[test]
    fn the_form_depends_on_the_samples_alone() {
        let own = |blocks: &[&[usize]], all: &[usize]| Alternative {
            blocks: blocks.iter().map(|block| set(block)).collect(),
            all: set(all),
        };
        let form = |own: &[Alternative]| united(own.iter().cloned().collect()).unwrap();
        let (first, second) = (own(&[&[0]], &[0, 1]), own(&[&[1]], &[0, 1]));
        assert_eq!(
            form(&[first.clone(), second]),
            form(&[own(&[&[0, 1]], &[0, 1])])
        );
        let beyond = own(&[&[1]], &[0, 1, 2]);
        let either = own(&[&[0, 1]], &[0, 1]);
        assert_eq!(form(&[first, beyond.clone()]), form(&[either, beyond]));
    }

    #[test]
    fn alternatives_are_linked_through_others() {
        let sets = [&[0, 1][..], &[2, 3], &[4], &[1, 2], &[5, 4]];
        let all = sets.map(|own| Alternative::of(BTreeSet::from([set(own)])));
        let mut found: Vec<usize> = linked(all.into()).iter().map(BTreeSet::len).collect();
        found.retain(|&len| len > 0);
        found.sort_unstable();
        assert_eq!(found, [2, 3]);
    }

    #[test]
    fn the_blocker_of_the_blocker_is_the_clutter() {
        let clutter = BTreeSet::from([set(&[0, 1]), set(&[1, 2, 3]), set(&[0, 3])]);
        let back = blocker(&blocker(&clutter).unwrap()).unwrap();
        assert_eq!(back, clutter);
    }
}
