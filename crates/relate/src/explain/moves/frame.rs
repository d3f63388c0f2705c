//! Both records of a pair on one numbering.

use std::collections::VecDeque;

use molkin_graph::{Element, NormalAtom};

use crate::mapping::Heavy;

/// The order class of a mobile bond, as [`Heavy`] has it.
pub(super) const MOBILE: u8 = 5;

/// A bond on the common numbering, lower atom first.
pub(super) type Bond = (u32, u32);

pub(super) fn bond(a: u32, b: u32) -> Bond {
    (a.min(b), a.max(b))
}

/// Two mapped records: atom `i` of the one is atom `i` of the other. The numbers are positions in the
/// canonical order of the first, so that nothing depends on the numbering of the input.
pub(super) struct Frame {
    pub(super) graphs: [Graph; 2],
}

/// The non-hydrogen atoms and bonds of one record. Atoms come from [`Frame::new`], which numbers both
/// records alike; so every index met here is in range.
pub(super) struct Graph {
    atoms: Vec<NormalAtom>,
    near: Vec<Vec<(u32, u8)>>,
}

impl Frame {
    /// `pairs` holds for each atom of the first record its image in the second.
    pub(super) fn new([first, second]: [&Heavy; 2], pairs: &[u32]) -> Self {
        let mut inverse = vec![0; pairs.len()];
        for (at, &image) in (0..).zip(pairs) {
            inverse[image as usize] = at;
        }
        let images = pairs.iter().map(|&image| second.atoms[image as usize]);
        let renamed = second.bonds.iter().map(|&(a, b, order)| {
            let [a, b] = [a, b].map(|end| inverse[end as usize]);
            (a, b, order)
        });
        Self {
            graphs: [
                Graph::new(first.atoms.clone(), first.bonds.iter().copied()),
                Graph::new(images.collect(), renamed),
            ],
        }
    }

    /// For each atom the lowest atom that kept bonds link it to.
    pub(super) fn pieces(&self) -> Vec<u32> {
        let [first, second] = &self.graphs;
        let mut piece: Vec<Option<u32>> = vec![None; first.size()];
        for start in 0..first.size() as u32 {
            let mut open = vec![start];
            while let Some(atom) = open.pop() {
                if piece[atom as usize].is_none() {
                    piece[atom as usize] = Some(start);
                    let kept = |&to: &u32| second.order(atom, to).is_some();
                    open.extend(first.neighbours(atom).filter(kept));
                }
            }
        }
        piece.into_iter().flatten().collect()
    }

    /// The atom in the numbering of the input.
    pub(super) fn source(&self, side: usize, atom: u32) -> u32 {
        self.graphs[side].atom(atom).source
    }

    pub(super) fn sources(&self, side: usize, atoms: &[u32]) -> Vec<u32> {
        atoms.iter().map(|&atom| self.source(side, atom)).collect()
    }

    pub(super) fn source_bond(&self, side: usize, (a, b): Bond) -> Bond {
        bond(self.source(side, a), self.source(side, b))
    }
}

impl Graph {
    pub(super) fn new(atoms: Vec<NormalAtom>, bonds: impl Iterator<Item = (u32, u32, u8)>) -> Self {
        let mut near = vec![Vec::new(); atoms.len()];
        for (a, b, order) in bonds {
            near[a as usize].push((b, order));
            near[b as usize].push((a, order));
        }
        for list in &mut near {
            list.sort_unstable();
        }
        Self { atoms, near }
    }

    pub(super) fn size(&self) -> usize {
        self.atoms.len()
    }

    pub(super) fn atom(&self, atom: u32) -> &NormalAtom {
        &self.atoms[atom as usize]
    }

    pub(super) fn is_carbon(&self, atom: u32) -> bool {
        self.atom(atom).element == Element::CARBON
    }

    /// Neighbours with the order class of the bond.
    pub(super) fn near(&self, atom: u32) -> &[(u32, u8)] {
        &self.near[atom as usize]
    }

