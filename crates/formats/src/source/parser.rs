//! From text to records, whatever the format.

use super::{RawRecord, ReadOptions, RecordOutcome, raw::Cut};
use crate::{molfile, sdf, smiles};

/// Parses records of any format; owns the scratch memory. One per thread.
#[derive(Debug)]
pub struct Parser {
    smiles: smiles::Reader,
    molfile: molfile::ReadOptions,
}

impl Parser {
    /// A parser with these options.
    pub fn new(options: &ReadOptions) -> Self {
        Self {
            smiles: smiles::Reader::new(options.smiles),
            molfile: options.molfile,
        }
    }

    /// Parses a record. What cannot be read is told in the outcome.
    pub fn parse(&mut self, raw: RawRecord) -> RecordOutcome {
        let mut outcome = RecordOutcome::default();
        self.parse_into(raw, &mut outcome);
        outcome
    }

    /// As [`Parser::parse`], in place of an outcome that has been worked up, whose storage is reused
    /// where the format allows.
    pub fn parse_into(&mut self, raw: RawRecord, outcome: &mut RecordOutcome) {
        outcome.index = raw.index;
        match raw.cut {
            Cut::Smiles(mut raw) => {
                outcome.name = smiles::title(&raw);
                let storage = outcome.result.as_mut().map(std::mem::take);
                let storage = storage.unwrap_or_default();
                outcome.result = smiles::parse_line(&mut raw, &mut self.smiles, storage);
            }
            Cut::Molfile(mut raw) => {
                outcome.name = sdf::title(&raw);
                outcome.result = sdf::parse(&mut raw, &self.molfile);
            }
            #[cfg(feature = "table")]
            Cut::Row(mut raw) => {
                (outcome.name, outcome.result) = raw.parse(&mut self.smiles, &self.molfile);
            }
        }
    }
}
