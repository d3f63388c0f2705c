//! Sources: files and streams of any format this crate reads, as one sequence of records.
//!
//! ```text
//! .smi .smiles     one SMILES a line           .mol          one molfile
//! .sdf .sd         molfiles with data items    .csv .tsv     tables with a column of structures (feature `table`)
//! ```
//! and `.gz` behind any of them (feature `gzip`).

mod counted;
mod error;
mod format;
mod kept;
mod parser;
mod raw;

use std::{
    fmt,
    fs::File,
    io::{BufRead, BufReader},
    path::Path,
};

#[cfg(feature = "table")]
use crate::table;
use crate::{
    ReadError, Record, molfile, sdf, smiles,
    table::{Columns, Delimiter},
};

use counted::{Counted, Taken};
use raw::Cut;

pub use self::{error::SourceError, format::Format, parser::Parser, raw::RawRecord};

/// How records are read, by format.
#[derive(Debug, Clone, Default)]
pub struct ReadOptions {
    /// For SMILES, those in tables included, and the bounds on the rows of tables.
    pub smiles: smiles::ReadOptions,
    /// For molfiles, those in SDF and in tables included.
    pub molfile: molfile::ReadOptions,
    /// For tables.
    pub columns: Columns,
    /// Leaves the [`Record::properties`] empty, which saves time where nothing is made of data items and
    /// other columns. Notes on them are made all the same.
    pub without_properties: bool,
}

/// What became of one record.
#[derive(Debug)]
pub struct RecordOutcome {
    /// The place of the record in its source, from 1. Records that fail count.
    pub index: u64,
    /// The name or title, given also where the record could not be read; empty if there is none.
    pub name: String,
    /// The record, or why there is none.
    pub result: Result<Record, ReadError>,
}

impl Default for RecordOutcome {
    /// Storage for [`Parser::parse_into`].
    fn default() -> Self {
        Self {
            index: 0,
            name: String::new(),
            result: Ok(Record::default()),
        }
    }
}

/// The records of a source in their order, whatever its format.
///
/// Every record gives one [`RecordOutcome`]; one that fails does not end the sequence. An error of
/// the source itself does, after one [`SourceError::Read`]. One record is in memory at a time.
///
/// # Examples
/// ```
/// use molkin_formats::source::{Format, ReadOptions, Records};
///
/// let text = "CCO ethanol\nC1CC broken\n";
/// let records = Records::new("stdin", text.as_bytes(), Format::Smiles, ReadOptions::default());
/// let outcomes: Vec<_> = records.collect::<Result<_, _>>()?;
/// assert_eq!((outcomes[0].index, outcomes[0].name.as_str()), (1, "ethanol"));
/// assert_eq!((outcomes[1].index, outcomes[1].name.as_str()), (2, "broken"));
/// assert!(outcomes[1].result.is_err());
/// # Ok::<(), molkin_formats::source::SourceError>(())
/// ```
pub struct Records<'s> {
    name: String,
    index: u64,
    reader: Reader<'s>,
    parser: Parser,
    /// Bytes taken from the file, where it is one.
    taken: Taken,
}

type Source<'s> = Box<dyn BufRead + Send + 's>;

