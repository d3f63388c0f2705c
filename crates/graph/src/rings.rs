//! Ring membership and small rings; no ring set is ever needed for identity.

use std::collections::VecDeque;

/// Compressed adjacency: the arcs of vertex `v` are `arcs[start[v]..start[v + 1]]`, each with the
/// neighbour and the index of the bond.
#[derive(Debug, Default, Clone)]
pub(crate) struct Adjacency {
    start: Vec<u32>,
    arcs: Vec<(u32, u32)>,
}

impl Adjacency {
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
        self.arcs.clear();
        self.arcs.resize(count, (0, 0));
        for (bond, (a, b)) in bonds.enumerate() {
            for (from, to) in [(a, b), (b, a)] {
                let slot = &mut self.start[from as usize];
                *slot -= 1;
                self.arcs[*slot as usize] = (to, bond as u32);
            }
        }
        // Filling from the back reversed the input order within each vertex; it carries no meaning.
    }

    /// The arcs of a vertex: neighbour and bond.
    pub(crate) fn of(&self, vertex: u32) -> &[(u32, u32)] {
        let at = vertex as usize;
        &self.arcs[self.start[at] as usize..self.start[at + 1] as usize]
    }

    /// The number of vertices.
    pub(crate) fn len(&self) -> usize {
        self.start.len().saturating_sub(1)
    }

    /// For each bond whether it lies in a ring: a depth-first search for bridges (Tarjan 1974),
    /// without recursion, linear in the bonds. `keep` selects the bonds that exist.
    pub(crate) fn ring_bonds(&self, bonds: usize, keep: impl Fn(u32) -> bool) -> Vec<bool> {
        const UNSEEN: u32 = u32::MAX;
        let mut in_ring = vec![false; bonds];
        let mut depth = vec![UNSEEN; self.len()];
        let mut low = vec![UNSEEN; self.len()];
        // Vertex, the bond it was entered by, and the range of arcs still to be looked at.
        let range = |vertex: u32| (self.start[vertex as usize], self.start[vertex as usize + 1]);
        let mut stack: Vec<(u32, u32, (u32, u32))> = Vec::with_capacity(self.len());
        for root in 0..self.len() as u32 {
            if depth[root as usize] != UNSEEN {
                continue;
            }
            depth[root as usize] = 0;
            low[root as usize] = 0;
            stack.push((root, u32::MAX, range(root)));
            while let Some(&mut (vertex, entered, (ref mut next, end))) = stack.last_mut() {
                if *next < end {
                    let (to, bond) = self.arcs[*next as usize];
                    *next += 1;
                    if bond == entered || !keep(bond) {
                        continue;
                    }
                    if depth[to as usize] == UNSEEN {
                        depth[to as usize] = depth[vertex as usize] + 1;
                        low[to as usize] = depth[to as usize];
                        stack.push((to, bond, range(to)));
                    } else {
                        in_ring[bond as usize] = true;
                        low[vertex as usize] = low[vertex as usize].min(depth[to as usize]);
                    }
                } else {
                    stack.pop();
                    if let Some(&(parent, _, _)) = stack.last() {
                        if low[vertex as usize] <= depth[parent as usize] {
                            in_ring[entered as usize] = true;
                        }
                        low[parent as usize] = low[parent as usize].min(low[vertex as usize]);
                    }
                }
            }
        }
        in_ring
    }

    /// The number of atoms of the smallest ring through a bond, if it is at most `limit`.
    pub(crate) fn smallest_ring(&self, a: u32, b: u32, limit: u32) -> Option<u32> {
        let mut seen: Vec<(u32, u32)> = vec![(a, 1)];
        let mut queue = VecDeque::from([(a, 1u32)]);
        while let Some((vertex, size)) = queue.pop_front() {
            if size == limit {
                break;
            }
            for &(to, _) in self.of(vertex) {
                if (vertex == a && to == b) || seen.iter().any(|&(v, _)| v == to) {
                    continue;
                }
                if to == b {
                    return Some(size + 1);
                }
                seen.push((to, size + 1));
                queue.push_back((to, size + 1));
            }
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
    fn bridges_are_not_in_rings() {
        let bonds = [(0, 1), (1, 2), (2, 0), (2, 3), (3, 4), (4, 5), (5, 3)];
        let table = adjacency(6, &bonds);
        let found = table.ring_bonds(bonds.len(), |_| true);
        assert_eq!(found, [true, true, true, false, true, true, true]);
    }

    #[test]
    fn smallest_ring_within_a_limit() {
        let ring: Vec<_> = (0..8).map(|i| (i, (i + 1) % 8)).collect();
        let table = adjacency(8, &ring);
        assert_eq!(table.smallest_ring(0, 1, 8), Some(8));
        assert_eq!(table.smallest_ring(0, 1, 7), None);
    }
}
