//! Equitable refinement, with the orientation of units where their ligands are told apart.

use super::{
    coloured::{COUNT_BITS, Coloured, ranked_parity},
    partition::{Keyed, Partition},
    trace::{Watch, mix},
};

/// Scratch of the refinement.
#[derive(Debug, Default, Clone)]
pub(super) struct Refiner {
    /// Cells to split others by; those before `front` are done.
    queue: Vec<u32>,
    front: usize,
    queued: Vec<bool>,
    key: Vec<u64>,
    touched: Vec<u32>,
    /// The touched vertices that share their cells.
    keyed: Vec<Keyed>,
    parts: Vec<(u32, u32)>,
    /// Centres of units: what the unit is, the cell of the other centre, the centre.
    oriented: Vec<(u32, u32, u32)>,
    /// Edges and units looked at since it was last taken.
    pub(super) work: u64,
}

impl Refiner {
    /// Gets ready for a graph with this many vertices.
    pub(super) fn reset(&mut self, vertices: usize) {
        self.forget();
        self.queued.resize(vertices.max(self.queued.len()), false);
        self.key.resize(vertices.max(self.key.len()), 0);
    }

    /// Empties the queue.
    fn forget(&mut self) {
        for &start in &self.queue[self.front..] {
            self.queued[start as usize] = false;
        }
        self.queue.clear();
        self.front = 0;
    }

    /// Puts a cell into the queue of splitters.
    pub(super) fn enqueue(&mut self, start: u32) {
        if !self.queued[start as usize] {
            self.queued[start as usize] = true;
            self.queue.push(start);
        }
    }

    /// Refines until the partition is equitable and units tell no more: then vertices of a cell have
    /// equal numbers of edges of each class into each cell, and equal numbers of units of each
    /// colour and orientation with the other centre in each cell. `watch` learns what is done, in
    /// words that are the same for images of a node. `false` if it ended the refinement early.
    pub(super) fn refine(
        &mut self,
        graph: &Coloured,
        partition: &mut Partition,
        watch: &mut impl Watch,
    ) -> bool {
        loop {
            if !self.equitable(graph, partition, watch) {
                self.forget();
                return false;
            }
            let settled = partition.is_discrete()
                || (graph.units.is_empty() && graph.placed.is_empty())
                || !self.orient(graph, partition, watch);
            if settled {
                watch.note(partition.cells.into());
                return watch.goes_on();
            }
        }
    }

    /// Refines by the edges alone.
    pub(super) fn equitable<W: Watch>(
        &mut self,
        graph: &Coloured,
        partition: &mut Partition,
        watch: &mut W,
    ) -> bool {
        while let Some(&start) = self.queue.get(self.front) {
            self.front += 1;
            self.queued[start as usize] = false;
            if partition.is_discrete() {
                break;
            }
            watch.note(start.into());
            self.keyed.clear();
            let alone = if let [only] = *partition.members(start) {
                self.key_neighbours::<W>(graph, partition, only)
            } else {
                self.touch::<W>(graph, partition, start);
                self.key_touched(partition)
            };
            watch.note(alone);
            if !self.keyed.is_empty() {
                self.split_keyed(partition, watch);
            }
            if !watch.goes_on() {
                return false;
            }
            // Forget the part of the queue that is done before it grows large.
            if self.front > 64 && self.front * 2 > self.queue.len() {
                self.queue.drain(..self.front);
                self.front = 0;
            }
        }
        self.forget();
        true
    }

    /// Counts, for each vertex next to a cell, its edges into it by class. Vertices in cells of their
    /// own matter only to one who listens.
    fn touch<W: Watch>(&mut self, graph: &Coloured, partition: &Partition, splitter: u32) {
        for &from in partition.members(splitter) {
            let arcs = graph.arcs(from);
            self.work += arcs.len() as u64;
            for &(to, class) in arcs {
                if !W::LISTENS && !partition.is_open(to) {
                    continue;
                }
                let key = &mut self.key[to as usize];
                if *key == 0 {
                    self.touched.push(to);
                }
                *key += 1 << (COUNT_BITS * u32::from(class));
            }
        }
    }

    /// Lists the open neighbours of a vertex by cell and class. Returns a word on the others.
    fn key_neighbours<W: Watch>(
        &mut self,
        graph: &Coloured,
        partition: &Partition,
        vertex: u32,
    ) -> u64 {
        let arcs = graph.arcs(vertex);
        self.work += arcs.len() as u64;
        let mut alone = 0u64;
        for &(to, class) in arcs {
            let key = 1 << (COUNT_BITS * u32::from(class));
            let cell = partition.cell[to as usize];
            if partition.len[cell as usize] > 1 {
                self.keyed.push(Keyed::new(cell, key, to));
            } else if W::LISTENS {
                alone = alone.wrapping_add(mix(key, cell.into()));
            }
        }
        alone
    }

    /// Lists the open vertices that were touched by cell and key. Returns a word on the others.
    fn key_touched(&mut self, partition: &Partition) -> u64 {
        let mut alone = 0u64;
        for &vertex in &self.touched {
            let key = std::mem::take(&mut self.key[vertex as usize]);
            let cell = partition.cell[vertex as usize];
            if partition.len[cell as usize] > 1 {
                self.keyed.push(Keyed::new(cell, key, vertex));
            } else {
                // Only a sum does not depend on the order of the list.
                alone = alone.wrapping_add(mix(key, cell.into()));
            }
        }
        self.touched.clear();
        alone
    }

