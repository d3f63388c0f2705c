//! Random small isomers.

use molkin_graph::{Atom, BondOrder, Element, Molecule, MoleculeBuilder};

use crate::Numbers;

/// Two random molecules of one formula with `atoms` non-hydrogen atoms (at least 2), connected and
/// with ordinary valences.
pub fn small_isomers(numbers: &mut Numbers, atoms: usize) -> [Molecule; 2] {
    const ELEMENTS: [(Element, u8); 8] = [
        (Element::CARBON, 4),
        (Element::CARBON, 4),
        (Element::CARBON, 4),
        (Element::CARBON, 4),
        (Element::NITROGEN, 3),
        (Element::NITROGEN, 3),
        (Element::OXYGEN, 2),
        (Element::FLUORINE, 1),
    ];
    loop {
        let kinds: Vec<(Element, u8)> = (0..atoms)
            .map(|_| ELEMENTS[numbers.below(ELEMENTS.len())])
            .collect();
        let more = numbers.below(5);
        let pair = [(); 2].map(|()| molecule(numbers, &kinds, more));
        if let [Some(a), Some(b)] = pair {
            return [a, b];
        }
    }
}

/// A random tree, and `more` further electron pairs between random atoms; `None` where valences
/// run out, which with so few atoms is often enough.
fn molecule(numbers: &mut Numbers, kinds: &[(Element, u8)], more: usize) -> Option<Molecule> {
    let mut kinds = kinds.to_vec();
    numbers.shuffle(&mut kinds);
    let count = kinds.len();
    let mut free: Vec<u8> = kinds.iter().map(|&(_, valence)| valence).collect();
    let mut orders = vec![vec![0u8; count]; count];
    for later in 1..count {
        let open: Vec<usize> = (0..later).filter(|&atom| free[atom] > 0).collect();
        let earlier = *open.get(numbers.below(open.len().max(1)))?;
        join(&mut orders, &mut free, earlier, later);
    }
    for _ in 0..more {
        let mut open = Vec::new();
        for b in 0..count {
            open.extend(
                (0..b)
                    .filter(|&a| free[a] > 0 && free[b] > 0 && orders[a][b] < 3)
                    .map(|a| (a, b)),
            );
        }
        let (a, b) = *open.get(numbers.below(open.len().max(1)))?;
        join(&mut orders, &mut free, a, b);
    }
    let mut builder = MoleculeBuilder::new();
    for (&(element, _), &hydrogens) in kinds.iter().zip(&free) {
        builder.add_atom(Atom {
            hydrogens,
            ..Atom::new(element)
        });
    }
    for (a, row) in orders.iter().enumerate() {
        for (b, &pairs) in row.iter().enumerate() {
            if let Some(order) = BondOrder::from_pairs(pairs) {
                builder.add_bond(a as u32, b as u32, order).ok()?;
            }
        }
    }
    builder.build().ok()
}

fn join(orders: &mut [Vec<u8>], free: &mut [u8], a: usize, b: usize) {
    orders[a][b] += 1;
    free[a] = free[a].saturating_sub(1);
    free[b] = free[b].saturating_sub(1);
}
