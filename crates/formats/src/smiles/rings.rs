//! Ring labels that are open while a text is read.

use super::syntax::BondSymbol;

/// Labels are 0 to 99.
const LABELS: usize = 100;

/// The first end of a ring bond.
#[derive(Debug, Clone, Copy)]
pub(super) struct RingEnd {
    pub(super) atom: u32,
    pub(super) symbol: BondSymbol,
    /// The place kept for the bond among those of the atom.
    pub(super) place: u32,
    pub(super) offset: usize,
    pub(super) width: usize,
}

/// The open labels.
#[derive(Debug)]
pub(super) struct Rings {
    ends: Box<[Option<RingEnd>; LABELS]>,
    open: usize,
}

impl Default for Rings {
    fn default() -> Self {
        Self {
            ends: Box::new([None; LABELS]),
            open: 0,
        }
    }
}

impl Rings {
    pub(super) fn clear(&mut self) {
        if self.open > 0 {
            self.ends.fill(None);
            self.open = 0;
        }
    }

    /// Closes the label if it is open.
    pub(super) fn take(&mut self, label: u8) -> Option<RingEnd> {
        let end = self.ends.get_mut(usize::from(label))?.take();
        self.open -= usize::from(end.is_some());
        end
    }

    /// Opens a label that is not open; labels beyond 99 do not occur.
    pub(super) fn open(&mut self, label: u8, end: RingEnd) {
        if let Some(slot) = self.ends.get_mut(usize::from(label)) {
            *slot = Some(end);
            self.open += 1;
        }
    }

    /// The label still open whose opening comes first in the text.
    pub(super) fn first_open(&self) -> Option<(u8, RingEnd)> {
        if self.open == 0 {
            return None;
        }
        let open = (0..)
            .zip(self.ends.iter())
            .filter_map(|(label, end)| end.map(|end| (label, end)));
        open.min_by_key(|(_, end)| end.offset)
    }
}
