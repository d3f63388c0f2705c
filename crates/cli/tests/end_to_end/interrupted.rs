//! A run that is ended from outside leaves the whole file or none.
#![cfg(unix)]

use std::{
    collections::BTreeSet,
    fs,
    process::{Command, Stdio},
    thread,
    time::{Duration, Instant},
};

use rstest::rstest;

use crate::runner::{Folder, program};

const ARGUMENTS: [&str; 7] = [
    "families",
    "a.smi",
    "--explain",
    "duplicates,isomers",
    "--output",
    "out.csv",
    "--threads=2",
];
/// Times at which a run is ended.
const TIMES: u32 = 24;

fn folder(test: &str) -> Folder {
    let lines = (0..2_000_usize).map(|number| {
        let (left, right) = (number % 13 + 1, number * 7 % 11 + 1);
        format!("{}N(C){}O\n", "C".repeat(left), "C".repeat(right))
    });
    Folder::new(test).with("a.smi", lines.collect::<String>())
}

fn names(folder: &Folder) -> BTreeSet<String> {
    let entries = fs::read_dir(folder.path()).unwrap();
    entries
        .map(|entry| entry.unwrap().file_name().into_string().unwrap())
        .collect()
}

/// Ends runs at times spread over the whole of one, and somewhat beyond.
#[rstest]
#[case::killed("KILL")]
#[case::interrupted("INT")]
#[case::asked_to_end("TERM")]
fn the_whole_file_or_none(#[case] signal: &str, #[values(false, true)] there_before: bool) {
    let folder = folder(&format!("interrupted_{signal}_{there_before}"));
    let start = Instant::now();
    assert_eq!(folder.run(&ARGUMENTS).status, 0);
    let takes = start.elapsed();
    let out = folder.path().join("out.csv");
    let whole = fs::read(&out).unwrap();
    let mut ended = 0;
    for time in 0..TIMES {
        match there_before {
            true => fs::write(&out, "before\n").unwrap(),
            false => drop(fs::remove_file(&out)),
        }
        let mut child = program(folder.path(), &ARGUMENTS);
        let mut child = child
            .stdout(Stdio::null())
            .stderr(Stdio::null())
            .spawn()
            .unwrap();
        thread::sleep(takes * time / (TIMES - 4) + Duration::from_millis(1));
        // One that has ended already cannot be reached.
        let kill = ["-s", signal, &child.id().to_string()].map(str::to_owned);
        let _ = Command::new("kill")
            .args(kill)
            .stderr(Stdio::null())
            .status();
        let status = child.wait().unwrap();
        ended += u32::from(!status.success());
        match fs::read(&out) {
            Ok(found) => assert!(found == whole || (there_before && found == b"before\n")),
            Err(_) => assert!(!there_before && !status.success()),
        }
        if signal != "KILL" {
            let left = names(&folder);
            assert!(
                left.iter().all(|name| name == "a.smi" || name == "out.csv"),
                "{left:?}"
            );
        }
    }
    assert!(ended > 0, "all runs were done before they were ended");
}
