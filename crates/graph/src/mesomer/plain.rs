//! Plain drawings: neutral, each atom with the bonds that its element has in its octet.
//!
//! Nearly all records are plain. No octet is exceeded then, nothing is open and nothing is charged, so
//! there is nothing to separate and no system to settle: the drawing is a best placement, and only
//! ring shifts are left to ask about.

use crate::{Element, skeleton::Skeleton};

use super::valence;

/// The electron pairs at an atom.
#[derive(Debug, Clone, Copy, Default)]
pub(super) struct Pairs {
    /// In all its bonds, and hydrogens.
    all: u32,
    /// In π bonds.
    pub(super) pi: u32,
}

/// Counts the electron pairs of each atom; whether the drawing is plain. One pass over the bonds and
/// one over the atoms are all that the normal form of a plain drawing costs beside its ring shifts.
pub(super) fn is_plain(skeleton: &Skeleton, pairs: &mut Vec<Pairs>) -> bool {
    pairs.clear();
    pairs.extend(skeleton.atoms.iter().map(|atom| Pairs {
        all: atom.hydrogens.into(),
        pi: 0,
    }));
    for bond in &skeleton.bonds {
        let order = u32::from(bond.pairs());
        if order > 3 {
            return false;
        }
        for atom in [bond.a, bond.b] {
            let pairs = &mut pairs[atom as usize];
            pairs.all += order;
            pairs.pi += order.saturating_sub(1);
        }
    }
    skeleton.atoms.iter().zip(&*pairs).all(|(atom, pairs)| {
        atom.charge == 0 && u32::from(VALENCES[usize::from(atom.element.number())]) == pairs.all
    })
}

/// The valence of each neutral atom that the octet model covers, and a number that no atom reaches for
/// the others; by atomic number, worked out at compile time. As long as a byte can count, so that no
/// index can be beyond it.
static VALENCES: [u8; 256] = {
    let mut valences = [u8::MAX; 256];
    let mut number = Element::HYDROGEN.number() + 1;
    while let Some(element) = Element::from_number(number) {
        if !element.is_metal() {
            valences[number as usize] = valence::neutral(element) as u8;
        }
        number += 1;
    }
    valences
};
