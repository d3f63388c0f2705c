//! Places in a text.

/// A stretch of bytes on one line of the source.
///
/// Lines and columns count from 1. A column is a byte of its line: the fields of a molfile are byte
/// columns, and SMILES is ASCII.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub struct Span {
    /// The line.
    pub line: u32,
    /// The first byte.
    pub column: u32,
    /// The number of bytes; 0 for a place at which something is missing.
    pub width: u32,
}

impl Span {
    /// A span from its three numbers.
    pub fn new(line: u32, column: u32, width: u32) -> Self {
        Self {
            line,
            column,
            width,
        }
    }

    /// The span of `width` bytes that starts at the byte with index `offset` (from 0) of a line.
    pub fn at_offset(line: u32, offset: usize, width: usize) -> Self {
        let count = |value: usize| u32::try_from(value).unwrap_or(u32::MAX);
        Self {
            line,
            column: count(offset).saturating_add(1),
            width: count(width),
        }
    }
}
