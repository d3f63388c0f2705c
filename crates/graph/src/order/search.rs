//! The search tree: individualise, refine, compare leaves, prune by automorphisms.
//!
//! McKay & Piperno, J. Symb. Comput. 2014, 60, 94. The canonical leaf is the least of (invariants of
//! the path, certificate). Two leaves with equal certificates give an automorphism; an automorphism
//! cuts off whatever it maps onto explored ground. Steps (refinements) are counted; when the limit
//! is reached there is no order at all.

use std::cmp::Ordering;

use crate::{Limits, OrderError};

use super::{
    certificate::write_certificate,
    coloured::Coloured,
    partition::Partition,
    permutation::Permutation,
    refine::{Inside, Refiner},
};

/// A leaf: the vertex at each position, and the graph written in that order.
#[derive(Debug, Default, Clone)]
struct Leaf {
    lab: Vec<u32>,
    path: Vec<u32>,
    traces: Vec<u64>,
    certificate: Vec<u64>,
}

/// A node on the present path.
#[derive(Debug, Clone)]
struct Node {
    /// Splits of the partition at this node.
    splits: usize,
    /// The cell whose vertices are the children.
    target: u32,
    children: Vec<u32>,
    next: usize,
    /// The vertex individualised to leave this node towards the present one.
    chosen: u32,
    /// Whether the path so far has the invariants of the first leaf's path.
    like_first: bool,
    /// The path so far against the best leaf's path.
    against_best: Ordering,
}

/// Searches one connected component at a time; all vectors are reused.
#[derive(Debug, Default, Clone)]
pub(crate) struct Search {
    partition: Partition,
    refiner: Refiner,
    nodes: Vec<Node>,
    depth: usize,
    traces: Vec<u64>,
    first: Leaf,
    best: Leaf,
    current: Vec<u64>,
    inside: Inside,
    generators: Vec<Permutation>,
    /// Union-find over vertices, of the automorphisms found so far.
    orbit: Vec<u32>,
    pruning: Vec<u32>,
    /// The deepest node, by index, that lies on the first path.
    on_first: usize,
    pub(crate) steps: u64,
}

fn find(parent: &mut [u32], mut vertex: u32) -> u32 {
    while parent[vertex as usize] != vertex {
        parent[vertex as usize] = parent[parent[vertex as usize] as usize];
        vertex = parent[vertex as usize];
    }
    vertex
}

fn unite(parent: &mut [u32], a: u32, b: u32) {
    let (a, b) = (find(parent, a), find(parent, b));
    let (low, high) = (a.min(b), a.max(b));
    parent[high as usize] = low;
}

impl Search {
    /// Orders the vertices of one component, whose units and placed centres `inside` lists, after
    /// [`Search::prepare`].
    ///
    /// Afterwards [`Search::order`], [`Search::certificate`] and [`Search::generators`] hold the
    /// answer. `steps` counts on from its present value up to the limit.
    pub(crate) fn run(
        &mut self,
        graph: &Coloured,
        members: &[u32],
        inside: &Inside,
        limits: &Limits,
    ) -> Result<(), OrderError> {
        self.inside.clone_from(inside);
        self.start(graph, members);
        for start in self.partition.starts().collect::<Vec<_>>() {
            self.refiner.enqueue(start);
        }
        self.step(graph, limits)?;
        self.depth = 0;
        self.on_first = 0;
        if self.partition.is_discrete() {
            self.leaf(graph, true, Ordering::Equal);
            return Ok(());
        }
        self.open_node(true, Ordering::Equal);
        while self.depth > 0 {
            self.advance(graph, limits)?;
        }
        Ok(())
    }

    /// Gets ready for the components of a graph: all that costs as much as the whole graph is done
    /// here, once.
    pub(crate) fn prepare(&mut self, graph: &Coloured) {
        self.refiner.reset(graph.len());
        for identity in [&mut self.orbit, &mut self.pruning] {
            identity.clear();
            identity.extend(0..graph.len() as u32);
        }
    }

    fn start(&mut self, graph: &Coloured, members: &[u32]) {
        self.partition
            .load(members, graph.len(), |v| graph.colours[v as usize]);
        self.traces.clear();
        self.generators.clear();
        self.first.certificate.clear();
        self.best.certificate.clear();
    }

    /// Refines once. Work is counted in edges and vertices looked at, so that a step costs about
    /// the same on small and large graphs.
    fn step(&mut self, graph: &Coloured, limits: &Limits) -> Result<u64, OrderError> {
        if self.steps > limits.order_steps {
            return Err(OrderError::StepLimit {
                limit: limits.order_steps,
            });
        }
        if limits.stopped() {
            return Err(OrderError::Stopped);
        }
        let trace = self
            .refiner
            .refine(graph, &self.inside, &mut self.partition);
        self.steps += 1 + std::mem::take(&mut self.refiner.work);
        Ok(trace)
    }

    /// Makes the present partition a node whose children are the vertices of its first cell of two
    /// or more. Cells before that of the node above have one vertex each and keep it, so the look
    /// starts there: all levels of a path together look at each cell once.
    fn open_node(&mut self, like_first: bool, against_best: Ordering) {
        let from = self
            .depth
            .checked_sub(1)
            .map_or(0, |above| self.nodes[above].target);
        if self.nodes.len() == self.depth {
            self.nodes.push(Node {
                splits: 0,
                target: 0,
                children: Vec::new(),
                next: 0,
                chosen: 0,
                like_first,
                against_best,
            });
        }
        let target = self.partition.first_open_cell(from);
        let node = &mut self.nodes[self.depth];
        node.splits = self.partition.splits();
        node.target = target;
        node.children.clear();
        node.children
            .extend_from_slice(self.partition.members(target));
        self.steps += node.children.len() as u64;
        node.next = 0;
        node.like_first = like_first;
        node.against_best = against_best;
        self.depth += 1;
    }

