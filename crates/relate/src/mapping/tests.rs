use std::sync::atomic::AtomicBool;

use rstest::rstest;

use super::{
    Arm, Arrangement, Distance, Effort, Mapping, MappingError, Proved, Side, map_atoms,
    oracle::{self, Numbers},
};

const ALL: Proved = Proved {
    bonds: true,
    orders: true,
    hydrogens: true,
};

fn mapping(a: &Side, b: &Side) -> Mapping {
    map_atoms(a, b, &Effort::default()).expect("simple graphs")
}

/// (i) to (iii) of a distance.
fn triple(distance: Distance) -> (u32, u32, u32) {
    (distance.bonds, distance.orders, distance.hydrogens)
}

/// Checks that the map keeps elements, leaves no atom over without need, and has the distance that it states.
#[track_caller]
fn check_map(a: &Side, b: &Side, mapping: &Mapping) {
    let pairs = mapping.pairs.iter();
    let mut sources: Vec<u32> = pairs.clone().map(|pair| pair.0).collect();
    let mut targets: Vec<u32> = pairs.clone().map(|pair| pair.1).collect();
    assert!(sources.is_sorted() && mapping.left_over_a.is_sorted());
    sources.extend(&mapping.left_over_a);
    targets.extend(&mapping.left_over_b);
    sources.sort_unstable();
    targets.sort_unstable();
    assert!((0..a.elements.len() as u32).eq(sources), "each atom once");
    assert!((0..b.elements.len() as u32).eq(targets), "each atom once");
    let element = |side: &Side, atom: u32| side.elements[atom as usize];
    for &(atom, image) in &mapping.pairs {
        assert_eq!(element(a, atom), element(b, image));
    }
    for &atom in &mapping.left_over_a {
        let could_be = |&other: &u32| element(b, other) == element(a, atom);
        assert!(!mapping.left_over_b.iter().any(could_be));
    }
    assert_eq!(distance(a, b, &mapping.pairs), mapping.distance);
    assert_eq!(mapping.all_bonds as usize, a.bonds.len() + b.bonds.len());
}

/// The distance of a map, counted bond by bond.
fn distance(a: &Side, b: &Side, pairs: &[(u32, u32)]) -> Distance {
    let class = |x: u32, y: u32| {
        let bond = b
            .bonds
            .iter()
            .find(|&&(s, t, _)| (s, t) == (x, y) || (t, s) == (x, y));
        bond.map(|bond| bond.2)
    };
    let image = |atom: u32| pairs.iter().find(|pair| pair.0 == atom).map(|pair| pair.1);
    let mut found = Distance::default();
    let mut kept = 0;
    for &(first, second, order) in &a.bonds {
        let images = image(first).zip(image(second));
        if let Some(other) = images.and_then(|(x, y)| class(x, y)) {
            kept += 1;
            found.orders += u32::from(other != order);
        }
    }
    found.bonds = (a.bonds.len() + b.bonds.len()) as u32 - 2 * kept;
    for &(x, y) in pairs {
        let (x, y) = (x as usize, y as usize);
        found.hydrogens += u32::from(a.hydrogens[x].abs_diff(b.hydrogens[y]));
        found.marks += u32::from(a.marks[x] != b.marks[y]);
    }
    found
}

