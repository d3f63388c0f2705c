//! Readers and writers of structure files.
//!
//! Each format is a module of its own: [`smiles`], [`molfile`], [`sdf`] and [`table`]; [`source`] reads
//! files of any of them. All give a [`Record`] or a [`ReadError`] with line, column, code and what was expected.
#![forbid(unsafe_code)]

mod error;
mod excerpt;
mod lines;
mod note;
mod raw;
mod record;
mod span;

pub mod molfile;
pub mod sdf;
pub mod smiles;
pub mod source;
pub mod table;

pub use crate::{
    error::{ReadError, ReadErrorKind},
    note::Note,
    record::Record,
    span::Span,
};
