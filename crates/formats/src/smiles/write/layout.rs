//! Where everything stands in the text: the spanning tree, the order of branches, ring labels.

use std::{cmp::Reverse, collections::BinaryHeap};

use super::structure::{Arc, Structure};

/// The highest label that the standard has.
pub(super) const LAST_LABEL: u32 = 99;

/// One end of a ring bond, at its atom.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(super) struct RingEnd {
    /// To the other end.
    pub(super) arc: Arc,
    /// Whether the label is opened here.
    pub(super) opens: bool,
    pub(super) label: u32,
    /// Index of the bond among ring bonds.
    closure: u32,
}

/// The plan of the text.
#[derive(Debug)]
pub(super) struct Layout {
    /// The first atom of each component, in text order.
    pub(super) roots: Vec<u32>,
    pub(super) highest_label: u32,
    /// Per atom: the bond to the atom before it in its chain.
    parent: Vec<Option<Arc>>,
    /// Per atom: its place among the atoms of the form in the text.
    place: Vec<u32>,
    starts: Vec<u32>,
    children: Vec<Arc>,
    /// Per atom: its ring bonds in written order.
    rings: Vec<Vec<RingEnd>>,
}

impl Layout {
    pub(super) fn new(structure: &Structure) -> Self {
        let tree = Tree::new(structure);
        let (starts, children) = children(&tree);
        let mut layout = Self {
            roots: tree.roots,
            highest_label: 0,
            parent: tree.parent,
            place: vec![0; structure.len()],
            starts,
            children,
            rings: vec![Vec::new(); structure.len()],
        };
        let sequence = layout.set_places();
        layout.set_rings(&sequence, &tree.closures);
        layout
    }

    /// The bond to the atom before this one in its chain.
    pub(super) fn parent(&self, atom: u32) -> Option<Arc> {
        self.parent[atom as usize]
    }

    /// The bonds to the atoms that follow, in text order: branches, then the chain.
    pub(super) fn children(&self, atom: u32) -> &[Arc] {
        let at = atom as usize;
        &self.children[self.starts[at] as usize..self.starts[at + 1] as usize]
    }

    /// The ring bonds of an atom in the order in which their labels are written.
    pub(super) fn rings(&self, atom: u32) -> &[RingEnd] {
        &self.rings[atom as usize]
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

    /// Numbers the atoms in text order and returns them in it.
    fn set_places(&mut self) -> Vec<u32> {
        let mut sequence = Vec::with_capacity(self.place.len());
        let mut stack: Vec<u32> = self.roots.iter().rev().copied().collect();
        while let Some(atom) = stack.pop() {
            self.place[atom as usize] = sequence.len() as u32;
            sequence.push(atom);
            stack.extend(self.children(atom).iter().rev().map(|arc| arc.to));
        }
        sequence
    }

    /// Gives each ring bond the lowest label that is free where it opens. At an atom the labels that
    /// close come first; they are free again only after those that open there, so that no atom has
    /// the same label twice.
    fn set_rings(&mut self, sequence: &[u32], closures: &[Closure]) {
        for (closure, &Closure { from, arc }) in (0..).zip(closures) {
            let back = Arc { to: from, ..arc };
            for (atom, arc, opens) in [(arc.to, back, true), (from, arc, false)] {
                self.rings[atom as usize].push(RingEnd {
                    arc,
                    opens,
                    label: 0,
                    closure,
                });
            }
        }
        let mut labels = Labels::default();
        let mut given = vec![0; closures.len()];
        for &atom in sequence {
            let place = &self.place;
            let ends = &mut self.rings[atom as usize];
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
        self.highest_label = labels.highest;
    }
}

/// A bond that is not in the tree: from the later atom to the earlier one.
#[derive(Debug, Clone, Copy)]
struct Closure {
    from: u32,
    arc: Arc,
}

/// A depth-first spanning forest, so that every other bond joins an atom to one it descends from.
#[derive(Debug, Default)]
struct Tree {
    roots: Vec<u32>,
    parent: Vec<Option<Arc>>,
    /// Every atom after its parent.
    visited: Vec<u32>,
    closures: Vec<Closure>,
}

impl Tree {
    fn new(structure: &Structure) -> Self {
        let mut tree = Self {
            parent: vec![None; structure.len()],
            ..Self::default()
        };
        let mut seen = vec![false; structure.len()];
        let mut used = vec![false; structure.form.bonds.len()];
        // Atom and how many of its bonds have been looked at.
        let mut stack: Vec<(u32, usize)> = Vec::new();
        for root in 0..structure.len() as u32 {
            if seen[root as usize] {
                continue;
            }
            tree.roots.push(root);
            let mut next = Some(root);
            loop {
                if let Some(atom) = next.take() {
                    seen[atom as usize] = true;
                    tree.visited.push(atom);
                    stack.push((atom, 0));
                }
                let Some((atom, at)) = stack.last_mut() else {
                    break;
                };
                let atom = *atom;
                let Some(&arc) = structure.arcs(atom).get(*at) else {
                    stack.pop();
                    continue;
                };
                *at += 1;
                if std::mem::replace(&mut used[arc.bond as usize], true) {
                    continue;
                }
                if seen[arc.to as usize] {
                    tree.closures.push(Closure { from: atom, arc });
                } else {
                    tree.parent[arc.to as usize] = Some(Arc { to: atom, ..arc });
                    next = Some(arc.to);
                }
            }
        }
        tree
    }
}

/// The bonds to children by atom, smaller branches first and equal ones by number.
fn children(tree: &Tree) -> (Vec<u32>, Vec<Arc>) {
    let mut size = vec![1u32; tree.parent.len()];
    let mut starts = vec![0u32; tree.parent.len() + 1];
    let mut found: Vec<(u32, Arc)> = Vec::new();
    for &atom in tree.visited.iter().rev() {
        if let Some(arc) = tree.parent[atom as usize] {
            size[arc.to as usize] += size[atom as usize];
            starts[arc.to as usize + 1] += 1;
            found.push((arc.to, Arc { to: atom, ..arc }));
        }
    }
    for at in 1..starts.len() {
        starts[at] += starts[at - 1];
    }
    found.sort_unstable_by_key(|&(parent, arc)| (parent, size[arc.to as usize], arc.to));
    (starts, found.into_iter().map(|(_, arc)| arc).collect())
}

/// Ring labels from 1.
#[derive(Debug, Default)]
struct Labels {
    free: BinaryHeap<Reverse<u32>>,
    highest: u32,
}

impl Labels {
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
