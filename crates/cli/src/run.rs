//! From arguments to an exit status.

use std::io::ErrorKind;

use crate::{
    args::{Arguments, Command},
    compare, describe,
    exit::Status,
    keys,
    report::{self, Report},
    samples,
};

/// Runs a command. Trouble with single inputs and records is reported where it occurs; only a
/// failure of standard output ends a command early.
pub(crate) fn run(arguments: &Arguments) -> Status {
    let mut report = Report::new();
    let outcome = match &arguments.command {
        Command::Compare(options) => compare::run(options, &mut report),
        Command::Keys(options) => keys::run(options, &mut report),
        Command::Describe(options) => describe::run(options, &mut report),
        Command::Samples(options) => samples::run(options, &mut report),
    };
    report.progress().end();
    match outcome.and_then(|()| report.flush()) {
        Ok(()) => {}
        // Whoever reads has seen enough. What was found up to here stands.
        Err(error) if error.kind() == ErrorKind::BrokenPipe => {}
        Err(error) => {
            report.count(Status::Trouble);
            report::words(format_args!("standard output: {error}"));
        }
    }
    report.status()
}
