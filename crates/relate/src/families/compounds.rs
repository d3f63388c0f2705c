//! Records of one key taken apart into compounds, on certificates.

use std::{io, rc::Rc};

use crate::Structure;

use super::{loader::Loader, rows::Relative};

/// Records that are identical.
#[derive(Debug)]
pub(super) struct Compound {
    /// Their numbers, rising, and whether each is open.
    pub(super) members: Vec<(u64, bool)>,
}

impl Compound {
    /// The record that stands for it.
    pub(super) fn first(&self) -> u64 {
        self.members.first().map_or(0, |&(record, _)| record)
    }

    /// Whether a record of it is open.
    pub(super) fn is_open(&self) -> bool {
        self.members.iter().any(|&(_, open)| open)
    }
}

/// Takes records of one family key, sorted, apart into labelled constitutions and these into compounds.
/// Different keys tell two apart; equal keys say nothing yet: certificates are compared. So there are
/// several constitutions only where the key fails.
pub(super) fn by_constitution(
    loader: &mut Loader<'_>,
    relatives: &[Relative],
) -> io::Result<Vec<Vec<Compound>>> {
    let mut constitutions: Vec<Vec<Compound>> = Vec::new();
    for same_key in relatives.chunk_by(|a, b| a.compound == b.compound) {
        for compound in by_certificate(loader, same_key)? {
            let own = loader.hold(compound.first())?;
            let place = find(&constitutions, |others| {
                let other = loader.hold(others.first().map_or(0, Compound::first))?;
                Ok(own
                    .canonical()
                    .same_labelled_constitution(other.canonical()))
            })?;
            match place {
                Some(place) => constitutions[place].push(compound),
                None => constitutions.push(vec![compound]),
            }
        }
    }
    Ok(constitutions)
}

/// Takes records of one compound key apart.
fn by_certificate(loader: &mut Loader<'_>, records: &[Relative]) -> io::Result<Vec<Compound>> {
    let mut compounds: Vec<Compound> = Vec::new();
    for relative in records {
        let record = relative.record;
        // The first one is asked for again and again.
        let own = match compounds.is_empty() {
            true => loader.hold(record)?,
            false => Rc::new(loader.read(record)?),
        };
        let place = find(&compounds, |compound| {
            Ok(are_identical(&own, &*loader.hold(compound.first())?))
        })?;
        let member = (record, own.canonical().is_open());
        match place {
            Some(place) => compounds[place].members.push(member),
            None => compounds.push(Compound {
                members: vec![member],
            }),
        }
    }
    Ok(compounds)
}

fn are_identical(a: &Structure, b: &Structure) -> bool {
    let (a, b) = (a.canonical(), b.canonical());
    a.same_labelled_constitution(b) && a.same_compound(b)
}

fn find<T>(
    items: &[T],
    mut holds: impl FnMut(&T) -> io::Result<bool>,
) -> io::Result<Option<usize>> {
    for (place, item) in items.iter().enumerate() {
        if holds(item)? {
            return Ok(Some(place));
        }
    }
    Ok(None)
}
