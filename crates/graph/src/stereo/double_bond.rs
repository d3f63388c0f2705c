//! Double bonds, cumulated ones and hindered axes that can be stereogenic.

use crate::{
    Shape,
    mesomer::{MOBILE, Mesomer},
    skeleton::{Skeleton, SkeletonBond},
};

use super::{Candidate, Perception, labile, marks::Mark, slot, tetrahedral::put_hydrogens};

/// Rings below this size hold their double bonds cis.
const SMALLEST_FREE_RING: u32 = 8;

/// Rings of this size let a single bond between two flat ends be an axis, as the biaryl bond of
/// colchicine is.
const SMALLEST_AXIS_RING: u32 = 7;

/// Adds the candidates. Mobile bonds, and single bonds as hindered axes, are candidates only in a
/// record that marks one; the absence of a mark on them leaves nothing open. `seen` is scratch.
pub(super) fn find(
    perception: &mut Perception,
    skeleton: &Skeleton,
    mesomer: &Mesomer,
    marks: &[Mark],
    seen: &mut Vec<u32>,
) {
    let marked = |shape: Shape, order: u8| {
        marks.iter().any(|mark| {
            mark.shape == shape
                && skeleton
                    .bond_between(mark.centres[0], mark.centres[1])
                    .is_some_and(|bond| mesomer.orders[bond as usize] == order)
        })
    };
    let marked_mobile = marked(Shape::DoubleBond, MOBILE);
    let marked_axis = marked(Shape::Axis, 1);
    for (index, bond) in skeleton.bonds.iter().enumerate() {
        let chain = match mesomer.orders[index] {
            2 => match cumulene(skeleton, mesomer, index as u32) {
                Some(chain) => chain,
                None => continue,
            },
            MOBILE if marked_mobile => Chain {
                ends: [bond.a, bond.b],
                inner: [bond.b, bond.a],
                bonds: 1,
            },
            1 if marked_axis && is_between_sp2(skeleton, mesomer, bond) => Chain {
                ends: [bond.a, bond.b],
                inner: [bond.b, bond.a],
                bonds: 0,
            },
            _ => continue,
        };
        if let Some(candidate) = candidate(skeleton, mesomer, index as u32, &chain, seen) {
            perception.candidates.push(candidate);
        }
    }
}

/// Whether a single bond joins two atoms that have other than single bonds besides.
fn is_between_sp2(skeleton: &Skeleton, mesomer: &Mesomer, bond: &SkeletonBond) -> bool {
    [bond.a, bond.b].iter().all(|&atom| {
        skeleton
            .arcs(atom)
            .iter()
            .any(|&(_, bond)| mesomer.orders[bond as usize] != 1)
    })
}

/// A run of cumulated double bonds, or one single bond that is an axis (`bonds` is 0): its two ends and the atom next to each end.
struct Chain {
    ends: [u32; 2],
    inner: [u32; 2],
    bonds: u32,
}

/// The run that a double bond belongs to, reported once: for the bond of least index in it.
fn cumulene(skeleton: &Skeleton, mesomer: &Mesomer, bond: u32) -> Option<Chain> {
    let start = &skeleton.bonds[bond as usize];
    let mut chain = Chain {
        ends: [0; 2],
        inner: [0; 2],
        bonds: 1,
    };
    for (side, (mut from, mut to)) in [(start.b, start.a), (start.a, start.b)]
        .into_iter()
        .enumerate()
    {
        while let Some((next, via)) = continues(skeleton, mesomer, from, to) {
            if via < bond || chain.bonds as usize > skeleton.bonds.len() {
                return None;
            }
            chain.bonds += 1;
            (from, to) = (to, next);
        }
        chain.ends[side] = to;
        chain.inner[side] = from;
    }
    Some(chain)
}

/// The next double bond beyond `to`, coming from `from`, where `to` is an inner atom of a cumulene.
fn continues(skeleton: &Skeleton, mesomer: &Mesomer, from: u32, to: u32) -> Option<(u32, u32)> {
    let record = &skeleton.atoms[to as usize];
    if record.element.group() != Some(14) || record.hydrogens > 0 || skeleton.degree(to) != 2 {
        return None;
    }
    skeleton
        .arcs(to)
        .iter()
        .copied()
        .find(|&(next, bond)| next != from && mesomer.orders[bond as usize] == 2)
}

fn candidate(
    skeleton: &Skeleton,
    mesomer: &Mesomer,
    bond: u32,
    chain: &Chain,
    seen: &mut Vec<u32>,
) -> Option<Candidate> {
    let [a, b] = chain.ends;
    if a == b || (chain.bonds == 1 && labile::is_labile_imine(skeleton, mesomer, a, b)) {
        return None;
    }
    let [first, second] = end_ligands(skeleton, mesomer, a, chain.inner[0])?;
    let [third, fourth] = end_ligands(skeleton, mesomer, b, chain.inner[1])?;
    if in_small_ring(skeleton, mesomer, bond, seen) {
        return None;
    }
    Some(Candidate {
        shape: if chain.bonds % 2 == 1 {
            Shape::DoubleBond
        } else {
            Shape::Axis
        },
        centres: [a, b],
        ligands: [first, second, third, fourth],
        parity: None,
        quiet: mesomer.orders[bond as usize] != 2,
        remembered: false,
    })
}

/// Whether a bond lies in a ring too small for a free choice of geometry.
pub(super) fn in_small_ring(
    skeleton: &Skeleton,
    mesomer: &Mesomer,
    bond: u32,
    seen: &mut Vec<u32>,
) -> bool {
    let ends = &skeleton.bonds[bond as usize];
    let smallest = match mesomer.orders[bond as usize] {
        1 => SMALLEST_AXIS_RING,
        _ => SMALLEST_FREE_RING,
    };
    skeleton.ring[bond as usize]
        && skeleton
            .adjacency
            .smallest_ring([ends.a, ends.b], smallest - 1, seen)
            .is_some()
}

/// The two ligands at an end, apart from the chain; `None` if it has not two, or two alike at
/// sight, or if the end cannot keep a geometry.
fn end_ligands(skeleton: &Skeleton, mesomer: &Mesomer, end: u32, inner: u32) -> Option<[u32; 2]> {
    let record = &skeleton.atoms[end as usize];
    let charge = mesomer.states[end as usize].charge;
    let others = skeleton.degree(end) - 1 + usize::from(record.hydrogens);
    let lone_pair = match (record.element.group(), others, charge) {
        (Some(14), 2, _) => false,
        (Some(15), 2, _) => false,
        (Some(15), 1, _) => true,
        (Some(16), 1, 1) => true,
        _ => return None,
    };
    // One of the neighbours is the inner atom, so there is room for the others.
    let mut found = [slot::LONE_PAIR; 2];
    let mut atoms = 0;
    for &(to, _) in skeleton.arcs(end) {
        if to != inner {
            found[atoms] = to;
            atoms += 1;
        }
    }
    put_hydrogens(&mut found[atoms..], record);
    (lone_pair || found[0] != found[1]).then_some(found)
}
