//! Results in the forms that can be asked for.

pub(crate) mod csv;
pub(crate) mod json;
mod style;
pub(crate) mod table;
pub(crate) mod text;

pub(crate) use style::Style;

/// What everybody who acts on a comparison must know.
pub(crate) const CAUTION: &str = "\
This compares records, not the contents of a vial: treat a flagged sample as unknown until analysed.
Site procedures, local rules and a qualified chemist decide.";
