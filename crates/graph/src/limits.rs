//! Bounds on work and size, all in one place.

/// Bounds within which a record is worked on. Searches count steps, not time, so results repeat.
///
/// Whatever reaches a bound ends in an error or a note that says so, never in a weaker answer.
#[derive(Debug, Clone, PartialEq, Eq)]
#[non_exhaustive]
pub struct Limits {
    /// Bytes of one line of input.
    pub line_bytes: usize,
    /// Bytes of one record of input.
    pub record_bytes: usize,
    /// Atoms of one record, hydrogens written as atoms included.
    pub atoms: usize,
    /// Refinements of a partition, over all canonical searches for one record.
    pub order_steps: u64,
    /// Unmarked stereo elements in positions that symmetry relates to marked ones: the stereoisomers
    /// they allow are listed, two to this power.
    pub open_elements: u32,
    /// Steps of the search for the atom map of one pair.
    pub map_steps: u64,
}

impl Default for Limits {
    fn default() -> Self {
        Self {
            line_bytes: 1 << 20,
            record_bytes: 16 << 20,
            atoms: 200_000,
            order_steps: 200_000,
            open_elements: 8,
            map_steps: 2_000_000,
        }
    }
}
