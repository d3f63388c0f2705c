//! From text to records, whatever the format.

use super::{RawRecord, ReadOptions, RecordOutcome, raw::Cut};
use crate::{molfile, sdf, smiles};

/// Parses records of any format; owns the scratch memory. One per thread.
#[derive(Debug)]
pub struct Parser {
    smiles: smiles::Reader,
    molfile: molfile::ReadOptions,
    /// Whether properties are kept.
    properties: bool,
}

impl Parser {
    /// A parser with these options.
    pub fn new(options: &ReadOptions) -> Self {
        Self {
            smiles: smiles::Reader::new(options.smiles),
            molfile: options.molfile,
            properties: !options.without_properties,
        }
    }

    /// Parses a record. What cannot be read is told in the outcome.
    pub fn parse(&mut self, mut raw: RawRecord) -> RecordOutcome {
        let mut outcome = RecordOutcome::default();
        self.parse_into(&mut raw, &mut outcome);
        outcome
    }

    /// As [`Parser::parse`], in place of an outcome that has been worked up, whose storage is reused
    /// where the format allows. The text is left as storage for
    /// [`Records::cut_into`](super::Records::cut_into).
    pub fn parse_into(&mut self, raw: &mut RawRecord, outcome: &mut RecordOutcome) {
        outcome.index = raw.index;
        match &mut raw.cut {
            Cut::Smiles(raw) => {
                outcome.name.clear();
                outcome.name.push_str(&smiles::title(raw));
                smiles::parse_line(raw, &mut self.smiles, &mut outcome.result);
            }
            Cut::Molfile(raw) => {
                outcome.name = sdf::title(raw);
                outcome.result = sdf::parse(raw, &self.molfile, self.properties);
            }
            #[cfg(feature = "table")]
            Cut::Row(raw) => {
                let readers = (&mut self.smiles, &self.molfile);
                raw.parse(readers, &mut outcome.name, &mut outcome.result);
                if self.properties
                    && let Ok(record) = &mut outcome.result
                {
                    record.properties = raw.properties();
                }
            }
        }
    }
}
