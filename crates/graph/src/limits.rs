//! Bounds on work and size, all in one place.

use std::sync::atomic::{AtomicBool, Ordering};

/// Bounds within which a record is worked on. Searches count steps, not time, so results repeat.
///
/// Whatever reaches a bound ends in an error or a note that says so, never in a weaker answer.
///
/// # Examples
/// ```
/// use molkin_graph::Limits;
///
/// let limits = Limits { atoms: 200, ..Limits::default() };
/// assert_eq!(limits.line_bytes, 1 << 20);
/// ```
#[derive(Debug, Clone, Copy)]
pub struct Limits {
    /// Bytes of one line of input, its end not counted: 1 MiB by default.
    pub line_bytes: usize,
    /// Bytes of one record of input, all its lines together: 16 MiB by default.
    pub record_bytes: usize,
    /// Atoms of one record, hydrogens written as atoms included: 200,000 by default.
    pub atoms: usize,
    /// Steps of all canonical searches for one record, a step being an edge or a vertex looked at:
    /// 100 million by default, which takes about a second.
    pub order_steps: u64,
    /// Unmarked stereo elements in positions that symmetry relates to marked ones: the stereoisomers
    /// they allow are listed, two to this power. 10 by default.
    pub open_elements: u32,
    /// In a record with stereo groups: groups, and unmarked elements, in positions that symmetry relates
    /// to each other or to marked ones. Their arrangements are listed, two to this power. 12 by default.
    pub stereo_pieces: u32,
    /// Steps of the search for the atom map of one pair: 3 million by default, some 70 ns each.
    pub map_steps: u64,
    /// Steps of the search for the CIP labels of one record, a step being a node made or looked at:
    /// 4 million by default, which takes less than a second. The marked elements share them evenly; one
    /// that would need more has no label, and a note says so.
    pub label_steps: u64,
    /// Raised from outside to end searches early, as if their limit had been reached.
    pub stop: Option<&'static AtomicBool>,
}

impl Default for Limits {
    fn default() -> Self {
        Self {
            line_bytes: 1 << 20,
            record_bytes: 16 << 20,
            atoms: 200_000,
            order_steps: 100_000_000,
            open_elements: 10,
            stereo_pieces: 12,
            map_steps: 3_000_000,
            label_steps: 4_000_000,
            stop: None,
        }
    }
}

impl Limits {
    /// Whether the stop flag has been raised.
    pub fn stopped(&self) -> bool {
        self.stop.is_some_and(|flag| flag.load(Ordering::Relaxed))
    }
}
