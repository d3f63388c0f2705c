//! `molkin families`.

use insta::assert_snapshot;
use rstest::rstest;
use serde_json::Value;

use crate::runner::{Folder, demo, repository, run, with_input};

/// The rows that have a number or a message.
fn rows(out: &str) -> String {
    let rows = out.lines().filter(|row| !row.contains(",ok,,,,,,,,,,,"));
    rows.map(|row| format!("{row}\n")).collect()
}

#[test]
fn a_shelf_and_a_delivery() {
    let outcome = demo(&[
        "families",
        "held.smi",
        "vendor.sdf",
        "--overlook",
        "salt,charge",
    ]);
    assert_eq!(outcome.status, 2);
    assert_snapshot!(rows(&outcome.out), @r#"
    source,record,name,status,duplicates,possible_duplicates,stereo,forms,isomers,first_source,first_record,relation,kind,open,message,explanation
    held.smi,1,QM-101,ok,1,,,,,,,,,,,
    held.smi,2,QM-102,ok,,1,,,,,,,,,,
    held.smi,3,QM-103,ok,,,1,,,,,,,,,
    held.smi,4,QM-104,ok,,,2,,1,,,,,,,
    held.smi,5,QM-105,ok,,2,3,,2,,,,,,,
    held.smi,6,QM-106,ok,,,4,,,,,,,,,
    held.smi,7,QM-107,ok,,,,,3,,,,,,,
    held.smi,8,QM-108,ok,,,,1,,,,,,,,
    held.smi,9,QM-109,ok,2,,,,,,,,,,,
    held.smi,11,QM-111,ok,3,,,,2,held.smi,5,constitutional,,false,,
    held.smi,12,QM-112,ok,,,,2,4,,,,,,,
    held.smi,13,QM-113,ok,4,,,,1,held.smi,4,constitutional,,false,,
    held.smi,14,QM-114,ok,,,,,5,,,,,,,
    held.smi,15,QM-115,ok,5,,,,,,,,,,,
    vendor.sdf,1,QM-101,ok,1,,,,,held.smi,1,identical,,false,,
    vendor.sdf,2,QM-103,ok,,,1,,,held.smi,3,stereo,enantiomers,false,,
    vendor.sdf,3,QM-102,ok,,1,,,,held.smi,2,identical,,true,,
    vendor.sdf,4,QM-104,ok,,,2,,1,held.smi,4,stereo,diastereomers,false,,
    vendor.sdf,5,QM-105,ok,,2,3,,2,held.smi,5,stereo,undetermined,false,,
    vendor.sdf,6,QM-106,ok,,,4,,,held.smi,6,stereo,unresolved,false,,
    vendor.sdf,7,QM-107,ok,,,,,3,held.smi,7,constitutional,,false,,
    vendor.sdf,8,QM-108,ok,,,,1,,held.smi,8,not-isomers,,false,,
    vendor.sdf,9,QM-109,ok,2,,,,,held.smi,9,identical,,false,,
    vendor.sdf,10,QM-110,error,,,,,,,,,,,"349:4: no-such-atom: atom 14 is named, but 11 atoms are declared",
    vendor.sdf,11,QM-111,ok,3,,,,2,held.smi,11,identical,,false,,
    vendor.sdf,12,QM-112,ok,,,,2,4,held.smi,12,constitutional,,false,,
    vendor.sdf,13,QM-113,ok,4,,,,1,held.smi,13,identical,,false,,
    vendor.sdf,14,QM-116,ok,,,,,5,held.smi,14,constitutional,,false,,
    vendor.sdf,15,QM-115,ok,5,,,,,held.smi,15,identical,,false,,
    "#);
    assert_snapshot!(outcome.words, @r#"
    molkin: 1 of 30 records failed
    molkin: 30 records, 1 failed, 23 different compounds
    molkin: duplicates: 10 records in 5 groups (5 of 2)
    molkin: possible duplicates: 4 records in 2 groups (2 of 2)
    molkin: stereoisomers: 8 records in 4 groups (4 of 2)
    molkin: forms of one parent: 4 records in 2 groups (2 of 2)
    molkin: isomers: 14 records in 5 groups (3 of 2, 2 of 4)
    "#);
}

#[test]
fn a_delivery_against_a_shelf() {
    let outcome = demo(&[
        "families",
        "vendor.sdf",
        "--against",
        "held.smi",
        "--only",
        "duplicates,stereo",
        "--explain",
        "stereo",
        "--explain-limit",
        "2",
    ]);
    assert_snapshot!(outcome.out, @r#"
    source,record,name,status,duplicates,possible_duplicates,stereo,forms,isomers,first_source,first_record,relation,kind,open,message,explanation
    vendor.sdf,1,QM-101,ok,1,,,,,held.smi,1,identical,,false,,
    vendor.sdf,2,QM-103,ok,,,1,,,held.smi,3,stereo,enantiomers,false,,"Enantiomers: mirror images that do not coincide; the only stereocentre is inverted: C3 (R in A, S in B)."
    vendor.sdf,4,QM-104,ok,,,2,,1,held.smi,4,stereo,diastereomers,false,,"Diastereomers (cis/trans isomers): the only double bond is of opposite geometry: C3=C4 (E in A, Z in B)."
    vendor.sdf,5,QM-105,ok,,2,3,,2,held.smi,5,stereo,undetermined,false,,
    vendor.sdf,6,QM-106,ok,,,4,,,held.smi,6,stereo,unresolved,false,,
    vendor.sdf,9,QM-109,ok,2,,,,,held.smi,9,identical,,false,,
    vendor.sdf,11,QM-111,ok,3,,,,2,held.smi,11,identical,,false,,
    vendor.sdf,13,QM-113,ok,4,,,,1,held.smi,13,identical,,false,,
    vendor.sdf,15,QM-115,ok,5,,,,,held.smi,15,identical,,false,,
    "#);
    assert_snapshot!(outcome.words, @r#"
    molkin: 1 of 15 records failed
    molkin: the first 2 of 3 records are explained; --explain-limit N explains more
    molkin: 30 records, 15 of them held, 1 failed, 23 different compounds
    molkin: duplicates: 10 records in 5 groups (5 of 2)
    molkin: possible duplicates: 4 records in 2 groups (2 of 2)
    molkin: stereoisomers: 8 records in 4 groups (4 of 2)
    molkin: isomers: 14 records in 5 groups (3 of 2, 2 of 4)
    "#);
}

/// The same facts in all forms of the table.
#[test]
fn objects_say_what_lines_say() {
    let arguments = ["families", "held.smi", "vendor.sdf"];
    let lines = demo(&arguments).out;
    let objects = demo(&[&arguments[..], &["--format", "jsonl"]].concat()).out;
    let mut lines = lines
        .lines()
        .map(|line| line.split(',').collect::<Vec<_>>());
    let header = lines.next().unwrap();
    assert_eq!(objects.lines().count(), 30);
    let mut compared = 0;
    // A message with commas stands in quotes, so that row is not as easily cut.
    for (line, object) in lines
        .zip(objects.lines())
        .filter(|(line, _)| line.len() == header.len())
    {
        compared += 1;
        let object: Value = serde_json::from_str(object).unwrap();
        assert_eq!(object["version"], 1);
        for (column, text) in header.iter().zip(line) {
            let value = match object.get(column) {
                None => String::new(),
                Some(Value::String(text)) => text.clone(),
                Some(other) => other.to_string(),
            };
            assert_eq!(value, text, "{column}");
        }
    }
    assert_eq!(compared, 29);
}

#[test]
fn the_summary_is_an_object() {
    let folder = Folder::new("families_summary").with("a.smi", "OCC\nCCO\nCOC\nC1\n");
    let outcome = folder.run(&[
        "families",
        "a.smi",
        "--against",
        "CCO",
        "--summary",
        "s.json",
    ]);
    assert_eq!(outcome.status, 2);
    let summary = std::fs::read_to_string(folder.path().join("s.json")).unwrap();
    assert_snapshot!(summary, @r#"
    {"version":1,"records":5,"held":1,"failed":1,"distinct":2,"duplicates":{"groups":1,"records":3,"sizes":[{"size":3,"groups":1}]},"possible_duplicates":{"groups":0,"records":0,"sizes":[]},"stereo":{"groups":0,"records":0,"sizes":[]},"forms":{"groups":0,"records":0,"sizes":[]},"isomers":{"groups":1,"records":4,"sizes":[{"size":4,"groups":1}]}}
    "#);
}

/// Where the rows lie, and how a file comes, makes no difference.
#[rstest]
#[case::in_files(&["--memory", "0"])]
#[case::in_little_memory(&["--memory", "1"])]
fn spilling_changes_nothing(#[case] options: &[&str]) {
    let mut text = String::new();
    for number in 0..4_000_usize {
        let chain = "C".repeat(number * 7_919 % 61 + 1);
        let mark = ["@", "@@", ""][number % 3];
        text.push_str(&format!("{chain}[C{mark}H](O)F {number}\n"));
    }
    let arguments = ["families", "-", "--threads", "2"];
    let expected = with_input(&arguments, &text);
    let found = with_input(&[&arguments[..], options].concat(), &text);
    assert_eq!(expected.out.lines().count(), 4_001);
    assert!(expected.out.contains("undetermined") && expected.out.contains("enantiomers"));
    assert_eq!((found.out, found.words), (expected.out, expected.words));
}

#[test]
fn a_table_as_columns_is_a_file() {
    let folder = Folder::new("families_columns").with("a.smi", "OCC\nCCO\nC1\n");
    for command in ["keys", "families"] {
        let arguments = [
            command,
            "a.smi",
            "--format",
            "parquet",
            "--output",
            "t.parquet",
        ];
        let outcome = folder.run(&arguments);
        assert_eq!((outcome.status, outcome.out.as_str()), (2, ""));
        let bytes = std::fs::read(folder.path().join("t.parquet")).unwrap();
        assert!(bytes.starts_with(b"PAR1") && bytes.ends_with(b"PAR1"));
    }
}

#[test]
fn standard_input_is_read_once() {
    let outcome = run(&["families", "-", "--against", "-"]);
    assert_eq!((outcome.status, outcome.out.as_str()), (2, ""));
    assert!(outcome.words.contains("only once"), "{}", outcome.words);
}

/// The README shows what is written.
#[test]
fn the_readme_shows_what_is_written() {
    let readme = std::fs::read_to_string(repository().join("README.md")).unwrap();
    let (_, section) = readme.split_once("## Whole files\n").unwrap();
    let (_, section) = section.split_once("molkin families ").unwrap();
    let (arguments, section) = section.split_once('\n').unwrap();
    let (_, shown) = section.split_once("```text\n").unwrap();
    let (shown, _) = shown.split_once("```").unwrap();
    let arguments: Vec<&str> = std::iter::once("families")
        .chain(arguments.split(' '))
        .collect();
    let outcome = run(&arguments);
    assert_eq!(outcome.out + &outcome.words, shown);
}
