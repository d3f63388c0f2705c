//! One row, cut out of its table and not parsed yet.

use std::sync::Arc;

use super::{
    header::Header,
    row::{Field, Row},
};
use crate::{ReadError, ReadErrorKind, Record, Span, molfile::decode, raw::RawText, smiles};

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

    /// The name in the row, empty where there is none, and the record.
    pub(crate) fn parse(
        &mut self,
        reader: &mut smiles::Reader,
    ) -> (String, Result<Record, ReadError>) {
        if let Some(fault) = self.raw.fault.take() {
            return (String::new(), Err(fault));
        }
        let named = self.header.name.and_then(|column| self.row.field(column));
        let title = named.map_or_else(String::new, |(_, name)| decode(name.trim_ascii()));
        let outcome = self.check_count().and_then(|()| self.structure(reader));
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

    fn structure(&self, reader: &mut smiles::Reader) -> Result<Record, ReadError> {
        let Some((field, value)) = self.row.field(self.header.structure) else {
            return Ok(Record::default());
        };
        let text = value.trim_ascii_start();
        let blanks = value.len() - text.len();
        let moved = |span: Span| {
            let offset = (span.column as usize).saturating_sub(1);
            field.part(blanks + offset, span.width as usize)
        };
        match reader.read(text.trim_ascii_end(), 1) {
            Ok(mut record) => {
                for note in &mut record.notes {
                    note.span = note.span.map(moved);
                }
                Ok(record)
            }
            Err(error) => Err(error.moved(moved, self.line_of(field))),
        }
    }

    /// The line on which a field begins.
    fn line_of(&self, field: &Field) -> &[u8] {
        super::row::line_of(&self.raw.text, field)
    }
}
