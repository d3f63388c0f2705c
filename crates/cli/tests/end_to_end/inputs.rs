//! What arguments lead to.

use rstest::rstest;

use crate::runner::{Folder, demo, run, with_input};

const WATER: &str = "water\n\n\n  1  0  0  0  0  0            999 V2000\n    0.0000    0.0000    0.0000 O   0  0\nM  END\n";

/// The source, record, name and formula of each line of keys.
fn read(text: &str) -> Vec<String> {
    let lines = text.lines().skip(1);
    lines
        .map(|line| {
            let fields: Vec<&str> = line.split(',').collect();
            [fields[0], fields[1], fields[2], fields[4]].join(" ")
        })
        .collect()
}

#[test]
fn a_smiles_may_bring_a_name() {
    assert_eq!(
        read(&run(&["keys", "CCO ethanol"]).out),
        ["CCO ethanol 1 ethanol C2H6O"]
    );
    assert_eq!(read(&run(&["keys", "smiles:O"]).out), ["O 1  H2O"]);
}

#[test]
fn standard_input_is_smiles_or_sdf() {
    assert_eq!(
        read(&with_input(&["keys", "-"], "O water\n").out),
        ["- 1 water H2O"]
    );
    assert_eq!(
        read(&with_input(&["keys", "-"], WATER).out),
        ["- 1 water H2O"]
    );
    assert!(read(&with_input(&["keys", "-"], "").out).is_empty());
}

#[test]
fn standard_input_serves_once() {
    let twice = with_input(&["compare", "-", "-"], "C\n");
    assert_eq!((twice.status, twice.out.as_str()), (2, ""));
    let twice = with_input(&["keys", "-", "-"], "C\n");
    assert_eq!((twice.status, read(&twice.out).len()), (2, 1));
}

#[test]
fn files_of_any_name() {
    let folder = Folder::new("files_of_any_name")
        .with("plain", "O water\n")
        .with("drawn", WATER)
        .with("C", "CC ethane\n");
    assert_eq!(
        read(&folder.run(&["keys", "file:plain"]).out),
        ["plain 1 water H2O"]
    );
    assert_eq!(
        read(&folder.run(&["keys", "file:drawn"]).out),
        ["drawn 1 water H2O"]
    );
    assert_eq!(
        read(&folder.run(&["keys", "C", "file:C"]).out),
        ["C 1  CH4", "C 1 ethane C2H6"]
    );
}

#[test]
fn a_file_name_that_looks_like_no_file() {
    let folder = Folder::new("a_file_name_that_looks_like_no_file").with("plain", "O\n");
    let outcome = folder.run(&["compare", "plain", "O"]);
    assert_eq!((outcome.status, outcome.out.as_str()), (2, ""));
    assert!(
        outcome.words.contains("write file:plain"),
        "{}",
        outcome.words
    );
}

const TABLE: &str = "id;Drawn;SMILES;price\nA 1;O;CCO;12\nA 2;C;C1CC;5\nA 3;N\nA 4;CC;\"CC\";7\n";

#[test]
fn tables_with_their_columns_found_or_chosen() {
    let folder = Folder::new("tables_with_their_columns_found_or_chosen")
        .with("t.csv", TABLE)
        .with("t.tsv", TABLE.replace(';', "\t"));
    for name in ["t.csv", "t.tsv"] {
        let outcome = folder.run(&["keys", name]);
        let rows = [
            format!("{name} 1 A 1 C2H6O"),
            format!("{name} 2 A 2 "),
            format!("{name} 3 A 3 "),
            format!("{name} 4 A 4 C2H6"),
        ];
        assert_eq!(read(&outcome.out), rows);
        assert!(
            outcome.out.contains("3:8: ring-not-closed: "),
            "{}",
            outcome.out
        );
        assert!(
            outcome.out.contains("4:6: field-count: "),
            "{}",
            outcome.out
        );
        assert_eq!(outcome.words, "molkin: 2 of 4 records failed\n");
        let chosen = folder.run(&["keys", name, "--structure", "drawn", "--name", "PRICE"]);
        let rows = [
            format!("{name} 1 12 H2O"),
            format!("{name} 2 5 CH4"),
            format!("{name} 3  "),
            format!("{name} 4 7 C2H6"),
        ];
        assert_eq!(read(&chosen.out), rows);
    }
    let piped = with_input(&["keys", "-"], TABLE);
    assert_eq!(read(&piped.out)[0], "- 1 A 1 C2H6O");
    let paired = folder.run(&["compare", "t.csv", "t.tsv", "--by", "name", "--brief"]);
    assert!(paired.out.contains("4 pairs"), "{}", paired.out);
}

