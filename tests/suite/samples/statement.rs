//! What a record with stereo groups says, and the list of all samples that it stands for.
//!
//! A sample is a set of stereoisomers. The list follows the definitions in docs/definitions.md to the
//! letter: for each decision of the OR groups every set of assignments in which both arrangements of
//! each AND group are present, then stereoisomers for assignments.

use std::collections::BTreeSet;

use molkin_graph::{GroupKind, Molecule, Parity, StereoGroup};
use molkin_tests::{Markings, Numbers};

/// What a record says of one place.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord)]
pub(super) enum Word {
    Unmarked,
    Absolute(bool),
    /// In a group, by number.
    Grouped(usize, bool),
}

#[derive(Debug, Clone, PartialEq, Eq)]
pub(super) struct Statement {
    pub(super) words: Vec<Word>,
    pub(super) kinds: Vec<GroupKind>,
}

impl Statement {
    pub(super) fn random(places: usize, numbers: &mut Numbers) -> Self {
        let kind = |numbers: &mut Numbers| {
            [
                GroupKind::And,
                GroupKind::Or,
                GroupKind::And,
                GroupKind::Or,
                GroupKind::Relative,
            ][numbers.below(5)]
        };
        let kinds = (0..1 + numbers.below(3))
            .map(|_| kind(numbers))
            .collect::<Vec<_>>();
        let words = (0..places)
            .map(|_| match numbers.below(8) {
                0 => Word::Unmarked,
                1 | 2 => Word::Absolute(numbers.coin()),
                _ => Word::Grouped(numbers.below(kinds.len()), numbers.coin()),
            })
            .collect();
        Self { words, kinds }
    }

    /// A statement close to this one.
    pub(super) fn changed(&self, numbers: &mut Numbers) -> Self {
        let mut other = self.clone();
        let at = numbers.below(other.words.len());
        match numbers.below(4) {
            0 => {
                let group = numbers.below(other.kinds.len());
                for word in &mut other.words {
                    if let Word::Grouped(own, odd) = word
                        && *own == group
                    {
                        *odd = !*odd;
                    }
                }
            }
            1 => {
                for word in &mut other.words {
                    if let Word::Grouped(_, odd) | Word::Absolute(odd) = word {
                        *odd = !*odd;
                    }
                }
            }
            2 => other.words[at] = Self::random(1, numbers).words[0],
            _ => {
                let group = numbers.below(other.kinds.len());
                other.kinds[group] = [GroupKind::And, GroupKind::Or][numbers.below(2)];
            }
        }
        for word in &mut other.words {
            if let Word::Grouped(group, _) = word {
                *group %= other.kinds.len();
            }
        }
        other
    }

    /// The record. Groups also name atoms that say nothing: unmarked ones, and ones in no element.
    pub(super) fn molecule(&self, markings: &Markings<'_>, numbers: &mut Numbers) -> Molecule {
        let marks: Vec<Option<Parity>> = self
            .words
            .iter()
            .map(|word| match *word {
                Word::Unmarked => None,
                Word::Absolute(odd) | Word::Grouped(_, odd) => Some(Parity::from_odd(odd)),
            })
            .collect();
        let mut groups: Vec<StereoGroup> = Vec::new();
        for (number, &kind) in self.kinds.iter().enumerate() {
            let members = self.words.iter().enumerate();
            let members = members.filter(|(_, w)| matches!(w, Word::Grouped(g, _) if *g == number));
            let atoms: Vec<u32> = members
                .map(|(at, _)| {
                    let names = markings.names(at);
                    names[numbers.below(names.len())]
                })
                .collect();
            if !atoms.is_empty() {
                groups.push(StereoGroup { kind, atoms });
            }
        }
        let marked = (0..marks.len()).filter(|&at| marks[at].is_some());
        let named: BTreeSet<u32> = marked.flat_map(|at| markings.names(at)).copied().collect();
        for atom in (0..markings.atoms()).filter(|atom| !named.contains(atom)) {
            let to = numbers.below(8);
            if let Some(group) = groups.get_mut(to) {
                group.atoms.push(atom);
            }
        }
        markings.grouped(&marks, &groups)
    }

