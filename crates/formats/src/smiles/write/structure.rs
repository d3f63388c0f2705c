//! The form with the bonds of each atom at hand.

use std::cmp::Reverse;

use molkin_graph::{CanonicalForm, FormAtom};

/// A bond seen from one of its atoms.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(super) struct Arc {
    /// The atom at the other end.
    pub(super) to: u32,
    /// The bond, by its index in the form.
    pub(super) bond: u32,
    pub(super) order: u8,
}

/// Atoms and bonds. Every atom number in an [`Arc`] is that of an atom of the form: bonds that name
/// others, which no form of a molecule has, are left out.
#[derive(Debug)]
pub(super) struct Structure<'a> {
    pub(super) form: &'a CanonicalForm,
    starts: Vec<u32>,
    arcs: Vec<Arc>,
}

impl<'a> Structure<'a> {
    pub(super) fn new(form: &'a CanonicalForm) -> Self {
        let count = form.atoms.len() as u32;
        let bonds = || {
            (0u32..)
                .zip(&form.bonds)
                .filter(|&(_, &(a, b, _))| a < b && b < count)
                .flat_map(|(bond, &(a, b, order))| {
                    [(a, b), (b, a)].map(|(from, to)| (from, Arc { to, bond, order }))
                })
        };
        let mut arcs: Vec<(u32, Arc)> = bonds().collect();
        // Multiple bonds first: the tree then follows them, and rings close at single bonds.
        arcs.sort_unstable_by_key(|&(from, arc)| (from, Reverse(arc.order), arc.to, arc.bond));
        let mut starts = vec![0; form.atoms.len() + 1];
        for &(from, _) in &arcs {
            starts[from as usize + 1] += 1;
        }
        for at in 1..starts.len() {
            starts[at] += starts[at - 1];
        }
        Self {
            form,
            starts,
            arcs: arcs.into_iter().map(|(_, arc)| arc).collect(),
        }
    }

    pub(super) fn len(&self) -> usize {
        self.form.atoms.len()
    }

    pub(super) fn atom(&self, atom: u32) -> &FormAtom {
        &self.form.atoms[atom as usize]
    }

    /// The bonds of an atom, those of higher order first, then by the other atom.
    pub(super) fn arcs(&self, atom: u32) -> &[Arc] {
        let at = atom as usize;
        &self.arcs[self.starts[at] as usize..self.starts[at + 1] as usize]
    }

    /// Whether an atom lies inside a row of cumulated double bonds: two of them and nothing else.
    pub(super) fn is_cumulated(&self, atom: u32) -> bool {
        let arcs = self.arcs(atom);
        arcs.len() == 2 && self.atom(atom).hydrogens == 0 && arcs.iter().all(|arc| arc.order == 2)
    }
}
