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

#[rstest]
#[case("t.csv")]
#[case("t.tsv.gz")]
fn tables_are_refused(#[case] name: &str) {
    let outcome = run(&["keys", name]);
    let words = format!("molkin: {name}: .csv and .tsv files are not read yet\n");
    assert_eq!((outcome.status, outcome.words), (2, words));
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
        "-,3,broken,error,,,,,3:2: ring-not-closed: ring label 1 is opened and never closed"
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
