//! Marks from drawings.

use molkin_graph::{Ligand, Parity, Polyhedron, Shape};
use rstest::rstest;

use super::{Record, Spot, codes, draw, draw_solid, read};

/// A point at a distance of 1.5 in a direction in degrees.
fn at(angle: f64) -> (f64, f64) {
    let (sine, cosine) = angle.to_radians().sin_cos();
    (1.5 * cosine, 1.5 * sine)
}

/// CFClBr(+I) with its ligands in these directions and stereo codes.
fn centre(turn: f64, bonds: &[(f64, u8)]) -> String {
    let mut atoms: Vec<Spot<'_>> = vec![("C", 0.0, 0.0)];
    let mut lines = Vec::new();
    for (&(angle, code), (symbol, to)) in
        bonds.iter().zip([("F", 2), ("Cl", 3), ("Br", 4), ("I", 5)])
    {
        let (x, y) = at(angle + turn);
        atoms.push((symbol, x, y));
        lines.push((1, to, 1, code));
    }
    draw(&atoms, &lines)
}

/// The parity is that of (H, F, Cl, Br), or of (F, Cl, Br, I).
#[rstest]
#[case::three_and_hydrogen(&[(90.0, 1), (210.0, 0), (330.0, 0)], Parity::Odd)]
#[case::the_same_hashed(&[(90.0, 6), (210.0, 0), (330.0, 0)], Parity::Even)]
#[case::another_bond_wedged(&[(90.0, 0), (210.0, 1), (330.0, 0)], Parity::Odd)]
#[case::two_wedges(&[(90.0, 1), (210.0, 1), (330.0, 0)], Parity::Odd)]
#[case::four_one_wedge(&[(90.0, 1), (200.0, 0), (270.0, 0), (340.0, 0)], Parity::Even)]
#[case::four_one_hash(&[(90.0, 6), (200.0, 0), (270.0, 0), (340.0, 0)], Parity::Odd)]
#[case::wedge_and_hash(&[(30.0, 0), (150.0, 0), (250.0, 1), (290.0, 6)], Parity::Even)]
#[case::cross(&[(0.0, 1), (90.0, 0), (180.0, 1), (270.0, 0)], Parity::Even)]
fn tetrahedral_parity(
    #[case] bonds: &[(f64, u8)],
    #[case] expected: Parity,
    #[values(0.0, 37.0, 90.0, 181.0, 300.0)] turn: f64,
) {
    let record = read(&centre(turn, bonds));
    let [mark] = record.molecule.drawn_stereo() else {
        panic!("one mark")
    };
    assert_eq!(
        (mark.shape, mark.centres, mark.parity),
        (Shape::Tetrahedral, [0, 0], Some(expected))
    );
    let first = if bonds.len() == 3 {
        Ligand::Hydrogen
    } else {
        Ligand::Atom(1)
    };
    assert_eq!(mark.ligands[0], first);
}

#[rstest]
#[case::t_shaped(&[(90.0, 1), (0.0, 0), (180.0, 0)], "wedges-t-shaped")]
#[case::one_sided(&[(0.0, 1), (60.0, 0), (-60.0, 0)], "wedges-one-sided")]
#[case::contradictory(&[(90.0, 1), (210.0, 6), (330.0, 0)], "wedges-contradictory")]
#[case::overlapping(&[(90.0, 1), (91.0, 0), (330.0, 0)], "bonds-overlap")]
#[case::opposite(&[(0.0, 1), (90.0, 0), (180.0, 6), (270.0, 0)], "wedges-ambiguous")]
#[case::all_wedged(&[(0.0, 1), (90.0, 1), (180.0, 1), (270.0, 1)], "wedges-ambiguous")]
fn unclear_wedges_say_nothing(#[case] bonds: &[(f64, u8)], #[case] code: &str) {
    let record = read(&centre(0.0, bonds));
    assert_eq!(codes(&record), [code]);
    assert_eq!(record.molecule.drawn_stereo()[0].parity, None);
}

#[test]
fn a_wavy_bond_cancels_the_wedges_of_its_centre() {
    let record = read(&centre(0.0, &[(90.0, 1), (210.0, 4), (330.0, 0)]));
    assert_eq!(record.molecule.drawn_stereo()[0].parity, None);
    assert!(record.notes.is_empty());
}

