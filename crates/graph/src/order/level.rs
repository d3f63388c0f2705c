//! Orders a graph by refining it and ordering the parts that it falls into.
//!
//! A part is a smaller coloured graph of its own and is ordered one level deeper. What does not fall
//! apart is searched ([`super::search`]); the leaves of that search are where it does fall apart. So
//! independent symmetries add to the cost and never multiply.

use super::{
    Work,
    certificate::write_certificate,
    coloured::Coloured,
    partition::Partition,
    parts::{Part, Parts},
    permutation::Generators,
    refine::Refiner,
    search::Tree,
    trace::Unwatched,
};
use crate::OrderError;

/// Parts of parts are ordered on their own down to here; below, all that is open is searched at once.
/// Sizes at least halve where like parts are told apart, so this is for the sake of the stack alone.
pub(super) const MOST_NESTED: u32 = 64;

/// All scratch of one level of nesting, and its answer.
#[derive(Debug, Default, Clone)]
pub(super) struct Level {
    pub(super) partition: Partition,
    pub(super) refiner: Refiner,
    pub(super) parts: Parts,
    pub(super) tree: Tree,
    /// The vertices in canonical order.
    pub(super) order: Vec<u32>,
    /// Generators of the automorphism group.
    pub(super) generators: Generators,
    /// Whether the whole graph was searched.
    pub(super) searched: bool,
    /// The parts by cells and certificate.
    ranking: Vec<u32>,
    /// Per part: where its certificate is in `words`.
    certificates: Vec<(u32, u32)>,
    words: Vec<u64>,
    /// Per cell: the place of the next vertex in the order.
    next: Vec<u32>,
    pos: Vec<u32>,
    local: Vec<u32>,
    /// The part that is ordered at the deeper level.
    part: Coloured,
    deeper: Option<Box<Level>>,
    /// How many levels lie above.
    pub(super) nested: u32,
}

impl Level {
    /// Refines a graph as far as that goes without a choice.
    pub(super) fn refine(
        &mut self,
        graph: &mut Coloured,
        work: &mut Work<'_>,
    ) -> Result<(), OrderError> {
        self.refiner.reset(graph.len());
        if let Some(root) = graph.root() {
            self.partition.clone_from(root);
        } else {
            self.partition.load(&graph.colours);
            for start in self.partition.starts() {
                self.refiner.enqueue(start);
            }
            self.refiner
                .equitable(graph, &mut self.partition, &mut Unwatched);
            graph.keep_root(&self.partition);
        }
        self.refiner
            .refine(graph, &mut self.partition, &mut Unwatched);
        work.spend(&mut self.refiner.work)
    }

    /// Orders a graph whose colours are equitable.
    fn order_equitable(&mut self, graph: &Coloured, work: &mut Work<'_>) -> Result<(), OrderError> {
        self.partition.load(&graph.colours);
        self.refiner.reset(graph.len());
        self.complete(graph, work)
    }

    /// Orders a refined graph.
    pub(super) fn complete(
        &mut self,
        graph: &Coloured,
        work: &mut Work<'_>,
    ) -> Result<(), OrderError> {
        self.generators.clear();
        self.searched = false;
        if self.partition.is_discrete() {
            self.order.clone_from(&self.partition.lab);
            return Ok(());
        }
        self.parts.find(graph, &self.partition);
        work.spend(&mut self.parts.work)?;
        if self.is_whole() && self.parts.vertices.len() == graph.len() || self.is_last() {
            self.searched = true;
            self.search(graph, work)
        } else {
            self.arrange(graph, work, true)
        }
    }

    /// Whether the open vertices are one part.
    pub(super) fn is_whole(&self) -> bool {
        self.parts.parts.len() == 1
    }

    /// Whether parts are not ordered on their own.
    pub(super) fn is_last(&self) -> bool {
        self.nested == MOST_NESTED
    }

