//! An upper bound on the reward of any map, tightened by moving shares.
//!
//! A kept bond earns a reward only if both of its pairs are chosen, so the reward is split between the two pairs. Each pair
//! alone then earns at most the best matching of its slots (less its own cost), and the best linear assignment of these
//! profits bounds the reward of every map, whatever the split. The ascent moves shares to pairs that are not chosen, as
//! far as they can grow for nothing, so that the chosen ones shrink.

use super::{
    assignment::{Assignment, Duals, Input},
    descent::Direction,
    domain::Domain,
    goal::Weights,
    local,
    meter::Meter,
    pairs::{PairIndex, Pairs},
    problem::Problem,
    shares::{self, Shares},
};

/// Hopeless pairs are looked for whenever the bound came nearer to what is needed, and once in so many times otherwise.
const HOPELESS_EVERY: u32 = 4;

/// What can be put back with [`Bound::undo`].
#[derive(Debug)]
pub(super) struct Mark {
    removed: usize,
    shares: shares::Mark,
    duals: Duals,
}

/// The bound, its shares and the possible pairs.
#[derive(Debug)]
pub(super) struct Bound<'p> {
    pub(super) problem: &'p Problem,
    pub(super) pairs: &'p Pairs,
    pub(super) domain: Domain,
    pub(super) assignment: Assignment,
    shares: Shares<'p>,
    /// What laying the atoms of a pair on each other costs.
    cost: Vec<i64>,
    /// Pairs whose profit has to be computed anew.
    queue: Vec<PairIndex>,
    queued: Vec<bool>,
    pub(super) weights: Vec<i32>,
    gaps: Vec<i32>,
    pub(super) direction: Direction,
    /// Times that the bound settled, and by how much it was above what is needed the last time.
    settled: u32,
    spare: i64,
}

impl<'p> Bound<'p> {
    /// Starts from half and half, or in the proportion of the shares of an earlier bound.
    pub(super) fn new(
        problem: &'p Problem,
        pairs: &'p Pairs,
        weights: Weights,
        earlier: Option<(&[i32], Weights)>,
        allowed: &[bool],
    ) -> Self {
        let cost = (0..pairs.none()).map(|pair| {
            let (left, right) = pairs.atoms(pair);
            weights.atom_cost(problem, left, right)
        });
        Self {
            problem,
            pairs,
            domain: Domain::new(problem, pairs, allowed),
            assignment: Assignment::new(problem, pairs),
            shares: Shares::new(pairs, weights, earlier),
            cost: cost.collect(),
            queue: (0..pairs.none()).collect(),
            queued: vec![true; pairs.len()],
            weights: Vec::new(),
            gaps: Vec::new(),
            direction: Direction::new(pairs.slots()),
            settled: 0,
            spare: i64::MAX,
        }
    }

    pub(super) fn shares(&self) -> &[i32] {
        self.shares.shares()
    }

    /// No map of possible pairs has a higher reward, in parts of the unit.
    pub(super) fn value(&self) -> i64 {
        self.assignment.value()
    }

    /// By how much the bound drops, at least, if this pair is forced.
    pub(super) fn slack(&self, pair: PairIndex) -> i64 {
        self.assignment
            .slack(self.pairs.atoms(pair), self.shares.profit(pair))
    }

    /// Notes the present state. Call only when settled.
    pub(super) fn mark(&mut self) -> Mark {
        Mark {
            removed: self.domain.mark(),
            shares: self.shares.mark(),
            duals: self.assignment.duals().clone(),
        }
    }

    /// Goes back to a mark.
    pub(super) fn undo(&mut self, mark: &Mark) {
        for pair in self.queue.drain(..) {
            self.queued[pair as usize] = false;
        }
        self.shares.undo(mark.shares);
        self.domain.undo(mark.removed, self.pairs);
        self.assignment.restore(&mark.duals);
    }

    /// Removes pairs and what follows from that. Returns false if no map is left.
    pub(super) fn remove_all(&mut self, remove: impl IntoIterator<Item = PairIndex>) -> bool {
        let mark = self.domain.mark();
        for pair in remove {
            if self.domain.contains(pair) {
                self.domain.remove(pair, self.pairs);
            }
        }
        self.conclude(mark)
    }

    /// Fixes a pair and what follows from that. Returns false if no map is left.
    pub(super) fn fix(&mut self, pair: PairIndex) -> bool {
        let mark = self.domain.mark();
        self.domain.fix(pair, self.pairs);
        self.conclude(mark)
    }

    /// Brings bound and possibilities to rest. Returns false if no map of reward `needed` or more is left.
    ///
    /// Stops early, with true, when the meter ends.
    pub(super) fn settle(&mut self, needed: i64, meter: &mut Meter<'_>) -> bool {
        loop {
            self.evaluate_queue(meter);
            let input = Input {
                problem: self.problem,
                pairs: self.pairs,
                domain: &self.domain,
                profit: self.shares.profits(),
            };
            if !self.assignment.solve(input, meter) || self.value() < needed {
                return false;
            }
            let spare = self.value() - needed;
            self.settled = self.settled.wrapping_add(1);
            let worthwhile = spare < self.spare || self.settled.is_multiple_of(HOPELESS_EVERY);
            self.spare = spare;
            if worthwhile && !self.remove_hopeless(needed) {
                return false;
            }
            if meter.ended() || (self.queue.is_empty() && !self.assignment.is_stale()) {
                return true;
            }
        }
    }

