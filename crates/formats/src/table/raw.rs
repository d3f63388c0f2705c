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
    pub(super) raw: RawText,
    pub(super) row: Row,
    header: Arc<Header>,
}

impl RawRow {
    /// Room for the rows below a header.
    pub(super) fn new(header: Arc<Header>) -> Self {
        Self {
            header,
            ..Self::default()
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

    /// The name in the row, empty where there is none, and the record.
    pub(crate) fn parse(
        &mut self,
        reader: &mut smiles::Reader,
        molfile: &molfile::ReadOptions,
    ) -> (String, Result<Record, ReadError>) {
        if let Some(fault) = self.raw.fault.take() {
            return (String::new(), Err(fault));
        }
        let named = self.header.name.and_then(|column| self.row.field(column));
        let title = named.map_or_else(String::new, |(_, name)| decode(name.trim_ascii()));
        let outcome = self
            .check_count()
            .and_then(|()| self.structure(reader, molfile));
        match outcome {
            Err(error) => (title, Err(error)),
            Ok(mut record) => {
                if self.header.name.is_some() {
                    record.name.clone_from(&title);
                }
                record.properties = self.properties();
                (record.name.clone(), Ok(record))
            }
        }
    }

    fn properties(&self) -> Vec<(String, String)> {
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
        reader: &mut smiles::Reader,
        options: &molfile::ReadOptions,
    ) -> Result<Record, ReadError> {
        let Some((field, value)) = self.row.field(self.header.structure) else {
            return Ok(Record::default());
        };
        // Blank lines in front belong to a molfile.
        let (text, outcome) = if is_molfile(value) {
            (value, molfile::parse_with(value, options))
        } else {
            let text = value.trim_ascii_start();
            (text, reader.read(text.trim_ascii_end(), 1))
        };
        let blanks = value.len() - text.len();
        let moved = |span: Span| field.place(span, blanks);
        match outcome {
            Ok(mut record) => {
                for note in &mut record.notes {
                    note.span = note.span.map(moved);
                }
                Ok(record)
            }
            Err(error) => {
                let line_at = |line| super::row::line_at(&self.raw.text, field, line);
                Err(error.moved(moved, line_at))
            }
        }
    }

    /// The line on which a field begins.
    fn line_of(&self, field: &Field) -> &[u8] {
        super::row::line_at(&self.raw.text, field, field.line)
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
