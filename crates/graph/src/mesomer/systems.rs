//! Finds the conjugated systems with charges or open valences.

use crate::skeleton::Skeleton;

use super::{
    placement::{Room, System, SystemBond},
    valence::Valence,
};

/// Finds the systems in which charges or open valences may be placed in other ways, and marks their
/// atoms in `inside`. New ones take their memory from `spare`.
pub(super) fn find(
    skeleton: &Skeleton,
    valences: &[Valence],
    inside: &mut Vec<bool>,
    systems: &mut Vec<System>,
    spare: &mut Vec<System>,
) {
    let is_strained = |atom: usize| {
        let valence = &valences[atom];
        valence.has_room() && (valence.open > 0 || skeleton.atoms[atom].charge != valence.intrinsic)
    };
    spare.append(systems);
    inside.clear();
    inside.resize(skeleton.len(), false);
    for start in (0..skeleton.len()).filter(|&atom| is_strained(atom)) {
        if !inside[start] {
            let joins = |atom: u32| valences[atom as usize].has_room();
            let mut system = spare.pop().unwrap_or_default();
            component(skeleton, joins, start as u32, inside, &mut system.atoms);
            if system.atoms.len() > 1 {
                system.fill(skeleton, valences);
                systems.push(system);
            } else {
                spare.push(system);
            }
        }
    }
}

/// Adds the systems that are best as drawn, of double bonds between atoms with one π bond each: what
/// ring shifts do, done the general way.
pub(super) fn add_neutral(
    skeleton: &Skeleton,
    valences: &[Valence],
    inside: &mut [bool],
    systems: &mut Vec<System>,
) {
    let has_one = |atom: u32| valences[atom as usize].pi == 1;
    let takes_part = |atom: u32| {
        let mut arcs = skeleton.arcs(atom).iter();
        has_one(atom)
            && arcs.any(|&(to, bond)| skeleton.bonds[bond as usize].order == 2 && has_one(to))
    };
    for start in 0..skeleton.len() as u32 {
        if !inside[start as usize] && takes_part(start) {
            let mut system = System::default();
            component(skeleton, takes_part, start, inside, &mut system.atoms);
            system.fill(skeleton, valences);
            systems.push(system);
        }
    }
}

/// The atoms reachable from `start` over atoms that join, ascending.
fn component(
    skeleton: &Skeleton,
    joins: impl Fn(u32) -> bool,
    start: u32,
    seen: &mut [bool],
    atoms: &mut Vec<u32>,
) {
    atoms.clear();
    atoms.push(start);
    seen[start as usize] = true;
    let mut at = 0;
    while let Some(&atom) = atoms.get(at) {
        at += 1;
        for &(to, bond) in skeleton.arcs(atom) {
            if skeleton.pairs(bond) > 0 && joins(to) && !seen[to as usize] {
                seen[to as usize] = true;
                atoms.push(to);
            }
        }
    }
    atoms.sort_unstable();
}

impl System {
    /// Fills in bonds, charge and room for the atoms.
    fn fill(&mut self, skeleton: &Skeleton, valences: &[Valence]) {
        let Self {
            atoms,
            bonds,
            charge,
            rooms,
            mate,
            ..
        } = self;
        mate.clear();
        bonds.clear();
        for (a, &atom) in (0..).zip(atoms.iter()) {
            for &(to, bond) in skeleton.arcs(atom) {
                if to > atom
                    && skeleton.pairs(bond) > 0
                    && let Ok(b) = atoms.binary_search(&to)
                {
                    let b = b as u32;
                    bonds.push(SystemBond { bond, a, b });
                }
            }
        }
        let charges = atoms
            .iter()
            .map(|&atom| skeleton.atoms[atom as usize].charge);
        *charge = charges.map(i32::from).sum();
        rooms.clear();
        rooms.extend(atoms.iter().map(|&atom| {
            let valence = valences[atom as usize];
            Room {
                pi: u32::from(valence.pi),
                spare: u32::from(valence.spare),
                onium: u32::from(valence.onium),
                valence,
            }
        }));
    }
}
