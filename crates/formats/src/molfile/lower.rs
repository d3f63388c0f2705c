//! From a drawing to a molecule: hydrogens first, then bonds, then stereo marks.

use molkin_graph::{Atom, BondOrder, BuildError, Molecule, MoleculeBuilder, PiDemand};

use crate::{
    Note, ReadErrorKind, Span,
    molfile::{
        block::Fault,
        drawing::{BondKind, Drawing, DrawnAtom},
        neighbours::Neighbours,
        stereo,
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
    /// Valence electrons in no bond, an open shell not counted; `None` outside the main groups.
    pub(super) idle: Option<i32>,
}

impl Site {
    pub(super) fn has_lone_pair(&self) -> bool {
        self.idle.is_some_and(|idle| idle >= 2)
    }
}

/// Makes the molecule. Notes are added to those of the drawing.
pub(super) fn molecule(drawing: &mut Drawing, table: ValenceTable) -> Result<Molecule, Fault> {
    let neighbours = Neighbours::new(drawing.atoms.len(), &drawing.bonds);
    let mut notes = Vec::new();
    let sites: Vec<Site> = (0_u32..)
        .zip(&drawing.atoms)
        .map(|(index, atom)| {
            let bonds = neighbours
                .of(index)
                .iter()
                .map(|&(_, bond)| drawing.bonds[bond as usize].kind);
            site(index, atom, bonds, table, &mut notes)
        })
        .collect();
    let mut builder = MoleculeBuilder::new();
    for (atom, site) in drawing.atoms.iter().zip(&sites) {
        let index = builder.add_atom(Atom {
            element: atom.element,
            isotope: atom.isotope,
            charge: atom.charge,
            hydrogens: site.hydrogens,
            multiplicity: atom.radical.multiplicity(),
        });
        builder.set_pi_demand(
            index,
            if site.delocalised {
                PiDemand::Needed
            } else {
                PiDemand::Excluded
            },
        );
    }
    for bond in &drawing.bonds {
        let [a, b] = bond.ends;
        let added = match bond.kind {
            BondKind::Single => builder.add_bond(a, b, BondOrder::Single),
            BondKind::Double => builder.add_bond(a, b, BondOrder::Double),
            BondKind::Triple => builder.add_bond(a, b, BondOrder::Triple),
            BondKind::Aromatic => builder.add_delocalised_bond(a, b),
        };
        added.map_err(|error| fault(error, drawing, Some(bond.span)))?;
    }
    for mark in stereo::marks(drawing, &neighbours, &sites, &mut notes) {
        builder.add_stereo(mark);
    }
    let molecule = builder
        .build()
        .map_err(|error| fault(error, drawing, None))?;
    drawing.notes.append(&mut notes);
    Ok(molecule)
}

fn site(
    index: u32,
    atom: &DrawnAtom,
    bonds: impl Iterator<Item = BondKind>,
    table: ValenceTable,
    notes: &mut Vec<Note>,
) -> Site {
    let (mut pairs, mut aromatic) = (0_u32, false);
    for kind in bonds {
        pairs = pairs.saturating_add(kind.pairs());
        aromatic |= kind == BondKind::Aromatic;
    }
    let open = u32::from(atom.radical.electrons());
    let bonding = Bonding {
        element: atom.element,
        charge: atom.charge,
        pairs,
        open,
        aromatic,
    };
    let (hydrogens, delocalised) = match atom.valence {
        Some(valence) => stated(index, atom, valence, &bonding, notes),
        None => {
            let hydrogens = bonding.hydrogens(table);
            note_table(index, atom, &bonding, notes);
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
    let used = i32::try_from(used)
        .unwrap_or(i32::MAX)
        .saturating_add(i32::from(atom.charge));
    Site {
        hydrogens,
        delocalised,
        idle: outer.map(|outer| outer.saturating_sub(used)),
    }
}

/// Hydrogens by the valence field: the stated valence less the bonds, and less one for the aromatic
/// system where there is room for it.
fn stated(
    index: u32,
    atom: &DrawnAtom,
    valence: u8,
    bonding: &Bonding,
    notes: &mut Vec<Note>,
) -> (u8, bool) {
    let room = u32::from(valence).checked_sub(bonding.pairs);
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

fn note_table(index: u32, atom: &DrawnAtom, bonding: &Bonding, notes: &mut Vec<Note>) {
    let early = bonding.hydrogens(ValenceTable::Early);
    let late = bonding.hydrogens(ValenceTable::Late);
    if early != late {
        notes.push(Note {
            code: "valence-table-dependent",
            atoms: vec![index],
            span: Some(atom.span),
            text: format!(
                "atom {} ({}) has {early} unwritten H by the valences used before 2014 and {late} by the later ones",
                index.saturating_add(1),
                atom.element
            ),
        });
    }
}

/// What the builder refuses, at the line of the atom or bond.
fn fault(error: BuildError, drawing: &Drawing, bond: Option<Span>) -> Fault {
    let place = |atom: u32| drawing.atoms.get(atom as usize).map(|atom| atom.span);
    let (kind, span) = match error {
        BuildError::NoSuchAtom { atom } => {
            let declared = u32::try_from(drawing.atoms.len()).unwrap_or(u32::MAX);
            (
                ReadErrorKind::NoSuchAtom {
                    named: atom.saturating_add(1),
                    declared,
                },
                bond,
            )
        }
        BuildError::SelfBond { atom } => (ReadErrorKind::SelfBond { atom }, bond),
        BuildError::DuplicateBond { a, b } => (ReadErrorKind::DuplicateBond { a, b }, bond),
        BuildError::AromaticOutsideRing { atom } => {
            (ReadErrorKind::AromaticOutsideRing { atom }, place(atom))
        }
        BuildError::NoKekuleStructure { atoms } => {
            let span = atoms.first().and_then(|&atom| place(atom));
            (
                ReadErrorKind::NoKekuleStructure {
                    atoms: atoms.into(),
                },
                span,
            )
        }
        BuildError::BadStereo { atom } => (ReadErrorKind::BadStereo { atom }, place(atom)),
        _ => (
            ReadErrorKind::Malformed {
                expected: "a structure",
            },
            None,
        ),
    };
    Fault::new(kind, span.unwrap_or(Span::new(1, 1, 0)))
}
