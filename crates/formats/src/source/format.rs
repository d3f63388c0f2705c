//! Formats, and how they are told apart.

use crate::molfile;
#[cfg(feature = "table")]
use crate::table;

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
    /// A table whose first line names the columns, separated by what is most frequent there.
    Csv,
    /// The same, separated by tabs.
    Tsv,
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
            "csv" => Self::Csv,
            "tsv" => Self::Tsv,
            _ => return None,
        };
        Some((format, compressed))
    }

    /// The format that the start of a text looks like: SDF where its fourth line names a molfile
    /// version; a table where its first line has several columns, one of them with a title that
    /// [`crate::table::Columns`] knows for structures (feature `table`); or else SMILES. For sources without a name
    /// that tells.
    pub fn guess(start: &[u8]) -> Self {
        let start = start.strip_prefix(b"\xEF\xBB\xBF").unwrap_or(start);
        let counts = molfile::Block::new(start, 1).lines().nth(3);
        if counts.is_some_and(molfile::states_version) {
            Self::Sdf
        } else if is_table(start) {
            Self::Csv
        } else {
            Self::Smiles
        }
    }
}

/// Whether the first line is the header of a table.
#[cfg(feature = "table")]
fn is_table(text: &[u8]) -> bool {
    let end = text.iter().position(|byte| matches!(byte, b'\n' | b'\r'));
    table::is_header(&text[..end.unwrap_or(text.len())])
}

#[cfg(not(feature = "table"))]
fn is_table(_: &[u8]) -> bool {
    false
}
