//! The tautomer that stands for a class: the first in the canonical order of the class.

use crate::{
    Canonical, Element,
    matching::{Matching, NONE},
    skeleton::Skeleton,
};

use super::{
    region::{self, Regions},
    room::{Drawing, Room},
};

/// Chooses the tautomer; owns the scratch.
#[derive(Debug, Default)]
pub(super) struct Placement {
    settled: Vec<bool>,
    /// Sites by preference and rank.
    sites: Vec<(u8, u32, u32)>,
    /// Bonds by the ranks of their ends.
    bonds: Vec<(u32, u32, u32)>,
}

impl Placement {
    /// Puts hydrogens on the sites in order of preference, then of rank, on each as many as some
    /// tautomer with those placed before has there; then π bonds, then charges, the same way. The
    /// matching is that tautomer afterwards.
    pub(super) fn place(
        &mut self,
        view: &Canonical,
        (rooms, regions): (&[Room], &Regions),
        members: &[u32],
        matching: &mut Matching,
    ) {
        self.settled.clear();
        self.settled.resize(matching.mates().len(), false);
        let rank = |atom: u32| view.written().rank[atom as usize];
        self.sites.clear();
        let is_site = |&&atom: &&u32| rooms[atom as usize].site && regions.region[atom as usize] != NONE;
        for &atom in members.iter().filter(is_site) {
            let preference = preference(view, regions, atom);
            self.sites.push((preference, rank(atom), atom));
        }
        self.sites.sort_unstable();
        for at in 0..self.sites.len() {
            let (_, _, atom) = self.sites[at];
            let pools = &regions.pools[regions.region[atom as usize] as usize];
            self.raise(matching, regions.vertices(rooms, atom), pools.hydrogen());
        }
        self.bonds.clear();
        for (index, bond) in (0..).zip(&view.skeleton.bonds) {
            let inside = [bond.a, bond.b].iter().all(|atom| members.binary_search(atom).is_ok());
            if inside && regions.shifts[index as usize] {
                let (a, b) = (rank(bond.a), rank(bond.b));
                self.bonds.push((a.min(b), a.max(b), index));
            }
        }
        self.bonds.sort_unstable();
        for at in 0..self.bonds.len() {
            let (_, _, bond) = self.bonds[at];
            let bond = &view.skeleton.bonds[bond as usize];
            let (a, b) = (regions.vertices(rooms, bond.a), regions.vertices(rooms, bond.b));
            self.raise(matching, a, b);
        }
        for at in 0..self.sites.len() {
            let (_, _, atom) = self.sites[at];
            let pools = &regions.pools[regions.region[atom as usize] as usize];
            self.raise(matching, regions.vertices(rooms, atom), pools.minus());
        }
    }

    /// Makes the number of matching edges between two ranges of vertices as high as it can be, and
    /// settles it.
    fn raise(
        &mut self,
        matching: &mut Matching,
        a: std::ops::Range<u32>,
        b: std::ops::Range<u32>,
    ) {
        while let Some((x, y)) = self.next(matching, a.clone(), b.clone()) {
            for vertex in [x, y] {
                self.settled[vertex as usize] = true;
                matching.set_removed(vertex, true);
            }
        }
        matching.cut(a, b, &self.settled);
    }

    /// The first edge between the ranges that a perfect matching of the rest has, not the one that happens
    /// to be there: the vertices of an atom are not all alike.
    fn next(
        &self,
        matching: &mut Matching,
        a: std::ops::Range<u32>,
        b: std::ops::Range<u32>,
    ) -> Option<(u32, u32)> {
        let open = |vertex: &u32| !self.settled[*vertex as usize];
        for x in a.filter(open) {
            for y in b.clone().filter(open) {
                let joined = matching.neighbours(x).contains(&y);
                if joined && (matching.mate(x) == y || matching.force(x, y)) {
                    return Some((x, y));
                }
            }
        }
        None
    }
}

/// Carbons before heteroatoms, but those that may belong to a flat ring after all else; nitrogen before
/// its like, then sulfur and oxygen.
fn preference(view: &Canonical, regions: &Regions, atom: u32) -> u8 {
    let record = &view.skeleton.atoms[atom as usize];
    if record.element == Element::CARBON {
        let arcs = view.skeleton.arcs(atom).iter();
        let in_ring = arcs.filter(|&&(to, bond)| {
            view.skeleton.ring[bond as usize]
                && regions.region[to as usize] == regions.region[atom as usize]
        });
        return if in_ring.count() >= 2 { 5 } else { 0 };
    }
    match (record.element.group(), record.element.period()) {
        (Some(15), 2) => 1,
        (Some(15), _) => 4,
        (_, 2) => 3,
        _ => 2,
    }
}

/// How many edges of the matching run between two atoms.
pub(super) fn multiplicity(
    regions: &Regions,
    rooms: &[Room],
    matching: &Matching,
    a: u32,
    b: u32,
) -> u8 {
    let others = regions.vertices(rooms, b);
    let vertices = regions.vertices(rooms, a);
    vertices.filter(|&v| others.contains(&matching.mate(v))).count() as u8
}

/// Mobile hydrogens and charge of an atom in the matching.
pub(super) fn state(regions: &Regions, rooms: &[Room], matching: &Matching, atom: u32) -> (u8, i8) {
    let region = regions.region[atom as usize];
    let pools = regions.pools.get(region as usize).copied().unwrap_or_default();
    let vertices = regions.vertices(rooms, atom);
    let count = |range: std::ops::Range<u32>| {
        let own = vertices.clone();
        own.filter(|&v| range.contains(&matching.mate(v))).count() as i8
    };
    let lent = i8::from(regions.lending[atom as usize]) - count(pools.unlent());
    (count(pools.hydrogen()) as u8, lent - count(pools.minus()))
}

/// Draws the tautomer that is in the matching.
pub(super) fn redraw(
    skeleton: &Skeleton,
    (rooms, regions): (&[Room], &Regions),
    matching: &Matching,
    drawing: &mut Drawing,
) {
    let inside = |atom: u32| regions.is_drawn(atom);
    let atoms = || (0..skeleton.len() as u32).filter(|&atom| inside(atom));
    // Before any bond changes: what is drawn now says how many hydrogens stay.
    for atom in atoms() {
        let mobile = region::mobile_hydrogens(skeleton, drawing, rooms, atom) as u8;
        drawing.hydrogens[atom as usize] -= mobile;
    }
    for atom in atoms() {
        let (hydrogens, charge) = state(regions, rooms, matching, atom);
        drawing.hydrogens[atom as usize] += hydrogens;
        drawing.charges[atom as usize] = charge;
    }
    let bonds = skeleton.bonds.iter().zip(&mut drawing.orders);
    for ((bond, order), &shifts) in bonds.zip(&regions.shifts) {
        if shifts && inside(bond.a) && inside(bond.b) {
            *order = 1 + multiplicity(regions, rooms, matching, bond.a, bond.b);
        }
    }
}
