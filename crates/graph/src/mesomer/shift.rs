//! Ring shifts: mobile bonds of neutral closed-shell systems.
//!
//! There every atom that takes part has one π bond, the drawing is a best placement, and another one
//! differs from it by alternating cycles. So one atom is one vertex, the drawn double bonds are a
//! perfect matching, and a bond is mobile exactly when some alternating cycle runs over it.

use crate::{
    Limits, OrderError,
    matching::{Matching, NONE},
    skeleton::Skeleton,
};

use super::{MOBILE, mobile::within};

/// Scratch of the search.
#[derive(Debug, Default)]
pub(super) struct Shift {
    /// Per atom: the other end of its double bond, [`NONE`] for atoms that take no part.
    partner: Vec<u32>,
    /// Per atom: its bonds to others that take part.
    degree: Vec<u32>,
    ends: Vec<u32>,
    /// Atoms of a walk, each with the bond that leads on.
    walked: Vec<(u32, u32)>,
}

impl Shift {
    /// Marks the mobile bonds in `orders` and lists them in `mobile`. Atoms outside `takes_part` stay
    /// as they are drawn.
    ///
    /// # Errors
    /// [`OrderError::StepLimit`] when the matching has looked at more edges than the limits allow.
    pub(super) fn mark(
        &mut self,
        skeleton: &Skeleton,
        takes_part: impl Fn(u32) -> bool,
        matching: &mut Matching,
        limits: &Limits,
        orders: &mut [u8],
        mobile: &mut Vec<u32>,
    ) -> Result<(), OrderError> {
        mobile.clear();
        if !self.pair(skeleton, takes_part) {
            return Ok(());
        }
        self.prune(skeleton);
        self.take_lone_rings(skeleton, orders, mobile);
        if self.partner.iter().all(|&other| other == NONE) {
            return Ok(());
        }
        self.connect(skeleton, matching);
        self.ask_double_bonds(skeleton, matching, limits, orders)?;
        self.ask_single_bonds(skeleton, matching, limits, orders)?;
        let bonds = 0..skeleton.bonds.len() as u32;
        mobile.extend(
            bonds.filter(|&bond| self.joins(skeleton, bond) && orders[bond as usize] == MOBILE),
        );
        Ok(())
    }

    /// Finds the partners; whether there are any. A double bond outside rings is on no cycle.
    fn pair(&mut self, skeleton: &Skeleton, takes_part: impl Fn(u32) -> bool) -> bool {
        self.partner.clear();
        self.partner.resize(skeleton.len(), NONE);
        let mut found = false;
        for (bond, &in_ring) in skeleton.bonds.iter().zip(&skeleton.ring) {
            if in_ring && bond.order == 2 && takes_part(bond.a) && takes_part(bond.b) {
                self.partner[bond.a as usize] = bond.b;
                self.partner[bond.b as usize] = bond.a;
                found = true;
            }
        }
        found
    }

    /// Whether a ring bond lies between two atoms that take part.
    fn joins(&self, skeleton: &Skeleton, bond: u32) -> bool {
        let ends = &skeleton.bonds[bond as usize];
        skeleton.ring[bond as usize]
            && matches!(ends.order, 1 | 2)
            && self.partner[ends.a as usize] != NONE
            && self.partner[ends.b as usize] != NONE
    }

    /// Takes out double bonds with an end that has no other bond, as these are on no cycle, until
    /// there are none.
    fn prune(&mut self, skeleton: &Skeleton) {
        self.degree.clear();
        self.degree.resize(skeleton.len(), 0);
        for bond in 0..skeleton.bonds.len() as u32 {
            if self.joins(skeleton, bond) {
                let ends = &skeleton.bonds[bond as usize];
                self.degree[ends.a as usize] += 1;
                self.degree[ends.b as usize] += 1;
            }
        }
        self.ends.clear();
        let atoms = 0..skeleton.len() as u32;
        self.ends
            .extend(atoms.filter(|&atom| self.degree[atom as usize] == 1));
        while let Some(end) = self.ends.pop() {
            let other = self.partner[end as usize];
            if other == NONE {
                continue;
            }
            for atom in [end, other] {
                for &(to, bond) in skeleton.arcs(atom) {
                    if self.joins(skeleton, bond) {
                        self.degree[to as usize] -= 1;
                        if self.degree[to as usize] == 1 {
                            self.ends.push(to);
                        }
                    }
                }
                self.partner[atom as usize] = NONE;
            }
        }
    }