    pub(super) fn neighbours(&self, atom: u32) -> impl Iterator<Item = u32> + '_ {
        self.near(atom).iter().map(|&(to, _)| to)
    }

    /// The order class of the bond between two atoms.
    pub(super) fn order(&self, a: u32, b: u32) -> Option<u8> {
        self.near(a)
            .iter()
            .find_map(|&(to, order)| (to == b).then_some(order))
    }

    pub(super) fn is_mobile(&self, a: u32, b: u32) -> bool {
        self.order(a, b) == Some(MOBILE)
    }

    /// Bonds, lower atom first, with order class.
    pub(super) fn bonds(&self) -> impl Iterator<Item = (Bond, u8)> + '_ {
        (0..).zip(&self.near).flat_map(|(atom, near)| {
            let upward = near.iter().filter(move |&&(to, _)| to > atom);
            upward.map(move |&(to, order)| ((atom, to), order))
        })
    }

    /// The atoms on the side of `to` of the bond between the two, sorted. `None` for a bond in a ring.
    pub(super) fn beyond(&self, from: u32, to: u32) -> Option<Vec<u32>> {
        let mut seen = vec![false; self.size()];
        seen[to as usize] = true;
        let mut found = vec![to];
        let mut at = 0;
        while let Some(&atom) = found.get(at) {
            at += 1;
            for next in self.neighbours(atom) {
                if (atom, next) == (to, from) || seen[next as usize] {
                    continue;
                }
                if next == from {
                    return None;
                }
                seen[next as usize] = true;
                found.push(next);
            }
        }
        found.sort_unstable();
        Some(found)
    }

    /// A shortest path that does not use the bond between its ends, ends included.
    pub(super) fn detour(&self, from: u32, to: u32) -> Option<Vec<u32>> {
        let mut before = vec![None; self.size()];
        before[from as usize] = Some(from);
        let mut open = VecDeque::from([from]);
        while let Some(atom) = open.pop_front() {
            for next in self.neighbours(atom) {
                if before[next as usize].is_some() || (atom, next) == (from, to) {
                    continue;
                }
                before[next as usize] = Some(atom);
                open.push_back(next);
            }
        }
        let mut path = vec![to];
        let mut atom = before[to as usize]?;
        while atom != from {
            path.push(atom);
            atom = before[atom as usize]?;
        }
        path.push(from);
        path.reverse();
        Some(path)
    }

    pub(super) fn in_ring(&self, a: u32, b: u32) -> bool {
        self.detour(a, b).is_some()
    }

    /// How many bonds of an atom lie in rings.
    pub(super) fn ring_bonds(&self, atom: u32) -> usize {
        self.neighbours(atom)
            .filter(|&to| self.in_ring(atom, to))
            .count()
    }

    /// The six-membered ring of mobile bonds on which an atom lies, from that atom on; `None` where there
    /// is none, or more than one.
    pub(super) fn mobile_six_ring(&self, atom: u32) -> Option<[u32; 6]> {
        let mut rings = Vec::new();
        let mut path = vec![atom];
        self.extend_ring(&mut path, &mut rings);
        match rings.as_slice() {
            [ring] => Some(*ring),
            _ => None,
        }
    }

    /// Walks on along mobile bonds; six atoms that close are a ring, taken in one sense.
    fn extend_ring(&self, path: &mut Vec<u32>, rings: &mut Vec<[u32; 6]>) {
        let (first, last) = (path[0], path[path.len() - 1]);
        if let Ok(ring) = <[u32; 6]>::try_from(path.as_slice()) {
            if self.is_mobile(last, first) && ring[1] < ring[5] {
                rings.push(ring);
            }
            return;
        }
        for &(to, order) in self.near(last) {
            if order == MOBILE && !path.contains(&to) {
                path.push(to);
                self.extend_ring(path, rings);
                path.pop();
            }
        }
    }
}
