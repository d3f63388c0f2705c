//! What each atom has to give to π bonds and mobile hydrogens.
//!
//! Here over-full octets are written without charges (pentavalent nitrogen in nitro groups and
//! N-oxides, S=O, P=O): a hydrogen that moves to such an oxygen then moves as to any other.

use crate::{
    Element,
    mesomer::{self, MOBILE, Mesomer},
    skeleton::Skeleton,
};

use super::{region::natural_hydrogens, rules};

/// The room of one atom. One with no vertices takes no part.
#[derive(Debug, Clone, Copy, Default, PartialEq, Eq)]
pub(super) struct Room {
    /// How many π bonds and mobile hydrogens the atom has together. A carbon that is no site has its
    /// π bonds alone.
    pub(super) vertices: u8,
    /// Whether hydrogens may come and go.
    pub(super) site: bool,
    /// A carbon that may become a site.
    pub(super) candidate: bool,
    /// Two of the vertices may be a lone pair instead: trivalent and pentavalent nitrogen or
    /// phosphorus, divalent and tetravalent sulfur.
    pub(super) pair: bool,
    /// A heteroatom: it can bear a negative charge for a hydrogen.
    pub(super) hetero: bool,
    /// Whether it has a lone pair that it can lend, at the price of a positive charge.
    pub(super) lends: bool,
    /// Whether it has lent one.
    pub(super) positive: bool,
    /// Whether it bears a negative charge.
    pub(super) negative: bool,
    /// Whether charges or open valences about the atom are beyond this model.
    pub(super) opaque: bool,
}

impl Room {
    /// Whether a π bond can be drawn to the atom.
    fn takes_part(&self) -> bool {
        self.vertices > 0 || self.positive
    }
}

/// A drawing without charges on neighbours that cancel: the orders of the bonds, and what is left of
/// the charges.
#[derive(Debug, Default)]
pub(super) struct Drawing {
    pub(super) orders: Vec<u8>,
    pub(super) charges: Vec<i8>,
    /// All hydrogens of each atom.
    pub(super) hydrogens: Vec<u8>,
}

impl Drawing {
    /// One of the best placements, charge-separated centres of groups 15 and 16 neutralised against
    /// their neighbours.
    pub(super) fn load(&mut self, skeleton: &Skeleton, mesomer: &Mesomer, rank: &mut Vec<u32>) {
        self.hydrogens.clear();
        self.hydrogens
            .extend(skeleton.atoms.iter().map(|atom| atom.hydrogens));
        self.orders.clear();
        self.charges.clear();
        self.charges
            .extend(skeleton.atoms.iter().map(|atom| atom.charge));
        let charged = mesomer.states.iter().any(|state| state.mobile)
            || skeleton.atoms.iter().any(|atom| atom.charge != 0);
        if !charged {
            self.orders
                .extend(skeleton.bonds.iter().map(|bond| bond.order));
            return;
        }
        self.orders.clone_from(&mesomer.orders);
        let states = self.charges.iter_mut().zip(&mesomer.states);
        states.for_each(|(charge, state)| {
            if !state.mobile {
                *charge = state.charge;
            }
        });
        rank.clear();
        rank.extend(0..skeleton.len() as u32);
        let (orders, charges) = (&mut self.orders, &mut self.charges);
        mesomer::First::default().place((skeleton, mesomer), rank, |_| false, orders, charges);
        let bonds = skeleton.bonds.iter().zip(self.orders.iter_mut());
        for (bond, order) in bonds {
            if *order == MOBILE {
                *order = bond.order;
            }
        }
        self.neutralise(skeleton);
    }

    fn neutralise(&mut self, skeleton: &Skeleton) {
        let heavy = |atom: u32| {
            let element = skeleton.atoms[atom as usize].element;
            !element.is_metal() && matches!(element.group(), Some(15 | 16))
        };
        for (bond, order) in skeleton.bonds.iter().zip(&mut self.orders) {
            for (centre, other) in [(bond.a, bond.b), (bond.b, bond.a)] {
                let (plus, minus) = (self.charges[centre as usize], self.charges[other as usize]);
                if plus > 0 && minus < 0 && heavy(centre) && matches!(*order, 1 | 2) {
                    *order += 1;
                    self.charges[centre as usize] -= 1;
                    self.charges[other as usize] += 1;
                }
            }
        }
    }
}

/// Electron pairs beyond the first.
pub(super) fn pi(order: u8) -> u8 {
    match order {
        order @ 2..=3 => order - 1,
        _ => 0,
    }
}

/// What is drawn about an atom.
struct About {
    /// Bonds that count as valence.
    sigma: u8,
    /// π bonds to atoms that take part.
    pi: u8,
    /// Whether a metal, or a bond of another kind, is among its neighbours.
    foreign: bool,
    /// Valence, π bonds and hydrogens included.
    valence: u8,
    /// Hydrogens of stated mass, which stay.
    labelled: u8,
}

