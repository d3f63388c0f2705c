//! All alkanes of a size, made by the test itself.

use std::collections::BTreeMap;

use molkin_graph::{Atom, BondOrder, Element, Key, Molecule, MoleculeBuilder};

use crate::Comparer;

/// A carbon skeleton: for each atom but the first, the earlier atom that it is bonded to.
#[derive(Debug, Clone, Default)]
pub struct Tree(Vec<u32>);

impl Tree {
    /// The alkane with this skeleton.
    ///
    /// # Panics
    /// Never, since growing minds the valence.
    pub fn molecule(&self) -> Molecule {
        let mut builder = MoleculeBuilder::new();
        for atom in 0..=self.0.len() as u32 {
            builder.add_atom(Atom {
                hydrogens: 4 - self.degree(atom),
                ..Atom::new(Element::CARBON)
            });
        }
        for (atom, &earlier) in (1..).zip(&self.0) {
            builder.add_bond(earlier, atom, BondOrder::Single).unwrap();
        }
        builder.build().unwrap()
    }

    fn degree(&self, atom: u32) -> u8 {
        let later = self.0.iter().filter(|&&earlier| earlier == atom).count() as u8;
        later + u8::from(atom > 0)
    }

    fn grown(&self) -> impl Iterator<Item = Self> + '_ {
        let atoms = 0..=self.0.len() as u32;
        atoms.filter(|&atom| self.degree(atom) < 4).map(|atom| {
            let mut tree = self.clone();
            tree.0.push(atom);
            tree
        })
    }
}

/// The alkanes with 1 to `most` carbon atoms, each as the constitution keys found and a skeleton
/// for each key: one more carbon is put on every atom of every smaller one.
///
/// # Panics
/// If an alkane has no canonical order.
pub fn alkanes(most: usize) -> Vec<BTreeMap<Key, Tree>> {
    let mut comparer = Comparer::default();
    let mut key = |tree: &Tree| {
        let canonical = comparer.order(&tree.molecule()).unwrap();
        canonical.constitution_key()
    };
    let methane = Tree::default();
    let mut sizes = vec![BTreeMap::from([(key(&methane), methane)])];
    while sizes.len() < most {
        let smaller = &sizes[sizes.len() - 1];
        let grown = smaller.values().flat_map(Tree::grown);
        let next = grown.map(|tree| (key(&tree), tree)).collect();
        sizes.push(next);
    }
    sizes
}
