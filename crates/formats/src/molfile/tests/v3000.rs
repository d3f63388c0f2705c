//! Version 3000.

use insta::assert_snapshot;
use molkin_graph::{BondOrder, GroupKind, Limits, Parity, Shape};
use rstest::rstest;

use super::{Record, codes, read};
use crate::molfile;

/// A table of these lines in the header and between `BEGIN CTAB` and `END CTAB`.
fn table(body: &str) -> String {
    let body: String = body
        .lines()
        .map(|line| format!("M  V30 {line}\n"))
        .collect();
    format!("test\n\n\n  0  0  0     0  0            999 V3000\n{body}M  END\n")
}

/// A table of atoms and bonds with their sections and counts, and further lines behind them.
fn draw(atoms: &[&str], bonds: &[&str], more: &str) -> String {
    let lines =
        |lines: &[&str]| -> String { lines.iter().map(|line| format!("{line}\n")).collect() };
    let (atom_count, bond_count) = (atoms.len(), bonds.len());
    let (atoms, bonds) = (lines(atoms), lines(bonds));
    table(&format!(
        "BEGIN CTAB\nCOUNTS {atom_count} {bond_count} 0 0 0\nBEGIN ATOM\n{atoms}END ATOM\nBEGIN BOND\n{bonds}END BOND\n{more}END CTAB"
    ))
}

fn refuse(text: &str) -> String {
    let error = molfile::parse(text.as_bytes()).unwrap_err();
    error.render().to_string()
}

fn formula(record: &Record) -> String {
    record.molecule.formula().to_string()
}

#[test]
fn ethanol() {
    let record = read(&draw(
        &["1 C 0 0 0 0", "2 C 1.3 0.75 0 0", "3 O 2.6 0 0 0"],
        &["1 1 1 2", "2 1 2 3"],
        "",
    ));
    assert_eq!(
        (record.name.as_str(), formula(&record)),
        ("test", "C2H6O".to_owned())
    );
    assert_eq!(codes(&record), [""; 0]);
}

/// What keys say of one atom: formula, isotope, multiplicity.
#[rstest]
#[case::charge("N", "CHG=1", "H4N+", None, None)]
#[case::radical("C", "RAD=2", "CH3", None, Some(2))]
#[case::mass("C", "MASS=13", "CH4", Some(13), None)]
#[case::deuterium("D", "", "H2", Some(2), None)]
#[case::valence("S", "VAL=4", "H4S", None, None)]
#[case::no_valence("O", "VAL=-1", "O", None, None)]
#[case::default_valence("O", "VAL=0 CFG=2 HCOUNT=0 ATTCHPT=0", "H2O", None, None)]
fn atom_keys(
    #[case] symbol: &str,
    #[case] keys: &str,
    #[case] expected: &str,
    #[case] isotope: Option<u16>,
    #[case] multiplicity: Option<u8>,
) {
    let record = read(&draw(&[&format!("7 {symbol} 0 0 0 0 {keys}")], &[], ""));
    assert_eq!(formula(&record), expected);
    let atom = record.molecule.atom(0).unwrap();
    assert_eq!((atom.isotope, atom.multiplicity), (isotope, multiplicity));
}

/// Numbers are names, and atoms keep the order of their lines.
#[test]
fn numbers_in_any_order() {
    let record = read(&draw(
        &["30 N 0 0 0 0", "7 C 1.3 0 0 0", "2000000000 O 2.6 0 0 0"],
        &["5 1 30 7", "4 2 2000000000 7"],
        "",
    ));
    let bonds: Vec<_> = record.molecule.bonds().collect();
    assert_eq!(
        bonds,
        [(0, 1, BondOrder::Single), (2, 1, BondOrder::Double)]
    );
}

#[test]
fn lines_go_on_in_the_next_one() {
    let text = draw(&["1 C 0 0 0 0 CHG=-", "1 C 0 0 0 0"], &[], "");
    let text = text
        .replace("CHG=-\nM  V30 1 C 0 0 0 0", "CHG=-\nM  V30 -1")
        .replace("COUNTS 2", "COUNTS 1");
    // The first dash joins, the second is the sign.
    assert_eq!(formula(&read(&text)), "CH3-");
}

