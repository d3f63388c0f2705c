//! Double bonds and cumulated chains of them, with what is attached at their ends.
//!
//! A single bond about which rotation is hindered is a chain of no double bond.

use molkin_graph::Ligand;

use crate::molfile::{
    drawing::{BondKind, BondMark},
    stereo::Scene,
};

/// The largest ring in which a double bond can only be cis.
const FORCED_RING: usize = 7;

/// A double bond, or several in a row, or none.
#[derive(Debug)]
pub(super) struct Chain {
    /// The atoms at its two ends.
    pub(super) ends: [u32; 2],
    /// What the ends carry, atoms first.
    pub(super) ligands: [[Ligand; 2]; 2],
    /// The number of double bonds; 0 for a single bond.
    length: usize,
    /// Whether a bond of the chain is drawn crossed.
    pub(super) crossed: bool,
}

impl Chain {
    /// Whether the ends stand at right angles, as those of an allene do.
    pub(super) fn is_axis(&self) -> bool {
        self.length.is_multiple_of(2)
    }

    /// A single bond between two ends.
    pub(super) fn single(ends: [u32; 2], ligands: [[Ligand; 2]; 2]) -> Self {
        Self {
            ends,
            ligands,
            length: 0,
            crossed: false,
        }
    }

    pub(super) fn is_single(&self) -> bool {
        self.length == 0
    }

    /// The ligands in the order of a stereo mark.
    pub(super) fn all_ligands(&self) -> [Ligand; 4] {
        let [[a, b], [c, d]] = self.ligands;
        [a, b, c, d]
    }
}

/// All chains whose ends can be told apart by geometry, in the order of their first bond. Chains in
/// rings of fewer than eight members are left out. Linear, save for the bounded ring search.
pub(super) fn find(scene: &Scene<'_>) -> Vec<Chain> {
    let mut chains = Vec::new();
    for (index, bond) in (0_u32..).zip(&scene.drawing.bonds) {
        if bond.kind != BondKind::Double {
            continue;
        }
        let [a, b] = bond.ends;
        // A plain double bond starts at either end, a longer chain once from each: the walk from
        // its smaller end is kept.
        let chain = walk(scene, a, index).or_else(|| walk(scene, b, index));
        let small = |chain: &Chain| {
            chain.length < FORCED_RING
                && scene
                    .neighbours
                    .in_ring_within(FORCED_RING, index, bond.ends)
        };
        chains.extend(chain.filter(|chain| !small(chain)));
    }
    chains
}

/// Follows double bonds from an end; `None` where there is no end, or the other one comes first.
fn walk(scene: &Scene<'_>, start: u32, first: u32) -> Option<Chain> {
    if scene.is_linear(start) {
        return None;
    }
    let (mut here, mut bond, mut length, mut crossed) = (start, first, 0, false);
    loop {
        length += 1;
        crossed |= scene.bond(bond).mark == BondMark::Either;
        here = other_end(scene.bond(bond).ends, here);
        if !scene.is_linear(here) {
            break;
        }
        bond = scene
            .neighbours
            .of(here)
            .iter()
            .map(|&(_, next)| next)
            .find(|&next| next != bond)?;
    }
    if length > 1 && here <= start {
        return None;
    }
    let ligands = [
        end_ligands(scene, start, first)?,
        end_ligands(scene, here, bond)?,
    ];
    Some(Chain {
        ends: [start, here],
        ligands,
        length,
        crossed,
    })
}

fn other_end([a, b]: [u32; 2], here: u32) -> u32 {
    if a == here { b } else { a }
}

impl Scene<'_> {
    /// Whether an atom is in the middle of two double bonds and straight: no lone pair bends it.
    fn is_linear(&self, atom: u32) -> bool {
        let site = self.site(atom);
        let bonds = self.neighbours.of(atom);
        bonds.len() == 2
            && bonds
                .iter()
                .all(|&(_, bond)| self.bond(bond).kind == BondKind::Double)
            && site.hydrogens == 0
            && site.idle.is_some_and(|idle| idle < 2)
    }
}

/// What an end carries besides the chain: two ligands in its plane, at least one of them an atom.
fn end_ligands(scene: &Scene<'_>, end: u32, bond: u32) -> Option<[Ligand; 2]> {
    let site = scene.site(end);
    // Outside the main groups a double bond says nothing about the shape.
    site.idle?;
    let mut atoms = scene
        .neighbours
        .of(end)
        .iter()
        .filter(|&&(_, by)| by != bond);
    let (first, second, more) = (atoms.next(), atoms.next(), atoms.next());
    let &(first, _) = first?;
    let second = match (second, more, site.hydrogens) {
        (Some(&(second, _)), None, 0) if !site.has_lone_pair() => Ligand::Atom(second),
        (None, None, 1) if !site.has_lone_pair() => Ligand::Hydrogen,
        (None, None, 0) => Ligand::LonePair,
        _ => return None,
    };
    Some([Ligand::Atom(first), second])
}
