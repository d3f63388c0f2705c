//! The placement of π bonds and charges that canonical text writes.

use crate::{
    Element, Limits,
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
        customary(skeleton, mesomer, &labelling.rank, self);
    }

    /// Electron pairs of a bond that count as valence.
    fn valence(&self, bond: u32) -> u8 {
        match self.orders[bond as usize] {
            order @ 1..=4 => order,
            _ => 0,
        }
    }

    fn bonds_and_charges(&self) -> (Vec<u8>, Vec<i8>) {
        (self.orders.clone(), self.charges.clone())
    }
}

/// Writes charge-separated pairs at third-row and heavier centres of groups 15–17 without charges,
/// wherever reading that separates them again. The octet rule may give up another π bond than the
/// one that is written; a centre where it does keeps its charges.
fn customary(skeleton: &Skeleton, mesomer: &Mesomer, rank: &[u32], placed: &mut Placed) {
    let is_centre = |&atom: &u32| {
        let element = skeleton.atoms[atom as usize].element;
        placed.charges[atom as usize] > 0
            && !element.is_metal()
            && matches!(element.group(), Some(15..=17))
            && element.period() >= 3
    };
    let mut centres: Vec<u32> = (0..skeleton.len() as u32).filter(is_centre).collect();
    if centres.is_empty() {
        return;
    }
    centres.sort_unstable_by_key(|&atom| rank[atom as usize]);
    let separated = placed.bonds_and_charges();
    for &centre in &centres {
        neutralise(skeleton, rank, centre, placed);
    }
    if placed.bonds_and_charges() == separated || is_restored(skeleton, mesomer, placed) {
        return;
    }
    (placed.orders, placed.charges) = separated;
    for centre in centres {
        let before = placed.bonds_and_charges();
        neutralise(skeleton, rank, centre, placed);
        if placed.bonds_and_charges() != before && !is_restored(skeleton, mesomer, placed) {
            (placed.orders, placed.charges) = before;
        }
    }
}

/// Neutralises a centre against its neighbours: oxygen first, then its group, then nitrogen; a
/// phosphorus ylide is written with a double bond as well.
fn neutralise(skeleton: &Skeleton, rank: &[u32], centre: u32, placed: &mut Placed) {
    if !is_full(skeleton, placed, centre) {
        return;
    }
    let element = skeleton.atoms[centre as usize].element;
    let mut partners: Vec<(u8, u32, u32, u32)> = skeleton
        .arcs(centre)
        .iter()
        .filter_map(|&(to, bond)| {
            let class = match skeleton.atoms[to as usize].element {
                Element::OXYGEN => 0,
                other if other.group() == Some(16) => 1,
                Element::NITROGEN => 2,
                Element::CARBON if element == Element::PHOSPHORUS => 3,
                _ => return None,
            };
            Some((class, rank[to as usize], to, bond))
        })
        .collect();
    partners.sort_unstable();
    for (_, _, to, bond) in partners {
        while placed.charges[centre as usize] > 0
            && placed.charges[to as usize] < 0
            && is_full(skeleton, placed, to)
            && (1..3).contains(&placed.orders[bond as usize])
        {
            placed.charges[centre as usize] -= 1;
            placed.charges[to as usize] += 1;
            placed.orders[bond as usize] += 1;
        }
    }
}

/// Whether a placement, read as a drawing, has the normal form that it was made from.
fn is_restored(skeleton: &Skeleton, mesomer: &Mesomer, placed: &Placed) -> bool {
    let mut drawn = skeleton.clone();
    for (atom, &charge) in drawn.atoms.iter_mut().zip(&placed.charges) {
        atom.charge = charge;
    }
    for (bond, &order) in drawn.bonds.iter_mut().zip(&placed.orders) {
        bond.order = order;
    }
    // The normal form was found within the caller's limits; finding it again takes about as much.
    let unbounded = Limits {
        order_steps: u64::MAX,
        ..Limits::default()
    };
    let mut read = Mesomer::default();
    read.load(&mut drawn, &unbounded, &mut mesomer::Scratch::default())
        .is_ok()
        && read.orders == mesomer.orders
        && read.states == mesomer.states
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