/// An H at C2 with the wedge of the F pointing up is `@@` for H, F, Cl, Br.
#[rstest]
#[case(1, Some(Parity::Odd))]
#[case(3, Some(Parity::Even))]
#[case(2, None)]
fn wedges(#[case] configuration: u8, #[case] parity: Option<Parity>) {
    let record = read(&draw(
        &[
            "1 C 0 0 0 0",
            "2 F 0 1 0 0",
            "3 Cl -0.87 -0.5 0 0",
            "4 Br 0.87 -0.5 0 0",
        ],
        &[
            &format!("1 1 1 2 CFG={configuration}"),
            "2 1 1 3",
            "3 1 1 4",
        ],
        "",
    ));
    let [mark] = record.molecule.drawn_stereo() else {
        panic!("one mark")
    };
    assert_eq!((mark.shape, mark.parity), (Shape::Tetrahedral, parity));
}

#[test]
fn coordination_and_hydrogen_bonds_take_no_valence() {
    let record = read(&draw(
        &["1 N 0 0 0 0", "2 B 1.5 0 0 0", "3 O 0 2 0 0"],
        &["1 9 1 2 DISP=COORD", "2 10 3 1 DISP=HBOND1"],
        "",
    ));
    assert_eq!(formula(&record), "BH8NO");
    let orders: Vec<_> = record.molecule.bonds().map(|(_, _, order)| order).collect();
    assert_eq!(orders, [BondOrder::Coordination, BondOrder::Hydrogen]);
}

/// Some writers count the coordination bonds of a metal in its valence.
#[rstest]
#[case("VAL=1", "CH3Li", true)]
#[case("VAL=-1", "CH3Li", false)]
#[case("VAL=2", "CH5Li", false)]
fn valences_of_metals_with_coordination(
    #[case] key: &str,
    #[case] expected: &str,
    #[case] noted: bool,
) {
    let lithium = format!("2 Li 1 0 0 0 CHG=1 {key}");
    let record = read(&draw(&["1 C 0 0 0 0 CHG=-1", &lithium], &["1 9 1 2"], ""));
    assert_eq!(formula(&record), expected);
    assert_eq!(codes(&record).contains(&"valence-with-coordination"), noted);
}

const ETHENE: [&str; 3] = ["1 C 0 0 0 0", "2 C 1.3 0 0 0", "3 Pt 0.7 1.5 0 0"];

/// A bond to a placeholder between two carbons is two bonds, and the placeholder goes.
#[rstest]
#[case("2 9 4 3 ENDPTS=(2 1 2) ATTACH=ALL")]
#[case("2 9 3 4 ATTACH=ALL ENDPTS=(2 1 2)")]
fn bonds_to_several_atoms(#[case] bond: &str) {
    let atoms = [&ETHENE[..], &["4 * 0.7 0 0 0"]].concat();
    let record = read(&draw(&atoms, &["1 2 1 2", bond], ""));
    assert_eq!(formula(&record), "C2H4Pt");
    let bonds: Vec<_> = record.molecule.bonds().skip(1).collect();
    let coordination = BondOrder::Coordination;
    assert_eq!(bonds, [(0, 2, coordination), (1, 2, coordination)]);
}

