//! Which records are compared with each other.

use serde_json::Value;

use crate::runner::{Folder, Outcome, demo, run};

/// Each pair as "record record relation", `!` for one without a verdict.
fn pairs(outcome: &Outcome) -> Vec<String> {
    let lines = outcome.out.lines();
    lines
        .map(|line| {
            let pair: Value = serde_json::from_str(line).unwrap();
            let relation = pair.get("relation").and_then(Value::as_str).unwrap_or("!");
            format!("{} {} {relation}", pair["a"]["record"], pair["b"]["record"])
        })
        .collect()
}

fn words(outcome: &Outcome) -> Vec<&str> {
    let caution = |line: &&str| !line.contains("This compares") && !line.starts_with("Site ");
    outcome.words.lines().filter(caution).collect()
}

#[test]
fn record_by_record() {
    let folder = Folder::new("record_by_record")
        .with("a.smi", "CCO\nC1\nCC\n")
        .with("b.smi", "OCC\nC\nO");
    let outcome = folder.run(&["compare", "a.smi", "b.smi", "--format", "jsonl"]);
    assert_eq!(
        pairs(&outcome),
        ["1 1 identical", "2 2 !", "3 3 not-isomers"]
    );
    assert_eq!(outcome.status, 2);
}

#[test]
fn different_counts_are_trouble_after_the_shorter_ends() {
    let folder = Folder::new("different_counts")
        .with("a.smi", "C\nC\n")
        .with("b.smi", "C\nC\nC\nC\n")
        .with("c.smi", "C\nC\nC\n");
    let outcome = folder.run(&["compare", "a.smi", "b.smi", "--format", "jsonl"]);
    assert_eq!(pairs(&outcome), ["1 1 identical", "2 2 identical"]);
    assert_eq!(outcome.status, 2);
    assert_eq!(
        words(&outcome)[0],
        "molkin: records 3 to 4 of b.smi have no partner: a.smi ends after record 2"
    );
    let outcome = folder.run(&["compare", "c.smi", "a.smi", "--format", "jsonl"]);
    assert_eq!(
        words(&outcome)[0],
        "molkin: record 3 of c.smi has no partner: a.smi ends after record 2"
    );
}

#[test]
fn one_against_many() {
    let folder = Folder::new("one_against_many").with("many.smi", "CCO\nC1\nCOC\n");
    let outcome = folder.run(&["compare", "CCO", "many.smi", "--format", "jsonl"]);
    assert_eq!(
        pairs(&outcome),
        ["1 1 identical", "1 2 !", "1 3 constitutional"]
    );
    let outcome = folder.run(&["compare", "many.smi", "CCO", "--format", "jsonl"]);
    assert_eq!(
        pairs(&outcome),
        ["1 1 identical", "2 1 !", "3 1 constitutional"]
    );
}

#[test]
fn by_name() {
    let outcome = demo(&[
        "compare",
        "held.smi",
        "vendor.sdf",
        "--by",
        "name",
        "--format",
        "jsonl",
    ]);
    assert_eq!(
        pairs(&outcome),
        [
            "1 1 identical",
            "2 3 identical",
            "3 2 stereo",
            "4 4 stereo",
            "5 5 stereo",
            "6 6 stereo",
            "7 7 constitutional",
            "8 8 not-isomers",
            "9 9 identical",
            "10 10 !",
            "11 11 identical",
            "12 12 constitutional",
            "13 13 identical",
            "15 15 identical",
        ]
    );
    assert_eq!(outcome.status, 2);
    let words = words(&outcome);
    assert_eq!(
        words[0],
        "molkin: not compared: held.smi, record 14: vendor.sdf has no \"QM-114\""
    );
    assert_eq!(
        words[1],
        "molkin: not compared: vendor.sdf, record 14: held.smi has no \"QM-116\""
    );
}

#[test]
fn names_that_do_not_pair_are_listed() {
    let folder = Folder::new("names_that_do_not_pair")
        .with("a.smi", "C x\nCC twice\nCCC twice\nO\nC1 broken\n")
        .with("b.smi", "CC twice\nC x\nC broken\n");
    let outcome = folder.run(&[
        "compare", "a.smi", "b.smi", "--by", "name", "--format", "jsonl",
    ]);
    assert_eq!(pairs(&outcome), ["1 2 identical", "5 3 !"]);
    assert_eq!(outcome.status, 2);
    assert_eq!(
        words(&outcome)[..3],
        [
            "molkin: not compared: a.smi, records 2, 3: all are named \"twice\"",
            "molkin: not compared: a.smi, record 4: it has no name",
            "molkin: not compared: b.smi, record 1: a.smi has \"twice\" more than once",
        ]
    );
}

#[test]
fn an_unreadable_record_keeps_its_name() {
    let outcome = run(&["compare", "C1 broken", "C", "--format", "jsonl"]);
    let pair: Value = serde_json::from_str(&outcome.out).unwrap();
    assert_eq!(pair["a"]["name"], "broken");
    assert_eq!(pair["errors"][0]["code"], "ring-not-closed");
    assert_eq!(pair["errors"][0]["input"], "a");
    assert_eq!(pair["b"]["formula"], "CH4");
}
