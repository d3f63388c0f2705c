//! The least distance of two constitutions by trying every map.

use molkin_graph::Element;
use molkin_relate::{Explanation, Structure};

/// Bonds that only one has, kept bonds of other order, differences in hydrogen count.
type Distance = (usize, usize, usize);

/// The distance that an explanation states; `None` where it shows no bonds.
pub fn stated_distance(explanation: &Explanation) -> Option<Distance> {
    let bonds = explanation.bonds.as_ref()?;
    let hydrogens = explanation.hydrogens.iter();
    Some((
        bonds.only_in_a.len() + bonds.only_in_b.len(),
        bonds.order_changed.len(),
        hydrogens
            .map(|h| usize::from(h.count_a.abs_diff(h.count_b)))
            .sum(),
    ))
}

/// The least distance over all one-to-one maps of the non-hydrogen atoms that keep the element, as
/// docs/definitions.md defines it. Exponential: for a handful of atoms.
///
/// # Panics
/// If the structures are not isomers.
pub fn least_distance(a: &Structure, b: &Structure) -> Distance {
    let (a, b) = (Heavy::of(a), Heavy::of(b));
    let mut image = Vec::new();
    let mut costs = vec![(0, 0, 0)];
    let mut best: Option<Distance> = None;
    let mut next = 0;
    // Counts through all injections; one whose part already costs as much as the best whole is
    // left, since costs only grow.
    loop {
        let done = image.len();
        let cost = costs[done];
        let hopeless = best.is_some_and(|best| cost >= best);
        if done == a.elements.len() && !hopeless {
            best = Some(cost);
        }
        let open = done < a.elements.len() && !hopeless;
        let candidate = (next..b.elements.len())
            .find(|&to| open && a.elements[done] == b.elements[to] && !image.contains(&to));
        match (candidate, image.last()) {
            (Some(to), _) => {
                costs.push(a.cost(&b, &image, to, cost));
                image.push(to);
                next = 0;
            }
            (None, Some(&last)) => {
                image.pop();
                costs.pop();
                next = last + 1;
            }
            (None, None) => return best.unwrap_or_else(|| panic!("isomers have a map")),
        }
    }
}

/// Non-hydrogen atoms with their bond orders; 0 for no bond, 9 for a mobile one.
struct Heavy {
    elements: Vec<Element>,
    hydrogens: Vec<u8>,
    orders: Vec<Vec<u8>>,
}

impl Heavy {
    fn of(structure: &Structure) -> Self {
        let form = structure.canonical().normal_form();
        let heavy: Vec<usize> = (0..form.atoms.len())
            .filter(|&at| form.atoms[at].element != Element::HYDROGEN)
            .collect();
        let place = |at: u32| heavy.iter().position(|&other| other == at as usize);
        let mut orders = vec![vec![0; heavy.len()]; heavy.len()];
        for bond in &form.bonds {
            if let (Some(x), Some(y)) = (place(bond.a), place(bond.b)) {
                orders[x][y] = bond.order.unwrap_or(9);
                orders[y][x] = orders[x][y];
            }
        }
        Self {
            elements: heavy.iter().map(|&at| form.atoms[at].element).collect(),
            hydrogens: heavy.iter().map(|&at| form.atoms[at].hydrogens).collect(),
            orders,
        }
    }

    /// The cost once the next atom is laid on `to`.
    fn cost(&self, other: &Self, image: &[usize], to: usize, cost: Distance) -> Distance {
        let atom = image.len();
        let (mut bonds, mut orders, mut hydrogens) = cost;
        hydrogens += usize::from(self.hydrogens[atom].abs_diff(other.hydrogens[to]));
        for (earlier, &far) in image.iter().enumerate() {
            let (own, others) = (self.orders[atom][earlier], other.orders[to][far]);
            bonds += usize::from((own == 0) != (others == 0));
            orders += usize::from(own != 0 && others != 0 && own != others);
        }
        (bonds, orders, hydrogens)
    }
}
