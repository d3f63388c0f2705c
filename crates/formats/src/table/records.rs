//! Records: rows whose structure is read.

use std::{io::BufRead, sync::Arc};

use super::{
    Columns, Delimiter, HeaderError, ReadOptions,
    header::Header,
    raw::RawRow,
    rows::{MOST_COLUMNS, Rows},
};
use crate::{
    ReadError, Record,
    molfile::{self, decode},
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
    header: Arc<Header>,
    reader: smiles::Reader,
    molfile: molfile::ReadOptions,
    /// The row at hand.
    raw: RawRow,
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
        let header = Arc::new(Self::header(&mut rows, &options.columns)?);
        Ok(Self {
            rows,
            reader: smiles::Reader::new(options.smiles),
            molfile: options.molfile,
            raw: RawRow::default(),
            header,
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

    /// Cuts the next row out of the source; false at its end.
    ///
    /// # Errors
    /// Those of the source itself, after which nothing more is read.
    pub(crate) fn cut(&mut self, raw: &mut RawRow) -> Result<bool, ReadError> {
        raw.put_below(&self.header);
        if self.ended {
            return Ok(false);
        }
        match self.rows.read() {
            Ok(Ok(true)) => self.rows.hand_over(raw),
            Ok(Ok(false)) => {
                self.ended = true;
                return Ok(false);
            }
            Ok(Err(error)) => raw.refuse(error),
            Err(error) => {
                self.ended = true;
                let line = self.rows.line().saturating_add(1);
                return Err(ReadError::of_source(&error, line));
            }
        }
        Ok(true)
    }
}

impl<R: BufRead> Iterator for Records<R> {
    type Item = Result<Record, ReadError>;

    fn next(&mut self) -> Option<Self::Item> {
        self.title.clear();
        let mut raw = std::mem::take(&mut self.raw);
        let outcome = match self.cut(&mut raw) {
            Ok(true) => {
                let mut outcome = Ok(Record::default());
                let readers = (&mut self.reader, &self.molfile);
                raw.parse(readers, &mut self.title, &mut outcome);
                Some(outcome.map(|record| Record {
                    properties: raw.properties(),
                    ..record
                }))
            }
            Ok(false) => None,
            Err(failure) => Some(Err(failure)),
        };
        self.raw = raw;
        outcome
    }
}
