//! The choice of the bonds that carry slopes.
//!
//! The ends of marked units are taken in text order, one set of units with common bonds after the
//! other; an end without a slope gets one on the best of its bonds that contradicts nothing, and the
//! search goes back where none is left. More slopes never mend a contradiction, so a set without a
//! solution has none. That is seen only where every bond at hand is taken up by other units, as in
//! rings of conjugated oximes: a hydrogen, written as an atom, settles all other cases.

use std::ops::Range;

use super::{
    forest::Forest,
    layout::Layout,
    slopes::{Carrier, Slopes},
    structure::Structure,
    units::{Choice, Unit},
};

/// Steps of one attempt per end of a set of units. Far more than conjugated systems take.
const STEPS_PER_END: usize = 64;
/// Units of one set that are given up one by one; after that the whole set is.
const MOST_DROPPED: usize = 8;
/// Double bonds in smaller rings have no choice: a mark on them says nothing.
const SMALLEST_FREE_RING: usize = 8;
/// Atoms that the look for a small ring may visit; only odd graphs have more within its reach.
const RING_VISITS: usize = 200;

/// A carrier at an end of a unit.
#[derive(Debug, Clone, Copy)]
struct Use {
    carrier: usize,
    unit: usize,
    end: usize,
    opposite: bool,
}

/// A slope that has been chosen for an end, and how to take it back.
struct Decision {
    place: usize,
    option: usize,
    carrier: Carrier,
    unions: usize,
}

/// An end that needs a slope: unit and side.
type EndOf = (usize, usize);

pub(super) struct Search<'a> {
    structure: &'a Structure<'a>,
    layout: &'a Layout,
    slopes: &'a mut Slopes,
    units: Vec<Unit>,
    given_up: Vec<usize>,
    /// Sorted by carrier.
    uses: Vec<Use>,
    /// Per unit and end: how many slopes it has.
    touched: Vec<[u32; 2]>,
    /// Whether units in small rings may be marked by accident.
    lenient: bool,
}

impl<'a> Search<'a> {
    pub(super) fn new(
        structure: &'a Structure<'a>,
        layout: &'a Layout,
        slopes: &'a mut Slopes,
        units: Vec<Unit>,
    ) -> Self {
        let mut uses = Vec::new();
        for (unit, record) in units.iter().enumerate() {
            for (end, side) in record.ends.iter().enumerate() {
                // The second end counts from its own first ligand.
                let across = end == 1 && record.mark == Some(true);
                uses.extend(side.options.iter().flatten().map(|choice| Use {
                    carrier: slopes.number(choice.carrier),
                    unit,
                    end,
                    opposite: choice.opposite ^ across,
                }));
            }
        }
        uses.sort_by_key(|entry| (entry.carrier, entry.unit, entry.end));
        let touched = vec![[0; 2]; units.len()];
        Self {
            structure,
            layout,
            slopes,
            units,
            given_up: Vec::new(),
            uses,
            touched,
            lenient: false,
        }
    }

    /// Gives slopes to all marked units but those that have to be given up.
    pub(super) fn run(&mut self) {
        self.sort_options();
        for mut ends in self.connected_sets() {
            let mut dropped = 0;
            while let Err(stuck) = self.attempt_both_ways(&ends) {
                dropped += 1;
                let unit = ends.get(stuck).map(|&(unit, _)| unit);
                let all = dropped > MOST_DROPPED;
                let (out, kept) = ends
                    .into_iter()
                    .partition(|&(other, _)| all || Some(other) == unit);
                self.give_up(out);
                ends = kept;
            }
        }
    }

    fn give_up(&mut self, ends: Vec<EndOf>) {
        for (unit, _) in ends {
            if self.units[unit].mark.take().is_some() {
                self.given_up.push(unit);
            }
        }
    }

    fn attempt_both_ways(&mut self, ends: &[EndOf]) -> Result<(), usize> {
        self.lenient = false;
        self.attempt(ends).or_else(|_| {
            self.lenient = true;
            self.attempt(ends)
        })
    }

