//! Neighbours and small rings; no ring set is ever needed for identity.

mod bridges;

pub(crate) use bridges::RingBonds;

/// Compressed adjacency: the arcs of vertex `v` are `arcs[start[v]..start[v + 1]]`, each with the
/// neighbour and the index of the bond.
#[derive(Debug, Default, Clone)]
pub(crate) struct Adjacency {
    start: Vec<u32>,
    arcs: Vec<(u32, u32)>,
}

impl Adjacency {
    /// Takes over another table, in the memory at hand.
    pub(crate) fn copy(&mut self, other: &Self) {
        self.start.clone_from(&other.start);
        self.arcs.clone_from(&other.arcs);
    }

    /// Fills the table from a bond list.
    pub(crate) fn load(
        &mut self,
        vertices: usize,
        bonds: impl Iterator<Item = (u32, u32)> + Clone,
    ) {
        self.start.clear();
        self.start.resize(vertices + 1, 0);
        let mut count = 0;
        for (a, b) in bonds.clone() {
            self.start[a as usize] += 1;
            self.start[b as usize] += 1;
            count += 2;
        }
        let mut sum = 0;
        for slot in &mut self.start {
            sum += *slot;
            *slot = sum;
        }
        // Every place is written below, so what was there before need not be cleared.
        self.arcs.resize(count, (0, 0));
        for (bond, (a, b)) in (0..).zip(bonds) {
            for (from, to) in [(a, b), (b, a)] {
                let slot = &mut self.start[from as usize];
                *slot -= 1;
                self.arcs[*slot as usize] = (to, bond);
            }
        }
        // Filling from the back reversed the input order within each vertex; it carries no meaning.
    }

    /// The arcs of a vertex: neighbour and bond.
    pub(crate) fn of(&self, vertex: u32) -> &[(u32, u32)] {
        let at = vertex as usize;
        &self.arcs[self.start[at] as usize..self.start[at + 1] as usize]
    }

    /// The number of atoms of the smallest ring through a bond, if it is at most `limit`: breadth
    /// first, in layers. `seen` is scratch.
    pub(crate) fn smallest_ring(
        &self,
        [a, b]: [u32; 2],
        limit: u32,
        seen: &mut Vec<u32>,
    ) -> Option<u32> {
        seen.clear();
        seen.push(a);
        let mut layer = 0;
        for size in 2..=limit {
            let reached = seen.len();
            for at in layer..reached {
                let vertex = seen[at];
                for &(to, _) in self.of(vertex) {
                    if to == b {
                        if vertex != a {
                            return Some(size);
                        }
                    } else if !seen.contains(&to) {
                        seen.push(to);
                    }
                }
            }
            layer = reached;
        }
        None
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn adjacency(vertices: usize, bonds: &[(u32, u32)]) -> Adjacency {
        let mut table = Adjacency::default();
        table.load(vertices, bonds.iter().copied());
        table
    }

    #[test]
    fn smallest_ring_within_a_limit() {
        let ring: Vec<_> = (0..8).map(|i| (i, (i + 1) % 8)).collect();
        let table = adjacency(8, &ring);
        let mut seen = Vec::new();
        assert_eq!(table.smallest_ring([0, 1], 8, &mut seen), Some(8));
        assert_eq!(table.smallest_ring([0, 1], 7, &mut seen), None);
    }
}
