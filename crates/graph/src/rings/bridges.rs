//! Which bonds lie in rings.

use super::Adjacency;

/// No vertex and no bond.
const NONE: u32 = u32::MAX;

/// Finds the bonds that lie in rings; owns the scratch.
#[derive(Debug, Default)]
pub(crate) struct RingBonds {
    steps: Vec<Step>,
    /// The bonds that no vertex is entered by.
    closures: Vec<(u32, u32, u32)>,
    adjacency: Adjacency,
    visits: Vec<Visit>,
}

/// How a vertex hangs on one with a lower number.
#[derive(Debug, Clone, Copy)]
struct Step {
    parent: u32,
    bond: u32,
    /// A vertex above it to which all bonds are known to be in rings, or itself.
    top: u32,
}

/// What the depth-first search knows of a vertex.
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

impl RingBonds {
    /// Fills in for each bond whether it lies in a ring. Close to linear in the bonds.
    pub(crate) fn find(
        &mut self,
        vertices: usize,
        bonds: impl Iterator<Item = (u32, u32)> + Clone,
        in_ring: &mut Vec<bool>,
    ) {
        in_ring.clear();
        in_ring.resize(bonds.clone().count(), false);
        if !self.climb(vertices, bonds.clone(), in_ring) {
            self.search(vertices, bonds, in_ring);
        }
    }

    /// The quick way, for numberings in which each vertex but the first of its component has a
    /// neighbour before it, as the atoms of a SMILES string have: a tree is at hand, and from the ends
    /// of each other bond the way up to where they meet is its ring. Says whether it was possible.
    fn climb(
        &mut self,
        vertices: usize,
        bonds: impl Iterator<Item = (u32, u32)>,
        in_ring: &mut [bool],
    ) -> bool {
        let Self {
            steps, closures, ..
        } = self;
        steps.clear();
        steps.extend((0..vertices as u32).map(|top| Step {
            parent: NONE,
            bond: NONE,
            top,
        }));
        closures.clear();
        for (bond, (a, b)) in (0..).zip(bonds) {
            let (low, high) = (a.min(b), a.max(b));
            let step = &mut steps[high as usize];
            if step.parent == NONE {
                (step.parent, step.bond) = (low, bond);
            } else {
                closures.push((low, high, bond));
            }
        }
        for &(a, b, bond) in closures.iter() {
            in_ring[bond as usize] = true;
            let (mut a, mut b) = (top(steps, a), top(steps, b));
            while a != b {
                // The vertex with the higher number is not above the other.
                let (low, high) = (a.min(b), a.max(b));
                let step = &mut steps[high as usize];
                if step.parent == NONE {
                    return false;
                }
                in_ring[step.bond as usize] = true;
                step.top = step.parent;
                (a, b) = (low, top(steps, high));
            }
        }
        true
    }

    /// The general way: a depth-first search for bridges (Tarjan 1974), without recursion, linear in
    /// the bonds.
    fn search(
        &mut self,
        vertices: usize,
        bonds: impl Iterator<Item = (u32, u32)> + Clone,
        in_ring: &mut [bool],
    ) {
        in_ring.fill(false);
        let Self {
            adjacency, visits, ..
        } = self;
        adjacency.load(vertices, bonds);
        visits.clear();
        visits.resize(vertices, UNSEEN);
        for root in 0..vertices {
            if visits[root].depth != NONE {
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
                if let Some(&(to, bond)) = adjacency.of(vertex as u32).get(next as usize) {
                    visits[vertex].next += 1;
                    let other = &mut visits[to as usize];
                    if other.depth == NONE {
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
                } else if entered == NONE {
                    break;
                } else {
                    in_ring[entered as usize] |= low < depth;
                    vertex = parent as usize;
                    visits[vertex].low = visits[vertex].low.min(low);
                }
            }
        }
    }
}

const UNSEEN: Visit = Visit {
    depth: NONE,
    low: NONE,
    entered: NONE,
    parent: 0,
    next: 0,
};

/// The highest vertex that a vertex is known to reach over ring bonds of the tree; shortens the way
/// for later calls, so that nested rings cost no more than their bonds (path halving, Tarjan & van
/// Leeuwen 1984).
fn top(steps: &mut [Step], mut vertex: u32) -> u32 {
    loop {
        let above = steps[vertex as usize].top;
        if above == vertex {
            return vertex;
        }
        let next = steps[above as usize].top;
        steps[vertex as usize].top = next;
        vertex = next;
    }
}

#[cfg(test)]
mod tests {
    use proptest::prelude::*;

    use super::*;

    fn found(vertices: usize, bonds: &[(u32, u32)]) -> Vec<bool> {
        let mut in_ring = Vec::new();
        RingBonds::default().find(vertices, bonds.iter().copied(), &mut in_ring);
        in_ring
    }

    /// Whether the ends of a bond are joined without it, by spreading until nothing changes.
    fn is_in_ring(vertices: usize, bonds: &[(u32, u32)], bond: usize) -> bool {
        let mut reached = vec![false; vertices];
        reached[bonds[bond].0 as usize] = true;
        for _ in 0..vertices {
            for (_, &(a, b)) in bonds.iter().enumerate().filter(|&(at, _)| at != bond) {
                let either = reached[a as usize] || reached[b as usize];
                reached[a as usize] = either;
                reached[b as usize] = either;
            }
        }
        reached[bonds[bond].1 as usize]
    }

    #[test]
    fn bridges_are_not_in_rings() {
        let bonds = [(0, 1), (1, 2), (2, 0), (2, 3), (3, 4), (4, 5), (5, 3)];
        let expected = [true, true, true, false, true, true, true];
        assert_eq!(found(6, &bonds), expected);
        // Vertices 4 and 5 have no neighbour before them.
        let bonds = [(5, 0), (0, 4), (4, 5), (4, 1), (1, 2), (2, 3), (3, 1)];
        assert_eq!(found(6, &bonds), expected);
    }

    proptest! {
        #[test]
        fn ring_bonds_are_those_whose_ends_are_joined_without_them(
            pairs in proptest::collection::btree_set((0..8u32, 0..8u32), 0..14),
        ) {
            let mut bonds: Vec<_> = pairs.into_iter().filter(|(a, b)| a != b).collect();
            bonds.retain({
                let all = bonds.clone();
                move |&(a, b)| a < b || !all.contains(&(b, a))
            });
            let expected: Vec<_> =
                (0..bonds.len()).map(|bond| is_in_ring(8, &bonds, bond)).collect();
            prop_assert_eq!(found(8, &bonds), expected);
        }
    }
}
