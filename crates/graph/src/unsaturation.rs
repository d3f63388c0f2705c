//! Degree of unsaturation: rings and π bonds.

use crate::{Element, Molecule};

/// Rings plus π bonds of a molecule.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub struct Unsaturation {
    /// Counted on the drawing, which is exact for any valence: components + Σ(bond orders) − atoms,
    /// hydrogens included.
    pub exact: i64,
    /// The textbook formula (2C + 2 + N − H − X)/2 with group valences 4, 3, 2 and 1, doubled: it is
    /// odd for radicals and some ions. `None` where the molecule has an element it says nothing of.
    pub textbook_doubled: Option<i64>,
}

impl Molecule {
    /// The degree of unsaturation. The two figures differ where valences are unusual (S=O, P=O, a
    /// pentavalent nitrogen) or charged.
    pub fn unsaturation(&self) -> Unsaturation {
        let (mut atoms, mut orders) = (0i64, 0i64);
        let mut doubled = Some(2);
        for atom in self.atoms() {
            let hydrogens = i64::from(atom.hydrogens);
            atoms += 1 + hydrogens;
            orders += hydrogens;
            doubled = doubled.and_then(|sum| Some(sum + excess_valence(atom.element)? - hydrogens));
        }
        orders += self
            .bonds()
            .map(|(_, _, order)| i64::from(order.pairs()))
            .sum::<i64>();
        let components = petgraph::algo::connected_components(self.graph()) as i64;
        // The textbook formula counts one component; each further one takes two more valences.
        let doubled = doubled.map(|sum| sum + 2 * (components - 1).max(0));
        Unsaturation {
            exact: components + orders - atoms,
            textbook_doubled: doubled,
        }
    }
}

/// Valence less two, for the elements of the textbook formula.
fn excess_valence(element: Element) -> Option<i64> {
    if element == Element::HYDROGEN {
        return Some(-1);
    }
    match element.group() {
        Some(14) if element.period() <= 4 => Some(2),
        Some(15) if element.period() <= 4 => Some(1),
        Some(16) if element.period() <= 5 => Some(0),
        Some(17) => Some(-1),
        Some(13) if element == Element::BORON => Some(1),
        _ => None,
    }
}
