//! The bound on the work for one label.

/// The budget of [`crate::Limits::label_steps`] ran out.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(super) struct Exhausted;

/// Steps that are left for one label. It depends on the molecule alone how many a label takes, not on
/// how it is drawn or numbered.
#[derive(Debug, Clone)]
pub(super) struct Budget {
    left: u64,
}

impl Budget {
    pub(super) fn new(steps: u64) -> Self {
        Self { left: steps }
    }

    /// Takes steps.
    pub(super) fn spend(&mut self, steps: usize) -> Result<(), Exhausted> {
        self.left = self.left.checked_sub(steps as u64).ok_or(Exhausted)?;
        Ok(())
    }
}
