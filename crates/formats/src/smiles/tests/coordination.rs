use molkin_graph::{Ligand, Polyhedron};
use rstest::rstest;

use super::read;

/// Polyhedron and symbols of the ligands by position, with `H` for hydrogens that are counted and
/// `:` for a vacancy.
#[track_caller]
fn arrangement(text: &str) -> (Polyhedron, Vec<&'static str>) {
    let molecule = read(text).molecule;
    let [mark] = molecule.drawn_coordination() else {
        panic!("{text}: {:?}", molecule.drawn_coordination());
    };
    let symbol = |ligand: &Ligand| match *ligand {
        Ligand::Atom(atom) => molecule.atom(atom).unwrap().element.symbol(),
        Ligand::Hydrogen => "H",
        Ligand::LonePair => ":",
    };
    (mark.polyhedron, mark.ligands.iter().map(symbol).collect())
}

/// Pairs of ligands across from each other in a square, sorted.
fn across(text: &str) -> [[&'static str; 2]; 2] {
    let (polyhedron, ligands) = arrangement(text);
    assert_eq!(polyhedron, Polyhedron::SquarePlanar);
    let mut pairs = [[ligands[0], ligands[2]], [ligands[1], ligands[3]]];
    pairs.iter_mut().for_each(|pair| pair.sort_unstable());
    pairs.sort_unstable();
    pairs
}

#[rstest]
#[case::cisplatin("N[Pt@SP1](N)(Cl)Cl", [["Cl", "N"], ["Cl", "N"]])]
#[case::transplatin("N[Pt@SP2](N)(Cl)Cl", [["Cl", "Cl"], ["N", "N"]])]
#[case::shape_u("C[Pt@SP1](F)(Cl)[H]", [["C", "Cl"], ["F", "H"]])]
#[case::shape_4("C[Pt@SP2](F)(Cl)[H]", [["C", "F"], ["Cl", "H"]])]
#[case::shape_z("C[Pt@SP3](F)(Cl)[H]", [["C", "H"], ["Cl", "F"]])]
#[case::counted_hydrogen("C[Pt@SP1H](F)Cl", [["C", "F"], ["Cl", "H"]])]
#[case::hydrogen_first("[Pt@SP1H](C)(F)Cl", [["C", "Cl"], ["F", "H"]])]
#[case::two_hydrogens("C[Pt@SP3H2]F", [["C", "F"], ["H", "H"]])]
#[case::vacancy("C[Pt@SP2](F)Cl", [[":", "C"], ["Cl", "F"]])]
#[case::ring_label("C[Pt@SP2]1(F)[H].Cl1", [["C", "Cl"], ["F", "H"]])]
fn squares(#[case] text: &str, #[case] expected: [[&str; 2]; 2]) {
    assert_eq!(across(text), expected, "{text}");
}

/// By definition `@TB1` and `@OH1` look from the first ligand to the last one.
#[rstest]
#[case("S[As@TB1](F)(Cl)(Br)N", ["S", "N", "F", "Cl", "Br"])]
#[case("S[As@TB2](F)(Cl)(Br)N", ["S", "N", "F", "Br", "Cl"])]
#[case("S[As@](F)(Cl)(Br)N", ["S", "N", "F", "Cl", "Br"])]
#[case("F[S@TB7](Cl)(Br)I", ["F", ":", "Cl", "Br", "I"])]
#[case("[P@TB1H](F)(Cl)(Br)I", ["H", "I", "F", "Cl", "Br"])]
fn bipyramids(#[case] text: &str, #[case] expected: [&str; 5]) {
    let expected = (Polyhedron::TrigonalBipyramidal, expected.to_vec());
    assert_eq!(arrangement(text), expected, "{text}");
}

#[rstest]
#[case("C[Co@OH1](F)(Cl)(Br)(I)S", ["C", "S", "F", "Cl", "Br", "I"])]
#[case("C[Co@@](F)(Cl)(Br)(I)S", ["C", "S", "F", "I", "Br", "Cl"])]
#[case("C[Co@OH4](F)(Cl)(Br)(I)S", ["C", "S", "F", "Cl", "I", "Br"])]
fn octahedra(#[case] text: &str, #[case] expected: [&str; 6]) {
    let expected = (Polyhedron::Octahedral, expected.to_vec());
    assert_eq!(arrangement(text), expected, "{text}");
}
