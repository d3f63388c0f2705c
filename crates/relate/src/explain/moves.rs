//! What moved between constitutional isomers: the difference under the atom map, told in a chemist's terms.
//!
//! Findings come one after the other out of a ledger of what differs: every bond of one record only
//! and every bond of changed order ends up in exactly one finding, what no other takes in
//! [`Change::Rest`]. All work is done on the canonical numbering of the lesser record of the two, so
//! that no choice depends on the input and the two directions mirror each other.

mod chains;
mod changes;
mod frame;
mod groups;
mod hydrogens;
mod ledger;
mod links;
mod orders;
mod place;
mod rings;
mod substituent;
mod transfer;
mod turned;

use molkin_graph::Limits;

use crate::{
    Structure,
    mapping::{Heavy, Mapping, Side},
};

use self::{frame::Frame, ledger::Ledger};

pub(super) use self::substituent::name;
pub use self::{
    changes::{Change, Finding, GroupHere, Link, Moved, RingChange, Seat, Shift},
    place::{Neighbour, Place},
    substituent::Substituent,
};

/// All findings, the most telling first, on the canonical positions that the map is between. Nothing
/// where the formulae differ, or where the records are too far apart to tell it piece by piece; a
/// single bond that sits elsewhere can always be told.
pub(super) fn findings(
    structures: [&Structure; 2],
    heavy: &[Heavy; 2],
    sides: &[Side; 2],
    mapping: &Mapping,
    limits: &Limits,
) -> Vec<Finding> {
    let whole = mapping.left_over_a.is_empty() && mapping.left_over_b.is_empty();
    let near = mapping.is_unrelated() == Some(false) || mapping.distance.bonds <= 2;
    if !(whole && near) {
        return Vec::new();
    }
    let [a, b] = heavy;
    let [first, second] = structures;
    // All atoms are mapped, so the pairs list the atoms of A one by one.
    let image: Vec<u32> = mapping.pairs.iter().map(|&(_, image)| image).collect();
    if sides[0] <= sides[1] {
        return find(&Frame::new([a, b], &image), structures, limits);
    }
    let mut inverse = vec![0; image.len()];
    for (at, &image) in (0..).zip(&image) {
        inverse[image as usize] = at;
    }
    let found = find(&Frame::new([b, a], &inverse), [second, first], limits);
    found.into_iter().map(Finding::mirrored).collect()
}

fn find(frame: &Frame, structures: [&Structure; 2], limits: &Limits) -> Vec<Finding> {
    let groups = groups::Groups::of(frame, structures, limits);
    let mut found = tell(frame, &groups, true);
    if found.iter().any(Finding::is_rest) {
        // A link takes bonds that may tell more as those of substituents.
        let others = tell(frame, &groups, false);
        if !others.iter().any(Finding::is_rest) {
            found = others;
        }
    }
    found.extend(hydrogens::moved(frame));
    found.extend(groups.changed());
    // Stable: within a rank the order of discovery, which is canonical.
    found.sort_by_key(|finding| finding.change.rank());
    found
}

/// Findings for all bonds that differ.
fn tell(frame: &Frame, groups: &groups::Groups, links: bool) -> Vec<Finding> {
    let mut ledger = Ledger::of(frame);
    let mut found = turned::moved(frame, &mut ledger, groups);
    if links {
        found.extend(links::moved(frame, &mut ledger));
    }
    found.extend(transfer::moved(frame, &mut ledger));
    found.extend(rings::swapped(frame, &mut ledger));
    found.extend(rings::changed(frame, &mut ledger));
    found.extend(orders::delocalised(frame, &mut ledger));
    found.extend(orders::shifted(frame, &mut ledger));
    found.extend(ledger.rest(frame));
    found
}
