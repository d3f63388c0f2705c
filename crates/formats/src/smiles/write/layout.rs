//! Where everything stands in the text: the spanning tree, the order of branches, ring labels.

use std::{cmp::Reverse, collections::BinaryHeap, ops::Range};

use super::{
    structure::{Arc, Structure},
    tree::{Closure, Tree},
};

/// The highest label that the standard has.
pub(super) const LAST_LABEL: u32 = 99;

/// One end of a ring bond, at its atom.
#[derive(Debug, Clone, Copy, Default, PartialEq, Eq)]
pub(super) struct RingEnd {
    /// To the other end.
    pub(super) arc: Arc,
    /// Whether the label is opened here.
    pub(super) opens: bool,
    pub(super) label: u32,
    /// Index of the bond among ring bonds.
    closure: u32,
}

/// The plan of the text; storage that is filled anew for every form.
#[derive(Debug, Default)]
pub(super) struct Layout {
    pub(super) highest_label: u32,
    tree: Tree,
    /// Atoms in text order.
    sequence: Vec<u32>,
    /// Per atom: its place among the atoms of the form in the text.
    place: Vec<u32>,
    stack: Vec<u32>,
    /// Per atom: where its ring bonds begin.
    ring_starts: Vec<u32>,
    /// By atom: ring bonds in written order.
    rings: Vec<RingEnd>,
    /// Per ring bond: its label.
    given: Vec<u32>,
    labels: Labels,
}

impl Layout {
    pub(super) fn plan(&mut self, structure: &Structure) {
        self.tree.grow(structure);
        self.set_places();
        self.highest_label = 0;
        self.ring_starts.clear();
        self.rings.clear();
        if !self.tree.closures.is_empty() {
            self.collect_rings();
            self.set_labels();
        }
    }

    /// The bond to the atom before this one in its chain.
    pub(super) fn parent(&self, atom: u32) -> Option<Arc> {
        self.tree.parent[atom as usize]
    }

    /// The bonds to the atoms that follow, in text order: branches, then the chain.
    pub(super) fn children(&self, atom: u32) -> &[Arc] {
        self.tree.children(atom)
    }

    /// The ring bonds of an atom in the order in which their labels are written.
    pub(super) fn rings(&self, atom: u32) -> &[RingEnd] {
        &self.rings[self.ring_range(atom)]
    }

    fn ring_range(&self, atom: u32) -> Range<usize> {
        let at = atom as usize;
        match self.ring_starts.get(at..at + 2) {
            Some(&[start, end]) => start as usize..end as usize,
            _ => 0..0,
        }
    }

    /// The place of an atom in the text, from 0.
    pub(super) fn place(&self, atom: u32) -> u32 {
        self.place[atom as usize]
    }

    /// Whether a bond between these two atoms is a ring bond.
    pub(super) fn is_ring_bond(&self, ends: [u32; 2], bond: u32) -> bool {
        ends.iter()
            .all(|&atom| self.parent(atom).is_none_or(|arc| arc.bond != bond))
    }

    /// The first atom of each component, in text order.
    pub(super) fn roots(&self) -> &[u32] {
        &self.tree.roots
    }

    /// Numbers the atoms in text order.
    fn set_places(&mut self) {
        let Self {
            tree,
            sequence,
            place,
            stack,
            ..
        } = self;
        sequence.clear();
        place.clear();
        place.resize(tree.parent.len(), 0);
        stack.clear();
        stack.extend(tree.roots.iter().rev());
        while let Some(atom) = stack.pop() {
            place[atom as usize] = sequence.len() as u32;
            sequence.push(atom);
            stack.extend(tree.children(atom).iter().rev().map(|arc| arc.to));
        }
    }

    /// Lists both ends of each ring bond by atom, by counting.
    fn collect_rings(&mut self) {
        let Self {
            tree,
            ring_starts,
            rings,
            ..
        } = self;
        let ends = |&Closure { from, arc }: &Closure| {
            let back = Arc { to: from, ..arc };
            [(arc.to, back, true), (from, arc, false)]
        };
        ring_starts.resize(tree.parent.len() + 1, 0);
        for (atom, ..) in tree.closures.iter().flat_map(ends) {
            ring_starts[atom as usize] += 1;
        }
        let mut sum = 0;
        for start in ring_starts.iter_mut() {
            sum += *start;
            *start = sum;
        }
        rings.resize(sum as usize, RingEnd::default());
        for (closure, ring) in (0..).zip(&tree.closures) {
            for (atom, arc, opens) in ends(ring) {
                let start = &mut ring_starts[atom as usize];
                *start -= 1;
                rings[*start as usize] = RingEnd {
                    arc,
                    opens,
                    label: 0,
                    closure,
                };
            }
        }
    }

    /// Gives each ring bond the lowest label that is free where it opens. At an atom the labels that
    /// close come first; they are free again only after those that open there, so that no atom has
    /// the same label twice.
    fn set_labels(&mut self) {
        self.given.clear();
        self.given.resize(self.tree.closures.len(), 0);
        self.labels.clear();
        for at in 0..self.sequence.len() {
            let range = self.ring_range(self.sequence[at]);
            let Self {
                place,
                given,
                labels,
                ..
            } = self;
            let ends = &mut self.rings[range];
            ends.sort_unstable_by_key(|end| {
                let within = if end.opens {
                    place[end.arc.to as usize]
                } else {
                    given[end.closure as usize]
                };
                (end.opens, within)
            });
            for end in ends.iter_mut() {
                let label = &mut given[end.closure as usize];
                if end.opens {
                    *label = labels.take();
                }
                end.label = *label;
            }
            ends.iter()
                .filter(|end| !end.opens)
                .for_each(|end| labels.put_back(end.label));
        }
        self.highest_label = self.labels.highest;
    }
}

/// Ring labels from 1.
#[derive(Debug, Default)]
struct Labels {
    free: BinaryHeap<Reverse<u32>>,
    highest: u32,
}

impl Labels {
    fn clear(&mut self) {
        self.free.clear();
        self.highest = 0;
    }

    fn take(&mut self) -> u32 {
        self.free.pop().map_or_else(
            || {
                self.highest += 1;
                self.highest
            },
            |Reverse(label)| label,
        )
    }

    fn put_back(&mut self, label: u32) {
        self.free.push(Reverse(label));
    }
}
