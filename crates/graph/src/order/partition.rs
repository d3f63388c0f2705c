//! An ordered partition of vertices and its equitable refinement.

/// A vertex with its cell and a key, in one word that sorts by cell, then key.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord)]
pub(super) struct Keyed(u128);

impl Keyed {
    pub(super) fn new(cell: u32, key: u64, vertex: u32) -> Self {
        Self(u128::from(cell) << 96 | u128::from(key) << 32 | u128::from(vertex))
    }

    pub(super) fn cell(self) -> u32 {
        (self.0 >> 96) as u32
    }

    pub(super) fn key(self) -> u64 {
        (self.0 >> 32) as u64
    }

    pub(super) fn vertex(self) -> u32 {
        self.0 as u32
    }
}

/// An ordered partition: `lab` lists the vertices cell by cell. Cells are named by where they start.
#[derive(Debug, Default)]
pub(crate) struct Partition {
    pub(super) lab: Vec<u32>,
    /// Per vertex: its position in `lab`. Valid for the vertices in `lab` only.
    pub(super) pos: Vec<u32>,
    /// Per vertex: the start of its cell.
    pub(super) cell: Vec<u32>,
    /// Per cell start: the number of vertices.
    pub(super) len: Vec<u32>,
    pub(super) cells: u32,
    /// The splits made, as the cell that was split and the cell split off, so that each can be
    /// undone by joining it to what precedes it.
    log: Vec<(u32, u32)>,
    /// Scratch: colours with their vertices.
    coloured: Vec<u64>,
}

impl Clone for Partition {
    fn clone(&self) -> Self {
        let mut copy = Self::default();
        copy.clone_from(self);
        copy
    }

    /// Keeps the memory, which the derived one would not, and leaves the scratch.
    fn clone_from(&mut self, source: &Self) {
        self.lab.clone_from(&source.lab);
        self.pos.clone_from(&source.pos);
        self.cell.clone_from(&source.cell);
        self.len.clone_from(&source.len);
        self.cells = source.cells;
        self.log.clone_from(&source.log);
    }
}

impl Partition {
    /// Starts with all vertices, ordered by colour, equal colours in one cell.
    pub(super) fn load(&mut self, colours: &[u64]) {
        self.sort_by_colour(colours);
        for table in [&mut self.pos, &mut self.cell] {
            table.resize(colours.len(), 0);
        }
        self.len.clear();
        self.len.resize(colours.len(), 0);
        self.cells = 0;
        self.log.clear();
        let (mut start, mut before) = (0, None);
        for (at, &vertex) in self.lab.iter().enumerate() {
            let colour = colours[vertex as usize];
            if before != Some(colour) {
                (start, before) = (at, Some(colour));
                self.cells += 1;
            }
            self.pos[vertex as usize] = at as u32;
            self.cell[vertex as usize] = start as u32;
            self.len[start] += 1;
        }
    }

    /// Lists the vertices by colour. Where both fit, colour and vertex are sorted as one word, which takes
    /// half the time that it takes to sort pairs.
    fn sort_by_colour(&mut self, colours: &[u64]) {
        self.lab.clear();
        let bits = usize::BITS - colours.len().leading_zeros();
        let used = colours.iter().fold(0, |used, colour| used | colour);
        if used.leading_zeros() < bits {
            self.lab.extend(0..colours.len() as u32);
            self.lab
                .sort_unstable_by_key(|&vertex| (colours[vertex as usize], vertex));
            return;
        }
        self.coloured.clear();
        let words = colours.iter().zip(0..);
        self.coloured
            .extend(words.map(|(&colour, vertex)| colour << bits | vertex));
        self.coloured.sort_unstable();
        let vertex = |&word: &u64| (word & ((1 << bits) - 1)) as u32;
        self.lab.extend(self.coloured.iter().map(vertex));
    }

    /// Whether every cell has one vertex.
    pub(super) fn is_discrete(&self) -> bool {
        self.cells as usize == self.lab.len()
    }

    /// The vertices of a cell.
    pub(super) fn members(&self, start: u32) -> &[u32] {
        &self.lab[start as usize..(start + self.len[start as usize]) as usize]
    }

    /// Whether the vertex shares its cell with others.
    pub(super) fn is_open(&self, vertex: u32) -> bool {
        self.len[self.cell[vertex as usize] as usize] > 1
    }

