//! Threads change nothing but the time.

use std::fmt::Write as _;

use rstest::rstest;

use crate::runner::{Folder, Outcome, repository};

/// Records of several kinds, some of which fail, in several formats; more than go to one thread.
fn folder(test: &str) -> Folder {
    let mut smiles = String::new();
    let mut table = String::from("id,smiles,note\n");
    for number in 0..300 {
        let length = number * 7 % 23 + 1;
        let (chain, ring) = ("C".repeat(length), number % 3);
        let text = match number % 11 {
            0 => format!("{chain}C1CC"),
            1 => format!("{chain}*"),
            2 => format!("{chain}[C@H](O)F"),
            3 => String::new(),
            _ => format!("{chain}C1CCC{}C1", "C".repeat(ring)),
        };
        writeln!(smiles, "{text} number {number}").unwrap();
        writeln!(table, "t{number},{text},\"two\nlines\"").unwrap();
    }
    table.push_str("too,few\n");
    let molfile = |name: &str| std::fs::read_to_string(repository().join(name)).unwrap();
    let label = molfile("fixtures/demo/label.mol");
    let arrived = molfile("fixtures/demo/arrived.mol");
    let sdf = format!("{label}$$$$\nbroken\n$$$$\n{arrived}$$$$\n").repeat(70);
    let reversed: String = smiles
        .lines()
        .rev()
        .map(|line| format!("{line}\n"))
        .collect();
    Folder::new(test)
        .with("a.smi", smiles)
        .with("b.smi", reversed)
        .with("t.csv", table)
        .with("s.sdf", sdf)
}

/// The same bytes on both streams and the same exit status.
fn check(folder: &Folder, arguments: &[&str], status: i32) {
    let run =
        |threads: &str| -> Outcome { folder.run(&[arguments, &["--threads", threads]].concat()) };
    let one = run("1");
    assert_eq!(one.status, status, "{}", one.words);
    assert!(one.out.lines().count() > 100);
    for threads in ["2", "4", "33"] {
        let several = run(threads);
        assert_eq!(several.out, one.out, "{threads} threads");
        assert_eq!(several.words, one.words, "{threads} threads");
        assert_eq!(several.status, one.status, "{threads} threads");
    }
    assert_eq!(
        folder.run(arguments).out,
        one.out,
        "as many as there are cores"
    );
}

#[rstest]
#[case::keys(&["keys", "a.smi", "none.smi", "t.csv", "-", "s.sdf", "-"])]
#[case::keys_as_objects(&["keys", "t.csv", "s.sdf", "--format", "jsonl"])]
#[case::families(&["families", "a.smi", "none.smi", "t.csv", "-", "s.sdf", "--memory", "0"])]
#[case::families_explained(&["families", "a.smi", "b.smi", "--overlook", "salt,charge", "--explain", "stereo,duplicates"])]
#[case::describe(&["describe", "t.csv", "CCO", "s.sdf", "a.smi"])]
#[case::describe_json(&["describe", "s.sdf", "none.sdf", "a.smi", "--format", "json"])]
#[case::compare(&["compare", "a.smi", "b.smi", "--brief"])]
#[case::compare_with_maps(&["compare", "t.csv", "a.smi", "--steps", "500", "--format", "json"])]
#[case::left_over(&["compare", "s.sdf", "a.smi", "--format", "jsonl", "--brief"])]
#[case::one_against_many(&["compare", "CCCC1CCCC1", "a.smi"])]
#[case::many_against_one(&["compare", "s.sdf", "COc1ccc(cc1)C=O", "--format", "jsonl"])]
#[case::by_name(&["compare", "a.smi", "b.smi", "--by", "name"])]
fn nothing_depends_on_the_number(#[case] arguments: &[&str]) {
    let folder = folder(&format!(
        "threads_{}",
        arguments.join("_").replace(['/', ' '], "")
    ));
    check(&folder, arguments, 2);
}

#[test]
fn no_thread_is_no_choice() {
    let folder = Folder::new("threads_none");
    for command in [
        &["keys", "C"][..],
        &["describe", "C"],
        &["families", "C"],
        &["compare", "C", "C"],
    ] {
        let outcome = folder.run(&[command, &["--threads", "0"]].concat());
        assert_eq!((outcome.status, outcome.out.as_str()), (2, ""));
        assert!(outcome.words.contains("--threads"), "{}", outcome.words);
    }
}
