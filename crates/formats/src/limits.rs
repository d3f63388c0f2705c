//! Bounds on what a reader takes in.

/// Bounds on one record. What exceeds them is an error for that record, not for those after it.
///
/// # Examples
/// ```
/// use molkin_formats::ReadLimits;
///
/// let limits = ReadLimits { atoms: 200, ..ReadLimits::default() };
/// assert_eq!(limits.line_bytes, 1 << 20);
/// ```
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub struct ReadLimits {
    /// Bytes of one record, all its lines together: 16 MiB by default.
    pub record_bytes: usize,
    /// Bytes of one line, its end not counted: 1 MiB by default.
    pub line_bytes: usize,
    /// Atoms of one record, hydrogens written as atoms included: 200,000 by default.
    pub atoms: usize,
}

impl Default for ReadLimits {
    fn default() -> Self {
        Self {
            record_bytes: 16 << 20,
            line_bytes: 1 << 20,
            atoms: 200_000,
        }
    }
}
