//! Which bonds, charges and radicals differ among the best placements.
//!
//! A bond is mobile when some perfect matching covers it another number of times than the one at
//! hand. Each question is answered exactly: some edges are forced, the others of that bond hidden,
//! and the matching is completed by augmenting paths or cannot be.

use crate::{
    Limits, OrderError,
    matching::{Matching, NONE},
    rings::Adjacency,
};

use super::{
    AtomState, MOBILE,
    placement::{Pool, System},
};

/// Asks what is mobile; owns the scratch.
#[derive(Debug, Default)]
pub(super) struct Mobility {
    /// The bonds of the system at each of its atoms.
    adjacency: Adjacency,
    mobile_bonds: Vec<bool>,
    mobile_atoms: Vec<bool>,
    /// Groups at which a question changed the matching.
    changed: Vec<u32>,
    question: Question,
}

/// Scratch of one question.
#[derive(Debug, Default)]
struct Question {
    edges: Vec<(u32, u32)>,
    exposed: Vec<u32>,
}

impl Mobility {
    /// Marks what is mobile in a settled system and sets what is fixed. The matching holds the
    /// system's placement before and after.
    ///
    /// # Errors
    /// [`OrderError::StepLimit`] when the matching has looked at more edges than the limits allow.
    pub(super) fn mark(
        &mut self,
        system: &System,
        matching: &mut Matching,
        limits: &Limits,
        orders: &mut [u8],
        states: &mut [AtomState],
    ) -> Result<(), OrderError> {
        self.mark_bonds(system, matching, limits, orders)?;
        self.mark_atoms(system, matching, limits, states)
    }

    fn mark_bonds(
        &mut self,
        system: &System,
        matching: &mut Matching,
        limits: &Limits,
        orders: &mut [u8],
    ) -> Result<(), OrderError> {
        let Self {
            adjacency,
            mobile_bonds: mobile,
            changed,
            question,
            ..
        } = self;
        let ends = system.bonds.iter().map(|bond| (bond.a, bond.b));
        adjacency.load(system.atoms.len(), ends);
        mobile.clear();
        mobile.resize(system.bonds.len(), false);
        for at in 0..system.bonds.len() {
            let bond = system.bonds[at];
            if mobile[at] {
                continue;
            }
            let moved = question.moves(system, matching, bond.a, bond.b);
            within(matching, limits)?;
            if !moved {
                continue;
            }
            // Every bond that the other placement covers differently is mobile, too; it can only be at
            // an atom where something changed.
            list_changed(system, matching, changed);
            for &group in &*changed {
                for &(_, near) in adjacency.of(group) {
                    let bond = system.bonds[near as usize];
                    let now = system.multiplicity(|v| matching.mate(v), bond.a, bond.b);
                    mobile[near as usize] |= now != system.placed(bond.a, bond.b);
                }
            }
            matching.undo_to(0);
        }
        for (bond, &mobile) in system.bonds.iter().zip(&*mobile) {
            let pi = system.placed(bond.a, bond.b) as u8;
            orders[bond.bond as usize] = if mobile { MOBILE } else { 1 + pi };
        }
        Ok(())
    }

    fn mark_atoms(
        &mut self,
        system: &System,
        matching: &mut Matching,
        limits: &Limits,
        states: &mut [AtomState],
    ) -> Result<(), OrderError> {
        let Self {
            mobile_atoms: mobile,
            changed,
            question,
            ..
        } = self;
        mobile.clear();
        mobile.resize(system.atoms.len(), false);
        for group in 0..system.atoms.len() as u32 {
            for pool in Pool::ALL {
                if mobile[group as usize] {
                    break;
                }
                let moved = question.moves(system, matching, group, system.pool_group(pool));
                within(matching, limits)?;
                if !moved {
                    continue;
                }
                list_changed(system, matching, changed);
                for &group in &*changed {
                    let now = system.charge_and_open(|v| matching.mate(v), group);
                    mobile[group as usize] |= now != system.placed_charge_and_open(group);
                }
                matching.undo_to(0);
            }
        }
        for ((group, &atom), &mobile) in (0..).zip(&system.atoms).zip(&*mobile) {
            states[atom as usize] = state(system, group, mobile);
        }
        Ok(())
    }
}

