use std::sync::atomic::AtomicBool;

use rstest::rstest;

use super::{
    Distance, Effort, Mapping, MappingError, Proved, Side, map_atoms,
    oracle::{self, Numbers},
};

const ALL: Proved = Proved {
    bonds: true,
    orders: true,
    hydrogens: true,
};

fn mapping(a: &Side, b: &Side) -> Mapping {
    map_atoms(a, b, &Effort::default()).expect("the sides have the same elements")
}

/// (i) to (iii) of a distance.
fn triple(distance: Distance) -> (u32, u32, u32) {
    (distance.bonds, distance.orders, distance.hydrogens)
}

/// Checks that the map keeps elements and has the distance that it states.
#[track_caller]
fn check_map(a: &Side, b: &Side, mapping: &Mapping) {
    let mut targets: Vec<u32> = mapping.pairs.clone();
    targets.sort_unstable();
    assert!((0..a.elements.len() as u32).eq(targets), "one-to-one");
    for (atom, &image) in mapping.pairs.iter().enumerate() {
        assert_eq!(a.elements[atom], b.elements[image as usize]);
    }
    let (a, b) = (super::problem::normal(a), super::problem::normal(b));
    let problem = super::problem::Problem::new(&a, &b).expect("checked before");
    assert_eq!(problem.distance(&mapping.pairs), mapping.distance);
}

#[test]
fn equals_brute_force() {
    let mut compared = 0;
    for seed in 0..700 {
        let mut numbers = Numbers::new(seed);
        // Eight atoms cost most of the time; a few are enough.
        let atoms = 3 + numbers.below(if seed % 4 == 0 { 6 } else { 5 });
        let (a, b) = oracle::isomers(&mut numbers, atoms);
        let found = mapping(&a, &b);
        let least = oracle::least_distance(&a, &b);
        check_map(&a, &b, &found);
        assert_eq!(
            triple(found.distance),
            triple(least),
            "seed {seed}: {a:?} {b:?}"
        );
        assert_eq!(
            found.distance.marks, least.marks,
            "seed {seed}: {a:?} {b:?}"
        );
        assert_eq!(found.proved, ALL, "seed {seed}");
        assert_eq!(found.bonds_at_least, found.distance.bonds);
        compared += 1;
    }
    assert!(compared >= 500);
}

#[test]
fn exchanged_sides_give_the_inverse() {
    for seed in 0..200 {
        let mut numbers = Numbers::new(seed);
        let atoms = 3 + numbers.below(14);
        let (a, b) = oracle::isomers(&mut numbers, atoms);
        let (there, back) = (mapping(&a, &b), mapping(&b, &a));
        assert_eq!(there.pairs, super::inverse(&back.pairs), "seed {seed}");
        assert_eq!(
            (there.distance, there.proved, there.steps),
            (back.distance, back.proved, back.steps)
        );
    }
}

#[test]
fn numbering_does_not_change_the_distance() {
    for seed in 0..200 {
        let mut numbers = Numbers::new(seed);
        let atoms = 3 + numbers.below(14);
        let (a, b) = oracle::isomers(&mut numbers, atoms);
        let (c, d) = (
            oracle::renumbered(&mut numbers, &a),
            oracle::renumbered(&mut numbers, &b),
        );
        let (first, second) = (mapping(&a, &b), mapping(&c, &d));
        assert_eq!((first.proved, second.proved), (ALL, ALL), "seed {seed}");
        assert_eq!(
            triple(first.distance),
            triple(second.distance),
            "seed {seed}"
        );
    }
}

#[test]
fn renumbered_copies_have_no_distance() {
    for seed in 0..100 {
        let mut numbers = Numbers::new(seed);
        let atoms = 3 + numbers.below(20);
        let (a, _) = oracle::isomers(&mut numbers, atoms);
        let b = oracle::renumbered(&mut numbers, &a);
        let found = mapping(&a, &b);
        check_map(&a, &b, &found);
        assert_eq!(triple(found.distance), (0, 0, 0), "seed {seed}");
        assert_eq!(found.proved, ALL);
    }
}