/// Fills the table of rooms.
pub(super) fn load(rooms: &mut Vec<Room>, skeleton: &Skeleton, mesomer: &Mesomer, drawing: &Drawing) {
    rooms.clear();
    rooms.extend((0..skeleton.len() as u32).map(|atom| room(skeleton, mesomer, drawing, atom)));
    // A π bond to an atom that takes no part stays where it is.
    for (bond, &order) in skeleton.bonds.iter().zip(&drawing.orders) {
        let ends = [bond.a, bond.b].map(|atom| rooms[atom as usize].takes_part());
        for (atom, other) in [(bond.a, ends[1]), (bond.b, ends[0])] {
            if pi(order) > 0 && !other {
                rooms[atom as usize] = Room {
                    opaque: rooms[atom as usize].opaque,
                    ..Room::default()
                };
            }
        }
    }
}

fn about(skeleton: &Skeleton, drawing: &Drawing, atom: u32) -> About {
    let hydrogens = drawing.hydrogens[atom as usize];
    let mut about = About {
        sigma: 0,
        pi: 0,
        foreign: false,
        valence: hydrogens,
        labelled: hydrogens - natural_hydrogens(skeleton, drawing, atom) as u8,
    };
    for &(to, bond) in skeleton.arcs(atom) {
        let order = drawing.orders[bond as usize];
        about.foreign |=
            !matches!(order, 1..=3) || skeleton.atoms[to as usize].element.is_metal();
        about.sigma += 1;
        about.pi += pi(order);
        about.valence = about.valence.saturating_add(order);
    }
    about
}

fn room(skeleton: &Skeleton, mesomer: &Mesomer, drawing: &Drawing, atom: u32) -> Room {
    let record = &skeleton.atoms[atom as usize];
    let about = about(skeleton, drawing, atom);
    let charge = drawing.charges[atom as usize];
    let state = &mesomer.states[atom as usize];
    let none = Room::default();
    let opaque = Room {
        opaque: true,
        ..none
    };
    if about.foreign || about.sigma > 6 || record.element.is_metal() {
        return none;
    }
    if state.open > 0 || (state.mobile && state.system.1 > 0) {
        return opaque;
    }
    match (record.element.group(), record.element) {
        (_, Element::CARBON) if charge != 0 || about.valence != 4 => opaque,
        (_, Element::CARBON) => Room {
            vertices: about.pi,
            candidate: about.pi <= 1 && rules::may_bear_mobile_hydrogen(skeleton, atom),
            ..none
        },
        (Some(15), _) => group_15(skeleton, atom, &about, charge),
        (Some(16), _) => group_16(skeleton, atom, &about, charge),
        _ if charge != 0 => opaque,
        _ => none,
    }
}

/// Mobile hydrogens and charges of natural hydrogen alone: labelled ones stay.
fn group_15(skeleton: &Skeleton, atom: u32, about: &About, charge: i8) -> Room {
    let nitrogen = skeleton.atoms[atom as usize].element == Element::NITROGEN;
    let terminal = rules::terminal_oxygens(skeleton, atom);
    let pair = if nitrogen {
        // A nitro group has none, but a mesomer of a larger system may be drawn with one there.
        (terminal == 1 || (terminal > 1 && about.valence == 3)) && matches!(about.sigma, 2 | 3)
    } else {
        terminal >= 1 && about.sigma <= 3
    };
    match (about.valence, charge) {
        (3 | 5, 0) if pair => hetero(5, about, true),
        (3, 0) => Room {
            lends: nitrogen,
            ..hetero(3, about, false)
        },
        (5, 0) => Room {
            site: false,
            ..hetero(5, about, false)
        },
        (4, 1) if nitrogen => Room {
            lends: true,
            positive: true,
            ..hetero(3, about, false)
        },
        (2, -1) => Room {
            lends: nitrogen,
            negative: true,
            ..hetero(3, about, false)
        },
        (4, 1) => Room::default(),
        _ => Room {
            opaque: true,
            ..Room::default()
        },
    }
}

fn group_16(skeleton: &Skeleton, atom: u32, about: &About, charge: i8) -> Room {
    let oxygen = skeleton.atoms[atom as usize].element == Element::OXYGEN;
    let terminal = rules::terminal_oxygens(skeleton, atom);
    let pair = !oxygen && matches!((about.sigma, terminal), (2, 1..) | (3, 2..));
    match (about.valence, charge) {
        (2 | 4, 0) if pair && about.sigma == 2 => hetero(4, about, true),
        (4 | 6, 0) if pair && about.sigma == 3 => hetero(6, about, true),
        (2, 0) => Room {
            lends: true,
            ..hetero(2, about, false)
        },
        (valence @ (4 | 6), 0) if !oxygen => Room {
            site: false,
            ..hetero(valence, about, false)
        },
        (3, 1) => Room {
            lends: true,
            positive: true,
            ..hetero(2, about, false)
        },
        (1, -1) => Room {
            lends: true,
            negative: true,
            ..hetero(2, about, false)
        },
        _ => Room {
            opaque: true,
            ..Room::default()
        },
    }
}

fn hetero(valence: u8, about: &About, pair: bool) -> Room {
    Room {
        vertices: valence.saturating_sub(about.sigma + about.labelled),
        site: true,
        pair,
        hetero: true,
        ..Room::default()
    }
}