/// The wide end of a wedge says nothing about its atom.
#[test]
fn only_the_narrow_end_counts() {
    let text = draw(
        &[
            ("C", 0.0, 0.0),
            ("F", 0.0, 1.5),
            ("Cl", -1.3, -0.75),
            ("Br", 1.3, -0.75),
        ],
        &[(2, 1, 1, 1), (1, 3, 1, 0), (1, 4, 1, 0)],
    );
    let record = read(&text);
    assert!(record.molecule.drawn_stereo().is_empty());
    assert_eq!(codes(&record), ["stereo-bond-ignored"]);
}

/// Sulfoxide: the lone pair is the fourth ligand, and the double bond to oxygen is no obstacle.
#[test]
fn a_lone_pair_is_a_ligand() {
    let text = draw(
        &[
            ("S", 0.0, 0.0),
            ("O", 0.0, 1.5),
            ("C", -1.3, -0.75),
            ("C", 1.3, -0.75),
            ("C", 2.6, 0.0),
        ],
        &[(1, 2, 2, 0), (1, 3, 1, 1), (1, 4, 1, 0), (4, 5, 1, 0)],
    );
    let record = read(&text);
    let [mark] = record.molecule.drawn_stereo() else {
        panic!("one mark")
    };
    assert_eq!(
        mark.ligands,
        [
            Ligand::LonePair,
            Ligand::Atom(1),
            Ligand::Atom(2),
            Ligand::Atom(3)
        ]
    );
    assert_eq!(mark.parity, Some(Parity::Odd));
}

/// CHFClBr in space: the same handedness as drawn with F towards the reader.
#[rstest]
#[case::as_drawn(1.0, Parity::Odd)]
#[case::mirrored(-1.0, Parity::Even)]
fn centres_in_space(#[case] depth: f64, #[case] expected: Parity) {
    let atoms = [
        ("C", 0.0, 0.0, 0.0),
        ("F", 0.0, 0.9, 1.0 * depth),
        ("Cl", -1.3, -0.75, 0.1),
        ("Br", 1.3, -0.75, 0.1),
    ];
    let record = read(&draw_solid(
        &atoms,
        &[(1, 2, 1, 0), (1, 3, 1, 0), (1, 4, 1, 0)],
        "",
    ));
    assert_eq!(record.molecule.drawn_stereo()[0].parity, Some(expected));
}

/// Methyl hydrogens, an amine and a flat cation in space make no marks.
#[test]
fn what_is_no_centre_in_space() {
    let atoms = [
        ("N", 0.0, 0.0, 0.4),
        ("C", 0.0, 1.4, 0.0),
        ("C", -1.2, -0.7, 0.0),
        ("F", 1.2, -0.7, 0.0),
        ("H", -1.2, -0.7, 1.0),
        ("H", -2.2, -0.7, 0.0),
    ];
    let bonds = [
        (1, 2, 1, 0),
        (1, 3, 1, 0),
        (1, 4, 1, 0),
        (3, 5, 1, 0),
        (3, 6, 1, 0),
    ];
    assert!(
        read(&draw_solid(&atoms, &bonds, ""))
            .molecule
            .drawn_stereo()
            .is_empty()
    );
}

/// 2-Fluorobut-2-ene in pieces: F and C at one end, C at the other.
#[rstest]
#[case::cis((-0.75, 1.3), (2.25, 1.3), 0, Some(Parity::Even))]
#[case::trans((-0.75, 1.3), (2.25, -1.3), 0, Some(Parity::Odd))]
#[case::crossed((-0.75, 1.3), (2.25, 1.3), 3, None)]
fn double_bonds(
    #[case] first: (f64, f64),
    #[case] last: (f64, f64),
    #[case] code: u8,
    #[case] expected: Option<Parity>,
) {
    let atoms = [
        ("C", 0.0, 0.0),
        ("C", 1.5, 0.0),
        ("F", first.0, first.1),
        ("Cl", last.0, last.1),
    ];
    let record = read(&draw(
        &atoms,
        &[(1, 2, 2, code), (1, 3, 1, 0), (2, 4, 1, 0)],
    ));
    let [mark] = record.molecule.drawn_stereo() else {
        panic!("one mark")
    };
    assert_eq!(
        (mark.shape, mark.centres, mark.parity),
        (Shape::DoubleBond, [0, 1], expected)
    );
    assert_eq!(
        mark.ligands,
        [
            Ligand::Atom(2),
            Ligand::Hydrogen,
            Ligand::Atom(3),
            Ligand::Hydrogen
        ]
    );
    assert!(record.notes.is_empty());
}

