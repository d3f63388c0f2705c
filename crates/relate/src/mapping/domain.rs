//! Which pairs are still possible: one set of right atoms for each left atom, undone in reverse.
//!
//! Sparse sets: the possible pairs of an atom stand first in its stretch of one list, a removed pair is swapped behind
//! them, so that undoing is a matter of lengths.

use super::{
    pairs::{PairIndex, Pairs},
    problem::Problem,
};

/// The possible pairs, with each left atom on a right atom of its own.
#[derive(Debug)]
pub(super) struct Domain {
    /// The pairs of each left atom, the possible ones first.
    order: Vec<PairIndex>,
    /// Place of each pair in `order`.
    place: Vec<u32>,
    /// Where the stretch of each left atom begins.
    first: Vec<u32>,
    /// Possible pairs of each left atom.
    left_count: Vec<u32>,
    /// Possible pairs of each right atom.
    right_count: Vec<u32>,
    /// By pair, and false for [`Pairs::none`].
    possible: Vec<bool>,
    /// Class of each left atom.
    class: Vec<u32>,
    removed: Vec<PairIndex>,
}

impl Domain {
    /// Exactly the allowed pairs are possible.
    pub(super) fn new(problem: &Problem, pairs: &Pairs, allowed: &[bool]) -> Self {
        let atoms = problem.left.atoms();
        let mut domain = Self {
            order: (0..pairs.none()).collect(),
            place: (0..pairs.none()).collect(),
            first: vec![0; atoms],
            left_count: vec![0; atoms],
            right_count: vec![0; atoms],
            possible: vec![true; pairs.len()],
            class: vec![0; atoms],
            removed: Vec::new(),
        };
        domain.possible.push(false);
        for (index, class) in (0..).zip(&problem.classes) {
            let size = class.left.len() as u32;
            for (&left, &right) in class.left.iter().zip(&class.right) {
                domain.first[left as usize] = pairs.of(left, class.right[0]);
                domain.left_count[left as usize] = size;
                domain.right_count[right as usize] = size;
                domain.class[left as usize] = index;
            }
        }
        for (pair, &allowed) in (0..).zip(allowed) {
            if !allowed {
                domain.remove(pair, pairs);
            }
        }
        domain
    }

    /// Whether a pair is possible; [`Pairs::none`] is not.
    pub(super) fn contains(&self, pair: PairIndex) -> bool {
        self.possible[pair as usize]
    }

    /// The possible pairs of a left atom, in no particular but in a repeatable order.
    pub(super) fn pairs_of(&self, left: u32) -> &[PairIndex] {
        let first = self.first[left as usize] as usize;
        &self.order[first..first + self.left_count[left as usize] as usize]
    }

    pub(super) fn is_fixed(&self, left: u32) -> bool {
        self.left_count[left as usize] == 1
    }

    pub(super) fn class(&self, left: u32) -> usize {
        self.class[left as usize] as usize
    }

    /// A mark to go back to with [`Domain::undo`].
    pub(super) fn mark(&self) -> usize {
        self.removed.len()
    }

    /// The pairs removed since a mark, oldest first.
    pub(super) fn removed_since(&self, mark: usize) -> &[PairIndex] {
        &self.removed[mark..]
    }

    /// Makes all pairs possible again that were removed after the mark.
    pub(super) fn undo(&mut self, mark: usize, pairs: &Pairs) {
        while self.removed.len() > mark {
            let Some(pair) = self.removed.pop() else {
                return;
            };
            let (left, right) = pairs.atoms(pair);
            self.possible[pair as usize] = true;
            self.left_count[left as usize] += 1;
            self.right_count[right as usize] += 1;
        }
    }

    /// Removes a possible pair; what follows from it is left to [`Domain::close`].
    pub(super) fn remove(&mut self, pair: PairIndex, pairs: &Pairs) {
        debug_assert!(self.contains(pair));
        let (left, right) = pairs.atoms(pair);
        self.left_count[left as usize] -= 1;
        self.right_count[right as usize] -= 1;
        let last = self.first[left as usize] + self.left_count[left as usize];
        let place = self.place[pair as usize];
        let other = self.order[last as usize];
        self.order.swap(place as usize, last as usize);
        self.place[pair as usize] = last;
        self.place[other as usize] = place;
        self.possible[pair as usize] = false;
        self.removed.push(pair);
    }

    /// Removes all pairs of a left atom but one.
    pub(super) fn fix(&mut self, pair: PairIndex, pairs: &Pairs) {
        let (left, _) = pairs.atoms(pair);
        for index in (0..self.pairs_of(left).len()).rev() {
            let other = self.pairs_of(left)[index];
            if other != pair {
                self.remove(other, pairs);
            }
        }
    }

    /// Draws the conclusions from all removals since the mark: an atom with one possibility takes it from all others.
    ///
    /// Returns false if some atom has no possibility left.
    pub(super) fn close(&mut self, mark: usize, problem: &Problem, pairs: &Pairs) -> bool {
        let mut next = mark;
        while let Some(&pair) = self.removed.get(next) {
            next += 1;
            let (left, right) = pairs.atoms(pair);
            if self.left_count[left as usize] == 0 || self.right_count[right as usize] == 0 {
                return false;
            }
            if self.left_count[left as usize] == 1 {
                let only = self.pairs_of(left)[0];
                self.take(only, problem, pairs);
            }
            if self.right_count[right as usize] == 1 {
                let class = &problem.classes[self.class(left)];
                let only = class
                    .left
                    .iter()
                    .map(|&left| pairs.of(left, right))
                    .find(|&pair| self.contains(pair));
                if let Some(only) = only {
                    self.fix(only, pairs);
                }
            }
        }
        true
    }

    /// Removes all other pairs of the right atom of `pair`.
    fn take(&mut self, pair: PairIndex, problem: &Problem, pairs: &Pairs) {
        let (left, right) = pairs.atoms(pair);
        if self.right_count[right as usize] == 1 {
            return;
        }
        for &other in &problem.classes[self.class(left)].left {
            let rival = pairs.of(other, right);
            if other != left && self.contains(rival) {
                self.remove(rival, pairs);
            }
        }
    }
}
