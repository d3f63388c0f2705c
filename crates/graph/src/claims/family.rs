//! Families of samples: what a record with stereo groups stands for, on numbered stereoisomers.
//!
//! A sample is a set of stereoisomers. Once all OR groups are decided, the record asks for each
//! arrangement of its AND groups that one stereoisomer of it be present, which one being left to what
//! is open, and that no other stereoisomer be. So its samples are the sets that lie within all these
//! stereoisomers and hit each *block*. Blocks that contain another ask for nothing more.

use std::collections::{BTreeMap, BTreeSet};

use crate::OrderError;

use super::{Freedom, Piece, primes};

pub(super) type Isomers = BTreeSet<usize>;

/// The samples for one decision of all OR groups. Two are equal exactly when their samples are:
/// minimal blocks are what all hitting sets are hit by (Berge, Hypergraphs, 1989, chapter 2).
#[derive(Debug, Clone, PartialEq, Eq, PartialOrd, Ord)]
pub(crate) struct Alternative {
    /// The minimal blocks.
    pub(crate) blocks: BTreeSet<Isomers>,
    pub(crate) all: Isomers,
}

impl Alternative {
    pub(crate) fn of(blocks: BTreeSet<Isomers>) -> Self {
        let all = blocks.iter().flatten().copied().collect();
        let minimal = |block: &&Isomers| {
            let mut smaller = blocks.iter().filter(|other| other.len() < block.len());
            !smaller.any(|other| other.is_subset(block))
        };
        Self {
            blocks: blocks.iter().filter(minimal).cloned().collect(),
            all,
        }
    }

    /// Whether each sample is one of the other's.
    fn is_within(&self, other: &Self) -> bool {
        self.all.is_subset(&other.all)
            && other
                .blocks
                .iter()
                .all(|theirs| self.blocks.iter().any(|ours| ours.is_subset(theirs)))
    }

    /// Whether there is one sample.
    fn is_single(&self) -> bool {
        self.blocks.len() == self.all.len() && self.blocks.iter().all(|block| block.len() == 1)
    }

    pub(crate) fn shares_isomer(&self, other: &Self) -> bool {
        !self.all.is_disjoint(&other.all)
    }

    /// Whether some sample is one of the other's: the greatest candidate is what both allow.
    fn meets(&self, other: &Self) -> bool {
        let both: Isomers = self.all.intersection(&other.all).copied().collect();
        let mut blocks = self.blocks.iter().chain(&other.blocks);
        blocks.all(|block| !block.is_disjoint(&both))
    }

    fn mapped(&self, image: &impl Fn(usize) -> usize) -> Self {
        let map = |set: &Isomers| set.iter().map(|&isomer| image(isomer)).collect();
        Self {
            blocks: self.blocks.iter().map(map).collect(),
            all: map(&self.all),
        }
    }
}

/// All samples of a record: those of any of its alternatives. Equal exactly for equal samples: see
/// [`primes`].
#[derive(Debug, Clone, Default, PartialEq, Eq)]
pub(crate) struct Family {
    pub(crate) alternatives: BTreeSet<Alternative>,
}

impl Family {
    /// The family of some pieces; `isomer` numbers the stereoisomer in which the pieces of a mask
    /// are inverted.
    ///
    /// # Errors
    /// [`OrderError::TooManySamples`].
    pub(crate) fn of(pieces: &[Piece], isomer: impl Fn(u64) -> usize) -> Result<Self, OrderError> {
        let [or, and, any] = [Freedom::Or, Freedom::And, Freedom::Any].map(|freedom| {
            let own = (0..).zip(pieces).filter(|(_, p)| p.freedom == freedom);
            own.fold(0u64, |mask, (at, _)| mask | 1 << at)
        });
        let block = |fixed: u64| -> Isomers { subsets(any).map(|m| isomer(fixed | m)).collect() };
        let all = subsets(or)
            .map(|choice| Alternative::of(subsets(and).map(|m| block(choice | m)).collect()));
        let united = primes::united(reduced(&all.collect()))?;
        Ok(Self {
            alternatives: reduced(&united),
        })
    }

    /// Whether there is one sample.
    pub(crate) fn is_single(&self) -> bool {
        self.alternatives.len() == 1 && self.alternatives.iter().all(Alternative::is_single)
    }