    /// Takes the next child of the deepest node, or leaves that node.
    fn advance(&mut self, graph: &Coloured, limits: &Limits) -> Result<(), OrderError> {
        let level = self.depth - 1;
        let Some(vertex) = self.next_child(level) else {
            self.depth = level;
            self.on_first = self.on_first.min(level.saturating_sub(1));
            return Ok(());
        };
        let node = &mut self.nodes[level];
        node.chosen = vertex;
        let (like_first, against_best) = (node.like_first, node.against_best);
        self.partition.undo_to(node.splits);
        let cell = self.partition.individualise(vertex);
        // The individualised vertex alone refines as far as it and the rest of its cell would.
        self.refiner.enqueue(cell);
        let trace = self.step(graph, limits)?;
        self.traces.truncate(level);
        self.traces.push(trace);
        let has_first = !self.first.certificate.is_empty();
        let like_first = like_first && (!has_first || self.first.traces.get(level) == Some(&trace));
        let against_best = if has_first && against_best.is_eq() {
            self.best
                .traces
                .get(level)
                .map_or(Ordering::Greater, |best| trace.cmp(best))
        } else {
            against_best
        };
        if !like_first && against_best.is_gt() {
            return Ok(());
        }
        if self.partition.is_discrete() {
            self.leaf(graph, like_first, against_best);
        } else {
            self.open_node(like_first, against_best);
        }
        Ok(())
    }

    /// The next child worth visiting: the least of each orbit under the automorphisms that fix the
    /// path to this node.
    fn next_child(&mut self, level: usize) -> Option<u32> {
        let on_first_path = level <= self.on_first;
        if !on_first_path && self.nodes[level].next > 0 && !self.generators.is_empty() {
            self.pruning_orbits(level);
        }
        let node = &mut self.nodes[level];
        while let Some(&vertex) = node.children.get(node.next) {
            let tried = &node.children[..node.next];
            node.next += 1;
            let orbit = if on_first_path {
                &mut self.orbit
            } else {
                &mut self.pruning
            };
            if tried.is_empty() || self.generators.is_empty() {
                return Some(vertex);
            }
            let own = find(orbit, vertex);
            if !tried.iter().any(|&earlier| find(orbit, earlier) == own) {
                return Some(vertex);
            }
        }
        None
    }

    fn pruning_orbits(&mut self, level: usize) {
        for &vertex in &self.partition.lab {
            self.pruning[vertex as usize] = vertex;
        }
        for generator in &self.generators {
            let fixes = self.nodes[..level]
                .iter()
                .all(|node| generator.image(node.chosen) == node.chosen);
            if fixes {
                for &(from, to) in generator.moved() {
                    unite(&mut self.pruning, from, to);
                }
            }
        }
    }

    fn leaf(&mut self, graph: &Coloured, like_first: bool, against_best: Ordering) {
        let mut certificate = std::mem::take(&mut self.current);
        write_certificate(graph, &self.partition, &self.inside, &mut certificate);
        self.steps += certificate.len() as u64;
        self.current = certificate;
        if self.first.certificate.is_empty() {
            self.keep_best();
            self.first.clone_from(&self.best);
            self.on_first = self.depth.saturating_sub(1);
            return;
        }
        if like_first && self.current == self.first.certificate {
            self.automorphism(true);
            return;
        }
        // A leaf that was reached only because it is like the first one may not become the best.
        let order = against_best.then_with(|| self.current.cmp(&self.best.certificate));
        match order {
            Ordering::Less => self.keep_best(),
            Ordering::Equal => self.automorphism(false),
            Ordering::Greater => {}
        }
    }

    fn keep_best(&mut self) {
        self.best.lab.clone_from(&self.partition.lab);
        self.best.certificate.clone_from(&self.current);
        self.best.traces.clone_from(&self.traces);
        self.best.path.clear();
        self.best
            .path
            .extend(self.nodes[..self.depth].iter().map(|node| node.chosen));
        // From here on the present path is the best one.
        for node in &mut self.nodes[..self.depth] {
            node.against_best = Ordering::Equal;
        }
    }

    /// Records the automorphism that takes an earlier leaf to this one, and goes back to where the
    /// two paths part: everything in between is an image of what was explored.
    fn automorphism(&mut self, with_first: bool) {
        let earlier = if with_first { &self.first } else { &self.best };
        let pairs = earlier
            .lab
            .iter()
            .copied()
            .zip(self.partition.lab.iter().copied());
        let generator = Permutation::of(pairs);
        for &(from, to) in generator.moved() {
            unite(&mut self.orbit, from, to);
        }
        let common = self.nodes[..self.depth]
            .iter()
            .zip(&earlier.path)
            .take_while(|(node, chosen)| node.chosen == **chosen)
            .count();
        self.generators.push(generator);
        self.depth = self.depth.min(common + 1);
        self.on_first = self.on_first.min(common);
    }

    /// The vertices in canonical order.
    pub(crate) fn order(&self) -> &[u32] {
        &self.best.lab
    }

    /// The graph written in canonical order: equal exactly for isomorphic components.
    pub(crate) fn certificate(&self) -> &[u64] {
        &self.best.certificate
    }

    /// Generators of the automorphism group.
    pub(crate) fn generators(&self) -> &[Permutation] {
        &self.generators
    }
}
