//! Ring shifts: mobile bonds of neutral closed-shell systems.
//!
//! There every atom that takes part has one π bond, the drawing is a best placement, and another one
//! differs from it by alternating cycles. So one atom is one vertex, the drawn double bonds are a
//! perfect matching, and a bond is mobile exactly when some alternating cycle runs over it.

use crate::{
    Limits, OrderError,
    matching::{Matching, NONE},
    rows::Rows,
    skeleton::Skeleton,
};

use super::{MOBILE, mobile::within};

/// The mobile bonds that ring shifts move.
#[derive(Debug, Default, Clone)]
pub(super) struct Shifting {
    /// Those of each ring that nothing joins to others, in the order of a walk around it.
    pub(super) lone_rings: Rows<u32>,
    /// All others.
    pub(super) joined: Vec<u32>,
}

/// Scratch of the search.
#[derive(Debug, Default)]
pub(super) struct Shift {
    /// Per atom of the skeleton.
    members: Vec<Member>,
    /// How many of them take part.
    left: usize,
    /// The ring bonds between atoms that took part at first.
    bonds: Vec<u32>,
    ends: Vec<u32>,
    /// Atoms of a walk, each with the bond that leads on.
    walked: Vec<(u32, u32)>,
}

/// An atom as part of the graph of ring bonds between atoms with a double bond in a ring.
#[derive(Debug, Clone, Copy)]
struct Member {
    /// The other end of its double bond, [`NONE`] for atoms that take no part.
    partner: u32,
    double_bond: u32,
    /// Its bonds in that graph.
    degree: u32,
    /// These bonds, and the atoms beyond, all in one by exclusive or: of two the one is known by the
    /// other, so walks along chains and rings need no lists of neighbours.
    bonds: u32,
    atoms: u32,
}

const OUTSIDE: Member = Member {
    partner: NONE,
    double_bond: NONE,
    degree: 0,
    bonds: 0,
    atoms: 0,
};

impl Member {
    fn takes_part(&self) -> bool {
        self.partner != NONE
    }
}

