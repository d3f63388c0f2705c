//! One record of a file.

use molkin_graph::Molecule;

use crate::Note;

/// A molecule with what its record says about it.
#[derive(Debug, Clone, Default)]
pub struct Record {
    /// The name or title; empty where there is none.
    pub name: String,
    /// The molecule as drawn. Its atoms are numbered in the order of the record.
    pub molecule: Molecule,
    /// Remarks of the reader, in the order in which it made them.
    pub notes: Vec<Note>,
    /// Data items in the order of the record: name and value. Empty for formats without any.
    pub properties: Vec<(String, String)>,
}
