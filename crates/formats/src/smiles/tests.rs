//! Tests of the reader as a whole. The rows are worked out by hand from the OpenSMILES specification
//! 1.0 unless they say otherwise.

use molkin_graph::{BondOrder, Ligand, Molecule, Parity, Shape};

use super::{ReadOptions, Reader};
use crate::{ReadError, Record};

mod aromatic;
mod coordination;
mod errors;
mod file;
mod hostile;
mod hydrogens;
mod notes;
mod stereo;
mod structure;

#[track_caller]
fn read(text: &str) -> Record {
    match Reader::default().read(text, 1) {
        Ok(record) => record,
        Err(error) => panic!("{}", error.render()),
    }
}

fn read_strictly(text: &str) -> Result<Record, ReadError> {
    let options = ReadOptions {
        strict: true,
        ..ReadOptions::default()
    };
    Reader::new(options).read(text, 1)
}

#[track_caller]
fn fault(text: &str) -> ReadError {
    match Reader::default().read(text, 1) {
        Ok(record) => panic!("{text} was read as {record:?}"),
        Err(error) => error,
    }
}

fn hydrogens(molecule: &Molecule) -> Vec<u8> {
    molecule.atoms().map(|atom| atom.hydrogens).collect()
}

/// Bonds as atom, order sign, atom, sorted.
fn bonds(molecule: &Molecule) -> Vec<String> {
    let sign = |order| match order {
        BondOrder::Single => '-',
        BondOrder::Double => '=',
        BondOrder::Triple => '#',
        BondOrder::Quadruple => '$',
        BondOrder::Coordination | BondOrder::Hydrogen => panic!("{order:?} in SMILES"),
    };
    let mut bonds: Vec<String> = molecule
        .bonds()
        .map(|(a, b, order)| format!("{}{}{}", a.min(b), sign(order), a.max(b)))
        .collect();
    bonds.sort();
    bonds
}

/// The only stereo mark of a text, its ligands put into the order of their atomic numbers (lone pair
/// 0, hydrogen 1) and its ends too. Meaningful where the ligands are different elements.
#[track_caller]
fn arrangement(text: &str) -> (Shape, [u8; 4], Parity) {
    let molecule = read(text).molecule;
    let [mark] = molecule.drawn_stereo() else {
        panic!("{text} has marks {:?}", molecule.drawn_stereo());
    };
    let number = |ligand: &Ligand| match *ligand {
        Ligand::LonePair => 0,
        Ligand::Hydrogen => 1,
        Ligand::Atom(atom) => molecule.atom(atom).unwrap().element.number(),
    };
    let mut numbers = [0; 4];
    mark.ligands
        .iter()
        .zip(&mut numbers)
        .for_each(|(ligand, slot)| *slot = number(ligand));
    let mut parity = mark.parity.unwrap();
    let mut swap = |numbers: &mut [u8; 4], a: usize, b: usize| {
        if numbers[a] > numbers[b] {
            numbers.swap(a, b);
            parity = parity.inverted();
        }
    };
    let steps: &[(usize, usize)] = match mark.shape {
        Shape::Tetrahedral => &[(0, 1), (2, 3), (0, 2), (1, 3), (1, 2)],
        Shape::DoubleBond | Shape::Axis => &[(0, 1), (2, 3)],
    };
    steps.iter().for_each(|&(a, b)| swap(&mut numbers, a, b));
    if mark.shape != Shape::Tetrahedral && numbers[..2] > numbers[2..] {
        // Both ends change places: two swaps, an even permutation.
        numbers.rotate_left(2);
    }
    (mark.shape, numbers, parity)
}