/// Wherever the placeholder stands, all others have the numbers of their lines, in notes and errors
/// too. Where it is drawn says nothing.
#[test]
fn placeholders_before_other_atoms() {
    let atoms = |valence: &str| {
        let lines = [
            "1 C 0 0 0 0",
            "2 * 0.7 0 9 0",
            "3 C 1.3 0 0 0",
            "4 * 0.7 0 9 0",
            "5 Pt 0.7 1.5 0 0",
        ];
        let methane = format!("6 C 9 9 0 0 {valence}");
        lines.map(str::to_owned).into_iter().chain([methane])
    };
    let bonds = [
        "1 2 1 3",
        "2 9 4 5 ENDPTS=(2 1 3) ATTACH=ALL",
        "3 9 5 2 ENDPTS=(1 6) ATTACH=ALL",
        "4 1 6 5",
    ];
    let drawn = |valence: &str, bonds: &[&str]| {
        let atoms: Vec<String> = atoms(valence).collect();
        let atoms: Vec<&str> = atoms.iter().map(String::as_str).collect();
        molfile::parse(draw(&atoms, bonds, "").as_bytes())
    };
    let record = drawn("VAL=0", &bonds[..3]).unwrap();
    let molecule = &record.molecule;
    assert_eq!(formula(&record), "C3H8Pt");
    let numbers: Vec<_> = (0..4).map(|atom| molecule.number(atom)).collect();
    assert_eq!(numbers, [1, 3, 5, 6]);
    let bonds_of = |record: &Record| {
        record
            .molecule
            .bonds()
            .map(|(a, b, _)| (a, b))
            .collect::<Vec<_>>()
    };
    assert_eq!(bonds_of(&record), [(0, 1), (0, 2), (1, 2), (3, 2)]);
    // A flat drawing, though the placeholders are not in its plane.
    assert!(
        molecule
            .drawn_stereo()
            .iter()
            .all(|mark| mark.shape == Shape::DoubleBond)
    );

    let noted = drawn("VAL=4 HCOUNT=2", &bonds[..3]).unwrap();
    assert_eq!(noted.notes[0].atoms, [3]);
    assert!(
        noted.notes[0].text.starts_with("atom 6 "),
        "{}",
        noted.notes[0].text
    );
    // Bonded once by the list and once more.
    assert_eq!(drawn("VAL=0", &bonds).unwrap_err().code(), "duplicate-bond");
}

#[rstest]
#[case::any_of_them(&["4 * 0 0 0 0"], &["2 9 4 3 ENDPTS=(2 1 2) ATTACH=ANY"], "query")]
#[case::single(&["4 * 0 0 0 0"], &["2 1 4 3 ENDPTS=(2 1 2) ATTACH=ALL"], "unsupported")]
#[case::no_attachment(&["4 * 0 0 0 0"], &["2 9 4 3 ENDPTS=(2 1 2)"], "missing-field")]
#[case::no_placeholder(&["4 C 0 0 0 0"], &["2 9 4 3 ENDPTS=(2 1 2) ATTACH=ALL"], "unsupported")]
#[case::bonded_before_others(&["4 * 0 0 0 0", "5 C 0 0 0 0"], &["2 9 4 3 ENDPTS=(2 1 2) ATTACH=ALL", "3 1 5 4"], "unsupported")]
#[case::bonded(&["4 * 0 0 0 0"], &["2 9 4 3 ENDPTS=(2 1 2) ATTACH=ALL", "3 1 4 1"], "unsupported")]
#[case::wrong_count(&["4 * 0 0 0 0"], &["2 9 4 3 ENDPTS=(3 1 2) ATTACH=ALL"], "malformed")]
#[case::no_list(&["4 * 0 0 0 0"], &["2 9 4 3 ENDPTS=1 ATTACH=ALL"], "malformed")]
#[case::no_such_atom(&["4 * 0 0 0 0"], &["2 9 4 3 ENDPTS=(2 1 9) ATTACH=ALL"], "no-such-atom")]
#[case::to_itself(&["4 * 0 0 0 0"], &["2 9 4 3 ENDPTS=(2 1 3) ATTACH=ALL"], "self-bond")]
fn bonds_to_several_atoms_that_are_refused(
    #[case] atoms: &[&str],
    #[case] bonds: &[&str],
    #[case] code: &str,
) {
    let atoms = [&ETHENE[..], atoms].concat();
    let bonds = [&["1 2 1 2"], bonds].concat();
    let error = molfile::parse(draw(&atoms, &bonds, "").as_bytes()).unwrap_err();
    assert_eq!(error.code(), code, "{error}");
}