    /// The units whose marks could not be written.
    pub(super) fn given_up(&self) -> impl Iterator<Item = &Unit> + '_ {
        self.given_up.iter().map(|&unit| &self.units[unit])
    }

    /// Puts the options of each end into order. Best is a bond to another marked unit, which serves
    /// both; then any other bond of the chain; then ring bonds, bonds to units without a mark, and
    /// last a hydrogen.
    fn sort_options(&mut self) {
        for unit in 0..self.units.len() {
            for end in 0..2 {
                let [Some(first), Some(second)] = &self.units[unit].ends[end].options else {
                    continue;
                };
                if self.cost(unit, second) < self.cost(unit, first) {
                    self.units[unit].ends[end].options.swap(0, 1);
                }
            }
        }
    }

    fn cost(&self, unit: usize, choice: &Choice) -> (bool, bool, bool, bool, [u32; 2]) {
        let Carrier::Bond(bond) = choice.carrier else {
            return (true, false, false, false, [0; 2]);
        };
        let others = || {
            let uses = self.uses_of(self.slopes.number(choice.carrier));
            self.uses[uses]
                .iter()
                .filter(move |entry| entry.unit != unit)
        };
        let unmarked = others().any(|entry| self.units[entry.unit].mark.is_none());
        let (a, b, _) = self.structure.form.bonds[bond as usize];
        let ring = self.layout.is_ring_bond([a, b], bond);
        let mut places = [a, b].map(|atom| self.layout.place(atom));
        places.sort_unstable();
        (false, unmarked, ring, others().next().is_none(), places)
    }

    fn uses_of(&self, carrier: usize) -> Range<usize> {
        let start = self.uses.partition_point(|entry| entry.carrier < carrier);
        let length = self.uses[start..].partition_point(|entry| entry.carrier == carrier);
        start..start + length
    }

    /// The ends of marked units in text order, by sets of units that have bonds in common.
    fn connected_sets(&self) -> Vec<Vec<EndOf>> {
        let mut forest = Forest::new(self.units.len());
        for pair in self.uses.windows(2) {
            if let [a, b] = pair
                && a.carrier == b.carrier
            {
                forest.join(a.unit as u32, b.unit as u32, false);
            }
        }
        let mut ends: Vec<(u32, u32, EndOf)> = (0..self.units.len())
            .filter(|&unit| self.units[unit].mark.is_some())
            .flat_map(|unit| [(unit, 0), (unit, 1)])
            .map(|(unit, end)| {
                let place = self.layout.place(self.units[unit].ends[end].atom);
                (forest.root(unit as u32).0, place, (unit, end))
            })
            .collect();
        ends.sort_unstable();
        ends.chunk_by(|a, b| a.0 == b.0)
            .map(|set| set.iter().map(|&(_, _, end)| end).collect())
            .collect()
    }

    /// Gives every end a slope, or takes back all it did and says how far it came.
    fn attempt(&mut self, ends: &[EndOf]) -> Result<(), usize> {
        let mut budget = STEPS_PER_END.saturating_mul(ends.len());
        let mut decisions: Vec<Decision> = Vec::new();
        let (mut place, mut option, mut furthest) = (0, 0, 0);
        while let Some(&(unit, end)) = ends.get(place) {
            furthest = furthest.max(place);
            if option == 0 && self.touched[unit][end] > 0 {
                place += 1;
                continue;
            }
            let choice = self.units[unit].ends[end].options.get(option);
            let carrier = choice.and_then(|choice| Some(choice.as_ref()?.carrier));
            match carrier.filter(|_| budget > 0) {
                Some(carrier) => {
                    budget -= 1;
                    let unions = self.slopes.forest().unions();
                    if self.raise(carrier) {
                        decisions.push(Decision {
                            place,
                            option,
                            carrier,
                            unions,
                        });
                        (place, option) = (place + 1, 0);
                    } else {
                        self.lower(carrier, unions);
                        option += 1;
                    }
                }
                None => {
                    let Some(last) = decisions.pop() else {
                        return Err(furthest);
                    };
                    self.lower(last.carrier, last.unions);
                    (place, option) = (last.place, last.option + 1);
                }
            }
        }
        Ok(())
    }

    /// Puts a slope on a bond; false if that contradicts something. It is to be taken back then.
    fn raise(&mut self, carrier: Carrier) -> bool {
        self.slopes.set_raised(carrier, true);
        let number = self.slopes.number(carrier);
        let mut fits = true;
        for at in self.uses_of(number) {
            let Use {
                unit,
                end,
                opposite,
                ..
            } = self.uses[at];
            self.touched[unit][end] += 1;
            fits &= if self.units[unit].mark.is_some() {
                let node = self.slopes.number_of_unit(unit);
                self.slopes.forest().join(number as u32, node, opposite)
            } else {
                self.touched[unit].contains(&0) || self.lenient && self.is_in_small_ring(unit)
            };
        }
        fits
    }

    fn lower(&mut self, carrier: Carrier, unions: usize) {
        self.slopes.set_raised(carrier, false);
        for at in self.uses_of(self.slopes.number(carrier)) {
            let Use { unit, end, .. } = self.uses[at];
            self.touched[unit][end] -= 1;
        }
        self.slopes.forest().undo_to(unions);
    }

    /// Whether the first bond of a unit lies in a ring that leaves it no choice. Breadth first.
    fn is_in_small_ring(&self, unit: usize) -> bool {
        let (from, goal) = (self.units[unit].inner, self.units[unit].ends[0].atom);
        let mut seen = vec![from];
        let mut layer = 0;
        // A ring of n atoms closes in n - 1 steps that avoid the bond.
        for _ in 2..SMALLEST_FREE_RING {
            let reached = seen.len();
            for at in layer..reached {
                for arc in self.structure.arcs(seen[at]) {
                    let across = seen[at] == from && arc.to == goal;
                    if across || seen.contains(&arc.to) {
                        continue;
                    }
                    if arc.to == goal {
                        return true;
                    }
                    if seen.len() >= RING_VISITS {
                        return false;
                    }
                    seen.push(arc.to);
                }
            }
            layer = reached;
        }
        false
    }
}