#[rstest]
#[case(&["keys", "t.csv"], "no column is known to hold structures; there are: \"a\", \"b c\"")]
#[case(&["describe", "t.csv", "--structure", "x"], "there is no column \"x\"; there are: \"a\", \"b c\"")]
#[case(&["compare", "t.csv", "C", "--structure", "a", "--name", "c"], "there is no column \"c\"; there are: \"a\", \"b c\"")]
fn a_table_without_its_columns(#[case] arguments: &[&str], #[case] reason: &str) {
    let folder = Folder::new(&format!("a_table_without_its_columns_{}", arguments[0]))
        .with("t.csv", "a,b c\nC,1\n");
    let outcome = folder.run(arguments);
    assert_eq!(
        (outcome.status, outcome.words),
        (2, format!("molkin: t.csv: {reason}\n"))
    );
}

#[test]
fn strict_reading_refuses_what_is_noted_otherwise() {
    let text = "C..C\n";
    assert_eq!(with_input(&["keys", "-"], text).status, 0);
    let strict = with_input(&["keys", "-", "--strict"], text);
    assert_eq!(strict.status, 2);
    assert!(strict.out.contains("misplaced-dot"), "{}", strict.out);
}

#[test]
fn tables_of_valences_can_be_chosen() {
    let tin = WATER.replace(" O", " Sn");
    let formula = |arguments: &[&str]| read(&with_input(arguments, &tin).out).concat();
    assert_eq!(formula(&["keys", "-"]), "- 1 water H2Sn");
    assert_eq!(
        formula(&["keys", "-", "--valences", "late"]),
        "- 1 water Sn"
    );
}

#[test]
fn every_record_counts() {
    let text = "C methane\n\nC1CC broken\nXx\nO water\n";
    let outcome = with_input(&["keys", "-"], text);
    assert_eq!(outcome.status, 2);
    assert_eq!(outcome.words, "molkin: 2 of 5 records failed\n");
    let rows: Vec<&str> = outcome.out.lines().skip(1).collect();
    assert_eq!(rows.len(), 5);
    assert_eq!(
        rows[2],
        "-,3,broken,error,,,,,3:2: ring-not-closed: ring label 1 is opened and never closed,,,,,"
    );
    assert!(rows[4].starts_with("-,5,water,ok,H2O,O,1-"));
}

#[test]
fn one_input_that_fails_does_not_stop_the_next() {
    let outcome = demo(&["keys", "none.smi", "label.mol"]);
    assert_eq!(outcome.status, 2);
    assert_eq!(read(&outcome.out), ["label.mol 1 QM-0417 label C8H8O2"]);
    assert!(
        outcome.words.starts_with("molkin: none.smi: "),
        "{}",
        outcome.words
    );
}

/// A damaged stream ends its input; what came before stands.
#[test]
fn a_damaged_file_breaks_off() {
    let folder =
        Folder::new("a_damaged_file_breaks_off").with("bad.smi.gz", b"\x1f\x8b\x08\x00junk");
    let outcome = folder.run(&["keys", "bad.smi.gz", "C"]);
    assert_eq!((outcome.status, read(&outcome.out).len()), (2, 1));
    let outcome = folder.run(&["compare", "bad.smi.gz", "C"]);
    assert_eq!((outcome.status, outcome.out.as_str()), (2, ""));
    assert!(
        outcome.words.starts_with("molkin: bad.smi.gz, line 1: "),
        "{}",
        outcome.words
    );
}
