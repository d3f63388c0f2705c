//! Counts steps against a budget.

use std::sync::atomic::{AtomicBool, Ordering};

use super::Effort;

/// The steps spent so far, the limit in force, and the flag that ends the search from outside.
#[derive(Debug)]
pub(super) struct Meter<'s> {
    spent: u64,
    budget: u64,
    limit: u64,
    stop: Option<&'s AtomicBool>,
}

impl<'s> Meter<'s> {
    pub(super) fn new(effort: &Effort<'s>) -> Self {
        Self {
            spent: 0,
            budget: effort.steps,
            limit: effort.steps,
            stop: effort.stop,
        }
    }

    /// Spends steps.
    pub(super) fn spend(&mut self, steps: usize) {
        self.spent = self.spent.saturating_add(steps as u64);
    }

    /// Allows `steps` more from here on, within the whole budget.
    pub(super) fn allow(&mut self, steps: u64) {
        self.limit = self.spent.saturating_add(steps).min(self.budget);
    }

    /// Allows a part of the whole budget from here on, in sixteenths, as far as there is so much left.
    pub(super) fn allow_sixteenths(&mut self, part: u64) {
        self.allow(self.budget / 16 * part);
    }

    /// Steps spent so far.
    pub(super) fn spent(&self) -> u64 {
        self.spent
    }

    /// Whether the search has to end now.
    pub(super) fn ended(&self) -> bool {
        self.spent >= self.limit || self.stop.is_some_and(|stop| stop.load(Ordering::Relaxed))
    }
}
