//! The output contract, version 1: what JSON says, field by field (docs/output.md).
//!
//! Atoms count from 1 here, in input order. Fields that do not apply are absent.

mod composition;
mod describe;
#[cfg(feature = "families")]
mod families;
mod findings;
mod keys;
mod pair;
#[cfg(feature = "parquet")]
mod parquet;
mod prepared;
mod samples;
mod table;

use molkin_formats::{Note as ReadNote, ReadError};
use molkin_graph::Molecule;
use serde::Serialize;

use crate::remarks::Noted;

#[cfg(feature = "parquet")]
pub use self::parquet::ParquetTable;
pub use composition::{FunctionalGroup, Piece, RingSystem, Sides, Surplus};
pub use describe::{Describe, Group, Masses, Stereo, Unsaturation, describe};
#[cfg(feature = "families")]
pub use families::{FamilyRow, FamilySummary, GroupSummary, SizeSummary, Sources};
pub use findings::{Finding, FoundGroup};
pub use keys::{KeyRow, KeyRows};
#[cfg(feature = "families")]
pub(crate) use keys::{prepare_message, read_message};
pub use pair::{
    Apart, BondPair, Bonds, BranchPoint, Branching, Hydrogens, Kind, Pair, StereoEntry, compare,
    compare_by,
};
pub use prepared::Prepared;
pub use samples::{
    CAUTION, ExpectedMass, FormulaEntry, HypothesisEntry, MassEntry, SampleEntry, SampleName,
    SampleRow, Tray, VerdictCount,
};
pub use table::{ColumnKind, TableColumn, TableRow, Value};

/// The version of the contract.
pub const VERSION: u32 = 1;

/// Which record of a pair a note or an error is about.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Serialize)]
#[serde(rename_all = "lowercase")]
pub enum Which {
    /// The first.
    A,
    /// The second.
    B,
}

/// Where a record came from, and what it is.
#[derive(Debug, Clone, PartialEq, Eq, Serialize)]
pub struct Input {
    /// File name, `-`, or the SMILES text as given.
    pub source: String,
    /// Number of the record in its source, from 1.
    pub record: u64,
    /// Name or title; empty where there is none.
    pub name: String,
    /// Formula in Hill order.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub formula: Option<String>,
    /// Canonical SMILES.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub smiles: Option<String>,
    /// Canonical SMILES of the form that was compared, where axes are overlooked.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub form: Option<String>,
}

/// A remark about a record or a pair.
#[derive(Debug, Clone, PartialEq, Eq, Serialize)]
pub struct Note {
    /// A stable name in kebab-case.
    pub code: String,
    /// The record, where it is about one of a pair.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub input: Option<Which>,
    /// Atoms, from 1.
    pub atoms: Vec<u32>,
    /// One sentence.
    pub text: String,
}

/// Why a record could not be read or compared.
#[derive(Debug, Clone, PartialEq, Eq, Serialize)]
pub struct Error {
    /// The record, where it is one of a pair.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub input: Option<Which>,
    /// Line of the source, from 1.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub line: Option<u32>,
    /// Byte column, from 1.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub column: Option<u32>,
    /// A stable name in kebab-case.
    pub code: String,
    /// What is wrong and what was expected.
    pub message: String,
}

impl Note {
    fn of(molecule: &Molecule, noted: Noted) -> Self {
        Self {
            code: noted.code.to_owned(),
            input: None,
            atoms: numbers(molecule, &noted.atoms),
            text: noted.text,
        }
    }

    fn of_reader(molecule: &Molecule, note: &ReadNote) -> Self {
        Self {
            code: note.code.to_owned(),
            input: None,
            atoms: numbers(molecule, &note.atoms),
            text: note.text.clone(),
        }
    }

    fn on(self, which: Which) -> Self {
        Self {
            input: Some(which),
            ..self
        }
    }
}

impl From<&ReadError> for Error {
    fn from(error: &ReadError) -> Self {
        let span = error.span();
        Self {
            input: None,
            line: Some(span.line),
            column: Some(span.column),
            code: error.code().to_owned(),
            message: error.kind().to_string(),
        }
    }
}

impl Error {
    /// An error that no place of a source shows.
    pub fn without_place(code: &str, message: String) -> Self {
        Self {
            input: None,
            line: None,
            column: None,
            code: code.to_owned(),
            message,
        }
    }

    fn on(self, which: Which) -> Self {
        Self {
            input: Some(which),
            ..self
        }
    }
}

/// The numbers of atoms in their record.
fn numbers(molecule: &Molecule, atoms: &[u32]) -> Vec<u32> {
    atoms.iter().map(|&atom| molecule.number(atom)).collect()
}
