//! Where everything stands in the text: the spanning tree, the order of branches, ring labels.

use std::{cmp::Reverse, collections::BinaryHeap};

use super::{
    structure::{Arc, Structure},
    tree::{Closure, Tree},
};

/// The highest label that the standard has.
pub(super) const LAST_LABEL: u32 = 99;

/// One end of a ring bond, at its atom.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(super) struct RingEnd {
    /// The place of the atom.
    place: u32,
    /// Whether the label is opened here.
    pub(super) opens: bool,
    /// The order among those of the atom that open, or close: by where they close, or by label.
    rank: u32,
    pub(super) label: u32,
    /// To the other end.
    pub(super) arc: Arc,
}

/// An atom in the text, and what stands between it and the one before.
#[derive(Debug, Clone, Copy)]
pub(super) struct Word {
    pub(super) atom: u32,
    /// How many branches close before it.
    pub(super) closes: u32,
    /// Whether it begins a branch.
    pub(super) opens: bool,
}

/// The plan of the text; storage that is filled anew for every form.
#[derive(Debug, Default)]
pub(super) struct Layout {
    pub(super) highest_label: u32,
    tree: Tree,
    /// Atoms in text order.
    words: Vec<Word>,
    /// Per atom: its place among the atoms of the form in the text.
    place: Vec<u32>,
    /// Atoms to come, those that begin a branch with [`OPEN`], and [`CLOSE`] behind each branch.
    stack: Vec<u32>,
    /// Both ends of each ring bond, in text order.
    rings: Vec<RingEnd>,
    labels: Labels,
}

const OPEN: u32 = 1 << 31;
const CLOSE: u32 = u32::MAX;

impl Layout {
    pub(super) fn plan(&mut self, structure: &Structure) {
        self.tree.grow(structure);
        self.set_places(structure.len());
        self.set_labels();
    }

    /// The bond to the atom before this one in its chain.
    pub(super) fn parent(&self, atom: u32) -> Option<Arc> {
        self.tree.parent(atom)
    }

    /// The orders of the bonds of an atom together, as they are written.
    pub(super) fn order_sum(&self, atom: u32) -> u32 {
        self.tree.order_sum(atom)
    }

    /// The atoms that follow, in text order: branches, then the chain.
    pub(super) fn children(&self, atom: u32) -> impl Iterator<Item = u32> {
        self.tree.children(atom)
    }

    /// The ring bonds of an atom in the order in which their labels are written.
    pub(super) fn rings(&self, atom: u32) -> &[RingEnd] {
        let place = self.place(atom);
        let from = self.rings.partition_point(|end| end.place < place);
        let length = self.rings[from..].partition_point(|end| end.place == place);
        &self.rings[from..from + length]
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

    /// The atoms in text order, each with the ends of ring bonds that are written at it.
    pub(super) fn words(&self) -> impl Iterator<Item = (Word, &[RingEnd])> {
        let mut rings = &self.rings[..];
        (0..).zip(&self.words).map(move |(place, &word)| {
            let here = rings.iter().take_while(|end| end.place == place).count();
            let (ends, rest) = rings.split_at(here);
            rings = rest;
            (word, ends)
        })
    }

    /// Lists the atoms in text order, in which each component follows the one before.
    fn set_places(&mut self, atoms: usize) {
        let Self {
            tree,
            words,
            place,
            stack,
            ..
        } = self;
        words.clear();
        place.clear();
        place.resize(atoms, 0);
        stack.clear();
        for &root in &tree.roots {
            stack.push(root);
            let mut closes = 0;
            while let Some(next) = stack.pop() {
                if next == CLOSE {
                    closes += 1;
                    continue;
                }
                let (atom, opens) = (next & !OPEN, next & OPEN != 0);
                place[atom as usize] = words.len() as u32;
                words.push(Word {
                    atom,
                    closes,
                    opens,
                });
                closes = 0;
                let from = stack.len();
                let mut children = tree.children(atom).peekable();
                while let Some(child) = children.next() {
                    if children.peek().is_some() {
                        stack.extend([child | OPEN, CLOSE]);
                    } else {
                        stack.push(child);
                    }
                }
                if stack.len() > from + 1 {
                    stack[from..].reverse();
                }
            }
        }
    }

    /// Gives each ring bond the lowest label that is free where it opens. At an atom the labels that
    /// close come first; they are free again only after those that open there, so that no atom has
    /// the same label twice.
    fn set_labels(&mut self) {
        let Self {
            tree,
            place,
            rings,
            labels,
            ..
        } = self;
        rings.clear();
        labels.clear();
        let places =
            |&Closure { from, arc }: &Closure| (place[arc.to as usize], place[from as usize]);
        tree.closures.sort_unstable_by_key(places);
        for closure in &tree.closures {
            let Closure { from, arc } = *closure;
            let (opening, closing) = places(closure);
            let label = labels.take(opening, closing);
            rings.push(RingEnd {
                place: opening,
                opens: true,
                rank: closing,
                label,
                arc: Arc { to: from, ..arc },
            });
            rings.push(RingEnd {
                place: closing,
                opens: false,
                rank: label,
                label,
                arc,
            });
        }
        rings.sort_unstable_by_key(|end| (end.place, end.opens, end.rank));
        self.highest_label = self.labels.highest;
    }
}

/// Ring labels from 1.
#[derive(Debug, Default)]
struct Labels {
    free: BinaryHeap<Reverse<u32>>,
    /// Where each label that is taken becomes free.
    open: BinaryHeap<Reverse<(u32, u32)>>,
    highest: u32,
}

impl Labels {
    fn clear(&mut self) {
        self.free.clear();
        self.open.clear();
        self.highest = 0;
    }

    /// The lowest label that is free at a place, which is not before that of the last call; it is taken
    /// up to another place.
    fn take(&mut self, opening: u32, closing: u32) -> u32 {
        while let Some(&Reverse((closed, label))) = self.open.peek()
            && closed < opening
        {
            self.open.pop();
            self.free.push(Reverse(label));
        }
        let label = match self.free.pop() {
            Some(Reverse(label)) => label,
            None => {
                self.highest += 1;
                self.highest
            }
        };
        self.open.push(Reverse((closing, label)));
        label
    }
}
