//! Mesomers are one structure: the normal form of charges, radicals and π bonds.
//!
//! Two steps, defined in docs/definitions.md. [`octet`] puts over-full octets into charge-separated
//! form by a closed table. Then, within each conjugated system, all placements of π bonds and
//! charges are considered that are best in this order: most π bonds, least total charge, fewest
//! open valences, fewest charges on atoms charged already, fewest negative charges on carbon. What
//! all best placements share is fixed, what differs among them is mobile. [`placement`] makes
//! this a perfect-matching question, so that the answer is exact and polynomial; [`mobile`] asks it
//! bond by bond. Neutral closed-shell systems, nearly all, are best as drawn and have a shorter way:
//! [`shift`]; where the whole drawing is such, [`plain`] tells.

mod first;
mod mobile;
mod octet;
mod placement;
mod plain;
mod shift;
mod systems;
mod valence;

#[cfg(test)]
mod tests;

use crate::{Limits, OrderError, matching::Matching, skeleton::Skeleton};

pub(crate) use first::First;
use mobile::Mobility;
pub(crate) use octet::{Scratch as OctetScratch, separate};
use placement::System;
use plain::Pairs;
use shift::{Shift, Shifting};
pub(crate) use valence::neutral as neutral_valence;
use valence::{Drawn, Valence};

/// The order of a bond that differs among the best placements.
pub(crate) const MOBILE: u8 = 5;

/// What the best placements say about an atom.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord, Default, Hash)]
pub(crate) struct AtomState {
    /// Charge where it is fixed; 0 where it is mobile.
    pub(crate) charge: i8,
    /// Open valences where they are fixed.
    pub(crate) open: u8,
    /// Whether charge or open valences differ among the best placements.
    pub(crate) mobile: bool,
    /// Net charge and open valences of the conjugated system, for atoms where these are mobile.
    pub(crate) system: (i16, u16),
}

/// The normal form of one molecule, on the atoms and bonds of its skeleton.
#[derive(Debug, Default, Clone)]
pub(crate) struct Mesomer {
    /// Per bond: 1 to 4, or [`MOBILE`].
    pub(crate) orders: Vec<u8>,
    pub(crate) states: Vec<AtomState>,
    /// The conjugated systems with charges or open valences, whose placement the drawing alone does
    /// not settle.
    systems: Vec<System>,
    /// The mobile bonds outside of them.
    shifting: Shifting,
}

/// Scratch that is reused from one molecule to the next.
#[derive(Debug, Default)]
pub(crate) struct Scratch {
    /// Takes the general way for plain drawings and ring shifts, too.
    pub(crate) no_shortcuts: bool,
    pairs: Vec<Pairs>,
    octet: octet::Scratch,
    drawn: Vec<Drawn>,
    valences: Vec<Valence>,
    /// Per atom: in one of the systems with charges or open valences.
    in_system: Vec<bool>,
    spare_systems: Vec<System>,
    mobility: Mobility,
    shift: Shift,
    matching: Matching,
}

impl Mesomer {
    /// Rings of 4n mobile bonds in which no atom has a third: cyclobutadienes, cyclooctatetraenes.
    pub(crate) fn bond_shift_rings(&self, skeleton: &Skeleton) -> Vec<Vec<u32>> {
        let mobile = |atom: u32| {
            let arcs = skeleton.arcs(atom).iter();
            arcs.filter(|&&(_, bond)| self.orders[bond as usize] == MOBILE)
                .map(|&(to, _)| to)
        };
        let mut seen = vec![false; skeleton.len()];
        let mut rings = Vec::new();
        for start in 0..skeleton.len() as u32 {
            let mut ring = Vec::new();
            let mut next = Some(start);
            while let Some(atom) = next.filter(|&a| !seen[a as usize] && mobile(a).count() == 2) {
                seen[atom as usize] = true;
                ring.push(atom);
                next = mobile(atom).find(|&to| !seen[to as usize]);
            }
            let closed = ring.len() >= 4
                && ring.len() % 4 == 0
                && ring
                    .last()
                    .is_some_and(|&last| mobile(last).any(|to| to == start));
            if closed {
                rings.push(ring);
            }
        }
        rings
    }

    /// Works out the normal form. The skeleton's charges and bond orders are brought into the
    /// charge-separated form on the way.
    ///
    /// # Errors
    /// [`OrderError::StepLimit`] for conjugated systems beyond all bounds.
    pub(crate) fn load(
        &mut self,
        skeleton: &mut Skeleton,
        limits: &Limits,
        scratch: &mut Scratch,
    ) -> Result<(), OrderError> {
        // An edge of a matching costs some four times as much as one of a refinement.
        scratch.matching.work = 0;
        scratch.matching.budget = limits.order_steps / 4;
        if !scratch.no_shortcuts && plain::is_plain(skeleton, &mut scratch.pairs) {
            return self.load_plain(skeleton, limits, scratch);
        }
        octet::separate(skeleton, &mut scratch.octet);
        self.take_orders(skeleton);
        self.place_systems(skeleton, limits, scratch)?;
        let Scratch {
            valences,
            in_system,
            shift,
            matching,
            ..
        } = scratch;
        // A ring shift that would turn a triple bond into cumulated ones relates valence isomers, not
        // mesomers (docs/definitions.md), so atoms with room for two π bonds stay out here.
        let takes_part = |atom: u32| valences[atom as usize].pi == 1 && !in_system[atom as usize];
        let (orders, shifting) = (&mut self.orders, &mut self.shifting);
        shift.mark(skeleton, takes_part, matching, limits, orders, shifting)
    }

    /// The same for a plain drawing: ring shifts are all that there is.
    fn load_plain(
        &mut self,
        skeleton: &Skeleton,
        limits: &Limits,
        scratch: &mut Scratch,
    ) -> Result<(), OrderError> {
        let Scratch {
            pairs,
            spare_systems,
            shift,
            matching,
            ..
        } = scratch;
        self.take_orders(skeleton);
        self.states.clear();
        self.states.resize(skeleton.len(), AtomState::default());
        spare_systems.append(&mut self.systems);
        let takes_part = |atom: u32| pairs[atom as usize].pi == 1;
        let (orders, shifting) = (&mut self.orders, &mut self.shifting);
        shift.mark(skeleton, takes_part, matching, limits, orders, shifting)
    }

    /// Finds the systems with charges or open valences, and what is mobile in them.
    fn place_systems(
        &mut self,
        skeleton: &Skeleton,
        limits: &Limits,
        scratch: &mut Scratch,
    ) -> Result<(), OrderError> {
        let Scratch {
            no_shortcuts,
            drawn,
            valences,
            in_system,
            spare_systems,
            mobility,
            matching,
            ..
        } = scratch;
        valence::load(valences, drawn, skeleton);
        let atoms = skeleton.atoms.iter().zip(valences.iter());
        self.states.clear();
        self.states.extend(atoms.map(|(atom, valence)| AtomState {
            charge: atom.charge,
            open: valence.open,
            ..AtomState::default()
        }));
        let systems = &mut self.systems;
        systems::find(skeleton, valences, in_system, systems, spare_systems);
        if *no_shortcuts {
            systems::add_neutral(skeleton, valences, in_system, systems);
        }
        let (orders, states) = (&mut self.orders, &mut self.states);
        for system in systems {
            if system.settle(valences, matching, limits)? {
                mobility.mark(system, matching, limits, orders, states)?;
            }
        }
        Ok(())
    }

    fn take_orders(&mut self, skeleton: &Skeleton) {
        self.orders.clear();
        self.orders
            .extend(skeleton.bonds.iter().map(|bond| bond.order));
    }
}
