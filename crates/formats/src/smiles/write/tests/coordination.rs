use molkin_graph::{BondOrder, Ligand, Parity, Polyhedron, Shape};
use rstest::rstest;

use super::{Written, as_drawn, assert_written, canonical, rewritten, write};
use crate::smiles::{Lost, parse};

/// Each row is one compound. The last two are those of the specification, "Trigonal Bipyramidal
/// Centers" and "Octahedral Centers".
#[rstest]
#[case::cis(&["N[Pt@SP1](N)(Cl)Cl", "N[Pt@SP3](N)(Cl)Cl", "N[Pt@SP1](Cl)(Cl)N", "N[Pt@SP2](Cl)(Cl)N",
    "[Pt@SP1](N)(N)(Cl)Cl"])]
#[case::trans(&["N[Pt@SP2](N)(Cl)Cl", "N[Pt@SP1](Cl)(N)Cl", "N[Pt@SP3](Cl)(Cl)N"])]
#[case::hydrides(&["F[Pt@SP1H2]Cl", "F[Pt@SP2H2]Cl", "F[Pt@SP1](Cl)([H])[H]", "Cl[Pt@SP3](F)([H])[H]"])]
#[case::vacancy(&["F[S@TB7](Cl)(Br)I", "Cl[S@TB14](F)(Br)I"])]
#[case::bipyramidal(&["S[As@](F)(Cl)(Br)N", "S[As@TB1](F)(Cl)(Br)N", "S[As@TB2](Br)(Cl)(F)N",
    "S[As@TB5](F)(N)(Cl)Br", "F[As@TB10](S)(Cl)(N)Br", "F[As@TB15](Cl)(S)(Br)N",
    "Br[As@TB20](Cl)(S)(F)N"])]
#[case::octahedral(&["C[Co@](F)(Cl)(Br)(I)S", "F[Co@@](S)(I)(C)(Cl)Br", "S[Co@OH5](F)(I)(Cl)(C)Br",
    "Br[Co@OH9](C)(S)(Cl)(F)I", "Br[Co@OH12](Cl)(I)(F)(S)C", "Cl[Co@OH15](C)(Br)(F)(I)S",
    "Cl[Co@OH19](C)(I)(F)(S)Br", "I[Co@OH27](Cl)(Br)(F)(S)C"])]
fn spellings_agree(#[case] spellings: &[&str]) {
    let (expected, keys) = canonical(&parse(spellings[0]).unwrap());
    assert_eq!(expected.lost, []);
    assert!(expected.text.contains('@'), "{}", expected.text);
    for spelling in spellings.iter().chain([&expected.text.as_str()]) {
        assert_eq!(
            canonical(&parse(spelling).unwrap()),
            (expected.clone(), keys.clone()),
            "{spelling}"
        );
    }
}

#[rstest]
#[case("N[Pt@SP1](N)(Cl)Cl", "N[Pt@SP2](N)(Cl)Cl")]
#[case("S[As@TB1](F)(Cl)(Br)N", "S[As@TB2](F)(Cl)(Br)N")]
#[case("S[As@TB1](F)(Cl)(Br)N", "S[As@TB3](F)(Cl)(Br)N")]
#[case("C[Co@OH1](F)(Cl)(Br)(I)S", "C[Co@OH2](F)(Cl)(Br)(I)S")]
fn spellings_differ(#[case] one: &str, #[case] other: &str) {
    assert_ne!(
        canonical(&parse(one).unwrap()),
        canonical(&parse(other).unwrap())
    );
}

/// Every tag is written as it was read where the order of the ligands stays.
#[test]
fn every_tag_is_kept() {
    let rows = [
        ("SP", 3, "C[Pt@](F)(Cl)Br"),
        ("TB", 20, "S[As@](F)(Cl)(Br)N"),
        ("OH", 30, "C[Co@](F)(Cl)(Br)(I)S"),
    ];
    for (class, most, text) in rows {
        for number in 1..=most {
            let text = text.replace('@', &format!("@{class}{number}"));
            assert_written(&text, &text);
        }
    }
}

#[test]
fn two_empty_sites_are_lost() {
    let mut form = as_drawn("F[Xe@SP2](F)(Cl)Cl");
    let mark = &mut form.coordination[0];
    mark.polyhedron = Polyhedron::Octahedral;
    mark.ligands.extend([Ligand::LonePair; 2]);
    let lost = Lost::Coordination {
        polyhedron: Polyhedron::Octahedral,
        centre: 1,
    };
    let Written { text, lost: found } = write(&form);
    assert_eq!((text.as_str(), found), ("F[Xe](F)(Cl)Cl", vec![lost]));
}

#[rstest]
#[case::coordination(BondOrder::Coordination, "C[NH2][Pt]Cl")]
#[case::hydrogen(BondOrder::Hydrogen, "CN.[Pt]Cl")]
fn bonds_without_a_symbol_are_told(#[case] order: BondOrder, #[case] expected: &str) {
    let mut form = as_drawn("C[NH2][Pt]Cl");
    form.bonds[1].2 = order as u8;
    let lost = Lost::Bond {
        atoms: [1, 2],
        order,
    };
    let Written { text, lost: found } = write(&form);
    assert_eq!((text.as_str(), found), (expected, vec![lost]));
}

#[test]
fn a_hindered_single_bond_is_lost() {
    let mut form = as_drawn("FC(Cl)=[C@]=C(F)Cl");
    assert_eq!(rewritten("FC(Cl)=[C@]=C(F)Cl").lost, []);
    form = molkin_graph::CanonicalForm {
        atoms: as_drawn("FC(Cl)C(F)Cl").atoms,
        bonds: as_drawn("FC(Cl)C(F)Cl").bonds,
        ..form
    };
    let element = &mut form.stereo[0];
    element.centres = [1, 3];
    element.ligands = [0, 2, 4, 5].map(Ligand::Atom);
    element.parity = Parity::Odd;
    let lost = Lost::Arrangement {
        shape: Shape::Axis,
        centres: [1, 3],
    };
    let Written { text, lost: found } = write(&form);
    assert_eq!((text.as_str(), found), ("FC(Cl)C(F)Cl", vec![lost]));
}
