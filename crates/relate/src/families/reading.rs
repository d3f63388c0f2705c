//! From the text of a record to what is needed to group it.

use molkin_formats::source::{Parser, RawRecord, ReadOptions, RecordOutcome};
use molkin_graph::Limits;

use crate::{Axes, FormError, Normaliser, Preparer, Structure, wire};

use super::{
    kept::Entry,
    rows::{Words, words},
};

/// A record that has been read: its keys, or what is wrong with it.
#[derive(Debug)]
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
    pub(super) open: bool,
}

impl Keys {
    fn of(structure: &Structure) -> Self {
        let canonical = structure.canonical();
        Self {
            compound: words(canonical.compound_key()),
            family: words(canonical.labelled_constitution_key()),
            parent: None,
            isomers: words(structure.isomer_key()),
            open: canonical.is_open(),
        }
    }
}

/// Reads records to be grouped; owns the scratch. One per thread.
#[derive(Debug)]
pub struct Reading {
    parser: Parser,
    preparer: Preparer,
    outcome: RecordOutcome,
    forms: Option<(Normaliser, Axes)>,
}

impl Reading {
    /// Reading with these options, within the limits.
    pub fn new(options: &ReadOptions, limits: Limits) -> Self {
        Self {
            parser: Parser::new(options),
            preparer: Preparer::new(limits),
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

    /// Reads a record. What cannot be read, or ordered within the limits, is kept with its message; this
    /// function does not fail.
    pub fn read(&mut self, raw: RawRecord) -> Gathered {
        let mut structure = Vec::new();
        raw.keep(&mut structure);
        self.parser.parse_into(raw, &mut self.outcome);
        let (keys, message) = match self.keys() {
            Ok((keys, message)) => (Some(keys), message),
            Err(message) => {
                structure.clear();
                (None, message)
            }
        };
        Gathered {
            index: self.outcome.index,
            entry: Entry {
                name: self.outcome.name.clone(),
                message,
                structure,
            },
            keys,
        }
    }

    /// The keys of the record at hand, with what is to be said about them; or why there are none.
    fn keys(&mut self) -> Result<(Keys, String), String> {
        let record = self.outcome.result.as_mut();
        let record = record.map_err(|error| wire::read_message(error))?;
        let structure = self.preparer.prepare(&mut record.molecule);
        let structure = structure.map_err(|error| wire::prepare_message(&error))?;
        let mut keys = Keys::of(structure);
        let mut message = String::new();
        if let Some((normaliser, overlook)) = &mut self.forms {
            match parent(normaliser, *overlook, structure) {
                Ok(parent) => keys.parent = Some(parent),
                Err(error) => message = format!("no parent: {}: {error}", error.code()),
            }
        }
        Ok((keys, message))
    }
}

fn parent(
    normaliser: &mut Normaliser,
    overlook: Axes,
    structure: &Structure,
) -> Result<Words, FormError> {
    let form = normaliser.overlook(structure, overlook)?;
    Ok(words(form.structure().canonical().compound_key()))
}
