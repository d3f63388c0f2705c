//! Summaries of stereo relations. Terms by the IUPAC Basic Terminology of Stereochemistry (1996); the
//! labels were worked out by hand.

use molkin_formats::smiles;
use molkin_graph::{
    DrawnStereo, GroupKind, Limits, Molecule, MoleculeBuilder, Orderer, StereoGroup,
};
use rstest::rstest;

use crate::{Structure, explain, relate};

use super::summary;

/// The molecule of a SMILES with its marks in stereo groups.
fn grouped(text: &str, groups: &[(GroupKind, &[u32])]) -> Molecule {
    let molecule = smiles::parse(text).unwrap();
    let mut builder = MoleculeBuilder::new();
    for atom in molecule.atoms() {
        builder.add_atom(*atom);
    }
    for (a, b, order) in molecule.bonds() {
        builder.add_bond(a, b, order).unwrap();
    }
    for mark in molecule.drawn_stereo() {
        builder.add_stereo(DrawnStereo { ..*mark });
    }
    for &(kind, atoms) in groups {
        let atoms = atoms.to_vec();
        builder.add_group(StereoGroup { kind, atoms });
    }
    builder.build().unwrap()
}

/// The whole summary.
fn told(a: Molecule, b: Molecule) -> String {
    let limits = Limits::default();
    let mut orderer = Orderer::new(limits);
    let [a, b] = [a, b].map(|molecule| Structure::new(&mut orderer, molecule).unwrap());
    let verdict = relate(&mut orderer, &a, &b).unwrap();
    let explanation = explain(&a, &b, verdict.relation, &limits);
    summary([&a, &b], &verdict, None, None, Some(&explanation))
}

#[rstest]
#[case::one_centre(
    "C[C@H](N)C(=O)O",
    "C[C@@H](N)C(=O)O",
    "Enantiomers: mirror images that do not coincide; the only stereocentre is inverted: C2 (S in A, R in B)."
)]
#[case::two_centres(
    "OC(=O)[C@@H](O)[C@H](O)C(=O)O",
    "OC(=O)[C@H](O)[C@@H](O)C(=O)O",
    "Enantiomers: mirror images that do not coincide; both stereocentres are inverted: C4 (S in A, R in B); C6 (S in A, R in B)."
)]
#[case::other_numbers(
    "C[C@H](N)C(=O)O",
    "OC(=O)[C@H](N)C",
    "Enantiomers: mirror images that do not coincide; the only stereocentre is inverted: C2 in A (S), C4 in B (R)."
)]
#[case::many_centres(
    "O=C[C@H](O)[C@@H](O)[C@H](O)[C@H](O)CO",
    "O=C[C@@H](O)[C@H](O)[C@@H](O)[C@@H](O)CO",
    "Enantiomers: mirror images that do not coincide; all 4 stereocentres are inverted."
)]
#[case::axis(
    "CC=[C@]=CC",
    "CC=[C@@]=CC",
    "Enantiomers: mirror images that do not coincide; the only stereogenic axis is inverted: C2…C4 (M in A, P in B)."
)]
#[case::beside_an_achiral_ring(
    "C[C@H](O)[C@H]1CC[C@H](C)CC1",
    "C[C@@H](O)[C@H]1CC[C@H](C)CC1",
    "Enantiomers: mirror images that do not coincide; 1 of 3 stereocentres is inverted: C2 (S in A, R in B). Under the atom map the others agree."
)]
#[case::epimers(
    "O=C[C@H](O)[C@@H](O)[C@H](O)[C@H](O)CO",
    "O=C[C@@H](O)[C@@H](O)[C@H](O)[C@H](O)CO",
    "Diastereomers (epimers): 1 of 4 stereocentres is inverted: C3 (R in A, S in B)."
)]
#[case::epimers_whose_middle_centre_lapses(
    "OC[C@H](O)[C@H](O)[C@H](O)CO",
    "OC[C@@H](O)[C@H](O)[C@H](O)CO",
    "Diastereomers (epimers): 1 of 2 stereocentres is inverted: C3 (S in A, R in B). C5 is not stereogenic in B."
)]
#[case::epimers_with_an_open_centre(
    "O=CC(O)[C@@H](O)[C@H](O)[C@H](O)CO",
    "O=CC(O)[C@@H](O)[C@H](O)[C@@H](O)CO",
    "Diastereomers (epimers): 1 of 3 stereocentres is inverted: C9 (R in A, S in B). Open in both: C3."
)]
#[case::across_a_ring(
    "C[C@H]1CC[C@@H](O)CC1",
    "C[C@H]1CC[C@H](O)CC1",
    "Diastereomers (epimers, cis/trans on the ring): 1 of 2 stereocentres is inverted: C5 (s in A, r in B)."
)]
#[case::two_of_four(
    "O=C[C@H](O)[C@@H](O)[C@H](O)[C@H](O)CO",
    "O=C[C@@H](O)[C@H](O)[C@H](O)[C@H](O)CO",
    "Diastereomers: stereoisomers but not mirror images; 2 of 4 stereocentres are inverted: C3 (R in A, S in B); C5 (S in A, R in B)."
)]
#[case::double_bond(
    "C/C=C/C=C/CC",
    "C/C=C/C=C\\CC",
    "Diastereomers (cis/trans isomers): 1 of 2 double bonds is of opposite geometry: C4=C5 (E in A, Z in B)."
)]
#[case::centre_and_double_bond(
    "C/C=C/[C@H](O)CC",
    "C/C=C\\[C@@H](O)CC",
    "Diastereomers: stereoisomers but not mirror images; both stereo elements are inverted: C2=C3 (E in A, Z in B); C4 (R in A, S in B)."
)]
#[case::open_on_either_side(
    "C[C@H](O)C(N)CC",
    "CC(O)[C@H](N)CC",
    "Undetermined: the same connectivity; as marked, the two may or may not be the same stereoisomer. Marked in A, open in B: C2 (S). Open in A, marked in B: C4 (R)."
)]
#[case::square_planar(
    "N[Pt@SP1](N)(Cl)Cl",
    "N[Pt@SP2](N)(Cl)Cl",
    "Diastereomers: the same connectivity, a different arrangement in space, and not mirror images. One stereo element differs."
)]
fn summaries(#[case] a: &str, #[case] b: &str, #[case] expected: &str) {
    let [a, b] = [a, b].map(|text| smiles::parse(text).unwrap());
    assert_eq!(told(a, b), expected);
}

