//! Tables as comma-separated values (RFC 4180, but lines end in LF).

use std::{
    cell::RefCell,
    io::{self, Write},
};

use csv::{Terminator, Writer, WriterBuilder};
use molkin_relate::wire::KeyRow;
use serde::Serialize;

/// The columns of `molkin keys`: the fields of [`KeyRow`]. New ones go to the end.
const COLUMNS: [&str; 11] = [
    "source",
    "record",
    "name",
    "status",
    "formula",
    "smiles",
    "constitution_key",
    "compound_key",
    "message",
    "parent_key",
    "tautomer_key",
];

/// The columns of `molkin samples`: the fields of [`molkin_relate::wire::SampleRow`]. New ones go to the
/// end.
pub(crate) const SAMPLE_COLUMNS: [&str; 21] = [
    "line",
    "id",
    "plate",
    "well",
    "verdict",
    "flagged",
    "relation",
    "kind",
    "same_apart_from",
    "label_smiles",
    "received_smiles",
    "mz",
    "adduct",
    "mz_expected",
    "ppm",
    "mz_fits",
    "formula_fits",
    "hypotheses",
    "sentence",
    "remark",
    "message",
];

/// Writes a header and rows.
pub(crate) fn write_rows(
    out: &mut impl Write,
    columns: &[&str],
    rows: impl Iterator<Item = impl Serialize>,
) -> io::Result<()> {
    let mut writer = WriterBuilder::new()
        .terminator(Terminator::Any(b'\n'))
        .has_headers(false)
        .from_writer(out);
    writer.write_record(columns)?;
    for row in rows {
        writer.serialize(row)?;
    }
    writer.flush()
}

/// Writes rows, each on its own.
pub(crate) struct Table {
    writer: Writer<Line>,
}

/// The line at hand. The writer that fills it lends it out shared only.
#[derive(Default)]
struct Line(RefCell<Vec<u8>>);

impl Write for Line {
    fn write(&mut self, bytes: &[u8]) -> io::Result<usize> {
        self.0.get_mut().write(bytes)
    }

    fn flush(&mut self) -> io::Result<()> {
        Ok(())
    }
}

impl Default for Table {
    fn default() -> Self {
        let writer = WriterBuilder::new()
            .terminator(Terminator::Any(b'\n'))
            // The header is written even if no row follows.
            .has_headers(false)
            .from_writer(Line::default());
        Self { writer }
    }
}

impl Table {
    /// The header.
    pub(crate) fn header(&mut self) -> io::Result<Vec<u8>> {
        self.writer.write_record(COLUMNS)?;
        self.line()
    }

    /// A row.
    pub(crate) fn row(&mut self, row: &KeyRow) -> io::Result<Vec<u8>> {
        self.writer.serialize(row)?;
        self.line()
    }

    fn line(&mut self) -> io::Result<Vec<u8>> {
        self.writer.flush()?;
        Ok(self.writer.get_ref().0.take())
    }
}
