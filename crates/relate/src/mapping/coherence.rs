//! Which of equally distant maps a chemist would take: rings and functional groups stay whole, stereo elements are kept,
//! and what is kept hangs together.

use super::{
    arrangement,
    problem::{Graph, Problem},
};

/// Less is better, in the order of the fields.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord)]
pub(super) struct Coherence {
    /// Bonds in rings, on either side, that are not kept or are laid on a bond outside rings.
    rings_cut: u32,
    /// Atoms of functional groups, on either side, that are not laid on an atom of an equal group, and bonds within groups
    /// that are not laid on a bond within an equal one.
    groups_cut: u32,
    /// Marked stereo elements of either side that are not kept.
    stereo: u32,
    /// Pieces that the kept bonds leave.
    pieces: u32,
}

impl Coherence {
    pub(super) fn of(problem: &Problem, map: &[u32]) -> Self {
        let (left, right) = (&problem.left, &problem.right);
        // A ring bond counts once for its own side; those laid on ring bonds are taken off for both.
        let mut rings_cut = left.ring_bonds() + right.ring_bonds();
        let (mut groups_cut, mut groups_kept) = (0, 0);
        let mut pieces = left.atoms() as u32;
        let mut parent: Vec<u32> = (0..pieces).collect();
        for (atom, &image) in (0..).zip(map) {
            let alike = left.group(atom) == right.group(image);
            if !alike {
                groups_cut += u32::from(left.group(atom) > 0) + u32::from(right.group(image) > 0);
            }
            for near in left.neighbours(atom).iter().filter(|near| near.atom > atom) {
                let far = map[near.atom as usize];
                if right.class_between(image, far).is_none() {
                    continue;
                }
                if left.in_ring(atom, near.atom) && right.in_ring(image, far) {
                    rings_cut -= 2;
                }
                // Bonds are counted from what is kept: the more, the fewer are cut.
                groups_kept += u32::from(
                    alike
                        && left.group(atom) > 0
                        && left.group(near.atom) > 0
                        && right.group(far) > 0,
                );
                let (first, second) = (root(&parent, atom), root(&parent, near.atom));
                if first != second {
                    parent[first.max(second) as usize] = first.min(second);
                    pieces -= 1;
                }
            }
        }
        let group_bonds = left.group_bonds() + right.group_bonds();
        Self {
            rings_cut,
            groups_cut: groups_cut + group_bonds - 2 * groups_kept,
            stereo: arrangement::disturbed(&left.stereo, &right.stereo, map),
            pieces,
        }
    }
}

fn root(parent: &[u32], atom: u32) -> u32 {
    let mut root = atom;
    while parent[root as usize] != root {
        root = parent[root as usize];
    }
    root
}

/// The bonds that lie in no ring, lower atom first, sorted: the bridges of the graph (Tarjan, Inf. Process. Lett. 2, 160
/// (1974)).
pub(super) fn bridges(graph: &Graph) -> Vec<(u32, u32)> {
    const UNSEEN: u32 = u32::MAX;
    let mut entered = vec![UNSEEN; graph.atoms()];
    let mut lowest = vec![UNSEEN; graph.atoms()];
    let mut time = 0;
    let mut bridges = Vec::new();
    for start in 0..graph.atoms() as u32 {
        if entered[start as usize] != UNSEEN {
            continue;
        }
        // Atom, the atom it was entered from, and how many of its neighbours are done.
        let mut path = vec![(start, UNSEEN, 0)];
        while let Some((atom, from, next)) = path.last_mut() {
            let (atom, from) = (*atom, *from);
            if *next == 0 {
                entered[atom as usize] = time;
                lowest[atom as usize] = time;
                time += 1;
            }
            if let Some(near) = graph.neighbours(atom).get(*next) {
                *next += 1;
                if entered[near.atom as usize] == UNSEEN {
                    path.push((near.atom, atom, 0));
                } else if near.atom != from {
                    let seen = entered[near.atom as usize];
                    lowest[atom as usize] = lowest[atom as usize].min(seen);
                }
                continue;
            }
            path.pop();
            if from != UNSEEN {
                let low = lowest[atom as usize];
                lowest[from as usize] = lowest[from as usize].min(low);
                if low > entered[from as usize] {
                    bridges.push((from.min(atom), from.max(atom)));
                }
            }
        }
    }
    bridges.sort_unstable();
    bridges
}
