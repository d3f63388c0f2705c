//! The canonical order of a coloured graph with oriented units.
//!
//! Components are ordered one by one and then sorted by their certificates, so that a record of
//! many equal components costs no more than their sum. Within a component see [`search`].

mod certificate;
mod coloured;
mod partition;
mod permutation;
mod refine;
mod search;

pub(crate) use coloured::{Coloured, Placed, Unit, ranked_parity};
pub(crate) use permutation::Permutation;
use refine::Inside;
use search::Search;

use crate::{Limits, OrderError};

/// Orders graphs; owns all scratch.
#[derive(Debug, Default, Clone)]
pub(crate) struct Labeller {
    search: Search,
    component_of: Vec<u32>,
    stack: Vec<u32>,
    members: Vec<Vec<u32>>,
    found: Vec<Component>,
}

#[derive(Debug, Default, Clone)]
struct Component {
    certificate: Vec<u64>,
    order: Vec<u32>,
}

/// The canonical order of a graph.
#[derive(Debug, Default, Clone)]
pub(crate) struct Labelling {
    /// The vertices in canonical order.
    pub(crate) order: Vec<u32>,
    /// Per vertex: its place in that order.
    pub(crate) rank: Vec<u32>,
    /// The graph written in that order; equal exactly for isomorphic graphs.
    pub(crate) certificate: Vec<u64>,
    /// Generators of the automorphism group.
    pub(crate) generators: Vec<Permutation>,
}

impl Labeller {
    /// Orders a graph, counting refinements in `steps`.
    ///
    /// # Errors
    /// [`OrderError::StepLimit`] when `steps` passes the limit, [`OrderError::Stopped`], and
    /// [`OrderError::TooManyNeighbours`].
    pub(crate) fn label(
        &mut self,
        graph: &Coloured,
        limits: &Limits,
        steps: &mut u64,
        labelling: &mut Labelling,
    ) -> Result<(), OrderError> {
        if graph.exceeds_degree() {
            return Err(OrderError::TooManyNeighbours);
        }
        labelling.generators.clear();
        self.components(graph);
        self.found.clear();
        self.search.steps = *steps;
        self.search.prepare(graph);
        let inside = self.inside(graph);
        for (members, inside) in self.members.iter().zip(&inside) {
            self.search.run(graph, members, inside, limits)?;
            labelling
                .generators
                .extend_from_slice(self.search.generators());
            self.found.push(Component {
                certificate: self.search.certificate().to_vec(),
                order: self.search.order().to_vec(),
            });
        }
        *steps = self.search.steps;
        self.found.sort_by(|a, b| a.certificate.cmp(&b.certificate));
        self.collect(graph, labelling);
        Ok(())
    }

    /// The units and placed centres of each component.
    fn inside(&self, graph: &Coloured) -> Vec<Inside> {
        let mut inside = vec![Inside::default(); self.members.len()];
        let component = |vertex: u32| self.component_of[vertex as usize] as usize;
        for (index, unit) in (0..).zip(&graph.units) {
            inside[component(unit.centres[0])].units.push(index);
        }
        for (index, placed) in (0..).zip(&graph.placed) {
            inside[component(placed.centre)].placed.push(index);
        }
        inside
    }

    fn components(&mut self, graph: &Coloured) {
        const UNSEEN: u32 = u32::MAX;
        self.component_of.clear();
        self.component_of.resize(graph.len(), UNSEEN);
        self.members.clear();
        for start in 0..graph.len() as u32 {
            if self.component_of[start as usize] != UNSEEN {
                continue;
            }
            let number = self.members.len() as u32;
            let mut members = Vec::new();
            self.component_of[start as usize] = number;
            self.stack.push(start);
            while let Some(vertex) = self.stack.pop() {
                members.push(vertex);
                for &(to, _) in graph.arcs(vertex) {
                    if self.component_of[to as usize] == UNSEEN {
                        self.component_of[to as usize] = number;
                        self.stack.push(to);
                    }
                }
            }
            self.members.push(members);
        }
    }

    fn collect(&self, graph: &Coloured, labelling: &mut Labelling) {
        labelling.order.clear();
        labelling.certificate.clear();
        for component in &self.found {
            labelling.order.extend_from_slice(&component.order);
            labelling
                .certificate
                .extend_from_slice(&component.certificate);
        }
        labelling.rank.clear();
        labelling.rank.resize(graph.len(), 0);
        for (at, &vertex) in labelling.order.iter().enumerate() {
            labelling.rank[vertex as usize] = at as u32;
        }
        for pair in self.found.windows(2) {
            if pair[0].certificate == pair[1].certificate {
                let pairs = pair[0].order.iter().zip(&pair[1].order);
                let exchange = Permutation::of(pairs.flat_map(|(&a, &b)| [(a, b), (b, a)]));
                labelling.generators.push(exchange);
            }
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn label(colours: &[u64], edges: &[(u32, u32, u8)]) -> Labelling {
        let mut graph = Coloured::default();
        graph.load(colours.iter().copied(), edges.iter().copied());
        let mut labelling = Labelling::default();
        let mut steps = 0;
        let outcome =
            Labeller::default().label(&graph, &Limits::default(), &mut steps, &mut labelling);
        assert_eq!(outcome, Ok(()));
        labelling
    }

    fn shuffled(edges: &[(u32, u32, u8)], vertices: u32, seed: u64) -> Vec<(u32, u32, u8)> {
        let mut state = seed.wrapping_mul(0x9e37_79b9_7f4a_7c15) | 1;
        let mut image: Vec<u32> = (0..vertices).collect();
        for at in (1..image.len()).rev() {
            state ^= state << 13;
            state ^= state >> 7;
            state ^= state << 17;
            image.swap(at, (state % (at as u64 + 1)) as usize);
        }
        edges
            .iter()
            .map(|&(a, b, c)| (image[a as usize], image[b as usize], c))
            .collect()
    }

    /// All graphs of five vertices: equal certificates exactly for isomorphic ones. OEIS A000088
    /// gives 34 graphs on five vertices.
    #[test]
    fn graphs_of_five_vertices() {
        let pairs: Vec<(u32, u32)> = (0..5)
            .flat_map(|a| (a + 1..5).map(move |b| (a, b)))
            .collect();
        let mut certificates = std::collections::BTreeSet::new();
        for mask in 0u32..1 << pairs.len() {
            let edges: Vec<_> = pairs
                .iter()
                .enumerate()
                .filter(|(i, _)| mask >> i & 1 == 1)
                .map(|(_, &(a, b))| (a, b, 0))
                .collect();
            certificates.insert(label(&[0; 5], &edges).certificate);
        }
        assert_eq!(certificates.len(), 34);
    }

    /// The Petersen graph: 120 automorphisms act on ten equivalent vertices; no numbering matters.
    #[test]
    fn petersen_graph() {
        let mut edges = Vec::new();
        for i in 0..5 {
            edges.extend([
                (i, (i + 1) % 5, 0),
                (i, i + 5, 0),
                (i + 5, (i + 2) % 5 + 5, 0),
            ]);
        }
        let reference = label(&[0; 10], &edges);
        for seed in 1..200 {
            let copy = label(&[0; 10], &shuffled(&edges, 10, seed));
            assert_eq!(copy.certificate, reference.certificate);
            for generator in &copy.generators {
                let mut images: Vec<u32> = generator.moved().iter().map(|&(_, to)| to).collect();
                images.sort_unstable();
                let moved: Vec<u32> = generator.moved().iter().map(|&(from, _)| from).collect();
                assert_eq!(images, moved);
            }
        }
    }
}
