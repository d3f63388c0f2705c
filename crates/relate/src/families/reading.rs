//! From the text of a record to what is needed to group it.

use molkin_formats::source::{Parser, RawRecord, ReadOptions, RecordOutcome};
use molkin_graph::{Formula, Identity, Key, Limits, Molecule, Orderer};

use crate::{
    Axes, FormError, Normaliser, PrepareError, Structure,
    structure::{check_is_one_structure, isotopes},
    wire,
};

use super::{
    kept::Entry,
    rows::{Words, words},
};

/// A record that has been read: its keys, or what is wrong with it. The default is storage for
/// [`Reading::read_into`].
#[derive(Debug, Default)]
pub struct Gathered {
    pub(super) index: u64,
    pub(super) entry: Entry,
    pub(super) keys: Option<Keys>,
}

impl Gathered {
    /// The place of the record in its source, from 1.
    pub fn index(&self) -> u64 {
        self.index
    }

    /// Whether the record could be read and ordered.
    pub fn is_fine(&self) -> bool {
        self.keys.is_some()
    }
}

/// By what a record is grouped.
#[derive(Debug, Clone, Copy)]
pub(super) struct Keys {
    pub(super) compound: Words,
    /// Of the labelled constitution.
    pub(super) family: Words,
    /// The compound apart from what is overlooked, where something is.
    pub(super) parent: Option<Words>,
    pub(super) isomers: Words,
}

/// Reads records to be grouped; owns the scratch. One per thread.
#[derive(Debug)]
pub struct Reading {
    parser: Parser,
    orderer: Orderer,
    identity: Identity,
    formula: Formula,
    outcome: RecordOutcome,
    forms: Option<(Normaliser, Axes)>,
}

impl Reading {
    /// Reading with these options, within the limits.
    pub fn new(options: &ReadOptions, limits: Limits) -> Self {
        Self {
            parser: Parser::new(options),
            orderer: Orderer::new(limits),
            identity: Identity::default(),
            formula: Formula::default(),
            outcome: RecordOutcome::default(),
            forms: None,
        }
    }

    /// The same, with parents: what records are apart from these axes.
    #[must_use]
    pub fn with_forms(self, normaliser: Normaliser, overlook: Axes) -> Self {
        Self {
            forms: (!overlook.is_empty()).then_some((normaliser, overlook)),
            ..self
        }
    }

    /// Reads a record.
    pub fn read(&mut self, mut raw: RawRecord) -> Gathered {
        let mut gathered = Gathered::default();
        self.read_into(&mut raw, &mut gathered);
        gathered
    }

    /// Reads a record in place of another. What cannot be read, or ordered within the limits, is kept with
    /// its message; this function does not fail.
    pub fn read_into(&mut self, raw: &mut RawRecord, gathered: &mut Gathered) {
        let Gathered { index, entry, keys } = gathered;
        entry.structure.clear();
        raw.keep(&mut entry.structure);
        self.parser.parse_into(raw, &mut self.outcome);
        *index = self.outcome.index;
        entry.name.clone_from(&self.outcome.name);
        entry.message.clear();
        *keys = match &self.outcome.result {
            Err(error) => Err(wire::read_message(error)),
            Ok(record) => {
                let keys = find_keys(
                    &mut self.orderer,
                    (&mut self.identity, &mut self.formula),
                    &record.molecule,
                );
                keys.map_err(|error| wire::prepare_message(&error))
            }
        }
        .map_err(|message| {
            entry.message = message;
            entry.structure.clear();
        })
        .ok();
        if let (Some(keys), Some((normaliser, overlook)), Ok(record)) =
            (keys, &mut self.forms, &self.outcome.result)
        {
            match parent(normaliser, *overlook, &record.molecule) {
                Ok(parent) => keys.parent = Some(parent),
                Err(error) => entry.message = format!("no parent: {}: {error}", error.code()),
            }
        }
    }
}

fn find_keys(
    orderer: &mut Orderer,
    (identity, formula): (&mut Identity, &mut Formula),
    molecule: &Molecule,
) -> Result<Keys, PrepareError> {
    check_is_one_structure(molecule)?;
    orderer.identify_into(molecule, identity)?;
    molecule.formula_into(formula);
    Ok(Keys {
        compound: words(identity.compound_key()),
        family: words(identity.labelled_constitution_key()),
        parent: None,
        isomers: words(Key::of_formula(formula, &isotopes(molecule))),
    })
}

fn parent(
    normaliser: &mut Normaliser,
    overlook: Axes,
    molecule: &Molecule,
) -> Result<Words, FormError> {
    let structure = Structure::new(normaliser.orderer(), molecule.clone())?;
    let form = normaliser.overlook(&structure, overlook)?;
    Ok(words(form.structure().canonical().compound_key()))
}
