//! What valence leaves open at each atom: room for π bonds, charges and radicals.

use crate::{
    Element,
    skeleton::{Skeleton, SkeletonAtom},
};

/// The room at one atom. Atoms outside the model keep what is drawn and have no room.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Default)]
pub(crate) struct Valence {
    /// π bonds possible with the charge that the σ skeleton alone gives.
    pub(crate) pi: u8,
    /// Further open valences of the σ skeleton that no π bond can use.
    pub(crate) spare: u8,
    /// Whether one more π bond is possible at the price of a positive charge.
    pub(crate) onium: bool,
    /// Charge that the σ skeleton alone enforces (an ammonium nitrogen).
    pub(crate) intrinsic: i8,
    /// Open valences in the drawing.
    pub(crate) open: u8,
    /// Whether the atom can carry a negative charge in place of an open valence.
    pub(crate) can_be_negative: bool,
    /// Whether it can carry a positive charge in place of an open valence.
    pub(crate) can_be_positive: bool,
    /// A boron atom with an empty orbital, or drawn with a negative charge in its place: it joins what
    /// it is bonded to into one conjugated system, however the charge is drawn.
    pub(crate) acceptor: bool,
    /// Group 15 to 17.
    pub(crate) hetero: bool,
}

impl Valence {
    /// Whether the atom can be part of a conjugated system.
    pub(crate) fn has_room(&self) -> bool {
        self.pi > 0 || self.spare > 0 || self.onium || self.acceptor
    }
}

/// Nitrogen, oxygen and fluorine groups.
pub(crate) fn is_group_15_to_17(element: Element) -> bool {
    !element.is_metal() && matches!(element.group(), Some(15..=17))
}

/// The valence of the neutral atom in its octet.
pub(crate) const fn neutral(element: Element) -> i32 {
    match element.group() {
        Some(13) => 3,
        Some(14) => 4,
        Some(15) => 3,
        Some(16) => 2,
        _ => 1,
    }
}

/// The valence of an atom with a charge.
pub(super) fn charged(element: Element, charge: i32) -> i32 {
    match element.group() {
        Some(13) => 3 - charge,
        Some(14) => 4 - charge.abs(),
        // Lone pairs become bonds as charge rises, until the electrons run out.
        _ => (neutral(element) + charge).min(8 - neutral(element) - charge),
    }
}

/// What is drawn at an atom.
#[derive(Debug, Clone, Copy, Default)]
pub(super) struct Drawn {
    /// Open valences; `None` where the octet model does not cover the atom.
    open: Option<u8>,
    /// Hydrogens and the electron pairs of all bonds.
    pairs: i32,
    /// A bond of order 4, of which the model knows nothing.
    quadruple: bool,
    /// Hydrogens, one for each bond to a covered atom, and bonds to others in full.
    sigma: i32,
}

/// Fills the table.
///
/// An atom whose drawn π bonds do not fit the model drops out, and its bonds then count in full at
/// its neighbours; so the table is made again until no further atom drops out. `drawn` is scratch.
pub(super) fn load(table: &mut Vec<Valence>, drawn: &mut Vec<Drawn>, skeleton: &Skeleton) {
    count_pairs(drawn, skeleton);
    for (drawn, atom) in drawn.iter_mut().zip(&skeleton.atoms) {
        drawn.open = open_valence(atom, drawn);
    }
    loop {
        count_sigma(drawn, skeleton);
        table.clear();
        let mut dropped = false;
        for (drawn, atom) in drawn.iter_mut().zip(&skeleton.atoms) {
            let valence = drawn.open.and_then(|open| room(atom, drawn, open));
            if valence.is_none() {
                dropped |= drawn.open.take().is_some();
            }
            table.push(valence.unwrap_or_default());
        }
        if !dropped {
            return;
        }
    }
}

fn count_pairs(drawn: &mut Vec<Drawn>, skeleton: &Skeleton) {
    drawn.clear();
    drawn.extend(skeleton.atoms.iter().map(|atom| Drawn {
        pairs: atom.hydrogens.into(),
        ..Drawn::default()
    }));
    for bond in &skeleton.bonds {
        for atom in [bond.a, bond.b] {
            let drawn = &mut drawn[atom as usize];
            drawn.pairs += i32::from(bond.pairs());
            drawn.quadruple |= bond.order == 4;
        }
    }
}

fn count_sigma(drawn: &mut [Drawn], skeleton: &Skeleton) {
    for (drawn, atom) in drawn.iter_mut().zip(&skeleton.atoms) {
        drawn.sigma = atom.hydrogens.into();
    }
    for bond in &skeleton.bonds {
        let pairs = i32::from(bond.pairs());
        for (atom, other) in [(bond.a, bond.b), (bond.b, bond.a)] {
            let covered = drawn[other as usize].open.is_some();
            drawn[atom as usize].sigma += if covered { pairs.min(1) } else { pairs };
        }
    }
}

/// Open valences of an atom as drawn, if the octet model covers it.
fn open_valence(atom: &SkeletonAtom, drawn: &Drawn) -> Option<u8> {
    if atom.element.is_metal() || atom.element == Element::HYDROGEN || drawn.quadruple {
        return None;
    }
    u8::try_from(charged(atom.element, atom.charge.into()) - drawn.pairs).ok()
}

/// The room at an atom; `None` if what is drawn does not fit in it.
fn room(atom: &SkeletonAtom, drawn: &Drawn, open: u8) -> Option<Valence> {
    let sigma = drawn.sigma;
    let pi_drawn = drawn.pairs - sigma;
    let left = neutral(atom.element) - sigma;
    let pi = left.clamp(0, 2);
    let hetero = is_group_15_to_17(atom.element);
    let boron = atom.element == Element::BORON;
    // Four pairs are an octet. Centres below the second row may take a π bond beyond the charge that
    // their σ bonds enforce (sulfur trioxide).
    let octet_room = (4 - sigma).clamp(0, 2) > pi;
    let onium = hetero && octet_room && (left >= 0 || (left == -1 && atom.element.period() >= 3));
    let outside = pi_drawn > pi + i32::from(onium) + i32::from(boron)
        || (boron && (atom.charge > 0 || sigma > 3));
    (!outside).then_some(Valence {
        pi: pi as u8,
        spare: (left - pi).max(0) as u8,
        onium,
        intrinsic: if hetero { (-left).clamp(0, 4) as i8 } else { 0 },
        open,
        can_be_negative: !boron,
        can_be_positive: !hetero && !boron,
        acceptor: boron,
        hetero,
    })
}
