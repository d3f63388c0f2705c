//! Puts the marks of a record onto the candidates, or says why they fall away.

use crate::{
    DrawnStereo, Element, Ligand, Parity, Shape,
    mesomer::{MOBILE, Mesomer},
    skeleton::{NO_ATOM, Skeleton},
};

use super::{Candidate, Dropped, Perception, double_bond, labile, slot};

/// A drawn mark in terms of the skeleton.
#[derive(Debug, Clone, Copy)]
pub(super) struct Mark {
    pub(super) shape: Shape,
    pub(super) centres: [u32; 2],
    pub(super) ligands: [u32; 4],
    pub(super) parity: Option<Parity>,
}

/// Translates marks: folded hydrogens become ligands that are no atoms.
pub(super) fn on_skeleton(marks: &mut Vec<Mark>, skeleton: &Skeleton, drawn: &[DrawnStereo]) {
    let home = |atom: u32| skeleton.home.get(atom as usize).copied().unwrap_or(NO_ATOM);
    marks.clear();
    marks.extend(drawn.iter().map(|mark| Mark {
        shape: mark.shape,
        centres: mark.centres.map(home),
        ligands: mark.ligands.map(|ligand| slot_of(skeleton, ligand)),
        parity: mark.parity,
    }));
}

/// A ligand as the skeleton knows it.
pub(super) fn slot_of(skeleton: &Skeleton, ligand: Ligand) -> u32 {
    match ligand {
        Ligand::LonePair => slot::LONE_PAIR,
        Ligand::Hydrogen => slot::HYDROGEN,
        Ligand::Atom(atom) => match skeleton.folded.get(atom as usize) {
            Some(Some(mass)) => slot::HYDROGEN + u32::from(*mass),
            _ => skeleton.home.get(atom as usize).copied().unwrap_or(NO_ATOM),
        },
    }
}

/// Sets the parity of candidates from marks and records the marks that fall away. `seen` is
/// scratch.
pub(super) fn apply(
    perception: &mut Perception,
    skeleton: &Skeleton,
    mesomer: &Mesomer,
    marks: &[Mark],
    seen: &mut Vec<u32>,
) {
    for mark in marks {
        if mark.parity.is_none() {
            continue;
        }
        let Some(index) = perception.candidate_at(mark.centres) else {
            let reason = reason(skeleton, mesomer, mark, seen);
            perception.dropped.push((reason, mark.centres));
            continue;
        };
        let candidate = &mut perception.candidates[index];
        match parity_on(candidate, mark) {
            Some(parity) => candidate.parity = Some(parity),
            None => perception.dropped.push((Dropped::Misfit, mark.centres)),
        }
    }
}

/// The parity that a mark gives a candidate at its place, if it fits.
pub(super) fn parity_on(candidate: &Candidate, mark: &Mark) -> Option<Parity> {
    let parity = mark.parity.filter(|_| candidate.shape == mark.shape)?;
    let odd = relative_parity(&candidate.ligands, candidate.centres, mark)?;
    Some(Parity::from_odd(parity.is_odd() != odd))
}

/// Whether the mark's ligand order is an odd permutation of the candidate's. A lone pair or
/// hydrogen of the mark may stand for the one ligand that it does not name.
fn relative_parity(ligands: &[u32; 4], centres: [u32; 2], mark: &Mark) -> Option<bool> {
    let mut named = mark.ligands;
    if centres != mark.centres {
        named = [named[2], named[3], named[0], named[1]];
    }
    let missing = |list: &[u32; 4], other: &[u32; 4]| {
        let mut absent = list.iter().copied().filter(|l| !other.contains(l));
        (absent.next(), absent.next())
    };
    if mark.shape != Shape::Tetrahedral {
        return end_parity(ligands, &named);
    }
    if let ((Some(unnamed), None), (Some(extra), None)) =
        (missing(ligands, &named), missing(&named, ligands))
    {
        if extra < slot::HYDROGEN {
            return None;
        }
        named = named.map(|l| if l == extra { unnamed } else { l });
    }
    let mut odd = false;
    let mut order = [0; 4];
    for (place, ligand) in order.iter_mut().zip(&named) {
        *place = ligands.iter().position(|l| l == ligand)?;
    }
    for i in 0..4 {
        for j in i + 1..4 {
            if order[i] == order[j] {
                return None;
            }
            odd ^= order[i] > order[j];
        }
    }
    Some(odd)
}

/// The same for two ends with two ligands each; each end is settled by one named ligand.
fn end_parity(ligands: &[u32; 4], named: &[u32; 4]) -> Option<bool> {
    let mut odd = false;
    for end in [0, 2] {
        let (own, mark) = (&ligands[end..end + 2], &named[end..end + 2]);
        odd ^= match (
            own.iter().position(|l| *l == mark[0]),
            own.iter().position(|l| *l == mark[1]),
        ) {
            (Some(0), _) | (None, Some(1)) => false,
            (Some(1), _) | (None, Some(0)) => true,
            _ => return None,
        };
    }
    Some(odd)
}

fn reason(skeleton: &Skeleton, mesomer: &Mesomer, mark: &Mark, seen: &mut Vec<u32>) -> Dropped {
    let [a, b] = mark.centres;
    if mark.shape == Shape::Tetrahedral {
        let record = &skeleton.atoms[a as usize];
        return if labile::turns_on_mobile_hydrogen(skeleton, a) {
            Dropped::MobileHydrogen
        } else if record.element == Element::NITROGEN
            && skeleton
                .arcs(a)
                .iter()
                .all(|&(_, bond)| mesomer.orders[bond as usize] == 1)
        {
            Dropped::AmineNitrogen
        } else {
            Dropped::NotStereogenic
        };
    }
    if labile::is_labile_imine(skeleton, mesomer, a, b) {
        return Dropped::LabileDoubleBond;
    }
    match skeleton.bond_between(a, b) {
        Some(bond) if double_bond::in_small_ring(skeleton, mesomer, bond, seen) => {
            Dropped::SmallRing
        }
        Some(bond) if mesomer.orders[bond as usize] == MOBILE => Dropped::LabileDoubleBond,
        _ => Dropped::NotStereogenic,
    }
}