/// FC(Cl)Br twice, unbonded.
fn two_centres(collections: &str) -> Result<Record, String> {
    let atoms = [
        "1 C 0 0 0 0",
        "2 F 0 1 0 0",
        "3 Cl -0.87 -0.5 0 0",
        "4 Br 0.87 -0.5 0 0",
        "5 C 10 0 0 0",
        "6 F 10 1 0 0",
        "7 Cl 9.13 -0.5 0 0",
        "8 Br 10.87 -0.5 0 0",
    ];
    let bonds = [
        "1 1 1 2 CFG=1",
        "2 1 1 3",
        "3 1 1 4",
        "4 1 5 6 CFG=1",
        "5 1 5 7",
        "6 1 5 8",
    ];
    let more = format!("BEGIN COLLECTION\n{collections}\nEND COLLECTION\n");
    molfile::parse(draw(&atoms, &bonds, &more).as_bytes()).map_err(|error| error.code().to_owned())
}

#[rstest]
#[case::absolute("MDLV30/STEABS ATOMS=(2 1 5)", &[])]
#[case::and("MDLV30/STERAC1 ATOMS=(2 1 5)", &[(GroupKind::And, &[0, 4][..])])]
#[case::in_two_lines("MDLV30/STERAC3 ATOMS=(1 5)\nMDLV30/STERAC3 ATOMS=(1 1)", &[(GroupKind::And, &[4, 0][..])])]
#[case::or_and("MDLV30/STEREL1 ATOMS=(1 5)\nMDLV30/STERAC1 ATOMS=(1 1)", &[(GroupKind::And, &[0][..]), (GroupKind::Or, &[4][..])])]
#[case::by_bond("MDLV30/STEREL2 BONDS=(1 4)\nMDLV30/HILITE ATOMS=(1 1)", &[(GroupKind::Or, &[4][..])])]
fn stereo_groups(#[case] collections: &str, #[case] expected: &[(GroupKind, &[u32])]) {
    let record = two_centres(collections).unwrap();
    let groups: Vec<_> = record
        .molecule
        .stereo_groups()
        .iter()
        .map(|group| (group.kind, &group.atoms[..]))
        .collect();
    assert_eq!(groups, expected);
    assert_eq!(codes(&record), [""; 0]);
}

#[rstest]
#[case::in_two_groups("MDLV30/STERAC1 ATOMS=(1 1)\nMDLV30/STERAC2 ATOMS=(1 1)", "malformed")]
#[case::absolute_and_not("MDLV30/STEABS ATOMS=(1 1)\nMDLV30/STEREL1 ATOMS=(1 1)", "malformed")]
#[case::no_number("MDLV30/STERAC ATOMS=(1 1)", "missing-field")]
#[case::unknown_kind("MDLV30/STEXYZ1 ATOMS=(1 1)", "malformed")]
#[case::no_such_atom("MDLV30/STERAC1 ATOMS=(1 9)", "no-such-atom")]
#[case::no_such_bond("MDLV30/STERAC1 BONDS=(1 7)", "no-such-bond")]
fn stereo_groups_that_are_none(#[case] collections: &str, #[case] code: &str) {
    assert_eq!(two_centres(collections).unwrap_err(), code);
}

#[test]
fn collections_of_users_are_noted() {
    let record = two_centres("LAB/MINE ATOMS=(1 1)").unwrap();
    assert_eq!(codes(&record), ["collection-ignored", "chiral-flag-unset"]);
}

/// Without the chiral flag and collections, all centres may be one group.
#[test]
fn an_unset_flag_may_mean_a_mixture() {
    let text = draw(
        &[
            "1 C 0 0 0 0",
            "2 F 0 1 0 0",
            "3 Cl -0.87 -0.5 0 0",
            "4 Br 0.87 -0.5 0 0",
        ],
        &["1 1 1 2 CFG=1", "2 1 1 3", "3 1 1 4"],
        "",
    );
    let options = molfile::ReadOptions {
        flag_zero: molfile::FlagZero::Mixture,
        ..molfile::ReadOptions::default()
    };
    let read = |text: &str| molfile::parse_with(text.as_bytes(), &options).unwrap();
    let record = read(&text);
    let [group] = record.molecule.stereo_groups() else {
        panic!("one group")
    };
    assert_eq!((group.kind, &group.atoms[..]), (GroupKind::And, &[0][..]));
    let absolute = read(&text.replace("COUNTS 4 3 0 0 0", "COUNTS 4 3 0 0 1"));
    assert!(absolute.molecule.stereo_groups().is_empty());
}