    /// Moves shares once over all possible pairs. Settle afterwards.
    pub(super) fn ascend(&mut self, meter: &mut Meter<'_>) {
        for left in 0..self.problem.left.atoms() as u32 {
            let near = self.problem.left.neighbours(left);
            if self.domain.is_fixed(left) && near.iter().all(|near| self.domain.is_fixed(near.atom))
            {
                continue;
            }
            for index in 0..self.domain.pairs_of(left).len() {
                let pair = self.domain.pairs_of(left)[index];
                self.take_shares(pair, meter);
            }
        }
    }

    /// Moves a part of a reward, or as much of it as there is, from one end to the other.
    pub(super) fn move_share(&mut self, to: usize, from: usize, part: i64) {
        let part = part.min(i64::from(self.shares.share(from))) as i32;
        if part > 0 {
            let (gains, loses) = (self.pairs.partner(from), self.pairs.partner(to));
            self.shares.take(gains, to, part);
            self.enqueue(gains);
            self.enqueue(loses);
        }
    }

    /// Takes shares from the partners of a pair, as far as it can grow for nothing: a part of its slack in the assignment
    /// and of the gap of each slot in the matching.
    fn take_shares(&mut self, pair: PairIndex, meter: &mut Meter<'_>) {
        let (rows, columns) = self.gather(pair, meter);
        let best = local::best_and_gaps(&self.weights, rows, columns, &mut self.gaps);
        let profit = i64::from(best) - self.cost[pair as usize];
        let slack = self.assignment.slack(self.pairs.atoms(pair), profit).max(0);
        let few = rows.min(columns).max(1) as i64;
        for (index, slot) in self.pairs.block(pair).enumerate() {
            let partner = self.pairs.partner(slot);
            if !self.domain.contains(partner) {
                continue;
            }
            // Three quarters of the slack and half of the gap: all of both would swing back and forth.
            let wanted = (3 * slack + 2 * i64::from(self.gaps[index])) / (4 * few);
            let left_to_take = self.shares.share(self.pairs.mirror(slot));
            if wanted > 0 && left_to_take > 0 {
                self.move_share(slot, self.pairs.mirror(slot), wanted);
            }
        }
    }

    /// Tells partners and assignment what was removed since the mark, and closes the domain.
    fn conclude(&mut self, mark: usize) -> bool {
        if !self.domain.close(mark, self.problem, self.pairs) {
            return false;
        }
        for index in 0..self.domain.removed_since(mark).len() {
            let pair = self.domain.removed_since(mark)[index];
            self.assignment.note_removal(self.pairs.atoms(pair));
            for slot in self.pairs.block(pair) {
                let partner = self.pairs.partner(slot);
                if self.domain.contains(partner) && self.shares.share(self.pairs.mirror(slot)) > 0 {
                    self.enqueue(partner);
                }
            }
        }
        true
    }

    /// Removes the pairs that no map of reward `needed` has.
    fn remove_hopeless(&mut self, needed: i64) -> bool {
        let spare = self.value() - needed;
        let mark = self.domain.mark();
        for left in 0..self.problem.left.atoms() as u32 {
            for index in (0..self.domain.pairs_of(left).len()).rev() {
                let pair = self.domain.pairs_of(left)[index];
                if self.slack(pair) > spare {
                    self.domain.remove(pair, self.pairs);
                }
            }
        }
        self.conclude(mark)
    }

    fn enqueue(&mut self, pair: PairIndex) {
        if !std::mem::replace(&mut self.queued[pair as usize], true) {
            self.queue.push(pair);
        }
    }

    fn evaluate_queue(&mut self, meter: &mut Meter<'_>) {
        while let Some(pair) = self.queue.pop() {
            self.queued[pair as usize] = false;
            if !self.domain.contains(pair) {
                continue;
            }
            let (rows, columns) = self.gather(pair, meter);
            let profit =
                i64::from(local::best(&self.weights, rows, columns)) - self.cost[pair as usize];
            if profit != self.shares.profit(pair) {
                self.shares.set_profit(pair, profit);
                self.assignment.note_profit(self.pairs.atoms(pair), profit);
            }
        }
    }

    /// Collects the shares of a pair that can still be earned; its size comes back.
    pub(super) fn gather(&mut self, pair: PairIndex, meter: &mut Meter<'_>) -> (usize, usize) {
        let (left, right) = self.pairs.atoms(pair);
        let size = (
            self.problem.left.degree(left),
            self.problem.right.degree(right),
        );
        self.weights.clear();
        let shares = &self.shares.shares()[self.pairs.block(pair)];
        let partners = self.pairs.partners(pair);
        let earned = shares.iter().zip(partners).map(|(&share, &partner)| {
            if self.domain.contains(partner) {
                share
            } else {
                0
            }
        });
        self.weights.extend(earned);
        meter.spend(local::steps(size.0, size.1));
        size
    }
}
