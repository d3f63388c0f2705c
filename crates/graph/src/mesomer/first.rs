//! The first of the best placements in a given order of atoms.

use crate::{
    matching::{Matching, NONE},
    skeleton::Skeleton,
};

use super::{
    MOBILE, Mesomer,
    placement::{Pool, System, SystemBond},
};

/// Finds first placements; owns the scratch.
#[derive(Debug, Default)]
pub(crate) struct First {
    matching: Matching,
    /// Bonds to settle: whether after the others, the ranks of the two atoms, the bond.
    bonds: Vec<(bool, u32, u32, u32)>,
    /// The atoms of a system in their order, each with its rank.
    groups: Vec<(u32, u32)>,
    settled: Vec<bool>,
    edges: Vec<(u32, u32)>,
}

impl First {
    /// Of the best placements the one that is first: bonds that `marked` names come before the
    /// others, and each sort goes by the ranks of their atoms; each gets the highest order that is
    /// still possible, then charges the same way. Orders and charges that are fixed stay as they are.
    pub(crate) fn place(
        &mut self,
        (skeleton, mesomer): (&Skeleton, &Mesomer),
        rank: &[u32],
        marked: impl Fn(u32) -> bool,
        orders: &mut [u8],
        charges: &mut [i8],
    ) {
        self.matching.budget = u64::MAX;
        for ring in mesomer.shifting.lone_rings.iter() {
            alternate(ring, skeleton, rank, &marked, orders);
        }
        for system in &mesomer.systems {
            let mobile = system
                .bonds
                .iter()
                .any(|bond| mesomer.orders[bond.bond as usize] == MOBILE)
                || system
                    .atoms
                    .iter()
                    .any(|&atom| mesomer.states[atom as usize].mobile);
            if mobile && !system.mate.is_empty() {
                self.place_system(system, rank, &marked, orders, charges);
            }
        }
        if !mesomer.shifting.joined.is_empty() {
            self.shift((skeleton, mesomer), rank, marked, orders);
        }
    }

    /// The same for bonds that ring shifts move, lone rings apart. The fixed bonds are the same in all placements, so
    /// the placements are the perfect matchings of the graph of the mobile ones, of which the drawing
    /// shows one.
    fn shift(
        &mut self,
        (skeleton, mesomer): (&Skeleton, &Mesomer),
        rank: &[u32],
        marked: impl Fn(u32) -> bool,
        orders: &mut [u8],
    ) {
        let Self {
            matching, bonds, ..
        } = self;
        matching.reset(skeleton.len());
        bonds.clear();
        for &bond in &mesomer.shifting.joined {
            let ends = &skeleton.bonds[bond as usize];
            matching.add_edge(ends.a, ends.b);
            if ends.order == 2 {
                matching.join(ends.a, ends.b);
            }
            let (a, b) = (rank[ends.a as usize], rank[ends.b as usize]);
            bonds.push((!marked(bond), a.min(b), a.max(b), bond));
        }
        matching.connect();
        bonds.sort_unstable();
        for &(_, _, _, bond) in bonds.iter() {
            let ends = &skeleton.bonds[bond as usize];
            let (a, b) = (ends.a, ends.b);
            // Neither end is settled yet, and a perfect matching of the rest has the bond. A bond
            // that none has will not come back: what is left only shrinks.
            let double = matching.mate(a) != NONE
                && matching.mate(b) != NONE
                && (matching.mate(a) == b || matching.force(a, b));
            orders[bond as usize] = 1 + u8::from(double);
            if double {
                matching.part(a);
                for atom in [a, b] {
                    matching.set_removed(atom, true);
                }
            }
        }
    }
}

