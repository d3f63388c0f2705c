//! What the fuzz targets do with an input, whatever it holds. Each function panics on a finding.

use std::io::BufReader;

use molkin_formats::{
    ReadError, Record,
    molfile::{self, ValenceTable},
    sdf, smiles,
    table::{self, Delimiter},
};
use molkin_graph::Limits;

use crate::Comparer;

/// Small, so that an input takes milliseconds and the limits themselves are met.
const LIMITS: Limits = Limits {
    line_bytes: 1 << 12,
    record_bytes: 1 << 14,
    atoms: 200,
    order_steps: 20_000,
    open_elements: 4,
    stereo_pieces: 4,
    map_steps: 100,
    label_steps: 2_000,
    stop: None,
};

/// The input as a line of a SMILES file, read leniently and strictly.
///
/// # Panics
/// On a finding: what strict reading takes, lenient reading must take too.
pub fn smiles(data: &[u8]) {
    let read = |strict| {
        let limits = LIMITS;
        let options = smiles::ReadOptions { strict, limits };
        check(smiles::Reader::new(options).read(data, 1), 1)
    };
    let (lenient, strict) = (read(false), read(true));
    assert!(lenient || !strict, "only strict reading takes it");
}

/// The input as a SMILES that is written, read back, and written again.
///
/// # Panics
/// On a finding: what is written without loss must be the same compound, and the same text.
pub fn round_trip(data: &[u8]) {
    let mut comparer = Comparer::new(LIMITS);
    let Ok(text) = std::str::from_utf8(data) else {
        return;
    };
    let Ok(canonical) = comparer.canonical(text) else {
        return;
    };
    let written = smiles::write(&canonical.form());
    // An orderer that gives up on another numbering has said so.
    let Ok(again) = comparer.canonical(&written.text) else {
        return;
    };
    if written.lost.is_empty() {
        let same = again.compound_key() == canonical.compound_key();
        assert!(same, "another compound when read back: {}", written.text);
        assert_eq!(smiles::write(&again.form()).text, written.text);
    }
}

/// The input as one molfile, read with both tables of valences.
///
/// # Panics
/// On a finding: the tables decide hydrogens, not whether a record is read.
pub fn molfile(data: &[u8]) {
    let lines = lines(data);
    for valences in [ValenceTable::Early, ValenceTable::Late] {
        let options = molfile::ReadOptions {
            valences,
            limits: LIMITS,
            ..molfile::ReadOptions::default()
        };
        check(molfile::parse_with(data, &options), lines);
    }
}

/// The input as an SDF, which comes in small pieces.
///
/// # Panics
/// On a finding: there are no more records than delimiters and a rest, whatever fails.
pub fn sdf(data: &[u8]) {
    let options = molfile::ReadOptions {
        limits: LIMITS,
        ..molfile::ReadOptions::default()
    };
    let lines = lines(data);
    let source = BufReader::with_capacity(13, data);
    let mut records = 0;
    for outcome in sdf::Records::new(source, options) {
        records += 1;
        check(outcome, lines);
    }
    assert!(records <= lines, "more records than lines");
}

/// The input as a table, which comes in small pieces.
///
/// # Panics
/// On a finding: there are fewer rows than lines, whatever fails, and each that is read has as many
/// properties.
pub fn table(data: &[u8]) {
    let mut options = table::ReadOptions::default();
    options.smiles.limits = Limits {
        record_bytes: 1 << 8,
        ..LIMITS
    };
    let lines = lines(data);
    let source = BufReader::with_capacity(13, data);
    let records = match table::Records::new(source, Delimiter::Detected, &options) {
        Ok(records) => records,
        Err(error) => {
            assert!(!error.to_string().is_empty());
            return;
        }
    };
    let (mut rows, mut columns) = (0, None);
    for outcome in records {
        rows += 1;
        if let Ok(record) = &outcome {
            let count = record.properties.len();
            assert_eq!(*columns.get_or_insert(count), count);
        }
        check(outcome, lines);
    }
    assert!(rows < lines, "as many rows as lines");
}

/// An upper bound on the lines of a text, one for the end included.
fn lines(data: &[u8]) -> usize {
    let ends = data.iter().filter(|byte| matches!(byte, b'\n' | b'\r'));
    ends.count() + 1
}

/// Follows a record that was read to its keys; an error must have a place within the text. Whether
/// it was read.
fn check(outcome: Result<Record, ReadError>, lines: usize) -> bool {
    match outcome {
        Ok(record) => {
            follow(&record);
            true
        }
        Err(error) => {
            let span = error.span();
            // A fault may be that a line is missing, which would be the next one.
            let within = (1..=lines + 1).contains(&(span.line as usize));
            assert!(within && span.column >= 1, "no place in the text: {error}");
            assert!(!error.code().is_empty() && !error.render().to_string().is_empty());
            false
        }
    }
}

/// Orders a record and writes it; what comes out must be SMILES.
fn follow(record: &Record) {
    for note in &record.notes {
        let atoms = record.molecule.atom_count();
        let known = note.atoms.iter().all(|&atom| (atom as usize) < atoms);
        assert!(known, "{} names atoms that are not there", note.code);
    }
    let mut comparer = Comparer::new(LIMITS);
    let Ok(canonical) = comparer.order(&record.molecule) else {
        return;
    };
    let _ = (canonical.stereo_elements(), canonical.remarks());
    let written = smiles::write(&canonical.form());
    if let Err(error) = comparer.molecule(&written.text) {
        panic!("written and not read back: {error}");
    }
}
