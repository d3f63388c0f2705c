//! Records: rows whose structure is read.

use std::io::BufRead;

use super::{
    Columns, Delimiter, HeaderError, ReadOptions,
    header::Header,
    rows::{MOST_COLUMNS, Rows},
};
use crate::{
    ReadError, ReadErrorKind, Record, Span,
    molfile::{self, Block, decode},
    smiles,
};

/// The records of a table, one for each row after the header.
///
/// Lines end in LF, CR LF or CR, also mixed and within quoted fields, where they become LF. Empty
/// lines are no rows. A row with more or fewer fields than the header, or with a structure that
/// cannot be read, is an error, and the rows after it are read; so are the lines after the first of
/// a row with a quote that is never closed. Text is UTF-8, or Latin-1 where a field is not valid
/// UTF-8. Memory follows the longest row, up to the limit.
///
/// # Examples
/// ```
/// use molkin_formats::table::{Delimiter, ReadOptions, Records};
///
/// let table = "ID;SMILES;price\nA 1;CCO;12\nA 2;C1CC;5\n";
/// let mut records = Records::new(table.as_bytes(), Delimiter::Detected, &ReadOptions::default())?;
/// let ethanol = records.next().ok_or("a record")??;
/// assert_eq!(ethanol.name, "A 1");
/// assert_eq!(ethanol.properties, [("price".to_owned(), "12".to_owned())]);
/// let error = records.next().ok_or("a record")?.unwrap_err();
/// assert_eq!(error.to_string(), "3:6: ring label 1 is opened and never closed");
/// assert_eq!(records.title(), "A 2");
/// assert!(records.next().is_none());
/// # Ok::<(), Box<dyn std::error::Error>>(())
/// ```
#[derive(Debug)]
pub struct Records<R> {
    pub(super) rows: Rows<R>,
    header: Header,
    reader: smiles::Reader,
    molfile: molfile::ReadOptions,
    title: String,
    ended: bool,
}

impl<R: BufRead> Records<R> {
    /// Reads the header of a table.
    ///
    /// # Errors
    /// [`HeaderError`] if there is none, or if it lacks a column that is needed.
    pub fn new(
        source: R,
        delimiter: Delimiter,
        options: &ReadOptions,
    ) -> Result<Self, HeaderError> {
        let limits = options.smiles.limits;
        let mut rows = Rows::new(source, delimiter, limits)
            .map_err(|error| ReadError::of_source(&error, 1))?;
        let header = Self::header(&mut rows, &options.columns)?;
        Ok(Self {
            rows,
            header,
            reader: smiles::Reader::new(options.smiles),
            molfile: options.molfile,
            title: String::new(),
            ended: false,
        })
    }

    fn header(rows: &mut Rows<R>, columns: &Columns) -> Result<Header, HeaderError> {
        let outcome = rows.read();
        let line = rows.line().saturating_add(1);
        let found = outcome.map_err(|error| ReadError::of_source(&error, line))??;
        if !found {
            return Err(HeaderError::Empty);
        }
        if rows.row().count > MOST_COLUMNS {
            let limit = MOST_COLUMNS;
            return Err(HeaderError::TooManyColumns { limit });
        }
        let titles = rows
            .row()
            .fields()
            .map(|(_, title)| decode(title.trim_ascii()));
        let header = Header::new(titles.collect(), columns)?;
        // One more shows where a row becomes too long.
        rows.keep(header.titles.len() + 1);
        Ok(header)
    }

    /// The name in the row read last, whether its structure could be read or not; empty where there
    /// is none.
    pub fn title(&self) -> String {
        self.title.clone()
    }

    fn parse(&mut self) -> Result<Record, ReadError> {
        let named = self
            .header
            .name
            .and_then(|column| self.rows.row().field(column));
        self.title = named.map_or_else(String::new, |(_, name)| decode(name.trim_ascii()));
        self.check_count()?;
        let mut record = self.read_structure()?;
        if self.header.name.is_some() {
            record.name.clone_from(&self.title);
        } else {
            self.title.clone_from(&record.name);
        }
        let Header {
            titles,
            structure,
            name,
        } = &self.header;
        let others = self.rows.row().fields().zip(titles).enumerate();
        record.properties = others
            .filter(|(column, _)| column != structure && Some(*column) != *name)
            .map(|(_, ((_, value), title))| (title.clone(), decode(value)))
            .collect();
        Ok(record)
    }

    fn check_count(&self) -> Result<(), ReadError> {
        let (found, expected) = (self.rows.row().count, self.header.titles.len());
        if found == expected {
            return Ok(());
        }
        let kind = ReadErrorKind::FieldCount { found, expected };
        // At the first field too many, or behind the last one.
        let place = expected.min(found.saturating_sub(1));
        let Some((field, _)) = self.rows.row().field(place) else {
            return Err(ReadError::new(kind, Span::new(self.rows.line(), 1, 0), b""));
        };
        let mut span = field.span();
        if found < expected {
            span.column = span.column.saturating_add(span.width);
            span.width = 0;
        }
        Err(ReadError::new(kind, span, self.rows.line_of(field)))
    }

    fn read_structure(&mut self) -> Result<Record, ReadError> {
        let Some((field, value)) = self.rows.row().field(self.header.structure) else {
            return Ok(Record::default());
        };
        // Blank lines in front belong to a molfile.
        let (text, outcome) = if is_molfile(value) {
            (value, molfile::parse_with(value, &self.molfile))
        } else {
            let text = value.trim_ascii_start();
            (text, self.reader.read(text.trim_ascii_end(), 1))
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
            Err(error) => Err(error.moved(moved, |line| self.rows.line_at(field, line))),
        }
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

impl<R: BufRead> Iterator for Records<R> {
    type Item = Result<Record, ReadError>;

    fn next(&mut self) -> Option<Self::Item> {
        if self.ended {
            return None;
        }
        self.title.clear();
        match self.rows.read() {
            Ok(Ok(true)) => Some(self.parse()),
            Ok(Ok(false)) => {
                self.ended = true;
                None
            }
            Ok(Err(error)) => Some(Err(error)),
            Err(error) => {
                self.ended = true;
                let line = self.rows.line().saturating_add(1);
                Some(Err(ReadError::of_source(&error, line)))
            }
        }
    }
}
