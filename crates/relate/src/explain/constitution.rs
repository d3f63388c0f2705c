//! The map between constitutional isomers and what it keeps.

use std::collections::HashMap;

use molkin_graph::Limits;

use crate::{
    Structure,
    mapping::{self, Effort, Heavy, sides},
};

use super::{Explanation, branching, moves};

/// Bonds under an atom map; atoms from 0. Bonds to hydrogen are not counted.
#[derive(Debug, Clone, PartialEq, Eq, Default)]
pub struct BondDifference {
    /// Bonds that both have, those of changed order included.
    pub kept: usize,
    /// Bonds that only A has, lower atom first.
    pub only_in_a: Vec<(u32, u32)>,
    /// Bonds that only B has, lower atom first.
    pub only_in_b: Vec<(u32, u32)>,
    /// Kept bonds of different order: the bond in A and in B. A mobile bond has an order of its own.
    pub order_changed: Vec<((u32, u32), (u32, u32))>,
    /// Whether bonds, orders and hydrogens are all proved to differ as little as possible.
    pub minimal: bool,
    /// Proved: no map has fewer bonds that only one record has.
    pub at_least: usize,
}

/// A pair of mapped atoms with different numbers of hydrogens; atoms from 0.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub struct HydrogenDifference {
    /// The atom in A.
    pub a: u32,
    /// The atom in B.
    pub b: u32,
    /// Hydrogens on it in A.
    pub count_a: u8,
    /// Hydrogens on it in B.
    pub count_b: u8,
}

pub(super) fn explain(a: &Structure, b: &Structure, limits: &Limits) -> Explanation {
    let heavy = [a, b].map(Heavy::of);
    let [left, right] = &heavy;
    let sides = sides(left, right);
    let effort = Effort {
        steps: limits.map_steps,
        stop: limits.stop,
    };
    let branching = Some([branching::of(a), branching::of(b)]);
    // Constitutional isomers have equal formulae and each side lists its bonds once, so all atoms
    // are mapped. Should one be left over all the same, there is no map to show.
    let found = mapping::map_atoms(&sides[0], &sides[1], &effort).ok();
    let whole = found.filter(|found| found.left_over_a.is_empty() && found.left_over_b.is_empty());
    let Some(mapping) = whole else {
        return Explanation {
            branching,
            stereo_least: true,
            ..Explanation::default()
        };
    };
    let pairs: Vec<u32> = mapping.pairs.iter().map(|&(_, image)| image).collect();
    let mut atom_map: Vec<(u32, u32)> = left
        .atoms
        .iter()
        .zip(&pairs)
        .map(|(atom, &image)| (atom.source, right.atoms[image as usize].source))
        .collect();
    atom_map.sort_unstable();
    let mut hydrogens: Vec<HydrogenDifference> = left
        .atoms
        .iter()
        .zip(&pairs)
        .map(|(atom, &image)| (atom, &right.atoms[image as usize]))
        .filter(|(x, y)| x.hydrogens != y.hydrogens)
        .map(|(x, y)| HydrogenDifference {
            a: x.source,
            b: y.source,
            count_a: x.hydrogens,
            count_b: y.hydrogens,
        })
        .collect();
    hydrogens.sort_unstable_by_key(|h| h.a);
    let mut bonds = difference(left, right, &pairs);
    let proved = mapping.proved;
    bonds.minimal = proved.bonds && proved.orders && proved.hydrogens;
    bonds.at_least = mapping.bonds_at_least as usize;
    Explanation {
        atom_map,
        bonds: Some(bonds),
        hydrogens,
        branching,
        findings: moves::findings([a, b], &heavy, &sides, &mapping, limits),
        stereo: Vec::new(),
        stereo_least: true,
        steps: mapping.steps,
    }
}

fn difference(left: &Heavy, right: &Heavy, pairs: &[u32]) -> BondDifference {
    let source = |side: &Heavy, a: u32, b: u32| {
        let (a, b) = (side.atoms[a as usize].source, side.atoms[b as usize].source);
        (a.min(b), a.max(b))
    };
    let mut in_b: HashMap<(u32, u32), u8> = right
        .bonds
        .iter()
        .map(|&(a, b, order)| ((a, b), order))
        .collect();
    let mut found = BondDifference::default();
    for &(a, b, order) in &left.bonds {
        let (x, y) = (pairs[a as usize], pairs[b as usize]);
        match in_b.remove(&(x.min(y), x.max(y))) {
            None => found.only_in_a.push(source(left, a, b)),
            Some(other) => {
                found.kept += 1;
                if other != order {
                    found
                        .order_changed
                        .push((source(left, a, b), source(right, x, y)));
                }
            }
        }
    }
    found
        .only_in_b
        .extend(in_b.keys().map(|&(a, b)| source(right, a, b)));
    found.only_in_a.sort_unstable();
    found.only_in_b.sort_unstable();
    found.order_changed.sort_unstable();
    found
}
