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
/// The matching then holds the double bonds; its vertices are the atoms.
pub(crate) fn assign(
    demand: &[PiDemand],
    ring: &[bool],
    delocalised: &[Delocalised],
    matching: &mut Matching,
) -> Result<(), BuildError> {
    matching.budget = u64::MAX;
    matching.reset(demand.len());
    for (atom, demand) in (0..).zip(demand) {
        match demand {
            PiDemand::Needed => {}
            PiDemand::Excluded => matching.set_removed(atom, true),
            PiDemand::Optional => matching.set_optional(atom),
        }
    }
    let takes_part = |atom: u32| demand[atom as usize] != PiDemand::Excluded;
    for in_rings in [true, false] {
        for &(bond, a, b) in delocalised {
            if ring[bond as usize] == in_rings && takes_part(a) && takes_part(b) {
                matching.add_edge(a, b);
            }
        }
        matching.connect();
        if matching.maximise() == 0 {
            return Ok(());
        }
    }
    let left_over =
        |&atom: &u32| demand[atom as usize] == PiDemand::Needed && matching.mate(atom) == NONE;
    let atoms = (0..demand.len() as u32).filter(left_over).collect();
    Err(BuildError::NoKekuleStructure { atoms })
}