    /// Splits all cells that have touched vertices by the keys of these, in an invariant order.
    fn split_touched(&mut self, partition: &mut Partition, watch: &mut impl Watch) -> bool {
        self.keyed.clear();
        watch.note(self.key_touched(partition));
        self.split_keyed(partition, watch)
    }

    fn split_keyed(&mut self, partition: &mut Partition, watch: &mut impl Watch) -> bool {
        let mut keyed = std::mem::take(&mut self.keyed);
        if keyed.len() > 1 {
            keyed.sort_unstable();
        }
        let mut split = false;
        let mut from = 0;
        while let Some(&first) = keyed.get(from) {
            let cell = first.cell();
            let rest = &keyed[from..];
            let same = |entry: &&Keyed| entry.cell() == cell;
            let group = &rest[..1 + rest[1..].iter().take_while(same).count()];
            split |= if group[group.len() - 1].key() == first.key() {
                self.split_off(cell, first.key(), group, partition, watch)
            } else {
                self.split_cell(cell, group, partition, watch)
            };
            from += group.len();
        }
        self.keyed = keyed;
        split
    }

    /// What [`Self::split_cell`] does, for a group of one key, as most are: often a single vertex.
    fn split_off(
        &mut self,
        cell: u32,
        key: u64,
        group: &[Keyed],
        partition: &mut Partition,
        watch: &mut impl Watch,
    ) -> bool {
        let count = group.len() as u32;
        let rest = partition.len[cell as usize] - count;
        if rest == 0 {
            watch.note(mix(key, u64::from(cell) << 32 | u64::from(count)));
            return false;
        }
        let part = partition.split_off(cell, group.iter().map(|entry| entry.vertex()));
        watch.note(mix(0, u64::from(cell) << 32 | u64::from(rest)));
        watch.note(mix(key, u64::from(part) << 32 | u64::from(count)));
        // Of a cell that waits, the other part waits already.
        let smaller = if count <= rest { part } else { cell };
        self.enqueue(if self.queued[cell as usize] {
            part
        } else {
            smaller
        });
        true
    }

    /// Splits a cell by the keys in `group`, two or more, and queues the parts: all if the cell was
    /// waiting, else all but the first of the largest (Hopcroft 1971).
    fn split_cell(
        &mut self,
        cell: u32,
        group: &[Keyed],
        partition: &mut Partition,
        watch: &mut impl Watch,
    ) -> bool {
        self.parts.clear();
        let parts = &mut self.parts;
        partition.split(cell, group, |start, size, key| {
            watch.note(mix(key, u64::from(start) << 32 | u64::from(size)));
            parts.push((size, start));
        });
        let waiting = self.queued[cell as usize];
        let mut largest = self.parts[0];
        for &part in &self.parts {
            if part.0 > largest.0 {
                largest = part;
            }
        }
        for at in 0..self.parts.len() {
            let part = self.parts[at];
            if waiting || part != largest {
                self.enqueue(part.1);
            }
        }
        true
    }

    /// Splits cells by the units centred on their vertices, and by the arrangement of their ligands.
    /// A unit whose ligands are not yet told apart counts as such.
    fn orient(
        &mut self,
        graph: &Coloured,
        partition: &mut Partition,
        watch: &mut impl Watch,
    ) -> bool {
        self.work += (graph.units.len() + graph.placed.len()) as u64;
        let vertices = graph.len() as u32;
        self.oriented.clear();
        for unit in &graph.units {
            let rank = |v: u32| partition.rank(v, vertices);
            let orientation = ranked_parity(unit, rank).map_or(0, |odd| 1 + u32::from(odd));
            let word = unit.colour << 2 | orientation;
            let [a, b] = unit.centres;
            for (centre, other) in [(a, b), (b, a)] {
                if centre < vertices && partition.is_open(centre) {
                    self.oriented.push((word, rank(other), centre));
                }
            }
        }
        self.oriented.sort_unstable();
        let oriented = std::mem::take(&mut self.oriented);
        let mut split = false;
        for group in oriented.chunk_by(|a, b| (a.0, a.1) == (b.0, b.1)) {
            watch.note(u64::from(group[0].0) << 32 | u64::from(group[0].1));
            for &(_, _, centre) in group {
                self.add(centre, 1);
            }
            split |= self.split_touched(partition, watch);
        }
        self.oriented = oriented;
        split | self.arrange(graph, partition, watch)
    }

    /// Splits cells by the arrangement of ligands placed about their vertices.
    fn arrange(
        &mut self,
        graph: &Coloured,
        partition: &mut Partition,
        watch: &mut impl Watch,
    ) -> bool {
        let vertices = graph.len() as u32;
        for placed in &graph.placed {
            let ranks = placed.ranks(|v| partition.rank(v, vertices));
            // Equal hashes of different arrangements split less, that is all.
            let word = ranks.iter().fold(1, |state, &rank| mix(state, rank.into()));
            if placed.centre < vertices {
                self.add(placed.centre, word >> 32 | 1);
            }
        }
        self.split_touched(partition, watch)
    }

    fn add(&mut self, vertex: u32, word: u64) {
        let key = &mut self.key[vertex as usize];
        if *key == 0 {
            self.touched.push(vertex);
        }
        *key = key.wrapping_add(word);
    }
}