    /// The rank of a vertex as far as it is known: its cell. Numbers from `vertices` upwards, which
    /// are no vertices, rank as they are.
    pub(super) fn rank(&self, number: u32, vertices: u32) -> u32 {
        if number < vertices {
            self.cell[number as usize]
        } else {
            number
        }
    }

    /// The starts of all cells in order.
    pub(super) fn starts(&self) -> impl Iterator<Item = u32> {
        let mut next = 0;
        std::iter::from_fn(move || {
            let start = next;
            next += *self.len.get(start as usize)?;
            Some(start)
        })
    }

    /// The first of the smallest cells that have two or more vertices.
    pub(super) fn smallest_open_cell(&self) -> u32 {
        let open = self.starts().filter(|&start| self.len[start as usize] > 1);
        open.min_by_key(|&start| self.len[start as usize])
            .unwrap_or(0)
    }

    /// Splits a vertex off the end of its cell and returns the start of its new cell.
    pub(super) fn individualise(&mut self, vertex: u32) -> u32 {
        self.split_off(self.cell[vertex as usize], std::iter::once(vertex))
    }

    /// Splits vertices, not all, off the end of their cell and returns the start of their new one.
    pub(super) fn split_off(
        &mut self,
        cell: u32,
        vertices: impl ExactSizeIterator<Item = u32>,
    ) -> u32 {
        let count = vertices.len() as u32;
        let rest = self.len[cell as usize] - count;
        let start = cell + rest;
        self.len[cell as usize] = rest;
        self.len[start as usize] = count;
        for (at, vertex) in (start..).zip(vertices) {
            // What a vertex changes places with is not one that was placed before it.
            self.exchange(self.pos[vertex as usize], at);
            self.cell[vertex as usize] = start;
        }
        self.cells += 1;
        self.log.push((cell, start));
        start
    }

    fn exchange(&mut self, a: u32, b: u32) {
        self.lab.swap(a as usize, b as usize);
        self.pos[self.lab[a as usize] as usize] = a;
        self.pos[self.lab[b as usize] as usize] = b;
    }

    /// How many splits were made so far; [`Partition::undo_to`] goes back to it.
    pub(super) fn splits(&self) -> usize {
        self.log.len()
    }

    /// Undoes splits until only the first `splits` are left. Cells get their vertices back, in
    /// whatever order: the order within a cell means nothing.
    pub(super) fn undo_to(&mut self, splits: usize) {
        while self.log.len() > splits
            && let Some((cell, part)) = self.log.pop()
        {
            let size = self.len[part as usize];
            self.len[cell as usize] += size;
            for at in part..part + size {
                self.cell[self.lab[at as usize] as usize] = cell;
            }
            self.cells -= 1;
        }
    }

    /// Splits a cell by keys: `keyed` lists those of its vertices whose key is not zero, ascending;
    /// there are two keys or more. Vertices with key zero stay in front. Costs only what `keyed` is
    /// long. Calls `fragment` with start, size and key of each part in order.
    pub(super) fn split(
        &mut self,
        cell: u32,
        keyed: &[Keyed],
        mut fragment: impl FnMut(u32, u32, u64),
    ) {
        let size = self.len[cell as usize];
        let rest = size - keyed.len() as u32;
        if rest > 0 {
            self.len[cell as usize] = rest;
            fragment(cell, rest, 0);
        }
        let logged = self.log.len();
        let mut start = cell + rest;
        let mut from = 0;
        while let Some(first) = keyed.get(from) {
            let key = first.key();
            let mut end = from;
            while let Some(next) = keyed.get(end).filter(|next| next.key() == key) {
                // Later vertices of the list are still where they were, so nothing placed is moved.
                let at = cell + rest + end as u32;
                self.exchange(self.pos[next.vertex() as usize], at);
                self.cell[next.vertex() as usize] = start;
                end += 1;
            }
            let length = (end - from) as u32;
            self.len[start as usize] = length;
            if start > cell {
                self.cells += 1;
                self.log.push((cell, start));
            }
            fragment(start, length, key);
            start += length;
            from = end;
        }
        // Undone from the back, parts have to join the cell from its near end onwards.
        self.log[logged..].reverse();
    }
}
