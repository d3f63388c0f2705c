//! Groups that several constitutions share: forms of one parent, isomers of one formula.

use std::io;

use super::{
    kinship::Kinship,
    rows::{Kin, Membership},
    sorter::{Sorted, Sorter},
};

/// Groups of records that have a key in common and not all one constitution.
pub(super) fn group(kin: Sorted<Kin>, memberships: &mut Sorter<Membership>) -> io::Result<()> {
    let mut group: Option<Group> = None;
    for row in kin {
        let row = row?;
        match &mut group {
            Some(group) if group.first.key == row.key => group.add(row, memberships)?,
            _ => group = Some(Group::new(row)),
        }
    }
    Ok(())
}

struct Group {
    first: Kin,
    /// Records of the first one's constitution, until there is another.
    waiting: Vec<u64>,
    several: bool,
}

impl Group {
    fn new(first: Kin) -> Self {
        Self {
            first,
            waiting: Vec::new(),
            several: false,
        }
    }

    fn add(&mut self, row: Kin, memberships: &mut Sorter<Membership>) -> io::Result<()> {
        let first = self.first.record;
        let other = row.family != self.first.family;
        if other && !self.several {
            self.several = true;
            memberships.push(Membership {
                first,
                record: first,
                kinship: Kinship::First,
            })?;
            for record in std::mem::take(&mut self.waiting) {
                memberships.push(of_one_constitution(first, record))?;
            }
        }
        let kinship = match row.isomers == self.first.isomers {
            true => Kinship::Constitutional,
            false => Kinship::NotIsomers,
        };
        match (other, self.several) {
            (true, _) => memberships.push(Membership {
                first,
                record: row.record,
                kinship,
            }),
            (false, true) => memberships.push(of_one_constitution(first, row.record)),
            (false, false) => {
                self.waiting.push(row.record);
                Ok(())
            }
        }
    }
}

/// A record of the first one's constitution. What it is to that one the closer groups say.
fn of_one_constitution(first: u64, record: u64) -> Membership {
    let kinship = Kinship::NotCompared;
    Membership {
        first,
        record,
        kinship,
    }
}
