//! Hydrogens and idle electrons of an atom, from its line, its bonds and the valence table.

use crate::{
    Note,
    molfile::{
        drawing::{BondKind, Drawing, DrawnAtom, DrawnBond},
        neighbours::Neighbours,
        valence::{Bonding, ValenceTable},
    },
};

/// What follows for one atom from its line, its bonds and the valence table.
#[derive(Debug, Clone, Copy)]
pub(super) struct Site {
    /// Hydrogens that are no atoms of the record.
    pub(super) hydrogens: u8,
    /// Whether the atom takes a double bond of its aromatic system.
    pub(super) delocalised: bool,
    /// Whether the atom has a double bond, be it one of an aromatic system.
    pub(super) unsaturated: bool,
    /// Valence electrons in no bond, an open shell not counted; `None` outside the main groups.
    pub(super) idle: Option<i32>,
}

impl Site {
    pub(super) fn has_lone_pair(&self) -> bool {
        self.idle.is_some_and(|idle| idle >= 2)
    }
}

/// What the bonds of an atom take.
#[derive(Debug, Clone, Copy, Default)]
pub(super) struct AtomBonds {
    /// Electron pairs, one for each aromatic bond; coordination bonds not counted.
    pairs: u32,
    aromatic: bool,
    double: bool,
    /// Coordination bonds of which the atom is the donor: the end that is no metal, or else the
    /// first one.
    given: u32,
    /// Coordination bonds of which it is the other end.
    received: u32,
}

impl AtomBonds {
    pub(super) fn of(drawing: &Drawing, neighbours: &Neighbours, atom: u32) -> Self {
        let mut found = Self::default();
        for &(_, bond) in neighbours.of(atom) {
            let bond = drawing.bonds[bond as usize];
            found.pairs = found.pairs.saturating_add(bond.kind.pairs());
            found.aromatic |= bond.kind == BondKind::Aromatic;
            found.double |= bond.kind == BondKind::Double;
            if bond.kind == BondKind::Coordination {
                let count = if donor(drawing, bond) == atom {
                    &mut found.given
                } else {
                    &mut found.received
                };
                *count = count.saturating_add(1);
            }
        }
        found
    }
}

fn donor(drawing: &Drawing, bond: DrawnBond) -> u32 {
    let [first, second] = bond.ends;
    let is_metal = |atom: u32| drawing.atoms[atom as usize].element.is_metal();
    if is_metal(first) && !is_metal(second) {
        second
    } else {
        first
    }
}

/// What follows for an atom.
pub(super) fn read(
    index: u32,
    atom: &DrawnAtom,
    bonds: AtomBonds,
    table: ValenceTable,
    notes: &mut Vec<Note>,
) -> Site {
    let AtomBonds {
        pairs, aromatic, ..
    } = bonds;
    let open = u32::from(atom.radical.electrons());
    let bonding = Bonding {
        element: atom.element,
        charge: atom.charge,
        pairs,
        open,
        aromatic,
    };
    let (hydrogens, delocalised) = match atom.valence {
        Some(valence) => stated(index, atom, valence, &bonding, bonds.received, notes),
        None => {
            let hydrogens = bonding.hydrogens(table);
            let other = bonding.hydrogens(table.other());
            if hydrogens != other {
                let [early, late] = match table {
                    ValenceTable::Early => [hydrogens, other],
                    ValenceTable::Late => [other, hydrogens],
                };
                notes.push(table_note(index, atom, early, late));
            }
            (
                hydrogens,
                aromatic && bonding.takes_double_bond(table, hydrogens),
            )
        }
    };
    let outer = match atom.element.group() {
        Some(group @ 1..=2) => Some(i32::from(group)),
        Some(group @ 13..=18) => Some(i32::from(group) - 10),
        _ => None,
    };
    let used = i64::from(pairs) + i64::from(hydrogens) + i64::from(open) + i64::from(delocalised);
    let given = i32::try_from(bonds.given).unwrap_or(i32::MAX);
    let used = i32::try_from(used)
        .unwrap_or(i32::MAX)
        .saturating_add(i32::from(atom.charge))
        .saturating_add(given.saturating_mul(2));
    Site {
        hydrogens,
        delocalised,
        unsaturated: delocalised || bonds.double,
        idle: outer.map(|outer| outer.saturating_sub(used)),
    }
}

/// Hydrogens by the valence field: the stated valence less the bonds, and less one for the aromatic
/// system where there is room for it. Coordination bonds do not count in the format, but some
/// writers count those that a metal receives: where the valence is just that much, there is no
/// hydrogen.
fn stated(
    index: u32,
    atom: &DrawnAtom,
    valence: u8,
    bonding: &Bonding,
    received: u32,
    notes: &mut Vec<Note>,
) -> (u8, bool) {
    let room = u32::from(valence).checked_sub(bonding.pairs);
    if received > 0 && room == Some(received) {
        notes.push(Note {
            code: "valence-with-coordination",
            atoms: vec![index],
            span: Some(atom.span),
            text: format!(
                "the valence {valence} that the line of atom {} states is read as counting its coordination bonds, so it has no hydrogens",
                index.saturating_add(1)
            ),
        });
        return (0, false);
    }
    if room.is_none() {
        notes.push(Note {
            code: "valence-exceeded",
            atoms: vec![index],
            span: Some(atom.span),
            text: format!(
                "atom {} has more bonds than the valence {valence} that its line states",
                index.saturating_add(1)
            ),
        });
    }
    let room = u8::try_from(room.unwrap_or(0)).unwrap_or(u8::MAX);
    let delocalised = bonding.aromatic && room > 0;
    (room - u8::from(delocalised), delocalised)
}

fn table_note(index: u32, atom: &DrawnAtom, early: u8, late: u8) -> Note {
    Note {
        code: "valence-table-dependent",
        atoms: vec![index],
        span: Some(atom.span),
        text: format!(
            "atom {} ({}) has {early} unwritten H by the valences used before 2014 and {late} by the later ones",
            index.saturating_add(1),
            atom.element
        ),
    }
}
