//! One line of the table of keys.

use std::borrow::Cow;

use molkin_formats::{ReadError, smiles, source::RecordOutcome};
use molkin_graph::Orderer;
use serde::Serialize;

use crate::Structure;

/// A record and its keys: the columns of `molkin keys`, in their order. Later columns are added at
/// the end.
#[derive(Debug, Clone, PartialEq, Eq, Serialize)]
pub struct KeyRow<'s> {
    /// File name, `-`, or the SMILES text as given.
    pub source: Cow<'s, str>,
    /// Number of the record in its source, from 1.
    pub record: u64,
    /// Name or title; empty where there is none.
    pub name: String,
    /// `ok` or `error`; beside `error` the columns up to `message` are empty.
    pub status: &'static str,
    /// Formula in Hill order.
    pub formula: String,
    /// Canonical SMILES.
    pub smiles: String,
    /// Key of the constitution: no stereo, no isotopes.
    pub constitution_key: String,
    /// Key of the compound: isotopes and all claims about stereo.
    pub compound_key: String,
    /// What is wrong: `line:column: code: message`, or `code: message` where it has no place.
    pub message: String,
}

/// The row of one record. What cannot be read, or ordered within the limits, becomes a row with
/// status `error`; this function does not fail.
pub fn key_row<'s>(orderer: &mut Orderer, source: &'s str, outcome: RecordOutcome) -> KeyRow<'s> {
    let mut row = KeyRow {
        source: Cow::Borrowed(source),
        record: outcome.index,
        name: outcome.name,
        status: "error",
        formula: String::new(),
        smiles: String::new(),
        constitution_key: String::new(),
        compound_key: String::new(),
        message: String::new(),
    };
    match outcome.result {
        Err(error) => row.message = placed(&error),
        Ok(record) => match Structure::new(orderer, record.molecule) {
            Err(error) => row.message = format!("{}: {error}", error.code()),
            Ok(structure) => {
                let canonical = structure.canonical();
                row.status = "ok";
                row.formula = structure.formula().to_string();
                row.smiles = smiles::write(&canonical.form()).text;
                row.constitution_key = canonical.constitution_key().to_string();
                row.compound_key = canonical.compound_key().to_string();
            }
        },
    }
    row
}

fn placed(error: &ReadError) -> String {
    let span = error.span();
    let (line, column) = (span.line, span.column);
    format!("{line}:{column}: {}: {}", error.code(), error.kind())
}
