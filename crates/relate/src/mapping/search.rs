//! Branch and bound over the pairs: one atom at a time, first laid where the assignment lays it, then not.

use super::{
    assignment,
    bound::{Bound, Mark},
    goal::{Goal, Incumbent, SCALE},
    grow::Grower,
    meter::Meter,
    pairs::{PairIndex, Pairs},
    problem::Problem,
    symmetry::Orbits,
};

/// A search is given up once so many nodes held maps that cost less than the incumbent but are not better.
const MOST_MISLEADING: usize = 8;

/// Weights that reached this do not grow: the search goes on.
const LARGEST_WEIGHT: i32 = 256;

/// What a search came to.
#[derive(Debug)]
pub(super) struct Outcome {
    /// Whether it is proved that no map is better by a step.
    pub(super) proved: bool,
    /// No map has a lower weighted cost than this or than the incumbent's.
    pub(super) cost_at_least: i64,
    /// The shares at the root, a good start for the next search.
    pub(super) shares: Vec<i32>,
    /// The search was given up, as too many maps cost less than the incumbent without being better.
    pub(super) misled: Option<Misled>,
}

/// By which part of the distance most maps are worse that cost less: its weight is too small.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(super) enum Misled {
    Bonds,
    Orders,
}

/// One decision on the way from the root.
pub(super) struct Frame {
    pair: PairIndex,
    mark: Mark,
    /// The bound when the decision was taken.
    value: i64,
}

/// Orbits of both sides once the decisions up to some depth are taken.
struct BothOrbits {
    left: Orbits,
    right: Orbits,
}

pub(super) struct Search<'p, 's, 'm> {
    pub(super) problem: &'p Problem,
    pub(super) pairs: &'p Pairs,
    pub(super) goal: Goal,
    pub(super) bound: Bound<'p>,
    pub(super) incumbent: &'m mut Incumbent,
    pub(super) meter: &'m mut Meter<'s>,
    pub(super) frames: Vec<Frame>,
    /// By depth, found when first needed.
    orbits: Vec<Option<BothOrbits>>,
    /// Cost of a map without any reward.
    base: i64,
    /// Nodes with a map that costs less than the incumbent but has more bonds, or more orders, that differ.
    pub(super) misleading: [usize; 2],
}

impl<'p, 's, 'm> Search<'p, 's, 'm> {
    pub(super) fn new(
        (problem, pairs): (&'p Problem, &'p Pairs),
        goal: Goal,
        bound: Bound<'p>,
        incumbent: &'m mut Incumbent,
        meter: &'m mut Meter<'s>,
    ) -> Self {
        Self {
            problem,
            pairs,
            goal,
            bound,
            incumbent,
            meter,
            frames: Vec::new(),
            orbits: Vec::new(),
            base: i64::from(goal.weights.bond) * problem.all_bonds() as i64,
            misleading: [0; 2],
        }
    }

    /// Searches until everything is proved or the meter ends.
    pub(super) fn run(mut self, grower: Option<&Grower<'_>>) -> Outcome {
        let open = self.root(grower);
        let shares = self.bound.shares().to_vec();
        if self.meter.ended() || !open || !self.branch() {
            return self.outcome(shares);
        }
        while let Some(frame) = self.frames.last() {
            if self.misled().is_some() {
                break;
            }
            let pair = frame.pair;
            let open = self.bound.fix(pair) && self.visit();
            if self.meter.ended() {
                break;
            }
            if open && self.branch() {
                continue;
            }
            self.turn_back();
            if self.meter.ended() {
                break;
            }
        }
        self.outcome(shares)
    }

    /// Leaves finished branches until there is another one to enter.
    fn turn_back(&mut self) {
        while let Some(frame) = self.frames.pop() {
            self.bound.undo(&frame.mark);
            let alike = self.alike(frame.pair);
            let open = self.bound.remove_all(alike) && self.visit();
            if self.meter.ended() {
                // Back on the stack, so that its bound counts as open.
                self.frames.push(frame);
                return;
            }
            if open && self.branch() {
                return;
            }
        }
    }

