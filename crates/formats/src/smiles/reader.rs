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
    /// Refuse what is read with a note by default: what the standard does not allow though no reader
    /// can misunderstand it, as repeated dots and ring labels after a branch, and what can hardly be
    /// meant, as unusual valences and marks that say nothing. Notes on what the standard expressly
    /// calls valid remain notes.
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
        let mut record = Record::default();
        self.read_into(text, line, &mut record)?;
        Ok(record)
    }

    /// As [`Reader::read`], into a record that has been worked up, whose storage is reused: no memory
    /// is asked for where none grows.
    ///
    /// # Errors
    /// As [`Reader::read`]; what the record then holds has no meaning.
    ///
    /// # Examples
    /// ```
    /// use molkin_formats::{Record, smiles::Reader};
    ///
    /// let mut reader = Reader::default();
    /// let mut record = Record::default();
    /// let mut atoms = 0;
    /// for (number, line) in (1..).zip(["CCO ethanol", "O water"]) {
    ///     reader.read_into(line, number, &mut record)?;
    ///     atoms += record.molecule.atom_count();
    /// }
    /// assert_eq!(atoms, 4);
    /// # Ok::<(), molkin_formats::ReadError>(())
    /// ```
    pub fn read_into(
        &mut self,
        text: impl AsRef<[u8]>,
        line: u32,
        record: &mut Record,
    ) -> Result<(), ReadError> {
        let text = text.as_ref();
        let outcome = self.read_bytes(text, line, record);
        outcome.map_err(|fault| {
            let error = ReadError::new(fault.kind, fault.extent.on(line), text);
            match fault.related {
                Some(related) => error.with_related(related.on(line)),
                None => error,
            }
        })
    }

    fn read_bytes(&mut self, text: &[u8], line: u32, record: &mut Record) -> Result<(), Fault> {
        let ReadOptions { strict, limits } = self.options;
        let limit = limits.line_bytes.min(limits.record_bytes).min(LONGEST);
        if text.len() > limit {
            return Err(Fault::new(ReadErrorKind::LineTooLong { limit }, limit, 0));
        }
        record.name.clear();
        record.properties.clear();
        record.notes.clear();
        let mut remarks = Remarks::new(strict, line, std::mem::take(&mut record.notes));
        let length = scan::scan(text, limits.atoms, &mut self.scratch, &mut remarks)?;
        let rest = text[length..].trim_ascii();
        if length == 0 && !rest.is_empty() {
            return Err(Fault::new(ReadErrorKind::NoStructure, 0, 1));
        }
        let Self {
            scratch, builder, ..
        } = self;
        let molecule = &mut record.molecule;
        lower::lower(&mut scratch.syntax, builder, molecule, &mut remarks)?;
        if molecule.atom_count() == 0 {
            let text = "the record has no atoms";
            remarks.note_allowed("no-atoms", &[], Extent::new(0, 0), text);
        }
        if rest.starts_with(b"|") {
            let start = text.len() - text[length..].trim_ascii_start().len();
            let text = "an extension after the SMILES is not read, though it may change the stereo";
            remarks.note(
                "extension-ignored",
                &[],
                Extent::new(start, rest.len()),
                text,
            )?;
        }
        record.name.push_str(&String::from_utf8_lossy(rest));
        record.notes = remarks.into_notes();
        Ok(())
    }
}