/// A chain of carbons, or a ring if closed.
fn carbons(atoms: u32, closed: bool) -> Side {
    let mut bonds: Vec<(u32, u32, u8)> = (1..atoms).map(|atom| (atom - 1, atom, 1)).collect();
    if closed {
        bonds.push((0, atoms - 1, 1));
    }
    Side {
        elements: vec![6; atoms as usize],
        hydrogens: vec![2; atoms as usize],
        marks: vec![0; atoms as usize],
        bonds,
    }
}

/// A central atom of element 26 with ligands of element 17.
fn star(ligands: u32, class: u8) -> Side {
    Side {
        elements: std::iter::once(26)
            .chain((0..ligands).map(|_| 17))
            .collect(),
        hydrogens: vec![0; ligands as usize + 1],
        marks: vec![0; ligands as usize + 1],
        bonds: (1..=ligands)
            .map(|atom| (0, atom, if atom < 3 { class } else { 1 }))
            .collect(),
    }
}

#[rstest]
#[case::nothing(carbons(0, false), carbons(0, false), (0, 0, 0))]
#[case::one_atom(carbons(1, false), carbons(1, false), (0, 0, 0))]
#[case::ring_opens(carbons(6, true), carbons(6, false), (1, 0, 0))]
#[case::more_than_64_atoms(carbons(100, true), carbons(100, false), (1, 0, 0))]
#[case::high_degree(star(9, 1), star(9, 2), (0, 2, 0))]
#[case::very_high_degree(star(40, 1), star(40, 5), (0, 2, 0))]
#[case::beyond_the_tables(carbons(600, true), carbons(600, false), (1, 0, 0))]
fn known_distances(#[case] a: Side, #[case] b: Side, #[case] expected: (u32, u32, u32)) {
    let found = mapping(&a, &b);
    check_map(&a, &b, &found);
    assert_eq!(triple(found.distance), expected);
    assert_eq!(found.proved, ALL);
}

#[test]
fn small_budgets_are_kept_and_prove_nothing_wrong() {
    for seed in 0..60 {
        let mut numbers = Numbers::new(seed);
        let (a, b) = oracle::isomers(&mut numbers, 7);
        let least = oracle::least_distance(&a, &b);
        for steps in [0, 1, 30, 100, 300, 1000, 3000] {
            let found = map_atoms(&a, &b, &Effort { steps, stop: None }).expect("same elements");
            check_map(&a, &b, &found);
            assert!(found.bonds_at_least <= least.bonds);
            assert!(found.steps < steps + 2000);
            assert!(!found.proved.bonds || found.distance.bonds == least.bonds);
            assert!(!found.proved.orders || found.distance.orders == least.orders);
            assert!(!found.proved.hydrogens || found.distance.hydrogens == least.hydrogens);
        }
    }
}

#[test]
fn a_raised_flag_ends_the_search() {
    let mut numbers = Numbers::new(5);
    let (a, b) = oracle::isomers(&mut numbers, 40);
    let stop = AtomicBool::new(true);
    let effort = Effort {
        stop: Some(&stop),
        ..Effort::default()
    };
    let found = map_atoms(&a, &b, &effort).expect("same elements");
    check_map(&a, &b, &found);
    assert!(!found.proved.bonds);
    assert!(found.steps < 50_000);
}

#[test]
fn refuses_what_cannot_be_mapped() {
    let chain = carbons(3, false);
    let refused = |other: &Side| map_atoms(&chain, other, &Effort::default()).unwrap_err();
    assert_eq!(refused(&carbons(4, false)), MappingError::ElementsDiffer);
    let mut other = chain.clone();
    other.elements[0] = 8;
    assert_eq!(refused(&other), MappingError::ElementsDiffer);
    let mut other = chain.clone();
    other.marks.pop();
    assert!(matches!(
        refused(&other),
        MappingError::UnequalLists { marks: 2, .. }
    ));
    for bond in [(0, 3, 1), (1, 1, 1), (1, 0, 2)] {
        let mut other = chain.clone();
        other.bonds.push(bond);
        assert!(
            matches!(refused(&other), MappingError::BadBond { .. }),
            "{bond:?}"
        );
    }
}