impl Shift {
    /// Marks the mobile bonds in `orders` and lists them in `shifting`. Atoms outside `takes_part` stay
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
        shifting: &mut Shifting,
    ) -> Result<(), OrderError> {
        shifting.lone_rings.clear();
        shifting.joined.clear();
        self.pair(skeleton, takes_part);
        if self.left == 0 {
            return Ok(());
        }
        self.link(skeleton);
        self.prune(skeleton);
        self.take_lone_rings(orders, &mut shifting.lone_rings);
        if self.left == 0 {
            return Ok(());
        }
        self.connect(skeleton, matching);
        self.ask_double_bonds(skeleton, matching, limits, orders)?;
        self.ask_single_bonds(skeleton, matching, limits, orders)?;
        let is_mobile = |&bond: &u32| orders[bond as usize] == MOBILE && self.joins(skeleton, bond);
        shifting
            .joined
            .extend(self.bonds.iter().copied().filter(is_mobile));
        Ok(())
    }

    /// Finds the partners. A double bond outside rings is on no cycle.
    fn pair(&mut self, skeleton: &Skeleton, takes_part: impl Fn(u32) -> bool) {
        self.members.clear();
        self.members.resize(skeleton.len(), OUTSIDE);
        self.left = 0;
        for ((index, bond), &in_ring) in (0..).zip(&skeleton.bonds).zip(&skeleton.ring) {
            if bond.order == 2 && in_ring && takes_part(bond.a) && takes_part(bond.b) {
                for (atom, partner) in [(bond.a, bond.b), (bond.b, bond.a)] {
                    let member = &mut self.members[atom as usize];
                    (member.partner, member.double_bond) = (partner, index);
                }
                self.left += 2;
            }
        }
    }

    /// Lists the ring bonds between atoms that take part, and counts them at each atom.
    fn link(&mut self, skeleton: &Skeleton) {
        self.bonds.clear();
        for ((index, bond), &in_ring) in (0..).zip(&skeleton.bonds).zip(&skeleton.ring) {
            let both = |members: &[Member]| {
                members[bond.a as usize].takes_part() && members[bond.b as usize].takes_part()
            };
            if in_ring && matches!(bond.order, 1 | 2) && both(&self.members) {
                self.bonds.push(index);
                for (atom, other) in [(bond.a, bond.b), (bond.b, bond.a)] {
                    let member = &mut self.members[atom as usize];
                    member.degree += 1;
                    member.bonds ^= index;
                    member.atoms ^= other;
                }
            }
        }
    }

    /// Whether a bond of the list lies between two atoms that still take part.
    fn joins(&self, skeleton: &Skeleton, bond: u32) -> bool {
        let ends = &skeleton.bonds[bond as usize];
        [ends.a, ends.b]
            .iter()
            .all(|&atom| self.members[atom as usize].takes_part())
    }

    fn remove(&mut self, atom: u32) {
        self.members[atom as usize].partner = NONE;
        self.left -= 1;
    }

    /// Takes out double bonds with an end that has no other bond, as these are on no cycle, until
    /// there are none.
    fn prune(&mut self, skeleton: &Skeleton) {
        self.ends.clear();
        let is_end = |(atom, member): (u32, &Member)| (member.degree == 1).then_some(atom);
        self.ends
            .extend((0..).zip(&self.members).filter_map(is_end));
        while let Some(end) = self.ends.pop() {
            let other = self.members[end as usize].partner;
            if other == NONE {
                continue;
            }
            self.remove(end);
            self.remove(other);
            for &(to, bond) in skeleton.arcs(other) {
                let member = &mut self.members[to as usize];
                let order = skeleton.bonds[bond as usize].order;
                if member.takes_part() && skeleton.ring[bond as usize] && order == 1 {
                    member.degree -= 1;
                    member.bonds ^= bond;
                    member.atoms ^= other;
                    if member.degree == 1 {
                        self.ends.push(to);
                    }
                }
            }
        }
    }

    /// Marks the rings that have no bond to anything else that is left, as most benzene rings do:
    /// each is an alternating cycle. They leave the graph, so that only fused rings need a matching.
    fn take_lone_rings(&mut self, orders: &mut [u8], lone_rings: &mut Rows<u32>) {
        for start in 0..self.members.len() as u32 {
            let member = &self.members[start as usize];
            if !member.takes_part() || member.degree != 2 {
                continue;
            }
            let closed = self.walk(start);
            if closed {
                lone_rings.push(self.walked.iter().map(|&(_, bond)| bond));
            }
            for at in 0..self.walked.len() {
                let (atom, bond) = self.walked[at];
                if closed {
                    self.remove(atom);
                    orders[bond as usize] = MOBILE;
                } else {
                    // No later walk comes this way again.
                    self.members[atom as usize].degree = 0;
                }
            }
        }
    }

    /// Walks on over atoms with two bonds, first along the double bond; whether that leads back to the
    /// start.
    fn walk(&mut self, start: u32) -> bool {
        self.walked.clear();
        let (mut at, mut from) = (start, start);
        let mut bond = 0;
        loop {
            let member = &self.members[at as usize];
            if member.degree != 2 {
                return false;
            }
            let (to, onward) = if at == start {
                (member.partner, member.double_bond)
            } else {
                (member.atoms ^ from, member.bonds ^ bond)
            };
            self.walked.push((at, onward));
            if to == start {
                return true;
            }
            (from, at, bond) = (at, to, onward);
        }
    }

    fn connect(&self, skeleton: &Skeleton, matching: &mut Matching) {
        matching.reset(skeleton.len());
        for &bond in &self.bonds {
            if self.joins(skeleton, bond) {
                let ends = &skeleton.bonds[bond as usize];
                matching.add_edge(ends.a, ends.b);
                if ends.order == 2 {
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
        for at in 0..self.bonds.len() {
            let bond = self.bonds[at];
            let ends = &skeleton.bonds[bond as usize];
            let (a, b) = (ends.a, ends.b);
            // A bond that shifts have made single by now is mobile already.
            if orders[bond as usize] != 2 || !self.joins(skeleton, bond) {
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
                    self.remove(atom);
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
        for &bond in &self.bonds {
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
