//! The constitution of a record as a graph with neighbours: what kinds and functional groups look at.

use molkin_graph::{Canonical, Element, NormalAtom, NormalBond, NormalForm};

use crate::Structure;

/// The normal form with its adjacency. Nothing in it depends on which mesomer was drawn.
pub(crate) struct Constitution {
    form: NormalForm,
    /// The arcs of atom `v` are `arcs[start[v]..start[v + 1]]`.
    start: Vec<u32>,
    /// Neighbour and bond.
    arcs: Vec<(u32, u32)>,
}

impl Constitution {
    pub(crate) fn of(structure: &Structure) -> Self {
        Self::of_view(structure.canonical())
    }

    /// That of a canonical view.
    pub(crate) fn of_view(canonical: &Canonical) -> Self {
        let mut form = canonical.normal_form();
        // A hydrogen bond (order 0) is no part of a constitution.
        form.bonds.retain(|bond| bond.order != Some(0));
        let mut start = vec![0; form.atoms.len() + 1];
        for bond in &form.bonds {
            start[bond.a as usize] += 1;
            start[bond.b as usize] += 1;
        }
        let mut sum = 0;
        for slot in &mut start {
            sum += *slot;
            *slot = sum;
        }
        let mut arcs = vec![(0, 0); form.bonds.len() * 2];
        for (index, bond) in (0..).zip(&form.bonds) {
            for (from, to) in [(bond.a, bond.b), (bond.b, bond.a)] {
                let slot = &mut start[from as usize];
                *slot -= 1;
                arcs[*slot as usize] = (to, index);
            }
        }
        Self { form, start, arcs }
    }

    /// Atoms, terminal hydrogens folded.
    pub(crate) fn atoms(&self) -> &[NormalAtom] {
        &self.form.atoms
    }

    pub(crate) fn bonds(&self) -> &[NormalBond] {
        &self.form.bonds
    }

    /// Neighbours of an atom, each with the index of the bond.
    pub(crate) fn arcs(&self, atom: u32) -> &[(u32, u32)] {
        let at = atom as usize;
        &self.arcs[self.start[at] as usize..self.start[at + 1] as usize]
    }

    pub(crate) fn atom(&self, atom: u32) -> &NormalAtom {
        &self.form.atoms[atom as usize]
    }

    pub(crate) fn bond(&self, bond: u32) -> &NormalBond {
        &self.form.bonds[bond as usize]
    }

    pub(crate) fn is_carbon(&self, atom: u32) -> bool {
        self.atom(atom).element == Element::CARBON
    }

    /// Positions of all atoms.
    pub(crate) fn positions(&self) -> std::ops::Range<u32> {
        0..self.form.atoms.len() as u32
    }

    /// Whether all bonds of an atom are single and fixed.
    pub(crate) fn has_single_bonds_only(&self, atom: u32) -> bool {
        let arcs = self.arcs(atom).iter();
        arcs.map(|&(_, bond)| self.bond(bond).order)
            .all(|order| order == Some(1))
    }

    /// Numbers the components of the graph that `keep` leaves of the bonds: for each atom its
    /// component, and how many there are.
    pub(crate) fn components(&self, keep: impl Fn(u32) -> bool) -> (Vec<u32>, u32) {
        const NONE: u32 = u32::MAX;
        let mut component = vec![NONE; self.atoms().len()];
        let mut count = 0;
        let mut open = Vec::new();
        for root in self.positions() {
            if component[root as usize] != NONE {
                continue;
            }
            component[root as usize] = count;
            open.push(root);
            while let Some(atom) = open.pop() {
                for &(to, bond) in self.arcs(atom) {
                    if component[to as usize] == NONE && keep(bond) {
                        component[to as usize] = count;
                        open.push(to);
                    }
                }
            }
            count += 1;
        }
        (component, count)
    }
}
