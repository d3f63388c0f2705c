//! Why there are no records, or no more.

use std::io;

use thiserror::Error;

use crate::{ReadError, ReadErrorKind, table::HeaderError};

/// Why a source cannot be opened, or not be read to its end. Faults of single records are
/// [`ReadError`]s instead.
#[derive(Debug, Error)]
#[non_exhaustive]
pub enum SourceError {
    /// The name has no known extension.
    #[error(
        "{name}: the extension is not known; .smi, .smiles, .mol, .sdf, .sd, .csv and .tsv are, each also with .gz"
    )]
    UnknownFormat {
        /// The name of the source.
        name: String,
    },
    /// The file is a table and this build reads no tables.
    #[error("{name}: this build cannot read tables (it lacks the feature \"table\")")]
    NoTables {
        /// The name of the source.
        name: String,
    },
    /// The header of a table leaves its rows without a meaning.
    #[error("{name}: {error}")]
    Header {
        /// The name of the source.
        name: String,
        /// What is wrong with it.
        #[source]
        error: HeaderError,
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

impl SourceError {
    /// The failure of the source that a record met, if it did.
    pub(super) fn of_record(name: &str, error: &ReadError) -> Option<Self> {
        match error.kind() {
            ReadErrorKind::Io { kind, message } => Some(Self::Read {
                name: name.to_owned(),
                line: error.span().line,
                kind: *kind,
                message: message.clone(),
            }),
            _ => None,
        }
    }

    /// What is wrong with the header of a table.
    #[cfg(feature = "table")]
    pub(super) fn of_header(name: &str, error: HeaderError) -> Self {
        let failure = match &error {
            HeaderError::Unreadable(error) => Self::of_record(name, error),
            _ => None,
        };
        failure.unwrap_or_else(|| Self::Header {
            name: name.to_owned(),
            error,
        })
    }
}
