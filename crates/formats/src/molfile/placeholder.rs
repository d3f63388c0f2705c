//! Takes the placeholders of bonds to several atoms out of a molecule.

use molkin_graph::{BuildError, DrawnCoordination, DrawnStereo, Ligand, Molecule, MoleculeBuilder};

use crate::Note;

/// The molecule without its placeholders, which have no bonds. All other atoms keep their numbers,
/// though not their indices.
pub(super) fn leave_out(
    placeholders: &[u32],
    molecule: &Molecule,
    notes: &mut [Note],
) -> Result<Molecule, BuildError> {
    let is_placeholder = |atom: u32| placeholders.binary_search(&atom).is_ok();
    // As many lower as there are placeholders before it.
    let moved = |atom: u32| atom - placeholders.partition_point(|&out| out < atom) as u32;
    let moved_ligand = |ligand: Ligand| match ligand {
        Ligand::Atom(atom) => Ligand::Atom(moved(atom)),
        other => other,
    };
    let keep = |atoms: &mut Vec<u32>| {
        atoms.retain(|&atom| !is_placeholder(atom));
        atoms.iter_mut().for_each(|atom| *atom = moved(*atom));
    };
    let mut builder = MoleculeBuilder::new();
    for (index, atom) in (0..).zip(molecule.atoms()) {
        if is_placeholder(index) {
            builder.skip_number();
        } else {
            builder.add_atom(*atom);
        }
    }
    for (a, b, order) in molecule.bonds() {
        builder.add_bond(moved(a), moved(b), order)?;
    }
    for mark in molecule.drawn_stereo() {
        builder.add_stereo(DrawnStereo {
            centres: mark.centres.map(moved),
            ligands: mark.ligands.map(moved_ligand),
            ..*mark
        });
    }
    for mark in molecule.drawn_coordination() {
        builder.add_coordination(DrawnCoordination {
            centre: moved(mark.centre),
            ligands: mark.ligands.iter().copied().map(moved_ligand).collect(),
            ..*mark
        });
    }
    for group in molecule.stereo_groups() {
        let mut group = group.clone();
        keep(&mut group.atoms);
        builder.add_group(group);
    }
    for note in notes {
        keep(&mut note.atoms);
    }
    builder.build()
}
