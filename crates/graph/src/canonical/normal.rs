//! The normal form, atom by atom, for callers who compare constitutions.

use crate::{
    Canonical, Element,
    mesomer::MOBILE,
    order::{Labelling, Permutation},
};

/// An atom of the normal form, terminal hydrogens folded.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub struct NormalAtom {
    /// The atom's index in the molecule.
    pub source: u32,
    /// The element.
    pub element: Element,
    /// The mass number, where given.
    pub isotope: Option<u16>,
    /// All hydrogens.
    pub hydrogens: u8,
    /// Hydrogens with mass number 1, 2 and 3, where given.
    pub labelled: [u8; 3],
    /// The charge; `None` where it differs among the best placements.
    pub charge: Option<i8>,
    /// Open valences; `None` where they differ among the best placements.
    pub open: Option<u8>,
}

/// A bond of the normal form, by positions in the list of atoms.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub struct NormalBond {
    /// One atom.
    pub a: u32,
    /// The other.
    pub b: u32,
    /// The order, 1 to 4, 6 for a coordination bond and 0 for a hydrogen bond; `None` for a mobile
    /// bond.
    pub order: Option<u8>,
    /// Whether the bond lies in a ring.
    pub in_ring: bool,
}

/// Atoms in canonical order, and bonds.
#[derive(Debug, Clone, Default, PartialEq, Eq)]
pub struct NormalForm {
    /// The atoms.
    pub atoms: Vec<NormalAtom>,
    /// The bonds, in no particular order.
    pub bonds: Vec<NormalBond>,
}

impl Canonical {
    /// The normal form: what the constitution of the record is, whatever placement was drawn.
    pub fn normal_form(&self) -> NormalForm {
        let atoms = self.written().order.iter().map(|&atom| {
            let record = &self.skeleton.atoms[atom as usize];
            let state = &self.mesomer.states[atom as usize];
            NormalAtom {
                source: record.source,
                element: record.element,
                isotope: record.isotope,
                hydrogens: record.hydrogens,
                labelled: [0, 4, 8].map(|shift| (record.labelled >> shift & 15) as u8),
                charge: (!state.mobile).then_some(state.charge),
                open: (!state.mobile).then_some(state.open),
            }
        });
        let rank = |atom: u32| self.written().rank[atom as usize];
        let bonds = self.skeleton.bonds.iter().enumerate().map(|(index, bond)| {
            let order = self.mesomer.orders[index];
            NormalBond {
                a: rank(bond.a),
                b: rank(bond.b),
                order: (order != MOBILE).then_some(order),
                in_ring: self.skeleton.ring[index],
            }
        });
        NormalForm {
            atoms: atoms.collect(),
            bonds: bonds.collect(),
        }
    }

    /// Whether an atom of the molecule is a hydrogen that counts as one of its neighbour's hydrogens.
    pub fn is_folded(&self, atom: u32) -> bool {
        self.skeleton
            .folded
            .get(atom as usize)
            .is_some_and(Option::is_some)
    }

    /// Generators of the automorphism group of the constitution with isotopes, stereo left aside. Each
    /// lists the positions in [`Canonical::normal_form`] that it moves, ascending, with their images.
    pub fn automorphisms(&self) -> Vec<Vec<(u32, u32)>> {
        let rank = |atom: u32| self.written().rank[atom as usize];
        let images = |generator: Permutation<'_>| {
            let moved = generator.moved().iter();
            let mut images: Vec<_> = moved.map(|&(from, to)| (rank(from), rank(to))).collect();
            images.sort_unstable();
            images
        };
        self.bare().generators.iter().map(images).collect()
    }

    /// For each position in [`Canonical::normal_form`] a number of its orbit: atoms that automorphisms of
    /// the constitution, isotopes and stereo left aside, relate have one number, and equal constitutions
    /// have equal numbers.
    pub fn constitution_orbits(&self) -> Vec<u32> {
        let Labelling {
            order,
            rank,
            generators,
            ..
        } = &self.constitution;
        // By canonical rank: an earlier rank of the same orbit.
        let mut earlier: Vec<u32> = (0..order.len() as u32).collect();
        let root = |earlier: &[u32], mut at: u32| {
            while earlier[at as usize] != at {
                at = earlier[at as usize];
            }
            at
        };
        for generator in generators.iter() {
            for &(from, to) in generator.moved() {
                let [a, b] = [from, to].map(|atom| root(&earlier, rank[atom as usize]));
                earlier[a.max(b) as usize] = a.min(b);
            }
        }
        let atoms = self.written().order.iter();
        atoms
            .map(|&atom| root(&earlier, rank[atom as usize]))
            .collect()
    }

    /// Positions in [`Canonical::normal_form`] in the canonical order of the constitution with
    /// isotopes: two records of one labelled constitution match position by position.
    pub fn constitution_order(&self) -> Vec<u32> {
        self.bare()
            .order
            .iter()
            .map(|&atom| self.written().rank[atom as usize])
            .collect()
    }
}
