//! The map between records of different constitution, of one formula or of two, and what it keeps.

use std::collections::HashMap;

use molkin_graph::Limits;

use crate::{
    Structure, functional_groups,
    mapping::{self, Effort, Heavy, Mapping, sides},
};

use super::{Explanation, LeftOver, branching, functional, left_over, moves, rings};

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
    /// Whether at least a third of the bonds of both together, and more than six, are in one only,
    /// however the atoms are mapped: then single differences say nothing. `None`: the search ended too early to tell.
    pub unrelated: Option<bool>,
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
    // Groups too symmetric for the limit have no say in the choice of the map.
    let groups = [a, b].map(|side| functional_groups(side, limits).ok());
    let sides = sides([a, b], [left, right], &groups);
    let effort = Effort {
        steps: limits.map_steps,
        stop: limits.stop,
    };
    let unmapped = Explanation {
        branching: Some([branching::of(a), branching::of(b)]),
        rings: Some([rings::of(a), rings::of(b)]),
        stereo_least: true,
        ..Explanation::default()
    };
    // Each side lists its bonds once, so there is always a map.
    let Ok(mapping) = mapping::map_atoms(&sides[0], &sides[1], &effort) else {
        return unmapped;
    };
    let pairs = mapping.pairs.iter();
    let pairs = pairs.map(|&(x, y)| (&left.atoms[x as usize], &right.atoms[y as usize]));
    let mut atom_map: Vec<(u32, u32)> = pairs.clone().map(|(x, y)| (x.source, y.source)).collect();
    atom_map.sort_unstable();
    let differing = pairs.filter(|(x, y)| x.hydrogens != y.hydrogens);
    let mut hydrogens: Vec<HydrogenDifference> = differing
        .map(|(x, y)| HydrogenDifference {
            a: x.source,
            b: y.source,
            count_a: x.hydrogens,
            count_b: y.hydrogens,
        })
        .collect();
    hydrogens.sort_unstable_by_key(|h| h.a);
    Explanation {
        functional_groups: functional::differences(groups, &atom_map),
        atom_map,
        bonds: Some(bonds_under(&mapping, left, right)),
        hydrogens,
        left_over: left_over_pieces(&mapping, [a, b], &heavy),
        findings: moves::findings([a, b], &heavy, &sides, &mapping, limits),
        steps: mapping.steps,
        ..unmapped
    }
}

fn left_over_pieces(
    mapping: &Mapping,
    structures: [&Structure; 2],
    heavy: &[Heavy; 2],
) -> [Vec<LeftOver>; 2] {
    let left_over = [&mapping.left_over_a, &mapping.left_over_b];
    [0, 1].map(|side| {
        let mut mapped = vec![true; heavy[side].atoms.len()];
        for &atom in left_over[side] {
            mapped[atom as usize] = false;
        }
        left_over::pieces(structures[side], &heavy[side], &mapped)
    })
}

fn bonds_under(mapping: &Mapping, left: &Heavy, right: &Heavy) -> BondDifference {
    let mut image = vec![None; left.atoms.len()];
    for &(atom, to) in &mapping.pairs {
        image[atom as usize] = Some(to);
    }
    let proved = mapping.proved;
    BondDifference {
        minimal: proved.bonds && proved.orders && proved.hydrogens,
        at_least: mapping.bonds_at_least as usize,
        unrelated: mapping.is_unrelated(),
        ..difference(left, right, &image)
    }
}

fn difference(left: &Heavy, right: &Heavy, image: &[Option<u32>]) -> BondDifference {
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
        let images = image[a as usize].zip(image[b as usize]);
        let laid = images.and_then(|(x, y)| Some((x, y, in_b.remove(&(x.min(y), x.max(y)))?)));
        match laid {
            None => found.only_in_a.push(source(left, a, b)),
            Some((x, y, other)) => {
                found.kept += 1;
                if other != order {
                    let changed = (source(left, a, b), source(right, x, y));
                    found.order_changed.push(changed);
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
