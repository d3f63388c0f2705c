//! What comes out: records in their order with their groups.

use std::{io, iter::Peekable, sync::Arc};

use molkin_formats::source::{Parser, RawRecord, ReadOptions, RecordOutcome};

use super::{
    Column, Counts, Families,
    kept::{self, Kept},
    kinship::Kinship,
    rows::Place,
    sorter::Sorted,
};

/// A record and the groups it is in.
#[derive(Debug, Clone)]
pub struct Grouped {
    /// Its number among all records, from 0.
    pub record: u64,
    /// Name or title; empty where there is none.
    pub name: String,
    /// Whether it could be read and ordered.
    pub is_fine: bool,
    /// What is wrong with it, or could not be found; empty where nothing is.
    pub message: String,
    /// Whether it may be a duplicate of others in ways that were not found within the limits.
    pub undecided: bool,
    groups: [Option<Membership>; Column::ALL.len()],
}

/// The place of a record in a group.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub struct Membership {
    /// The number of the group in its column, from 1, in the order of first records.
    pub number: u64,
    /// The first record of the group.
    pub first: u64,
    /// What the record is to that one.
    pub kinship: Kinship,
}

impl Grouped {
    /// Its group in a column.
    pub fn group(&self, column: Column) -> Option<Membership> {
        self.groups[column.place()]
    }

    /// The closest group whose first record comes before this one and is one of the first so many.
    pub fn closest(&self, before: u64) -> Option<(Column, Membership)> {
        let before = before.min(self.record);
        let groups = Column::ALL.into_iter().zip(self.groups);
        let mut known = groups.filter_map(|(column, group)| Some((column, group?)));
        known.find(|(_, group)| group.first < before)
    }
}

impl Families {
    /// How many records and groups there are.
    pub fn counts(&self) -> &Counts {
        &self.counts
    }

    /// What reads records again.
    pub fn again(&self) -> Again {
        Again {
            kept: Arc::clone(&self.kept),
        }
    }

    /// The records in their order.
    pub fn into_records(self) -> InOrder {
        InOrder {
            record: 0,
            entries: kept::InOrder::new(self.kept),
            columns: self.columns,
            undecided: self.undecided,
        }
    }
}

/// Reads records again that were grouped.
#[derive(Clone)]
pub struct Again {
    kept: Arc<Kept>,
}

impl Again {
    /// A record of this number among all, with the place it shall have.
    ///
    /// # Errors
    /// The temporary file cannot be read.
    pub fn read(
        &self,
        record: u64,
        index: u64,
        options: &ReadOptions,
    ) -> io::Result<RecordOutcome> {
        let entry = self.kept.get(record)?;
        let raw = RawRecord::from_kept(index, &entry.structure);
        let outcome = Parser::new(options).parse(raw);
        Ok(RecordOutcome {
            name: entry.name,
            ..outcome
        })
    }
}

/// Records in their order.
pub struct InOrder {
    record: u64,
    entries: kept::InOrder,
    columns: Vec<Peekable<Sorted<Place>>>,
    undecided: Peekable<Sorted<u64>>,
}

impl InOrder {
    fn step(&mut self, entry: kept::Entry) -> io::Result<Grouped> {
        let record = self.record;
        self.record += 1;
        let mut groups = [None; Column::ALL.len()];
        for (group, places) in groups.iter_mut().zip(&mut self.columns) {
            let place = next_of(places, |place: &Place| place.record == record)?;
            *group = place.map(|place| Membership {
                number: place.number,
                first: place.first,
                kinship: place.kinship,
            });
        }
        let undecided = next_of(&mut self.undecided, |own| *own == record)?.is_some();
        Ok(Grouped {
            record,
            name: entry.name,
            is_fine: !entry.structure.is_empty(),
            message: entry.message,
            undecided,
            groups,
        })
    }
}

/// The next row, if it is about this record.
fn next_of<T>(
    rows: &mut Peekable<impl Iterator<Item = io::Result<T>>>,
    is_own: impl Fn(&T) -> bool,
) -> io::Result<Option<T>> {
    let own = |row: &io::Result<T>| row.as_ref().map_or(true, &is_own);
    rows.next_if(own).transpose()
}

impl Iterator for InOrder {
    type Item = io::Result<Grouped>;

    fn next(&mut self) -> Option<Self::Item> {
        let entry = self.entries.next()?;
        Some(entry.and_then(|entry| self.step(entry)))
    }
}
