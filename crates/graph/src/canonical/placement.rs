//! The placement of π bonds and charges that canonical text writes.

use crate::{
    Element,
    mesomer::{self, First, Mesomer},
    order::Labelling,
    skeleton::Skeleton,
};

/// Bond orders and charges of one valence structure, on the skeleton; scratch that is reused.
#[derive(Debug, Default)]
pub(super) struct Placed {
    pub(super) orders: Vec<u8>,
    pub(super) charges: Vec<i8>,
    first: First,
    /// Neighbours that may take a charge: how soon, rank, atom, bond.
    partners: Vec<(u8, u32, u32, u32)>,
}

impl Placed {
    /// Of all best placements the first in canonical order: bonds that carry a mark (`marked`, by
    /// bond) before the others, then by the ranks of their atoms, each as high an order as the bonds
    /// before it allow, then charges. Charge-separated centres below the second row are then written
    /// in the customary form (S=O, P=O).
    pub(super) fn place(
        &mut self,
        skeleton: &Skeleton,
        mesomer: &Mesomer,
        labelling: &Labelling,
        marked: impl Fn(u32) -> bool,
    ) {
        let Self {
            orders,
            charges,
            first,
            ..
        } = self;
        orders.clone_from(&mesomer.orders);
        charges.clear();
        let atoms = skeleton.atoms.iter().zip(&mesomer.states);
        charges.extend(atoms.map(|(atom, state)| {
            if state.mobile {
                atom.charge
            } else {
                state.charge
            }
        }));
        first.place(
            (skeleton, mesomer),
            &labelling.rank,
            marked,
            orders,
            charges,
        );
        self.customary(skeleton, labelling);
    }

    /// Electron pairs of a bond that count as valence.
    fn valence(&self, bond: u32) -> u8 {
        match self.orders[bond as usize] {
            order @ 1..=4 => order,
            _ => 0,
        }
    }

    /// Neutralises charge-separated pairs at third-row and heavier centres of groups 15–17: oxygen
    /// first, then its group, then nitrogen; a phosphorus ylide is written with a double bond as well.
    fn customary(&mut self, skeleton: &Skeleton, labelling: &Labelling) {
        let rank = &labelling.rank;
        for &centre in &labelling.order {
            let element = skeleton.atoms[centre as usize].element;
            // Only where reading the customary form would separate the charges again.
            if self.charges[centre as usize] <= 0
                || element.is_metal()
                || !matches!(element.group(), Some(15..=17))
                || element.period() < 3
                || !is_full(skeleton, self, centre)
            {
                continue;
            }
            self.partners.clear();
            for &(to, bond) in skeleton.arcs(centre) {
                let class = match skeleton.atoms[to as usize].element {
                    Element::OXYGEN => 0,
                    other if other.group() == Some(16) => 1,
                    Element::NITROGEN => 2,
                    Element::CARBON if element == Element::PHOSPHORUS => 3,
                    _ => continue,
                };
                self.partners.push((class, rank[to as usize], to, bond));
            }
            self.partners.sort_unstable();
            for at in 0..self.partners.len() {
                let (_, _, to, bond) = self.partners[at];
                while self.charges[centre as usize] > 0
                    && self.charges[to as usize] < 0
                    && is_full(skeleton, self, to)
                    && (1..3).contains(&self.orders[bond as usize])
                {
                    self.charges[centre as usize] -= 1;
                    self.charges[to as usize] += 1;
                    self.orders[bond as usize] += 1;
                }
            }
        }
    }
}

/// Whether an atom has exactly the bonds that its charge gives room for: no open valence, no octet
/// exceeded or broken up.
fn is_full(skeleton: &Skeleton, placed: &Placed, atom: u32) -> bool {
    let record = &skeleton.atoms[atom as usize];
    let bonds = skeleton.arcs(atom).iter();
    let drawn: i32 = bonds
        .map(|&(_, bond)| i32::from(placed.valence(bond)))
        .sum();
    drawn + i32::from(record.hydrogens)
        == mesomer::neutral_valence(record.element) + i32::from(placed.charges[atom as usize])
}
