//! Over-full octets become charge-separated.
//!
//! A group 15–17 atom drawn above its octet (pentavalent nitrogen, a sulfone's sulfur, a phosphine
//! oxide's phosphorus, perchlorate, iodosyl, ylides and their thio and seleno analogues) takes a
//! positive charge for each π bond in excess, and the neighbour takes the negative one.

use crate::skeleton::Skeleton;

use super::valence;

/// Rewrites charges and bond orders of the skeleton in place.
///
/// A π bond between two over-full atoms stays as drawn: giving the charge to either would let the
/// numbering decide.
pub(super) fn separate(skeleton: &mut Skeleton) {
    let over_full: Vec<bool> = (0..skeleton.len() as u32)
        .map(|atom| {
            let element = skeleton.atoms[atom as usize].element;
            valence::is_group_15_to_17(element) && excess(skeleton, atom) > 0
        })
        .collect();
    for atom in 0..skeleton.len() as u32 {
        if !over_full[atom as usize] {
            continue;
        }
        while excess(skeleton, atom) > 0 {
            let Some(bond) = pi_bond(skeleton, atom, &over_full) else {
                break;
            };
            let other = {
                let bond = &mut skeleton.bonds[bond as usize];
                bond.order -= 1;
                bond.a ^ bond.b ^ atom
            };
            let centre = &mut skeleton.atoms[atom as usize];
            centre.charge = centre.charge.saturating_add(1);
            let neighbour = &mut skeleton.atoms[other as usize];
            neighbour.charge = neighbour.charge.saturating_sub(1);
        }
    }
}

/// How far the electrons about an atom exceed its octet.
fn excess(skeleton: &Skeleton, atom: u32) -> i32 {
    let record = &skeleton.atoms[atom as usize];
    let drawn: i32 = skeleton
        .arcs(atom)
        .iter()
        .map(|&(_, bond)| i32::from(skeleton.pairs(bond)))
        .sum::<i32>()
        + i32::from(record.hydrogens);
    drawn - valence::neutral(record.element) - i32::from(record.charge)
}

/// A π bond to give up: one to a neighbour of oxygen's group if there is one. Among equals the choice
/// does not matter: where not all are given up, the centre and its neighbours are one conjugated
/// system.
fn pi_bond(skeleton: &Skeleton, atom: u32, over_full: &[bool]) -> Option<u32> {
    skeleton
        .arcs(atom)
        .iter()
        .filter(|&&(to, bond)| {
            !over_full[to as usize]
                && skeleton.pairs(bond) > 1
                && !skeleton.atoms[to as usize].element.is_metal()
        })
        .max_by_key(|&&(to, _)| valence::neutral(skeleton.atoms[to as usize].element) == 2)
        .map(|&(_, bond)| bond)
}
