//! Over-full octets become charge-separated.
//!
//! A group 15–17 atom drawn above its octet (pentavalent nitrogen, a sulfone's sulfur, a phosphine
//! oxide's phosphorus, perchlorate, iodosyl, ylides and their thio and seleno analogues) takes a
//! positive charge for each π bond in excess, and the neighbour takes the negative one.

use crate::skeleton::Skeleton;

use super::valence;

/// Scratch that is reused from one molecule to the next.
#[derive(Debug, Default)]
pub(crate) struct Scratch {
    /// Atoms of groups 15 to 17 whose electrons exceed the octet in the drawing.
    beyond_octet: Vec<u32>,
    /// Per atom.
    over_full: Vec<bool>,
}

/// Rewrites charges and bond orders of the skeleton in place.
///
/// A π bond between two over-full atoms waits until one of them is full: giving the charge to either
/// would let the numbering decide. So the table is applied in rounds, each decided by what was
/// over-full at its start; what is left between two over-full atoms stays as drawn.
pub(crate) fn separate(skeleton: &mut Skeleton, scratch: &mut Scratch) {
    let Scratch {
        beyond_octet,
        over_full,
    } = scratch;
    // Giving up a bond takes from what exceeds the octet of one atom and changes nothing at the other,
    // so no atom comes to be beyond its octet on the way, and most records have none.
    let is_beyond = |&atom: &u32| {
        valence::is_group_15_to_17(skeleton.atoms[atom as usize].element)
            && excess(skeleton, atom) > 0
    };
    beyond_octet.clear();
    beyond_octet.extend((0..skeleton.len() as u32).filter(is_beyond));
    if beyond_octet.is_empty() {
        return;
    }
    loop {
        over_full.clear();
        over_full.resize(skeleton.len(), false);
        for &atom in &*beyond_octet {
            over_full[atom as usize] = is_over_full(skeleton, atom);
        }
        let mut changed = false;
        for &atom in &*beyond_octet {
            if !over_full[atom as usize] {
                continue;
            }
            while excess(skeleton, atom) > 0
                && let Some(bond) = pi_bond(skeleton, atom, over_full)
            {
                separate_bond(skeleton, atom, bond);
                changed = true;
            }
        }
        if !changed {
            return;
        }
    }
}

fn separate_bond(skeleton: &mut Skeleton, centre: u32, bond: u32) {
    let other = {
        let bond = &mut skeleton.bonds[bond as usize];
        bond.order -= 1;
        bond.a ^ bond.b ^ centre
    };
    let centre = &mut skeleton.atoms[centre as usize];
    centre.charge = centre.charge.saturating_add(1);
    let neighbour = &mut skeleton.atoms[other as usize];
    neighbour.charge = neighbour.charge.saturating_sub(1);
}

/// Whether an atom of groups 15–17 has more electrons about it than an octet, in bonds that it has
/// the electrons for. (With more bonds than valence electrons a drawing means nothing; it stays.)
fn is_over_full(skeleton: &Skeleton, atom: u32) -> bool {
    let record = &skeleton.atoms[atom as usize];
    if !valence::is_group_15_to_17(record.element) {
        return false;
    }
    let electrons = 8 - valence::neutral(record.element);
    excess(skeleton, atom) > 0 && drawn(skeleton, atom) + i32::from(record.charge) <= electrons
}

/// Electron pairs in the bonds of an atom.
fn drawn(skeleton: &Skeleton, atom: u32) -> i32 {
    let bonds = skeleton
        .arcs(atom)
        .iter()
        .map(|&(_, bond)| i32::from(skeleton.pairs(bond)));
    bonds.sum::<i32>() + i32::from(skeleton.atoms[atom as usize].hydrogens)
}

/// How far the electrons about an atom exceed its octet.
fn excess(skeleton: &Skeleton, atom: u32) -> i32 {
    let record = &skeleton.atoms[atom as usize];
    drawn(skeleton, atom) - valence::neutral(record.element) - i32::from(record.charge)
}

/// A π bond to give up: one to a neighbour of oxygen's group if there is one, and to one that the
/// charge leaves within its valence. Among equals of these the choice does not matter: where not all
/// are given up, the centre and its neighbours are one conjugated system. Neighbours with more bonds
/// than their valence are in none; if not all bonds to them are given up, none is.
fn pi_bond(skeleton: &Skeleton, atom: u32, over_full: &[bool]) -> Option<u32> {
    let preference = |to: u32| {
        let oxygen_group = valence::neutral(skeleton.atoms[to as usize].element) == 2;
        (oxygen_group, fits(skeleton, to))
    };
    let candidates = || {
        let arcs = skeleton.arcs(atom).iter().copied();
        arcs.filter(|&(to, bond)| {
            !over_full[to as usize]
                && skeleton.pairs(bond) > 1
                && !skeleton.atoms[to as usize].element.is_metal()
        })
    };
    let (to, bond) = candidates().max_by_key(|&(to, _)| preference(to))?;
    let best = preference(to);
    if !best.1 {
        let equals = candidates().filter(|&(to, _)| preference(to) == best);
        let held: i32 = equals
            .map(|(_, bond)| i32::from(skeleton.pairs(bond)) - 1)
            .sum();
        // Each bond that is given up takes two from the excess.
        if held > (excess(skeleton, atom) + 1) / 2 {
            return None;
        }
    }
    Some(bond)
}

/// Whether an atom that takes the electrons of one of its π bonds keeps to its valence.
fn fits(skeleton: &Skeleton, atom: u32) -> bool {
    let record = &skeleton.atoms[atom as usize];
    let charge = i32::from(record.charge) - 1;
    drawn(skeleton, atom) - 1 <= valence::charged(record.element, charge)
}
