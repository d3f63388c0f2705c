//! Functional groups that only one of two records has.

use std::collections::HashMap;

use crate::FunctionalGroup;

/// The groups that A has more often than B, and B than A, by their lowest atom. `None`: those of
/// a record are not known.
///
/// Of several equal groups those count as kept that the map lays on an equal one.
pub(super) fn differences(
    groups: [Option<Vec<FunctionalGroup>>; 2],
    atom_map: &[(u32, u32)],
) -> Option<[Vec<FunctionalGroup>; 2]> {
    let [own, others] = groups;
    let (mut own, mut others) = (own?, others?);
    let image: HashMap<u32, u32> = atom_map.iter().copied().collect();
    own.retain(|group| {
        let mut images: Vec<u32> = group
            .atoms
            .iter()
            .filter_map(|atom| image.get(atom))
            .copied()
            .collect();
        images.sort_unstable();
        let laid_on = |other: &FunctionalGroup| {
            other.atoms == images && other.certificate == group.certificate
        };
        take(&mut others, laid_on).is_none()
    });
    own.retain(|group| take(&mut others, |other| other.certificate == group.certificate).is_none());
    Some([own, others])
}

fn take<T>(list: &mut Vec<T>, wanted: impl Fn(&T) -> bool) -> Option<T> {
    let at = list.iter().position(wanted)?;
    Some(list.remove(at))
}
