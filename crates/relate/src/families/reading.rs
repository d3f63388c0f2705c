//! From the text of a record to what is needed to group it.

use molkin_formats::source::{Parser, RawRecord, ReadOptions, RecordOutcome};
use molkin_graph::Limits;

use crate::{Preparer, Structure, wire};

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
    pub(super) isomers: Words,
    pub(super) open: bool,
}

impl Keys {
    fn of(structure: &Structure) -> Self {
        let canonical = structure.canonical();
        Self {
            compound: words(canonical.compound_key()),
            family: words(canonical.labelled_constitution_key()),
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
}

impl Reading {
    /// Reading with these options, within the limits.
    pub fn new(options: &ReadOptions, limits: Limits) -> Self {
        Self {
            parser: Parser::new(options),
            preparer: Preparer::new(limits),
            outcome: RecordOutcome::default(),
        }
    }

    /// Reads a record. What cannot be read, or ordered within the limits, is kept with its message; this
    /// function does not fail.
    pub fn read(&mut self, raw: RawRecord) -> Gathered {
        let mut structure = Vec::new();
        raw.keep(&mut structure);
        self.parser.parse_into(raw, &mut self.outcome);
        let outcome = &mut self.outcome;
        let keys = match &mut outcome.result {
            Err(error) => Err(wire::read_message(error)),
            Ok(record) => match self.preparer.prepare(&mut record.molecule) {
                Err(error) => Err(wire::prepare_message(&error)),
                Ok(structure) => Ok(Keys::of(structure)),
            },
        };
        if keys.is_err() {
            structure.clear();
        }
        let (keys, message) = match keys {
            Ok(keys) => (Some(keys), String::new()),
            Err(message) => (None, message),
        };
        let entry = Entry {
            name: outcome.name.clone(),
            message,
            structure,
        };
        Gathered {
            index: outcome.index,
            entry,
            keys,
        }
    }
}
