//! Trays of samples.

use std::{collections::BTreeMap, fs};

use rstest::rstest;
use serde_json::Value;

use crate::runner::{Folder, Outcome, demo, repository, with_input};

const TRAY: [&str; 4] = ["samples", "tray.csv", "--held", "held.smi"];

fn objects(outcome: &Outcome) -> Vec<Value> {
    let lines = outcome.out.lines();
    lines
        .map(|line| serde_json::from_str(line).unwrap())
        .collect()
}

fn tray(format: &str) -> Outcome {
    demo(&[&TRAY[..], &["--format", format]].concat())
}

/// The samples of a tray from standard input.
fn samples(text: &str, options: &[&str]) -> Vec<Value> {
    let arguments = [&["samples", "-", "--format", "jsonl"], options].concat();
    let found = objects(&with_input(&arguments, text));
    found
        .into_iter()
        .filter(|object| object["type"] == "sample")
        .collect()
}

/// Every row of the demo page: what it says first is the verdict in words.
#[test]
fn the_demo_tray_is_as_its_page_says() {
    let objects = objects(&tray("jsonl"));
    let words: BTreeMap<&str, &str> = objects
        .iter()
        .filter(|object| object["type"] == "sample")
        .map(|object| {
            (
                object["id"].as_str().unwrap(),
                object["words"].as_str().unwrap(),
            )
        })
        .collect();
    assert_eq!(words.len(), 96);
    let page = fs::read_to_string(repository().join("fixtures/demo/README.md")).unwrap();
    let rows = page.lines().filter_map(|line| line.strip_prefix("| QT-"));
    let mut named = 0;
    let mut occurring = std::collections::BTreeSet::new();
    for row in rows {
        let (ids, expected) = row.trim_end_matches(" |").split_once(" | ").unwrap();
        let expected = expected.split(':').next().unwrap();
        for id in ids.split(", ") {
            let id = format!("QT-{}", id.trim_start_matches("QT-"));
            assert_eq!(words[id.as_str()], expected, "{id}");
            occurring.insert(expected);
            named += 1;
        }
    }
    assert_eq!((named, occurring.len()), (36, 9));
}

/// The block of the README is the beginning of what the command beside it writes.
#[test]
fn the_readme_shows_the_output() {
    let page = fs::read_to_string(repository().join("README.md")).unwrap();
    let (_, section) = page.split_once("## A tray of samples").unwrap();
    let command = "-- samples fixtures/demo/tray.csv --held fixtures/demo/held.smi\n";
    let (_, after) = section.split_once(command).unwrap();
    let (_, block) = after.split_once("```text\n").unwrap();
    let (block, _) = block.split_once("```").unwrap();
    assert!(block.lines().count() > 20);
    let outcome = demo(&TRAY);
    assert!(outcome.out.starts_with(block), "{}", outcome.out);
    assert_eq!(outcome.status, 1);
}

#[test]
fn all_forms_say_what_they_are_about_and_agree() {
    let [text, csv, jsonl] = ["text", "csv", "jsonl"].map(tray);
    let caution = "This compares records, not the contents of vials: treat a flagged sample as unknown until analysed.";
    for outcome in [&text, &csv, &jsonl] {
        assert!(outcome.out.lines().next().unwrap().contains(caution));
        assert_eq!((outcome.status, outcome.words.as_str()), (1, ""));
    }
    let rows: Vec<&str> = csv.out.lines().skip(1).collect();
    assert!(
        rows[0].starts_with("line,id,plate,well,verdict,flagged,relation,kind,same_apart_from,")
    );
    assert_eq!(rows[0].split(',').count(), 21);
    assert_eq!(rows.len(), 97);
    let objects = objects(&jsonl);
    let flagged = objects
        .iter()
        .filter(|object| object["flagged"] == true)
        .count();
    assert_eq!(objects[0]["flagged"], flagged);
    assert!(text.out.contains(&format!("96 samples, {flagged} flagged")));
    let in_csv = rows
        .iter()
        .filter(|row| row.split(',').nth(5) == Some("true"));
    assert_eq!(in_csv.count(), flagged);
}

#[test]
fn threads_do_not_show() {
    let run = |threads| demo(&[&TRAY[..], &["--threads", threads]].concat()).out;
    assert_eq!(run("1"), run("5"));
}

