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
    /// Two edges join the same vertices.
    #[error("vertices {a} and {b} (from 0) are joined twice")]
    Repeated {
        /// One vertex.
        a: u32,
        /// The other.
        b: u32,
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
    /// Per vertex: the last one found to be joined to it.
    joined: Vec<u32>,
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
        if let Some((a, b)) = self.repeated() {
            return Err(GraphError::Repeated { a, b });
        }
        let mut steps = 0;
        self.labeller.label(
            &mut self.graph,
            &self.limits,
            &mut steps,
            &mut self.labelling,
        )?;
        Ok(GraphOrder {
            order: &self.labelling.order,
            certificate: &self.labelling.certificate,
            steps,
        })
    }

    fn repeated(&mut self) -> Option<(u32, u32)> {
        self.joined.clear();
        self.joined.resize(self.graph.len(), u32::MAX);
        for vertex in 0..self.graph.len() as u32 {
            for &(to, _) in self.graph.arcs(vertex) {
                if std::mem::replace(&mut self.joined[to as usize], vertex) == vertex {
                    return Some((vertex, to));
                }
            }
        }
        None
    }

    /// Generators of the automorphism group of the graph ordered last: each lists the vertices that
    /// it moves, ascending, with their images.
    pub fn generators(&self) -> impl ExactSizeIterator<Item = &[(u32, u32)]> {
        self.labelling.generators.iter().map(|g| g.moved())
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn edges_that_cannot_be() {
        let mut orderer = GraphOrderer::default();
        let mut outcome =
            |edges: &[_]| orderer.order(&[0; 3], edges).map(|order| order.order.len());
        assert_eq!(
            outcome(&[(0, 1, 0), (1, 1, 0)]),
            Err(GraphError::Edge { index: 1 })
        );
        assert_eq!(outcome(&[(0, 3, 0)]), Err(GraphError::Edge { index: 0 }));
        assert_eq!(outcome(&[(0, 1, 7)]), Err(GraphError::Edge { index: 0 }));
        let repeated = outcome(&[(0, 1, 0), (2, 1, 0), (1, 0, 1)]);
        assert_eq!(repeated, Err(GraphError::Repeated { a: 0, b: 1 }));
        assert_eq!(outcome(&[(0, 1, 6)]), Ok(3));
    }
}
