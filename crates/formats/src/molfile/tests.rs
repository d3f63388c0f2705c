//! Whole molfiles.

mod errors;
mod properties;
mod stereo;
mod v3000;

use std::fmt::Write;

use crate::{Record, molfile};

/// An atom of a test drawing: symbol and position.
type Spot<'a> = (&'a str, f64, f64);

/// A V2000 molfile without property lines. Bonds are two atoms from 1, type and stereo code.
fn draw(atoms: &[Spot<'_>], bonds: &[(usize, usize, u8, u8)]) -> String {
    let solid: Vec<_> = atoms
        .iter()
        .map(|&(symbol, x, y)| (symbol, x, y, 0.0))
        .collect();
    draw_solid(&solid, bonds, "")
}

/// The same in space, with property lines.
fn draw_solid(
    atoms: &[(&str, f64, f64, f64)],
    bonds: &[(usize, usize, u8, u8)],
    properties: &str,
) -> String {
    let mut text = String::from("test\n\n\n");
    let counts = (atoms.len(), bonds.len());
    writeln!(
        text,
        "{:3}{:3}  0  0  1  0            999 V2000",
        counts.0, counts.1
    )
    .unwrap();
    for (symbol, x, y, z) in atoms {
        writeln!(text, "{x:10.4}{y:10.4}{z:10.4} {symbol:3} 0  0  0  0  0  0").unwrap();
    }
    for (a, b, order, stereo) in bonds {
        writeln!(text, "{a:3}{b:3}{order:3}{stereo:3}").unwrap();
    }
    text + properties + "M  END\n"
}

#[track_caller]
fn read(text: &str) -> Record {
    match molfile::parse(text.as_bytes()) {
        Ok(record) => record,
        Err(error) => panic!("{}", error.render()),
    }
}

fn codes(record: &Record) -> Vec<&'static str> {
    record.notes.iter().map(|note| note.code).collect()
}
