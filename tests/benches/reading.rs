//! Reading of whole sources by format: `cargo bench -p molkin-tests --bench reading`.
//!
//! The same structures in each format, those of the demo's vendor file, so that the formats can be
//! compared. Beside the reference library: tests/scripts/reading_speed.
#![allow(clippy::unwrap_used, reason = "a bench fails by panicking")]

use std::fmt::Write;

use divan::{Bencher, black_box, counter::BytesCount};
use molkin_formats::source::{Format, ReadOptions, Records};
use molkin_graph::{BondOrder, Molecule};
use molkin_tests::{Comparer, read_text, workspace};

const FORMATS: [&str; 4] = ["smiles", "v2000", "v3000", "csv"];

fn molecules(text: &str, format: Format) -> Vec<Molecule> {
    let records = Records::new("bench", text.as_bytes(), format, ReadOptions::default());
    records
        .map(|outcome| outcome.unwrap().result.unwrap().molecule)
        .collect()
}

/// A record of version 3000, all atoms at the origin.
fn v3000(molecule: &Molecule) -> String {
    let mut text =
        String::from("\n\n\n  0  0  0     0  0            999 V3000\nM  V30 BEGIN CTAB\n");
    let counts = (molecule.atom_count(), molecule.bonds().len());
    writeln!(
        text,
        "M  V30 COUNTS {} {} 0 0 0\nM  V30 BEGIN ATOM",
        counts.0, counts.1
    )
    .unwrap();
    for (number, atom) in (1..).zip(molecule.atoms()) {
        let symbol = atom.element.symbol();
        writeln!(
            text,
            "M  V30 {number} {symbol} 0.0000 0.0000 0.0000 0 CHG={}",
            atom.charge
        )
        .unwrap();
    }
    text += "M  V30 END ATOM\nM  V30 BEGIN BOND\n";
    for (number, (a, b, order)) in (1..).zip(molecule.bonds()) {
        let order = match order {
            BondOrder::Double => 2,
            BondOrder::Triple => 3,
            _ => 1,
        };
        writeln!(text, "M  V30 {number} {order} {} {}", a + 1, b + 1).unwrap();
    }
    text + "M  V30 END BOND\nM  V30 END CTAB\nM  END\n$$$$\n"
}

fn source(format: &str) -> (String, Format) {
    let drawn = read_text(&workspace("fixtures/demo/vendor.sdf"));
    let molecules = molecules(&drawn, Format::Sdf);
    let mut comparer = Comparer::default();
    let mut smiles = molecules.iter().map(|molecule| {
        let canonical = comparer.order(molecule).unwrap();
        molkin_formats::smiles::write(&canonical.form()).text
    });
    match format {
        "v2000" => (drawn, Format::Sdf),
        "v3000" => (molecules.iter().map(v3000).collect(), Format::Sdf),
        "csv" => {
            let rows: String = smiles.map(|text| format!("\"{text}\",1\n")).collect();
            (format!("smiles,batch\n{rows}"), Format::Csv)
        }
        _ => (
            smiles.by_ref().map(|text| text + " name\n").collect(),
            Format::Smiles,
        ),
    }
}

#[divan::bench(args = FORMATS)]
fn read(bencher: Bencher<'_, '_>, name: &str) {
    let (text, format) = source(name);
    let expected = molecules(&source("v2000").0, Format::Sdf).len();
    assert!(expected > 5 && molecules(&text, format).len() == expected);
    bencher
        .counter(BytesCount::of_str(&text))
        .bench_local(|| molecules(black_box(&text), format).len());
}

fn main() {
    divan::main();
}