/// The pairs of the inverse map.
fn turned(mapping: &Mapping) -> Vec<(u32, u32)> {
    let mut pairs: Vec<(u32, u32)> = mapping.pairs.iter().map(|&(x, y)| (y, x)).collect();
    pairs.sort_unstable();
    pairs
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
fn equals_brute_force_where_atoms_are_left_over() {
    let mut left_over = 0;
    for seed in 0..700 {
        let mut numbers = Numbers::new(seed);
        let (a, b) = oracle::relatives(&mut numbers, 7);
        let (found, back) = (mapping(&a, &b), mapping(&b, &a));
        let least = oracle::least_distance(&a, &b);
        check_map(&a, &b, &found);
        assert_eq!(
            triple(found.distance),
            triple(least),
            "seed {seed}: {a:?} {b:?}"
        );
        assert_eq!(found.proved, ALL, "seed {seed}");
        assert_eq!(turned(&back), found.pairs, "seed {seed}");
        assert_eq!(back.left_over_a, found.left_over_b, "seed {seed}");
        left_over += usize::from(!found.left_over_a.is_empty() && !found.left_over_b.is_empty());
    }
    assert!(left_over > 200, "{left_over}");
}

#[test]
fn exchanged_sides_give_the_inverse() {
    for seed in 0..200 {
        let mut numbers = Numbers::new(seed);
        let atoms = 3 + numbers.below(14);
        let (a, b) = oracle::isomers(&mut numbers, atoms);
        let (there, back) = (mapping(&a, &b), mapping(&b, &a));
        assert_eq!(there.pairs, turned(&back), "seed {seed}");
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
        ..Side::default()
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
        ..Side::default()
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

/// A ring of five carbons with an atom of another element on it.
fn halogen(element: u8) -> Side {
    let mut side = carbons(5, true);
    side.elements.push(element);
    side.hydrogens.push(0);
    side.marks.push(0);
    side.bonds.push((2, 5, 1));
    side
}

#[rstest]
#[case::one_carbon_more(carbons(7, false), carbons(8, false), (1, 0, 0), 0, 1)]
#[case::ring_of_one_more(carbons(6, true), carbons(7, true), (3, 0, 0), 0, 1)]
#[case::another_halogen(halogen(17), halogen(35), (2, 0, 0), 1, 1)]
#[case::one_halogen_less(halogen(17), carbons(5, true), (1, 0, 0), 1, 0)]
#[case::nothing_on_one_side(carbons(3, false), carbons(0, false), (2, 0, 0), 3, 0)]
#[case::nothing_alike(star(3, 1), carbons(4, false), (6, 0, 0), 4, 4)]
fn relatives(
    #[case] a: Side,
    #[case] b: Side,
    #[case] expected: (u32, u32, u32),
    #[case] left_over_a: usize,
    #[case] left_over_b: usize,
) {
    let found = mapping(&a, &b);
    check_map(&a, &b, &found);
    assert_eq!(triple(found.distance), expected);
    assert_eq!(found.proved, ALL);
    assert_eq!(found.left_over_a.len(), left_over_a);
    assert_eq!(found.left_over_b.len(), left_over_b);
}

/// Two rings of three on one side, a ring of three and a chain on the other: opening a ring costs one bond either way, and
/// the ring that is kept lies on the ring.
#[test]
fn rings_stay_whole() {
    let mut a = carbons(8, false);
    a.bonds.extend([(0, 2, 1), (5, 7, 1)]);
    let mut b = carbons(8, false);
    b.bonds.push((0, 2, 1));
    let found = mapping(&a, &b);
    check_map(&a, &b, &found);
    assert_eq!(found.distance.bonds, 1);
    let ring: Vec<u32> = found
        .pairs
        .iter()
        .filter(|pair| pair.1 < 3)
        .map(|pair| pair.0)
        .collect();
    assert!(ring == [0, 1, 2] || ring == [5, 6, 7], "{ring:?}");
}

/// A chain of eight carbons whose end was moved inwards. Either end may be the one that moved; the group stays whole, on
/// the chain or on what moved.
#[rstest]
#[case::on_the_chain([0, 1])]
#[case::on_the_branch([6, 7])]
fn functional_groups_stay_whole(#[case] group: [u32; 2]) {
    let mut a = carbons(8, false);
    a.groups = vec![1, 1, 0, 0, 0, 0, 0, 0];
    let mut b = carbons(6, false);
    b.elements.extend([6, 6]);
    b.hydrogens.extend([2, 2]);
    b.marks.extend([0, 0]);
    b.bonds.extend([(2, 6, 1), (6, 7, 1)]);
    b.groups = (0..8)
        .map(|atom| u32::from(group.contains(&atom)))
        .collect();
    let found = mapping(&a, &b);
    check_map(&a, &b, &found);
    assert_eq!(found.distance.bonds, 2);
    let images: Vec<u32> = found.pairs[..2].iter().map(|pair| pair.1).collect();
    assert!(
        images.iter().all(|image| group.contains(image)),
        "{images:?}"
    );
}

/// A ring of six with centres 0 and 3, bearing atoms 6 and 7; the two halves of the ring are alike.
fn ring_with_two_centres(odd: [bool; 2]) -> Side {
    let mut side = carbons(6, true);
    side.elements.extend([8, 8]);
    side.hydrogens.extend([1, 1]);
    side.marks.extend([0, 0]);
    side.bonds.extend([(0, 6, 1), (3, 7, 1)]);
    let centre = |atom: u32, arms: [u32; 3], odd| Arrangement {
        centres: [atom; 2],
        arms: [
            Arm::Atom(arms[0]),
            Arm::Atom(arms[1]),
            Arm::Atom(arms[2]),
            Arm::Hydrogen(0),
        ],
        odd,
    };
    side.stereo = vec![centre(0, [1, 5, 6], odd[0]), centre(3, [2, 4, 7], odd[1])];
    side.symmetries = vec![
        vec![(1, 5), (2, 4), (4, 2), (5, 1)],
        vec![
            (0, 3),
            (1, 2),
            (2, 1),
            (3, 0),
            (4, 5),
            (5, 4),
            (6, 7),
            (7, 6),
        ],
    ];
    side
}

/// The halves of the ring are laid on each other so that both centres are kept, where that is possible.
#[rstest]
#[case::as_drawn([false, false], [false, false], true)]
#[case::turned([false, false], [true, true], true)]
#[case::cis_and_trans([false, false], [false, true], false)]
fn stereo_elements_are_kept(#[case] of_a: [bool; 2], #[case] of_b: [bool; 2], #[case] kept: bool) {
    let (a, mut b) = (ring_with_two_centres(of_a), ring_with_two_centres(of_b));
    // One more carbon, so that the two are not the same.
    b.elements.push(6);
    b.hydrogens.push(3);
    b.marks.push(0);
    b.bonds.push((7, 8, 1));
    b.symmetries.pop();
    let found = mapping(&a, &b);
    assert_eq!(found.distance.bonds, 1);
    let image: Vec<u32> = found.pairs.iter().map(|pair| pair.1).collect();
    let disturbed = super::arrangement::disturbed(&a.stereo, &b.stereo, &image);
    assert_eq!(disturbed == 0, kept, "{image:?}");
}

#[test]
fn arrangements_follow_their_arms() {
    let arms = [Arm::Atom(1), Arm::Atom(2), Arm::Atom(3), Arm::Hydrogen(0)];
    let own = Arrangement {
        centres: [0; 2],
        arms,
        odd: false,
    };
    let exchanged = Arrangement {
        arms: [arms[1], arms[0], arms[2], arms[3]],
        odd: true,
        ..own
    };
    let inverted = Arrangement { odd: true, ..own };
    let identity = [0, 1, 2, 3];
    let disturbed = |other| super::arrangement::disturbed(&[own], &[other], &identity);
    assert_eq!(
        (disturbed(own), disturbed(exchanged), disturbed(inverted)),
        (0, 0, 2)
    );
    // Cis on either side of a double bond, its ends exchanged by the map.
    let ends = [
        Arm::Atom(2),
        Arm::Hydrogen(0),
        Arm::Atom(3),
        Arm::Hydrogen(0),
    ];
    let bond = Arrangement {
        centres: [0, 1],
        arms: ends,
        odd: false,
    };
    assert_eq!(
        super::arrangement::disturbed(&[bond], &[bond], &[1, 0, 3, 2]),
        0
    );
}

#[rstest]
#[case::near(carbons(9, true), carbons(9, false), Some(false))]
#[case::same(carbons(9, true), carbons(9, true), Some(false))]
#[case::far(star(6, 1), carbons(7, false), Some(true))]
#[case::ring_of_three(carbons(3, true), carbons(3, false), Some(false))]
#[case::few_bonds(star(3, 1), carbons(4, false), Some(false))]
fn unrelated_beyond_a_third(#[case] a: Side, #[case] b: Side, #[case] expected: Option<bool>) {
    assert_eq!(mapping(&a, &b).is_unrelated(), expected);
}

#[test]
fn too_little_search_leaves_open_whether_unrelated() {
    let mut numbers = Numbers::new(11);
    let (a, b) = oracle::isomers(&mut numbers, 30);
    let effort = Effort {
        steps: 0,
        stop: None,
    };
    let found = map_atoms(&a, &b, &effort).expect("simple graphs");
    assert!(
        3 * found.distance.bonds >= found.all_bonds,
        "{:?}",
        found.distance
    );
    assert_eq!(found.is_unrelated(), None);
}

#[test]
fn refuses_what_cannot_be_mapped() {
    let chain = carbons(3, false);
    let refused = |other: &Side| map_atoms(&chain, other, &Effort::default()).unwrap_err();
    let mut other = chain.clone();
    other.marks.pop();
    assert!(matches!(
        refused(&other),
        MappingError::UnequalLists { marks: 2, .. }
    ));
    let mut other = chain.clone();
    other.symmetries = vec![vec![(0, 3), (3, 0)]];
    assert!(matches!(
        refused(&other),
        MappingError::NoSuchAtom { atom: 3 }
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