    /// The stereoisomers, if the samples are all sets of them.
    pub(crate) fn one_block(&self) -> Option<&Isomers> {
        let only = self.alternatives.first()?;
        let one = self.alternatives.len() == 1 && only.blocks.len() == 1;
        one.then_some(&only.all)
            .filter(|all| only.blocks.first() == Some(all))
    }

    /// Whether an exchange of stereoisomers maps what is free to be one, the other or both (`Any`),
    /// has to be both (`And`), or either (`Or`) onto itself.
    pub(crate) fn is_kept_by(&self, freedom: Freedom, image: &impl Fn(usize) -> usize) -> bool {
        let map = |set: &Isomers| -> Isomers { set.iter().map(|&i| image(i)).collect() };
        match freedom {
            Freedom::Or => {
                let images = self.alternatives.iter().map(|own| own.mapped(image));
                images.collect::<BTreeSet<_>>() == self.alternatives
            }
            Freedom::And => self
                .alternatives
                .iter()
                .all(|own| own.mapped(image) == *own),
            Freedom::Any => self
                .alternatives
                .iter()
                .flat_map(|own| own.blocks.iter().chain([&own.all]))
                .all(|set| map(set) == *set),
        }
    }

    /// Sets that the samples are made from: minimal blocks, and all stereoisomers of an alternative.
    pub(crate) fn sets(&self) -> impl Iterator<Item = &Isomers> {
        let own = |a: &'_ Alternative| a.blocks.len() > 1 || a.blocks.first() != Some(&a.all);
        self.alternatives
            .iter()
            .flat_map(move |a| a.blocks.iter().chain(own(a).then_some(&a.all)))
    }

    /// Whether some sample is one of the other's.
    pub(crate) fn meets(&self, other: &Self) -> bool {
        self.pairs(other).any(|(a, b)| a.meets(b))
    }

    /// All pairs of alternatives.
    pub(crate) fn pairs<'f>(
        &'f self,
        other: &'f Self,
    ) -> impl Iterator<Item = (&'f Alternative, &'f Alternative)> {
        self.alternatives
            .iter()
            .flat_map(|a| other.alternatives.iter().map(move |b| (a, b)))
    }
}

/// Alternatives that do not lie within another.
fn reduced(all: &BTreeSet<Alternative>) -> BTreeSet<Alternative> {
    // One that lies within another has all its stereoisomers there, the first among them.
    let mut holding: BTreeMap<usize, Vec<&Alternative>> = BTreeMap::new();
    for own in all {
        for &isomer in &own.all {
            holding.entry(isomer).or_default().push(own);
        }
    }
    let kept = all.iter().filter(|own| {
        let others = own.all.first().and_then(|first| holding.get(first));
        let mut others = others.into_iter().flatten();
        !others.any(|other| other != own && own.is_within(other))
    });
    kept.cloned().collect()
}

/// All masks within a mask.
pub(crate) fn subsets(mask: u64) -> impl Iterator<Item = u64> {
    let mut next = Some(0u64);
    std::iter::from_fn(move || {
        let own = next?;
        // The next higher number with bits of the mask only.
        let following = own.wrapping_sub(mask) & mask;
        next = (following != 0).then_some(following);
        Some(own)
    })
}

/// Whether samples without a common stereoisomer exist where one side's samples are, in each of some
/// copies of the alternative `a`, sets that hit all its blocks, and the other's need one stereoisomer
/// of each block of `b` from any of the copies. Exact; `steps` counts the blocks that are looked at.
pub(crate) fn leaves_room(
    a: &Alternative,
    b: &Alternative,
    copies: u64,
    steps: &mut u64,
    limit: u64,
) -> Result<bool, OrderError> {
    let covered: Vec<&Isomers> = b.blocks.iter().collect();
    let blocks: Vec<&Isomers> = a.blocks.iter().collect();
    let mut room = Room {
        blocks: &blocks,
        steps,
        limit,
    };
    room.is_left(&covered, copies)
}

struct Room<'r> {
    blocks: &'r [&'r Isomers],
    steps: &'r mut u64,
    limit: u64,
}

