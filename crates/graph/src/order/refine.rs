//! Equitable refinement, with the orientation of units where their ligands are told apart.

use super::{
    coloured::{COUNT_BITS, Coloured, ranked_parity},
    partition::Partition,
};

/// The units and placed centres of the component that is being ordered, by index.
#[derive(Debug, Default, Clone)]
pub(crate) struct Inside {
    pub(super) units: Vec<u32>,
    pub(super) placed: Vec<u32>,
}

/// Scratch of the refinement, and the running invariant of what it did.
#[derive(Debug, Default, Clone)]
pub(super) struct Refiner {
    queue: Vec<u32>,
    queued: Vec<bool>,
    key: Vec<u64>,
    touched: Vec<u32>,
    /// Cell, key and number of each touched vertex.
    keyed: Vec<(u32, u64, u32)>,
    /// Key and number of the touched vertices of one cell.
    group: Vec<(u64, u32)>,
    parts: Vec<u32>,
    splitter: Vec<u32>,
    invariant: u64,
    /// Edges looked at since the last reset.
    pub(super) work: u64,
}

/// One step of a hash that is invariant because its inputs come in an invariant order.
fn mix(state: u64, word: u64) -> u64 {
    let product = u128::from(state ^ word.wrapping_mul(0x9e37_79b9_7f4a_7c15))
        .wrapping_mul(0xd6e8_feb8_6659_fd93_a076_1d64_78bd_642f);
    (product >> 64) as u64 ^ product as u64
}

impl Refiner {
    /// Gets ready for a graph with this many vertices.
    pub(super) fn reset(&mut self, vertices: usize) {
        self.work = 0;
        self.queue.clear();
        self.queued.clear();
        self.queued.resize(vertices, false);
        self.key.clear();
        self.key.resize(vertices, 0);
    }

    /// Puts a cell into the queue of splitters.
    pub(super) fn enqueue(&mut self, start: u32) {
        if !self.queued[start as usize] {
            self.queued[start as usize] = true;
            self.queue.push(start);
        }
    }

    /// Refines until the partition is equitable and no unit tells more. Returns an invariant of the
    /// refinement: nodes of the search tree that are images of each other give the same.
    pub(super) fn refine(
        &mut self,
        graph: &Coloured,
        inside: &Inside,
        partition: &mut Partition,
    ) -> u64 {
        self.invariant = mix(0, partition.cells.into());
        loop {
            self.equitable(graph, partition);
            if partition.is_discrete() || !self.orient(graph, inside, partition) {
                break;
            }
        }
        mix(self.invariant, partition.cells.into())
    }

    fn equitable(&mut self, graph: &Coloured, partition: &mut Partition) {
        let mut at = 0;
        while at < self.queue.len() {
            let start = self.queue[at];
            at += 1;
            self.queued[start as usize] = false;
            if partition.is_discrete() {
                continue;
            }
            self.splitter.clear();
            self.splitter.extend_from_slice(partition.members(start));
            self.touch(graph);
            self.invariant = mix(self.invariant, start.into());
            self.split_touched(partition);
            // The queue is drained from the front; forget the drained part before it grows large.
            if at > 64 && at * 2 > self.queue.len() {
                self.queue.drain(..at);
                at = 0;
            }
        }
        self.queue.clear();
    }

    /// Counts, for each vertex next to the splitter, its edges into it by class.
    fn touch(&mut self, graph: &Coloured) {
        self.touched.clear();
        for &from in &self.splitter {
            self.work += graph.arcs(from).len() as u64;
            for &(to, class) in graph.arcs(from) {
                let key = &mut self.key[to as usize];
                if *key == 0 {
                    self.touched.push(to);
                }
                *key += 1 << (COUNT_BITS * u32::from(class));
            }
        }
    }

    /// Splits all cells that have touched vertices by the keys of these, in an invariant order.
    fn split_touched(&mut self, partition: &mut Partition) -> bool {
        self.keyed.clear();
        for &vertex in &self.touched {
            let key = std::mem::take(&mut self.key[vertex as usize]);
            self.keyed
                .push((partition.cell[vertex as usize], key, vertex));
        }
        self.keyed.sort_unstable();
        let keyed = std::mem::take(&mut self.keyed);
        let mut split = false;
        for group in keyed.chunk_by(|a, b| a.0 == b.0) {
            let cell = group[0].0;
            self.group.clear();
            self.group
                .extend(group.iter().map(|&(_, key, vertex)| (key, vertex)));
            split |= self.split_cell(cell, partition);
        }
        self.keyed = keyed;
        split
    }

    /// Splits a cell by the keys in `group` and queues the parts: all if the cell was waiting, else
    /// all but the first of the largest (Hopcroft 1971).
    fn split_cell(&mut self, cell: u32, partition: &mut Partition) -> bool {
        let (mut invariant, mut largest) = (self.invariant, (0, 0));
        let waiting = self.queued[cell as usize];
        self.parts.clear();
        let parts = &mut self.parts;
        let split = partition.split(cell, &self.group, |start, size, key| {
            invariant = mix(
                mix(invariant, key),
                u64::from(start) << 32 | u64::from(size),
            );
            if size > largest.1 {
                largest = (start, size);
            }
            parts.push(start);
        });
        if split {
            for at in 0..self.parts.len() {
                let start = self.parts[at];
                if waiting || start != largest.0 {
                    self.enqueue(start);
                }
            }
        } else {
            let key = self.group.first().map_or(0, |&(key, _)| key);
            invariant = mix(
                mix(invariant, key),
                u64::from(cell) << 32 | self.group.len() as u64,
            );
        }
        self.invariant = invariant;
        split
    }

    /// Splits cells by the orientation of the units centred on their vertices. A unit whose ligands
    /// are not yet told apart counts as such.
    fn orient(&mut self, graph: &Coloured, inside: &Inside, partition: &mut Partition) -> bool {
        if inside.units.is_empty() && inside.placed.is_empty() {
            return false;
        }
        self.touched.clear();
        self.work += (inside.units.len() + inside.placed.len()) as u64;
        let vertices = graph.len() as u32;
        let rank = |v: u32| {
            if v < vertices {
                partition.cell[v as usize]
            } else {
                v
            }
        };
        for &index in &inside.units {
            let unit = &graph.units[index as usize];
            let word = match ranked_parity(unit, rank) {
                None => 1,
                Some(false) => 1 << 16,
                Some(true) => 1 << 32,
            };
            let ends = if unit.centres[0] == unit.centres[1] {
                1
            } else {
                2
            };
            for &centre in &unit.centres[..ends] {
                self.add(centre, word);
            }
        }
        for &index in &inside.placed {
            let placed = &graph.placed[index as usize];
            let ranks = placed.ranks(rank);
            let word = ranks.iter().fold(1, |state, &rank| mix(state, rank.into()));
            // Bits above those of units; equal hashes of different arrangements split less, that is
            // all.
            self.add(placed.centre, word << 48 | 1 << 47);
        }
        self.split_touched(partition)
    }

    fn add(&mut self, vertex: u32, word: u64) {
        let key = &mut self.key[vertex as usize];
        if *key == 0 {
            self.touched.push(vertex);
        }
        *key = key.wrapping_add(word);
    }
}
