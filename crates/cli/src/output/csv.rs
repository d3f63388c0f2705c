//! Tables as comma-separated values (RFC 4180, but lines end in LF).

use std::{
    cell::RefCell,
    io::{self, Write},
};

use csv::{Terminator, Writer, WriterBuilder};
use molkin_relate::wire::KeyRow;

/// The columns of `molkin keys`: the fields of [`KeyRow`]. New ones go to the end.
const COLUMNS: [&str; 9] = [
    "source",
    "record",
    "name",
    "status",
    "formula",
    "smiles",
    "constitution_key",
    "compound_key",
    "message",
];

/// Writes rows to an output that others write to as well.
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
    /// Writes the header.
    pub(crate) fn header(&mut self, out: &mut impl Write) -> io::Result<()> {
        self.writer.write_record(COLUMNS)?;
        self.pass_on(out)
    }

    /// Writes a row.
    pub(crate) fn row(&mut self, out: &mut impl Write, row: &KeyRow<'_>) -> io::Result<()> {
        self.writer.serialize(row)?;
        self.pass_on(out)
    }

    fn pass_on(&mut self, out: &mut impl Write) -> io::Result<()> {
        self.writer.flush()?;
        let mut line = self.writer.get_ref().0.borrow_mut();
        out.write_all(&line)?;
        line.clear();
        Ok(())
    }
}
