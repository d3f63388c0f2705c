//! Molfiles: one drawn structure as a table of atoms and bonds (CTfile formats).
//!
//! ```text
//! line 1      name                         may be blank, but must be there
//! line 2, 3   program, comment             say nothing about the structure
//! line 4      counts line                  aaabbb…V2000
//! atom lines  x y z, symbol, charge, …     columns 1-10, 11-20, 21-30, 32-34, …
//! bond lines  atom, atom, type, stereo     columns 1-3, 4-6, 7-9, 10-12
//! M  CHG …    charges, radicals, isotopes
//! M  END
//! ```
//! This is version 2000. Version 3000 has the same header with `V3000` on the counts line, and then
//! words instead of columns. What the reader decides where the format leaves it open is listed in
//! `docs/formats.md`.

mod aromatic;
mod block;
mod bond_type;
mod drawing;
mod field;
mod group_type;
mod header;
mod lower;
mod neighbours;
mod placeholder;
mod site;
mod stereo;
mod symbol;
mod v2000;
mod v3000;
mod valence;

pub use valence::ValenceTable;

use block::Fault;
pub(crate) use block::{Block, Line, Lines};
pub(crate) use field::decode;
use header::Version;
pub(crate) use header::states_version;
use molkin_graph::Limits;

use crate::{Note, ReadError, ReadErrorKind, Record, Span};

/// How molfiles are read.
///
/// # Examples
/// ```
/// use molkin_formats::molfile::{ReadOptions, ValenceTable};
///
/// let options = ReadOptions { valences: ValenceTable::Late, ..ReadOptions::default() };
/// assert_eq!(options.limits.atoms, molkin_graph::Limits::default().atoms);
/// ```
#[derive(Debug, Clone, Copy, Default)]
pub struct ReadOptions {
    /// The table from which hydrogens follow that the file does not write.
    pub valences: ValenceTable,
    /// How marks are meant where the chiral flag is not set.
    pub flag_zero: FlagZero,
    /// Bounds on the record.
    pub limits: Limits,
}

/// How the marks of a record are meant whose chiral flag is not set and that has no stereo
/// collections.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Default)]
#[non_exhaustive]
pub enum FlagZero {
    /// As drawn, with a note: most writers leave the flag unset on drawings that are meant so.
    #[default]
    Absolute,
    /// As a mixture of the drawn arrangement and its mirror image: all tetrahedral centres and axes
    /// of the record are one AND group.
    Mixture,
    /// As one arrangement, its mirror image, or both: all tetrahedral centres and axes of the record
    /// are one group of relative configuration.
    Relative,
}

/// Reads one molfile with the default [`ReadOptions`].
///
/// # Returns
/// The record: the name from the first line, and a molecule whose atoms are numbered as the atom
/// lines are. It has no properties; those belong to SDF.
///
/// # Errors
/// A [`ReadError`] at the first line and column that cannot be read, counted from 1. Queries, R
/// groups and polymers are refused by name, since they stand for no one structure.
///
/// # Complexity
/// Linear in the length of the text, save for aromatic bonds (maximum matching).
///
/// # Examples
/// ```
/// let text = "water\n\n\n  1  0  0  0  0  0            999 V2000
///     0.0000    0.0000    0.0000 O   0  0
/// M  END
/// ";
/// let record = molkin_formats::molfile::parse(text.as_bytes())?;
/// assert_eq!(record.name, "water");
/// assert_eq!(record.molecule.formula().to_string(), "H2O");
/// # Ok::<(), molkin_formats::ReadError>(())
/// ```
pub fn parse(text: &[u8]) -> Result<Record, ReadError> {
    parse_with(text, &ReadOptions::default())
}

/// Reads one molfile. Text after `M  END` is left out with a note.
///
/// # Errors
/// As [`parse`], and what exceeds [`ReadOptions::limits`].
pub fn parse_with(text: &[u8], options: &ReadOptions) -> Result<Record, ReadError> {
    let block = Block::new(strip_signature(text), 1);
    check_lines(&block, text.len(), options.limits.line_bytes)
        .map_err(|fault| block.error(fault))?;
    let mut lines = block.lines();
    let mut record = read(&mut lines, options, text.len()).map_err(|fault| block.error(fault))?;
    if let Some(line) = lines.find(|line| !line.is_blank()) {
        record.notes.push(Note {
            code: "text-after-end",
            atoms: Vec::new(),
            span: Some(line.span()),
            text: "text after the end of the molfile is not read".to_owned(),
        });
    }
    Ok(record)
}

/// Reads a molfile of `length` bytes from its lines and leaves those after `M  END`.
pub(crate) fn read(
    lines: &mut Lines<'_>,
    options: &ReadOptions,
    length: usize,
) -> Result<Record, Fault> {
    let start = lines.place();
    let limit = options.limits.record_bytes;
    if length > limit {
        return Err(Fault::new(ReadErrorKind::RecordTooLong { limit }, start));
    }
    let header = header::read(lines)?;
    let mut drawing = match header.version {
        Version::V3000 => v3000::read(lines, &options.limits)?,
        Version::V2000 | Version::Unstated => {
            v2000::read(lines, header.counts, header.version, &options.limits)?
        }
    };
    let molecule = lower::molecule(&mut drawing, options)?;
    if molecule.atom_count() == 0 {
        drawing.notes.push(Note {
            code: "no-atoms",
            atoms: Vec::new(),
            span: Some(header.counts.field(1, 3).span()),
            text: "the record has no atoms".to_owned(),
        });
    }
    Ok(Record {
        name: header.name,
        molecule,
        notes: drawing.notes,
        properties: Vec::new(),
    })
}

/// Refuses a line of more bytes than `limit`. Sources check their lines as they come; of a text in
/// memory, only one that is longer than the limit is looked at.
fn check_lines(block: &Block<'_>, length: usize, limit: usize) -> Result<(), Fault> {
    if length <= limit {
        return Ok(());
    }
    match block.lines().find(|line| line.text.len() > limit) {
        None => Ok(()),
        Some(line) => {
            let place = Span::at_offset(line.number, limit, 0);
            Err(Fault::new(ReadErrorKind::LineTooLong { limit }, place))
        }
    }
}

/// Takes off the signature that some editors put in front of UTF-8.
fn strip_signature(text: &[u8]) -> &[u8] {
    text.strip_prefix(b"\xEF\xBB\xBF").unwrap_or(text)
}

#[cfg(test)]
mod tests;
