//! The search tree: individualise, refine, compare leaves, prune by automorphisms.
//!
//! McKay & Piperno, J. Symb. Comput. 2014, 60, 94. A leaf is a node at which the graph falls apart;
//! its parts are ordered on their own, which gives the leaf an order that is canonical for it. The
//! canonical leaf is the least of (trace of the path, certificate). Two leaves with equal
//! certificates give an automorphism; an automorphism cuts off whatever it maps onto explored ground.

use std::cmp::Ordering;

use super::{
    Work,
    certificate::write_certificate,
    coloured::Coloured,
    level::Level,
    permutation::{Generators, Permutation},
    trace::{Standing, Trace, Watch},
};
use crate::OrderError;

/// A leaf: the vertex at each position, and the graph written in that order.
#[derive(Debug, Default, Clone)]
struct Leaf {
    order: Vec<u32>,
    path: Vec<u32>,
    certificate: Vec<u64>,
}

impl Leaf {
    /// Takes over another leaf, in the memory at hand.
    fn copy(&mut self, other: &Self) {
        self.order.clone_from(&other.order);
        self.path.clone_from(&other.path);
        self.certificate.clone_from(&other.certificate);
    }
}

/// A node on the present path.
#[derive(Debug, Default, Clone)]
struct Node {
    /// Splits of the partition at this node.
    splits: usize,
    /// The trace at this node.
    mark: (usize, u64, Standing),
    /// The vertices of the target cell.
    children: Vec<u32>,
    next: usize,
    /// The vertex individualised to leave this node towards the present one.
    chosen: u32,
}

/// The state of a search; all vectors are reused.
#[derive(Debug, Default, Clone)]
pub(super) struct Tree {
    nodes: Vec<Node>,
    depth: usize,
    trace: Trace,
    first: Leaf,
    best: Leaf,
    current: Vec<u64>,
    pos: Vec<u32>,
    /// Union-find over vertices, of the automorphisms found so far.
    orbit: Vec<u32>,
    pruning: Vec<u32>,
    /// The deepest node, by index, that lies on the first path.
    on_first: usize,
}

fn find(parent: &mut [u32], mut vertex: u32) -> u32 {
    while parent[vertex as usize] != vertex {
        parent[vertex as usize] = parent[parent[vertex as usize] as usize];
        vertex = parent[vertex as usize];
    }
    vertex
}

fn unite(parent: &mut [u32], permutation: Permutation<'_>) {
    for &(from, to) in permutation.moved() {
        let (a, b) = (find(parent, from), find(parent, to));
        parent[a.max(b) as usize] = a.min(b);
    }
}

impl Tree {
    fn clear(&mut self, vertices: usize) {
        self.depth = 0;
        self.on_first = 0;
        self.trace.clear();
        for leaf in [&mut self.first, &mut self.best] {
            leaf.certificate.clear();
        }
        for identity in [&mut self.orbit, &mut self.pruning] {
            identity.clear();
            identity.extend(0..vertices as u32);
        }
    }

    /// The next child worth visiting: the first of each orbit under the automorphisms that fix the
    /// path to this node.
    fn next_child(&mut self, generators: &Generators) -> Option<u32> {
        let level = self.depth - 1;
        let on_first_path = level <= self.on_first;
        if !on_first_path && self.nodes[level].next > 0 && !generators.is_empty() {
            self.pruning_orbits(level, generators);
        }
        let node = &mut self.nodes[level];
        let orbit = if on_first_path {
            &mut self.orbit
        } else {
            &mut self.pruning
        };
        while let Some(&vertex) = node.children.get(node.next) {
            let tried = &node.children[..node.next];
            node.next += 1;
            if tried.is_empty() || generators.is_empty() {
                return Some(vertex);
            }
            let own = find(orbit, vertex);
            if !tried.iter().any(|&earlier| find(orbit, earlier) == own) {
                return Some(vertex);
            }
        }
        None
    }

    fn pruning_orbits(&mut self, level: usize, generators: &Generators) {
        for (vertex, parent) in (0..).zip(&mut self.pruning) {
            *parent = vertex;
        }
        for generator in generators.iter() {
            let path = &self.nodes[..level];
            if path.iter().all(|node| generator.fixes(node.chosen)) {
                unite(&mut self.pruning, generator);
            }
        }
    }

    /// Makes the present leaf the best one.
    fn keep_best(&mut self, order: &[u32]) {
        self.best.order.clear();
        self.best.order.extend_from_slice(order);
        self.best.certificate.clone_from(&self.current);
        self.best.path.clear();
        let path = self.nodes[..self.depth].iter();
        self.best.path.extend(path.map(|node| node.chosen));
        self.trace.keep_best();
        // From here on the present path is the best one.
        for node in &mut self.nodes[..self.depth] {
            node.mark.2.against_best = Ordering::Equal;
        }
    }

