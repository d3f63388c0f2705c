//! The best placements of π bonds and charges in a conjugated system, as perfect matchings.
//!
//! Each atom is split into vertices: one for every π bond that its σ skeleton leaves room for
//! without charge, spare ones where more valences are open than π bonds can fill, and one *onium*
//! vertex where a lone pair can be lent at the price of a positive charge. Pools of further
//! vertices take what is left over: negative charges (on heteroatoms, on carbon), open valences,
//! positive charges on carbon, and unused onium vertices (of atoms without other charge, and
//! of those that the σ skeleton charges already). For given pool sizes the placements are exactly the
//! perfect matchings of that graph.
//!
//! Pool sizes follow from counting electrons. With `base` vertices that are not onium, charge `q`
//! beyond what the σ skeleton enforces, `k` π bonds, `t` onium vertices used and `p` positive
//! carbons there are `t + p − q` negative charges and `q + base − 2k − 2p` open valences. So the
//! order of preference is a short loop: `k` from the largest down, `t + p` from the least up, `p`
//! from the largest down, onium vertices of atoms charged already from none up, negative carbons from
//! none up.

use crate::{Limits, OrderError, matching::Matching};

use super::{mobile::within, valence::Valence};

/// What can become of a vertex that no π bond covers.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(crate) enum Pool {
    NegativeHetero,
    NegativeCarbon,
    Open,
    Positive,
    Idle,
    /// An unused onium vertex of an atom that the σ skeleton charges already.
    IdleCharged,
}

impl Pool {
    pub(crate) const ALL: [Self; 6] = [
        Self::NegativeHetero,
        Self::NegativeCarbon,
        Self::Open,
        Self::Positive,
        Self::Idle,
        Self::IdleCharged,
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
pub(super) struct Room {
    pub(super) pi: u32,
    pub(super) spare: u32,
    pub(super) onium: u32,
    pub(super) valence: Valence,
}

/// One conjugated system, and after [`System::settle`] one of its best placements.
#[derive(Debug, Default, Clone)]
pub(crate) struct System {
    /// Skeleton atoms; positions in this list are group numbers.
    pub(crate) atoms: Vec<u32>,
    pub(crate) bonds: Vec<SystemBond>,
    /// Net charge of the atoms of the system.
    pub(crate) charge: i32,
    pub(super) rooms: Vec<Room>,
    pub(super) pools: [u32; 6],
    /// First vertex of each group; groups are the atoms, then the pools.
    pub(super) first: Vec<u32>,
    /// The placement that was found.
    pub(crate) mate: Vec<u32>,
}

impl System {
    /// Takes the matching as the placement that was found.
    fn keep(&mut self, matching: &mut Matching) {
        self.mate.clear();
        self.mate.extend_from_slice(matching.mates());
        matching.keep_changes();
    }

    /// Finds a best placement, which the matching holds afterwards. `false` where the model has none
    /// and the drawing stands.
    ///
    /// # Errors
    /// [`OrderError::StepLimit`] when the matching has looked at more edges than the limits allow.
    pub(super) fn settle(
        &mut self,
        valences: &[Valence],
        matching: &mut Matching,
        limits: &Limits,
    ) -> Result<bool, OrderError> {
        let sum = |of: fn(&Room) -> u32| self.rooms.iter().map(of).sum::<u32>() as i32;
        let (base, onium) = (sum(|r| r.pi + r.spare), sum(|r| r.onium));
        let twice = sum(|r| if r.valence.intrinsic > 0 { r.onium } else { 0 });
        let on_hetero = sum(|r| if r.valence.hetero { r.pi + r.spare } else { 0 });
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
        within(matching, limits)?;
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
                    // Atoms that bear two charges, then carbons that bear a negative one.
                    let doubled = (used - (onium - twice)).max(0)..=used.min(twice);
                    let carbons = (negative - on_hetero).max(0)..=negative;
                    for (charged, on_carbon) in
                        doubled.flat_map(|charged| carbons.clone().map(move |c| (charged, c)))
                    {
                        let sizes = [
                            negative - on_carbon,
                            on_carbon,
                            open,
                            positive,
                            onium - twice - (used - charged),
                            twice - charged,
                        ];
                        self.pools = sizes.map(|size| size as u32);
                        if self.is_placement(matching, limits)? {
                            return Ok(true);
                        }
                    }
                }
            }
        }
        Ok(false)
    }

    /// Whether the present pool sizes have a perfect matching; if so it is kept.
    fn is_placement(
        &mut self,
        matching: &mut Matching,
        limits: &Limits,
    ) -> Result<bool, OrderError> {
        // The graph is not even built when it would be larger than the work allowed.
        let vertices: u64 = self
            .rooms
            .iter()
            .map(|r| u64::from(r.pi + r.spare + r.onium))
            .sum();
        let pools: u64 = self.pools.iter().map(|&size| u64::from(size)).sum();
        matching.work = matching.work.saturating_add(vertices);
        if vertices.saturating_mul(pools) > limits.order_steps / 8 {
            return Err(OrderError::StepLimit {
                limit: limits.order_steps,
            });
        }
        within(matching, limits)?;
        self.build(matching);
        let found = matching.maximise() == 0;
        within(matching, limits)?;
        if found {
            self.keep(matching);
        }
        Ok(found)
    }

    /// The size of a largest matching by π bonds alone: an upper bound.
    fn most_pi_bonds(&mut self, with_onium: bool, matching: &mut Matching) -> i32 {
        self.pools = [0; 6];
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
        self.connect(matching);
    }

    /// Puts the graph into the matching.
    pub(super) fn connect(&self, matching: &mut Matching) {
        matching.reset(self.first.last().map_or(0, |&count| count as usize));
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
        matching.connect();
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
            Pool::Idle | Pool::IdleCharged => {
                let charged = room.valence.intrinsic > 0;
                return if charged == (pool == Pool::IdleCharged) {
                    base.end..all.end
                } else {
                    all.end..all.end
                };
            }
        };
        if allowed {
            base
        } else {
            base.start..base.start
        }
    }

    /// How many edges of a matching run between two groups.
    pub(crate) fn multiplicity(&self, mate: impl Fn(u32) -> u32, a: u32, b: u32) -> u32 {
        let range = self.vertices(b);
        self.vertices(a)
            .filter(|&v| range.contains(&mate(v)))
            .count() as u32
    }

    /// How many edges of the placement that was found run between two groups.
    pub(crate) fn placed(&self, a: u32, b: u32) -> u32 {
        self.multiplicity(|v| self.mate[v as usize], a, b)
    }

    /// Charge and open valences of an atom in a placement.
    pub(crate) fn charge_and_open(&self, mate: impl Fn(u32) -> u32, group: u32) -> (i32, u32) {
        let room = &self.rooms[group as usize];
        let count = |pool| self.multiplicity(&mate, group, self.pool_group(pool)) as i32;
        let onium = room.onium as i32 - count(Pool::Idle) - count(Pool::IdleCharged);
        let negative = count(Pool::NegativeHetero) + count(Pool::NegativeCarbon);
        let charge = i32::from(room.valence.intrinsic) + onium + count(Pool::Positive) - negative;
        (charge, count(Pool::Open) as u32)
    }

    /// Charge and open valences of an atom in the placement that was found.
    pub(crate) fn placed_charge_and_open(&self, group: u32) -> (i32, u32) {
        self.charge_and_open(|v| self.mate[v as usize], group)
    }

    /// Open valences of the whole system.
    pub(crate) fn open_total(&self) -> u32 {
        self.pools[Pool::Open as usize]
    }
}
