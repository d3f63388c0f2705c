//! Which bonds, charges and radicals differ among the best placements.
//!
//! A bond is mobile when some perfect matching covers it another number of times than the one at
//! hand. Each question is answered exactly: some edges are forced, the others of that bond hidden,
//! and the matching is completed by augmenting paths or cannot be.

use crate::matching::{Matching, NONE};

use super::{
    AtomState, MOBILE,
    placement::{Pool, System},
};

/// Marks what is mobile in a settled system and sets what is fixed.
pub(super) fn mark(
    system: &System,
    matching: &mut Matching,
    orders: &mut [u8],
    states: &mut [AtomState],
) {
    let mut mobile = vec![false; system.bonds.len()];
    for at in 0..system.bonds.len() {
        if mobile[at] {
            continue;
        }
        let bond = system.bonds[at];
        if let Some(other) = another_placement(system, matching, bond.a, bond.b) {
            for (flag, bond) in mobile.iter_mut().zip(&system.bonds) {
                let count = |mate: &[u32]| system.multiplicity(mate, bond.a, bond.b);
                *flag |= count(&system.mate) != count(&other);
            }
        }
    }
    for (bond, mobile) in system.bonds.iter().zip(mobile) {
        let pi = system.multiplicity(&system.mate, bond.a, bond.b) as u8;
        orders[bond.bond as usize] = if mobile { MOBILE } else { 1 + pi };
    }
    if !system.is_closed() {
        mark_atoms(system, matching, states);
    }
}

fn mark_atoms(system: &System, matching: &mut Matching, states: &mut [AtomState]) {
    let mut mobile = vec![false; system.atoms.len()];
    for group in 0..system.atoms.len() as u32 {
        for pool in Pool::ALL {
            if mobile[group as usize] {
                break;
            }
            let pool = system.pool_group(pool);
            if let Some(other) = another_placement(system, matching, group, pool) {
                for (flag, group) in mobile.iter_mut().zip(0..) {
                    let state = |mate: &[u32]| system.charge_and_open(mate, group);
                    *flag |= state(&system.mate) != state(&other);
                }
            }
        }
    }
    for (group, &atom) in system.atoms.iter().enumerate() {
        let (charge, open) = system.charge_and_open(&system.mate, group as u32);
        states[atom as usize] = if mobile[group] {
            let total = system.charge.clamp(i16::MIN.into(), i16::MAX.into()) as i16;
            let system = (total, system.open_total().min(u16::MAX.into()) as u16);
            AtomState {
                charge: 0,
                open: 0,
                mobile: true,
                system,
            }
        } else {
            let open = open.min(u8::MAX.into()) as u8;
            AtomState {
                charge: charge as i8,
                open,
                mobile: false,
                system: (0, 0),
            }
        };
    }
}

/// A perfect matching in which the number of edges between two groups differs from the present one.
fn another_placement(system: &System, matching: &mut Matching, a: u32, b: u32) -> Option<Vec<u32>> {
    let edges: Vec<(u32, u32)> = system
        .vertices(a)
        .flat_map(|x| system.vertices(b).map(move |y| (x, y)))
        .filter(|&(x, y)| matching.neighbours(x).contains(&y))
        .collect();
    if edges.is_empty() {
        return None;
    }
    let present = system.multiplicity(&system.mate, a, b);
    if present != 0 {
        let found = complete(system, matching, &[], (a, b));
        if found.is_some() {
            return found;
        }
    }
    if present != 1 {
        let found = edges
            .iter()
            .find_map(|&edge| complete(system, matching, &[edge], (a, b)));
        if found.is_some() {
            return found;
        }
    }
    if present != 2 {
        let pairs = edges
            .iter()
            .enumerate()
            .flat_map(|(at, &first)| edges[at + 1..].iter().map(move |&second| [first, second]));
        for pair in pairs.filter(|[p, q]| p.0 != q.0 && p.1 != q.1) {
            let found = complete(system, matching, &pair, (a, b));
            if found.is_some() {
                return found;
            }
        }
    }
    None
}

/// Completes the forced edges to a perfect matching without further edges between the two groups.
fn complete(
    system: &System,
    matching: &mut Matching,
    forced: &[(u32, u32)],
    groups: (u32, u32),
) -> Option<Vec<u32>> {
    matching.restore(&system.mate);
    let (a, b) = (system.vertices(groups.0), system.vertices(groups.1));
    for x in a {
        if b.contains(&matching.mate(x)) {
            matching.part(x);
        }
    }
    for &(x, y) in forced {
        for vertex in [x, y] {
            matching.part(vertex);
            matching.set_removed(vertex, true);
        }
    }
    matching.block(Some(groups));
    let perfect = (0..system.mate.len() as u32)
        .filter(|&vertex| !forced.iter().any(|&(x, y)| vertex == x || vertex == y))
        .all(|vertex| matching.mate(vertex) != NONE || matching.augment(vertex));
    matching.block(None);
    for &(x, y) in forced {
        matching.set_removed(x, false);
        matching.set_removed(y, false);
        matching.join(x, y);
    }
    let found = perfect.then(|| matching.saved());
    matching.restore(&system.mate);
    found
}
