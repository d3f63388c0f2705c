//! Charges, radicals, isotopes, hydrogens and what is read through.

use molkin_graph::Atom;
use rstest::rstest;

use super::{codes, draw, draw_solid, read};
use crate::molfile::{self, ReadOptions, ValenceTable};

fn atom(text: &str, index: u32) -> Atom {
    *read(text).molecule.atom(index).unwrap()
}

/// A carbon and an oxygen with a single bond, and these property lines.
fn pair(properties: &str) -> String {
    draw_solid(
        &[("C", 0.0, 0.0, 0.0), ("O", 1.5, 0.0, 0.0)],
        &[(1, 2, 1, 0)],
        properties,
    )
}

#[rstest]
#[case::none("", 0, 1)]
#[case::charge("M  CHG  1   2  -1\n", -1, 0)]
#[case::two_entries("M  CHG  2   1   1   2  -1\n", -1, 0)]
#[case::radical("M  RAD  1   2   2\n", 0, 0)]
#[case::later_line_wins("M  CHG  1   2  -1\nM  CHG  1   2   1\n", 1, 2)]
#[case::skipped("S  SKP  1\nM  CHG  1   2  -1\n", 0, 1)]
#[case::trailing_blanks("M  CHG  1   2  -1   \n", -1, 0)]
fn charge_and_hydrogens_of_the_oxygen(
    #[case] properties: &str,
    #[case] charge: i8,
    #[case] hydrogens: u8,
) {
    let oxygen = atom(&pair(properties), 1);
    assert_eq!((oxygen.charge, oxygen.hydrogens), (charge, hydrogens));
}

/// The charge field of the atom line, and how property lines overrule it.
#[rstest]
#[case::minus("  5", "", -1, None)]
#[case::plus_three("  1", "", 3, None)]
#[case::doublet("  4", "", 0, Some(2))]
#[case::void_by_charge_line("  5", "M  CHG  1   1   1\n", 0, None)]
#[case::void_by_radical_line("  5", "M  RAD  1   1   3\n", 0, None)]
#[case::kept_beside_isotope_line("  5", "M  ISO  1   1  13\n", -1, None)]
fn charge_field(
    #[case] field: &str,
    #[case] properties: &str,
    #[case] charge: i8,
    #[case] multiplicity: Option<u8>,
) {
    let text = pair(properties).replace(" O   0  0", &format!(" O   0{field}"));
    let oxygen = atom(&text, 1);
    assert_eq!((oxygen.charge, oxygen.multiplicity), (charge, multiplicity));
}

#[rstest]
#[case::difference("C  ", " 1", "", Some(13))]
#[case::below("C  ", "-1", "", Some(11))]
#[case::void_by_isotope_line("C  ", " 1", "M  ISO  1   2  18\n", None)]
#[case::isotope_line("C  ", " 0", "M  ISO  1   1  14\n", Some(14))]
#[case::deuterium("D  ", " 0", "", Some(2))]
#[case::tritium_beside_isotope_line("T  ", " 0", "M  ISO  1   2  18\n", Some(3))]
#[case::out_of_range("C  ", " 9", "", None)]
#[case::no_standard_weight("Tc ", " 1", "", Some(98))]
fn isotopes(
    #[case] symbol: &str,
    #[case] difference: &str,
    #[case] properties: &str,
    #[case] expected: Option<u16>,
) {
    let text = pair(properties).replace(" C   0  0", &format!(" {symbol}{difference}  0"));
    assert_eq!(atom(&text, 0).isotope, expected);
}

/// The valence field states hydrogens where the table would not give them.
#[rstest]
#[case(0, 3)]
#[case(15, 0)]
#[case(2, 1)]
#[case(14, 13)]
fn valence_field(#[case] valence: u8, #[case] hydrogens: u8) {
    let text = pair("").replace(
        "C   0  0  0  0  0  0",
        &format!("C   0  0  0  0  0{valence:3}"),
    );
    assert_eq!(atom(&text, 0).hydrogens, hydrogens);
}

#[test]
fn a_valence_below_the_bonds_is_noted() {
    let text = draw(&[("C", 0.0, 0.0), ("O", 1.5, 0.0)], &[(1, 2, 2, 0)])
        .replace("C   0  0  0  0  0  0", "C   0  0  0  0  0  1");
    let record = read(&text);
    assert_eq!(codes(&record), ["valence-exceeded"]);
    assert_eq!(record.molecule.atom(0).unwrap().hydrogens, 0);
}

/// Dimethyl tin drawn without hydrogens is where the two tables part.
#[test]
fn the_valence_table_is_a_choice() {
    let atoms = [("Sn", 0.0, 0.0), ("C", 1.5, 0.0), ("C", -1.5, 0.0)];
    let text = draw(&atoms, &[(1, 2, 1, 0), (1, 3, 1, 0)]);
    for (valences, hydrogens) in [(ValenceTable::Early, 0), (ValenceTable::Late, 0)] {
        let options = ReadOptions {
            valences,
            ..ReadOptions::default()
        };
        let record = molfile::parse_with(text.as_bytes(), &options).unwrap();
        assert_eq!(record.molecule.atom(0).unwrap().hydrogens, hydrogens);
        assert!(record.notes.is_empty());
    }
    let text = draw(&atoms[..2], &[(1, 2, 1, 0)]);
    for (valences, hydrogens) in [(ValenceTable::Early, 1), (ValenceTable::Late, 0)] {
        let options = ReadOptions {
            valences,
            ..ReadOptions::default()
        };
        let record = molfile::parse_with(text.as_bytes(), &options).unwrap();
        assert_eq!(record.molecule.atom(0).unwrap().hydrogens, hydrogens);
        assert_eq!(codes(&record), ["valence-table-dependent"]);
    }
}

