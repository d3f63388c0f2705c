//! molkin at the command line: arguments in, results to standard output, words to standard error.
#![forbid(unsafe_code)]

mod args;
mod compare;
mod describe;
mod destination;
mod exit;
mod families;
mod forms;
mod input;
mod keys;
mod output;
mod progress;
mod records;
mod report;
mod run;
mod samples;

use std::process::ExitCode;

use clap::Parser;

fn main() -> ExitCode {
    run::run(&args::Arguments::parse()).into()
}
