//! From a drawing to a molecule: hydrogens first, then bonds, then stereo marks.

use molkin_graph::{Atom, BondOrder, BuildError, Molecule, MoleculeBuilder, PiDemand};

use crate::{
    Note, ReadErrorKind, Span,
    molfile::{
        FlagZero, ReadOptions, aromatic,
        block::Fault,
        drawing::{BondKind, Drawing},
        neighbours::Neighbours,
        placeholder,
        site::{self, AtomBonds, Site},
        stereo,
    },
};

/// Makes the molecule. Notes are added to those of the drawing.
pub(super) fn molecule(drawing: &mut Drawing, options: &ReadOptions) -> Result<Molecule, Fault> {
    let neighbours = Neighbours::new(drawing.atoms.len(), &drawing.bonds);
    let mut notes = Vec::new();
    let mut sites: Vec<Site> = (0_u32..)
        .zip(&drawing.atoms)
        .map(|(index, atom)| {
            let bonds = AtomBonds::of(drawing, &neighbours, index);
            site::read(index, atom, bonds, options.valences, &mut notes)
        })
        .collect();
    let assembly = Assembly {
        drawing,
        neighbours: &neighbours,
        flag_zero: options.flag_zero,
    };
    let mut more = Vec::new();
    let molecule = match assembly.build(&sites, &mut more) {
        Err((BuildError::NoKekuleStructure { atoms }, place)) => {
            more.clear();
            if !aromatic::place_hydrogens(drawing, &neighbours, &mut sites, &mut notes)? {
                let error = BuildError::NoKekuleStructure { atoms };
                return Err(fault(error, drawing, place));
            }
            assembly.build(&sites, &mut more)
        }
        built => built,
    };
    let molecule = molecule.map_err(|(error, place)| fault(error, drawing, place))?;
    drawing.notes.append(&mut notes);
    drawing.notes.append(&mut more);
    if drawing.placeholders.is_empty() {
        return Ok(molecule);
    }
    let Drawing {
        placeholders,
        notes,
        ..
    } = drawing;
    placeholder::leave_out(placeholders, &molecule, notes)
        .map_err(|error| fault(error, drawing, None))
}

/// What a molecule is put together from.
struct Assembly<'a> {
    drawing: &'a Drawing,
    neighbours: &'a Neighbours,
    flag_zero: FlagZero,
}

impl Assembly<'_> {
    /// The molecule, or what is wrong and the bond line where it is.
    fn build(
        &self,
        sites: &[Site],
        notes: &mut Vec<Note>,
    ) -> Result<Molecule, (BuildError, Option<Span>)> {
        let mut builder = MoleculeBuilder::new();
        builder.reserve(self.drawing.atoms.len(), self.drawing.bonds.len());
        for (atom, site) in self.drawing.atoms.iter().zip(sites) {
            let index = builder.add_atom(Atom {
                element: atom.element,
                isotope: atom.isotope,
                charge: atom.charge,
                hydrogens: site.hydrogens,
                multiplicity: atom.radical.multiplicity(),
            });
            if site.delocalised {
                builder.set_pi_demand(index, PiDemand::Needed);
            }
        }
        for bond in &self.drawing.bonds {
            let [a, b] = bond.ends;
            let added = match bond.kind {
                BondKind::Single => builder.add_bond(a, b, BondOrder::Single),
                BondKind::Double => builder.add_bond(a, b, BondOrder::Double),
                BondKind::Triple => builder.add_bond(a, b, BondOrder::Triple),
                BondKind::Aromatic => builder.add_delocalised_bond(a, b),
                BondKind::Coordination => builder.add_bond(a, b, BondOrder::Coordination),
                BondKind::Hydrogen => builder.add_bond(a, b, BondOrder::Hydrogen),
            };
            added.map_err(|error| (error, Some(bond.span)))?;
        }
        let marks = stereo::marks(self.drawing, self.neighbours, sites, self.flag_zero, notes);
        for mark in marks.elements {
            builder.add_stereo(mark);
        }
        for mark in marks.coordination {
            builder.add_coordination(mark);
        }
        for group in marks.groups {
            builder.add_group(group);
        }
        builder.build().map_err(|error| (error, None))
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
