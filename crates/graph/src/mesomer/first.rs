//! The first of the best placements in a given order of atoms.

use crate::matching::{Matching, NONE};

use super::placement::{Pool, System, SystemBond};

impl System {
    /// Walks through the bonds, those that `first` names before the others and each sort by the ranks
    /// of their atoms, and gives each the highest order that is
    /// still possible, then does the same with charges; reports orders and charges.
    pub(crate) fn first_placement(
        &self,
        matching: &mut Matching,
        rank: &[u32],
        first: impl Fn(u32) -> bool,
        mut set_order: impl FnMut(u32, u8),
        mut set_charge: impl FnMut(u32, i8),
    ) {
        let mut system = self.clone();
        system.build(matching);
        matching.restore(&self.mate);
        let mut order: Vec<(bool, u32, u32, SystemBond)> = self
            .bonds
            .iter()
            .map(|bond| {
                let ranks = [bond.a, bond.b].map(|at| rank[self.atoms[at as usize] as usize]);
                let ordered = if ranks[0] < ranks[1] {
                    *bond
                } else {
                    SystemBond {
                        a: bond.b,
                        b: bond.a,
                        ..*bond
                    }
                };
                let later = !first(bond.bond);
                (
                    later,
                    ranks[0].min(ranks[1]),
                    ranks[0].max(ranks[1]),
                    ordered,
                )
            })
            .collect();
        order.sort_unstable_by_key(|&(later, a, b, _)| (later, a, b));
        let mut choice = Choice {
            system: &system,
            matching,
            settled: vec![false; self.mate.len()],
        };
        for (_, _, _, bond) in order {
            let pi = choice.raise(bond.a, bond.b);
            set_order(bond.bond, 1 + pi);
        }
        if self.is_closed() {
            return;
        }
        let mut groups: Vec<u32> = (0..self.atoms.len() as u32).collect();
        groups.sort_unstable_by_key(|&at| rank[self.atoms[at as usize] as usize]);
        for &group in &groups {
            for pool in [
                Pool::NegativeHetero,
                Pool::NegativeCarbon,
                Pool::Positive,
                Pool::Open,
            ] {
                choice.raise(group, system.pool_group(pool));
            }
        }
        let mate = choice.matching.saved();
        for group in groups {
            let (charge, _) = self.charge_and_open(|v| mate[v as usize], group);
            set_charge(self.atoms[group as usize], charge as i8);
        }
    }
}

/// A matching in which more and more is settled.
struct Choice<'a> {
    system: &'a System,
    matching: &'a mut Matching,
    settled: Vec<bool>,
}

impl Choice<'_> {
    /// Makes the number of matching edges between two groups as high as it can be, settles it, and
    /// returns it.
    fn raise(&mut self, a: u32, b: u32) -> u8 {
        let mut count = 0;
        while self.settle_one(a, b) {
            count += 1;
        }
        self.matching.cut(
            self.system.vertices(a),
            self.system.vertices(b),
            &self.settled,
        );
        count
    }

    /// Settles one more edge between the groups if some perfect matching has it.
    fn settle_one(&mut self, a: u32, b: u32) -> bool {
        let edges: Vec<(u32, u32)> = self
            .system
            .vertices(a)
            .flat_map(|x| self.system.vertices(b).map(move |y| (x, y)))
            .filter(|&(x, y)| {
                !self.settled[x as usize]
                    && !self.settled[y as usize]
                    && self.matching.neighbours(x).contains(&y)
            })
            .collect();
        // The first edge that some perfect matching has, not the one that happens to be present:
        // vertices of an atom are not all alike, and the choice may not depend on the drawing.
        let found = edges
            .into_iter()
            .find(|&(x, y)| self.matching.mate(x) == y || self.force((x, y)));
        if let Some((x, y)) = found {
            for vertex in [x, y] {
                self.settled[vertex as usize] = true;
                self.matching.set_removed(vertex, true);
            }
        }
        found.is_some()
    }

    /// Brings an edge into the perfect matching if that is possible, else leaves all as it was.
    fn force(&mut self, (x, y): (u32, u32)) -> bool {
        let before = self.matching.changes();
        let (u, v) = (self.matching.part(x), self.matching.part(y));
        self.matching.set_removed(x, true);
        self.matching.set_removed(y, true);
        let done =
            u != NONE && v != NONE && self.matching.augment(u) && self.matching.mate(v) != NONE;
        self.matching.set_removed(x, false);
        self.matching.set_removed(y, false);
        if done {
            self.matching.join(x, y);
        } else {
            self.matching.undo_to(before);
        }
        done
    }
}
