//! Counts cases, so that a test that ran fewer than it states fails.

/// The cases of one test: how many ran, and what went wrong.
#[derive(Debug)]
pub struct Tally {
    name: &'static str,
    cases: usize,
    failures: Vec<String>,
}

/// Failures that a message spells out.
const SHOWN: usize = 40;

impl Tally {
    /// An empty tally. The name stands in messages.
    pub fn new(name: &'static str) -> Self {
        Self {
            name,
            cases: 0,
            failures: Vec::new(),
        }
    }

    /// Counts a case.
    pub fn case(&mut self, good: bool, failure: impl FnOnce() -> String) {
        self.cases += 1;
        if !good {
            self.failures.push(failure());
        }
    }

    /// Counts a case that gives a value or the reason why not.
    pub fn value<T>(&mut self, outcome: Result<T, String>) -> Option<T> {
        self.cases += 1;
        outcome.map_err(|failure| self.failures.push(failure)).ok()
    }

    /// The number of cases so far.
    pub fn cases(&self) -> usize {
        self.cases
    }

    /// Ends the test.
    ///
    /// # Panics
    /// If any case failed or fewer than `at_least` ran.
    #[track_caller]
    #[allow(clippy::print_stderr, reason = "a test says how many cases it ran")]
    pub fn finish(self, at_least: usize) {
        let Self {
            name,
            cases,
            failures,
        } = self;
        eprintln!("{name}: {cases} cases, {} failed", failures.len());
        let shown = &failures[..failures.len().min(SHOWN)];
        assert!(
            failures.is_empty(),
            "{name}: {} of {cases} cases failed\n{}",
            failures.len(),
            shown.join("\n")
        );
        assert!(
            cases >= at_least,
            "{name}: only {cases} cases ran, {at_least} are stated"
        );
    }
}
