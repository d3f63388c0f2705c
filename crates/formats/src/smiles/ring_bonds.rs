//! Which bonds lie in rings, for the few records in which that decides what a symbol means.

use super::syntax::{BondKind, NONE, Syntax};

/// One atom of the walk: how it was reached and which place comes next.
#[derive(Debug, Clone, Copy)]
struct Step {
    atom: u32,
    parent_bond: u32,
    place: u32,
}

/// Settles every elided bond between an aromatic symbol and a wildcard: delocalised in a ring,
/// single elsewhere.
pub(super) fn settle_open_bonds(syntax: &mut Syntax) {
    let ring = ring_bonds(syntax);
    for (bond, in_ring) in (0..).zip(ring) {
        if syntax.bonds[bond as usize].kind == BondKind::Open {
            syntax.settle(bond, in_ring);
        }
    }
}

/// For each bond whether it lies in a ring. Linear in atoms and bonds.
///
/// A bond is in a ring unless it is a bridge; bridges are found by depth-first search with low
/// points (Tarjan, Inf. Process. Lett. 1974, 2, 160) on an explicit stack.
pub(super) fn ring_bonds(syntax: &Syntax) -> Vec<bool> {
    let count = syntax.atoms.len();
    let mut ring = vec![true; syntax.bonds.len()];
    let mut entered = vec![NONE; count];
    let mut low = vec![NONE; count];
    let mut stack = Vec::new();
    let mut time = 0;
    for root in 0..count as u32 {
        if entered[root as usize] != NONE {
            continue;
        }
        let mut arrival = Some(Step {
            atom: root,
            parent_bond: NONE,
            place: NONE,
        });
        loop {
            if let Some(step) = arrival.take() {
                entered[step.atom as usize] = time;
                low[step.atom as usize] = time;
                time += 1;
                stack.push(Step {
                    place: syntax.first_place(step.atom),
                    ..step
                });
            }
            let Some(top) = stack.last_mut() else { break };
            let Some((other, bond, next)) = syntax.step(top.place) else {
                let done = *top;
                stack.pop();
                if let Some(parent) = stack.last() {
                    let reach = low[done.atom as usize];
                    ring[done.parent_bond as usize] = reach <= entered[parent.atom as usize];
                    low[parent.atom as usize] = low[parent.atom as usize].min(reach);
                }
                continue;
            };
            top.place = next;
            if bond == top.parent_bond {
                continue;
            }
            match entered[other as usize] {
                NONE => {
                    arrival = Some(Step {
                        atom: other,
                        parent_bond: bond,
                        place: NONE,
                    })
                }
                seen => low[top.atom as usize] = low[top.atom as usize].min(seen),
            }
        }
    }
    ring
}
