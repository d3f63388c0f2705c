//! One proof for each part of the distance, the earlier parts held.
//!
//! In each proof an earlier part weighs twice the next. That is enough: once the earlier parts are proved, only maps that
//! reach them too can be better, and all of these that are better cost less. Small weights prove sooner than large ones.

use super::{
    Mapping, Proved,
    goal::{Goal, Incumbent, Weights},
    grow::Grower,
    meter::Meter,
    pairs::Pairs,
    polish::polish,
    problem::Problem,
    search::{Outcome, Search},
    symmetry::Kept,
};

/// Above this many pairs or slots only the linear method is used; below, a slot takes some 10 bytes.
const MOST_PAIRS: usize = 250_000;
const MOST_SLOTS: usize = 2_500_000;

/// What the proof of (i) may spend of the budget, in sixteenths; the rest finds good (ii) and (iii) where it fails.
const SHARE_OF_BONDS: u64 = 14;
/// Steps for fewer differences in (iv), which nobody asks to be proved.
const STEPS_FOR_MARKS: u64 = 50_000;

/// Finds the map of least distance within the meter.
pub(super) fn solve(problem: &Problem, meter: &mut Meter<'_>) -> Mapping {
    let grower = Grower::new(problem);
    let mut incumbent = first_map(problem, &grower, meter);
    let mut proved = Proved::default();
    let mut at_least = problem.left.bonds().abs_diff(problem.right.bonds()) as u32;
    if let Some(pairs) = Pairs::new(problem, MOST_PAIRS, MOST_SLOTS) {
        let mut stages = Stages {
            problem,
            pairs: &pairs,
            earlier: None,
        };
        (proved, at_least) = stages.run(&grower, &mut incumbent, meter);
    }
    let distance = incumbent.distance;
    proved.bonds |= distance.bonds <= at_least;
    proved.orders |= proved.bonds && distance.orders == 0;
    proved.hydrogens |= proved.orders && distance.hydrogens == 0;
    Mapping {
        pairs: incumbent.map,
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
        meter.allow(meter.left() / 16 * SHARE_OF_BONDS);
        // Every kept bond takes one bond from each side: (i) moves in steps of two.
        let weights = Weights {
            bond: 1,
            order: 0,
            hydrogen: 0,
            mark: 0,
        };
        let outcome = self.prove(
            Goal {
                weights,
                step: 2,
                kept: Kept::default(),
            },
            Some(grower),
            incumbent,
            meter,
        );
        proved.bonds = outcome.proved;
        let at_least = u32::try_from(outcome.cost_at_least).unwrap_or(0);

        meter.allow(meter.left());
        let kept = Kept {
            orders: true,
            ..Kept::default()
        };
        let weights = Weights {
            bond: 2,
            order: 1,
            hydrogen: 0,
            mark: 0,
        };
        proved.orders = incumbent.distance.orders == 0
            || self
                .prove(
                    Goal {
                        weights,
                        step: 1,
                        kept,
                    },
                    None,
                    incumbent,
                    meter,
                )
                .proved;
        proved.orders &= proved.bonds;

        // (iii) is odd or even as the difference of the hydrogen totals is: steps of two again.
        let kept = Kept {
            hydrogens: true,
            ..kept
        };
        let weights = Weights {
            bond: 4,
            order: 2,
            hydrogen: 1,
            mark: 0,
        };
        proved.hydrogens = incumbent.distance.hydrogens == 0
            || self
                .prove(
                    Goal {
                        weights,
                        step: 2,
                        kept,
                    },
                    None,
                    incumbent,
                    meter,
                )
                .proved;
        proved.hydrogens &= proved.orders;

        if proved.hydrogens && incumbent.distance.marks > 0 {
            meter.allow(STEPS_FOR_MARKS);
            let kept = Kept {
                marks: true,
                ..kept
            };
            let weights = Weights {
                bond: 8,
                order: 4,
                hydrogen: 2,
                mark: 1,
            };
            self.prove(
                Goal {
                    weights,
                    step: 1,
                    kept,
                },
                None,
                incumbent,
                meter,
            );
        }
        (proved, at_least)
    }

    fn prove(
        &mut self,
        goal: Goal,
        grower: Option<&Grower<'_>>,
        incumbent: &mut Incumbent,
        meter: &mut Meter<'_>,
    ) -> Outcome {
        let earlier = self
            .earlier
            .as_ref()
            .map(|(shares, weights)| (shares.as_slice(), *weights));
        let search = Search::new((self.problem, self.pairs), goal, earlier, incumbent, meter);
        let mut outcome = search.run(grower);
        self.earlier = Some((std::mem::take(&mut outcome.shares), goal.weights));
        outcome
    }
}
