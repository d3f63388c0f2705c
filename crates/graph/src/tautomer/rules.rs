//! Which carbons may bear mobile hydrogens, and which bonds mobile hydrogens may shift.
//!
//! Everything here is read off the σ skeleton alone: elements and neighbours, never bond orders or
//! hydrogens. So the answer is the same for all tautomers of a compound.

use crate::{Element, skeleton::Skeleton};

/// Oxygens, sulfurs and their like with no other neighbour.
pub(super) fn terminal_oxygens(skeleton: &Skeleton, atom: u32) -> usize {
    let arcs = skeleton.arcs(atom).iter();
    arcs.filter(|&&(to, _)| is_terminal_oxygen(skeleton, to))
        .count()
}

fn is_terminal_oxygen(skeleton: &Skeleton, atom: u32) -> bool {
    skeleton.atoms[atom as usize].element.group() == Some(16) && skeleton.degree(atom) == 1
}

/// Whether keto–enol shifts and their like may bring a hydrogen to this carbon or take one away.
///
/// Not where it bears a hydroxy or an open-chain amino group: α-hydroxy and α-amino ketones keep
/// their groups where they are, so that aldoses, ketoses and amino acids stay what they are.
pub(super) fn may_bear_mobile_hydrogen(skeleton: &Skeleton, atom: u32) -> bool {
    let arcs = || skeleton.arcs(atom).iter();
    let heavy = skeleton.degree(atom);
    (1..=3).contains(&heavy)
        && !arcs().any(|&(to, bond)| {
            is_terminal_oxygen(skeleton, to) || is_open_chain_amine(skeleton, to, bond)
        })
}

/// The largest ring that holds an amino group to its carbon.
const LARGEST_RING: u32 = 8;

/// Whether an atom is nitrogen between carbons, joined by a bond outside small rings.
fn is_open_chain_amine(skeleton: &Skeleton, atom: u32, bond: u32) -> bool {
    let carbon = |&(to, _): &(u32, u32)| skeleton.atoms[to as usize].element == Element::CARBON;
    skeleton.atoms[atom as usize].element == Element::NITROGEN
        && !in_small_ring(skeleton, bond)
        && skeleton.arcs(atom).iter().all(carbon)
}

/// Whether π bonds between two atoms take part in shifts of hydrogen wherever they are not drawn.
/// Ylide bonds from carbon to sulfur or phosphorus above its octet do not.
pub(super) fn may_shift(skeleton: &Skeleton, a: u32, b: u32) -> bool {
    let ylide = |x: u32, y: u32| {
        let heavy = &skeleton.atoms[y as usize].element;
        skeleton.atoms[x as usize].element == Element::CARBON
            && heavy.period() >= 3
            && skeleton.degree(y) >= 3
    };
    !ylide(a, b) && !ylide(b, a)
}

fn in_small_ring(skeleton: &Skeleton, bond: u32) -> bool {
    let ends = &skeleton.bonds[bond as usize];
    let mut seen = Vec::new();
    skeleton.ring[bond as usize]
        && skeleton
            .adjacency
            .smallest_ring([ends.a, ends.b], LARGEST_RING, &mut seen)
            .is_some()
}
