//! Small molecules for unit tests, written as atom and bond lists.

use crate::{Atom, BondOrder, Canonical, Element, Limits, Molecule, MoleculeBuilder, Orderer};

/// Builds a molecule from `symbol charge hydrogens` words ("N+1 2" is written `("N", 1, 2)`) and
/// bonds with orders 1 to 4.
pub(crate) fn molecule(atoms: &[(&str, i8, u8)], bonds: &[(u32, u32, u8)]) -> Molecule {
    let mut builder = MoleculeBuilder::new();
    for &(symbol, charge, hydrogens) in atoms {
        let element = Element::from_symbol(symbol).unwrap();
        builder.add_atom(Atom {
            charge,
            hydrogens,
            ..Atom::new(element)
        });
    }
    for &(a, b, order) in bonds {
        builder
            .add_bond(a, b, BondOrder::from_pairs(order).unwrap())
            .unwrap();
    }
    builder.build().unwrap()
}

/// Its canonical view.
pub(crate) fn canonical(atoms: &[(&str, i8, u8)], bonds: &[(u32, u32, u8)]) -> Canonical {
    Orderer::new(Limits::default())
        .order(&molecule(atoms, bonds))
        .unwrap()
}
