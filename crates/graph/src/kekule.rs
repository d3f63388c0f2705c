//! Aromatic input: one valence structure for bonds that a record gives only as delocalised.

use crate::{
    BuildError,
    matching::{Matching, NONE},
};

/// Whether an atom with delocalised bonds takes part in a double bond among them.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Default)]
pub enum PiDemand {
    /// It must: an aromatic carbon, a pyridine nitrogen.
    Needed,
    /// It must not: a pyrrole nitrogen, a furan oxygen, an atom with an exocyclic double bond.
    #[default]
    Excluded,
    /// It may: an unknown atom.
    Optional,
}

/// A delocalised bond: its index and its two atoms.
pub(crate) type Delocalised = (u32, u32, u32);

/// Chooses which delocalised bonds are double: a perfect matching of the atoms that need one
/// (OpenSMILES, aromaticity algorithm; Edmonds 1965). Bonds outside rings are used only where no
/// matching exists without them, so that a bond between two rings stays single.
///
/// Returns for each delocalised bond whether it is double.
pub(crate) fn assign(
    demand: &[PiDemand],
    ring: &[bool],
    delocalised: &[Delocalised],
    matching: &mut Matching,
) -> Result<Vec<bool>, BuildError> {
    // Excluded atoms take no part: the others are numbered among themselves.
    let mut number = vec![NONE; demand.len()];
    let mut members = Vec::new();
    for (atom, slot) in (0..).zip(&mut number) {
        if demand[atom as usize] != PiDemand::Excluded {
            *slot = members.len() as u32;
            members.push(atom);
        }
    }
    matching.budget = u64::MAX;
    matching.reset(members.len());
    for (vertex, &atom) in (0..).zip(&members) {
        if demand[atom as usize] == PiDemand::Optional {
            matching.set_optional(vertex);
        }
    }
    let ends = |a: u32, b: u32| [number[a as usize], number[b as usize]];
    let mut exposed = usize::MAX;
    for in_rings in [true, false] {
        for &(bond, a, b) in delocalised {
            let [a, b] = ends(a, b);
            if ring[bond as usize] == in_rings && a != NONE && b != NONE {
                matching.add_edge(a, b);
            }
        }
        exposed = matching.maximise();
        if exposed == 0 {
            break;
        }
    }
    if exposed > 0 {
        let left_over = |vertex: u32, atom: u32| {
            demand[atom as usize] == PiDemand::Needed && matching.mate(vertex) == NONE
        };
        let atoms = (0..)
            .zip(&members)
            .filter(|&(vertex, &atom)| left_over(vertex, atom))
            .map(|(_, &atom)| atom)
            .collect();
        return Err(BuildError::NoKekuleStructure { atoms });
    }
    Ok(delocalised
        .iter()
        .map(|&(_, a, b)| {
            let [a, b] = ends(a, b);
            a != NONE && b != NONE && matching.mate(a) == b
        })
        .collect())
}
