//! How many pairs came out how.

use std::fmt::{self, Display};

use molkin_relate::wire::Pair;

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
    pub(super) fn add(&mut self, pair: &Pair) {
        let count = match pair.relation {
            Some("identical") => &mut self.identical,
            Some("stereo") => &mut self.stereo,
            Some("constitutional") => &mut self.constitutional,
            Some(_) => &mut self.not_isomers,
            None => &mut self.failed,
        };
        *count += 1;
        self.open += u64::from(pair.open == Some(true));
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
