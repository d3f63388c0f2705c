//! Tables: rows of delimited fields, one of which holds a structure: a SMILES or a molfile.
//!
//! ```text
//! table  := header row*                      row := field { delimiter field } line-end
//! field  := plain | '"' { any | '""' } '"'   a quoted field may hold delimiters and line ends
//! ```
//! The first row names the columns. Which of them holds the structure and which the name is found
//! by [`Columns`]; the others become [`crate::Record::properties`].

#[cfg(feature = "table")]
mod header;
#[cfg(feature = "table")]
mod raw;
#[cfg(feature = "table")]
mod records;
#[cfg(feature = "table")]
mod row;
#[cfg(feature = "table")]
mod rows;
#[cfg(feature = "table")]
mod sheet;

use thiserror::Error;

use crate::{ReadError, molfile, smiles};

#[cfg(feature = "table")]
pub use {
    raw::parse_field,
    records::Records,
    sheet::{Sheet, SheetRow},
};

#[cfg(feature = "table")]
pub(crate) use {header::is_header, raw::RawRow};

/// Which columns of a table are read as what.
///
/// A column that is asked for must be there: as it is written, or else whatever its case. Where none
/// is asked for, the first of a list of usual titles is taken that the table has, whatever its case
/// and with blanks, `-` and `_` left out: for structures *isomeric SMILES, SMILES, canonical SMILES,
/// smi, molfile, molblock, structure,
/// molecule, mol, compound structure*, for names *name, title, compound name, ID,
/// identifier, compound ID, code, compound, sample, sample ID, molecule name, catalog number, number*.
/// A table may lack names, but no structures.
#[derive(Debug, Clone, Default, PartialEq, Eq)]
pub struct Columns {
    /// The title of the column with the structures.
    pub structure: Option<String>,
    /// The title of the column with the names.
    pub name: Option<String>,
}

/// What separates the fields.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Delimiter {
    /// This byte.
    Byte(u8),
    /// Whichever of comma, semicolon, tab and `|` is most frequent in the first line outside quotes;
    /// of several the first in this order, and a comma where there is none.
    Detected,
}

/// How tables are read.
#[derive(Debug, Clone, Default)]
pub struct ReadOptions {
    /// How the SMILES are read, and the bounds on rows.
    pub smiles: smiles::ReadOptions,
    /// How the molfiles are read.
    pub molfile: molfile::ReadOptions,
    /// Which columns are read.
    pub columns: Columns,
}

/// Why the header of a table leaves its rows without a meaning.
#[derive(Debug, Clone, PartialEq, Eq, Error)]
#[non_exhaustive]
pub enum HeaderError {
    /// Not even a header.
    #[error("the table is empty; its first line should name the columns")]
    Empty,
    /// The header cannot be read.
    #[error("the header: {0}")]
    Unreadable(#[from] ReadError),
    /// More columns than are read.
    #[error("the table has more than {limit} columns")]
    TooManyColumns {
        /// The limit.
        limit: usize,
    },
    /// No title says that structures stand below.
    #[error(
        "no column is known to hold structures; there are: {}",
        listed(columns)
    )]
    NoStructures {
        /// The titles.
        columns: Vec<String>,
    },
    /// The column that was asked for is not there.
    #[error("there is no column {wanted:?}; there are: {}", listed(columns))]
    NoSuchColumn {
        /// The title asked for.
        wanted: String,
        /// The titles.
        columns: Vec<String>,
    },
}

/// Titles in quotes, a long list cut short.
fn listed(columns: &[String]) -> String {
    const SHOWN: usize = 20;
    const LONGEST: usize = 40;
    let shorten = |title: &String| match title.char_indices().nth(LONGEST) {
        Some((end, _)) => format!("{:?}...", &title[..end]),
        None => format!("{title:?}"),
    };
    let mut list: Vec<String> = columns.iter().take(SHOWN).map(shorten).collect();
    if columns.len() > SHOWN {
        list.push(format!("and {} more", columns.len() - SHOWN));
    }
    list.join(", ")
}

#[cfg(test)]
mod tests;