/// A ring of these atoms with aromatic bonds: the double bonds found, and hydrogens.
#[rstest]
#[case::benzene(&["C", "C", "C", "C", "C", "C"], 3, 6)]
#[case::pyridine(&["N", "C", "C", "C", "C", "C"], 3, 5)]
#[case::furan(&["O", "C", "C", "C", "C"], 2, 4)]
#[case::square(&["C", "C", "C", "C"], 2, 4)]
fn aromatic_rings(#[case] symbols: &[&str], #[case] double: usize, #[case] hydrogens: u32) {
    let molecule = read(&ring(symbols)).molecule;
    assert_eq!(
        molecule
            .bonds()
            .filter(|(_, _, order)| order.pairs() == 2)
            .count(),
        double
    );
    assert_eq!(
        molecule
            .atoms()
            .map(|atom| u32::from(atom.hydrogens))
            .sum::<u32>(),
        hydrogens
    );
}

/// A hydrogen that only one nitrogen can have is read there.
#[test]
fn the_hydrogen_of_pyrrole_has_one_place() {
    let record = read(&ring(&["C", "C", "N", "C", "C"]));
    assert_eq!(record.molecule.formula().to_string(), "C4H5N");
    assert_eq!(codes(&record), ["hydrogen-placed"]);
    assert_eq!(record.notes[0].atoms, [2]);
}

/// Which nitrogen of imidazole has the hydrogen cannot be read off aromatic bonds; no nitrogen helps
/// cyclopentadienyl.
#[rstest]
#[case::imidazole(&["N", "C", "N", "C", "C"], "hydrogens-undetermined")]
#[case::triazole(&["N", "N", "N", "C", "C"], "hydrogens-undetermined")]
#[case::cyclopentadienyl(&["C", "C", "C", "C", "C"], "no-kekule-structure")]
fn aromatic_rings_that_need_a_hydrogen(#[case] symbols: &[&str], #[case] code: &str) {
    let error = molfile::parse(ring(symbols).as_bytes()).unwrap_err();
    assert_eq!(error.code(), code);
}

fn ring(symbols: &[&str]) -> String {
    let count = symbols.len();
    let atoms: Vec<_> = symbols
        .iter()
        .enumerate()
        .map(|(index, &symbol)| {
            let angle = std::f64::consts::TAU * index as f64 / count as f64;
            (symbol, 1.4 * angle.cos(), 1.4 * angle.sin())
        })
        .collect();
    let bonds: Vec<_> = (0..count)
        .map(|atom| (atom + 1, (atom + 1) % count + 1, 4, 0))
        .collect();
    draw(&atoms, &bonds)
}

#[rstest]
#[case::alias("A    1\nR group text\n", "alias-ignored")]
#[case::value("V    1 some text\n", "alias-ignored")]
#[case::abbreviation("G    1  2\nPh\n", "alias-ignored")]
#[case::unknown("M  XYZ  1   1   1\n", "unknown-line")]
#[case::stray_text("what is this\n", "unknown-line")]
#[case::superatom(
    "M  STY  1   1 SUP\nM  SAL   1  1   2\nM  SMT   1 OH\n",
    "group-ignored"
)]
#[case::data("M  STY  1   1 DAT\nM  SED   1 text\n", "group-ignored")]
#[case::strange_isotope("M  ISO  1   1 200\n", "isotope-unusual")]
fn read_through_with_a_note(#[case] properties: &str, #[case] code: &str) {
    assert_eq!(codes(&read(&pair(properties))), [code]);
}

#[test]
fn short_lines_and_a_missing_version_are_taken() {
    let text = "old\r\n\r\n\r\n  2  1\r\n    0.0000    0.0000    0.0000 C\r\n\
                \x20   1.5000    0.0000    0.0000 N\r\n  1  2  3\r\n";
    let record = read(text);
    assert_eq!(record.name, "old");
    assert_eq!(record.molecule.atom_count(), 2);
    assert_eq!(record.molecule.atom(0).unwrap().hydrogens, 1);
}

#[test]
fn an_empty_structure_is_a_molecule_without_atoms() {
    assert_eq!(read(&draw(&[], &[])).molecule.atom_count(), 0);
    assert_eq!(codes(&read(&draw(&[], &[]))), ["no-atoms"]);
}

#[test]
fn text_after_the_end_is_noted() {
    let record = read(&(pair("") + "\n> <a>\nb\n"));
    assert_eq!(codes(&record), ["text-after-end"]);
    assert_eq!(record.notes[0].span.unwrap().line, 10);
}
