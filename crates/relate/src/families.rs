//! Groups of the records of whole files: duplicates, possible duplicates, stereo families, forms of one
//! parent and isomers.
//!
//! A [`Gatherer`] takes records one after another, as [`Reading`] makes them; what it keeps of each in
//! memory is a row of keys, and the rest lies in a temporary file. In the end rows are sorted by key. That
//! two records are identical is never concluded from equal keys: the records are read again from the
//! temporary file and their certificates compared. What groups there are is defined in docs/output.md.

mod compounds;
mod counts;
mod family;
mod gatherer;
mod grouped;
mod kept;
mod kin;
mod kinship;
mod loader;
mod numbering;
mod possible;
mod reading;
mod rows;
mod sorter;
mod store;

#[cfg(test)]
mod tests;

use std::{iter::Peekable, sync::Arc};

pub use self::{
    counts::Counts,
    gatherer::Gatherer,
    grouped::{Again, Grouped, InOrder, Membership},
    kinship::Kinship,
    reading::{Gathered, Reading},
};

use self::{kept::Kept, rows::Place, sorter::Sorted};

/// The sorts of groups, the closest first.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord)]
pub enum Column {
    /// Identical, and not open.
    Duplicates,
    /// Linked by pairs that may be the same compound.
    PossibleDuplicates,
    /// One labelled constitution, several compounds.
    Stereo,
    /// One parent, several labelled constitutions: the same apart from what is overlooked.
    Forms,
    /// One formula, several labelled constitutions.
    Isomers,
}

impl Column {
    /// All of them, the closest first.
    pub const ALL: [Self; 5] = [
        Self::Duplicates,
        Self::PossibleDuplicates,
        Self::Stereo,
        Self::Forms,
        Self::Isomers,
    ];

    fn place(self) -> usize {
        self as usize
    }
}

/// All records with their groups.
pub struct Families {
    kept: Arc<Kept>,
    columns: Vec<Peekable<Sorted<Place>>>,
    undecided: Peekable<Sorted<u64>>,
    counts: Counts,
}
