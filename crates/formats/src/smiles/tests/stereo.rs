use molkin_graph::{Ligand, Parity, Shape};
use rstest::rstest;

use super::{arrangement, read};

/// Every row is one compound in several spellings.
#[rstest]
#[case::halomethane(&["Br[C@](F)(I)Cl", "Br[C@@](I)(F)Cl", "Br[C@@](F)(Cl)I", "F[C@@](Br)(I)Cl",
    "[C@](Br)(F)(I)Cl", "[C@]1(F)(I)Cl.Br1", "Br[C@]1(I)Cl.F1", "Br[C@TH1](F)(I)Cl", "I[C@@](Cl)(F)Br",
    "[C@]2341.Br2.F3.I4.Cl1", "[C@](Br)(F)1Cl.I1"])]
#[case::bracket_hydrogen(&["F[C@H](Cl)Br", "F[C@]([H])(Cl)Br", "[H][C@@](F)(Cl)Br", "[C@@H](F)(Cl)Br",
    "Cl[C@@H](F)Br", "[H]1.F[C@]1(Cl)Br", "F[C@H]1Br.Cl1"])]
#[case::sulfoxide(&["C[S@](=O)F", "[S@@](C)(=O)F", "O=[S@@](C)F", "F[S@@](=O)C"])]
#[case::phosphane(&["C[P@](F)Cl", "[P@@](C)(F)Cl", "F[P@@](C)Cl"])]
#[case::sulfonium(&["C[S@+](F)Cl", "F[S@@+](C)Cl"])]
#[case::ring_closure_order(&["F[C@]12Br.Cl1.I2", "F[C@](Cl)(I)Br"])]
#[case::trans(&["F/C=C/Cl", "F\\C=C\\Cl", "C(\\F)=C/Cl", "Cl/C=C/F", "C(=C/Cl)\\F"])]
#[case::cis(&["F/C=C\\Cl", "F\\C=C/Cl", "C(/F)=C/Cl", "C(=C\\Cl)\\F"])]
#[case::trisubstituted(&["F/C(Br)=C/Cl", "F/C(/Br)=C/Cl", "FC(/Br)=C/Cl", "C(F)(/Br)=C/Cl"])]
#[case::ring_label_slopes(&["F/C=C/1.Cl1", "F/C=C1.Cl\\1", "F/C=C/1.Cl\\1", "F/C=C/Cl"])]
#[case::oxime(&["F/C=N/Cl", "C(\\F)=N/Cl", "Cl/N=C/F"])]
#[case::butatriene(&["F/C=C=C=C/Cl", "Cl/C=C=C=C/F", "C(\\F)=C=C=C/Cl"])]
#[case::allene(&["NC(Br)=[C@]=C(O)F", "NC(Br)=[C@AL1]=C(O)F", "BrC(N)=[C@@]=C(O)F",
    "[C@](=C(N)Br)=C(O)F", "C(N)(Br)=[C@]=C(O)F", "NC(=[C@]=C(O)F)Br", "OC(F)=[C@]=C(N)Br"])]
#[case::allene_hydrogens(&["FC=[C@]=CCl", "[H]C(F)=[C@@]=CCl", "C(F)=[C@@]=CCl", "FC=[C@@]=C(Cl)[H]"])]
#[case::long_allene(&["FC=C=[C@]=C=CCl", "C(F)=C=[C@@]=C=CCl"])]
fn spellings_agree(#[case] spellings: &[&str]) {
    let expected = arrangement(spellings[0]);
    for spelling in spellings {
        assert_eq!(arrangement(spelling), expected, "{spelling}");
    }
}

#[rstest]
#[case("F[C@H](Cl)Br", "F[C@@H](Cl)Br")]
#[case("F[C@TH1H](Cl)Br", "F[C@TH2H](Cl)Br")]
#[case("F/C=C/Cl", "F/C=C\\Cl")]
#[case("F/C=C=C=C/Cl", "F/C=C=C=C\\Cl")]
#[case("FC=[C@AL1]=CCl", "FC=[C@AL2]=CCl")]
fn spellings_differ(#[case] one: &str, #[case] other: &str) {
    let (shape, ligands, parity) = arrangement(one);
    assert_eq!(arrangement(other), (shape, ligands, parity.inverted()));
}

#[test]
fn the_pair_of_the_specification_agrees() {
    // FC1C[C@](Br)(Cl)CCC1 and [C@]1(Br)(Cl)CCCC(F)C1: ligands ring CH2 near F, Br, Cl, other CH2.
    let near_and_far = |text: &str, near: u32, far: u32| {
        let molecule = read(text).molecule;
        let mark = molecule.drawn_stereo()[0];
        let ligands: Vec<Ligand> = mark.ligands.to_vec();
        let find = |ligand| ligands.iter().position(|&other| other == ligand).unwrap();
        (
            find(Ligand::Atom(near)),
            find(Ligand::Atom(far)),
            mark.parity.unwrap(),
        )
    };
    assert_eq!(
        near_and_far("FC1C[C@](Br)(Cl)CCC1", 2, 6),
        (0, 3, Parity::Even)
    );
    // Ring bond to the near CH2 first, then Br, Cl, and the far CH2.
    assert_eq!(
        near_and_far("[C@]1(Br)(Cl)CCCC(F)C1", 8, 3),
        (0, 3, Parity::Even)
    );
}

#[test]
fn ligands_are_named_as_the_contract_asks() {
    let molecule = read("F/C=C=C=N/Cl").molecule;
    let mark = molecule.drawn_stereo()[0];
    assert_eq!((mark.shape, mark.centres), (Shape::DoubleBond, [1, 4]));
    let expected = [
        Ligand::Atom(0),
        Ligand::Hydrogen,
        Ligand::LonePair,
        Ligand::Atom(5),
    ];
    assert_eq!((mark.ligands, mark.parity), (expected, Some(Parity::Even)));
}

#[rstest]
#[case::no_mark("FC=CCl", 0)]
#[case::one_mark("F/C=CCl", 0)]
#[case::conjugated("F/C=C/C=C/Cl", 2)]
#[case::conjugated_half("F/C=C/C=CCl", 1)]
#[case::both_ligands("F/C(/Br)=C(/Cl)\\I", 1)]
#[case::not_stereogenic("C/C(C)=C/C", 1)]
#[case::same_ligands("C[C@](C)(F)Cl", 1)]
#[case::allene_slopes("F/C=C=C/Cl", 0)]
#[case::ring_of_double_bonds("C1=C=C=C=C=C=1", 0)]
#[case::two_centres("C[C@H](O)[C@@H](N)F", 2)]
fn marks_are_counted(#[case] text: &str, #[case] expected: usize) {
    assert_eq!(read(text).molecule.drawn_stereo().len(), expected, "{text}");
}
