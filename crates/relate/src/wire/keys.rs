//! One line of the table of keys.

use std::fmt::{Display, Write as _};

use molkin_formats::{ReadError, smiles, source::RecordOutcome};
use molkin_graph::{CanonicalForm, Formula, Identity, Key, Limits, Molecule, Orderer};

use super::table::{TableColumn, TableRow, Value};
use crate::{
    Axes, Axis, Normaliser, PrepareError, Structure,
    structure::{check_is_one_structure, isotopes},
};

/// A record and its keys: the columns of `molkin keys`, in their order. Later columns are added at
/// the end.
#[derive(Debug, Clone, Default, PartialEq, Eq)]
pub struct KeyRow {
    /// File name, `-`, or the SMILES text as given.
    pub source: String,
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
    /// What is wrong: `line:column: code: message`, or `code: message` where it has no place. Beside `ok`:
    /// which keys of forms are not there, and why.
    pub message: String,
    /// Compound key with the axes `salt` and `charge` overlooked; empty where it is not asked for.
    pub parent_key: String,
    /// Compound key with the axis `tautomer` overlooked; empty where it is not asked for.
    pub tautomer_key: String,
    /// Whether the record stands for more than one possible sample, or leaves out what its notation
    /// cannot say. It takes a view of all stereo elements, so it is there beside keys of forms only.
    pub open: Option<bool>,
    /// Key of the constitution with its isotopes, no stereo: that of all its stereoisomers.
    pub labelled_constitution_key: String,
    /// Key of formula, isotopes and charge.
    pub isomer_key: String,
}

impl TableRow for KeyRow {
    const COLUMNS: &'static [TableColumn] = &[
        TableColumn::text("source"),
        TableColumn::number("record"),
        TableColumn::text("name"),
        TableColumn::text("status"),
        TableColumn::text("formula"),
        TableColumn::text("smiles"),
        TableColumn::text("constitution_key"),
        TableColumn::text("compound_key"),
        TableColumn::text("message"),
        TableColumn::text("parent_key"),
        TableColumn::text("tautomer_key"),
        TableColumn::truth("open"),
        TableColumn::text("labelled_constitution_key"),
        TableColumn::text("isomer_key"),
    ];

    fn values(&self) -> impl Iterator<Item = Value<'_>> {
        [
            Value::Text(&self.source),
            Value::Number(self.record),
            Value::Text(&self.name),
            Value::Word(self.status),
            Value::word(&self.formula),
            Value::word(&self.smiles),
            Value::word(&self.constitution_key),
            Value::word(&self.compound_key),
            Value::text(&self.message),
            Value::word(&self.parent_key),
            Value::word(&self.tautomer_key),
            Value::from(self.open),
            Value::word(&self.labelled_constitution_key),
            Value::word(&self.isomer_key),
        ]
        .into_iter()
    }
}

/// Which keys of forms the rows have.
#[derive(Debug)]
struct Forms {
    normaliser: Normaliser,
    /// Axes that all keys leave out.
    overlook: Axes,
    /// Whether there are keys of parent and tautomers.
    further: bool,
}

/// Makes one row after another in the same memory. One per thread.
///
/// # Examples
/// ```
/// use molkin_formats::source::{Format, ReadOptions, Records};
/// use molkin_graph::Limits;
/// use molkin_relate::wire::KeyRows;
///
/// let mut rows = KeyRows::new(Limits::default());
/// let file = "OCC\nC1CC\n";
/// let mut records = Records::new("a.smi", file.as_bytes(), Format::Smiles, ReadOptions::default());
/// let ethanol = records.next().ok_or("a record")??;
/// let row = rows.row("a.smi", &ethanol);
/// assert_eq!((row.status, row.formula.as_str()), ("ok", "C2H6O"));
/// let broken = records.next().ok_or("a record")??;
/// assert_eq!(rows.row("a.smi", &broken).status, "error");
/// # Ok::<(), Box<dyn std::error::Error>>(())
/// ```
#[derive(Debug)]
pub struct KeyRows {
    orderer: Orderer,
    identity: Identity,
    formula: Formula,
    forms: Option<Forms>,
    form: CanonicalForm,
    writer: smiles::Writer,
    written: smiles::Written,
    row: KeyRow,
}

impl KeyRows {
    /// Rows within the given limits, without keys of forms.
    pub fn new(limits: Limits) -> Self {
        Self {
            orderer: Orderer::new(limits),
            identity: Identity::default(),
            formula: Formula::default(),
            forms: None,
            form: CanonicalForm::default(),
            writer: smiles::Writer::default(),
            written: smiles::Written::default(),
            row: KeyRow::default(),
        }
    }

    /// The same with some axes overlooked in all keys and, if `further` is set, with the keys of parent and
    /// tautomers.
    #[must_use]
    pub fn with_forms(self, normaliser: Normaliser, overlook: Axes, further: bool) -> Self {
        let wanted = further || !overlook.is_empty();
        Self {
            forms: wanted.then_some(Forms {
                normaliser,
                overlook,
                further,
            }),
            ..self
        }
    }

