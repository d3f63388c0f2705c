//! Damaged records: a result or an error for each, and never a panic.

use std::collections::BTreeSet;

use molkin_formats::{molfile, sdf, smiles};
use molkin_graph::Limits;
use molkin_tests::{
    Comparer, Numbers, Tally, definition_pairs, first_word, molfiles, read_text, shared,
};

use crate::hostile::use_up;

/// Small budgets, since nobody waits for the answers.
fn comparer() -> Comparer {
    Comparer::new(Limits {
        order_steps: 2_000,
        ..Limits::default()
    })
}

/// Outcomes that no input may have: what is written without loss must come back as it was.
const WRONG: [&str; 2] = ["changed", "not read back"];

/// One to four changes of single bytes or stretches: overwritten, left out, doubled, cut off.
fn damaged(text: &str, alphabet: &[u8], numbers: &mut Numbers) -> Vec<u8> {
    let mut bytes = text.as_bytes().to_vec();
    for _ in 0..=numbers.below(4) {
        if bytes.is_empty() {
            break;
        }
        let at = numbers.below(bytes.len());
        let end = (at + 1 + numbers.below(6)).min(bytes.len());
        let other = alphabet[numbers.below(alphabet.len())];
        match numbers.below(6) {
            0 | 1 => bytes[at] = other,
            2 => bytes.insert(at, other),
            3 => drop(bytes.drain(at..end)),
            4 => {
                let stretch = bytes[at..end].to_vec();
                let to = numbers.below(bytes.len());
                bytes.splice(to..to, stretch);
            }
            _ if numbers.below(8) == 0 => bytes.truncate(at),
            _ => bytes[at] = numbers.below(256) as u8,
        }
    }
    bytes
}

/// Real records, damaged by bytes that mean something in SMILES.
#[test]
fn damaged_smiles_give_a_result_or_an_error() {
    const ALPHABET: &[u8] = b"CNOcnosSPFIBrl[]()=#$:/\\@+-.%0123456789Hh* \t|";
    let pairs = definition_pairs();
    let mut texts: Vec<String> = pairs
        .into_iter()
        .flat_map(|pair| [pair.a, pair.b])
        .collect();
    if let Some(path) = shared("collections/vendor.smi") {
        let text = read_text(&path);
        texts.extend(
            text.lines()
                .step_by(20)
                .map(|line| first_word(line).to_owned()),
        );
    }
    let mut numbers = Numbers::new(7);
    let mut comparer = comparer();
    let mut reader = smiles::Reader::default();
    let mut tally = Tally::new("damaged SMILES");
    let mut met = BTreeSet::new();
    for _ in 0..20_000 {
        let text = &texts[numbers.below(texts.len())];
        let text = damaged(text, ALPHABET, &mut numbers);
        let outcome = match reader.read(&text, 1) {
            Ok(record) => use_up(&mut comparer, record.molecule),
            Err(error) => {
                assert!(!error.render().to_string().is_empty());
                error.code()
            }
        };
        met.insert(outcome);
        tally.case(!WRONG.contains(&outcome), || {
            String::from_utf8_lossy(&text).into_owned()
        });
    }
    assert!(met.len() > 12, "the damage reaches too little: {met:?}");
    tally.finish(20_000);
}

/// Real molfiles: with hydrogens and in space, plain, and hard ones.
const PUBLISHED: [&str; 3] = [
    "drawings/3d.sdf.gz",
    "collections/nci200.sdf.gz",
    "collections/hard.sdf.gz",
];

/// Bytes that mean something in a molfile.
const MOLFILE_ALPHABET: &[u8] = b" 0123456789-.CNOSPHRXAQLM\n\r\tvV*>";

#[test]
fn damaged_molfiles_give_a_result_or_an_error() {
    let texts = molfiles(&PUBLISHED);
    let mut numbers = Numbers::new(8);
    let mut comparer = comparer();
    let mut tally = Tally::new("damaged molfiles");
    let mut met = BTreeSet::new();
    for _ in 0..8_000 {
        let text = &texts[numbers.below(texts.len())];
        let text = damaged(text, MOLFILE_ALPHABET, &mut numbers);
        let outcome = match molfile::parse(&text) {
            Ok(record) => use_up(&mut comparer, record.molecule),
            Err(error) => {
                assert!(!error.render().to_string().is_empty());
                error.code()
            }
        };
        met.insert(outcome);
        tally.case(!WRONG.contains(&outcome), || {
            String::from_utf8_lossy(&text).into_owned()
        });
    }
    assert!(met.len() > 12, "the damage reaches too little: {met:?}");
    tally.finish(8_000);
}

/// Every record of a file is read or fails, however broken it and the others are.
#[test]
fn damaged_files_have_as_many_records_as_before() {
    let texts = molfiles(&PUBLISHED);
    let mut numbers = Numbers::new(10);
    let mut tally = Tally::new("damaged files");
    for _ in 0..200 {
        let count = 1 + numbers.below(20);
        let (mut sdf, mut smi) = (Vec::new(), Vec::new());
        for _ in 0..count {
            let text = &texts[numbers.below(texts.len())];
            sdf.extend(damaged(text, MOLFILE_ALPHABET, &mut numbers));
            sdf.extend(b"\n$$$$\n");
            let line = damaged("C[C@H](N)C(=O)O alanine", b"()=123 ", &mut numbers);
            smi.extend(line.into_iter().filter(|byte| !b"\r\n".contains(byte)));
            smi.push(b'\n');
        }
        let sdf = sdf::Records::new(&sdf[..], molfile::ReadOptions::default()).count();
        let smi = smiles::Records::new(&smi[..], smiles::ReadOptions::default()).count();
        tally.case((sdf, smi) == (count, count), || {
            format!("{sdf} and {smi} records of {count}")
        });
    }
    tally.finish(200);
}
