//! What differs under the map and has not been told yet.

use std::collections::{BTreeMap, BTreeSet};

use super::{
    changes::{Change, Finding},
    frame::{Bond, Frame},
};

/// Bonds on the common numbering. A bond leaves the ledger with the finding that accounts for it.
pub(super) struct Ledger {
    /// Bonds that only the first or only the second record has.
    only_in: [BTreeSet<Bond>; 2],
    /// Order classes in both.
    changed: BTreeMap<Bond, [u8; 2]>,
}

impl Ledger {
    pub(super) fn of(frame: &Frame) -> Self {
        let [first, second] = &frame.graphs;
        let mut ledger = Self {
            only_in: [BTreeSet::new(), BTreeSet::new()],
            changed: BTreeMap::new(),
        };
        for (bond, order) in first.bonds() {
            match second.order(bond.0, bond.1) {
                None => {
                    ledger.only_in[0].insert(bond);
                }
                Some(other) if other != order => {
                    ledger.changed.insert(bond, [order, other]);
                }
                Some(_) => {}
            }
        }
        let new = second.bonds().map(|(bond, _)| bond);
        ledger.only_in[1].extend(new.filter(|bond| first.order(bond.0, bond.1).is_none()));
        ledger
    }

    pub(super) fn only_in(&self, side: usize) -> impl Iterator<Item = Bond> + '_ {
        self.only_in[side].iter().copied()
    }

    pub(super) fn has(&self, side: usize, bond: Bond) -> bool {
        self.only_in[side].contains(&bond)
    }

    pub(super) fn changed(&self) -> impl Iterator<Item = (Bond, [u8; 2])> + '_ {
        self.changed.iter().map(|(&bond, &orders)| (bond, orders))
    }

    /// A finding that accounts for these bonds, which leave the ledger.
    pub(super) fn settle(
        &mut self,
        frame: &Frame,
        change: Change,
        only_in: [Vec<Bond>; 2],
        changed: &[Bond],
    ) -> Finding {
        for (side, bonds) in only_in.iter().enumerate() {
            for bond in bonds {
                self.only_in[side].remove(bond);
            }
        }
        for bond in changed {
            self.changed.remove(bond);
        }
        let [a, b] = only_in;
        let numbered = |side: usize, bonds: Vec<Bond>| {
            let bonds = bonds.into_iter().map(|bond| frame.source_bond(side, bond));
            let mut bonds: Vec<Bond> = bonds.collect();
            bonds.sort_unstable();
            bonds
        };
        let changed = changed
            .iter()
            .map(|&bond| [0, 1].map(|side| frame.source_bond(side, bond)));
        let mut order_changed: Vec<[Bond; 2]> = changed.collect();
        order_changed.sort_unstable();
        Finding {
            change,
            only_in: [numbered(0, a), numbered(1, b)],
            order_changed,
        }
    }

    /// What is left, as one finding.
    pub(super) fn rest(mut self, frame: &Frame) -> Option<Finding> {
        let only_in = [0, 1].map(|side| self.only_in(side).collect::<Vec<Bond>>());
        let changed: Vec<Bond> = self.changed.keys().copied().collect();
        let nothing = only_in.iter().all(Vec::is_empty) && changed.is_empty();
        (!nothing).then(|| self.settle(frame, Change::Rest, only_in, &changed))
    }
}
