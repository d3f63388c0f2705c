//! The reader: one record after another with the same scratch.

use molkin_graph::Limits;
use molkin_graph::MoleculeBuilder;

use super::{
    lower,
    remarks::{Extent, Fault, Remarks},
    scan::{self, Scratch},
};
use crate::{ReadError, ReadErrorKind, Record};

/// How SMILES is read.
#[derive(Debug, Clone, Copy, Default)]
pub struct ReadOptions {
    /// Refuse what the standard does not allow and no reader can misunderstand: repeated dots, ring
    /// labels after a branch, unpaired or contradictory `/` and `\`, three and more charge signs,
    /// `[HH]`, aromatic symbols beyond the standard. By default each of these is read with a note.
    pub strict: bool,
    /// Bounds on a record.
    pub limits: Limits,
}

/// Reads SMILES records and reuses its storage from one to the next.
///
/// # Examples
/// ```
/// use molkin_formats::smiles::{ReadOptions, Reader};
///
/// let mut reader = Reader::new(ReadOptions::default());
/// let record = reader.read("OC[C@H](O)C=O D-glyceraldehyde", 1)?;
/// assert_eq!(record.name, "D-glyceraldehyde");
/// assert_eq!(record.molecule.atom_count(), 6);
/// assert_eq!(record.molecule.drawn_stereo().len(), 1);
/// # Ok::<(), molkin_formats::ReadError>(())
/// ```
#[derive(Debug, Default)]
pub struct Reader {
    options: ReadOptions,
    scratch: Scratch,
    builder: MoleculeBuilder,
}

/// Texts beyond this length are refused whatever the limits say, so that offsets and sums of bond
/// orders fit 32 bits.
const LONGEST: usize = 1 << 28;

impl Reader {
    /// A reader with these options.
    pub fn new(options: ReadOptions) -> Self {
        Self {
            options,
            ..Self::default()
        }
    }

    /// Reads one record: a SMILES, and after the first white space its name.
    ///
    /// `line` is the number of the line for errors and notes, from 1. A text without any atom gives
    /// an empty molecule and the note `no-atoms`. A name that begins with `|` is an extension which
    /// is not read; the note `extension-ignored` says so, since it may change the stereo.
    ///
    /// # Errors
    /// The first fault of the text, with its place; see [`ReadErrorKind`].
    ///
    /// # Complexity
    /// Linear in the length of the text, save for the matching in aromatic systems.
    pub fn read(&mut self, text: impl AsRef<[u8]>, line: u32) -> Result<Record, ReadError> {
        let text = text.as_ref();
        self.read_bytes(text, line).map_err(
            |Fault {
                 kind,
                 extent,
                 related,
             }| {
                let error = ReadError::new(kind, extent.on(line), text);
                match related {
                    Some(related) => error.with_related(related.on(line)),
                    None => error,
                }
            },
        )
    }

    fn read_bytes(&mut self, text: &[u8], line: u32) -> Result<Record, Fault> {
        let ReadOptions { strict, limits } = self.options;
        let limit = limits.line_bytes.min(limits.record_bytes).min(LONGEST);
        if text.len() > limit {
            return Err(Fault::new(ReadErrorKind::LineTooLong { limit }, limit, 0));
        }
        let mut remarks = Remarks::new(strict, line);
        let length = scan::scan(text, limits.atoms, &mut self.scratch, &mut remarks)?;
        let rest = text[length..].trim_ascii();
        if length == 0 && !rest.is_empty() {
            return Err(Fault::new(ReadErrorKind::NoStructure, 0, 1));
        }
        let molecule = lower::lower(&mut self.scratch.syntax, &mut self.builder, &mut remarks)?;
        if molecule.atom_count() == 0 {
            let text = "the record has no atoms";
            remarks.note("no-atoms", &[], Extent::new(0, 0), text);
        }
        if rest.starts_with(b"|") {
            let start = text.len() - text[length..].trim_ascii_start().len();
            let text = "an extension after the SMILES is not read, though it may change the stereo";
            remarks.note(
                "extension-ignored",
                &[],
                Extent::new(start, rest.len()),
                text,
            );
        }
        let name = String::from_utf8_lossy(rest).into_owned();
        Ok(Record {
            name,
            molecule,
            notes: remarks.into_notes(),
            properties: Vec::new(),
        })
    }
}
