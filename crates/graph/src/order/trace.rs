//! What a refinement did, in words that are the same for nodes that are images of each other.

use std::cmp::Ordering;

/// Is told what a refinement does, and may end it.
pub(super) trait Watch {
    /// Whether anything is done with what is noted.
    const LISTENS: bool;

    /// Takes note of a word.
    fn note(&mut self, word: u64);

    /// Closes a step of the refinement; `false` ends it.
    fn goes_on(&mut self) -> bool;
}

/// Nothing to compare with: the refinement of a root.
#[derive(Debug)]
pub(super) struct Unwatched;

impl Watch for Unwatched {
    const LISTENS: bool = false;

    fn note(&mut self, _: u64) {}

    fn goes_on(&mut self) -> bool {
        true
    }
}

/// The trace of the present path, step by step beside those of the first and of the best leaf.
///
/// Each word is a hash of all that came before it, so equal words mean, hashing aside, equal
/// histories. Equality of traces only prunes; it never decides that two leaves are equal.
#[derive(Debug, Default, Clone)]
pub(super) struct Trace {
    words: Vec<u64>,
    state: u64,
    first: Vec<u64>,
    best: Vec<u64>,
    standing: Standing,
    has_leaf: bool,
}

/// How a path compares with those of the first and the best leaf.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(super) struct Standing {
    pub(super) like_first: bool,
    pub(super) against_best: Ordering,
}

impl Default for Standing {
    fn default() -> Self {
        Self {
            like_first: true,
            against_best: Ordering::Equal,
        }
    }
}

impl Standing {
    /// Whether leaves below can still be automorphic to the first one, or the best.
    pub(super) fn is_promising(self) -> bool {
        self.like_first || self.against_best.is_le()
    }
}

/// One step of a hash that is invariant because its inputs come in an invariant order.
pub(super) fn mix(state: u64, word: u64) -> u64 {
    let product = u128::from(state ^ word.wrapping_mul(0x9e37_79b9_7f4a_7c15))
        * u128::from(0xd6e8_feb8_6659_fd93u64);
    (product >> 64) as u64 ^ product as u64
}

impl Watch for Trace {
    const LISTENS: bool = true;

    fn note(&mut self, word: u64) {
        self.state = mix(self.state, word);
    }

    fn goes_on(&mut self) -> bool {
        let at = self.words.len();
        self.words.push(self.state);
        if !self.has_leaf {
            return true;
        }
        if self.standing.like_first && self.first.get(at) != Some(&self.state) {
            self.standing.like_first = false;
        }
        if self.standing.against_best.is_eq() {
            self.standing.against_best = self
                .best
                .get(at)
                .map_or(Ordering::Greater, |best| self.state.cmp(best));
        }
        self.standing.is_promising()
    }
}

impl Trace {
    /// Forgets all paths.
    pub(super) fn clear(&mut self) {
        self.words.clear();
        self.state = 0;
        self.standing = Standing::default();
        self.has_leaf = false;
    }

    /// Where the present path is, for [`Trace::back_to`].
    pub(super) fn mark(&self) -> (usize, u64, Standing) {
        (self.words.len(), self.state, self.standing)
    }

    /// Goes back to a node of the present path.
    pub(super) fn back_to(&mut self, (length, state, standing): (usize, u64, Standing)) {
        self.words.truncate(length);
        self.state = state;
        self.standing = standing;
    }

    /// How the present path, now complete, compares.
    pub(super) fn at_leaf(&self) -> Standing {
        let Standing {
            like_first,
            against_best,
        } = self.standing;
        Standing {
            like_first: like_first && self.words.len() == self.first.len(),
            against_best: against_best.then(self.words.len().cmp(&self.best.len())),
        }
    }

    /// Makes the present path the first one, and so the best.
    pub(super) fn keep_first(&mut self) {
        self.first.clone_from(&self.words);
        self.has_leaf = true;
        self.keep_best();
    }

    /// Makes the present path the best one.
    pub(super) fn keep_best(&mut self) {
        self.best.clone_from(&self.words);
        self.standing.against_best = Ordering::Equal;
    }
}
