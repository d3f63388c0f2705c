//! Bridgeheads that determine each other.
//!
//! Two atoms joined by three disjoint paths of at least one atom each, where the two smallest of the
//! three rings so made have at most seven members, can only have both outer ligands outward: seen
//! along the same three paths their parities are opposite. Such atoms are one element for identity;
//! each keeps its own entry in output.

use crate::{Parity, skeleton::Skeleton};

use super::{Candidate, Perception};

/// The largest size of the two smaller rings.
const LARGEST_FORCED_RING: usize = 7;
/// Inner atoms of a path that can be part of such a pair: the other path of its ring has one.
const LONGEST_PATH: usize = LARGEST_FORCED_RING - 3;

/// Two bridgeheads and their three paths: the first and last inner atom of each.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(super) struct Theta {
    pub(super) ends: [u32; 2],
    paths: [[u32; 2]; 3],
}

/// Candidates that are one element: index, and whether its parity is opposite to the first one's.
#[derive(Debug, Default, Clone, PartialEq, Eq)]
pub(crate) struct Cage {
    pub(crate) members: Vec<(usize, bool)>,
}

/// A path between two possible bridgeheads.
#[derive(Debug, Clone, Copy)]
struct Path {
    end: u32,
    length: usize,
    atoms: [u32; LONGEST_PATH],
}

impl Path {
    /// The atoms between the bridgeheads.
    fn inner(&self) -> &[u32] {
        &self.atoms[..self.length]
    }
}

/// Scratch that is reused from one molecule to the next.
#[derive(Debug, Default)]
pub(super) struct Scratch {
    heads: Vec<u32>,
    paths: Vec<Path>,
    /// Atoms of the path that is being followed, each with the place of the arc to look at next.
    trail: Vec<(u32, usize)>,
    /// The pairs that were found.
    pub(super) thetas: Vec<Theta>,
    forest: Forest,
    /// Candidates by the root of their set: root, candidate, parity to the root.
    sets: Vec<(usize, usize, bool)>,
}

/// All pairs, among atoms that can be centres.
pub(super) fn find_thetas(
    skeleton: &Skeleton,
    can_be: impl Fn(u32) -> bool,
    scratch: &mut Scratch,
) {
    let Scratch {
        heads,
        paths,
        trail,
        thetas: found,
        ..
    } = scratch;
    found.clear();
    let in_ring = |&&(_, bond): &&(u32, u32)| skeleton.ring[bond as usize];
    let branching = |&atom: &u32| {
        let arcs = skeleton.arcs(atom);
        arcs.len() >= 3 && can_be(atom) && arcs.iter().filter(in_ring).count() >= 3
    };
    heads.clear();
    heads.extend((0..skeleton.len() as u32).filter(branching));
    if heads.len() < 2 {
        return;
    }
    for (at, &head) in heads.iter().enumerate() {
        find_paths(skeleton, head, &heads[at + 1..], trail, paths);
        if paths.len() < 3 {
            continue;
        }
        paths.sort_unstable_by_key(|path| (path.end, path.length, path.atoms));
        for group in paths.chunk_by(|a, b| a.end == b.end) {
            disjoint_triples(head, group, found);
        }
    }
}

/// Simple paths over ring bonds with one to [`LONGEST_PATH`] inner atoms, to atoms among `ends`,
/// which are ascending. Depth-first without recursion; the depth is bounded.
fn find_paths(
    skeleton: &Skeleton,
    head: u32,
    ends: &[u32],
    trail: &mut Vec<(u32, usize)>,
    paths: &mut Vec<Path>,
) {
    paths.clear();
    trail.clear();
    trail.push((head, 0));
    while let Some((atom, at)) = trail.last_mut() {
        let Some(&(to, bond)) = skeleton.arcs(*atom).get(*at) else {
            trail.pop();
            continue;
        };
        *at += 1;
        if !skeleton.ring[bond as usize] || trail.iter().any(|&(atom, _)| atom == to) {
            continue;
        }
        if trail.len() > 1 && ends.binary_search(&to).is_ok() {
            let mut atoms = [0; LONGEST_PATH];
            for (place, &(atom, _)) in atoms.iter_mut().zip(&trail[1..]) {
                *place = atom;
            }
            paths.push(Path {
                end: to,
                length: trail.len() - 1,
                atoms,
            });
        }
        // Cages of main-group atoms have no more than four bonds at an atom; a metal cluster is no
        // such cage, and its paths would multiply.
        if trail.len() <= LONGEST_PATH && skeleton.degree(to) <= 4 {
            trail.push((to, 0));
        }
    }
}