    /// Whether one of some places is unmarked, or no more than relative to others.
    pub(super) fn leaves_open(&self, places: &[usize]) -> bool {
        places.iter().any(|&at| match self.words[at] {
            Word::Unmarked => true,
            Word::Absolute(_) => false,
            Word::Grouped(group, _) => self.kinds[group] == GroupKind::Relative,
        })
    }

    /// The samples: sets of stereoisomers, as bits. `None` where there are too many to list.
    pub(super) fn samples(&self, isomer: &dyn Fn(u32) -> usize) -> Option<BTreeSet<u64>> {
        let base = self
            .words
            .iter()
            .enumerate()
            .fold(0, |bits, (at, word)| match *word {
                Word::Absolute(odd) | Word::Grouped(_, odd) => bits | u32::from(odd) << at,
                Word::Unmarked => bits,
            });
        let mut pieces: Vec<(GroupKind, u32)> = Vec::new();
        for (number, &kind) in self.kinds.iter().enumerate() {
            let mask = self
                .words
                .iter()
                .enumerate()
                .fold(0, |mask, (at, word)| match word {
                    Word::Grouped(group, _) if *group == number => mask | 1 << at,
                    _ => mask,
                });
            if mask != 0 {
                pieces.push((kind, mask));
            }
        }
        for (at, word) in self.words.iter().enumerate() {
            if *word == Word::Unmarked {
                pieces.push((GroupKind::Relative, 1 << at));
            }
        }
        let of = |kind: GroupKind| -> Vec<u32> {
            let own = pieces.iter().filter(|(own, _)| *own == kind);
            own.map(|&(_, mask)| mask).collect()
        };
        let (or, and, any) = (
            of(GroupKind::Or),
            of(GroupKind::And),
            of(GroupKind::Relative),
        );
        if and.len() + any.len() > 3 {
            return None;
        }
        let mut samples = BTreeSet::new();
        for decided in sums(&or) {
            // All assignments, each with the number of its AND arrangement.
            let assignments: Vec<(usize, u32)> = sums(&and)
                .into_iter()
                .enumerate()
                .flat_map(|(arrangement, present)| {
                    sums(&any)
                        .into_iter()
                        .map(move |left| (arrangement, base ^ decided ^ present ^ left))
                })
                .collect();
            for chosen in 1u32..1 << assignments.len() {
                let own = (0..assignments.len()).filter(|at| chosen >> at & 1 == 1);
                let own: Vec<(usize, u32)> = own.map(|at| assignments[at]).collect();
                let present: BTreeSet<usize> =
                    own.iter().map(|&(arrangement, _)| arrangement).collect();
                if present.len() == 1 << and.len() {
                    samples.insert(own.iter().fold(0, |set, &(_, a)| set | 1 << isomer(a)));
                }
            }
        }
        (samples.len() <= 300).then_some(samples)
    }
}

/// All sums of masks.
fn sums(masks: &[u32]) -> Vec<u32> {
    masks.iter().fold(vec![0], |sums, mask| {
        sums.iter().flat_map(|sum| [*sum, sum ^ mask]).collect()
    })
}

/// The verdict as docs/definitions.md has it.
pub(super) fn expected(
    a: &BTreeSet<u64>,
    b: &BTreeSet<u64>,
    mirror: &dyn Fn(u64) -> u64,
) -> (&'static str, bool) {
    if a == b {
        return ("identical", a.len() > 1);
    }
    if !a.is_disjoint(b) {
        return ("undetermined", false);
    }
    let mut seen = BTreeSet::new();
    for &x in a {
        for &y in b {
            seen.insert(if mirror(x) == y {
                "enantiomers"
            } else if x & y == 0 {
                "diastereomers"
            } else {
                "composition"
            });
        }
    }
    let only = seen.first().copied().filter(|_| seen.len() == 1);
    (only.unwrap_or("unresolved"), false)
}
