//! One proof for each part of the distance, the earlier parts held.
//!
//! In each proof an earlier part weighs twice the next. That is enough: once the earlier parts are proved, only maps that
//! reach them too can be better, and all of these that are better cost less. Small weights prove sooner than large ones.

use super::{
    Distance, Proved,
    bound::Bound,
    choice::choose,
    goal::{Goal, Incumbent, SCALE, Weights},
    grow::Grower,
    meter::Meter,
    pairs::Pairs,
    polish::polish,
    problem::Problem,
    search::{Misled, Outcome, Search},
    symmetry::Kept,
};

/// Above this many pairs or slots only the linear method is used; below, a slot takes some 10 bytes.
const MOST_PAIRS: usize = 250_000;
const MOST_SLOTS: usize = 2_500_000;

/// What each proof may spend of the budget, in sixteenths: (i), then (ii) and (iii). Where (i) fails the rest finds good
/// (ii) and (iii).
const SHARE_OF_BONDS: u64 = 14;
const SHARE_OF_OTHERS: u64 = 6;
/// Steps for fewer differences in (iv), which nobody asks to be proved.
const STEPS_FOR_MARKS: u64 = 50_000;

/// A map of all atoms, absent ones included, and what is known about it.
pub(super) struct Solution {
    /// For each left atom, the right one.
    pub(super) image: Vec<u32>,
    pub(super) distance: Distance,
    pub(super) proved: Proved,
    pub(super) bonds_at_least: u32,
    pub(super) steps: u64,
}

/// Finds the map of least distance within the meter.
pub(super) fn solve(problem: &Problem, meter: &mut Meter<'_>) -> Solution {
    let grower = Grower::new(problem);
    let mut incumbent = first_map(problem, &grower, meter);
    let mut proved = Proved::default();
    let mut at_least = problem.left.bonds().abs_diff(problem.right.bonds()) as u32;
    if let Some(pairs) = Pairs::new(problem, MOST_PAIRS, MOST_SLOTS) {
        let mut stages = Stages {
            problem,
            pairs: &pairs,
            earlier: None,
            allowed: vec![true; pairs.len()],
        };
        (proved, at_least) = stages.run(&grower, &mut incumbent, meter);
    }
    choose(problem, &grower, &mut incumbent, meter);
    let distance = incumbent.distance;
    proved.bonds |= distance.bonds <= at_least;
    proved.orders |= proved.bonds && distance.orders == 0;
    proved.hydrogens |= proved.orders && distance.hydrogens == 0;
    Solution {
        image: incumbent.map,
        distance,
        proved,
        bonds_at_least: if proved.bonds {
            distance.bonds
        } else {
            at_least
        },
        steps: meter.spent(),
    }
}

/// The better of two maps: in the order of the atoms, and by like surroundings.
fn first_map(problem: &Problem, grower: &Grower<'_>, meter: &mut Meter<'_>) -> Incumbent {
    let mut map = vec![0; problem.left.atoms()];
    for class in &problem.classes {
        for (&left, &right) in class.left.iter().zip(&class.right) {
            map[left as usize] = right;
        }
    }
    let mut incumbent = Incumbent::new(problem, map);
    if incumbent.distance.bonds > 0 {
        let mut map = grower.outline();
        polish(problem, &mut map, meter);
        incumbent.offer(problem, &map);
    }
    incumbent
}

/// The proofs, one after the other.
struct Stages<'p> {
    problem: &'p Problem,
    pairs: &'p Pairs,
    /// Shares of the proof before, and its weights.
    earlier: Option<(Vec<i32>, Weights)>,
    /// Pairs that a map as good as the incumbent can have.
    allowed: Vec<bool>,
}

