//! The best placements of π bonds and charges in a conjugated system, as perfect matchings.
//!
//! Each atom is split into vertices: one for every π bond that its σ skeleton leaves room for
//! without charge, spare ones where more valences are open than π bonds can fill, and one *onium*
//! vertex where a lone pair can be lent at the price of a positive charge. Pools of further
//! vertices take what is left over: negative charges (on heteroatoms, on carbon), open valences,
//! positive charges on carbon or boron, and unused onium vertices. For given pool sizes the
//! placements are exactly the perfect matchings of that graph.
//!
//! Pool sizes follow from counting electrons. With `base` vertices that are not onium, charge `q`
//! beyond what the σ skeleton enforces, `k` π bonds, `t` onium vertices used and `p` positive
//! carbons there are `t + p − q` negative charges and `q + base − 2k − 2p` open valences. So the
//! order of preference is a short loop: `k` from the largest down, `t + p` from the least up, `p`
//! from the largest down, negative carbons from none up.

use crate::{
    matching::{Matching, NONE},
    skeleton::Skeleton,
};

use super::valence::Valence;

/// What can become of a vertex that no π bond covers.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(crate) enum Pool {
    NegativeHetero,
    NegativeCarbon,
    Open,
    Positive,
    Idle,
}

impl Pool {
    pub(crate) const ALL: [Self; 5] = [
        Self::NegativeHetero,
        Self::NegativeCarbon,
        Self::Open,
        Self::Positive,
        Self::Idle,
    ];
}

/// A bond of a system: its index in the skeleton and its ends as positions in the system.
#[derive(Debug, Clone, Copy)]
pub(crate) struct SystemBond {
    pub(crate) bond: u32,
    pub(crate) a: u32,
    pub(crate) b: u32,
}

/// How many vertices an atom has of each sort, and what it can carry.
#[derive(Debug, Clone, Copy, Default)]
struct Room {
    pi: u32,
    spare: u32,
    onium: u32,
    valence: Valence,
}

