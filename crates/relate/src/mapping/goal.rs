//! What a search is to prove, and the best map that it has.

use super::{Distance, coherence::Coherence, problem::Problem, symmetry::Kept};

/// How many parts the unit of cost is split into, so that integer shares of it are fine enough.
pub(super) const SCALE: i64 = 4096;

/// What the parts of the distance weigh. A bond that only one side has costs `bond`, and so on.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(super) struct Weights {
    pub(super) bond: i32,
    pub(super) order: i32,
    pub(super) hydrogen: i32,
    pub(super) mark: i32,
}

impl Weights {
    /// The reward of a kept bond, in parts: it saves one bond on each side.
    pub(super) fn reward(self, same_order: bool) -> i32 {
        let units = 2 * self.bond - if same_order { 0 } else { self.order };
        units * SCALE as i32
    }

    /// The cost of laying one atom on another, in parts.
    pub(super) fn atom_cost(self, problem: &Problem, left: u32, right: u32) -> i64 {
        let (hydrogens, mark) = problem.atom_cost(left, right);
        let units = i64::from(self.hydrogen) * i64::from(hydrogens)
            + i64::from(self.mark) * i64::from(mark);
        units * SCALE
    }

    /// The cost of a whole map, in units.
    pub(super) fn cost(self, distance: Distance) -> i64 {
        let part = |weight: i32, part: u32| i64::from(weight) * i64::from(part);
        part(self.bond, distance.bonds)
            + part(self.order, distance.orders)
            + part(self.hydrogen, distance.hydrogens)
            + part(self.mark, distance.marks)
    }
}

/// To prove that no map costs less than the incumbent by `step` or more.
#[derive(Debug, Clone, Copy)]
pub(super) struct Goal {
    pub(super) weights: Weights,
    pub(super) step: u32,
    /// What an automorphism has to keep so that it does not change any cost.
    pub(super) kept: Kept,
}

/// The best map so far: the nearest, of these the most coherent, of these the lexicographically least.
#[derive(Debug)]
pub(super) struct Incumbent {
    pub(super) map: Vec<u32>,
    pub(super) distance: Distance,
    pub(super) coherence: Coherence,
}

impl Incumbent {
    pub(super) fn new(problem: &Problem, map: Vec<u32>) -> Self {
        Self {
            distance: problem.distance(&map),
            coherence: Coherence::of(problem, &map),
            map,
        }
    }

    /// Takes a map if it is better. Returns its distance.
    pub(super) fn offer(&mut self, problem: &Problem, map: &[u32]) -> Distance {
        let distance = problem.distance(map);
        if distance > self.distance || map == self.map {
            return distance;
        }
        let coherence = Coherence::of(problem, map);
        let own = (self.distance, self.coherence, self.map.as_slice());
        if (distance, coherence, map) < own {
            self.distance = distance;
            self.coherence = coherence;
            self.map.clear();
            self.map.extend_from_slice(map);
        }
        distance
    }
}
