//! Which bonds, charges and radicals differ among the best placements.
//!
//! A bond is mobile when some perfect matching covers it another number of times than the one at
//! hand. Each question is answered exactly: some edges are forced, the others of that bond hidden,
//! and the matching is completed by augmenting paths or cannot be.

use crate::{
    Limits, OrderError,
    matching::{Matching, NONE},
};

use super::{
    AtomState, MOBILE,
    placement::{Pool, System},
};

/// Marks what is mobile in a settled system and sets what is fixed. The matching holds the system's
/// placement before and after.
///
/// # Errors
/// [`OrderError::StepLimit`] when the matching has looked at more edges than the limits allow.
pub(super) fn mark(
    system: &System,
    matching: &mut Matching,
    limits: &Limits,
    orders: &mut [u8],
    states: &mut [AtomState],
) -> Result<(), OrderError> {
    let mut bonds_at: Vec<Vec<usize>> = vec![Vec::new(); system.atoms.len()];
    for (at, bond) in system.bonds.iter().enumerate() {
        bonds_at[bond.a as usize].push(at);
        bonds_at[bond.b as usize].push(at);
    }
    let mut mobile = vec![false; system.bonds.len()];
    for at in 0..system.bonds.len() {
        let bond = system.bonds[at];
        if mobile[at] {
            continue;
        }
        let moved = moves(system, matching, bond.a, bond.b);
        within(matching, limits)?;
        if !moved {
            continue;
        }
        // Every bond that the other placement covers differently is mobile, too; it can only be at
        // an atom where something changed.
        let changed = matching
            .changed_since(0)
            .map(|vertex| matching.group(vertex));
        for group in changed.filter(|&group| (group as usize) < bonds_at.len()) {
            for &near in &bonds_at[group as usize] {
                let bond = system.bonds[near];
                let now = system.multiplicity(|v| matching.mate(v), bond.a, bond.b);
                mobile[near] |= now != system.placed(bond.a, bond.b);
            }
        }
        matching.undo_to(0);
    }
    for (bond, mobile) in system.bonds.iter().zip(mobile) {
        let pi = system.placed(bond.a, bond.b) as u8;
        orders[bond.bond as usize] = if mobile { MOBILE } else { 1 + pi };
    }
    mark_atoms(system, matching, limits, states)
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

fn mark_atoms(
    system: &System,
    matching: &mut Matching,
    limits: &Limits,
    states: &mut [AtomState],
) -> Result<(), OrderError> {
    let mut mobile = vec![false; system.atoms.len()];
    for group in 0..system.atoms.len() as u32 {
        for pool in Pool::ALL {
            if mobile[group as usize] {
                break;
            }
            let moved = moves(system, matching, group, system.pool_group(pool));
            within(matching, limits)?;
            if !moved {
                continue;
            }
            let changed: Vec<u32> = matching
                .changed_since(0)
                .map(|vertex| matching.group(vertex))
                .collect();
            let atoms = system.atoms.len() as u32;
            for group in changed.into_iter().filter(|&group| group < atoms) {
                let now = system.charge_and_open(|v| matching.mate(v), group);
                mobile[group as usize] |= now != system.placed_charge_and_open(group);
            }
            matching.undo_to(0);
        }
    }
    for (group, &atom) in system.atoms.iter().enumerate() {
        let (charge, open) = system.placed_charge_and_open(group as u32);
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
    Ok(())
}

/// Whether some perfect matching has another number of edges between two groups than the present
/// one. If so the matching now is such a one, and its changes are in the journal.
fn moves(system: &System, matching: &mut Matching, a: u32, b: u32) -> bool {
    // The vertices of a pool are all alike, and no more than two can be needed.
    let most = if b as usize >= system.atoms.len() {
        2
    } else {
        usize::MAX
    };
    let edges: Vec<(u32, u32)> = system
        .vertices(a)
        .flat_map(|x| system.vertices(b).take(most).map(move |y| (x, y)))
        .filter(|&(x, y)| matching.neighbours(x).contains(&y))
        .collect();
    matching.work += system.vertices(b).len() as u64;
    if edges.is_empty() {
        return false;
    }
    let present = system.placed(a, b);
    if present != 0 && complete(system, matching, &[], (a, b)) {
        return true;
    }
    if present != 1
        && edges
            .iter()
            .any(|&edge| complete(system, matching, &[edge], (a, b)))
    {
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
            .any(|pair| complete(system, matching, &pair, (a, b)))
}

/// Completes the forced edges to a perfect matching without further edges between the two groups;
/// leaves all as it was if that cannot be.
fn complete(
    system: &System,
    matching: &mut Matching,
    forced: &[(u32, u32)],
    groups: (u32, u32),
) -> bool {
    let mut exposed = Vec::new();
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
        .into_iter()
        .filter(|&vertex| !is_forced(vertex))
        .all(|vertex| matching.mate(vertex) != NONE || matching.augment(vertex));
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
