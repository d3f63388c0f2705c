//! What a reader remarks about a record that it could read.

use crate::Span;

/// A warning: the record was read, and this is what its sender should know about it.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Note {
    /// A stable name of the kind of remark, in kebab-case.
    pub code: &'static str,
    /// The atoms it is about, as indices from 0; empty where it concerns the whole record.
    pub atoms: Vec<u32>,
    /// The place in the source, where there is one.
    pub span: Option<Span>,
    /// One sentence for a chemist. Atoms in it count from 1.
    pub text: String,
}
