//! The spanning tree that the text follows.

use super::structure::{Arc, Structure};

/// No atom, or no bond.
const NONE: u32 = u32::MAX;

/// A bond that is not in the tree: from the later atom to the earlier one.
#[derive(Debug, Clone, Copy)]
pub(super) struct Closure {
    pub(super) from: u32,
    pub(super) arc: Arc,
}

/// A depth-first spanning forest, so that every other bond joins an atom to one it descends from.
/// Storage that is filled anew for every form.
#[derive(Debug, Default)]
pub(super) struct Tree {
    /// The first atom of each component, in text order.
    pub(super) roots: Vec<u32>,
    pub(super) closures: Vec<Closure>,
    nodes: Vec<Node>,
}

/// An atom in the tree. All of it is in one place, as it is looked at together.
#[derive(Debug, Clone, Copy)]
struct Node {
    /// The bond to the atom before it in its chain; to [`NONE`] at a root.
    parent: Arc,
    /// Its bonds that have not been looked at.
    arcs: (u32, u32),
    /// When it was visited, or [`NONE`].
    time: u32,
    /// How many atoms hang on it, itself included.
    size: u32,
    /// The orders of its bonds together.
    order_sum: u32,
    /// The first of the atoms that follow it, or [`NONE`].
    first: u32,
    /// The next of the atoms that follow the same one, or [`NONE`].
    sibling: u32,
}

impl Node {
    fn unseen(arcs: (u32, u32)) -> Self {
        let parent = Arc {
            to: NONE,
            bond: NONE,
            order: 0,
        };
        Self {
            parent,
            arcs,
            time: NONE,
            size: 1,
            order_sum: 0,
            first: NONE,
            sibling: NONE,
        }
    }
}

impl Tree {
    /// Linear in atoms and bonds, as atoms have few neighbours: what has a canonical order has at most
    /// 511 of them.
    pub(super) fn grow(&mut self, structure: &Structure) {
        let (starts, arcs) = structure.all_arcs();
        self.roots.clear();
        self.closures.clear();
        self.nodes.clear();
        let arcs_of = starts.windows(2).map(|ends| (ends[0], ends[1]));
        self.nodes.extend(arcs_of.map(Node::unseen));
        let mut time = 0;
        for root in 0..self.nodes.len() as u32 {
            if self.nodes[root as usize].time == NONE {
                self.roots.push(root);
                self.walk(arcs, root, &mut time);
            }
        }
    }

    /// The bond to the atom before this one in its chain.
    pub(super) fn parent(&self, atom: u32) -> Option<Arc> {
        let parent = self.nodes[atom as usize].parent;
        (parent.to != NONE).then_some(parent)
    }

    /// The orders of the bonds of an atom together, as they are written.
    pub(super) fn order_sum(&self, atom: u32) -> u32 {
        self.nodes[atom as usize].order_sum
    }

    /// The atoms that follow one, smaller branches first and equal ones by number.
    pub(super) fn children(&self, atom: u32) -> impl Iterator<Item = u32> {
        let mut next = self.nodes[atom as usize].first;
        std::iter::from_fn(move || {
            let child = next;
            next = self.nodes.get(child as usize)?.sibling;
            Some(child)
        })
    }

    /// Visits a component depth first; `time` is how many atoms were visited before.
    fn walk(&mut self, arcs: &[Arc], root: u32, time: &mut u32) {
        let mut atom = root;
        self.nodes[atom as usize].time = *time;
        loop {
            let node = &mut self.nodes[atom as usize];
            if node.arcs.0 == node.arcs.1 {
                if atom == root {
                    break;
                }
                let parent = node.parent.to;
                self.add_child(parent, atom);
                atom = parent;
                continue;
            }
            let arc = arcs[node.arcs.0 as usize];
            node.arcs.0 += 1;
            node.order_sum += u32::from(arc.order);
            let (came, here) = (node.parent.bond, node.time);
            let other = &mut self.nodes[arc.to as usize];
            if other.time == NONE {
                *time += 1;
                other.time = *time;
                other.parent = Arc { to: atom, ..arc };
                atom = arc.to;
            } else if arc.bond != came && other.time < here {
                // The other way round it is met again later.
                self.closures.push(Closure { from: atom, arc });
            }
        }
        *time += 1;
    }

    /// Lists an atom, whose size is known, among those that follow its parent.
    fn add_child(&mut self, parent: u32, atom: u32) {
        let size = self.nodes[atom as usize].size;
        let above = &mut self.nodes[parent as usize];
        above.size += size;
        let mut next = above.first;
        let mut before = NONE;
        while let Some(node) = self.nodes.get(next as usize)
            && (node.size, next) < (size, atom)
        {
            (before, next) = (next, node.sibling);
        }
        self.nodes[atom as usize].sibling = next;
        match self.nodes.get_mut(before as usize) {
            Some(node) => node.sibling = atom,
            None => self.nodes[parent as usize].first = atom,
        }
    }
}