impl Room<'_> {
    fn is_left(&mut self, wanted: &[&Isomers], copies: u64) -> Result<bool, OrderError> {
        if wanted.is_empty() {
            return Ok(true);
        }
        if copies == 0 {
            return Ok(false);
        }
        self.choose(0, &mut Isomers::new(), wanted, copies)
    }

    /// Hits the blocks from the given one on, then looks which of the wanted are still without room.
    fn choose(
        &mut self,
        from: usize,
        chosen: &mut Isomers,
        wanted: &[&Isomers],
        copies: u64,
    ) -> Result<bool, OrderError> {
        let mut rest = self.blocks[from..].iter().zip(from..);
        let next = rest.find(|(block, _)| block.is_disjoint(chosen));
        let reached = next.map_or(self.blocks.len(), |(_, at)| at);
        *self.steps += 1 + (reached - from) as u64;
        if *self.steps > self.limit {
            return Err(OrderError::StepLimit { limit: self.limit });
        }
        let Some(next) = next else {
            let filled = wanted.iter().filter(|block| block.is_subset(chosen));
            let filled: Vec<&Isomers> = filled.copied().collect();
            return if filled.len() < wanted.len() {
                self.is_left(&filled, copies - 1)
            } else {
                Ok(false)
            };
        };
        for &isomer in next.0.iter() {
            chosen.insert(isomer);
            let found = self.choose(next.1 + 1, chosen, wanted, copies)?;
            chosen.remove(&isomer);
            if found {
                return Ok(true);
            }
        }
        Ok(false)
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn set(isomers: &[usize]) -> Isomers {
        isomers.iter().copied().collect()
    }

    fn alternative(blocks: &[&[usize]]) -> Alternative {
        Alternative::of(blocks.iter().map(|block| set(block)).collect())
    }

    /// All samples, by trying every set.
    fn samples(own: &Alternative) -> BTreeSet<Isomers> {
        let isomers: Vec<usize> = own.all.iter().copied().collect();
        (0u32..1 << isomers.len())
            .map(|mask| {
                let chosen = isomers.iter().enumerate();
                let chosen = chosen.filter(|(at, _)| mask >> at & 1 == 1);
                chosen.map(|(_, &isomer)| isomer).collect::<Isomers>()
            })
            .filter(|chosen| own.blocks.iter().all(|block| !block.is_disjoint(chosen)))
            .collect()
    }

    #[test]
    fn questions_agree_with_listed_samples() {
        let shapes: Vec<Alternative> = [
            &[&[0][..]][..],
            &[&[0, 1]],
            &[&[0], &[1]],
            &[&[0, 1], &[1, 2]],
            &[&[0, 1], &[2, 3]],
            &[&[1, 2, 3]],
            &[&[0, 2], &[1], &[0, 1, 3]],
            &[&[4], &[0, 3]],
            &[&[4, 5]],
        ]
        .iter()
        .map(|blocks| alternative(blocks))
        .collect();
        for a in &shapes {
            for b in &shapes {
                let (ours, theirs) = (samples(a), samples(b));
                assert_eq!(a.is_within(b), ours.is_subset(&theirs), "{a:?} {b:?}");
                assert_eq!(a.meets(b), !ours.is_disjoint(&theirs), "{a:?} {b:?}");
                let apart = ours.iter().any(|x| theirs.iter().any(|y| x.is_disjoint(y)));
                let room = leaves_room(a, b, 1, &mut 0, 1000).unwrap();
                assert_eq!(room, apart, "{a:?} {b:?}");
            }
            assert_eq!(a.is_single(), samples(a).len() == 1);
        }
    }

    /// Two copies of a block of one stereoisomer each leave no room for it in either.
    #[test]
    fn copies_give_room_only_where_a_choice_is_left() {
        let (one, two) = (alternative(&[&[0]]), alternative(&[&[0, 1]]));
        let wanted = alternative(&[&[0], &[1]]);
        assert!(!leaves_room(&one, &one, 2, &mut 0, 100).unwrap());
        assert!(!leaves_room(&two, &wanted, 1, &mut 0, 100).unwrap());
        assert!(leaves_room(&two, &wanted, 2, &mut 0, 100).unwrap());
    }

    #[test]
    fn subsets_of_a_mask() {
        assert_eq!(subsets(0b101).collect::<Vec<_>>(), [0, 1, 4, 5]);
        assert_eq!(subsets(0).collect::<Vec<_>>(), [0]);
    }
}