enum Reader<'s> {
    Smiles(Box<smiles::Records<Source<'s>>>),
    /// SDF, or a molfile, which is SDF of one record.
    Sdf(sdf::Records<Source<'s>>),
    #[cfg(feature = "table")]
    Table(Box<table::Records<Source<'s>>>),
    /// There are no records, and this is why, until it has been said.
    Refused(Option<SourceError>),
}

impl<'s> Reader<'s> {
    #[cfg(feature = "table")]
    fn table(name: &str, source: Source<'s>, delimiter: Delimiter, options: ReadOptions) -> Self {
        let options = table::ReadOptions {
            smiles: options.smiles,
            molfile: options.molfile,
            columns: options.columns,
        };
        match table::Records::new(source, delimiter, &options) {
            Ok(records) => Self::Table(Box::new(records)),
            Err(error) => Self::Refused(Some(SourceError::of_header(name, error))),
        }
    }

    #[cfg(not(feature = "table"))]
    fn table(name: &str, _: Source<'s>, _: Delimiter, _: ReadOptions) -> Self {
        let name = name.to_owned();
        Self::Refused(Some(SourceError::NoTables { name }))
    }
}

impl<'s> Records<'s> {
    /// The records of a stream in a given format. `name` is for errors. Of a table, the header is
    /// read here; what is wrong with it is told in place of the first record.
    pub fn new(
        name: impl Into<String>,
        source: impl BufRead + Send + 's,
        format: Format,
        options: ReadOptions,
    ) -> Self {
        let name = name.into();
        let source: Source<'s> = Box::new(source);
        let parser = Parser::new(&options);
        let reader = match format {
            Format::Smiles => {
                Reader::Smiles(Box::new(smiles::Records::new(source, options.smiles)))
            }
            Format::Molfile => Reader::Sdf(sdf::Records::of_molfile(source, options.molfile)),
            Format::Sdf => Reader::Sdf(sdf::Records::new(source, options.molfile)),
            Format::Csv => Reader::table(&name, source, Delimiter::Detected, options),
            Format::Tsv => Reader::table(&name, source, Delimiter::Byte(b'\t'), options),
        };
        Self {
            name,
            index: 0,
            reader,
            parser,
            taken: Taken::default(),
        }
    }

    /// The records of a stream whose format is guessed from the bytes that come first
    /// ([`Format::guess`]).
    ///
    /// # Errors
    /// [`SourceError::Read`] if nothing can be read.
    pub fn guess(
        name: impl Into<String>,
        mut source: impl BufRead + Send + 's,
        options: ReadOptions,
    ) -> Result<Self, SourceError> {
        let name = name.into();
        let format = match source.fill_buf() {
            Ok(start) => Format::guess(start),
            Err(error) => {
                let (kind, message) = (error.kind(), error.to_string().into());
                return Err(SourceError::Read {
                    name,
                    line: 1,
                    kind,
                    message,
                });
            }
        };
        Ok(Self::new(name, source, format, options))
    }

    /// The name given to the source.
    pub fn name(&self) -> &str {
        &self.name
    }

    /// How many bytes of the file have been taken, those of a compressed file as they stand in it; 0
    /// where the source was not opened here. Somewhat ahead of the records.
    pub fn bytes_taken(&self) -> u64 {
        self.taken.bytes()
    }

    /// Cuts the next record out of the source without parsing it, which any [`Parser`] with the same
    /// options can do later, on another thread too. The iterator does both.
    ///
    /// # Examples
    /// ```
    /// use molkin_formats::source::{Format, Parser, ReadOptions, Records};
    ///
    /// let options = ReadOptions::default();
    /// let mut records = Records::new("stdin", &b"CCO\nO\n"[..], Format::Smiles, options.clone());
    /// let first = records.cut().ok_or("a record")??;
    /// let second = records.cut().ok_or("a record")??;
    /// let mut parser = Parser::new(&options);
    /// assert_eq!(parser.parse(second).result?.molecule.atom_count(), 1);
    /// assert_eq!(parser.parse(first).result?.molecule.atom_count(), 3);
    /// # Ok::<(), Box<dyn std::error::Error>>(())
    /// ```
    pub fn cut(&mut self) -> Option<Result<RawRecord, SourceError>> {
        let mut record = RawRecord::default();
        match self.cut_into(&mut record) {
            Ok(true) => Some(Ok(record)),
            Ok(false) => None,
            Err(error) => Some(Err(error)),
        }
    }

    /// As [`Records::cut`], in place of a record that has been parsed, whose storage is reused; false
    /// where there is no other.
    ///
    /// # Errors
    /// [`SourceError::Read`], after which there is no other record.
    pub fn cut_into(&mut self, record: &mut RawRecord) -> Result<bool, SourceError> {
        let cut = std::mem::take(&mut record.cut);
        let found = match &mut self.reader {
            Reader::Smiles(records) => {
                let mut text = cut.into_text();
                let found = records.cut(&mut text);
                record.cut = Cut::Smiles(text);
                found
            }
            Reader::Sdf(records) => {
                let mut text = cut.into_text();
                let found = records.cut(&mut text);
                record.cut = Cut::Molfile(text);
                found
            }
            #[cfg(feature = "table")]
            Reader::Table(records) => {
                let mut row = cut.into_row();
                let found = records.cut(&mut row);
                record.cut = Cut::Row(row);
                found
            }
            Reader::Refused(error) => return error.take().map_or(Ok(false), Err),
        };
        let found = match found {
            Ok(found) => found,
            Err(error) => {
                return SourceError::of_record(&self.name, &error).map_or(Ok(false), Err);
            }
        };
        self.index += u64::from(found);
        record.index = self.index;
        Ok(found)
    }
}

impl Records<'static> {
    /// Opens a file in the format that its extension means.
    ///
    /// # Errors
    /// [`SourceError::UnknownFormat`], [`SourceError::NoTables`], [`SourceError::NoGzip`],
    /// [`SourceError::Open`].
    pub fn open(path: &Path, options: ReadOptions) -> Result<Self, SourceError> {
        let name = path.display().to_string();
        let Some((format, compressed)) = Format::of_name(&name) else {
            return Err(SourceError::UnknownFormat { name });
        };
        if matches!(format, Format::Csv | Format::Tsv) && !cfg!(feature = "table") {
            return Err(SourceError::NoTables { name });
        }
        if compressed && !cfg!(feature = "gzip") {
            return Err(SourceError::NoGzip { name });
        }
        match File::open(path) {
            Ok(file) => {
                let (file, taken) = Counted::new(file);
                let source = decompress(file, compressed);
                let records = Self::new(name, source, format, options);
                Ok(Self { taken, ..records })
            }
            Err(error) => Err(SourceError::Open { name, error }),
        }
    }

    /// Opens a file whose name does not tell its format, which is guessed from its start
    /// ([`Format::guess`]); where the extension is known, it decides.
    ///
    /// # Errors
    /// As [`Records::open`], [`SourceError::UnknownFormat`] aside, and [`SourceError::Read`].
    pub fn open_any(path: &Path, options: ReadOptions) -> Result<Self, SourceError> {
        let name = path.display().to_string();
        if Format::of_name(&name).is_some() {
            return Self::open(path, options);
        }
        match File::open(path) {
            Ok(file) => {
                let (file, taken) = Counted::new(file);
                let records = Self::guess(name, BufReader::new(file), options)?;
                Ok(Self { taken, ..records })
            }
            Err(error) => Err(SourceError::Open { name, error }),
        }
    }
}

/// Bytes that are read at once: fewer calls, and fewer lines in two pieces.
const BUFFER: usize = 1 << 16;

#[cfg(feature = "gzip")]
fn decompress(file: Counted<File>, compressed: bool) -> Source<'static> {
    if compressed {
        // A .gz file may be several streams in a row.
        let stream = flate2::bufread::MultiGzDecoder::new(BufReader::new(file));
        Box::new(BufReader::with_capacity(BUFFER, stream))
    } else {
        Box::new(BufReader::with_capacity(BUFFER, file))
    }
}

#[cfg(not(feature = "gzip"))]
fn decompress(file: Counted<File>, _compressed: bool) -> Source<'static> {
    Box::new(BufReader::with_capacity(BUFFER, file))
}

impl Iterator for Records<'_> {
    type Item = Result<RecordOutcome, SourceError>;

    fn next(&mut self) -> Option<Self::Item> {
        let raw = self.cut()?;
        Some(raw.map(|raw| self.parser.parse(raw)))
    }
}

impl fmt::Debug for Records<'_> {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        f.debug_struct("Records")
            .field("name", &self.name)
            .field("index", &self.index)
            .finish_non_exhaustive()
    }
}

#[cfg(test)]
mod tests;
