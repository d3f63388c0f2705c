//! What is done at one node of the search: the bound is tightened, and maps are offered on the way.

use super::{descent::Pace, grow::Grower, pairs::PairIndex, polish::polish, search::Search};

/// Ascents at the root. They close easy pairs; the descent does the rest.
const ROOT_ASCENTS: usize = 3;
/// By which part each step of a descent is shorter than the one before, at the root and at other nodes: some 330 steps
/// and some 30.
const ROOT_SLOWNESS: u64 = 80;
const SLOWNESS: u64 = 7;
/// At the root the assignment is polished once in so many steps.
const POLISHED_STEPS: usize = 16;
/// Maps grown from single pairs at the root, at most.
const GROWN: usize = 40;
/// Maps are polished down to this depth.
const POLISHED_DEPTH: usize = 3;

impl Search<'_, '_, '_> {
    /// Tightens the bound as far as it goes and looks for good maps. Returns whether anything is left to search.
    pub(super) fn root(&mut self, grower: Option<&Grower<'_>>) -> bool {
        if !self.settle() {
            return false;
        }
        self.offer_assignment(true);
        for _ in 0..ROOT_ASCENTS {
            if self.meter.ended() {
                return true;
            }
            self.bound.ascend(self.meter);
            if !self.settle() {
                return false;
            }
            self.offer_assignment(false);
        }
        self.offer_assignment(true);
        if let Some(grower) = grower {
            self.offer_grown(grower);
        }
        self.descend(ROOT_SLOWNESS) && self.settle()
    }

    /// Settles a node, tightens its bound and offers its assignment. Returns whether anything is left to search in it.
    pub(super) fn visit(&mut self) -> bool {
        if !self.settle() {
            return false;
        }
        self.bound.ascend(self.meter);
        if !self.settle() || !self.descend(SLOWNESS) {
            return false;
        }
        self.offer_assignment(self.frames.len() <= POLISHED_DEPTH);
        true
    }

    /// Brings the bound near to its least, or below what is needed: then it returns false.
    fn descend(&mut self, slowness: u64) -> bool {
        self.bound.direction.forget();
        let mut pace = Some(Pace::start());
        let mut step = 0;
        while let Some(length) = pace.filter(|_| !self.meter.ended()) {
            let disagrees = self.bound.descend(self.needed() - 1, length, self.meter);
            if !disagrees {
                self.offer_assignment(false);
                return self.settle();
            }
            if !self.settle() {
                return false;
            }
            self.offer_assignment(self.frames.is_empty() && step % POLISHED_STEPS == 0);
            step += 1;
            pace = length.shorter(slowness);
        }
        true
    }

    fn settle(&mut self) -> bool {
        self.bound.settle(self.needed(), self.meter)
    }

    fn offer_assignment(&mut self, polished: bool) {
        if self.meter.ended() {
            return;
        }
        let image = self.bound.assignment.image();
        let distance = self.incumbent.offer(self.problem, image);
        let best = self.incumbent.distance;
        let weights = self.goal.weights;
        let cheaper = weights.cost(distance) + i64::from(self.goal.step) <= weights.cost(best);
        if cheaper && !self.frames.is_empty() {
            self.misleading[usize::from(distance.bonds == best.bonds)] += 1;
        }
        if polished {
            let mut map = image.to_vec();
            polish(self.problem, &mut map, self.meter);
            self.incumbent.offer(self.problem, &map);
        }
    }

    /// Grows maps from the pairs that the bound likes best.
    fn offer_grown(&mut self, grower: &Grower<'_>) {
        let possible = (0..self.pairs.none()).filter(|&pair| self.bound.domain.contains(pair));
        let mut anchors: Vec<(i64, PairIndex)> = possible
            .map(|pair| (self.bound.slack(pair), pair))
            .collect();
        anchors.sort_unstable();
        for &(_, pair) in anchors.iter().take(GROWN) {
            if self.bound.value() < self.needed() || self.meter.ended() {
                return;
            }
            let (left, right) = self.pairs.atoms(pair);
            let mut map = grower.around_pair(left, right);
            self.meter.spend(self.problem.left.atoms());
            polish(self.problem, &mut map, self.meter);
            self.incumbent.offer(self.problem, &map);
        }
    }
}
