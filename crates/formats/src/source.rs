//! Sources: files and streams of any format this crate reads, as one sequence of records.
//!
//! ```text
//! .smi .smiles     one SMILES a line           .mol          one molfile
//! .sdf .sd         molfiles with data items    and .gz behind any of them (feature `gzip`)
//! ```

use std::{
    fmt,
    fs::File,
    io::{self, BufRead, BufReader},
    path::Path,
};

use thiserror::Error;

use crate::{ReadError, ReadErrorKind, Record, molfile, sdf, smiles};

/// The formats of a source.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
#[non_exhaustive]
pub enum Format {
    /// One SMILES and a name on each line.
    Smiles,
    /// One molfile.
    Molfile,
    /// Molfiles with data items, each ended by `$$$$`.
    Sdf,
}

impl Format {
    /// The format that a file name's extension means, and whether `.gz` follows it; `None` for an
    /// extension that is not known. Case does not count.
    ///
    /// # Examples
    /// ```
    /// use molkin_formats::source::Format;
    ///
    /// assert_eq!(Format::of_name("vendor/lot.SDF.gz"), Some((Format::Sdf, true)));
    /// assert_eq!(Format::of_name("CCO"), None);
    /// ```
    pub fn of_name(name: &str) -> Option<(Self, bool)> {
        let name = name.to_ascii_lowercase();
        let (stem, compressed) = match name.strip_suffix(".gz") {
            Some(stem) => (stem, true),
            None => (name.as_str(), false),
        };
        let (_, extension) = stem.rsplit_once('.')?;
        let format = match extension {
            "smi" | "smiles" => Self::Smiles,
            "mol" => Self::Molfile,
            "sdf" | "sd" => Self::Sdf,
            _ => return None,
        };
        Some((format, compressed))
    }

    /// The format that the start of a text looks like: SDF where its fourth line names a molfile
    /// version, or else SMILES. For sources without a name that tells.
    pub fn guess(start: &[u8]) -> Self {
        let counts = molfile::Block::new(start, 1).lines().nth(3);
        let version = counts.map(|line| line.field(34, 6).text());
        match version {
            Some(b"V2000" | b"V3000") => Self::Sdf,
            _ => Self::Smiles,
        }
    }
}

/// How records are read, by format.
#[derive(Debug, Clone, Copy, Default)]
pub struct ReadOptions {
    /// For SMILES.
    pub smiles: smiles::ReadOptions,
    /// For molfiles, those in SDF included.
    pub molfile: molfile::ReadOptions,
}

/// Why a source cannot be opened, or not be read to its end. Faults of single records are
/// [`ReadError`]s instead.
#[derive(Debug, Error)]
#[non_exhaustive]
pub enum SourceError {
    /// The name has no known extension.
    #[error(
        "{name}: the extension is not known; .smi, .smiles, .mol, .sdf and .sd are, each also with .gz"
    )]
    UnknownFormat {
        /// The name of the source.
        name: String,
    },
    /// Tables are not read yet.
    #[error("{name}: .csv and .tsv files are not read yet")]
    TableFormat {
        /// The name of the source.
        name: String,
    },
    /// The file is compressed and this build reads no compressed files.
    #[error("{name}: this build cannot read .gz files (it lacks the feature \"gzip\")")]
    NoGzip {
        /// The name of the source.
        name: String,
    },
    /// The file cannot be opened.
    #[error("{name}: {error}")]
    Open {
        /// The name of the source.
        name: String,
        /// What the system says.
        #[source]
        error: io::Error,
    },
    /// Reading failed midway; records before this one are good.
    #[error("{name}, line {line}: {message}")]
    Read {
        /// The name of the source.
        name: String,
        /// The line that could not be read, from 1.
        line: u32,
        /// The class of the failure.
        kind: io::ErrorKind,
        /// What the system says.
        message: Box<str>,
    },
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
}

type Source<'s> = Box<dyn BufRead + Send + 's>;

enum Reader<'s> {
    Smiles(Box<smiles::Records<Source<'s>>>),
    /// SDF, or a molfile, which is SDF of one record.
    Sdf(sdf::Records<Source<'s>>),
}

impl<'s> Records<'s> {
    /// The records of a stream in a given format. `name` is for errors.
    pub fn new(
        name: impl Into<String>,
        source: impl BufRead + Send + 's,
        format: Format,
        options: ReadOptions,
    ) -> Self {
        let source: Source<'s> = Box::new(source);
        let reader = match format {
            Format::Smiles => {
                Reader::Smiles(Box::new(smiles::Records::new(source, options.smiles)))
            }
            Format::Molfile => Reader::Sdf(sdf::Records::of_molfile(source, options.molfile)),
            Format::Sdf => Reader::Sdf(sdf::Records::new(source, options.molfile)),
        };
        Self {
            name: name.into(),
            index: 0,
            reader,
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
}

impl Records<'static> {
    /// Opens a file in the format that its extension means.
    ///
    /// # Errors
    /// [`SourceError::UnknownFormat`], [`SourceError::TableFormat`], [`SourceError::NoGzip`],
    /// [`SourceError::Open`].
    pub fn open(path: &Path, options: ReadOptions) -> Result<Self, SourceError> {
        let name = path.display().to_string();
        let Some((format, compressed)) = Format::of_name(&name) else {
            return Err(if is_table(&name) {
                SourceError::TableFormat { name }
            } else {
                SourceError::UnknownFormat { name }
            });
        };
        if compressed && !cfg!(feature = "gzip") {
            return Err(SourceError::NoGzip { name });
        }
        match File::open(path) {
            Ok(file) => Ok(Self::new(
                name,
                decompress(file, compressed),
                format,
                options,
            )),
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
        if Format::of_name(&name).is_some() || is_table(&name) {
            return Self::open(path, options);
        }
        match File::open(path) {
            Ok(file) => Self::guess(name, BufReader::new(file), options),
            Err(error) => Err(SourceError::Open { name, error }),
        }
    }
}

fn is_table(name: &str) -> bool {
    let name = name.to_ascii_lowercase();
    let stem = name.strip_suffix(".gz").unwrap_or(&name);
    stem.ends_with(".csv") || stem.ends_with(".tsv")
}

#[cfg(feature = "gzip")]
fn decompress(file: File, compressed: bool) -> Source<'static> {
    if compressed {
        // A .gz file may be several streams in a row.
        Box::new(BufReader::new(flate2::bufread::MultiGzDecoder::new(
            BufReader::new(file),
        )))
    } else {
        Box::new(BufReader::new(file))
    }
}

#[cfg(not(feature = "gzip"))]
fn decompress(file: File, _compressed: bool) -> Source<'static> {
    Box::new(BufReader::new(file))
}

impl Iterator for Records<'_> {
    type Item = Result<RecordOutcome, SourceError>;

    fn next(&mut self) -> Option<Self::Item> {
        let (result, title) = match &mut self.reader {
            Reader::Smiles(records) => (records.next()?, records.title()),
            Reader::Sdf(records) => (records.next()?, records.title()),
        };
        if let Err(error) = &result
            && let ReadErrorKind::Io { kind, message } = error.kind()
        {
            let (name, line) = (self.name.clone(), error.span().line);
            let (kind, message) = (*kind, message.clone());
            return Some(Err(SourceError::Read {
                name,
                line,
                kind,
                message,
            }));
        }
        self.index += 1;
        Some(Ok(RecordOutcome {
            index: self.index,
            name: title,
            result,
        }))
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
