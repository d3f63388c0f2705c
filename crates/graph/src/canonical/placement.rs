//! The placement of π bonds and charges that canonical text writes.

use crate::{
    Element, Limits,
    mesomer::{self, First, Mesomer},
    order::Labelling,
    skeleton::Skeleton,
};

/// Bond orders and charges of one valence structure, on the skeleton.
#[derive(Debug, Default, PartialEq, Eq)]
pub(super) struct Drawing {
    pub(super) orders: Vec<u8>,
    pub(super) charges: Vec<i8>,
}

impl Drawing {
    /// Takes over another drawing, in the memory at hand.
    fn copy(&mut self, other: &Self) {
        self.orders.clone_from(&other.orders);
        self.charges.clone_from(&other.charges);
    }

    /// Electron pairs of a bond that count as valence.
    fn valence(&self, bond: u32) -> u8 {
        match self.orders[bond as usize] {
            order @ 1..=4 => order,
            _ => 0,
        }
    }
}

/// Makes the drawing; owns the scratch.
#[derive(Debug, Default)]
pub(super) struct Placed {
    pub(super) drawing: Drawing,
    first: First,
    /// Charge-separated centres that have a customary form.
    centres: Vec<u32>,
    /// Neighbours to neutralise a centre against: preference, rank, atom, bond.
    partners: Vec<(u8, u32, u32, u32)>,
    separated: Drawing,
    before: Drawing,
    reading: Reading,
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
        let Drawing { orders, charges } = &mut self.drawing;
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
        self.first.place(
            (skeleton, mesomer),
            &labelling.rank,
            marked,
            orders,
            charges,
        );
        self.customary(skeleton, mesomer, &labelling.rank);
    }

    /// Writes charge-separated pairs at third-row and heavier centres of groups 15–17 without charges,
    /// wherever reading that separates them again. The octet rule may give up another π bond than the
    /// one that is written; a centre where it does keeps its charges.
    fn customary(&mut self, skeleton: &Skeleton, mesomer: &Mesomer, rank: &[u32]) {
        let Self {
            drawing,
            centres,
            partners,
            separated,
            before,
            reading,
            ..
        } = self;
        let is_centre = |&atom: &u32| {
            let element = skeleton.atoms[atom as usize].element;
            drawing.charges[atom as usize] > 0
                && !element.is_metal()
                && matches!(element.group(), Some(15..=17))
                && element.period() >= 3
        };
        if drawing.charges.iter().all(|&charge| charge <= 0) {
            return;
        }
        centres.clear();
        centres.extend((0..skeleton.len() as u32).filter(is_centre));
        if centres.is_empty() {
            return;
        }
        centres.sort_unstable_by_key(|&atom| rank[atom as usize]);
        separated.copy(drawing);
        for &centre in &*centres {
            neutralise(skeleton, rank, centre, partners, drawing);
        }
        if drawing == separated || reading.restores(drawing, separated, skeleton, mesomer) {
            return;
        }
        drawing.copy(separated);
        for &centre in &*centres {
            before.copy(drawing);
            neutralise(skeleton, rank, centre, partners, drawing);
            if drawing != before && !reading.restores(drawing, separated, skeleton, mesomer) {
                drawing.copy(before);
            }
        }
    }
}

/// Neutralises a centre against its neighbours: oxygen first, then its group, then nitrogen; a
/// phosphorus ylide is written with a double bond as well.
fn neutralise(
    skeleton: &Skeleton,
    rank: &[u32],
    centre: u32,
    partners: &mut Vec<(u8, u32, u32, u32)>,
    placed: &mut Drawing,
) {
    if !is_full(skeleton, placed, centre) {
        return;
    }
    let element = skeleton.atoms[centre as usize].element;
    let arcs = skeleton.arcs(centre).iter();
    partners.clear();
    partners.extend(arcs.filter_map(|&(to, bond)| {
        let class = match skeleton.atoms[to as usize].element {
            Element::OXYGEN => 0,
            other if other.group() == Some(16) => 1,
            Element::NITROGEN => 2,
            Element::CARBON if element == Element::PHOSPHORUS => 3,
            _ => return None,
        };
        Some((class, rank[to as usize], to, bond))
    }));
    partners.sort_unstable();
    for &(_, _, to, bond) in &*partners {
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

/// Reads drawings back; owns the scratch.
#[derive(Debug, Default)]
struct Reading {
    drawn: Skeleton,
    octet: mesomer::OctetScratch,
    read: Mesomer,
    mesomer: mesomer::Scratch,
}

impl Reading {
    /// Whether a drawing, when read, has the normal form that it was made from. It has if over-full
    /// octets become the charges of `separated`, as they nearly always do, for that is a placement of
    /// the normal form. Only where they become others the normal form is found and compared.
    fn restores(
        &mut self,
        drawing: &Drawing,
        separated: &Drawing,
        skeleton: &Skeleton,
        mesomer: &Mesomer,
    ) -> bool {
        let drawn = &mut self.drawn;
        drawn.atoms.clone_from(&skeleton.atoms);
        drawn.bonds.clone_from(&skeleton.bonds);
        drawn.adjacency.copy(&skeleton.adjacency);
        drawn.ring.clone_from(&skeleton.ring);
        for (atom, &charge) in drawn.atoms.iter_mut().zip(&drawing.charges) {
            atom.charge = charge;
        }
        for (bond, &order) in drawn.bonds.iter_mut().zip(&drawing.orders) {
            bond.order = order;
        }
        mesomer::separate(drawn, &mut self.octet);
        let mut atoms = drawn.atoms.iter().zip(&separated.charges);
        let mut bonds = drawn.bonds.iter().zip(&separated.orders);
        if atoms.all(|(atom, &charge)| atom.charge == charge)
            && bonds.all(|(bond, &order)| bond.order == order)
        {
            return true;
        }
        // The normal form was found within the caller's limits; finding it again takes about as much.
        let unbounded = Limits {
            order_steps: u64::MAX,
            ..Limits::default()
        };
        self.read.load(drawn, &unbounded, &mut self.mesomer).is_ok()
            && self.read.orders == mesomer.orders
            && self.read.states == mesomer.states
    }
}

/// Whether an atom has exactly the bonds that its charge gives room for: no open valence, no octet
/// exceeded or broken up.
fn is_full(skeleton: &Skeleton, placed: &Drawing, atom: u32) -> bool {
    let record = &skeleton.atoms[atom as usize];
    let bonds = skeleton.arcs(atom).iter();
    let drawn: i32 = bonds
        .map(|&(_, bond)| i32::from(placed.valence(bond)))
        .sum();
    drawn + i32::from(record.hydrogens)
        == mesomer::neutral_valence(record.element) + i32::from(placed.charges[atom as usize])
}
