//! Centres that are not tetrahedral: the arrangements that a record gives.

use crate::{
    DrawnCoordination,
    order::Placed,
    skeleton::{NO_ATOM, Skeleton},
};

use super::{Dropped, Perception, marks::slot_of, tetrahedral::hydrogen_slots};

/// Puts the drawn arrangements onto the skeleton; those that do not name every neighbour once fall
/// away.
pub(super) fn load(perception: &mut Perception, skeleton: &Skeleton, drawn: &[DrawnCoordination]) {
    perception.placed.clear();
    for mark in drawn {
        let home = skeleton.home.get(mark.centre as usize).copied();
        let Some(centre) = home.filter(|&atom| atom != NO_ATOM) else {
            continue;
        };
        let ligands: Vec<u32> = mark
            .ligands
            .iter()
            .map(|&ligand| slot_of(skeleton, ligand))
            .collect();
        if names_all_neighbours(skeleton, centre, &ligands) {
            let polyhedron = mark.polyhedron;
            perception.placed.push(Placed {
                centre,
                polyhedron,
                ligands,
            });
        } else {
            perception.dropped.push((Dropped::Misfit, [centre, centre]));
        }
    }
    perception.placed.sort_by_key(|placed| placed.centre);
    perception.placed.dedup_by_key(|placed| placed.centre);
}

fn names_all_neighbours(skeleton: &Skeleton, centre: u32, ligands: &[u32]) -> bool {
    let record = &skeleton.atoms[centre as usize];
    let mut expected: Vec<u32> = skeleton
        .arcs(centre)
        .iter()
        .map(|&(to, _)| to)
        .chain(hydrogen_slots(record.hydrogens, record.labelled))
        .collect();
    let mut named: Vec<u32> = ligands
        .iter()
        .copied()
        .filter(|&ligand| ligand != super::slot::LONE_PAIR)
        .collect();
    expected.sort_unstable();
    named.sort_unstable();
    expected == named
}
