//! Holds the quick way to keys and canonical text to the general one, on every structure of SMILES
//! files.
//!
//!     cargo run --release -p molkin-tests --example shortcuts -- FILE…
//!
//! The first word of a line is a structure; a file may end in `.gz`. Ends with status 1 where the two
//! ways differ.
#![forbid(unsafe_code)]
#![allow(
    clippy::print_stdout,
    clippy::print_stderr,
    reason = "a program of the tests says what it found"
)]

use std::{ops::AddAssign, path::Path, process::ExitCode};

use molkin_tests::{Numbers, Shortcuts, check_lines, first_word, read_text};

#[derive(Default)]
struct Counts {
    compared: usize,
    differences: usize,
    without_key: usize,
}

impl AddAssign for Counts {
    fn add_assign(&mut self, other: Self) {
        self.compared += other.compared;
        self.differences += other.differences;
        self.without_key += other.without_key;
    }
}

fn main() -> ExitCode {
    let mut all = Counts::default();
    for file in std::env::args().skip(1) {
        let text = read_text(Path::new(&file));
        let lines: Vec<&str> = text.lines().map(first_word).collect();
        let counts = check_lines(&lines, || {
            let mut shortcuts = Shortcuts::default();
            move |number, line: &str, counts: &mut Counts| {
                // The sequence belongs to the line, so that a run repeats whatever the threads do.
                let mut numbers = Numbers::new(number as u64);
                match shortcuts.agree_on(line, &mut numbers) {
                    Ok(Some(())) => counts.compared += 1,
                    Ok(None) => counts.without_key += 1,
                    Err(message) => {
                        counts.differences += 1;
                        eprintln!("line {}: {message}", number + 1);
                    }
                }
            }
        });
        say(&file, &counts);
        all += counts;
    }
    say("all", &all);
    ExitCode::from(u8::from(all.differences > 0))
}

fn say(name: &str, counts: &Counts) {
    let Counts {
        compared,
        differences,
        without_key,
    } = counts;
    println!(
        "{name}: {compared} agree, {differences} differ, {without_key} have no key either way"
    );
}
