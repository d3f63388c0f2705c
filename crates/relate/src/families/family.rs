//! The records of one labelled constitution: which are duplicates, may be, or are stereoisomers.

use std::io;

use crate::{PrepareError, Relation, StereoKind, Verdict, relate};

use super::{
    Column,
    compounds::{Compound, by_constitution},
    kinship::Kinship,
    loader::Loader,
    possible::{Links, MOST_PAIRS, Meeting},
    rows::{Membership, Relative},
};

/// What was found about the records of one family key.
#[derive(Debug, Default)]
pub(super) struct Found {
    pub(super) memberships: Vec<(Column, Membership)>,
    /// Records that repeat a compound.
    pub(super) repeats: u64,
    /// Records that may be duplicates of others in ways that were not found within the limits.
    pub(super) undecided: Vec<u64>,
}

/// Relates the records of one family key, sorted.
pub(super) fn relate_family(loader: &mut Loader<'_>, relatives: &[Relative]) -> io::Result<Found> {
    let found = relate_compounds(loader, relatives);
    loader.clear();
    match found {
        // Keys ask for less than a comparison does, which may reach a limit where they did not.
        Err(error)
            if error
                .get_ref()
                .is_some_and(|inner| inner.is::<PrepareError>()) =>
        {
            Ok(Found {
                undecided: relatives.iter().map(|relative| relative.record).collect(),
                ..Found::default()
            })
        }
        found => found,
    }
}

fn relate_compounds(loader: &mut Loader<'_>, relatives: &[Relative]) -> io::Result<Found> {
    let mut found = Found::default();
    for compounds in by_constitution(loader, relatives)? {
        found.add_duplicates(&compounds);
        found.add_possible_duplicates(loader, &compounds)?;
        if compounds.len() > 1 {
            let all: Vec<&Compound> = compounds.iter().collect();
            found.add_group(loader, Column::Stereo, &all)?;
        }
    }
    Ok(found)
}

impl Found {
    fn add_duplicates(&mut self, compounds: &[Compound]) {
        for Compound { members } in compounds {
            self.repeats += members.len().saturating_sub(1) as u64;
            let closed = members.iter().filter(|(_, open)| !open);
            let mut closed = closed.map(|&(record, _)| record).peekable();
            let Some(&first) = closed.peek() else {
                continue;
            };
            let several = members.iter().filter(|(_, open)| !open).nth(1).is_some();
            for record in closed.filter(|_| several) {
                let kinship = match record == first {
                    true => Kinship::First,
                    false => Kinship::Identical { open: false },
                };
                self.add(Column::Duplicates, first, record, kinship);
            }
        }
    }

    fn add_possible_duplicates(
        &mut self,
        loader: &mut Loader<'_>,
        compounds: &[Compound],
    ) -> io::Result<()> {
        let mut links = Links::find(compounds, MOST_PAIRS, |a, b| {
            Ok(match kinship(loader, a, b)? {
                Kinship::Stereo(StereoKind::Undetermined) => Meeting::Meet,
                Kinship::NotCompared => Meeting::Unknown,
                _ => Meeting::Apart,
            })
        })?;
        for group in links.groups(compounds) {
            let group: Vec<&Compound> = group.into_iter().map(|at| &compounds[at]).collect();
            self.add_group(loader, Column::PossibleDuplicates, &group)?;
        }
        if !links.complete {
            let members = compounds.iter().flat_map(|compound| &compound.members);
            self.undecided.extend(members.map(|&(record, _)| record));
        }
        Ok(())
    }

    /// Puts the records of these compounds in one group.
    fn add_group(
        &mut self,
        loader: &mut Loader<'_>,
        column: Column,
        compounds: &[&Compound],
    ) -> io::Result<()> {
        let Some(leader) = compounds.iter().min_by_key(|compound| compound.first()) else {
            return Ok(());
        };
        for compound in compounds {
            let other = match compound.first() == leader.first() {
                true => None,
                false => Some(kinship(loader, leader, compound)?),
            };
            let first_open = leader.members.first().is_some_and(|&(_, open)| open);
            for &(record, open) in &compound.members {
                let kinship = other.unwrap_or(match record == leader.first() {
                    true => Kinship::First,
                    false => Kinship::Identical {
                        open: open || first_open,
                    },
                });
                self.add(column, leader.first(), record, kinship);
            }
        }
        Ok(())
    }

    fn add(&mut self, column: Column, first: u64, record: u64, kinship: Kinship) {
        let membership = Membership {
            first,
            record,
            kinship,
        };
        self.memberships.push((column, membership));
    }
}

/// What two different compounds of one constitution are to each other.
fn kinship(loader: &mut Loader<'_>, a: &Compound, b: &Compound) -> io::Result<Kinship> {
    let (a, b) = (loader.hold(a.first())?, loader.hold(b.first())?);
    let verdict = relate(loader.orderer(), &a, &b);
    Ok(verdict.map_or(Kinship::NotCompared, Kinship::from))
}

impl From<Verdict> for Kinship {
    fn from(Verdict { relation, open }: Verdict) -> Self {
        match relation {
            Relation::Identical => Self::Identical { open },
            Relation::Stereo(kind) => Self::Stereo(kind),
            Relation::Constitutional => Self::Constitutional,
            Relation::NotIsomers => Self::NotIsomers,
        }
    }
}
