//! The canonical order of a coloured graph with oriented units.
//!
//! Refinement splits the vertices into cells; what is left open falls apart into independent parts
//! ([`parts`]); each part is ordered on its own ([`level`]), by a search tree where it is symmetric as
//! a whole ([`search`]).

mod certificate;
mod coloured;
mod level;
mod partition;
mod parts;
mod permutation;
mod plain;
mod refine;
mod search;
#[cfg(test)]
mod tests;
mod trace;

pub(crate) use coloured::{Coloured, Placed, Unit, ranked_parity};
pub(crate) use permutation::{Generators, Permutation};
pub use plain::{GraphError, GraphOrder, GraphOrderer};

use certificate::{write_certificate, write_units};
use level::Level;

use crate::{Limits, OrderError};

/// Orders graphs; owns all scratch.
#[derive(Debug, Default, Clone)]
pub(crate) struct Labeller {
    level: Level,
}

/// Work done and allowed.
#[derive(Debug)]
struct Work<'a> {
    limits: &'a Limits,
    /// Edges and vertices looked at.
    steps: u64,
}

impl Work<'_> {
    /// Adds steps, taking them from a counter.
    fn spend(&mut self, steps: &mut u64) -> Result<(), OrderError> {
        self.steps += 1 + std::mem::take(steps);
        if self.steps > self.limits.order_steps {
            return Err(OrderError::StepLimit {
                limit: self.limits.order_steps,
            });
        }
        if self.limits.stopped() {
            return Err(OrderError::Stopped);
        }
        Ok(())
    }
}

/// The canonical order of a graph.
#[derive(Debug, Default)]
pub(crate) struct Labelling {
    /// The vertices in canonical order.
    pub(crate) order: Vec<u32>,
    /// Per vertex: its place in that order.
    pub(crate) rank: Vec<u32>,
    /// The graph written in that order; equal exactly for isomorphic graphs.
    pub(crate) certificate: Vec<u64>,
    /// Generators of the automorphism group.
    pub(crate) generators: Generators,
    /// Whether the whole graph was searched: nothing in it falls apart or is settled.
    searched: bool,
}

impl Clone for Labelling {
    fn clone(&self) -> Self {
        let mut copy = Self::default();
        copy.clone_from(self);
        copy
    }

    /// Keeps the memory, which the derived one would not.
    fn clone_from(&mut self, source: &Self) {
        self.order.clone_from(&source.order);
        self.rank.clone_from(&source.rank);
        self.certificate.clone_from(&source.certificate);
        self.generators.clone_from(&source.generators);
        self.searched = source.searched;
    }
}

impl Labeller {
    /// Orders a graph, counting refinements in `steps`.
    ///
    /// # Errors
    /// [`OrderError::StepLimit`] when `steps` passes the limit, [`OrderError::Stopped`], and
    /// [`OrderError::TooManyNeighbours`].
    pub(crate) fn label(
        &mut self,
        graph: &mut Coloured,
        limits: &Limits,
        steps: &mut u64,
        labelling: &mut Labelling,
    ) -> Result<(), OrderError> {
        if graph.exceeds_degree() {
            return Err(OrderError::TooManyNeighbours);
        }
        let mut work = Work {
            limits,
            steps: *steps,
        };
        let outcome = self.order(graph, &mut work, labelling);
        *steps = work.steps;
        outcome
    }

    fn order(
        &mut self,
        graph: &mut Coloured,
        work: &mut Work<'_>,
        labelling: &mut Labelling,
    ) -> Result<(), OrderError> {
        let level = &mut self.level;
        level.refine(graph, work)?;
        if let Some(plain) = graph.plain_under(&level.partition) {
            labelling.clone_from(plain);
            write_units(graph, &labelling.rank, &mut labelling.certificate);
            return Ok(());
        }
        level.complete(graph, work)?;
        std::mem::swap(&mut labelling.order, &mut level.order);
        std::mem::swap(&mut labelling.generators, &mut level.generators);
        labelling.searched = level.searched;
        labelling.certificate.clear();
        write_certificate(
            graph,
            &labelling.order,
            &mut labelling.rank,
            &mut labelling.certificate,
        );
        Ok(())
    }
}
