//! The same molecule with its double bonds in other places.

use std::collections::{BTreeMap, BTreeSet};

use molkin_graph::{BondOrder, Molecule, MoleculeBuilder, Shape};

use crate::Numbers;

/// A molecule in which double bonds of some rings have shifted by one place; itself where no ring
/// lets them. Rings with a marked double bond stay as they are.
///
/// # Panics
/// If the molecule cannot be rebuilt.
pub fn other_kekule_form(molecule: &Molecule, numbers: &mut Numbers) -> Molecule {
    let mut bonds: BTreeMap<(u32, u32), BondOrder> = molecule
        .bonds()
        .map(|(a, b, order)| ((a.min(b), a.max(b)), order))
        .collect();
    let marked: BTreeSet<u32> = molecule
        .drawn_stereo()
        .iter()
        .filter(|mark| mark.shape != Shape::Tetrahedral)
        .flat_map(|mark| mark.centres)
        .collect();
    let mut starts = partners(&bonds, molecule.atom_count(), &marked);
    numbers.shuffle(&mut starts);
    for (a, _) in starts {
        if numbers.coin() {
            shift(&mut bonds, molecule, a, &marked, numbers);
        }
    }
    let mut builder = MoleculeBuilder::new();
    molecule.atoms().for_each(|atom| {
        builder.add_atom(*atom);
    });
    for (&(a, b), &order) in &bonds {
        builder.add_bond(a, b, order).unwrap();
    }
    for mark in molecule.drawn_stereo() {
        builder.add_stereo(*mark);
    }
    for mark in molecule.drawn_coordination() {
        builder.add_coordination(mark.clone());
    }
    for group in molecule.stereo_groups() {
        builder.add_group(group.clone());
    }
    builder.build().unwrap()
}

/// The two ends of each double bond, both ways, where it is the only π bond of both and neither is
/// an end of a marked one.
fn partners(
    bonds: &BTreeMap<(u32, u32), BondOrder>,
    atoms: usize,
    marked: &BTreeSet<u32>,
) -> Vec<(u32, u32)> {
    let mut multiple = vec![0; atoms];
    for (&(a, b), &order) in bonds {
        let weight = match order {
            BondOrder::Single => 0,
            BondOrder::Double => 1,
            _ => 2,
        };
        multiple[a as usize] += weight;
        multiple[b as usize] += weight;
    }
    let free = |atom: &u32| multiple[*atom as usize] == 1 && !marked.contains(atom);
    let double = bonds
        .iter()
        .filter(|&(_, &order)| order == BondOrder::Double);
    double
        .filter(|((a, b), _)| free(a) && free(b))
        .flat_map(|(&(a, b), _)| [(a, b), (b, a)])
        .collect()
}

/// Turns single bonds into double ones and the reverse along a ring of alternating bonds through
/// the double bond of `start`, if the walk finds one: depth-first, each double bond once.
fn shift(
    bonds: &mut BTreeMap<(u32, u32), BondOrder>,
    molecule: &Molecule,
    start: u32,
    marked: &BTreeSet<u32>,
    numbers: &mut Numbers,
) {
    let partner: BTreeMap<u32, u32> = partners(bonds, molecule.atom_count(), marked)
        .into_iter()
        .collect();
    let Some(&second) = partner.get(&start) else {
        return;
    };
    // Each entry ends a double bond; its index in `before` is that of the double bond before it.
    let mut before: BTreeMap<u32, u32> = BTreeMap::from([(second, second)]);
    let mut waiting = vec![second];
    while let Some(atom) = waiting.pop() {
        let mut next: Vec<u32> = molecule.neighbours(atom).map(|(to, _)| to).collect();
        numbers.shuffle(&mut next);
        for to in next {
            if to == partner[&atom] {
                continue;
            }
            if to == start {
                return turn(bonds, &partner, &before, atom, start);
            }
            let Some(&far) = partner.get(&to) else {
                continue;
            };
            if !before.contains_key(&far) && !before.contains_key(&to) {
                before.insert(far, atom);
                waiting.push(far);
            }
        }
    }
}

fn turn(
    bonds: &mut BTreeMap<(u32, u32), BondOrder>,
    partner: &BTreeMap<u32, u32>,
    before: &BTreeMap<u32, u32>,
    last: u32,
    start: u32,
) {
    let mut set = |a: u32, b: u32, order| bonds.insert((a.min(b), a.max(b)), order);
    let (mut atom, mut entered) = (last, start);
    loop {
        set(atom, entered, BondOrder::Double);
        entered = partner[&atom];
        set(atom, entered, BondOrder::Single);
        if before[&atom] == atom {
            return;
        }
        atom = before[&atom];
    }
}

#[cfg(test)]
mod tests {
    use rstest::rstest;

    use super::*;
    use crate::Comparer;

    /// Numbers of perfect matchings (Cyvin and Gutman, Kekulé Structures in Benzenoid
    /// Hydrocarbons, 1988, from memory).
    #[rstest]
    #[case::benzene("C1=CC=CC=C1", 2)]
    #[case::naphthalene("C1=CC=C2C=CC=CC2=C1", 3)]
    #[case::phenanthrene("C1=CC=C2C(=C1)C=CC3=CC=CC=C32", 5)]
    #[case::cyclohexadiene("C1=CC=CCC1", 1)]
    #[case::marked_annulene("C1=CC=C/C=C/C=CC=C1", 1)]
    fn every_kekule_structure_is_met(#[case] text: &str, #[case] stated: usize) {
        let mut numbers = Numbers::new(1);
        let first = Comparer::default().molecule(text).unwrap();
        let mut found = BTreeSet::new();
        let mut molecule = first;
        for _ in 0..200 {
            let mut bonds: Vec<_> = molecule
                .bonds()
                .map(|(a, b, order)| (a.min(b), a.max(b), order as u8))
                .collect();
            bonds.sort_unstable();
            found.insert(bonds);
            molecule = other_kekule_form(&molecule, &mut numbers);
        }
        assert_eq!(found.len(), stated);
    }
}