/// What changes nothing about the structure is read through.
#[rstest]
#[case::abbreviation(
    "BEGIN SGROUP\n1 SUP 0 ATOMS=(1 1) LABEL=\"a \"\"b\"\" c\" BRKXYZ=(9 0 0 0 0 0 0 0 0 0)\nEND SGROUP",
    "group-ignored"
)]
#[case::defaults(
    "BEGIN SGROUP\nDEFAULT CLASS=A\n1 DAT 0 FIELDDATA=\"x = (1\"\nEND SGROUP",
    "group-ignored"
)]
#[case::objects("BEGIN OBJ3D\n1 -1 0\nEND OBJ3D", "objects-ignored")]
#[case::unknown("FUTURE 1 2", "unknown-line")]
fn read_through(#[case] more: &str, #[case] code: &str) {
    let record = read(&draw(&["1 C 0 0 0 0"], &[], &format!("{more}\n")));
    assert_eq!(formula(&record), "CH4");
    assert_eq!(codes(&record), [code]);
}

#[rstest]
#[case::list("1 [C,N] 0 0 0 0", "query")]
#[case::not_in_list("1 NOT[C,N] 0 0 0 0", "query")]
#[case::quoted_list("1 \"NOT [C]\" 0 0 0 0", "query")]
#[case::group("1 R# 0 0 0 0 RGROUPS=(1 1)", "query")]
#[case::any("1 A 0 0 0 0", "query")]
#[case::attachment("1 C 0 0 0 0 ATTCHPT=1", "query")]
#[case::substitution("1 C 0 0 0 0 SUBST=2", "query")]
#[case::template("1 Leu 0 0 0 0 CLASS=AA SEQID=1", "unsupported")]
#[case::unknown("1 Leu 0 0 0 0", "unknown-element")]
#[case::charge("1 C 0 0 0 0 CHG=16", "number-out-of-range")]
#[case::no_charge("1 C 0 0 0 0 CHG=", "missing-field")]
#[case::no_number("C C 0 0 0 0", "bad-number")]
#[case::zero("0 C 0 0 0 0", "number-out-of-range")]
#[case::huge("99999999999 C 0 0 0 0", "number-out-of-range")]
#[case::not_a_number("1 C nan 0 0 0", "bad-number")]
#[case::far("1 C 1e308 0 0 0", "number-out-of-range")]
#[case::short("1 C 0 0", "missing-field")]
#[case::open("1 \"C 0 0 0 0", "malformed")]
#[case::open_list("1 C 0 0 0 0 RGROUPS=(1 1", "malformed")]
fn atoms_that_are_refused(#[case] atom: &str, #[case] code: &str) {
    let error = molfile::parse(draw(&[atom], &[], "").as_bytes()).unwrap_err();
    assert_eq!(error.code(), code, "{error}");
}

#[rstest]
#[case::query_type("1 8 1 2", "query")]
#[case::no_type("1 11 1 2", "number-out-of-range")]
#[case::no_such_atom("1 1 1 3", "no-such-atom")]
#[case::zero("1 1 0 2", "no-such-atom")]
#[case::itself("1 1 2 2", "self-bond")]
#[case::configuration("1 1 1 2 CFG=4", "number-out-of-range")]
fn bonds_that_are_refused(#[case] bond: &str, #[case] code: &str) {
    let atoms = ["1 C 0 0 0 0", "2 C 1 0 0 0"];
    let error = molfile::parse(draw(&atoms, &[bond], "").as_bytes()).unwrap_err();
    assert_eq!(error.code(), code, "{error}");
}

