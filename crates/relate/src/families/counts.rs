//! How many records and groups there are.

use super::{Column, numbering::Sizes};

/// Numbers of records and groups.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Counts {
    /// All records.
    pub records: u64,
    /// Those that could not be read or ordered.
    pub failed: u64,
    /// Different compounds among the others.
    pub distinct: u64,
    sizes: [Sizes; Column::ALL.len()],
}

impl Counts {
    pub(super) fn new(records: u64, failed: u64, repeats: u64) -> Self {
        Self {
            records,
            failed,
            distinct: records.saturating_sub(failed).saturating_sub(repeats),
            sizes: Default::default(),
        }
    }

    pub(super) fn set_sizes(&mut self, column: Column, sizes: Sizes) {
        self.sizes[column.place()] = sizes;
    }

    /// The sizes of the groups of a column, rising, each with the number of such groups.
    pub fn sizes(&self, column: Column) -> impl Iterator<Item = (u64, u64)> {
        let sizes = self.sizes[column.place()].iter();
        sizes.map(|(&size, &groups)| (size, groups))
    }

    /// How many groups a column has.
    pub fn groups(&self, column: Column) -> u64 {
        self.sizes(column).map(|(_, groups)| groups).sum()
    }

    /// How many records are in groups of a column.
    pub fn members(&self, column: Column) -> u64 {
        let sizes = self.sizes(column);
        sizes.map(|(size, groups)| size * groups).sum()
    }
}