impl Stages<'_> {
    /// Returns what was proved and the least (i) that is possible.
    fn run(
        &mut self,
        grower: &Grower<'_>,
        incumbent: &mut Incumbent,
        meter: &mut Meter<'_>,
    ) -> (Proved, u32) {
        let mut proved = Proved::default();
        meter.allow_sixteenths(SHARE_OF_BONDS);
        let outcome = self.prove(self.goal_of_bonds(), Some(grower), incumbent, meter);
        proved.bonds = outcome.proved;
        let at_least = u32::try_from(outcome.cost_at_least).unwrap_or(0);

        meter.allow_sixteenths(SHARE_OF_OTHERS);
        proved.orders = incumbent.distance.orders == 0
            || self
                .prove(self.goal_of_orders(), None, incumbent, meter)
                .proved;
        proved.orders &= proved.bonds;

        meter.allow_sixteenths(SHARE_OF_OTHERS);
        proved.hydrogens = incumbent.distance.hydrogens == 0
            || self
                .prove(self.goal_of_hydrogens(), None, incumbent, meter)
                .proved;
        proved.hydrogens &= proved.orders;

        if proved.hydrogens && incumbent.distance.marks > 0 {
            meter.allow(STEPS_FOR_MARKS);
            self.prove(self.goal_of_marks(), None, incumbent, meter);
        }
        (proved, at_least)
    }

    /// Every kept bond takes one bond from each side: (i) moves in steps of two.
    fn goal_of_bonds(&self) -> Goal {
        Goal {
            weights: Weights {
                bond: 1,
                order: 0,
                hydrogen: 0,
                mark: 0,
            },
            step: 2,
            kept: Kept::default(),
        }
    }

    fn goal_of_orders(&self) -> Goal {
        Goal {
            weights: Weights {
                bond: 2,
                order: 1,
                hydrogen: 0,
                mark: 0,
            },
            step: 1,
            kept: Kept {
                orders: true,
                ..Kept::default()
            },
        }
    }

    /// Where all atoms are mapped, (iii) is odd or even as the difference of the hydrogen totals is: steps of two again.
    fn goal_of_hydrogens(&self) -> Goal {
        Goal {
            weights: Weights {
                bond: 4,
                order: 2,
                hydrogen: 1,
                mark: 0,
            },
            step: if self.problem.leaves_over() { 1 } else { 2 },
            kept: Kept {
                orders: true,
                hydrogens: true,
                marks: false,
            },
        }
    }

    fn goal_of_marks(&self) -> Goal {
        Goal {
            weights: Weights {
                bond: 8,
                order: 4,
                hydrogen: 2,
                mark: 1,
            },
            step: 1,
            kept: Kept {
                orders: true,
                hydrogens: true,
                marks: true,
            },
        }
    }

    /// Proves with small weights, and with larger ones where these turn out to be too small.
    fn prove(
        &mut self,
        mut goal: Goal,
        grower: Option<&Grower<'_>>,
        incumbent: &mut Incumbent,
        meter: &mut Meter<'_>,
    ) -> Outcome {
        loop {
            let mut outcome = self.search(goal, grower, incumbent, meter);
            self.earlier = Some((std::mem::take(&mut outcome.shares), goal.weights));
            if meter.ended() {
                return outcome;
            }
            self.keep_survivors(goal, incumbent, meter);
            match outcome.misled {
                Some(Misled::Bonds) => goal.weights.bond *= 2,
                Some(Misled::Orders) => {
                    goal.weights.order *= 2;
                    // A kept bond always earns something.
                    goal.weights.bond = goal.weights.bond.max(goal.weights.order);
                }
                None => return outcome,
            }
        }
    }

    fn search(
        &self,
        goal: Goal,
        grower: Option<&Grower<'_>>,
        incumbent: &mut Incumbent,
        meter: &mut Meter<'_>,
    ) -> Outcome {
        let bound = self.bound(goal);
        Search::new((self.problem, self.pairs), goal, bound, incumbent, meter).run(grower)
    }

    fn bound(&self, goal: Goal) -> Bound<'_> {
        let earlier = self.earlier.as_ref();
        let earlier = earlier.map(|(shares, weights)| (shares.as_slice(), *weights));
        Bound::new(
            self.problem,
            self.pairs,
            goal.weights,
            earlier,
            &self.allowed,
        )
    }

    /// Strikes out the pairs of which the bound shows that no map as good as the incumbent has them. That holds for good,
    /// as later parts of the distance weigh less.
    fn keep_survivors(&mut self, goal: Goal, incumbent: &Incumbent, meter: &mut Meter<'_>) {
        let mut bound = self.bound(goal);
        let cost = goal.weights.cost(incumbent.distance);
        let base = i64::from(goal.weights.bond) * self.problem.all_bonds() as i64;
        if bound.settle((base - cost) * SCALE, meter) {
            let survivors = (0..self.pairs.none()).map(|pair| bound.domain.contains(pair));
            self.allowed = survivors.collect();
        }
    }
}