#[rstest]
#[case::group("BEGIN SGROUP\n1 SRU 0 ATOMS=(1 1)\nEND SGROUP\n", "unsupported")]
#[case::link("LINKNODE 1 2 2 1 2 1 3\n", "query")]
#[case::nested("BEGIN SGROUP\nBEGIN BOND\n", "malformed")]
#[case::crossed("BEGIN SGROUP\nEND COLLECTION\n", "malformed")]
#[case::not_opened("END SGROUP\n", "malformed")]
#[case::not_known("BEGIN FUTURE\nEND FUTURE\n", "malformed")]
#[case::not_closed("BEGIN OBJ3D\n", "unexpected-end")]
fn tables_that_are_refused(#[case] more: &str, #[case] code: &str) {
    let error = molfile::parse(draw(&["1 C 0 0 0 0"], &[], more).as_bytes()).unwrap_err();
    assert_eq!(error.code(), code, "{error}");
}

#[test]
fn errors_show_the_place() {
    let text = draw(&["1 C 0 0 0 0"], &[], "");
    assert_snapshot!(refuse(&text.replace("COUNTS 1", "COUNTS 2")), @r"
    6:15: 2 atoms are declared, but there are 1
    6 | M  V30 COUNTS 2 0 0 0 0
      |        -------^--------
    ");
    assert_snapshot!(refuse(&text.replace("COUNTS 1", "COUNTS 999999999")), @r"
    6:15: the record has more than 200000 atoms
    6 | M  V30 COUNTS 999999999 0 0 0 0
      |               ^^^^^^^^^
    ");
    assert_snapshot!(refuse(&text.replace("0 0\nM  V30 END ATOM", "0 0 -\nM  V30 CHG=x\nM  V30 END ATOM")), @r"
    9:12: the charge is not a number
    9 | M  V30 CHG=x
      |            ^
    ");
    assert_snapshot!(refuse(&text.replace("M  V30 END ATOM\n", "M  V30 1 N 1 0 0 0\nM  V30 END ATOM\n")), @r"
    9:8: the number 1 is given twice
    9 | M  V30 1 N 1 0 0 0
      |        ^
    ");
    assert_snapshot!(refuse(&text.replace("M  V30 END ATOM\n", "")), @r"
    9:8: this is not M  V30 END ATOM
    9 | M  V30 BEGIN BOND
      |        ^^^^^^^^^^
    ");
    assert_snapshot!(refuse(&text[..text.find("M  V30 END ATOM").unwrap()]), @r"
    9:1: the record ends where M  V30 END ATOM is expected
    9 | 
      | ^
    ");
    assert_snapshot!(refuse(&text.replace("M  V30 END CTAB\n", "M  V30 END CTAB\nM  V30 BEGIN RGROUP 1\n")), @r"
    13:8: an R group makes this a query, not a structure
    13 | M  V30 BEGIN RGROUP 1
       |        ^^^^^^^^^^^^^^
    ");
}

/// A continuation without end and numbers beyond the limit are errors, whatever they claim.
#[test]
fn limits_hold() {
    let mut text = table("BEGIN CTAB").replace("M  END\n", "");
    text.push_str(&"M  V30 -\n".repeat(10_000));
    assert_eq!(
        molfile::parse(text.as_bytes()).unwrap_err().code(),
        "unexpected-end"
    );
    let options = molfile::ReadOptions {
        limits: Limits {
            atoms: 1,
            ..Limits::default()
        },
        ..molfile::ReadOptions::default()
    };
    let text = draw(&["1 C 0 0 0 0", "2 C 1 0 0 0"], &[], "");
    for text in [text.clone(), text.replace("COUNTS 2", "COUNTS 1")] {
        let error = molfile::parse_with(text.as_bytes(), &options).unwrap_err();
        assert_eq!(error.code(), "too-many-atoms");
    }
}

#[test]
fn an_empty_table_needs_no_sections() {
    let record = read(&table("BEGIN CTAB\nCOUNTS 0 0 0 0 0\nEND CTAB"));
    assert_eq!(codes(&record), ["no-atoms"]);
}
