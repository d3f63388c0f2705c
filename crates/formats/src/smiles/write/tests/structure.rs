use molkin_graph::{CanonicalForm, Element, FormAtom};
use rstest::rstest;

use super::{assert_written, rewritten, write};

#[rstest]
#[case::empty("", "")]
#[case::chain("CCO", "CCO")]
#[case::orders("C=CC#CC$C", "C=CC#CC$C")]
#[case::short_branch_first("CC(CCC)O", "CC(O)CCC")]
#[case::equal_branches_by_number("CC(F)Cl", "CC(F)Cl")]
#[case::three_branches("CC(CC)(F)CCC", "CC(F)(CC)CCC")]
#[case::components("[Na+].[Cl-].O", "[Na+].[Cl-].O")]
#[case::components_joined_by_label("C1.OC.C1", "CC.OC")]
#[case::ring("C1CCCCC1", "C1CCCCC1")]
#[case::kekule_benzene("c1ccccc1", "C1=CC=CC=C1")]
#[case::ring_closes_at_single_bond("C=1CCCC1", "C1=CCCC1")]
#[case::spiro("C1CCC12CC2", "C1CCC12CC2")]
#[case::label_reused("C1CC1CC2CC2", "C1CC1CC1CC1")]
#[case::cubane("C12C3C4C1C5C2C3C45", "C12C3C4C1C1C2C3C14")]
#[case::triple_in_ring("C1#CCCCCCC1", "C1#CCCCCCC1")]
fn structures(#[case] text: &str, #[case] expected: &str) {
    assert_written(text, expected);
}

#[rstest]
#[case::organic("[CH4]", "C")]
#[case::radical("[CH3]", "[CH3]")]
#[case::bare_without_hydrogens("FS(F)(F)(F)(F)F", "FS(F)(F)(F)(F)F")]
#[case::phosphane("CP(=O)C", "CP(=O)C")]
#[case::phosphorus_without("CP(C)(=O)C", "CP(C)(=O)C")]
#[case::hypervalent_without("C[P](=O)C", "C[P](=O)C")]
#[case::nitro("CN(=O)=O", "CN(=O)=O")]
#[case::iodine("CI(Cl)Cl", "CI(Cl)Cl")]
#[case::perchloric("OCl(=O)(=O)=O", "OCl(=O)(=O)=O")]
#[case::boron("CB", "CB")]
#[case::charge("C[NH3+].[O-]C", "C[NH3+].[O-]C")]
#[case::charges("[Fe+3].[O-2].[Ti+4]", "[Fe+3].[O-2].[Ti+4]")]
#[case::isotope("[13CH4].[2H]O", "[13CH4].[2H]O")]
#[case::isotope_zero("[0CH4]", "[0CH4]")]
#[case::hydrogen_molecule("[H][H]", "[H][H]")]
#[case::counted_hydrogen_on_hydrogen("[HH]", "[H][H]")]
#[case::proton("[H+]", "[H+]")]
#[case::wildcard("*C", "*C")]
#[case::wildcard_with_hydrogen("[*H]C", "[*H]C")]
#[case::wildcard_charge("[*+]C", "[*+]C")]
#[case::metal("[Pt](Cl)Cl", "[Pt](Cl)Cl")]
#[case::silane("[SiH4]", "[SiH4]")]
fn atoms(#[case] text: &str, #[case] expected: &str) {
    assert_written(text, expected);
}

#[test]
fn hydrogens_beyond_one_digit_are_atoms() {
    let atom = FormAtom {
        element: Element::CARBON,
        isotope: None,
        charge: 0,
        hydrogens: 11,
    };
    let form = CanonicalForm {
        atoms: vec![atom],
        ..CanonicalForm::default()
    };
    assert_eq!(write(&form).text, "[CH9]([H])[H]");
}

/// A hub with `count` rings of three: all labels are open at once.
pub(super) fn flower(count: u32) -> CanonicalForm {
    let atom = |hydrogens| FormAtom {
        element: Element::CARBON,
        isotope: None,
        charge: 0,
        hydrogens,
    };
    let mut form = CanonicalForm {
        atoms: vec![atom(0)],
        ..CanonicalForm::default()
    };
    for petal in 0..count {
        let [a, b] = [2 * petal + 1, 2 * petal + 2];
        form.atoms.extend([atom(2), atom(2)]);
        form.bonds.extend([(0, a, 1), (0, b, 1), (a, b, 1)]);
    }
    form.bonds.sort_unstable();
    form
}

#[test]
fn labels_from_ten_have_a_percent_sign() {
    let written = write(&flower(10));
    assert_eq!(
        written.text,
        "C123456789%10(CC1)(CC2)(CC3)(CC4)(CC5)(CC6)(CC7)(CC8)(CC9)CC%10"
    );
    assert!(written.lost.is_empty());
}

#[test]
fn deep_and_long_input_is_written() {
    let depth = 20_000;
    let text = format!("{}C{}", "C(F)(".repeat(depth), ")".repeat(depth));
    assert!(rewritten(&text).lost.is_empty());
    assert_written(&"C".repeat(50_000), &"C".repeat(50_000));
}

#[test]
fn a_form_of_nothing_that_exists_is_written_without_it() {
    let mut form = flower(1);
    form.bonds.push((2, 77, 1));
    form.bonds.push((2, 2, 1));
    assert_eq!(write(&form).text, "[C]1CC1");
}
