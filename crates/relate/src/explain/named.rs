//! Ligands of both records in the names of one.

use molkin_graph::Ligand;

use crate::Structure;

/// A ligand as the other side would name it.
#[derive(PartialEq, Eq, Clone, Copy)]
pub(super) enum Named {
    Atom(u32),
    Hydrogen(Option<u16>),
    LonePair,
}

/// Names a ligand by where `image` takes its atom.
pub(super) fn named(
    structure: &Structure,
    ligand: Ligand,
    image: &dyn Fn(u32) -> Option<u32>,
) -> Named {
    match ligand {
        Ligand::LonePair => Named::LonePair,
        Ligand::Hydrogen => Named::Hydrogen(None),
        Ligand::Atom(atom) => match image(atom) {
            Some(to) => Named::Atom(to),
            // Only folded hydrogens have no image.
            None => Named::Hydrogen(structure.molecule().atom(atom).and_then(|a| a.isotope)),
        },
    }
}

/// An atom, unless it is a hydrogen that counts as one of its neighbour's.
pub(super) fn unfolded(structure: &Structure, atom: u32) -> Option<u32> {
    (!structure.canonical().is_folded(atom)).then_some(atom)
}
