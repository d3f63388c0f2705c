//! Molecules with other marks.

use molkin_graph::{DrawnStereo, Element, Ligand, Molecule, MoleculeBuilder, Parity, Shape};

/// The mirror image.
///
/// # Panics
/// If the molecule cannot be rebuilt.
pub fn mirrored(molecule: &Molecule) -> Molecule {
    let marks = molecule.drawn_stereo().iter().map(|mark| DrawnStereo {
        parity: match mark.shape {
            Shape::DoubleBond => mark.parity,
            _ => mark.parity.map(Parity::inverted),
        },
        ..*mark
    });
    with_marks(molecule, marks)
}

/// A molecule with every combination of marks on all its carbon atoms that have four ligands, at
/// most one of them hydrogen; 2 to the number of such atoms. Its own marks are left out.
///
/// # Panics
/// If the molecule cannot be rebuilt, or has twenty such atoms.
pub fn all_markings(molecule: &Molecule) -> impl Iterator<Item = Molecule> + '_ {
    let places: Vec<(u32, [Ligand; 4])> = (0u32..)
        .zip(molecule.atoms())
        .filter(|(_, atom)| atom.element == Element::CARBON && atom.hydrogens <= 1)
        .filter_map(|(index, atom)| {
            let mut ligands: Vec<Ligand> = molecule
                .neighbours(index)
                .map(|(neighbour, _)| Ligand::Atom(neighbour))
                .collect();
            if atom.hydrogens == 1 {
                ligands.push(Ligand::Hydrogen);
            }
            Some((index, ligands.try_into().ok()?))
        })
        .collect();
    assert!(places.len() < 20, "too many combinations");
    (0u32..1 << places.len()).map(move |choice| {
        let marks = (0..)
            .zip(&places)
            .map(|(bit, &(centre, ligands))| DrawnStereo {
                shape: Shape::Tetrahedral,
                centres: [centre, centre],
                ligands,
                parity: Some(Parity::from_odd(choice >> bit & 1 == 1)),
            });
        with_marks(molecule, marks)
    })
}

fn with_marks(molecule: &Molecule, marks: impl Iterator<Item = DrawnStereo>) -> Molecule {
    let mut builder = MoleculeBuilder::new();
    for atom in molecule.atoms() {
        builder.add_atom(*atom);
    }
    for (a, b, order) in molecule.bonds() {
        builder.add_bond(a, b, order).unwrap();
    }
    marks.for_each(|mark| builder.add_stereo(mark));
    builder.build().unwrap()
}
