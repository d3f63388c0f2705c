//! Tests of the writer. Forms are made from text in the order of its atoms, so that the rows do not
//! depend on what the canonical order is; rows were worked out by hand from OpenSMILES 1.0.

use molkin_graph::{CanonicalForm, FormAtom, FormStereo, Limits, Molecule, Orderer};

use super::{Written, write};
use crate::smiles::parse;

mod coordination;
mod lost;
mod round_trip;
mod stereo;
mod structure;

/// A form whose atoms are numbered as the text has them.
fn as_drawn(text: &str) -> CanonicalForm {
    let molecule = parse(text).unwrap();
    let mut bonds: Vec<_> = molecule
        .bonds()
        .map(|(a, b, order)| (a.min(b), a.max(b), order.pairs()))
        .collect();
    bonds.sort_unstable();
    let atoms = molecule.atoms().map(|atom| FormAtom {
        element: atom.element,
        isotope: atom.isotope,
        charge: atom.charge,
        hydrogens: atom.hydrogens,
    });
    let stereo = molecule.drawn_stereo().iter().map(|mark| FormStereo {
        shape: mark.shape,
        centres: mark.centres,
        ligands: mark.ligands,
        parity: mark.parity.unwrap(),
    });
    CanonicalForm {
        atoms: atoms.collect(),
        bonds,
        stereo: stereo.collect(),
        groups: Vec::new(),
        coordination: molecule.drawn_coordination().to_vec(),
    }
}

/// Writes a text's atoms in the order in which it has them.
fn rewritten(text: &str) -> Written {
    write(&as_drawn(text))
}

#[track_caller]
fn assert_written(text: &str, expected: &str) {
    let written = rewritten(text);
    assert_eq!(written.text, expected, "from {text}");
    assert_eq!(written.lost, [], "from {text}");
}

/// The canonical text of a molecule and its two keys.
fn canonical(molecule: &Molecule) -> (Written, [String; 2]) {
    let view = Orderer::new(Limits::default()).order(molecule).unwrap();
    let keys = [view.constitution_key(), view.compound_key()].map(|key| key.to_string());
    (write(&view.form()), keys)
}
