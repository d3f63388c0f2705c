//! From arguments to an exit status.

use std::io::{self, ErrorKind};

use crate::{
    args::{Arguments, Command},
    compare, describe,
    exit::Status,
    families, keys,
    report::{self, Report},
    samples,
};

/// What ends a command early.
pub(crate) enum Failure {
    /// Results cannot be written.
    Output(io::Error),
    /// Temporary files cannot be written or read.
    Temporary(io::Error),
}

impl From<io::Error> for Failure {
    fn from(error: io::Error) -> Self {
        Self::Output(error)
    }
}

/// Runs a command. Trouble with single inputs and records is reported where it occurs; only a
/// [`Failure`] ends a command early.
pub(crate) fn run(arguments: &Arguments) -> Status {
    let mut report = Report::new();
    let outcome = match &arguments.command {
        Command::Compare(options) => compare::run(options, &mut report).map_err(Failure::from),
        Command::Keys(options) => keys::run(options, &mut report).map_err(Failure::from),
        Command::Families(options) => families::run(options, &mut report),
        Command::Describe(options) => describe::run(options, &mut report).map_err(Failure::from),
        Command::Samples(options) => samples::run(options, &mut report).map_err(Failure::from),
    };
    report.progress().end();
    match outcome.and_then(|()| Ok(report.finish()?)) {
        Ok(()) => {}
        // Whoever reads has seen enough. What was found up to here stands.
        Err(Failure::Output(error)) if error.kind() == ErrorKind::BrokenPipe => {}
        Err(Failure::Output(error)) => {
            report.count(Status::Trouble);
            report::words(format_args!("{}: {error}", report.destination()));
        }
        Err(Failure::Temporary(error)) => {
            report.count(Status::Trouble);
            report::words(format_args!("temporary files: {error}"));
        }
    }
    report.status()
}