#[test]
fn a_ligand_in_line_with_the_double_bond_shows_no_side() {
    let atoms = [
        ("C", 0.0, 0.0),
        ("N", 1.5, 0.0),
        ("F", -0.75, 1.3),
        ("O", 3.0, 0.05),
    ];
    let record = read(&draw(&atoms, &[(1, 2, 2, 0), (1, 3, 1, 0), (2, 4, 1, 0)]));
    assert_eq!(record.molecule.drawn_stereo()[0].parity, None);
    assert_eq!(
        record.molecule.drawn_stereo()[0].ligands[3],
        Ligand::LonePair
    );
    assert_eq!(codes(&record), ["double-bond-unclear"]);
}

/// A wavy bond from the double bond's own end, and one from a methyl group.
#[rstest]
#[case::starts_there((1, 3))]
#[case::ends_there((3, 1))]
fn a_wavy_bond_beside_a_double_bond(#[case] (from, to): (usize, usize)) {
    let atoms = [
        ("C", 0.0, 0.0),
        ("C", 1.5, 0.0),
        ("C", -0.75, 1.3),
        ("Cl", 2.25, 1.3),
    ];
    let record = read(&draw(
        &atoms,
        &[(1, 2, 2, 0), (from, to, 1, 4), (2, 4, 1, 0)],
    ));
    let marks = record.molecule.drawn_stereo();
    assert_eq!((marks.len(), marks[0].parity), (1, None));
}

/// Double bonds that have no geometry to show: C=O, =CH2, and those of small rings.
#[rstest]
#[case::carbonyl(&[("C", 0.0, 0.0), ("O", 1.5, 0.0), ("F", -0.75, 1.3)], &[(1, 2, 2, 0), (1, 3, 1, 0)])]
#[case::methylene(&[("C", 0.0, 0.0), ("C", 1.5, 0.0), ("F", -0.75, 1.3)], &[(1, 2, 2, 0), (1, 3, 1, 0)])]
#[case::imine_hydrogen(&[("C", 0.0, 0.0), ("N", 1.5, 0.0), ("F", -0.75, 1.3)], &[(1, 2, 2, 0), (1, 3, 1, 0)])]
#[case::cyclobutene(
    &[("C", 0.0, 0.0), ("C", 1.5, 0.0), ("C", 1.5, 1.5), ("C", 0.0, 1.5)],
    &[(1, 2, 2, 0), (2, 3, 1, 0), (3, 4, 1, 0), (4, 1, 1, 0)]
)]
fn no_geometry(#[case] atoms: &[Spot<'_>], #[case] bonds: &[(usize, usize, u8, u8)]) {
    assert!(read(&draw(atoms, bonds)).molecule.drawn_stereo().is_empty());
}

/// Without coordinates nothing is specified.
#[test]
fn no_coordinates() {
    let atoms = [
        ("C", 0.0, 0.0),
        ("F", 0.0, 0.0),
        ("Cl", 0.0, 0.0),
        ("Br", 0.0, 0.0),
    ];
    let record = read(&draw(&atoms, &[(1, 2, 1, 1), (1, 3, 1, 0), (1, 4, 1, 0)]));
    assert!(record.molecule.drawn_stereo().is_empty());
    assert_eq!(codes(&record), ["stereo-without-coordinates"]);
}

/// An allene from left to right. Seen from F, above the plane at the near end, Cl (below), Br and H
/// run clockwise where Br is on the left of the axis.
#[rstest]
#[case::wedge(1, 1.3, Some(Parity::Odd))]
#[case::hash(6, 1.3, Some(Parity::Even))]
#[case::other_side(1, -1.3, Some(Parity::Even))]
#[case::wavy(4, 1.3, None)]
fn allenes(#[case] code: u8, #[case] side: f64, #[case] expected: Option<Parity>) {
    let atoms = [
        ("C", 0.0, 0.0),
        ("C", 1.5, 0.0),
        ("C", 3.0, 0.0),
        ("F", -0.75, 1.3),
        ("Cl", -0.75, -1.3),
        ("Br", 3.75, side),
    ];
    let bonds = [
        (1, 2, 2, 0),
        (2, 3, 2, 0),
        (1, 4, 1, code),
        (1, 5, 1, 0),
        (3, 6, 1, 0),
    ];
    let record = read(&draw(&atoms, &bonds));
    let [mark] = record.molecule.drawn_stereo() else {
        panic!("one mark")
    };
    assert_eq!(
        (mark.shape, mark.centres, mark.parity),
        (Shape::Axis, [0, 2], expected)
    );
    assert_eq!(
        mark.ligands,
        [
            Ligand::Atom(3),
            Ligand::Atom(4),
            Ligand::Atom(5),
            Ligand::Hydrogen
        ]
    );
}

