//! An ordered partition of vertices and its equitable refinement.

/// An ordered partition: `lab` lists the vertices cell by cell. Cells are named by where they start.
#[derive(Debug, Default, Clone)]
pub(crate) struct Partition {
    pub(super) lab: Vec<u32>,
    /// Per vertex: its position in `lab`. Valid for the vertices in `lab` only.
    pub(super) pos: Vec<u32>,
    /// Per vertex: the start of its cell.
    pub(super) cell: Vec<u32>,
    /// Per cell start: the number of vertices.
    pub(super) len: Vec<u32>,
    pub(super) cells: u32,
}

/// What has to be put back to return to a node of the search tree.
#[derive(Debug, Default, Clone)]
pub(super) struct Snapshot {
    lab: Vec<u32>,
    len: Vec<u32>,
    cells: u32,
}

impl Partition {
    /// Starts with the given vertices, ordered by `colour`, equal colours in one cell. `vertices`
    /// bounds all vertex numbers.
    pub(super) fn load<C: Ord + Copy>(
        &mut self,
        members: &[u32],
        vertices: usize,
        colour: impl Fn(u32) -> C,
    ) {
        self.lab.clear();
        self.lab.extend_from_slice(members);
        self.lab.sort_unstable_by_key(|&v| colour(v));
        self.pos.resize(vertices.max(self.pos.len()), 0);
        self.cell.resize(vertices.max(self.cell.len()), 0);
        self.len.clear();
        self.len.resize(members.len(), 0);
        self.cells = 0;
        let mut start = 0;
        for at in 0..self.lab.len() {
            let vertex = self.lab[at];
            if at == 0 || colour(self.lab[at - 1]) != colour(vertex) {
                start = at;
                self.cells += 1;
            }
            self.pos[vertex as usize] = at as u32;
            self.cell[vertex as usize] = start as u32;
            self.len[start] += 1;
        }
    }

    /// Whether every cell has one vertex.
    pub(super) fn is_discrete(&self) -> bool {
        self.cells as usize == self.lab.len()
    }

    /// The vertices of a cell.
    pub(super) fn members(&self, start: u32) -> &[u32] {
        &self.lab[start as usize..(start + self.len[start as usize]) as usize]
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

    /// Splits a vertex off the front of its cell; the rest follows as a new cell.
    pub(super) fn individualise(&mut self, vertex: u32) {
        let start = self.cell[vertex as usize];
        let (at, first) = (self.pos[vertex as usize], self.lab[start as usize]);
        self.lab.swap(start as usize, at as usize);
        self.pos[vertex as usize] = start;
        self.pos[first as usize] = at;
        let rest = self.len[start as usize] - 1;
        self.len[start as usize] = 1;
        self.len[start as usize + 1] = rest;
        for at in start + 1..=start + rest {
            let other = self.lab[at as usize];
            self.cell[other as usize] = start + 1;
        }
        self.cells += 1;
    }

    pub(super) fn save(&self, snapshot: &mut Snapshot) {
        snapshot.lab.clone_from(&self.lab);
        snapshot.len.clone_from(&self.len);
        snapshot.cells = self.cells;
    }

    pub(super) fn restore(&mut self, snapshot: &Snapshot) {
        self.lab.clone_from(&snapshot.lab);
        self.len.clone_from(&snapshot.len);
        self.cells = snapshot.cells;
        let mut start = 0;
        while start < self.lab.len() {
            let end = start + self.len[start] as usize;
            for at in start..end {
                let vertex = self.lab[at] as usize;
                self.pos[vertex] = at as u32;
                self.cell[vertex] = start as u32;
            }
            start = end;
        }
    }

    /// Splits the cell at `start` by a key per vertex, ascending. Calls `fragment` with the start of
    /// each part in order, if there is more than one.
    pub(super) fn split(
        &mut self,
        start: u32,
        key: &[u64],
        mut fragment: impl FnMut(u32, u32, u64),
    ) -> bool {
        let end = start + self.len[start as usize];
        let slice = &mut self.lab[start as usize..end as usize];
        let first = key[slice[0] as usize];
        if slice.iter().all(|&v| key[v as usize] == first) {
            return false;
        }
        slice.sort_unstable_by_key(|&v| key[v as usize]);
        let mut begin = start;
        for at in start..end {
            let vertex = self.lab[at as usize];
            if at > start && key[vertex as usize] != key[self.lab[at as usize - 1] as usize] {
                self.len[begin as usize] = at - begin;
                begin = at;
                self.cells += 1;
            }
            self.pos[vertex as usize] = at;
            self.cell[vertex as usize] = begin;
        }
        self.len[begin as usize] = end - begin;
        let mut at = start;
        while at < end {
            let size = self.len[at as usize];
            fragment(at, size, key[self.lab[at as usize] as usize]);
            at += size;
        }
        true
    }
}
