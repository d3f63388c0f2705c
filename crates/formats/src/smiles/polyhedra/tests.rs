use std::collections::BTreeSet;

use molkin_graph::Polyhedron;
use rstest::rstest;

use super::{Placement, placement, tag};

/// Turns that generate all rotations, as the position from which each position gets its ligand.
fn turns(polyhedron: Polyhedron) -> &'static [&'static [usize]] {
    match polyhedron {
        Polyhedron::SquarePlanar => &[&[1, 2, 3, 0], &[0, 3, 2, 1]],
        Polyhedron::TrigonalBipyramidal => &[&[0, 1, 3, 4, 2], &[1, 0, 2, 4, 3]],
        // Quarter turns about the vertical axis, and about the one through positions 3 and 5.
        Polyhedron::Octahedral => &[&[0, 1, 3, 4, 5, 2], &[2, 4, 1, 3, 0, 5]],
    }
}

fn turned(placement: Placement, turn: &[usize]) -> Placement {
    let mut result = placement;
    for (to, &from) in turn.iter().enumerate() {
        result[to] = placement[from];
    }
    result
}

/// All rotations of a placement.
fn orbit(polyhedron: Polyhedron, placement: Placement) -> BTreeSet<Placement> {
    let mut found = BTreeSet::from([placement]);
    let mut open = vec![placement];
    while let Some(next) = open.pop() {
        for turn in turns(polyhedron) {
            let image = turned(next, turn);
            if found.insert(image) {
                open.push(image);
            }
        }
    }
    found
}

/// All orders of the first `count` ligands.
fn permutations(count: u8) -> Vec<Placement> {
    let mut found = vec![[0; 6]];
    for ligand in 1..count {
        let place = usize::from(ligand);
        found = found
            .into_iter()
            .flat_map(|shorter| {
                (0..=place).map(move |at| {
                    let mut longer = shorter;
                    longer.copy_within(at..place, at + 1);
                    longer[at] = ligand;
                    longer
                })
            })
            .collect();
    }
    found
}

#[rstest]
#[case(Polyhedron::SquarePlanar, 4, 8, 3)]
#[case(Polyhedron::TrigonalBipyramidal, 5, 6, 20)]
#[case(Polyhedron::Octahedral, 6, 24, 30)]
fn every_placement_has_one_tag(
    #[case] polyhedron: Polyhedron,
    #[case] ligands: u8,
    #[case] rotations: usize,
    #[case] classes: u8,
) {
    let mut seen = BTreeSet::new();
    for number in 1..=classes {
        let orbit = orbit(polyhedron, placement(polyhedron, number).unwrap());
        assert_eq!(orbit.len(), rotations);
        for image in orbit {
            assert_eq!(tag(polyhedron, image), Some(number), "{image:?}");
            assert!(seen.insert(image), "{image:?} is in two classes");
        }
    }
    let all: BTreeSet<_> = permutations(ligands).into_iter().collect();
    assert_eq!(seen, all);
    assert_eq!(placement(polyhedron, 0), None);
    assert_eq!(placement(polyhedron, classes + 1), None);
}
