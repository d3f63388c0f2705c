use rstest::rstest;

use super::{bonds, read};

#[rstest]
#[case::chain("CCO", &["0-1", "1-2"])]
#[case::orders("C=C#C$C-C", &["0=1", "1#2", "2$3", "3-4"])]
#[case::branches("C(F)(Cl)Br", &["0-1", "0-2", "0-3"])]
#[case::nested("C(C(C)=O)N", &["0-1", "0-4", "1-2", "1=3"])]
#[case::ring("C1CC1", &["0-1", "0-2", "1-2"])]
#[case::two_digits("C%12CC%12", &["0-1", "0-2", "1-2"])]
#[case::digit_and_two_digits("C1CC%01", &["0-1", "0-2", "1-2"])]
#[case::two_digits_then_one("C%123CC%12CC3", &["0-1", "0-2", "0-4", "1-2", "2-3", "3-4"])]
#[case::zero("C0CC%00", &["0-1", "0-2", "1-2"])]
#[case::reused("C1CC1C1CC1", &["0-1", "0-2", "1-2", "2-3", "3-4", "3-5", "4-5"])]
#[case::bicyclobutane("C12CC1C2", &["0-1", "0-2", "0-3", "1-2", "2-3"])]
#[case::order_at_opening("C=1CC1", &["0-1", "0=2", "1-2"])]
#[case::order_at_closing("C1CC=1", &["0-1", "0=2", "1-2"])]
#[case::order_at_both("C=1CC=1", &["0-1", "0=2", "1-2"])]
#[case::dot("C.C", &[])]
#[case::ring_across_dot("C1.C1", &["0-1"])]
#[case::dot_in_branch("C(.O)C", &["0-2"])]
#[case::several_across_dots("C1234.Br1.Cl2.F3.I4", &["0-1", "0-2", "0-3", "0-4"])]
#[case::label_after_branch("C(C)1CC1", &["0-1", "0-2", "0-3", "2-3"])]
#[case::bond_then_label_after_branch("C(C)=1CC1", &["0-1", "0-2", "0=3", "2-3"])]
fn bonds_are_as_written(#[case] text: &str, #[case] expected: &[&str]) {
    assert_eq!(bonds(&read(text).molecule), expected, "{text}");
}

#[rstest]
#[case::isotope("[13CH4]", "C", Some(13), 4, 0)]
#[case::leading_zero("[02H]", "H", Some(2), 0, 0)]
#[case::isotope_zero("[0C]", "C", Some(0), 0, 0)]
#[case::hydrogen("[H]", "H", None, 0, 0)]
#[case::proton("[H+]", "H", None, 0, 1)]
#[case::one_hydrogen("[OH-]", "O", None, 1, -1)]
#[case::charge_number("[Fe+3]", "Fe", None, 0, 3)]
#[case::charge_two_digits("[U-15]", "U", None, 0, -15)]
#[case::charge_zero("[Na+0]", "Na", None, 0, 0)]
#[case::two_signs("[Ca++]", "Ca", None, 0, 2)]
#[case::three_signs("[Al+++]", "Al", None, 0, 3)]
#[case::class("[CH3:005]", "C", None, 3, 0)]
#[case::all_fields("[14NH3+:12]", "N", Some(14), 3, 1)]
#[case::two_letters("[Sc]", "Sc", None, 0, 0)]
#[case::copernicium("[Cn]", "Cn", None, 0, 0)]
#[case::oganesson("[Og]", "Og", None, 0, 0)]
#[case::wildcard("[*H2-]", "*", None, 2, -1)]
#[case::bare_wildcard("*", "*", None, 0, 0)]
fn bracket_atoms(
    #[case] text: &str,
    #[case] symbol: &str,
    #[case] isotope: Option<u16>,
    #[case] hydrogens: u8,
    #[case] charge: i8,
) {
    let molecule = read(text).molecule;
    let atom = molecule.atom(0).unwrap();
    let found = (
        atom.element.symbol(),
        atom.isotope,
        atom.hydrogens,
        atom.charge,
    );
    assert_eq!(found, (symbol, isotope, hydrogens, charge), "{text}");
}

#[test]
fn hydrogens_that_are_atoms_count_in_text_order() {
    let molecule = read("[H]OC([2H])Cl").molecule;
    let symbols: Vec<&str> = molecule.atoms().map(|atom| atom.element.symbol()).collect();
    assert_eq!(symbols, ["H", "O", "C", "H", "Cl"]);
    assert_eq!(bonds(&molecule), ["0-1", "1-2", "2-3", "2-4"]);
}

#[rstest]
#[case("CCO", "")]
#[case("CCO ethanol", "ethanol")]
#[case("CCO\tethyl alcohol 96 % ", "ethyl alcohol 96 %")]
#[case("CCO 7\u{3b1}", "7\u{3b1}")]
#[case("CCO\r\n", "")]
fn the_name_follows_white_space(#[case] text: &str, #[case] name: &str) {
    assert_eq!(read(text).name, name);
}

#[test]
fn a_reader_starts_afresh_after_a_fault() {
    let mut reader = super::Reader::default();
    for broken in ["C1CC(", "[C", "c1cccc1", "C12(C)C1", "F/C=C/["] {
        assert!(reader.read(broken, 1).is_err(), "{broken}");
        let record = reader.read("C1CC1", 1).unwrap();
        assert_eq!(
            bonds(&record.molecule),
            ["0-1", "0-2", "1-2"],
            "after {broken}"
        );
        assert!(record.notes.is_empty() && record.molecule.drawn_stereo().is_empty());
    }
}