/// The same for a ring whose bonds come in turn and that no mobile bond joins to others: its first
/// bond is double, and that settles the rest.
fn alternate(
    ring: &[u32],
    skeleton: &Skeleton,
    rank: &[u32],
    marked: impl Fn(u32) -> bool,
    orders: &mut [u8],
) {
    let place = |bond: u32| {
        let ends = &skeleton.bonds[bond as usize];
        let (a, b) = (rank[ends.a as usize], rank[ends.b as usize]);
        (!marked(bond), a.min(b), a.max(b))
    };
    let places = ring.iter().enumerate();
    let first = places.min_by_key(|&(_, &bond)| place(bond));
    let first = first.map_or(0, |(at, _)| at);
    for (at, &bond) in ring.iter().enumerate() {
        orders[bond as usize] = if at % 2 == first % 2 { 2 } else { 1 };
    }
}

impl First {
    /// The same for a system with charges or open valences.
    fn place_system(
        &mut self,
        system: &System,
        rank: &[u32],
        marked: impl Fn(u32) -> bool,
        orders: &mut [u8],
        charges: &mut [i8],
    ) {
        let Self {
            matching,
            bonds,
            groups,
            settled,
            edges,
        } = self;
        system.connect(matching);
        matching.restore(&system.mate);
        let rank_of = |at: u32| rank[system.atoms[at as usize] as usize];
        bonds.clear();
        bonds.extend((0..).zip(&system.bonds).map(|(at, bond)| {
            let (a, b) = (rank_of(bond.a), rank_of(bond.b));
            (!marked(bond.bond), a.min(b), a.max(b), at)
        }));
        bonds.sort_unstable();
        settled.clear();
        settled.resize(system.mate.len(), false);
        let mut choice = Choice {
            system,
            matching,
            settled,
            edges,
        };
        for &(_, _, _, at) in &*bonds {
            let SystemBond { bond, a, b } = system.bonds[at as usize];
            let (a, b) = if rank_of(a) < rank_of(b) {
                (a, b)
            } else {
                (b, a)
            };
            orders[bond as usize] = 1 + choice.raise(a, b);
        }
        groups.clear();
        groups.extend((0..system.atoms.len() as u32).map(|at| (rank_of(at), at)));
        groups.sort_unstable();
        for &(_, group) in &*groups {
            for pool in [
                Pool::NegativeHetero,
                Pool::NegativeCarbon,
                Pool::Positive,
                Pool::Open,
            ] {
                choice.raise(group, system.pool_group(pool));
            }
        }
        let mate = choice.matching.mates();
        for &(_, group) in &*groups {
            let (charge, _) = system.charge_and_open(|v| mate[v as usize], group);
            charges[system.atoms[group as usize] as usize] = charge as i8;
        }
    }
}

/// A matching in which more and more is settled.
struct Choice<'a> {
    system: &'a System,
    matching: &'a mut Matching,
    settled: &'a mut [bool],
    edges: &'a mut Vec<(u32, u32)>,
}

impl Choice<'_> {
    /// Makes the number of matching edges between two groups as high as it can be, settles it, and
    /// returns it.
    fn raise(&mut self, a: u32, b: u32) -> u8 {
        let mut count = 0;
        while self.settle_one(a, b) {
            count += 1;
        }
        self.matching.cut(
            self.system.vertices(a),
            self.system.vertices(b),
            self.settled,
        );
        count
    }

    /// Settles one more edge between the groups if some perfect matching has it.
    fn settle_one(&mut self, a: u32, b: u32) -> bool {
        let Self {
            system,
            matching,
            settled,
            edges,
        } = self;
        let pairs = system
            .vertices(a)
            .flat_map(|x| system.vertices(b).map(move |y| (x, y)));
        edges.clear();
        edges.extend(pairs.filter(|&(x, y)| {
            !settled[x as usize] && !settled[y as usize] && matching.neighbours(x).contains(&y)
        }));
        // The first edge that some perfect matching has, not the one that happens to be present:
        // vertices of an atom are not all alike, and the choice may not depend on the drawing.
        let mut edges = edges.iter().copied();
        let found = edges.find(|&(x, y)| matching.mate(x) == y || matching.force(x, y));
        if let Some((x, y)) = found {
            for vertex in [x, y] {
                self.settled[vertex as usize] = true;
                self.matching.set_removed(vertex, true);
            }
        }
        found.is_some()
    }
}
