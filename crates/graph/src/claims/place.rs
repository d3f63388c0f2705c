//! Names of stereo elements that do not depend on the numbering.

use crate::{
    Shape,
    order::{Labelling, ranked_parity},
    stereo::{Candidate, Perception},
};

use super::Variable;

/// A stereo element by shape and the canonical places of its centres. Sets of elements closed under
/// automorphisms have the same places whichever of the equivalent orders was found.
pub(crate) type Place = (Shape, u32, u32);

/// The place of a candidate.
pub(crate) fn place(candidate: &Candidate, order: &Labelling) -> Place {
    let [a, b] = candidate.centres.map(|atom| order.rank[atom as usize]);
    (candidate.shape, a.min(b), a.max(b))
}

/// The place of a variable, and whether its even value is odd when the ligands are in canonical
/// order. For a variable that no automorphism moves or inverts both are the same in every order.
pub(super) fn canonical_place(
    variable: &Variable,
    perception: &Perception,
    order: &Labelling,
) -> Option<(Place, bool)> {
    let atoms = order.rank.len() as u32;
    let rank = |ligand: u32| {
        if ligand < atoms {
            order.rank[ligand as usize]
        } else {
            ligand
        }
    };
    let members = variable.members.iter();
    let named = members.map(|&(index, opposite)| {
        let candidate = &perception.candidates[index];
        (place(candidate, order), candidate, opposite)
    });
    let (place, candidate, opposite) = named.min_by_key(|(place, ..)| *place)?;
    Some((place, ranked_parity(&candidate.unit(opposite), rank)?))
}