    /// Orders the parts found and sorts them: vertices of a cell follow each other by part, and
    /// within a part by its order. Adds generators, if asked for.
    pub(super) fn arrange(
        &mut self,
        graph: &Coloured,
        work: &mut Work<'_>,
        generators: bool,
    ) -> Result<(), OrderError> {
        self.words.clear();
        self.certificates.clear();
        self.certificates.resize(self.parts.parts.len(), (0, 0));
        self.ranking.clear();
        self.ranking.extend(0..self.parts.parts.len() as u32);
        let (parts, cell) = (&self.parts, &self.partition.cell);
        self.ranking.sort_unstable_by(|&a, &b| {
            let cells = |part: u32| cells_of(parts, cell, part);
            cells(a).cmp(cells(b))
        });
        let mut from = 0;
        while let Some(&leader) = self.ranking.get(from) {
            let like = |&part: &u32| self.in_same_cells(leader, part);
            let count = self.ranking[from..].iter().take_while(|p| like(p)).count();
            let run = from..from + count;
            from = run.end;
            for at in run.clone() {
                self.order_part(graph, self.ranking[at], count > 1, work, generators)?;
            }
            self.sort_run(run, generators);
        }
        self.place();
        Ok(())
    }

    fn part(&self, part: u32) -> Part {
        self.parts.parts[part as usize]
    }

    fn in_same_cells(&self, a: u32, b: u32) -> bool {
        let cells = |part| cells_of(&self.parts, &self.partition.cell, part);
        cells(a).eq(cells(b))
    }

    /// Puts the vertices of a part into their canonical order, with its certificate if asked for.
    fn order_part(
        &mut self,
        graph: &Coloured,
        part: u32,
        certificate: bool,
        work: &mut Work<'_>,
        generators: bool,
    ) -> Result<(), OrderError> {
        if self.part(part).rigid {
            return Ok(());
        }
        let Self {
            local, part: own, ..
        } = self;
        own.load_part(graph, &self.partition, &self.parts, part, local);
        let deeper = self.deeper.get_or_insert_default();
        deeper.nested = self.nested + 1;
        deeper.order_equitable(own, work)?;
        let vertices = &mut self.parts.vertices[self.parts.parts[part as usize].range()];
        if generators {
            self.generators
                .extend_renamed(&deeper.generators, |v| vertices[v as usize]);
        }
        let (order, old) = (&deeper.order, &mut self.local);
        old.clear();
        old.extend_from_slice(vertices);
        for (vertex, &from) in vertices.iter_mut().zip(order) {
            *vertex = old[from as usize];
        }
        if certificate {
            let start = self.words.len() as u32;
            write_certificate(own, order, &mut self.pos, &mut self.words);
            self.certificates[part as usize] = (start, self.words.len() as u32);
            work.steps += self.words.len() as u64 - u64::from(start);
        }
        Ok(())
    }

    /// Sorts parts that lie in the same cells by certificate. Equal ones can be exchanged.
    fn sort_run(&mut self, run: std::ops::Range<usize>, generators: bool) {
        let run = &mut self.ranking[run];
        let certificate = |part: u32| {
            let (start, end) = self.certificates[part as usize];
            &self.words[start as usize..end as usize]
        };
        run.sort_unstable_by(|&a, &b| certificate(a).cmp(certificate(b)));
        if !generators {
            return;
        }
        let vertices = |part: u32| &self.parts.vertices[self.parts.parts[part as usize].range()];
        for pair in run.windows(2) {
            if certificate(pair[0]) == certificate(pair[1]) {
                let pairs = vertices(pair[0]).iter().zip(vertices(pair[1]));
                self.generators
                    .push(pairs.flat_map(|(&a, &b)| [(a, b), (b, a)]));
            }
        }
    }

    /// Writes the order that the ranking of the parts gives.
    fn place(&mut self) {
        self.order.clone_from(&self.partition.lab);
        self.next.resize(self.partition.cell.len(), 0);
        let cell = |vertex: u32| self.partition.cell[vertex as usize] as usize;
        for &vertex in &self.parts.vertices {
            self.next[cell(vertex)] = cell(vertex) as u32;
        }
        for &part in &self.ranking {
            for &vertex in &self.parts.vertices[self.parts.parts[part as usize].range()] {
                let place = &mut self.next[cell(vertex)];
                self.order[*place as usize] = vertex;
                *place += 1;
            }
        }
    }
}

/// The cells of the vertices of a part, in order.
fn cells_of<'a>(parts: &'a Parts, cell: &'a [u32], part: u32) -> impl Iterator<Item = u32> + 'a {
    let vertices = &parts.vertices[parts.parts[part as usize].range()];
    vertices.iter().map(|&vertex| cell[vertex as usize])
}