/// One conjugated system, and after [`System::settle`] one of its best placements.
#[derive(Debug, Default, Clone)]
pub(crate) struct System {
    /// Skeleton atoms; positions in this list are group numbers.
    pub(crate) atoms: Vec<u32>,
    pub(crate) bonds: Vec<SystemBond>,
    /// Net charge of the atoms of the system.
    pub(crate) charge: i32,
    rooms: Vec<Room>,
    pools: [u32; 5],
    /// First vertex of each group; groups are the atoms, then the pools.
    first: Vec<u32>,
    /// The placement that was found.
    pub(crate) mate: Vec<u32>,
    /// Neutral and closed-shell: the drawing is a best placement already.
    closed: bool,
}

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
            if !seen[to as usize] && joins(to, bond) {
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
                if to > atom && keep(bond) {
                    if let Ok(b) = atoms.binary_search(&to) {
                        bonds.push(SystemBond {
                            bond,
                            a: a as u32,
                            b: b as u32,
                        });
                    }
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

    /// Finds a best placement. `false` where the model has none and the drawing stands.
    pub(super) fn settle(
        &mut self,
        skeleton: &Skeleton,
        valences: &[Valence],
        matching: &mut Matching,
    ) -> bool {
        if !self.closed {
            return self.search(valences, matching);
        }
        self.build(matching);
        for at in 0..self.bonds.len() {
            let SystemBond { bond, a, b } = self.bonds[at];
            for _ in 1..skeleton.bonds[bond as usize].order {
                let free = |group: u32| self.vertices(group).find(|&v| matching.mate(v) == NONE);
                if let (Some(x), Some(y)) = (free(a), free(b)) {
                    matching.join(x, y);
                }
            }
        }
        self.mate = matching.saved();
        true
    }

    fn search(&mut self, valences: &[Valence], matching: &mut Matching) -> bool {
        let sum = |of: fn(&Room) -> u32| self.rooms.iter().map(of).sum::<u32>() as i32;
        let (base, onium) = (sum(|r| r.pi + r.spare), sum(|r| r.onium));
        let intrinsic: i32 = self
            .atoms
            .iter()
            .map(|&a| i32::from(valences[a as usize].intrinsic))
            .sum();
        let charge = self.charge - intrinsic;
        let most = self
            .most_pi_bonds(true, matching)
            .min((charge + base).div_euclid(2));
        let without_onium = self.most_pi_bonds(false, matching);
        for pi_bonds in (0..=most).rev() {
            for positive_total in charge.max(0)..=onium + base {
                let least = (pi_bonds - without_onium).max(0);
                for used in least..=positive_total.min(onium) {
                    let positive = positive_total - used;
                    let negative = positive_total - charge;
                    let open = charge + base - 2 * pi_bonds - 2 * positive;
                    if open < 0 || base - (2 * pi_bonds - used) != open + positive + negative {
                        continue;
                    }
                    for on_carbon in 0..=negative {
                        let sizes = [
                            negative - on_carbon,
                            on_carbon,
                            open,
                            positive,
                            onium - used,
                        ];
                        self.pools = sizes.map(|size| size as u32);
                        self.build(matching);
                        if matching.maximise() == 0 {
                            self.mate = matching.saved();
                            return true;
                        }
                    }
                }
            }
        }
        false
    }

    /// The size of a largest matching by π bonds alone: an upper bound.
    fn most_pi_bonds(&mut self, with_onium: bool, matching: &mut Matching) -> i32 {
        self.pools = [0; 5];
        self.build(matching);
        let mut vertices = 0;
        for (group, room) in self.rooms.iter().enumerate() {
            for (at, vertex) in self.vertices(group as u32).enumerate() {
                let idle = at as u32 >= room.pi + room.spare && !with_onium;
                matching.set_removed(vertex, idle);
                vertices += usize::from(!idle);
            }
        }
        ((vertices - matching.maximise()) / 2) as i32
    }

    /// The vertices of a group.
    pub(crate) fn vertices(&self, group: u32) -> std::ops::Range<u32> {
        self.first[group as usize]..self.first[group as usize + 1]
    }

    /// The group number of a pool.
    pub(crate) fn pool_group(&self, pool: Pool) -> u32 {
        (self.atoms.len() + pool as usize) as u32
    }

    /// Builds the graph for the present pool sizes.
    pub(crate) fn build(&mut self, matching: &mut Matching) {
        self.first.clear();
        let mut next = 0;
        let sizes = self
            .rooms
            .iter()
            .map(|r| r.pi + r.spare + r.onium)
            .chain(self.pools);
        for size in sizes {
            self.first.push(next);
            next += size;
        }
        self.first.push(next);
        matching.reset(next as usize);
        for group in 0..self.first.len() as u32 - 1 {
            for vertex in self.vertices(group) {
                matching.set_group(vertex, group);
            }
        }
        for bond in &self.bonds {
            for x in self.pi_vertices(bond.a) {
                for y in self.pi_vertices(bond.b) {
                    matching.add_edge(x, y);
                }
            }
        }
        for pool in Pool::ALL {
            for group in 0..self.atoms.len() as u32 {
                for x in self.pool_vertices(pool, group) {
                    for y in self.vertices(self.pool_group(pool)) {
                        matching.add_edge(x, y);
                    }
                }
            }
        }
    }

    /// The vertices of an atom that a π bond can cover.
    fn pi_vertices(&self, group: u32) -> impl Iterator<Item = u32> + Clone {
        let room = self.rooms[group as usize];
        let start = self.first[group as usize];
        let onium = start + room.pi + room.spare;
        (start..start + room.pi).chain(onium..onium + room.onium)
    }

    /// The vertices of an atom that a pool can cover.
    fn pool_vertices(&self, pool: Pool, group: u32) -> std::ops::Range<u32> {
        let room = self.rooms[group as usize];
        let all = self.vertices(group);
        let base = all.start..all.end - room.onium;
        let allowed = match pool {
            Pool::NegativeHetero => room.valence.can_be_negative && room.valence.hetero,
            Pool::NegativeCarbon => room.valence.can_be_negative && !room.valence.hetero,
            Pool::Open => true,
            Pool::Positive => room.valence.can_be_positive,
            Pool::Idle => return base.end..all.end,
        };
        if allowed {
            base
        } else {
            base.start..base.start
        }
    }

    /// How many edges of a matching run between two groups.
    pub(crate) fn multiplicity(&self, mate: &[u32], a: u32, b: u32) -> u32 {
        let range = self.vertices(b);
        self.vertices(a)
            .filter(|&v| range.contains(&mate[v as usize]))
            .count() as u32
    }

    /// Charge and open valences of an atom in a placement.
    pub(crate) fn charge_and_open(&self, mate: &[u32], group: u32) -> (i32, u32) {
        let room = &self.rooms[group as usize];
        let count = |pool| self.multiplicity(mate, group, self.pool_group(pool)) as i32;
        let onium = room.onium as i32 - count(Pool::Idle);
        let negative = count(Pool::NegativeHetero) + count(Pool::NegativeCarbon);
        let charge = i32::from(room.valence.intrinsic) + onium + count(Pool::Positive) - negative;
        (charge, count(Pool::Open) as u32)
    }

    /// Open valences of the whole system.
    pub(crate) fn open_total(&self) -> u32 {
        self.pools[Pool::Open as usize]
    }

    /// Whether the drawing was a best placement from the start.
    pub(crate) fn is_closed(&self) -> bool {
        self.closed
    }
}