const AND: GroupKind = GroupKind::And;
const OR: GroupKind = GroupKind::Or;

#[rstest]
#[case::racemate("C[C@H](O)[C@@H](N)CC", &[(AND, &[1, 3][..])], "C[C@H](O)[C@@H](N)CC", &[],
    "A is a mixture of both enantiomers (AND group 1); B is one of them.")]
#[case::racemate_second("C[C@H](O)[C@@H](N)CC", &[], "C[C@H](O)[C@@H](N)CC", &[(AND, &[1, 3][..])],
    "B is a mixture of both enantiomers (AND group 1); A is one of them.")]
#[case::epimeric_mixture("C[C@H](O)[C@@H](N)CC", &[(AND, &[1][..])], "C[C@H](O)[C@@H](N)CC", &[],
    "A is a mixture of both arrangements of AND group 1; B is one of them.")]
#[case::one_hand_unknown("C[C@H](N)C(=O)O", &[(OR, &[1][..])], "C[C@H](N)C(=O)O", &[],
    "A is one of two enantiomers, not said which (OR group 1); B is one of them.")]
#[case::one_against_both("C[C@H](N)C(=O)O", &[(OR, &[1][..])], "C[C@H](N)C(=O)O", &[(AND, &[1][..])],
    "A is one of two enantiomers, not said which (OR group 1); B is a mixture of both enantiomers (AND group 1).")]
#[case::two_groups("C[C@H](O)[C@@H](N)CC", &[(AND, &[1][..]), (AND, &[3][..])], "C[C@H](O)[C@@H](N)CC", &[(AND, &[1, 3][..])],
    "A is a mixture of all arrangements of AND groups 1 and 2; B is a mixture of both enantiomers (AND group 1).")]
#[case::mixture_and_unmarked("C[C@H](N)C(=O)O", &[(AND, &[1][..])], "CC(N)C(=O)O", &[],
    "A is a mixture of both enantiomers (AND group 1); B is open there. Marked in A, open in B: C2 (S).")]
fn groups(
    #[case] a: &str,
    #[case] groups_a: &[(GroupKind, &[u32])],
    #[case] b: &str,
    #[case] groups_b: &[(GroupKind, &[u32])],
    #[case] expected: &str,
) {
    let told = told(grouped(a, groups_a), grouped(b, groups_b));
    let (_, sentences) = told.split_once(". ").unwrap();
    assert_eq!(sentences, expected);
}
