//! Equitable refinement, with the orientation of units where their ligands are told apart.

use super::{
    coloured::{COUNT_BITS, Coloured, ranked_parity},
    partition::Partition,
};

/// Scratch of the refinement, and the running invariant of what it did.
#[derive(Debug, Default, Clone)]
pub(super) struct Refiner {
    queue: Vec<u32>,
    queued: Vec<bool>,
    key: Vec<u64>,
    touched: Vec<u32>,
    cells: Vec<u32>,
    splitter: Vec<u32>,
    invariant: u64,
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
        units: &[u32],
        partition: &mut Partition,
    ) -> u64 {
        self.invariant = mix(0, partition.cells.into());
        loop {
            self.equitable(graph, partition);
            if partition.is_discrete() || !self.orient(graph, units, partition) {
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
            self.touch(graph, partition);
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
    fn touch(&mut self, graph: &Coloured, partition: &Partition) {
        self.touched.clear();
        self.cells.clear();
        for &from in &self.splitter {
            for &(to, class) in graph.arcs(from) {
                let key = &mut self.key[to as usize];
                if *key == 0 {
                    self.touched.push(to);
                    self.cells.push(partition.cell[to as usize]);
                }
                *key += 1 << (COUNT_BITS * u32::from(class));
            }
        }
        self.cells.sort_unstable();
        self.cells.dedup();
    }

    fn split_touched(&mut self, partition: &mut Partition) {
        let cells = std::mem::take(&mut self.cells);
        for &cell in &cells {
            let size = partition.len[cell as usize];
            if size == 1 {
                let key = self.key[partition.lab[cell as usize] as usize];
                self.invariant = mix(self.invariant, key ^ (u64::from(cell) << 40));
                continue;
            }
            self.split_cell(cell, partition);
        }
        self.cells = cells;
        for &vertex in &self.touched {
            self.key[vertex as usize] = 0;
        }
    }

    /// Splits a cell by the present keys and queues the parts: all if the cell was waiting, else all
    /// but the first of the largest (Hopcroft 1971).
    fn split_cell(&mut self, cell: u32, partition: &mut Partition) -> bool {
        let (mut invariant, mut largest) = (self.invariant, (0, 0));
        let mut parts: [u32; 16] = [0; 16];
        let mut count = 0;
        let waiting = self.queued[cell as usize];
        let mut overflow = Vec::new();
        let split = partition.split(cell, &self.key, |start, size, key| {
            invariant = mix(
                mix(invariant, key),
                u64::from(start) << 32 | u64::from(size),
            );
            if size > largest.1 {
                largest = (start, size);
            }
            match parts.get_mut(count) {
                Some(slot) => *slot = start,
                None => overflow.push(start),
            }
            count += 1;
        });
        if split {
            let known = parts[..count.min(parts.len())].iter().copied();
            for start in known.chain(overflow) {
                if waiting || start != largest.0 {
                    self.enqueue(start);
                }
            }
        } else {
            let key = self.key[partition.lab[cell as usize] as usize];
            invariant = mix(mix(invariant, key), cell.into());
        }
        self.invariant = invariant;
        split
    }

    /// Splits cells by the orientation of the units centred on their vertices. A unit whose ligands
    /// are not yet told apart counts as such.
    fn orient(&mut self, graph: &Coloured, units: &[u32], partition: &mut Partition) -> bool {
        if units.is_empty() {
            return false;
        }
        self.touched.clear();
        self.cells.clear();
        let vertices = graph.len() as u32;
        for &index in units {
            let unit = &graph.units[index as usize];
            let rank = |v: u32| {
                if v < vertices {
                    partition.cell[v as usize]
                } else {
                    v
                }
            };
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
                if self.key[centre as usize] == 0 {
                    self.touched.push(centre);
                    self.cells.push(partition.cell[centre as usize]);
                }
                self.key[centre as usize] += word;
            }
        }
        self.cells.sort_unstable();
        self.cells.dedup();
        let mut split = false;
        let cells = std::mem::take(&mut self.cells);
        for &cell in &cells {
            split |= self.split_cell(cell, partition);
        }
        self.cells = cells;
        for &vertex in &self.touched {
            self.key[vertex as usize] = 0;
        }
        split
    }
}