#[test]
fn an_allene_drawn_flat_and_plain_has_no_mark() {
    let atoms = [
        ("C", 0.0, 0.0),
        ("C", 1.5, 0.0),
        ("C", 3.0, 0.0),
        ("F", -0.75, 1.3),
        ("Br", 3.75, 1.3),
    ];
    let bonds = [(1, 2, 2, 0), (2, 3, 2, 0), (1, 4, 1, 0), (3, 5, 1, 0)];
    assert!(
        read(&draw(&atoms, &bonds))
            .molecule
            .drawn_stereo()
            .is_empty()
    );
}

/// Three double bonds in a row lie in one plane again.
#[test]
fn a_cumulene_of_three_is_a_long_double_bond() {
    let atoms = [
        ("C", 0.0, 0.0),
        ("C", 1.5, 0.0),
        ("C", 3.0, 0.0),
        ("C", 4.5, 0.0),
        ("F", -0.75, 1.3),
        ("Cl", 5.25, -1.3),
    ];
    let bonds = [
        (1, 2, 2, 0),
        (2, 3, 2, 0),
        (3, 4, 2, 0),
        (1, 5, 1, 0),
        (4, 6, 1, 0),
    ];
    let record = read(&draw(&atoms, &bonds));
    let [mark] = record.molecule.drawn_stereo() else {
        panic!("one mark")
    };
    assert_eq!((mark.shape, mark.centres), (Shape::DoubleBond, [0, 3]));
    assert_eq!(mark.parity, Some(Parity::Odd));
}

/// FC(=O)C(=S)Cl with stereo codes for the bonds to F and Cl.
fn hindered(wedges: [u8; 2]) -> Record {
    let atoms = [
        ("C", 0.0, 0.0),
        ("C", 1.5, 0.0),
        ("O", -0.75, 1.3),
        ("F", -0.75, -1.3),
        ("S", 2.25, 1.3),
        ("Cl", 2.25, -1.3),
    ];
    let bonds = [
        (1, 2, 1, 0),
        (1, 3, 2, 0),
        (1, 4, 1, wedges[0]),
        (2, 5, 2, 0),
        (2, 6, 1, wedges[1]),
    ];
    read(&draw(&atoms, &bonds))
}

/// A wedge at an unsaturated atom stands that end of the axis upright; wedges at both ends must
/// agree. The ligands are O, F, S, Cl.
#[rstest]
#[case::towards([1, 0], Some(Parity::Even))]
#[case::away([6, 0], Some(Parity::Odd))]
#[case::other_end([0, 1], Some(Parity::Odd))]
#[case::contrary_on_one_side([1, 6], Some(Parity::Even))]
#[case::alike_on_one_side([1, 1], None)]
#[case::unknown([4, 0], None)]
fn hindered_axes(#[case] wedges: [u8; 2], #[case] expected: Option<Parity>) {
    let record = hindered(wedges);
    let [mark] = record.molecule.drawn_stereo() else {
        panic!("one mark, {:?}", codes(&record))
    };
    assert_eq!((mark.shape, mark.centres), (Shape::Axis, [0, 1]));
    assert_eq!(mark.ligands, [2, 3, 4, 5].map(Ligand::Atom));
    assert_eq!(mark.parity, expected);
    let unclear = wedges == [1, 1];
    assert_eq!(codes(&record).contains(&"axis-unclear"), unclear);
}

