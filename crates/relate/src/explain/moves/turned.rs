//! Functional groups that are the other way round: an ester whose acid and alcohol have changed sides.

use super::{
    changes::{Change, Finding},
    frame::{Bond, Frame, bond},
    groups::Groups,
    ledger::Ledger,
};

/// Atoms x and y of one functional group that are bonded to p and q in the one and to q and p in the
/// other.
pub(super) fn moved(frame: &Frame, ledger: &mut Ledger, groups: &Groups) -> Vec<Finding> {
    let mut found = Vec::new();
    let lost: Vec<Bond> = ledger.only_in(0).collect();
    let ends: Vec<(u32, u32)> = lost.iter().flat_map(|&(a, b)| [(a, b), (b, a)]).collect();
    for &(x, p) in &ends {
        for &(y, q) in ends.iter().filter(|&&(y, _)| x < y) {
            let Some(name) = groups.name_of_both([x, y]) else {
                continue;
            };
            let only_in = [vec![bond(x, p), bond(y, q)], vec![bond(x, q), bond(y, p)]];
            let is_open =
                (0..2).all(|side| only_in[side].iter().all(|&bond| ledger.has(side, bond)));
            if p == q || !is_open {
                continue;
            }
            let source = |side: usize, ends: [(u32, u32); 2]| {
                ends.map(|(a, b)| (frame.source(side, a), frame.source(side, b)))
            };
            let bonds = [source(0, [(x, p), (y, q)]), source(1, [(x, q), (y, p)])];
            found.push(ledger.settle(frame, Change::Turned { name, bonds }, only_in, &[]));
        }
    }
    found
}