    /// Takes the automorphism that maps an earlier leaf onto this one, and goes back to where the
    /// two paths part: everything in between is an image of what was explored.
    fn automorphism(&mut self, order: &[u32], with_first: bool, generators: &mut Generators) {
        let earlier = if with_first { &self.first } else { &self.best };
        let pairs = earlier.order.iter().copied().zip(order.iter().copied());
        unite(&mut self.orbit, generators.push(pairs));
        let common = self.nodes[..self.depth]
            .iter()
            .zip(&earlier.path)
            .take_while(|(node, chosen)| node.chosen == **chosen)
            .count();
        self.depth = self.depth.min(common + 1);
        self.on_first = self.on_first.min(common);
    }
}

impl Level {
    /// Orders a graph that does not fall apart by search.
    pub(super) fn search(
        &mut self,
        graph: &Coloured,
        work: &mut Work<'_>,
    ) -> Result<(), OrderError> {
        self.tree.clear(graph.len());
        self.open_node(work);
        while self.tree.depth > 0 {
            self.advance(graph, work)?;
        }
        self.order.clone_from(&self.tree.best.order);
        Ok(())
    }

    /// Makes the present partition a node whose children are the vertices of its first smallest open
    /// cell.
    fn open_node(&mut self, work: &mut Work<'_>) {
        let Tree {
            nodes,
            depth,
            trace,
            ..
        } = &mut self.tree;
        if nodes.len() == *depth {
            nodes.push(Node::default());
        }
        let target = self.partition.smallest_open_cell();
        let node = &mut nodes[*depth];
        node.splits = self.partition.splits();
        node.mark = trace.mark();
        node.children.clear();
        node.children
            .extend_from_slice(self.partition.members(target));
        node.next = 0;
        *depth += 1;
        work.steps += node.children.len() as u64;
    }

    /// Takes the next child of the deepest node, or leaves that node.
    fn advance(&mut self, graph: &Coloured, work: &mut Work<'_>) -> Result<(), OrderError> {
        let tree = &mut self.tree;
        let level = tree.depth - 1;
        let Some(vertex) = tree.next_child(&self.generators) else {
            tree.depth = level;
            tree.on_first = tree.on_first.min(level.saturating_sub(1));
            return Ok(());
        };
        let node = &mut tree.nodes[level];
        node.chosen = vertex;
        tree.trace.back_to(node.mark);
        self.partition.undo_to(node.splits);
        let cell = self.partition.individualise(vertex);
        // The individualised vertex alone refines as far as it and the rest of its cell would.
        self.refiner.enqueue(cell);
        let goes_on = self
            .refiner
            .refine(graph, &mut self.partition, &mut tree.trace);
        work.spend(&mut self.refiner.work)?;
        if !goes_on {
            return Ok(());
        }
        self.parts.find(graph, &self.partition);
        work.spend(&mut self.parts.work)?;
        tree.trace.note(self.parts.parts.len() as u64);
        if !tree.trace.goes_on() {
            return Ok(());
        }
        if self.is_whole() || (self.is_last() && !self.partition.is_discrete()) {
            self.open_node(work);
            return Ok(());
        }
        self.leaf(graph, work)
    }

    fn leaf(&mut self, graph: &Coloured, work: &mut Work<'_>) -> Result<(), OrderError> {
        let is_first = self.tree.first.certificate.is_empty();
        self.arrange(graph, work, is_first)?;
        let tree = &mut self.tree;
        tree.current.clear();
        write_certificate(graph, &self.order, &mut tree.pos, &mut tree.current);
        work.steps += tree.current.len() as u64;
        if is_first {
            tree.trace.keep_first();
            tree.keep_best(&self.order);
            tree.first.copy(&tree.best);
            tree.on_first = tree.depth.saturating_sub(1);
            for generator in self.generators.iter() {
                unite(&mut tree.orbit, generator);
            }
            return Ok(());
        }
        let standing = tree.trace.at_leaf();
        if standing.like_first && tree.current == tree.first.certificate {
            tree.automorphism(&self.order, true, &mut self.generators);
            return Ok(());
        }
        // A leaf that was reached only because it is like the first one may not become the best.
        let order = standing.against_best;
        match order.then_with(|| tree.current.cmp(&tree.best.certificate)) {
            Ordering::Less => tree.keep_best(&self.order),
            Ordering::Equal => tree.automorphism(&self.order, false, &mut self.generators),
            Ordering::Greater => {}
        }
        Ok(())
    }
}