/// The same axis in space: the end with O and F is turned by a quarter, F nearer to the reader. It
/// is read only because a wedge says that rotation is hindered.
#[rstest]
#[case(1, Some(Parity::Even))]
#[case(0, None)]
fn hindered_axes_in_space(#[case] wedge: u8, #[case] expected: Option<Parity>) {
    let atoms = [
        ("C", 0.0, 0.0, 0.0),
        ("C", 1.5, 0.0, 0.0),
        ("O", -0.75, 0.0, -1.3),
        ("F", -0.75, 0.0, 1.3),
        ("S", 2.25, 1.3, 0.0),
        ("Cl", 2.25, -1.3, 0.0),
    ];
    let bonds = [
        (1, 2, 1, 0),
        (1, 3, 2, 0),
        (1, 4, 1, wedge),
        (2, 5, 2, 0),
        (2, 6, 1, 0),
    ];
    let record = read(&draw_solid(&atoms, &bonds, ""));
    let marks = record.molecule.drawn_stereo();
    assert_eq!(marks.first().map(|mark| mark.parity), expected.map(Some));
}

/// Platinum in space with two Cl and two Br; the Cl opposite to each other.
#[test]
fn a_square_metal_in_space() {
    let atoms = [
        ("Pt", 0.0, 0.0, 0.0),
        ("Cl", 2.3, 0.0, 0.1),
        ("Cl", -2.3, 0.0, 0.0),
        ("Br", 0.0, 2.4, 0.0),
        ("Br", 0.0, -2.4, 0.0),
    ];
    let bonds = [(1, 2, 1, 0), (1, 3, 1, 0), (1, 4, 1, 0), (1, 5, 1, 0)];
    let record = read(&draw_solid(&atoms, &bonds, ""));
    let [mark] = record.molecule.drawn_coordination() else {
        panic!("one arrangement, {:?}", codes(&record))
    };
    assert_eq!(
        (mark.polyhedron, mark.centre),
        (Polyhedron::SquarePlanar, 0)
    );
    let place = |atom| {
        mark.ligands
            .iter()
            .position(|&ligand| ligand == Ligand::Atom(atom))
    };
    assert_eq!(place(1).unwrap().abs_diff(place(2).unwrap()), 2);
    assert!(record.molecule.drawn_stereo().is_empty());
}

/// Wedges at a metal make no tetrahedron of it, and a flat drawing says no more.
#[test]
fn wedges_at_a_metal_are_noted() {
    let atoms = [
        ("Pt", 0.0, 0.0),
        ("Cl", 1.5, 0.5),
        ("Cl", -1.5, 0.5),
        ("N", 1.5, -0.5),
        ("N", -1.5, -0.5),
    ];
    let bonds = [(1, 2, 1, 6), (1, 3, 1, 6), (1, 4, 1, 1), (1, 5, 1, 1)];
    let record = read(&draw(&atoms, &bonds));
    assert!(record.molecule.drawn_stereo().is_empty());
    assert!(record.molecule.drawn_coordination().is_empty());
    assert_eq!(codes(&record), ["metal-wedges-ignored"]);
}

/// Norbornane-like bridgehead: all three ring bonds on one side and the bridge wedged.
#[test]
fn a_bridgehead_may_have_all_bonds_on_one_side() {
    let atoms = [
        ("C", -1.5, 0.0),
        ("C", -0.75, 1.3),
        ("C", 0.75, 1.3),
        ("C", 1.5, 0.0),
        ("C", 0.75, -1.3),
        ("O", -0.75, -1.3),
        ("C", 0.0, 0.0),
    ];
    let bonds = [
        (1, 2, 1, 0),
        (2, 3, 1, 0),
        (3, 4, 1, 0),
        (4, 5, 1, 0),
        (5, 6, 1, 0),
        (6, 1, 1, 0),
        (1, 7, 1, 1),
        (4, 7, 1, 1),
    ];
    let record = read(&draw(&atoms, &bonds));
    assert!(record.notes.is_empty());
    assert!(
        record
            .molecule
            .drawn_stereo()
            .iter()
            .all(|mark| mark.parity.is_some())
    );
    assert_eq!(record.molecule.drawn_stereo().len(), 2);
}

#[test]
fn an_unset_chiral_flag_is_noted() {
    let text = centre(0.0, &[(90.0, 1), (210.0, 0), (330.0, 0)]);
    let text = text.replace("  4  3  0  0  1", "  4  3  0  0  0");
    let record = read(&text);
    assert_eq!(codes(&record), ["chiral-flag-unset"]);
    assert_eq!(record.notes[0].atoms, [0]);
}
