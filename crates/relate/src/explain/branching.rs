//! Branch points and chains of one record.

use std::collections::{HashMap, HashSet};

use molkin_graph::Element;

use crate::Structure;

/// An atom with three or more non-hydrogen neighbours.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct BranchPoint {
    /// The atom, from 0.
    pub atom: u32,
    /// The sizes, in non-hydrogen atoms, of what hangs on it outside rings, ascending.
    pub branches: Vec<usize>,
    /// How many of its bonds lie in rings.
    pub ring_bonds: usize,
}

/// How a record branches.
#[derive(Debug, Clone, PartialEq, Eq, Default)]
pub struct Branching {
    /// The branch points by atom number.
    pub points: Vec<BranchPoint>,
    /// For each part outside rings that has a bond within: a longest chain of non-hydrogen atoms, from
    /// its lower-numbered end.
    pub chains: Vec<Vec<u32>>,
}

/// The heavy-atom graph of a record, on its own numbering.
struct Skeleton {
    neighbours: Vec<Vec<(u32, bool)>>,
}

/// Describes a record.
pub(super) fn of(structure: &Structure) -> Branching {
    let form = structure.canonical().normal_form();
    let mut skeleton = Skeleton {
        neighbours: vec![Vec::new(); structure.molecule().atom_count()],
    };
    for bond in &form.bonds {
        let [a, b] = [bond.a, bond.b].map(|at| &form.atoms[at as usize]);
        if a.element != Element::HYDROGEN && b.element != Element::HYDROGEN {
            skeleton.neighbours[a.source as usize].push((b.source, bond.in_ring));
            skeleton.neighbours[b.source as usize].push((a.source, bond.in_ring));
        }
    }
    for list in &mut skeleton.neighbours {
        list.sort_unstable();
    }
    Branching {
        points: skeleton.points(),
        chains: skeleton.chains(),
    }
}

impl Skeleton {
    fn points(&self) -> Vec<BranchPoint> {
        let tree = Tree::of(self);
        let branching = (0u32..)
            .zip(&self.neighbours)
            .filter(|(_, list)| list.len() >= 3);
        branching
            .map(|(atom, list)| {
                let outside = list.iter().filter(|&&(_, in_ring)| !in_ring);
                let mut branches: Vec<usize> =
                    outside.map(|&(to, _)| tree.size_beyond(atom, to)).collect();
                branches.sort_unstable();
                let ring_bonds = list.len() - branches.len();
                BranchPoint {
                    atom,
                    branches,
                    ring_bonds,
                }
            })
            .collect()
    }

    /// The atoms reachable from one through atoms that count, breadth first, each with its predecessor.
    fn order_from(&self, start: u32, counts: impl Fn(u32) -> bool) -> Vec<(u32, u32)> {
        let mut seen = HashSet::from([start]);
        let mut order = vec![(start, start)];
        let mut at = 0;
        while let Some(&(atom, _)) = order.get(at) {
            at += 1;
            for &(to, _) in &self.neighbours[atom as usize] {
                if counts(to) && seen.insert(to) {
                    order.push((to, atom));
                }
            }
        }
        order
    }

    /// Longest chains by two breadth-first walks, which is exact in trees.
    fn chains(&self) -> Vec<Vec<u32>> {
        let outside_rings = |atom: u32| {
            let mut bonds = self.neighbours[atom as usize].iter();
            bonds.all(|&(_, in_ring)| !in_ring)
        };
        let mut seen = HashSet::new();
        let mut chains = Vec::new();
        for start in (0..self.neighbours.len() as u32).filter(|&atom| outside_rings(atom)) {
            if seen.contains(&start) {
                continue;
            }
            let part = self.order_from(start, outside_rings);
            seen.extend(part.iter().map(|&(atom, _)| atom));
            if let [_, .., (end, _)] = *part {
                chains.push(path_back(&self.order_from(end, outside_rings), end));
            }
        }
        chains
    }
}

/// Sizes of subtrees of a spanning tree. A bond outside rings is a bond of every spanning tree, so the
/// atoms beyond it are a subtree or all but one.
struct Tree {
    parent: Vec<u32>,
    size: Vec<usize>,
    /// Per atom: the atoms of its component.
    whole: Vec<usize>,
}

impl Tree {
    fn of(skeleton: &Skeleton) -> Self {
        let count = skeleton.neighbours.len();
        let mut tree = Self {
            parent: (0..count as u32).collect(),
            size: vec![1; count],
            whole: vec![0; count],
        };
        for start in 0..count as u32 {
            if tree.whole[start as usize] > 0 {
                continue;
            }
            let order = skeleton.order_from(start, |_| true);
            for &(atom, before) in order.iter().rev() {
                tree.whole[atom as usize] = order.len();
                tree.parent[atom as usize] = before;
                if atom != before {
                    tree.size[before as usize] += tree.size[atom as usize];
                }
            }
        }
        tree
    }

    /// The atoms on the far side of a bond outside rings.
    fn size_beyond(&self, atom: u32, to: u32) -> usize {
        if self.parent[to as usize] == atom {
            self.size[to as usize]
        } else {
            self.whole[atom as usize] - self.size[atom as usize]
        }
    }
}

/// The path from the last atom of a breadth-first walk back to its start, lower end first.
fn path_back(walk: &[(u32, u32)], start: u32) -> Vec<u32> {
    let before: HashMap<u32, u32> = walk.iter().copied().collect();
    let mut path = Vec::new();
    let mut atom = walk.last().map(|&(atom, _)| atom);
    while let Some(here) = atom {
        path.push(here);
        atom = before.get(&here).copied().filter(|_| here != start);
    }
    if path.first() > path.last() {
        path.reverse();
    }
    path
}