    fn outcome(&self, shares: Vec<i32>) -> Outcome {
        let open = self.frames.iter().map(|frame| frame.value);
        let unfinished = self.meter.ended() && self.frames.is_empty();
        let open = open.chain(unfinished.then(|| self.bound.value())).max();
        let own = self.goal.weights.cost(self.incumbent.distance);
        Outcome {
            proved: open.is_none(),
            cost_at_least: open.map_or(own, |value| own.min(self.base - value.div_euclid(SCALE))),
            shares,
            misled: self.misled(),
        }
    }

    fn misled(&self) -> Option<Misled> {
        let [bonds, orders] = self.misleading;
        let part = if bonds > orders {
            Misled::Bonds
        } else {
            Misled::Orders
        };
        let weights = self.goal.weights;
        let may_grow = weights.bond.max(weights.order) < LARGEST_WEIGHT;
        (may_grow && bonds + orders >= MOST_MISLEADING).then_some(part)
    }

    /// The reward a map needs to be better by a step, in parts of the unit.
    pub(super) fn needed(&self) -> i64 {
        let cost = self.goal.weights.cost(self.incumbent.distance);
        (self.base - cost + i64::from(self.goal.step)) * SCALE
    }

    /// Takes the next decision. Returns false if all atoms are fixed.
    fn branch(&mut self) -> bool {
        let depth = self.frames.len();
        let Some(left) = self.next_atom() else {
            return false;
        };
        if self.orbits.len() <= depth {
            self.orbits.push(None);
        }
        let frame = Frame {
            pair: assignment::chosen(&self.bound.assignment, self.pairs, left),
            mark: self.bound.mark(),
            value: self.bound.value(),
        };
        self.frames.push(frame);
        self.orbits.truncate(depth + 1);
        true
    }

    /// The atom to lay next: one with few possibilities and many bonds.
    ///
    /// Taking the square of the bonds halves the steps against taking the fewest possibilities alone. Whether the atom is
    /// next to a fixed one does not help.
    fn next_atom(&self) -> Option<u32> {
        let domain = &self.bound.domain;
        let gap = (self.bound.value() - self.needed()).max(1);
        let open = (0..self.problem.left.atoms() as u32).filter(|&left| !domain.is_fixed(left));
        open.min_by_key(|&left| {
            // The less its slack, the more of the tree hangs on a possibility.
            let weight = |&pair: &PairIndex| 1 + 64 * (gap - self.bound.slack(pair)).max(0) / gap;
            let possibilities: i64 = domain.pairs_of(left).iter().map(weight).sum();
            let bonds = self.problem.left.degree(left) as i64;
            (possibilities + 64) * 16 / (1 + bonds * bonds)
        })
    }

    /// The pairs that are as good as this one, given the decisions in force.
    fn alike(&mut self, pair: PairIndex) -> Vec<PairIndex> {
        let depth = self.frames.len();
        if self.orbits[depth].is_none() {
            self.orbits[depth] = Some(self.find_orbits(depth));
        }
        let (left, right) = self.pairs.atoms(pair);
        let Some(orbits) = &self.orbits[depth] else {
            return vec![pair];
        };
        let rights: Vec<u32> = orbits.right.of(right).collect();
        let pairs = self.pairs;
        let lefts = orbits.left.of(left);
        lefts
            .flat_map(|left| rights.iter().map(move |&right| pairs.of(left, right)))
            .collect()
    }

    fn find_orbits(&mut self, depth: usize) -> BothOrbits {
        let known = self.orbits[..depth].iter().flatten();
        let (mut left_trivial, mut right_trivial) = (false, false);
        for orbits in known {
            left_trivial |= orbits.left.is_trivial();
            right_trivial |= orbits.right.is_trivial();
        }
        let decided = self.frames.iter().map(|frame| self.pairs.atoms(frame.pair));
        let (lefts, rights): (Vec<u32>, Vec<u32>) = decided.unzip();
        let atoms = self.problem.left.atoms();
        // Fewer automorphisms the more is fixed: once there are none, there will be none further down.
        let find = |trivial, graph, fixed: &[u32]| {
            if trivial {
                Orbits::trivial(atoms)
            } else {
                Orbits::new(graph, self.goal.kept, fixed)
            }
        };
        let orbits = BothOrbits {
            left: find(left_trivial, &self.problem.left, &lefts),
            right: find(right_trivial, &self.problem.right, &rights),
        };
        self.meter.spend(2 * atoms);
        orbits
    }
}
