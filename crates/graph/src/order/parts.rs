//! Where an equitable partition falls apart.
//!
//! Vertices in cells of their own are settled. Between two cells that are joined completely by edges
//! of one class, or not at all, edges carry no choice. What is left links the open vertices into
//! parts; automorphisms that keep the cells act on each part by itself, or exchange whole parts. So
//! parts can be ordered one by one, and sorted.

use super::{
    coloured::{COUNT_BITS, Coloured, Link},
    partition::Partition,
};

/// A set of open vertices that nothing links to the others.
#[derive(Debug, Clone, Copy)]
pub(super) struct Part {
    start: u32,
    end: u32,
    /// All its vertices are in different cells, and no placed centre is among them. Rigid parts in
    /// the same cells are images of each other: each vertex has the same edges into each cell.
    pub(super) rigid: bool,
}

impl Part {
    pub(super) fn range(self) -> std::ops::Range<usize> {
        self.start as usize..self.end as usize
    }
}

/// The parts of a partition; all vectors are reused.
#[derive(Debug, Default, Clone)]
pub(super) struct Parts {
    /// The open vertices, part by part, within each by cell.
    pub(super) vertices: Vec<u32>,
    pub(super) parts: Vec<Part>,
    /// Part and index of each unit that a part has to respect.
    pub(super) units: Vec<(u32, u32)>,
    /// Part and index of each placed centre that a part has to respect.
    pub(super) placed: Vec<(u32, u32)>,
    /// Per vertex: union-find.
    root: Vec<u32>,
    /// Per root: its part.
    part_of: Vec<u32>,
    open: Vec<u32>,
    counts: Vec<u64>,
    /// Edges and vertices looked at by the last call.
    pub(super) work: u64,
}

/// No part yet.
const NONE: u32 = u32::MAX;

impl Parts {
    /// Finds the parts of an equitable partition, in an order that is not canonical.
    pub(super) fn find(&mut self, graph: &Coloured, partition: &Partition) {
        self.open.clear();
        self.root.resize(graph.len().max(self.root.len()), 0);
        self.part_of.resize(graph.len().max(self.part_of.len()), 0);
        self.counts.resize(graph.len().max(self.counts.len()), 0);
        for start in partition.starts() {
            let members = partition.members(start);
            if members.len() > 1 {
                self.open.extend_from_slice(members);
            }
        }
        self.work = self.open.len() as u64;
        for &vertex in &self.open {
            self.root[vertex as usize] = vertex;
            self.part_of[vertex as usize] = NONE;
        }
        for at in 0..self.open.len() {
            self.link_neighbours(graph, partition, self.open[at]);
        }
        self.units.clear();
        self.placed.clear();
        self.link_units(graph, partition);
        self.link_placed(graph, partition);
        self.gather(partition);
    }

    fn find_root(&mut self, mut vertex: u32) -> u32 {
        while self.root[vertex as usize] != vertex {
            let above = self.root[self.root[vertex as usize] as usize];
            self.root[vertex as usize] = above;
            vertex = above;
        }
        vertex
    }

    fn unite(&mut self, a: u32, b: u32) {
        let (a, b) = (self.find_root(a), self.find_root(b));
        self.root[a.max(b) as usize] = a.min(b);
    }

    /// Links a vertex to its open neighbours, save in cells to which its own is joined completely.
    fn link_neighbours(&mut self, graph: &Coloured, partition: &Partition, vertex: u32) {
        let arcs = graph.arcs(vertex);
        self.work += arcs.len() as u64;
        let cell_of = |to: u32| partition.cell[to as usize] as usize;
        for &(to, class) in arcs {
            self.counts[cell_of(to)] += 1 << (COUNT_BITS * u32::from(class));
        }
        let own = cell_of(vertex);
        for &(to, class) in arcs {
            let cell = cell_of(to);
            let others = partition.len[cell] - u32::from(cell == own);
            let open = partition.len[cell] > 1;
            let complete = others < 1 << COUNT_BITS
                && self.counts[cell] == u64::from(others) << (COUNT_BITS * u32::from(class));
            if open && !complete {
                self.unite(vertex, to);
            }
        }
        for &(to, _) in arcs {
            self.counts[cell_of(to)] = 0;
        }
    }

    /// Links what units link.
    fn link_units(&mut self, graph: &Coloured, partition: &Partition) {
        let vertices = graph.len() as u32;
        let is_open = |v: u32| v < vertices && partition.is_open(v);
        for (index, unit) in (0..).zip(&graph.units) {
            let first = match unit.link(partition, vertices) {
                Link::All => self.link_all(unit.vertices().filter(|&v| is_open(v))),
                Link::Ends => self.link_all(unit.centres.into_iter()),
                Link::Nothing => None,
            };
            self.units.extend(first.map(|first| (first, index)));
        }
    }

    /// Links the ligands of placed centres with each other: refinement need not tell all
    /// arrangements apart.
    fn link_placed(&mut self, graph: &Coloured, partition: &Partition) {
        let vertices = graph.len() as u32;
        for (index, placed) in (0..).zip(&graph.placed) {
            let all = placed.vertices();
            let first = self.link_all(all.filter(|&v| v < vertices && partition.is_open(v)));
            self.placed.extend(first.map(|first| (first, index)));
        }
    }

    fn link_all(&mut self, mut vertices: impl Iterator<Item = u32>) -> Option<u32> {
        let first = vertices.next()?;
        for vertex in vertices {
            self.unite(first, vertex);
        }
        Some(first)
    }

    /// Lists the vertices part by part. The open vertices come by cell, so those of a part do too.
    fn gather(&mut self, partition: &Partition) {
        self.parts.clear();
        for at in 0..self.open.len() {
            let root = self.find_root(self.open[at]) as usize;
            if self.part_of[root] == NONE {
                self.part_of[root] = self.parts.len() as u32;
                self.parts.push(Part {
                    start: 0,
                    end: 0,
                    rigid: true,
                });
            }
            self.parts[self.part_of[root] as usize].end += 1;
        }
        let mut total = 0;
        for part in &mut self.parts {
            (part.start, total) = (total, total + part.end);
            part.end = part.start;
        }
        self.vertices.clear();
        self.vertices.resize(self.open.len(), 0);
        for at in 0..self.open.len() {
            let vertex = self.open[at];
            let root = self.find_root(vertex) as usize;
            let part = &mut self.parts[self.part_of[root] as usize];
            let end = part.end as usize;
            if part.end > part.start {
                let before = self.vertices[end - 1];
                part.rigid &= partition.cell[before as usize] != partition.cell[vertex as usize];
            }
            self.vertices[end] = vertex;
            part.end += 1;
        }
        self.assign_units();
    }

    fn assign_units(&mut self) {
        for list in [&mut self.units, &mut self.placed] {
            for (vertex, _) in list.iter_mut() {
                let mut root = *vertex;
                while self.root[root as usize] != root {
                    root = self.root[root as usize];
                }
                *vertex = self.part_of[root as usize];
            }
            list.sort_unstable();
        }
        for &(part, _) in &self.placed {
            self.parts[part as usize].rigid = false;
        }
    }

    /// The entries of a list of units or placed centres that belong to a part.
    pub(super) fn entries(list: &[(u32, u32)], part: u32) -> impl Iterator<Item = u32> + '_ {
        let from = list.partition_point(|&(other, _)| other < part);
        let own = list[from..].iter();
        own.take_while(move |&&(other, _)| other == part)
            .map(|&(_, index)| index)
    }
}
