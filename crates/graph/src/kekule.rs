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

/// Chooses which delocalised bonds are double; owns the scratch.
#[derive(Debug, Default)]
pub(crate) struct Kekule {
    /// Per atom: the other end of its double bond, or [`NONE`].
    partner: Vec<u32>,
    matching: Matching,
}

impl Kekule {
    /// Chooses which delocalised bonds are double: a perfect matching of the atoms that need one
    /// (OpenSMILES, aromaticity algorithm; Edmonds 1965). Bonds outside rings are used only where no
    /// matching exists without them, so that a bond between two rings stays single.
    pub(crate) fn assign(
        &mut self,
        demand: &[PiDemand],
        ring: &[bool],
        delocalised: &[Delocalised],
    ) -> Result<(), BuildError> {
        if self.pair_in_turn(demand, ring, delocalised) {
            return Ok(());
        }
        let matching = &mut self.matching;
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
                self.partner.clear();
                self.partner.extend_from_slice(matching.mates());
                return Ok(());
            }
        }
        let left_over =
            |&atom: &u32| demand[atom as usize] == PiDemand::Needed && matching.mate(atom) == NONE;
        let atoms = (0..demand.len() as u32).filter(left_over).collect();
        Err(BuildError::NoKekuleStructure { atoms })
    }

    /// Makes each ring bond double in turn whose atoms still need it. Atoms that are written along
    /// their rings are nearly always all paired by that, and a perfect matching is what was asked for;
    /// says whether it is one.
    fn pair_in_turn(
        &mut self,
        demand: &[PiDemand],
        ring: &[bool],
        delocalised: &[Delocalised],
    ) -> bool {
        let mut needed = 0;
        for demand in demand {
            match demand {
                PiDemand::Needed => needed += 1,
                PiDemand::Excluded => {}
                PiDemand::Optional => return false,
            }
        }
        self.partner.clear();
        self.partner.resize(demand.len(), NONE);
        let is_free = |partner: &[u32], atom: u32| {
            demand[atom as usize] == PiDemand::Needed && partner[atom as usize] == NONE
        };
        for &(bond, a, b) in delocalised {
            let partner = &mut self.partner;
            if ring[bond as usize] && is_free(partner, a) && is_free(partner, b) {
                partner[a as usize] = b;
                partner[b as usize] = a;
                needed -= 2;
            }
        }
        needed == 0
    }

    /// Whether the delocalised bond between two atoms is double.
    pub(crate) fn is_double(&self, a: u32, b: u32) -> bool {
        self.partner[a as usize] == b
    }
}