    /// Marks the rings that have no bond to anything else that is left, as most benzene rings do:
    /// each is an alternating cycle. They leave the graph, so that only fused rings need a matching.
    fn take_lone_rings(&mut self, skeleton: &Skeleton, orders: &mut [u8], mobile: &mut Vec<u32>) {
        for start in 0..skeleton.len() as u32 {
            if self.partner[start as usize] == NONE {
                continue;
            }
            let closed = self.walk(skeleton, start);
            for &(atom, bond) in &self.walked {
                if closed {
                    self.partner[atom as usize] = NONE;
                    orders[bond as usize] = MOBILE;
                    mobile.push(bond);
                } else {
                    // No later walk comes this way again.
                    self.degree[atom as usize] = 0;
                }
            }
        }
    }

    /// Walks on over atoms with two bonds; whether that leads back to the start.
    fn walk(&mut self, skeleton: &Skeleton, start: u32) -> bool {
        self.walked.clear();
        let (mut at, mut came) = (start, None);
        while self.degree[at as usize] == 2 {
            let mut arcs = skeleton.arcs(at).iter();
            let onward = arcs.find(|&&(_, bond)| Some(bond) != came && self.joins(skeleton, bond));
            let Some(&(to, bond)) = onward else {
                return false;
            };
            self.walked.push((at, bond));
            if to == start {
                return true;
            }
            (at, came) = (to, Some(bond));
        }
        false
    }

    fn connect(&self, skeleton: &Skeleton, matching: &mut Matching) {
        matching.reset(skeleton.len());
        for bond in 0..skeleton.bonds.len() as u32 {
            if self.joins(skeleton, bond) {
                let ends = &skeleton.bonds[bond as usize];
                matching.add_edge(ends.a, ends.b);
                if self.partner[ends.a as usize] == ends.b {
                    matching.join(ends.a, ends.b);
                }
            }
        }
        matching.connect();
        matching.keep_changes();
    }

    /// Asks of each double bond whether the rest has a perfect matching without it. The ends of one
    /// that is in all of them leave the graph.
    fn ask_double_bonds(
        &mut self,
        skeleton: &Skeleton,
        matching: &mut Matching,
        limits: &Limits,
        orders: &mut [u8],
    ) -> Result<(), OrderError> {
        for a in 0..skeleton.len() as u32 {
            let b = self.partner[a as usize];
            if b == NONE || b < a || matching.mate(a) != b || is_mobile(skeleton, orders, a, b) {
                continue;
            }
            matching.part(a);
            matching.block(Some((a, b)));
            let moves = matching.augment(a);
            matching.block(None);
            within(matching, limits)?;
            if moves {
                mark_changes(skeleton, matching, orders);
            } else {
                matching.undo_to(0);
                for atom in [a, b] {
                    matching.set_removed(atom, true);
                    self.partner[atom as usize] = NONE;
                }
            }
        }
        Ok(())
    }

    /// Asks of each bond that is left whether a perfect matching has it.
    fn ask_single_bonds(
        &self,
        skeleton: &Skeleton,
        matching: &mut Matching,
        limits: &Limits,
        orders: &mut [u8],
    ) -> Result<(), OrderError> {
        for bond in 0..skeleton.bonds.len() as u32 {
            if orders[bond as usize] == MOBILE || !self.joins(skeleton, bond) {
                continue;
            }
            let ends = &skeleton.bonds[bond as usize];
            let found = matching.force(ends.a, ends.b);
            within(matching, limits)?;
            if found {
                mark_changes(skeleton, matching, orders);
            }
        }
        Ok(())
    }
}

fn is_mobile(skeleton: &Skeleton, orders: &[u8], a: u32, b: u32) -> bool {
    let bond = skeleton.bond_between(a, b);
    bond.is_some_and(|bond| orders[bond as usize] == MOBILE)
}

/// Marks the bonds of an alternating cycle, on which the matching has just changed, and takes the
/// change as settled.
fn mark_changes(skeleton: &Skeleton, matching: &mut Matching, orders: &mut [u8]) {
    for (vertex, before) in matching.changes_since(0) {
        for mate in [before, matching.mate(vertex)] {
            if let Some(bond) = skeleton.bond_between(vertex, mate) {
                orders[bond as usize] = MOBILE;
            }
        }
    }
    matching.keep_changes();
}
