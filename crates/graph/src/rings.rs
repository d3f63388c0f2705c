//! Ring membership and small rings; no ring set is ever needed for identity.

/// Compressed adjacency: the arcs of vertex `v` are `arcs[start[v]..start[v + 1]]`, each with the
/// neighbour and the index of the bond.
#[derive(Debug, Default, Clone)]
pub(crate) struct Adjacency {
    start: Vec<u32>,
    arcs: Vec<(u32, u32)>,
    /// Scratch of the search for rings.
    visits: Vec<Visit>,
}

/// What the search for bridges knows of a vertex.
#[derive(Debug, Clone, Copy)]
struct Visit {
    depth: u32,
    /// The least depth that the vertices beyond it reach.
    low: u32,
    /// The bond it was entered by.
    entered: u32,
    parent: u32,
    /// The arc to look at next.
    next: u32,
}

const UNSEEN: u32 = u32::MAX;
const NO_BOND: u32 = u32::MAX;

impl Default for Visit {
    fn default() -> Self {
        Self {
            depth: UNSEEN,
            low: UNSEEN,
            entered: NO_BOND,
            parent: 0,
            next: 0,
        }
    }
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

    /// For each bond whether it lies in a ring: a depth-first search for bridges (Tarjan 1974),
    /// without recursion, linear in the bonds.
    pub(crate) fn ring_bonds(&mut self, bonds: usize, in_ring: &mut Vec<bool>) {
        in_ring.clear();
        in_ring.resize(bonds, false);
        let Self {
            start,
            arcs,
            visits,
        } = self;
        visits.clear();
        visits.extend(start.iter().map(|&next| Visit {
            next,
            ..Visit::default()
        }));
        for root in 0..start.len().saturating_sub(1) {
            if visits[root].depth != UNSEEN {
                continue;
            }
            visits[root].depth = 0;
            visits[root].low = 0;
            let mut vertex = root;
            loop {
                let Visit {
                    depth,
                    low,
                    entered,
                    parent,
                    next,
                } = visits[vertex];
                if next < start[vertex + 1] {
                    visits[vertex].next += 1;
                    let (to, bond) = arcs[next as usize];
                    let other = &mut visits[to as usize];
                    if other.depth == UNSEEN {
                        other.depth = depth + 1;
                        other.low = depth + 1;
                        other.entered = bond;
                        other.parent = vertex as u32;
                        vertex = to as usize;
                    } else if bond != entered {
                        in_ring[bond as usize] = true;
                        let reached = other.depth;
                        visits[vertex].low = low.min(reached);
                    }
                } else if entered == NO_BOND {
                    break;
                } else {
                    in_ring[entered as usize] |= low < depth;
                    vertex = parent as usize;
                    visits[vertex].low = visits[vertex].low.min(low);
                }
            }
        }
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
    fn bridges_are_not_in_rings() {
        let bonds = [(0, 1), (1, 2), (2, 0), (2, 3), (3, 4), (4, 5), (5, 3)];
        let mut table = adjacency(6, &bonds);
        let mut found = Vec::new();
        table.ring_bonds(bonds.len(), &mut found);
        assert_eq!(found, [true, true, true, false, true, true, true]);
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
