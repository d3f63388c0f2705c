//! Labelled samples: is what the label says what came?
//!
//! A [`Sample`] has what its label says, what came, and perhaps what was measured. [`Judge`] gives each
//! sample a [`Verdict`] by itself; [`causes`] then looks across the tray for what explains the samples
//! that do not agree. Records are compared, not the contents of vials.

mod adduct;
mod causes;
mod component;
mod composition;
mod judge;
mod measured;
mod pattern;
mod sentences;
mod verdict;
mod well;

use std::sync::Arc;

use crate::{
    Structure,
    wire::{Error, Prepared},
};

pub use self::{
    adduct::{Adduct, AdductError},
    causes::{Analysis, Cause, Evidence, Hypothesis, causes},
    composition::{Composition, FormulaError},
    judge::{Judge, Judgement},
    measured::{MassCheck, Measurement, Tolerance, ToleranceError, parse_number},
    pattern::Peak,
    verdict::Verdict,
    well::Well,
};

/// One row of a tray.
#[derive(Debug, Clone, Default)]
pub struct Sample {
    /// The line of the table on which it begins, from 1.
    pub line: u32,
    /// What the sample is called.
    pub id: String,
    /// Its plate, as written.
    pub plate: String,
    /// Its well, as written.
    pub well: String,
    /// What the label says.
    pub label: Option<Arc<Prepared>>,
    /// What came, by the vendor's record.
    pub received: Option<Arc<Prepared>>,
    /// A measured m/z.
    pub measurement: Option<Measurement>,
    /// A measured formula.
    pub formula: Option<Composition>,
    /// What else stands in the row.
    pub remark: String,
    /// Why the row, or cells of it, could not be read; those of structures are theirs.
    pub faults: Vec<Error>,
}

impl Sample {
    /// The structure on the label, where it could be read.
    pub fn label_structure(&self) -> Option<&Structure> {
        self.label.as_ref()?.structure()
    }

    /// The structure that came, where it could be read.
    pub fn received_structure(&self) -> Option<&Structure> {
        self.received.as_ref()?.structure()
    }

    /// What could not be read.
    pub fn errors(&self) -> impl Iterator<Item = &Error> {
        let sides = [&self.label, &self.received].into_iter().flatten();
        self.faults
            .iter()
            .chain(sides.filter_map(|side| side.error()))
    }
}