/// Triples of disjoint paths, shortest first, with rings small enough.
fn disjoint_triples(head: u32, paths: &[Path], found: &mut Vec<Theta>) {
    let disjoint = |a: &Path, b: &Path| a.inner().iter().all(|atom| !b.inner().contains(atom));
    for (i, a) in paths.iter().enumerate() {
        for (j, b) in paths.iter().enumerate().skip(i + 1) {
            if !disjoint(a, b) {
                continue;
            }
            for c in &paths[j + 1..] {
                // Paths come by length, so the two smallest rings are a with b and a with c.
                let ring = a.length + c.length + 2;
                if ring <= LARGEST_FORCED_RING && disjoint(a, c) && disjoint(b, c) {
                    let ends = |p: &Path| [p.atoms[0], p.atoms[p.length - 1]];
                    let paths = [ends(a), ends(b), ends(c)];
                    found.push(Theta {
                        ends: [head, a.end],
                        paths,
                    });
                }
            }
        }
    }
}

/// Joins candidates into cages and lets marked bridgeheads speak for the others. Where the marks
/// contradict what a cage can have, all count as drawn.
pub(super) fn bind(perception: &mut Perception, scratch: &mut Scratch) {
    let Scratch {
        thetas,
        forest,
        sets,
        ..
    } = scratch;
    if thetas.is_empty() {
        return;
    }
    forest.reset(perception.candidates.len());
    for theta in &*thetas {
        let [u, v] = theta.ends.map(|atom| perception.candidate_at([atom, atom]));
        let (Some(u), Some(v)) = (u, v) else { continue };
        let order = |index: usize, side: usize| {
            along_paths(
                &perception.candidates[index],
                theta.paths.map(|path| path[side]),
            )
        };
        if let (Some(first), Some(second)) = (order(u, 0), order(v, 1)) {
            forest.join(u, v, !(first ^ second));
        }
    }
    forest.list(sets);
    for set in sets.chunk_by(|a, b| a.0 == b.0) {
        // A set whose relations contradict each other binds nothing.
        if set.len() > 1 && !forest.contradictory[set[0].0] {
            let members = set.iter().map(|&(_, index, odd)| (index, odd)).collect();
            settle(perception, Cage { members });
        }
    }
}

/// Whether putting a candidate's ligands into the order path, path, path, outer one is odd.
fn along_paths(candidate: &Candidate, paths: [u32; 3]) -> Option<bool> {
    let mut order = [0usize; 4];
    let mut sum = 0;
    for (place, atom) in order.iter_mut().zip(paths) {
        *place = candidate.ligands.iter().position(|&l| l == atom)?;
        sum += *place;
    }
    order[3] = 6usize.checked_sub(sum)?;
    let mut odd = false;
    for i in 0..4 {
        for j in i + 1..4 {
            odd ^= order[i] > order[j];
        }
    }
    Some(odd)
}

fn settle(perception: &mut Perception, cage: Cage) {
    let candidates = &mut perception.candidates;
    let atoms = |candidates: &[Candidate]| -> Vec<u32> {
        cage.members
            .iter()
            .map(|&(index, _)| candidates[index].centres[0])
            .collect()
    };
    let mut implied = cage
        .members
        .iter()
        .filter_map(|&(index, opposite)| Some(candidates[index].parity?.is_odd() != opposite));
    let Some(first) = implied.next() else {
        perception.cages.push(cage);
        return;
    };
    if implied.any(|other| other != first) {
        let atoms = atoms(candidates);
        perception.impossible.push(atoms);
        return;
    }
    for &(index, opposite) in &cage.members {
        candidates[index].parity = Some(Parity::from_odd(first != opposite));
    }
    perception.cages.push(cage);
}

/// Union-find with a parity to the root.
#[derive(Debug, Default)]
struct Forest {
    parent: Vec<usize>,
    odd: Vec<bool>,
    contradictory: Vec<bool>,
}

impl Forest {
    fn reset(&mut self, count: usize) {
        self.parent.clear();
        self.parent.extend(0..count);
        for table in [&mut self.odd, &mut self.contradictory] {
            table.clear();
            table.resize(count, false);
        }
    }

    fn root(&self, mut index: usize) -> (usize, bool) {
        let mut odd = false;
        while self.parent[index] != index {
            odd ^= self.odd[index];
            index = self.parent[index];
        }
        (index, odd)
    }

    fn join(&mut self, a: usize, b: usize, odd: bool) {
        let ((a, a_odd), (b, b_odd)) = (self.root(a), self.root(b));
        let between = odd ^ a_odd ^ b_odd;
        if a == b {
            self.contradictory[a] |= between;
            return;
        }
        let (low, high) = (a.min(b), a.max(b));
        self.parent[high] = low;
        self.odd[high] = between;
        self.contradictory[low] |= self.contradictory[high];
    }

    /// Lists all members by set.
    fn list(&self, sets: &mut Vec<(usize, usize, bool)>) {
        sets.clear();
        sets.extend((0..self.parent.len()).map(|index| {
            let (root, odd) = self.root(index);
            (root, index, odd)
        }));
        sets.sort_unstable();
    }
}
