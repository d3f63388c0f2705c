//! What cannot be read, and how that is shown.

use insta::assert_snapshot;
use molkin_graph::Limits;
use rstest::rstest;

use super::draw_solid;
use crate::molfile;

fn refuse(text: &str) -> String {
    molfile::parse(text.as_bytes())
        .unwrap_err()
        .render()
        .to_string()
}

const ETHANOL: &str = "ethanol
  drawn by hand

  3  2  0  0  0  0            999 V2000
    0.0000    0.0000    0.0000 C   0  0
    1.2990    0.7500    0.0000 C   0  0
    2.5981    0.0000    0.0000 O   0  0
  1  2  1  0
  2  3  1  0
M  END
";

/// The molfile of ethanol with one piece of it replaced.
fn broken(piece: &str, by: &str) -> String {
    assert_eq!(ETHANOL.matches(piece).count(), 1, "{piece:?}");
    refuse(&ETHANOL.replace(piece, by))
}

#[test]
fn atoms_and_numbers() {
    assert_snapshot!(broken("0.7500    0.0000 C", "  a.75    0.0000 C"), @r"
    6:11: the coordinate is not a number
    6 |     1.2990      a.75    0.0000 C   0  0
      |           ^^^^^^^^^^
    ");
    assert_snapshot!(broken("0.7500    0.0000 C", "   NaN    0.0000 C"), @r"
    6:11: the coordinate is not a number
    6 |     1.2990       NaN    0.0000 C   0  0
      |           ^^^^^^^^^^
    ");
    assert_snapshot!(broken("2.5981    0.0000", "2.5981     1e300"), @r"
    7:11: the coordinate must be from -10000000 to 10000000
    7 |     2.5981     1e300    0.0000 O   0  0
      |           ^^^^^^^^^^
    ");
    assert_snapshot!(broken("O   0  0", "Ox  0  0"), @r#"
    7:32: "Ox" is not the symbol of an element
    7 |     2.5981    0.0000    0.0000 Ox  0  0
      |                                ^^^
    "#);
    assert_snapshot!(broken("O   0  0", "O   0  9"), @r"
    7:37: the charge code must be from 0 to 7
    7 |     2.5981    0.0000    0.0000 O   0  9
      |                                     ^^^
    ");
    assert_snapshot!(broken("O   0  0", "R#  0  0"), @r"
    7:32: an R group makes this a query, not a structure
    7 |     2.5981    0.0000    0.0000 R#  0  0
      |                                ^^^
    ");
    assert_snapshot!(broken("O   0  0", ""), @r"
    7:32: the atom symbol is missing
    7 |     2.5981    0.0000    0.0000
      | 
    ");
}

#[test]
fn bonds() {
    assert_snapshot!(broken("  2  3  1", "  2  9  1"), @r"
    9:4: atom 9 is named, but 3 atoms are declared
    9 |   2  9  1  0
      |    ^^^
    ");
    assert_snapshot!(broken("  2  3  1", "  0  3  1"), @r"
    9:1: atom 0 is named, but 3 atoms are declared
    9 |   0  3  1  0
      | ^^^
    ");
    assert_snapshot!(broken("  2  3  1", "  3  3  1"), @r"
    9:4: atom 3 is bonded to itself
    9 |   3  3  1  0
      |    ^^^
    ");
    assert_snapshot!(broken("  2  3  1", "  2  1  1"), @r"
    9:1: atoms 2 and 1 are bonded twice
    9 |   2  1  1  0
      | ^^^^^^^^^^^^
    ");
    assert_snapshot!(broken("  2  3  1", "  2  3  8"), @r"
    9:7: an any-order bond makes this a query, not a structure
    9 |   2  3  8  0
      |       ^^^
    ");
    assert_snapshot!(broken("  2  3  1", "  2  3 -1"), @r"
    9:7: the bond type must be from 1 to 10
    9 |   2  3 -1  0
      |       ^^^
    ");
    assert_snapshot!(broken("  2  3  1  0\n", ""), @r"
    9:1: the record ends where a bond line is expected
    9 | M  END
      | ^^^^^^
    ");
    assert_snapshot!(broken("  1  2  1", "  1  2  4"), @r"
    5:32: atom 1 is aromatic but in no aromatic ring
    5 |     0.0000    0.0000    0.0000 C   0  0
      |                                ^^^
    ");
}

#[test]
fn header() {
    assert_snapshot!(refuse(""), @r"
    1:1: the record ends where the name line of a molfile is expected
    1 | 
      | ^
    ");
    assert_snapshot!(refuse("\n\n"), @r"
    3:1: the record ends where the comment line of a molfile is expected
    3 | 
      | ^
    ");
    assert_snapshot!(refuse(&ETHANOL["ethanol\n".len()..]), @r"
    3:1: this is the counts line, but three lines belong before it: is a blank first line missing?
    3 |   3  2  0  0  0  0            999 V2000
      | ^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^
    ");
    assert_snapshot!(broken("  3  2  0  0  0  0            999 V2000", "three atoms"), @r"
    4:1: this is not a counts line
    4 | three atoms
      | ^^^^^^^^^^^
    ");
    assert_snapshot!(broken("V2000", "V3000"), @r"
    5:1: this is not a line that starts with M  V30
    5 |     0.0000    0.0000    0.0000 C   0  0
      | ^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^
    ");
    assert_snapshot!(broken("V2000", "V4000"), @r"
    4:34: this is not V2000 or V3000
    4 |   3  2  0  0  0  0            999 V4000
      |                                  ^^^^^^
    ");
}

#[test]
fn properties() {
    assert_snapshot!(broken("M  END", "M  CHG  2   1   1"), @r"
    10:18: the atom number is missing
    10 | M  CHG  2   1   1
       |                  ^
    ");
    assert_snapshot!(broken("M  END", "M  CHG  1   4   1"), @r"
    10:10: atom 4 is named, but 3 atoms are declared
    10 | M  CHG  1   4   1
       |          ^^^^
    ");
    assert_snapshot!(broken("M  END", "M  CHG  1   1  16"), @r"
    10:14: the charge must be from -15 to 15
    10 | M  CHG  1   1  16
       |              ^^^^
    ");
    assert_snapshot!(broken("M  END", "M  ALS   1  2 F C   N"), @r"
    10:1: an atom list makes this a query, not a structure
    10 | M  ALS   1  2 F C   N
       | ^^^^^^^^^^^^^^^^^^^^^
    ");
    assert_snapshot!(broken("M  END", "M  STY  1   1 SRU"), @r"
    10:14: a polymer is not read
    10 | M  STY  1   1 SRU
       |              ^^^^
    ");
    assert_snapshot!(broken("M  END", "S  SKP999"), @r"
    11:1: the record ends where a line to skip is expected
    11 | 
       | ^
    ");
    assert_snapshot!(broken("M  END\n", ""), @r"
    10:1: the record ends where M  END is expected
    10 | 
       | ^
    ");
}

/// Everything that makes a molfile something else than one structure has the code `query`.
#[rstest]
#[case("A")]
#[case("Q")]
#[case("X")]
#[case("M")]
#[case("L")]
#[case("R1")]
#[case("MH")]
fn query_atoms(#[case] symbol: &str) {
    let text = draw_solid(&[(symbol, 0.0, 0.0, 0.0)], &[], "");
    assert_eq!(molfile::parse(text.as_bytes()).unwrap_err().code(), "query");
}

#[rstest]
#[case::attachment("M  APO  1   1   1", "query")]
#[case::r_group("M  RGP  1   1   1", "query")]
#[case::link("M  LIN  1   1   3   2   3", "query")]
#[case::substitution("M  SUB  1   1   2", "query")]
#[case::copolymer("M  STY  1   1 COP", "unsupported")]
fn query_lines(#[case] line: &str, #[case] code: &str) {
    let text = ETHANOL.replace("M  END", line);
    assert_eq!(molfile::parse(text.as_bytes()).unwrap_err().code(), code);
}

#[test]
fn a_line_in_memory_is_bounded_as_one_of_a_source() {
    let text = format!(
        "{}\n>  <long>\n{}\n",
        draw_solid(&[("C", 0.0, 0.0, 0.0)], &[], ""),
        "x".repeat(70)
    );
    let read = |line_bytes| {
        let limits = Limits {
            line_bytes,
            ..Limits::default()
        };
        let options = molfile::ReadOptions {
            limits,
            ..molfile::ReadOptions::default()
        };
        molfile::parse_with(text.as_bytes(), &options)
    };
    assert!(read(70).is_ok());
    let error = read(69).unwrap_err();
    assert_eq!(error.to_string(), "9:70: the line is longer than 69 bytes");
}

#[test]
fn limits() {
    let limits = Limits {
        atoms: 2,
        ..Limits::default()
    };
    let options = molfile::ReadOptions {
        limits,
        ..Default::default()
    };
    let error = molfile::parse_with(ETHANOL.as_bytes(), &options).unwrap_err();
    assert_eq!(error.code(), "too-many-atoms");
    let limits = Limits {
        record_bytes: 20,
        ..Limits::default()
    };
    let options = molfile::ReadOptions {
        limits,
        ..Default::default()
    };
    let error = molfile::parse_with(ETHANOL.as_bytes(), &options).unwrap_err();
    assert_eq!(error.code(), "record-too-long");
}

/// Every cut of a molfile is an error or a molecule, and so is every change of one byte.
#[test]
fn no_damage_panics() {
    let text = ETHANOL.as_bytes();
    for end in 0..text.len() {
        let _ = molfile::parse(&text[..end]);
    }
    for at in 0..text.len() {
        for byte in [b' ', b'-', b'0', b'9', b'M', b'\n', b'\r', 0, 0xff] {
            let mut changed = text.to_vec();
            changed[at] = byte;
            let _ = molfile::parse(&changed);
        }
    }
}