#[rstest]
#[case::semicolons("label;received\nCCO;OCC\n")]
#[case::tabs("ordered\tSMILES\nCCO\tOCC\n")]
#[case::molfile(
    "label,received\nO,\"\n\n\n  1  0  0  0  0  0            999 V2000\n    0.0000    0.0000    0.0000 O   0  0\nM  END\"\n"
)]
#[case::mass_alone("label,m/z,ion\nCCN,\"46,0651\",M+H\n")]
fn trays_that_agree(#[case] text: &str) {
    let found = samples(text, &[]);
    assert_eq!(found.len(), 1);
    assert_eq!(found[0]["verdict"], "agrees", "{found:?}");
}

#[test]
fn options_name_columns_ions_and_tolerances() {
    let text = "what,got,weight\nCCN,,46.0653\n";
    let columns = ["--label", "what", "--received", "GOT", "--mz", "weight"];
    let verdict = |more: &[&str]| {
        let found = samples(text, &[&columns[..], more].concat());
        found[0]["verdict"].as_str().unwrap().to_owned()
    };
    assert_eq!(verdict(&[]), "agrees");
    assert_eq!(verdict(&["--within", "1 ppm"]), "measurement-contradicts");
    assert_eq!(verdict(&["--ion", "[M+Na]+"]), "measurement-contradicts");
}

#[test]
fn rows_that_cannot_be_read_stay_on_the_list() {
    let text = "id,label,received,m/z\nA,C1CC,C,\nB,C\nC,C,C,x\nD,C,\"C\nE,C,C,\n";
    let found = samples(text, &[]);
    let lines: Vec<(u64, &str)> = found
        .iter()
        .map(|sample| {
            (
                sample["line"].as_u64().unwrap(),
                sample["verdict"].as_str().unwrap(),
            )
        })
        .collect();
    let expected = [
        (2, "unreadable"),
        (3, "unreadable"),
        (4, "unreadable"),
        (5, "unreadable"),
        (6, "agrees"),
    ];
    assert_eq!(lines, expected);
    assert_eq!(found[0]["errors"][0]["code"], "ring-not-closed");
    assert_eq!(found[1]["errors"][0]["code"], "field-count");
    assert_eq!(found[2]["errors"][0]["code"], "mz");
}

/// A tray comes from elsewhere: it names files in its own folder or below, and no others.
#[test]
fn files_are_those_beside_the_tray() {
    let folder = Folder::new("samples-files").with("held.smi", "CCO\n").with(
        "tray.csv",
        "label,received\nheld.smi,CCO\n../samples-files/held.smi,CCO\n",
    );
    let outcome = folder.run(&["samples", "tray.csv", "--format", "jsonl"]);
    let objects = objects(&outcome);
    assert_eq!(objects[1]["verdict"], "agrees");
    assert_eq!(objects[2]["verdict"], "unreadable");
}

#[test]
fn held_names() {
    let folder = Folder::new("samples-held")
        .with("held.smi", "CCO one\nCCN two\nCCC two\n")
        .with("tray.csv", "label,received\none,OCC\ntwo,CCN\nthree,C\n");
    let outcome = folder.run(&[
        "samples", "tray.csv", "--held", "held.smi", "--format", "jsonl",
    ]);
    let objects = objects(&outcome);
    assert_eq!(objects[1]["verdict"], "agrees");
    assert_eq!(objects[2]["errors"][0]["code"], "name-repeated");
    assert_eq!(objects[3]["errors"][0]["code"], "not-held");
}

#[rstest]
#[case::no_flag("label,received\nCCO,OCC\n", &[], 0)]
#[case::flagged("label,received\nCCO,CCN\n", &[], 1)]
#[case::no_labels("id,received\nCCO,CCN\n", &[], 2)]
#[case::no_such_column("label,received\nCCO,CCN\n", &["--mz", "mass"], 2)]
#[case::no_ion("label,received\nCCO,CCN\n", &["--ion", "M"], 2)]
#[case::empty("", &[], 2)]
fn exit_status(#[case] text: &str, #[case] options: &[&str], #[case] expected: i32) {
    let outcome = with_input(&[&["samples", "-"], options].concat(), text);
    assert_eq!(outcome.status, expected, "{outcome:?}");
    assert_eq!(outcome.words.is_empty(), expected < 2);
}