/// The atoms of the system, as groups, at which the matching has changed.
fn list_changed(system: &System, matching: &Matching, changed: &mut Vec<u32>) {
    let atoms = system.atoms.len() as u32;
    let groups = matching
        .changed_since(0)
        .map(|vertex| matching.group(vertex));
    changed.clear();
    changed.extend(groups.filter(|&group| group < atoms));
    changed.sort_unstable();
    changed.dedup();
}

/// What the best placements say about an atom.
fn state(system: &System, group: u32, mobile: bool) -> AtomState {
    if mobile {
        let total = system.charge.clamp(i16::MIN.into(), i16::MAX.into()) as i16;
        let system = (total, system.open_total().min(u16::MAX.into()) as u16);
        AtomState {
            charge: 0,
            open: 0,
            mobile: true,
            system,
        }
    } else {
        let (charge, open) = system.placed_charge_and_open(group);
        let open = open.min(u8::MAX.into()) as u8;
        AtomState {
            charge: charge as i8,
            open,
            mobile: false,
            system: (0, 0),
        }
    }
}

/// Fails once the matching has gone beyond its budget.
pub(super) fn within(matching: &Matching, limits: &Limits) -> Result<(), OrderError> {
    if matching.is_exhausted() {
        return Err(OrderError::StepLimit {
            limit: limits.order_steps,
        });
    }
    Ok(())
}

impl Question {
    /// Whether some perfect matching has another number of edges between two groups than the present
    /// one. If so the matching now is such a one, and its changes are in the journal.
    fn moves(&mut self, system: &System, matching: &mut Matching, a: u32, b: u32) -> bool {
        // The vertices of a pool are all alike, and no more than two can be needed.
        let most = if b as usize >= system.atoms.len() {
            2
        } else {
            usize::MAX
        };
        let Self { edges, exposed } = self;
        let pairs = system
            .vertices(a)
            .flat_map(|x| system.vertices(b).take(most).map(move |y| (x, y)));
        edges.clear();
        edges.extend(pairs.filter(|&(x, y)| matching.neighbours(x).contains(&y)));
        matching.work += system.vertices(b).len() as u64;
        if edges.is_empty() {
            return false;
        }
        let present = system.placed(a, b);
        let mut complete =
            |forced: &[(u32, u32)]| complete(system, matching, forced, (a, b), exposed);
        if present != 0 && complete(&[]) {
            return true;
        }
        if present != 1 && edges.iter().any(|&edge| complete(&[edge])) {
            return true;
        }
        let pairs = || {
            edges
                .iter()
                .enumerate()
                .flat_map(|(at, &first)| edges[at + 1..].iter().map(move |&second| [first, second]))
        };
        present != 2
            && pairs()
                .filter(|[p, q]| p.0 != q.0 && p.1 != q.1)
                .any(|pair| complete(&pair))
    }
}

/// Completes the forced edges to a perfect matching without further edges between the two groups;
/// leaves all as it was if that cannot be. `exposed` is scratch.
fn complete(
    system: &System,
    matching: &mut Matching,
    forced: &[(u32, u32)],
    groups: (u32, u32),
    exposed: &mut Vec<u32>,
) -> bool {
    exposed.clear();
    let b = system.vertices(groups.1);
    for x in system.vertices(groups.0) {
        if b.contains(&matching.mate(x)) {
            exposed.extend([x, matching.part(x)]);
        }
    }
    for &(x, y) in forced {
        for vertex in [x, y] {
            let other = matching.part(vertex);
            if other != NONE {
                exposed.push(other);
            }
            matching.set_removed(vertex, true);
        }
    }
    matching.block(Some(groups));
    let is_forced = |vertex: u32| forced.iter().any(|&(x, y)| vertex == x || vertex == y);
    let perfect = exposed
        .iter()
        .filter(|&&vertex| !is_forced(vertex))
        .all(|&vertex| matching.mate(vertex) != NONE || matching.augment(vertex));
    matching.block(None);
    for &(x, y) in forced {
        matching.set_removed(x, false);
        matching.set_removed(y, false);
        if perfect {
            matching.join(x, y);
        }
    }
    if !perfect {
        matching.undo_to(0);
    }
    perfect
}
