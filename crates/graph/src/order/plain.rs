//! The canonical order of plain graphs, for callers that have no molecule.

use thiserror::Error;

use super::{Coloured, Labeller, Labelling};
use crate::{Limits, OrderError};

/// Why a graph has no canonical order.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Error)]
#[non_exhaustive]
pub enum GraphError {
    /// An edge joins a vertex to itself, or names a vertex that is not there, or has a class above 6.
    #[error("edge {index} (from 0) is a loop, names no vertex or has a class above 6")]
    Edge {
        /// The edge, from 0.
        index: usize,
    },
    /// A limit was reached.
    #[error(transparent)]
    Order(#[from] OrderError),
}

/// Orders graphs with coloured vertices and classed edges; owns the scratch memory. One per thread.
///
/// # Examples
/// ```
/// use molkin_graph::{GraphOrderer, Limits};
///
/// let mut orderer = GraphOrderer::new(Limits::default());
/// let path = orderer.order(&[0, 0, 0], &[(0, 1, 0), (1, 2, 0)])?.certificate.to_vec();
/// assert_eq!(orderer.order(&[0, 0, 0], &[(2, 0, 0), (0, 1, 0)])?.certificate, path);
/// # Ok::<(), molkin_graph::GraphError>(())
/// ```
#[derive(Debug, Default)]
pub struct GraphOrderer {
    limits: Limits,
    labeller: Labeller,
    graph: Coloured,
    labelling: Labelling,
}

/// The canonical order of a graph.
#[derive(Debug, Clone, Copy)]
pub struct GraphOrder<'a> {
    /// The vertices in canonical order.
    pub order: &'a [u32],
    /// The graph written in that order: equal exactly for isomorphic graphs.
    pub certificate: &'a [u64],
    /// Edges and vertices that were looked at.
    pub steps: u64,
}

impl GraphOrderer {
    /// An orderer with the given limits.
    pub fn new(limits: Limits) -> Self {
        Self {
            limits,
            ..Self::default()
        }
    }

    /// Orders a graph given by the colours of its vertices and by its edges, each with a class from
    /// 0 to 6.
    ///
    /// # Errors
    /// [`GraphError`]: an edge that cannot be, or a limit.
    pub fn order(
        &mut self,
        colours: &[u64],
        edges: &[(u32, u32, u8)],
    ) -> Result<GraphOrder<'_>, GraphError> {
        let fits = |&(a, b, class): &(u32, u32, u8)| {
            a != b && (a.max(b) as usize) < colours.len() && class < 7
        };
        if let Some(index) = edges.iter().position(|edge| !fits(edge)) {
            return Err(GraphError::Edge { index });
        }
        if colours.len() > self.limits.atoms {
            let limit = self.limits.atoms;
            return Err(OrderError::TooManyAtoms { limit }.into());
        }
        self.graph
            .load(colours.iter().copied(), edges.iter().copied());
        let mut steps = 0;
        self.labeller
            .label(&self.graph, &self.limits, &mut steps, &mut self.labelling)?;
        Ok(GraphOrder {
            order: &self.labelling.order,
            certificate: &self.labelling.certificate,
            steps,
        })
    }

    /// Generators of the automorphism group of the graph ordered last: each lists the vertices that
    /// it moves, ascending, with their images.
    pub fn generators(&self) -> impl ExactSizeIterator<Item = &[(u32, u32)]> {
        self.labelling.generators.iter().map(|g| g.moved())
    }
}
