//! Exit status.

use std::process::ExitCode;

/// What a run came to, as `cmp` and `diff` have it. Ordered: the worst thing that happened counts.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord)]
pub(crate) enum Status {
    /// All pairs are identical; or, where nothing is compared, all went well.
    Same,
    /// Some pairs differ.
    Different,
    /// Something could not be read, paired, compared or written.
    Trouble,
}

impl Status {
    /// The number that the shell sees.
    fn code(self) -> u8 {
        match self {
            Self::Same => 0,
            Self::Different => 1,
            Self::Trouble => 2,
        }
    }
}

impl From<Status> for ExitCode {
    fn from(status: Status) -> Self {
        Self::from(status.code())
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn the_worst_counts() {
        let seen = [Status::Same, Status::Trouble, Status::Different];
        assert_eq!(seen.into_iter().max().map(Status::code), Some(2));
        assert_eq!(Status::Same.max(Status::Different).code(), 1);
    }
}
