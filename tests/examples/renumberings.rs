//! Rewrites every structure of SMILES files at random and counts the keys that change.
//!
//!     cargo run --release -p molkin-tests --example renumberings -- TIMES FILE…
//!
//! Each copy is spelled by a writer of the tests' own, read again, given another Kekulé form and
//! another order of atoms, bonds, marks and ligands. What the writer cannot spell (axes,
//! coordination centres) is copied without it. The first word of a line is a structure; a file may
//! end in `.gz`. Ends with status 1 where a key differs.
#![forbid(unsafe_code)]
#![allow(
    clippy::print_stdout,
    clippy::print_stderr,
    reason = "a program of the tests says what it found"
)]

use std::{ops::AddAssign, path::Path, process::ExitCode, time::Instant};

use molkin_tests::{
    Comparer, Numbers, check_lines, first_word, other_kekule_form, random_spelling, read_text,
    renumbered,
};

#[derive(Default)]
struct Counts {
    structures: usize,
    copies: usize,
    respelled: usize,
    differences: usize,
    unread: usize,
}

impl AddAssign for Counts {
    fn add_assign(&mut self, other: Self) {
        self.structures += other.structures;
        self.copies += other.copies;
        self.respelled += other.respelled;
        self.differences += other.differences;
        self.unread += other.unread;
    }
}

fn main() -> ExitCode {
    let mut arguments = std::env::args().skip(1);
    let times = arguments.next().and_then(|word| word.parse().ok());
    let (Some(times), files) = (times, arguments.collect::<Vec<String>>()) else {
        eprintln!("usage: renumberings TIMES FILE...");
        return ExitCode::from(2);
    };
    let start = Instant::now();
    let mut all = Counts::default();
    for file in &files {
        let text = read_text(Path::new(file));
        let lines: Vec<&str> = text.lines().map(first_word).collect();
        let counts = check_file(&lines, times);
        say(file, &counts);
        all += counts;
    }
    say("all", &all);
    println!("{:.0} seconds", start.elapsed().as_secs_f64());
    ExitCode::from(u8::from(all.differences > 0))
}

fn say(name: &str, counts: &Counts) {
    let Counts {
        structures,
        copies,
        respelled,
        differences,
        unread,
    } = counts;
    println!(
        "{name}: {structures} structures, {copies} copies ({respelled} respelled), \
         {differences} other keys, {unread} lines not read"
    );
}

fn check_file(lines: &[&str], times: usize) -> Counts {
    check_lines(lines, || {
        let mut comparer = Comparer::default();
        move |number, line: &str, counts: &mut Counts| {
            // The sequence belongs to the line, so that a run repeats whatever the threads do.
            let mut numbers = Numbers::new(number as u64);
            if let Err(message) = check(&mut comparer, line, times, &mut numbers, counts) {
                eprintln!("line {}: {line}: {message}", number + 1);
            }
        }
    })
}

/// Counts one structure and its copies.
fn check(
    comparer: &mut Comparer,
    text: &str,
    times: usize,
    numbers: &mut Numbers,
    counts: &mut Counts,
) -> Result<(), String> {
    let read = comparer.molecule(text).and_then(|molecule| {
        let canonical = comparer.order(&molecule)?;
        Ok((molecule, canonical))
    });
    let (molecule, canonical) = match read {
        Ok(read) => read,
        Err(message) => {
            counts.unread += 1;
            return Err(message);
        }
    };
    counts.structures += 1;
    let form = canonical.form();
    for _ in 0..times {
        let spelling = random_spelling(&form, numbers);
        let respelled = match &spelling {
            Some(text) => comparer.molecule(text),
            None => Ok(molecule.clone()),
        };
        let key = respelled.and_then(|molecule| {
            let copy = other_kekule_form(&molecule, numbers);
            comparer.key(&renumbered(&copy, numbers))
        });
        counts.copies += 1;
        counts.respelled += usize::from(spelling.is_some());
        if key.as_ref() != Ok(&canonical.compound_key()) {
            counts.differences += 1;
            return Err(format!("{key:?} from {spelling:?}"));
        }
    }
    Ok(())
}
