//! The bound on the work for one label.

use crate::Limits;

/// The budget of [`Limits::label_steps`] ran out.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(super) struct Exhausted;

/// Steps that are left for one label. How many a label takes depends on the molecule alone, and so does
/// the share: no label hangs on the numbering.
#[derive(Debug, Clone)]
pub(super) struct Budget<'l> {
    left: u64,
    limits: &'l Limits,
}

impl<'l> Budget<'l> {
    /// The share of one of `elements`.
    pub(super) fn share(limits: &'l Limits, elements: usize) -> Self {
        let left = limits.label_steps / (elements as u64).max(1);
        Self { left, limits }
    }

    /// Takes steps.
    pub(super) fn spend(&mut self, steps: usize) -> Result<(), Exhausted> {
        if self.limits.stopped() {
            return Err(Exhausted);
        }
        self.left = self.left.checked_sub(steps as u64).ok_or(Exhausted)?;
        Ok(())
    }
}
