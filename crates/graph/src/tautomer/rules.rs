//! Which carbons may bear mobile hydrogens, and which bonds mobile hydrogens may shift.
//!
//! Everything here is read off the σ skeleton alone: elements and neighbours, never bond orders or
//! hydrogens. So the answer is the same for all tautomers of a compound.

use crate::{
    Element,
    skeleton::{Skeleton, SkeletonBond},
};

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
///
/// Ylide bonds from carbon to sulfur or phosphorus above its octet do not, nor do bonds from carbon to a
/// carboxylic acid, ester or amide group outside rings: these have no enols on paper.
pub(super) fn may_shift(skeleton: &Skeleton, bond: u32) -> bool {
    let SkeletonBond { a, b, .. } = skeleton.bonds[bond as usize];
    let carbons = [a, b]
        .iter()
        .all(|&atom| skeleton.atoms[atom as usize].element == Element::CARBON);
    let acyl = carbons && (is_acyl(skeleton, a) || is_acyl(skeleton, b));
    let ylide = |x: u32, y: u32| {
        let heavy = &skeleton.atoms[y as usize].element;
        skeleton.atoms[x as usize].element == Element::CARBON
            && heavy.period() >= 3
            && skeleton.degree(y) >= 3
    };
    !ylide(a, b) && !ylide(b, a) && (!acyl || skeleton.ring[bond as usize])
}

/// Carbon with an oxygen that has no other neighbour, and another nitrogen or oxygen.
fn is_acyl(skeleton: &Skeleton, atom: u32) -> bool {
    let elements = || {
        let arcs = skeleton.arcs(atom).iter();
        arcs.map(|&(to, _)| (skeleton.atoms[to as usize].element, skeleton.degree(to)))
    };
    let hetero = elements().filter(|(e, _)| [Element::NITROGEN, Element::OXYGEN].contains(e));
    elements().any(|(e, degree)| e == Element::OXYGEN && degree == 1) && hetero.count() >= 2
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
