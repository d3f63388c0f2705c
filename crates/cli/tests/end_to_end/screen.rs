//! An ordinary pair fits a screen.

use std::fs;

use crate::runner::{Folder, demo, repository};

const LINES: usize = 24;
const COLUMNS: usize = 100;

/// Below the last pair stand an empty line and the caution.
const BELOW: usize = 3;

/// The pairs of a run, each with its lines.
fn pairs(out: &str) -> Vec<Vec<&str>> {
    let blocks = out.split("\n\n").filter(|block| block.contains("\n  A "));
    blocks.map(|block| block.lines().collect()).collect()
}

fn fits(lines: &[&str]) -> bool {
    lines.len() + BELOW <= LINES
}

fn is_narrow(lines: &[&str]) -> bool {
    lines.iter().all(|line| line.chars().count() <= COLUMNS)
}

#[test]
fn pairs_of_the_demo() {
    let out = demo(&["compare", "held.smi", "vendor.sdf", "--by", "name"]).out;
    let pairs = pairs(&out);
    assert_eq!(pairs.len(), 14);
    for lines in pairs {
        assert!(fits(&lines) && is_narrow(&lines), "{}", lines.join("\n"));
    }
}

/// Drug-sized isomers with one to three substituents elsewhere: all fit the width, nearly all the
/// height. With `--full` the map is there as well.
#[test]
fn drug_sized_pairs() {
    let data = repository().join("../shared/data/relations");
    if !data.exists() {
        eprintln!("../shared/data/relations is not there: skipped");
        return;
    }
    let mut folder = Folder::new("screen");
    for file in ["moved_a.smi", "moved_b.smi"] {
        folder = folder.with(file, fs::read(data.join(file)).unwrap());
    }
    let compare = ["compare", "moved_a.smi", "moved_b.smi"];
    let short = folder.run(&compare).out;
    let pairs = pairs(&short);
    assert_eq!(pairs.len(), 600);
    let wide = pairs.iter().filter(|lines| !is_narrow(lines)).count();
    let high = pairs.iter().filter(|lines| !fits(lines)).count();
    eprintln!("600 pairs, {wide} too wide, {high} too high");
    assert!(wide == 0 && high <= 30, "{wide} too wide, {high} too high");
    let full = folder.run(&[&compare[..], &["--full"]].concat()).out;
    assert!(full.len() > short.len() && !full.contains("--full"));
}
