//! Kept bonds of another order.

use std::collections::BTreeSet;

use super::{
    changes::{Change, Finding, Shift},
    frame::{Bond, Frame, MOBILE},
    ledger::Ledger,
};

/// Bonds that are mobile in one record only, each connected set of them a finding.
pub(super) fn delocalised(frame: &Frame, ledger: &mut Ledger) -> Vec<Finding> {
    let mut found = Vec::new();
    for side in 0..2 {
        let mut left: BTreeSet<Bond> = ledger
            .changed()
            .filter(|(_, orders)| orders[side] == MOBILE)
            .map(|(bond, _)| bond)
            .collect();
        while let Some(first) = left.pop_first() {
            let mut bonds = vec![first];
            let mut at = 0;
            while let Some(&(a, b)) = bonds.get(at) {
                at += 1;
                let touches = |&(c, d): &Bond| [a, b].contains(&c) || [a, b].contains(&d);
                let near: Vec<Bond> = left.iter().copied().filter(touches).collect();
                left.retain(|bond| !touches(bond));
                bonds.extend(near);
            }
            let (atoms, ring) = in_ring_order(&bonds);
            let change = Change::Delocalised {
                side,
                atoms: [0, 1].map(|side| frame.sources(side, &atoms)),
                ring,
            };
            found.push(ledger.settle(frame, change, [Vec::new(), Vec::new()], &bonds));
        }
    }
    found
}

/// The atoms of some bonds: round the ring where they are one, or else sorted.
fn in_ring_order(bonds: &[Bond]) -> (Vec<u32>, bool) {
    let atoms: BTreeSet<u32> = bonds.iter().flat_map(|&(a, b)| [a, b]).collect();
    let near = |atom: u32| {
        let own = bonds.iter().filter(move |&&(a, b)| a == atom || b == atom);
        let to = own.map(move |&(a, b)| if a == atom { b } else { a });
        to.collect::<BTreeSet<u32>>()
    };
    let sorted: Vec<u32> = atoms.iter().copied().collect();
    if !sorted.iter().all(|&atom| near(atom).len() == 2) {
        return (sorted, false);
    }
    // Connected and two bonds an atom: one ring.
    let mut round = vec![sorted[0]];
    while let Some(next) = near(round[round.len() - 1])
        .into_iter()
        .find(|to| !round.contains(to))
    {
        round.push(next);
    }
    (round, true)
}

/// The other bonds of changed order: one that loses with the nearest that gains, then those left.
pub(super) fn shifted(frame: &Frame, ledger: &mut Ledger) -> Vec<Finding> {
    let mut left: Vec<(Bond, [u8; 2])> = ledger.changed().collect();
    let mut pairs = Vec::new();
    for &(from, before) in left.iter().filter(|(_, orders)| orders[0] > orders[1]) {
        for &(to, after) in left.iter().filter(|(_, orders)| orders[0] < orders[1]) {
            let fits = before[0] - before[1] == after[1] - after[0];
            pairs.push((!fits, distance(frame, from, to), from, to));
        }
    }
    pairs.sort_unstable();
    let mut found = Vec::new();
    for (_, _, from, to) in pairs {
        let both = [from, to].map(|bond| left.iter().position(|other| other.0 == bond));
        if both.contains(&None) {
            continue;
        }
        left.retain(|(bond, _)| ![from, to].contains(bond));
        found.push(tell(frame, ledger, &[from, to]));
    }
    for (bond, _) in left {
        found.push(tell(frame, ledger, &[bond]));
    }
    found
}

fn tell(frame: &Frame, ledger: &mut Ledger, bonds: &[Bond]) -> Finding {
    let shifts = bonds.iter().map(|&bond| Shift {
        bonds: [0, 1].map(|side| frame.source_bond(side, bond)),
        orders: [0, 1].map(|side| {
            let order = frame.graphs[side].order(bond.0, bond.1);
            order.filter(|&order| order != MOBILE)
        }),
    });
    let change = Change::Shifted(shifts.collect());
    ledger.settle(frame, change, [Vec::new(), Vec::new()], bonds)
}

/// Bonds on a shortest way between two bonds, in the first record; 0 if they share an atom.
fn distance(frame: &Frame, from: Bond, to: Bond) -> usize {
    let graph = &frame.graphs[0];
    let mut seen = BTreeSet::from([from.0, from.1]);
    let mut shell: Vec<u32> = seen.iter().copied().collect();
    for distance in 0.. {
        if shell.contains(&to.0) || shell.contains(&to.1) {
            return distance;
        }
        let next: BTreeSet<u32> = shell
            .iter()
            .flat_map(|&atom| graph.neighbours(atom))
            .collect();
        shell = next.into_iter().filter(|&atom| seen.insert(atom)).collect();
        if shell.is_empty() {
            break;
        }
    }
    usize::MAX
}
