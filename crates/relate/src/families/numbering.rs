//! Groups numbered in the order in which they appear.

use std::{collections::BTreeMap, io};

use super::{
    rows::{Membership, Place},
    sorter::{Sorted, Sorter},
};

/// How many groups a column has, by their size.
pub(super) type Sizes = BTreeMap<u64, u64>;

/// Numbers groups from 1 by their first records. The places come in the order of the records.
pub(super) fn number(
    memberships: Sorted<Membership>,
    mut places: Sorter<Place>,
) -> io::Result<(Sorted<Place>, Sizes)> {
    let mut sizes = Sizes::new();
    let (mut number, mut size, mut before) = (0, 0, None);
    for membership in memberships {
        let Membership {
            first,
            record,
            kinship,
        } = membership?;
        if before != Some(first) {
            count(&mut sizes, size);
            (number, size, before) = (number + 1, 0, Some(first));
        }
        size += 1;
        places.push(Place {
            record,
            number,
            first,
            kinship,
        })?;
    }
    count(&mut sizes, size);
    Ok((places.finish()?, sizes))
}

fn count(sizes: &mut Sizes, size: u64) {
    if size > 0 {
        *sizes.entry(size).or_default() += 1;
    }
}
