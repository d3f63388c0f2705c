//! Records that have been cut out of a source and not parsed yet.

use crate::raw::RawText;
#[cfg(feature = "table")]
use crate::table::RawRow;

/// A record as text: where it starts and ends is known, and nothing else. See
/// [`Records::cut`](super::Records::cut). The default is storage for
/// [`Records::cut_into`](super::Records::cut_into).
#[derive(Debug, Default)]
pub struct RawRecord {
    pub(super) index: u64,
    pub(super) cut: Cut,
}

/// The text, by the way in which it is parsed.
#[derive(Debug)]
pub(super) enum Cut {
    Smiles(RawText),
    Molfile(RawText),
    #[cfg(feature = "table")]
    Row(RawRow),
}

impl Default for Cut {
    fn default() -> Self {
        Self::Smiles(RawText::default())
    }
}

impl Cut {
    /// The text, as storage to be reused.
    pub(super) fn into_text(self) -> RawText {
        match self {
            Self::Smiles(raw) | Self::Molfile(raw) => raw,
            #[cfg(feature = "table")]
            Self::Row(row) => row.raw,
        }
    }

    /// The row, as storage to be reused.
    #[cfg(feature = "table")]
    pub(super) fn into_row(self) -> RawRow {
        match self {
            Self::Row(row) => row,
            Self::Smiles(raw) | Self::Molfile(raw) => RawRow::in_place_of(raw),
        }
    }
}

impl RawRecord {
    /// The place of the record in its source, from 1. Records that fail count.
    pub fn index(&self) -> u64 {
        self.index
    }

    /// Bytes of text.
    pub fn bytes(&self) -> usize {
        match &self.cut {
            Cut::Smiles(raw) | Cut::Molfile(raw) => raw.text.len(),
            #[cfg(feature = "table")]
            Cut::Row(raw) => raw.len(),
        }
    }
}
