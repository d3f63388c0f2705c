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
    let excluded = |atom: u32| demand[atom as usize] == PiDemand::Excluded;
    matching.budget = u64::MAX;
    matching.reset(demand.len());
    for (atom, demand) in (0..).zip(demand) {
        match demand {
            PiDemand::Needed => {}
            PiDemand::Excluded => matching.set_removed(atom, true),
            PiDemand::Optional => matching.set_optional(atom),
        }
    }
    let mut exposed = usize::MAX;
    for in_rings in [true, false] {
        let usable = delocalised.iter().filter(|&&(bond, a, b)| {
            ring[bond as usize] == in_rings && !excluded(a) && !excluded(b)
        });
        for &(_, a, b) in usable {
            matching.add_edge(a, b);
        }
        exposed = matching.maximise();
        if exposed == 0 {
            break;
        }
    }
    if exposed > 0 {
        let atoms = (0..demand.len() as u32)
            .filter(|&atom| {
                demand[atom as usize] == PiDemand::Needed && matching.mate(atom) == NONE
            })
            .collect();
        return Err(BuildError::NoKekuleStructure { atoms });
    }
    Ok(delocalised
        .iter()
        .map(|&(_, a, b)| matching.mate(a) == b)
        .collect())
}
