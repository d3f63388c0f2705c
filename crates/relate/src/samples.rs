//! Labelled samples: is what the label says what came?

mod adduct;
mod component;
mod composition;
mod measured;
mod pattern;
mod well;

pub use self::{
    adduct::{Adduct, AdductError},
    composition::{Composition, FormulaError},
    measured::{MassCheck, Measurement, Tolerance, ToleranceError, number},
    pattern::Peak,
    well::Well,
};
