//! The rows that are sorted: what is known of a record, in few bytes.

use molkin_graph::Key;

use super::{kinship::Kinship, sorter::Row};

/// A key as two numbers, which compare faster than bytes.
pub(super) type Words = [u64; 2];

pub(super) fn words(key: Key) -> Words {
    let all = u128::from_be_bytes(key.bytes());
    [(all >> 64) as u64, all as u64]
}

/// A record among those of its labelled constitution.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord)]
pub(super) struct Relative {
    pub(super) family: Words,
    pub(super) compound: Words,
    /// Its number among all records, from 0.
    pub(super) record: u64,
}

/// A record by a key that several constitutions share.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord)]
pub(super) struct Kin {
    pub(super) key: Words,
    pub(super) record: u64,
    pub(super) family: Words,
    /// Formula, isotopes and charge.
    pub(super) isomers: Words,
}

/// A record in a group, named by the group's first record.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord)]
pub(super) struct Membership {
    pub(super) first: u64,
    pub(super) record: u64,
    pub(super) kinship: Kinship,
}

/// The place of a record in the groups of one column.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord)]
pub(super) struct Place {
    pub(super) record: u64,
    pub(super) number: u64,
    pub(super) first: u64,
    pub(super) kinship: Kinship,
}

impl Row for Relative {
    type Numbers = [u64; 5];

    fn numbers(&self) -> [u64; 5] {
        let ([a, b], [c, d]) = (self.family, self.compound);
        [a, b, c, d, self.record]
    }

    fn of_numbers([a, b, c, d, record]: [u64; 5]) -> Self {
        Self {
            family: [a, b],
            compound: [c, d],
            record,
        }
    }
}

impl Row for Kin {
    type Numbers = [u64; 7];

    fn numbers(&self) -> [u64; 7] {
        let ([a, b], [c, d], [e, f]) = (self.key, self.family, self.isomers);
        [a, b, self.record, c, d, e, f]
    }

    fn of_numbers([a, b, record, c, d, e, f]: [u64; 7]) -> Self {
        Self {
            key: [a, b],
            record,
            family: [c, d],
            isomers: [e, f],
        }
    }
}

impl Row for Membership {
    type Numbers = [u64; 3];

    fn numbers(&self) -> [u64; 3] {
        [self.first, self.record, self.kinship.code()]
    }

    fn of_numbers([first, record, code]: [u64; 3]) -> Self {
        Self {
            first,
            record,
            kinship: Kinship::of_code(code),
        }
    }
}

impl Row for Place {
    type Numbers = [u64; 4];

    fn numbers(&self) -> [u64; 4] {
        [self.record, self.number, self.first, self.kinship.code()]
    }

    fn of_numbers([record, number, first, code]: [u64; 4]) -> Self {
        Self {
            record,
            number,
            first,
            kinship: Kinship::of_code(code),
        }
    }
}
