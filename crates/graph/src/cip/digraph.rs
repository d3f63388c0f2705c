//! The hierarchical digraph: the tree of all paths from a root, with duplicates (P-92.1.4).

use super::{
    Label,
    atoms::{Atoms, Substance},
    budget::{Budget, Exhausted},
};

/// No node, or no atom.
pub(super) const NONE: u32 = u32::MAX;

/// What a node stands for.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(super) enum Kind {
    /// An atom.
    Atom,
    /// A hydrogen of its atom, of this mass number or natural.
    Hydrogen(u8),
    /// The duplicate that ends a path which meets itself.
    RingClosure,
    /// A duplicate for a multiple bond, averaged or not.
    MultipleBond,
}

/// A node.
#[derive(Debug, Clone)]
pub(super) struct Node {
    pub(super) kind: Kind,
    /// The atom it stands for or duplicates.
    pub(super) atom: u32,
    pub(super) parent: u32,
    /// Bonds between the node and the root.
    pub(super) sphere: u32,
    /// Root distance for Rule 1b.
    pub(super) distance: u32,
    pub(super) substance: Substance,
    /// First child and number of children, once they are made.
    children: Option<(u32, u32)>,
    /// Auxiliary descriptors: of the centre or axis, and of the double bond, that begins here.
    pub(super) labels: [Option<Label>; 2],
}

impl Node {
    /// Of the descriptors that reflection changes, whether it is R or one that goes with R.
    pub(super) fn handedness(&self) -> Option<bool> {
        self.labels
            .iter()
            .flatten()
            .find_map(|label| label.handedness())
    }
}

/// The nodes that have been made so far. The tree grows as far as it is asked for.
#[derive(Debug)]
pub(super) struct Digraph<'a> {
    atoms: &'a Atoms,
    nodes: Vec<Node>,
}

impl<'a> Digraph<'a> {
    /// The root of the tree of an atom.
    pub(super) const ROOT: u32 = 0;

    pub(super) fn new(atoms: &'a Atoms, root: u32) -> Self {
        let mut digraph = Self {
            atoms,
            nodes: Vec::with_capacity(32),
        };
        digraph.push(Kind::Atom, root, NONE, atoms.substance(root));
        digraph
    }

    pub(super) fn node(&self, node: u32) -> &Node {
        &self.nodes[node as usize]
    }

    pub(super) fn node_mut(&mut self, node: u32) -> &mut Node {
        &mut self.nodes[node as usize]
    }

    /// The children of a node, made on first demand.
    pub(super) fn children(
        &mut self,
        node: u32,
        budget: &mut Budget<'_>,
    ) -> Result<std::ops::Range<u32>, Exhausted> {
        if let Some((first, count)) = self.node(node).children {
            return Ok(first..first + count);
        }
        let first = self.nodes.len() as u32;
        if self.node(node).kind == Kind::Atom {
            self.expand(node, budget)?;
        }
        let count = self.nodes.len() as u32 - first;
        budget.spend(count as usize)?;
        self.node_mut(node).children = Some((first, count));
        Ok(first..first + count)
    }

    fn expand(&mut self, node: u32, budget: &mut Budget<'_>) -> Result<(), Exhausted> {
        let Node {
            atom,
            parent,
            sphere,
            ..
        } = *self.node(node);
        let from = match parent {
            NONE => NONE,
            parent => self.node(parent).atom,
        };
        let atoms = self.atoms;
        for index in atoms.arcs(atom) {
            let arc = atoms.arc(index);
            if arc.to != from {
                // Only over ring bonds can a path meet itself. Eight links of it are about one step.
                if arc.in_ring {
                    budget.spend(sphere as usize / 8)?;
                }
                if arc.in_ring && self.is_on_path(arc.to, node) {
                    self.push(Kind::RingClosure, arc.to, node, atoms.duplicate(arc.to));
                } else {
                    self.push(Kind::Atom, arc.to, node, atoms.substance(arc.to));
                }
            }
            for _ in 0..arc.duplicates {
                let substance = atoms.duplicate(arc.to);
                self.push(Kind::MultipleBond, arc.to, node, substance);
            }
        }
        if let Some(averaged) = atoms.averaged(atom) {
            for _ in 0..averaged.count {
                self.push(Kind::MultipleBond, NONE, node, averaged.substance);
            }
        }
        for (mass, count) in (0u8..).zip(atoms.hydrogens(atom)) {
            for _ in 0..count {
                let substance = Substance::hydrogen(mass);
                self.push(Kind::Hydrogen(mass), NONE, node, substance);
            }
        }
        Ok(())
    }

    fn push(&mut self, kind: Kind, atom: u32, parent: u32, substance: Substance) {
        let sphere = match parent {
            NONE => 0,
            parent => self.node(parent).sphere + 1,
        };
        // Rule 1b as amended by Hanson et al. 2018: a ring closure has the sphere of the atom that it
        // duplicates, a duplicate for a multiple bond that of the atom it hangs on.
        let distance = match kind {
            Kind::RingClosure => self.sphere_on_path(atom, parent),
            Kind::MultipleBond => sphere - 1,
            Kind::Atom | Kind::Hydrogen(_) => 0,
        };
        self.nodes.push(Node {
            kind,
            atom,
            parent,
            sphere,
            distance,
            substance,
            children: None,
            labels: [None; 2],
        });
    }

    /// The nodes from a node up to the root.
    fn path(&self, node: u32) -> impl Iterator<Item = &Node> {
        let up = |&node: &u32| Some(self.node(node).parent).filter(|&parent| parent != NONE);
        std::iter::successors(Some(node), up).map(|node| self.node(node))
    }

    fn is_on_path(&self, atom: u32, node: u32) -> bool {
        self.path(node).any(|on_path| on_path.atom == atom)
    }

    fn sphere_on_path(&self, atom: u32, node: u32) -> u32 {
        let original = self.path(node).find(|on_path| on_path.atom == atom);
        original.map_or(0, |original| original.sphere)
    }
}
