//! From syntax to molecule: hydrogens first, then what each aromatic atom gives, then stereo marks.

use molkin_graph::{Atom, BondOrder, BuildError, Molecule, MoleculeBuilder, PiDemand};

use super::{
    remarks::{Extent, Fault, Remarks},
    ring_bonds, stereo,
    syntax::{AtomSyntax, BondKind, Syntax},
    valence,
};
use crate::ReadErrorKind;

/// Builds the molecule that the syntax stands for. The builder is left empty.
pub(super) fn lower(
    syntax: &mut Syntax,
    builder: &mut MoleculeBuilder,
    molecule: &mut Molecule,
    remarks: &mut Remarks,
) -> Result<(), Fault> {
    builder.clear();
    builder.reserve(syntax.atoms.len(), syntax.bonds.len());
    if syntax.has_open {
        ring_bonds::settle_open_bonds(syntax);
    }
    add_atoms(syntax, builder, remarks)?;
    check_undelocalised(syntax)?;
    add_bonds(syntax, builder)?;
    stereo::add_marks(syntax, builder, remarks)?;
    builder
        .build_into(molecule)
        .map_err(|error| build_fault(syntax, error, None))
}

fn add_atoms(
    syntax: &mut Syntax,
    builder: &mut MoleculeBuilder,
    remarks: &mut Remarks,
) -> Result<(), Fault> {
    for (index, atom) in (0..).zip(&mut syntax.atoms) {
        if atom.bracket {
            builder.add_atom(atom.atom);
        } else {
            let hydrogens = valence::implicit_hydrogens(atom);
            builder.add_atom(Atom {
                hydrogens,
                ..Atom::new(atom.atom.element)
            });
            atom.atom.hydrogens = hydrogens;
        }
        let mut demand = PiDemand::Excluded;
        if atom.aromatic || atom.delocalised {
            demand = aromatic_demand(index, atom)?;
            builder.set_pi_demand(index, demand);
        }
        if let Some(oddity) = valence::oddity(atom, demand) {
            let number = u64::from(index) + 1;
            let text = format!("{} atom {number} {oddity}", atom.atom.element.name());
            let extent = Extent::new(atom.offset as usize, atom.width as usize);
            remarks.note("unusual-valence", &[index], extent, text)?;
        }
    }
    Ok(())
}

fn aromatic_demand(index: u32, atom: &AtomSyntax) -> Result<PiDemand, Fault> {
    match valence::pi_demand(atom) {
        Some(demand) => Ok(demand),
        // Brackets may hold any number of hydrogens and bonds.
        None if atom.bracket => Ok(PiDemand::Excluded),
        None => {
            let kind = ReadErrorKind::AromaticValence { atom: index };
            Err(Fault::new(kind, atom.offset as usize, atom.width as usize))
        }
    }
}

/// Aromatic atoms all of whose bonds are written with an order. The builder knows nothing of their
/// symbols: they must lie in a ring and ask for no double bond.
fn check_undelocalised(syntax: &Syntax) -> Result<(), Fault> {
    let lone = |atom: &AtomSyntax| atom.aromatic && !atom.delocalised;
    if !syntax.atoms.iter().any(lone) {
        return Ok(());
    }
    let ring = ring_bonds::ring_bonds(syntax);
    for (index, atom) in (0..).zip(&syntax.atoms).filter(|(_, atom)| lone(atom)) {
        let in_ring = syntax
            .neighbours(index)
            .any(|(_, bond)| ring[bond as usize]);
        let kind = if !in_ring {
            ReadErrorKind::AromaticOutsideRing { atom: index }
        } else if valence::pi_demand(atom) == Some(PiDemand::Needed) {
            ReadErrorKind::NoKekuleStructure {
                atoms: [index].into(),
            }
        } else {
            continue;
        };
        return Err(Fault::new(kind, atom.offset as usize, atom.width as usize));
    }
    Ok(())
}

fn add_bonds(syntax: &Syntax, builder: &mut MoleculeBuilder) -> Result<(), Fault> {
    for bond in &syntax.bonds {
        let [a, b] = bond.ends;
        let added = match bond.kind {
            BondKind::Order(order) => builder.add_bond(a, b, order),
            BondKind::Delocalised => builder.add_delocalised_bond(a, b),
            BondKind::Open => builder.add_bond(a, b, BondOrder::Single),
        };
        if let Err(error) = added {
            let extent = Extent::new(bond.offset as usize, bond.width as usize);
            return Err(build_fault(syntax, error, Some(extent)));
        }
    }
    Ok(())
}

/// Puts a place to what the builder refuses: that of the bond, or else of the atom.
fn build_fault(syntax: &Syntax, error: BuildError, bond: Option<Extent>) -> Fault {
    let place = |atom: u32| {
        let atom = syntax.atoms.get(atom as usize)?;
        Some(Extent::new(atom.offset as usize, atom.width as usize))
    };
    let (kind, atom, other) = match error {
        BuildError::SelfBond { atom } => (ReadErrorKind::SelfBond { atom }, atom, None),
        BuildError::DuplicateBond { a, b } => (ReadErrorKind::DuplicateBond { a, b }, a, None),
        BuildError::AromaticOutsideRing { atom } => {
            (ReadErrorKind::AromaticOutsideRing { atom }, atom, None)
        }
        BuildError::NoKekuleStructure { atoms } => {
            let first = atoms.first().copied().unwrap_or_default();
            let last = atoms.last().copied().filter(|&last| last != first);
            (
                ReadErrorKind::NoKekuleStructure {
                    atoms: atoms.into(),
                },
                first,
                last,
            )
        }
        BuildError::NoSuchAtom { atom } | BuildError::BadStereo { atom } => {
            (ReadErrorKind::BadStereo { atom }, atom, None)
        }
        _ => (
            ReadErrorKind::Malformed {
                expected: "a structure that can be built",
            },
            0,
            None,
        ),
    };
    let extent = bond.or_else(|| place(atom)).unwrap_or(Extent::new(0, 0));
    Fault {
        kind,
        extent,
        related: other.and_then(place),
    }
}
