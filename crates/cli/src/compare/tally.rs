//! How many pairs came out how.

use std::fmt::{self, Display};

use molkin_relate::wire::Pair;

use crate::exit::Status;

/// How a pair came out.
#[derive(Debug, Clone, Copy)]
pub(super) struct Outcome {
    /// None where there is no verdict.
    relation: Option<&'static str>,
    open: bool,
}

impl Outcome {
    /// How a pair came out.
    pub(super) fn of(pair: &Pair) -> Self {
        Self {
            relation: pair.relation,
            open: pair.open == Some(true),
        }
    }

    /// What that means for the exit status.
    pub(super) fn status(self) -> Status {
        match self.relation {
            Some("identical") => Status::Same,
            Some(_) => Status::Different,
            None => Status::Trouble,
        }
    }
}

/// Counts of verdicts.
#[derive(Debug, Default)]
pub(super) struct Tally {
    identical: u64,
    open: u64,
    stereo: u64,
    constitutional: u64,
    not_isomers: u64,
    failed: u64,
}

impl Tally {
    /// Counts a pair.
    pub(super) fn add(&mut self, outcome: Outcome) {
        let count = match outcome.relation {
            Some("identical") => &mut self.identical,
            Some("stereo") => &mut self.stereo,
            Some("constitutional") => &mut self.constitutional,
            Some(_) => &mut self.not_isomers,
            None => &mut self.failed,
        };
        *count += 1;
        self.open += u64::from(outcome.open);
    }

    /// All pairs, those without a verdict included.
    pub(super) fn pairs(&self) -> u64 {
        self.identical + self.stereo + self.constitutional + self.not_isomers + self.failed
    }
}

impl Display for Tally {
    fn fmt(&self, out: &mut fmt::Formatter<'_>) -> fmt::Result {
        let noun = if self.pairs() == 1 { "pair" } else { "pairs" };
        write!(out, "{} {noun}: {} identical", self.pairs(), self.identical)?;
        if self.open > 0 {
            write!(out, " ({} of them open)", self.open)?;
        }
        write!(
            out,
            ", {} stereo, {} constitutional, {} not isomers, {} without a verdict",
            self.stereo, self.constitutional, self.not_isomers, self.failed
        )
    }
}
