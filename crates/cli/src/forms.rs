//! What `--overlook` and `--counter-ions` ask for.

use std::{fs, sync::Arc};

use molkin_graph::Limits;
use molkin_relate::{Axes, CounterIons, Normaliser};

use crate::args;

/// What is overlooked, with the counter-ions that are known.
#[derive(Clone)]
pub(crate) struct Forms {
    pub(crate) overlook: Axes,
    /// Others than those of the library.
    counter_ions: Option<Arc<CounterIons>>,
}

impl Forms {
    /// Reads the table of counter-ions, if there is one.
    ///
    /// # Errors
    /// A message: it cannot be opened, or some row is wrong.
    pub(crate) fn new(options: &args::Forms) -> Result<Self, String> {
        let counter_ions = match &options.counter_ions {
            None => None,
            Some(path) => {
                let of_file =
                    |error: &dyn std::fmt::Display| format!("{}: {error}", path.display());
                let table = fs::read_to_string(path).map_err(|error| of_file(&error))?;
                let known = CounterIons::standard().extended(&table);
                Some(Arc::new(known.map_err(|error| of_file(&error))?))
            }
        };
        Ok(Self {
            overlook: options.overlook.unwrap_or(Axes::NONE),
            counter_ions,
        })
    }

    /// What finds forms.
    pub(crate) fn normaliser(&self, limits: Limits) -> Normaliser {
        let normaliser = Normaliser::new(limits);
        match &self.counter_ions {
            Some(known) => normaliser.with_counter_ions(Arc::clone(known)),
            None => normaliser,
        }
    }
}
