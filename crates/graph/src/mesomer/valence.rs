//! What valence leaves open at each atom: room for π bonds, charges and radicals.

use crate::{Element, skeleton::Skeleton};

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
pub(crate) fn neutral(element: Element) -> i32 {
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

/// Fills the table.
///
/// An atom whose drawn π bonds do not fit the model drops out, and its bonds then count in full at
/// its neighbours; so the table is made again until no further atom drops out.
pub(crate) fn load(table: &mut Vec<Valence>, skeleton: &Skeleton) {
    let mut open: Vec<Option<u8>> = (0..skeleton.len() as u32)
        .map(|atom| open_valence(skeleton, atom))
        .collect();
    loop {
        table.clear();
        let mut dropped = false;
        for atom in 0..skeleton.len() as u32 {
            let valence = open[atom as usize].and_then(|left| room(skeleton, &open, atom, left));
            if valence.is_none() && open[atom as usize].is_some() {
                open[atom as usize] = None;
                dropped = true;
            }
            table.push(valence.unwrap_or_default());
        }
        if !dropped {
            return;
        }
    }
}

/// Open valences of an atom as drawn, if the octet model covers it.
fn open_valence(skeleton: &Skeleton, atom: u32) -> Option<u8> {
    let record = &skeleton.atoms[atom as usize];
    if record.element.is_metal() || record.element == Element::HYDROGEN {
        return None;
    }
    let mut drawn = i32::from(record.hydrogens);
    for &(_, bond) in skeleton.arcs(atom) {
        let order = skeleton.pairs(bond);
        if order > 3 {
            return None;
        }
        drawn += i32::from(order);
    }
    u8::try_from(charged(record.element, i32::from(record.charge)) - drawn).ok()
}

/// The room at an atom; `None` if what is drawn does not fit in it.
fn room(skeleton: &Skeleton, covered: &[Option<u8>], atom: u32, open: u8) -> Option<Valence> {
    let record = &skeleton.atoms[atom as usize];
    let mut sigma = i32::from(record.hydrogens);
    let mut pi_drawn = 0;
    for &(to, bond) in skeleton.arcs(atom) {
        let order = i32::from(skeleton.pairs(bond));
        if order > 0 && covered[to as usize].is_some() {
            sigma += 1;
            pi_drawn += order - 1;
        } else {
            sigma += order;
        }
    }
    let left = neutral(record.element) - sigma;
    let pi = left.clamp(0, 2);
    let hetero = is_group_15_to_17(record.element);
    // Four pairs are an octet. Centres below the second row may take a π bond beyond the charge that
    // their σ bonds enforce (sulfur trioxide).
    let octet_room = (4 - sigma).clamp(0, 2) > pi;
    let onium = hetero && octet_room && (left >= 0 || (left == -1 && record.element.period() >= 3));
    let outside = pi_drawn > pi + i32::from(onium) + i32::from(record.element == Element::BORON)
        || (record.element == Element::BORON && (record.charge > 0 || sigma > 3));
    (!outside).then_some(Valence {
        pi: pi as u8,
        spare: (left - pi).max(0) as u8,
        onium,
        intrinsic: if hetero { (-left).clamp(0, 4) as i8 } else { 0 },
        open,
        can_be_negative: record.element != Element::BORON,
        can_be_positive: !hetero,
        acceptor: record.element == Element::BORON,
        hetero,
    })
}