    /// The row of one record. What cannot be read, or ordered within the limits, becomes a row with
    /// status `error`; this function does not fail.
    pub fn row(&mut self, source: &str, outcome: &RecordOutcome) -> &KeyRow {
        self.row.begin(source, outcome);
        match &outcome.result {
            Err(error) => self.row.message = read_message(error),
            Ok(record) => {
                if let Err(error) = self.fill(&record.molecule) {
                    self.row.message = prepare_message(&error);
                }
            }
        }
        &self.row
    }

    fn fill(&mut self, molecule: &Molecule) -> Result<(), PrepareError> {
        check_is_one_structure(molecule)?;
        self.orderer.identify_into(molecule, &mut self.identity)?;
        self.orderer
            .identity_form_into(&self.identity, &mut self.form);
        self.writer.write_into(&self.form, &mut self.written);
        molecule.formula_into(&mut self.formula);
        let row = &mut self.row;
        row.status = "ok";
        set(&mut row.formula, &self.formula);
        row.smiles.push_str(&self.written.text);
        set(&mut row.constitution_key, self.identity.constitution_key());
        set(&mut row.compound_key, self.identity.compound_key());
        set(
            &mut row.labelled_constitution_key,
            self.identity.labelled_constitution_key(),
        );
        let isomers = Key::of_formula(&self.formula, &isotopes(molecule));
        set(&mut row.isomer_key, isomers);
        if let Some(forms) = &mut self.forms {
            let structure = Structure::new(&mut self.orderer, molecule.clone())?;
            self.row.open = Some(structure.canonical().is_open());
            self.row.add_forms(forms, &structure);
        }
        Ok(())
    }
}

impl KeyRow {
    fn begin(&mut self, source: &str, outcome: &RecordOutcome) {
        set(&mut self.source, source);
        self.record = outcome.index;
        self.name.clone_from(&outcome.name);
        self.status = "error";
        for field in [
            &mut self.formula,
            &mut self.smiles,
            &mut self.message,
            &mut self.parent_key,
            &mut self.tautomer_key,
        ] {
            field.clear();
        }
        self.clear_keys();
    }

    fn clear_keys(&mut self) {
        for field in [
            &mut self.constitution_key,
            &mut self.labelled_constitution_key,
            &mut self.compound_key,
            &mut self.isomer_key,
        ] {
            field.clear();
        }
        self.open = None;
    }

    fn fill_keys(&mut self, structure: &Structure) {
        let canonical = structure.canonical();
        set(&mut self.constitution_key, canonical.constitution_key());
        set(
            &mut self.labelled_constitution_key,
            canonical.labelled_constitution_key(),
        );
        set(&mut self.compound_key, canonical.compound_key());
        set(&mut self.isomer_key, structure.isomer_key());
        self.open = Some(canonical.is_open());
    }
}

impl KeyRow {
    fn add_forms(&mut self, forms: &mut Forms, structure: &Structure) {
        let Forms {
            normaliser,
            overlook,
            further,
        } = forms;
        let message = &mut self.message;
        let mut form = |name: &str, axes: Axes| match normaliser.overlook(structure, axes) {
            Ok(form) => Some(form),
            Err(error) => {
                let gap = if message.is_empty() { "" } else { "; " };
                // Writing to a string does not fail.
                let _ = write!(message, "{gap}no {name}: {}: {error}", error.code());
                None
            }
        };
        let overlooked = (!overlook.is_empty()).then(|| form("key", *overlook));
        if *further {
            let parent = overlook.with(Axis::Salt).with(Axis::Charge);
            if let Some(form) = form("parent_key", parent) {
                let canonical = form.structure().canonical();
                set(&mut self.parent_key, canonical.compound_key());
            }
            if let Some(form) = form("tautomer_key", overlook.with(Axis::Tautomer)) {
                let canonical = form.structure().canonical();
                set(&mut self.tautomer_key, canonical.compound_key());
            }
        }
        match overlooked {
            None => {}
            Some(Some(form)) => self.fill_keys(form.structure()),
            Some(None) => self.clear_keys(),
        }
    }
}

/// Puts a value's text into a field whose memory is reused.
fn set(field: &mut String, value: impl Display) {
    field.clear();
    // Writing to a string does not fail.
    let _ = write!(field, "{value}");
}

/// An error of a reader with its place and code.
pub(crate) fn read_message(error: &ReadError) -> String {
    let span = error.span();
    let (line, column) = (span.line, span.column);
    format!("{line}:{column}: {}: {}", error.code(), error.kind())
}

/// An error of the canonical order with its code.
pub(crate) fn prepare_message(error: &PrepareError) -> String {
    format!("{}: {error}", error.code())
}
