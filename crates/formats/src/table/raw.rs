//! One row, cut out of its table and not parsed yet.

use std::sync::Arc;

use super::{
    header::Header,
    row::{Field, Row},
};
use crate::{
    ReadError, ReadErrorKind, Record, Span,
    molfile::{self, Block, decode},
    raw::RawText,
    smiles,
};

/// The lines of a row and where its fields stand in them.
#[derive(Debug, Default)]
pub(crate) struct RawRow {
    pub(crate) raw: RawText,
    pub(super) row: Row,
    header: Arc<Header>,
}

impl RawRow {
    /// Room for a row, in that of a text.
    pub(crate) fn in_place_of(raw: RawText) -> Self {
        Self {
            raw,
            ..Self::default()
        }
    }

    /// Makes this a row below a header.
    pub(super) fn put_below(&mut self, header: &Arc<Header>) {
        // Threads that share a header wait for each other to count it.
        if !Arc::ptr_eq(&self.header, header) {
            self.header = Arc::clone(header);
        }
    }

    /// Why there is no row.
    pub(super) fn refuse(&mut self, fault: ReadError) {
        self.raw.begin(fault.span().line);
        self.row.clear();
        self.raw.fault = Some(fault);
    }

    /// Bytes of text.
    pub(crate) fn len(&self) -> usize {
        self.raw.text.len()
    }

    /// The value of the structure column, and whether it is a molfile; otherwise it is a SMILES.
    pub(crate) fn structure_text(&self) -> (bool, &[u8]) {
        let field = self.row.field(self.header.structure);
        let value = field.map_or(&b""[..], |(_, value)| value);
        match is_molfile(value) {
            true => (true, value),
            false => (false, value.trim_ascii()),
        }
    }

    /// Reads the name in the row, none where there is none, and the record, in place of one that is done
    /// with; its properties are left out.
    pub(crate) fn parse(
        &mut self,
        readers: (&mut smiles::Reader, &molfile::ReadOptions),
        name: &mut String,
        outcome: &mut Result<Record, ReadError>,
    ) {
        name.clear();
        if let Some(fault) = self.raw.fault.take() {
            *outcome = Err(fault);
            return;
        }
        let named = self.header.name.and_then(|column| self.row.field(column));
        if let Some((_, text)) = named {
            name.push_str(&decode(text.trim_ascii()));
        }
        if outcome.is_err() {
            *outcome = Ok(Record::default());
        }
        let Ok(record) = outcome else { return };
        let read = self
            .check_count()
            .and_then(|()| self.structure(readers, record));
        if let Err(error) = read {
            *outcome = Err(error);
            return;
        }
        if named.is_some() {
            record.name.clone_from(name);
        } else {
            name.clone_from(&record.name);
        }
    }

    /// The fields that are neither structure nor name, with their titles.
    pub(crate) fn properties(&self) -> Vec<(String, String)> {
        let Header {
            titles,
            structure,
            name,
        } = &*self.header;
        let fields = self.row.fields().zip(titles).enumerate();
        fields
            .filter(|(column, _)| column != structure && Some(*column) != *name)
            .map(|(_, ((_, value), title))| (title.clone(), decode(value)))
            .collect()
    }

    fn check_count(&self) -> Result<(), ReadError> {
        let (found, expected) = (self.row.count, self.header.titles.len());
        if found == expected {
            return Ok(());
        }
        let kind = ReadErrorKind::FieldCount { found, expected };
        // At the first field too many, or behind the last one.
        let place = expected.min(found.saturating_sub(1));
        let Some((field, _)) = self.row.field(place) else {
            let span = Span::new(self.raw.first_line, 1, 0);
            return Err(ReadError::new(kind, span, b""));
        };
        let mut span = field.span();
        if found < expected {
            span.column = span.column.saturating_add(span.width);
            span.width = 0;
        }
        Err(ReadError::new(kind, span, self.line_of(field)))
    }

    fn structure(
        &self,
        (reader, options): (&mut smiles::Reader, &molfile::ReadOptions),
        record: &mut Record,
    ) -> Result<(), ReadError> {
        let Some((field, value)) = self.row.field(self.header.structure) else {
            *record = Record::default();
            return Ok(());
        };
        let (blanks, outcome) = parse_value(value, reader, options, record);
        let moved = |span: Span| field.place(span, blanks);
        for note in &mut record.notes {
            note.span = note.span.map(moved);
        }
        outcome.map_err(|error| {
            let line_at = |line| super::row::line_at(&self.raw.text, field, line);
            error.moved(moved, line_at)
        })
    }

    /// The line on which a field begins.
    fn line_of(&self, field: &Field) -> &[u8] {
        super::row::line_at(&self.raw.text, field, field.line)
    }
}

/// Reads the value of a field, a molfile or a SMILES, and tells how many blanks stand before it.
fn parse_value(
    value: &[u8],
    reader: &mut smiles::Reader,
    options: &molfile::ReadOptions,
    record: &mut Record,
) -> (usize, Result<(), ReadError>) {
    // Blank lines in front belong to a molfile.
    if is_molfile(value) {
        let read = molfile::parse_with(value, options);
        return (0, read.map(|read| *record = read));
    }
    let text = value.trim_ascii_start();
    let outcome = reader.read_into(text.trim_ascii_end(), 1, record);
    (value.len() - text.len(), outcome)
}

/// Reads a structure from a field of a [`super::Sheet`]: a molfile or a SMILES. `line` is that of the
/// field; columns count within it.
///
/// # Errors
/// [`ReadError`] if it is neither.
pub fn parse_field(
    value: &str,
    line: u32,
    reader: &mut smiles::Reader,
    options: &molfile::ReadOptions,
) -> Result<Record, ReadError> {
    let mut record = Record::default();
    let (blanks, outcome) = parse_value(value.as_bytes(), reader, options, &mut record);
    let moved = |span: Span| Span {
        line: span.line.saturating_add(line.saturating_sub(1)),
        column: match span.line {
            1 => span.column.saturating_add(blanks as u32),
            _ => span.column,
        },
        ..span
    };
    let line_at = |wanted: u32| {
        let ahead = wanted.saturating_sub(line) as usize;
        let mut lines = value.as_bytes().split(|&byte| byte == b'\n');
        lines.nth(ahead).unwrap_or_default()
    };
    match outcome {
        Ok(()) => Ok(record),
        Err(error) => Err(error.moved(moved, line_at)),
    }
}

/// Whether a value of several lines is a molfile: one of its first lines states a version, or it
/// has an end. Not just the fourth line, so that one whose first line is lost is an error with that
/// reason.
fn is_molfile(value: &[u8]) -> bool {
    let lines = || Block::new(value, 1).lines();
    value.contains(&b'\n')
        && (lines().take(4).any(molfile::states_version) || lines().any(|line| line.is_end()))
}
