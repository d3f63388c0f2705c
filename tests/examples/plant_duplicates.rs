//! Plants duplicates in SMILES files: copies in random spellings and Kekulé forms, at random places.
//!
//!     cargo run --release -p molkin-tests --example plant_duplicates -- PERCENT OUTPUT TRUTH FILE…
//!
//! OUTPUT gets all lines of all files, cut to the structure, and so many copies more that they are PERCENT
//! of the lines, all in random order. TRUTH says of each line of OUTPUT which line of the files it is or is
//! a copy of, and whether it is a copy. Copies are spelled by a writer of the tests' own from another
//! Kekulé form; what that cannot spell (axes, coordination centres) is not copied. Every run gives the
//! same files.
#![forbid(unsafe_code)]
#![allow(
    clippy::print_stdout,
    clippy::print_stderr,
    clippy::unwrap_used,
    reason = "a program of the tests says what it did, and fails by panicking"
)]

use std::{
    fs::File,
    io::{BufWriter, Write as _},
    path::Path,
    process::ExitCode,
};

use molkin_graph::{CanonicalForm, FormAtom, FormStereo, Molecule};
use molkin_tests::{Comparer, Numbers, first_word, other_kekule_form, random_spelling, read_text};

fn main() -> ExitCode {
    let arguments: Vec<String> = std::env::args().skip(1).collect();
    let [percent, output, truth, files @ ..] = &arguments[..] else {
        eprintln!("usage: plant_duplicates PERCENT OUTPUT TRUTH FILE...");
        return ExitCode::from(2);
    };
    let percent: usize = percent.parse().unwrap();
    let texts: Vec<String> = files
        .iter()
        .map(|file| read_text(Path::new(file)))
        .collect();
    let lines = texts.iter().flat_map(|text| text.lines()).map(first_word);
    let mut lines: Vec<Line> = (1..).zip(lines).map(Line::original).collect();
    let copies = plant(&mut lines, percent);
    Numbers::new(0).shuffle(&mut lines);
    write(&lines, output, truth);
    println!("{} lines, {copies} of them copies", lines.len());
    ExitCode::SUCCESS
}

struct Line {
    text: String,
    /// The line of the files, from 1.
    original: usize,
    is_copy: bool,
}

impl Line {
    fn original((original, text): (usize, &str)) -> Self {
        Self {
            text: text.to_owned(),
            original,
            is_copy: false,
        }
    }
}

/// Adds copies of random lines; how many.
fn plant(lines: &mut Vec<Line>, percent: usize) -> usize {
    let mut comparer = Comparer::default();
    let mut numbers = Numbers::new(1);
    let (originals, wanted) = (lines.len(), lines.len() * percent / 100);
    let mut copies = 0;
    while copies < wanted {
        let line = &lines[numbers.below(originals)];
        if let Some(text) = respelled(&mut comparer, &line.text, &mut numbers) {
            let original = line.original;
            let is_copy = true;
            lines.push(Line {
                text,
                original,
                is_copy,
            });
            copies += 1;
        }
    }
    copies
}

fn respelled(comparer: &mut Comparer, text: &str, numbers: &mut Numbers) -> Option<String> {
    let molecule = comparer.molecule(text).ok()?;
    // What has no key is in no group.
    comparer.key(&molecule).ok()?;
    random_spelling(&drawn(&other_kekule_form(&molecule, numbers))?, numbers)
}

/// The molecule as it is drawn, in a form that can be spelled.
fn drawn(molecule: &Molecule) -> Option<CanonicalForm> {
    let atoms = molecule.atoms().map(|atom| FormAtom {
        element: atom.element,
        isotope: atom.isotope,
        charge: atom.charge,
        hydrogens: atom.hydrogens,
    });
    let bonds = molecule.bonds().map(|(a, b, order)| {
        let order = match order {
            molkin_graph::BondOrder::Single => 1,
            molkin_graph::BondOrder::Double => 2,
            molkin_graph::BondOrder::Triple => 3,
            _ => return None,
        };
        Some((a.min(b), a.max(b), order))
    });
    let marks = molecule.drawn_stereo().iter();
    let stereo = marks.filter_map(|mark| {
        Some(FormStereo {
            shape: mark.shape,
            centres: mark.centres,
            ligands: mark.ligands,
            parity: mark.parity?,
        })
    });
    Some(CanonicalForm {
        atoms: atoms.collect(),
        bonds: bonds.collect::<Option<_>>()?,
        stereo: stereo.collect(),
        coordination: molecule.drawn_coordination().to_vec(),
        groups: Vec::new(),
    })
}

fn write(lines: &[Line], output: &str, truth: &str) {
    let mut output = BufWriter::new(File::create(output).unwrap());
    let mut truth = BufWriter::new(File::create(truth).unwrap());
    writeln!(truth, "record\toriginal\tcopy").unwrap();
    for (record, line) in (1..).zip(lines) {
        writeln!(output, "{}", line.text).unwrap();
        let copy = u8::from(line.is_copy);
        writeln!(truth, "{record}\t{}\t{copy}", line.original).unwrap();
    }
    output.into_inner().unwrap().sync_all().unwrap();
    truth.into_inner().unwrap().sync_all().unwrap();
}
