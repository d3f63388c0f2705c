//! The spanning tree that the text follows.

use super::structure::{Arc, Structure};

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
    /// Per atom: the bond to the atom before it in its chain.
    pub(super) parent: Vec<Option<Arc>>,
    pub(super) closures: Vec<Closure>,
    /// Every atom after its parent.
    visited: Vec<u32>,
    /// Per atom: when it was visited, or [`UNSEEN`].
    time: Vec<u32>,
    /// Atom and how many of its bonds have been looked at.
    stack: Vec<(u32, usize)>,
    /// Per atom: how many atoms hang on it, itself included.
    size: Vec<u32>,
    starts: Vec<u32>,
    children: Vec<Arc>,
}

const UNSEEN: u32 = u32::MAX;

impl Tree {
    /// Linear in atoms and bonds.
    pub(super) fn grow(&mut self, structure: &Structure) {
        let count = structure.len();
        self.roots.clear();
        self.closures.clear();
        self.visited.clear();
        self.stack.clear();
        self.parent.clear();
        self.parent.resize(count, None);
        self.time.clear();
        self.time.resize(count, UNSEEN);
        for root in 0..count as u32 {
            if self.time[root as usize] == UNSEEN {
                self.roots.push(root);
                self.visit(root);
                self.walk(structure);
            }
        }
        self.sort_children();
    }

    /// The bonds to the atoms that follow one, smaller branches first and equal ones by number.
    pub(super) fn children(&self, atom: u32) -> &[Arc] {
        let at = atom as usize;
        &self.children[self.starts[at] as usize..self.starts[at + 1] as usize]
    }

    fn visit(&mut self, atom: u32) {
        self.time[atom as usize] = self.visited.len() as u32;
        self.visited.push(atom);
        self.stack.push((atom, 0));
    }

    fn walk(&mut self, structure: &Structure) {
        while let Some((atom, at)) = self.stack.last_mut() {
            let atom = *atom;
            let Some(&arc) = structure.arcs(atom).get(*at) else {
                self.stack.pop();
                continue;
            };
            *at += 1;
            let came = self.parent[atom as usize].is_some_and(|back| back.bond == arc.bond);
            let time = self.time[arc.to as usize];
            if time == UNSEEN {
                self.parent[arc.to as usize] = Some(Arc { to: atom, ..arc });
                self.visit(arc.to);
            } else if !came && time < self.time[atom as usize] {
                // The other way round it is met again later.
                self.closures.push(Closure { from: atom, arc });
            }
        }
    }

    fn sort_children(&mut self) {
        let Self {
            parent,
            visited,
            size,
            starts,
            children,
            ..
        } = self;
        size.clear();
        size.resize(parent.len(), 1);
        starts.clear();
        starts.resize(parent.len() + 1, 0);
        for &atom in visited.iter().rev() {
            if let Some(arc) = parent[atom as usize] {
                size[arc.to as usize] += size[atom as usize];
                starts[arc.to as usize] += 1;
            }
        }
        let mut sum = 0;
        for start in starts.iter_mut() {
            sum += *start;
            *start = sum;
        }
        children.clear();
        children.resize(sum as usize, Arc::default());
        for &atom in visited.iter() {
            if let Some(arc) = parent[atom as usize] {
                let start = &mut starts[arc.to as usize];
                *start -= 1;
                children[*start as usize] = Arc { to: atom, ..arc };
            }
        }
        for ends in starts.windows(2) {
            let own = &mut children[ends[0] as usize..ends[1] as usize];
            if own.len() > 1 {
                own.sort_unstable_by_key(|arc| (size[arc.to as usize], arc.to));
            }
        }
    }
}
