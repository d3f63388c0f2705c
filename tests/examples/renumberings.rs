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

use std::{
    ops::AddAssign,
    path::Path,
    process::ExitCode,
    sync::atomic::{AtomicUsize, Ordering},
    thread,
    time::Instant,
};

use molkin_tests::{
    Comparer, Numbers, first_word, other_kekule_form, random_spelling, read_text, renumbered,
};

/// Lines that a thread takes at a time.
const CHUNK: usize = 256;

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

/// As many threads as processors, each of which takes the next lines.
fn check_file(lines: &[&str], times: usize) -> Counts {
    let next = AtomicUsize::new(0);
    let threads = thread::available_parallelism().map_or(1, usize::from);
    let work = || {
        let mut comparer = Comparer::default();
        let mut counts = Counts::default();
        loop {
            let from = next.fetch_add(CHUNK, Ordering::Relaxed);
            let Some(chunk) = lines.get(from..lines.len().min(from + CHUNK)) else {
                return counts;
            };
            if chunk.is_empty() {
                return counts;
            }
            for (number, line) in (from..).zip(chunk) {
                // The sequence belongs to the line, so that a run repeats whatever the threads do.
                let mut numbers = Numbers::new(number as u64);
                if let Err(message) = check(&mut comparer, line, times, &mut numbers, &mut counts) {
                    eprintln!("line {}: {line}: {message}", number + 1);
                }
            }
        }
    };
    let mut all = Counts::default();
    thread::scope(|scope| {
        let workers: Vec<_> = (0..threads).map(|_| scope.spawn(work)).collect();
        for worker in workers {
            match worker.join() {
                Ok(counts) => all += counts,
                Err(panic) => std::panic::resume_unwind(panic),
            }
        }
    });
    all
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
