//! Finds the conjugated systems of a molecule.

use crate::skeleton::Skeleton;

use super::{
    placement::{Room, System, SystemBond},
    valence::Valence,
};

/// Finds the systems in which something may differ between placements.
pub(super) fn find_systems(skeleton: &Skeleton, valences: &[Valence], systems: &mut Vec<System>) {
    let count = skeleton.len();
    let strained = |atom: usize| {
        let valence = &valences[atom];
        valence.has_room() && (valence.open > 0 || skeleton.atoms[atom].charge != valence.intrinsic)
    };
    let mut in_open_system = vec![false; count];
    if (0..count).any(strained) {
        for start in (0..count).filter(|&atom| strained(atom)) {
            if in_open_system[start] {
                continue;
            }
            let atoms = component(skeleton, start as u32, &mut in_open_system, |atom, _| {
                valences[atom as usize].has_room()
            });
            if atoms.len() > 1 {
                systems.push(System::open(skeleton, valences, atoms));
            }
        }
    }
    // A ring shift that would turn a triple bond into cumulated ones relates valence isomers, not
    // mesomers (docs/definitions.md), so atoms with room for two π bonds stay out here.
    let takes_part = |atom: u32| valences[atom as usize].pi == 1 && !in_open_system[atom as usize];
    let cyclic = skeleton.adjacency.ring_bonds(skeleton.bonds.len(), |bond| {
        let bond = &skeleton.bonds[bond as usize];
        takes_part(bond.a) && takes_part(bond.b)
    });
    let mut seen = vec![false; count];
    for start in 0..count as u32 {
        if seen[start as usize] || !takes_part(start) {
            continue;
        }
        let atoms = component(skeleton, start, &mut seen, |_, bond| cyclic[bond as usize]);
        if atoms.len() > 2 {
            systems.push(System::closed(skeleton, atoms, &cyclic));
        }
    }
}

/// The atoms reachable from `start` over bonds that `joins` accepts, given the far atom.
fn component(
    skeleton: &Skeleton,
    start: u32,
    seen: &mut [bool],
    joins: impl Fn(u32, u32) -> bool,
) -> Vec<u32> {
    let mut atoms = vec![start];
    seen[start as usize] = true;
    let mut at = 0;
    while let Some(&atom) = atoms.get(at) {
        at += 1;
        for &(to, bond) in skeleton.arcs(atom) {
            if !seen[to as usize] && skeleton.pairs(bond) > 0 && joins(to, bond) {
                seen[to as usize] = true;
                atoms.push(to);
            }
        }
    }
    atoms
}

impl System {
    fn with_atoms(skeleton: &Skeleton, mut atoms: Vec<u32>, keep: impl Fn(u32) -> bool) -> Self {
        atoms.sort_unstable();
        let mut bonds = Vec::new();
        for (a, &atom) in atoms.iter().enumerate() {
            for &(to, bond) in skeleton.arcs(atom) {
                if to > atom
                    && skeleton.pairs(bond) > 0
                    && keep(bond)
                    && let Ok(b) = atoms.binary_search(&to)
                {
                    bonds.push(SystemBond {
                        bond,
                        a: a as u32,
                        b: b as u32,
                    });
                }
            }
        }
        let charge = atoms
            .iter()
            .map(|&a| i32::from(skeleton.atoms[a as usize].charge))
            .sum();
        Self {
            atoms,
            bonds,
            charge,
            ..Self::default()
        }
    }

    /// A system with charges or open valences: everything about it is to be found.
    fn open(skeleton: &Skeleton, valences: &[Valence], atoms: Vec<u32>) -> Self {
        let mut system = Self::with_atoms(skeleton, atoms, |_| true);
        system.rooms = system
            .atoms
            .iter()
            .map(|&atom| {
                let valence = valences[atom as usize];
                Room {
                    pi: u32::from(valence.pi),
                    spare: u32::from(valence.spare),
                    onium: u32::from(valence.onium),
                    valence,
                }
            })
            .collect();
        system
    }

    /// A neutral closed-shell system reduced to bonds on cycles of π-capable atoms: no other bond
    /// can differ, and the π bonds drawn on these are what is to be rearranged.
    fn closed(skeleton: &Skeleton, atoms: Vec<u32>, cyclic: &[bool]) -> Self {
        let mut system = Self::with_atoms(skeleton, atoms, |bond| cyclic[bond as usize]);
        system.closed = true;
        system.rooms = vec![Room::default(); system.atoms.len()];
        for bond in &system.bonds {
            let pi = u32::from(skeleton.bonds[bond.bond as usize].order) - 1;
            system.rooms[bond.a as usize].pi += pi;
            system.rooms[bond.b as usize].pi += pi;
        }
        system
    }
}
