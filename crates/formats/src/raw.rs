//! The text of one record, cut out of its source and not parsed yet.

use crate::ReadError;

/// What a source is cut into. Cutting costs little beside parsing and has to be done in order;
/// parsing a record needs nothing but its text.
#[derive(Debug, Default)]
pub(crate) struct RawText {
    /// The line of a SMILES file without its end; otherwise lines each ended by LF.
    pub(crate) text: Vec<u8>,
    /// The number of the first line in the source, from 1.
    pub(crate) first_line: u32,
    /// Why this is no record whatever the text says: it exceeds a limit, and the text is a part of it.
    pub(crate) fault: Option<ReadError>,
}

/// Bytes of storage that are kept from one record to the next.
const MOST_KEPT: usize = 1 << 14;

impl RawText {
    /// Makes room for the next record.
    pub(crate) fn begin(&mut self, first_line: u32) {
        self.text.clear();
        // Many texts may be under way: each keeps what a common record takes, not what the longest did.
        self.text.shrink_to(MOST_KEPT);
        self.first_line = first_line;
        self.fault = None;
    }
}
