//! What the digraph needs to know of each atom: number, mass, neighbours and duplicates.

use std::ops::Range;

use crate::{
    BondOrder, Element,
    mesomer::{MOBILE, Mesomer, neutral_valence},
    skeleton::{Skeleton, SkeletonAtom},
};

/// Atomic numbers are multiples of this, so that means over up to twelve places stay whole.
const UNIT: u32 = 27_720;

/// Atomic number in units of 1/27720, and mass in units of 1/27720 micro-dalton.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(super) struct Substance {
    pub(super) number: u32,
    pub(super) mass: u64,
}

impl Substance {
    /// An atom of an element: an isotope weighs its exact mass, a natural atom the atomic weight (the
    /// sharpened Rule 2 of Hanson et al., J. Chem. Inf. Model. 2018, 58, 1755).
    fn new(element: Element, isotope: Option<u16>) -> Self {
        let natural = || {
            let longest = element.mass_number_of_longest_lived();
            let nuclide = longest.and_then(|number| element.isotope_mass(number));
            element.standard_weight().or(nuclide).unwrap_or(0.0)
        };
        let mass = match isotope {
            // A mass number that no table lists stands for itself.
            Some(number) => element.isotope_mass(number).unwrap_or(f64::from(number)),
            None => natural(),
        };
        Self {
            number: u32::from(element.number()) * UNIT,
            mass: (mass * 1e6).round() as u64 * u64::from(UNIT),
        }
    }

    /// A hydrogen with a mass number, or a natural one for 0.
    pub(super) fn hydrogen(mass_number: u8) -> Self {
        let isotope = (mass_number > 0).then_some(u16::from(mass_number));
        Self::new(Element::HYDROGEN, isotope)
    }
}

/// A bond to a neighbour, and how many duplicates of the neighbour it brings.
#[derive(Debug, Clone, Copy)]
pub(super) struct Arc {
    pub(super) to: u32,
    pub(super) duplicates: u8,
    /// Whether the bond lies in a ring.
    pub(super) in_ring: bool,
}

/// Duplicates that stand for π bonds which are in several places.
#[derive(Debug, Clone, Copy)]
pub(super) struct Averaged {
    pub(super) count: u8,
    pub(super) substance: Substance,
}

/// One atom.
#[derive(Debug, Clone)]
struct AtomFacts {
    substance: Substance,
    natural: Substance,
    arcs: Range<u32>,
    averaged: Option<Averaged>,
    /// Hydrogens of natural composition, then those of mass number 1, 2 and 3.
    hydrogens: [u8; 4],
}

/// The atoms of a record.
#[derive(Debug, Clone)]
pub(super) struct Atoms {
    facts: Vec<AtomFacts>,
    arcs: Vec<Arc>,
}

impl Atoms {
    /// Collects what is to be known about the atoms of a skeleton.
    ///
    /// Bonds and charges are those of the normal form: a π bond that all best placements share
    /// brings a duplicate at each end, a mobile one an averaged duplicate. Centres drawn over their
    /// octet (sulfones, phosphine oxides) are charge-separated, so that their bonds are single:
    /// d orbitals are neglected at atoms with four ligands (Prelog & Helmchen, Angew. Chem. Int. Ed.
    /// Engl. 1982, 21, 567).
    pub(super) fn new(skeleton: &Skeleton, mesomer: &Mesomer) -> Self {
        let mut atoms = Self {
            facts: Vec::with_capacity(skeleton.len()),
            arcs: Vec::with_capacity(2 * skeleton.bonds.len()),
        };
        let bearers = charge_bearers(skeleton, mesomer);
        for (index, record) in (0u32..).zip(&skeleton.atoms) {
            let start = atoms.arcs.len() as u32;
            for &(to, bond) in skeleton.arcs(index) {
                let duplicates = match mesomer.orders[bond as usize] {
                    HYDROGEN_BOND => continue,
                    order @ 2..=4 => order - 1,
                    _ => 0,
                };
                atoms.arcs.push(Arc {
                    to,
                    duplicates,
                    in_ring: skeleton.ring[bond as usize],
                });
            }
            let natural = Substance::new(record.element, None);
            atoms.facts.push(AtomFacts {
                substance: match record.isotope {
                    Some(_) => Substance::new(record.element, record.isotope),
                    None => natural,
                },
                natural,
                arcs: start..atoms.arcs.len() as u32,
                averaged: averaged(skeleton, mesomer, index, bearers[index as usize]),
                hydrogens: hydrogens(record),
            });
        }
        atoms
    }

    /// Number and mass of an atom.
    pub(super) fn substance(&self, atom: u32) -> Substance {
        self.facts[atom as usize].substance
    }

    /// Number and mass of a duplicate of an atom, which is never labelled.
    pub(super) fn duplicate(&self, atom: u32) -> Substance {
        self.facts[atom as usize].natural
    }

    /// The bonds of an atom.
    pub(super) fn arcs(&self, atom: u32) -> Range<usize> {
        let Range { start, end } = self.facts[atom as usize].arcs;
        start as usize..end as usize
    }

    /// One of the bonds.
    pub(super) fn arc(&self, index: usize) -> Arc {
        self.arcs[index]
    }

    /// Duplicates for π bonds that are in several places.
    pub(super) fn averaged(&self, atom: u32) -> Option<Averaged> {
        self.facts[atom as usize].averaged
    }

    /// How many hydrogens of natural composition and of mass number 1, 2 and 3 the atom bears.
    pub(super) fn hydrogens(&self, atom: u32) -> [u8; 4] {
        self.facts[atom as usize].hydrogens
    }
}

/// The class of a hydrogen bond, over which no ligand is attached.
const HYDROGEN_BOND: u8 = BondOrder::Hydrogen as u8;

fn hydrogens(record: &SkeletonAtom) -> [u8; 4] {
    let labelled = [0, 4, 8].map(|shift| (record.labelled >> shift & 15) as u8);
    let natural = record.hydrogens.saturating_sub(labelled.iter().sum());
    [natural, labelled[0], labelled[1], labelled[2]]
}

/// P-92.1.4.4: where the double bonds of an atom are in several places, its duplicate has the mean of
/// the atomic numbers that it would have in each. That the atom bears a charge instead of the double
/// bond counts as a place with nothing.
fn averaged(
    skeleton: &Skeleton,
    mesomer: &Mesomer,
    atom: u32,
    bears_charge: bool,
) -> Option<Averaged> {
    let arcs = skeleton.arcs(atom).iter();
    let mobile = arcs.filter(|&&(_, bond)| mesomer.orders[bond as usize] == MOBILE);
    let (mut places, mut number, mut mass, mut drawn) = (0u32, 0u32, 0u64, 0u8);
    for &(to, bond) in mobile {
        let neighbour = Substance::new(skeleton.atoms[to as usize].element, None);
        places += 1;
        number += neighbour.number;
        mass += neighbour.mass;
        drawn += skeleton.bonds[bond as usize].order.saturating_sub(1);
    }
    if places == 0 {
        return None;
    }
    let count = if mesomer.states[atom as usize].mobile {
        most_pi_bonds(skeleton, mesomer, atom)
    } else {
        drawn
    };
    let places = places + u32::from(bears_charge);
    Some(Averaged {
        count,
        substance: Substance {
            number: number / places,
            mass: mass / u64::from(places),
        },
    })
}

/// The atoms at which mobile charges stay. Of the atoms that it reaches over mobile bonds, a negative one
/// prefers the most electronegative, a positive one the least.
fn charge_bearers(skeleton: &Skeleton, mesomer: &Mesomer) -> Vec<bool> {
    let mut bears = vec![false; skeleton.len()];
    let mut seen = vec![false; skeleton.len()];
    let is_mobile = |atom: u32| mesomer.states[atom as usize].mobile;
    let preference = |atom: u32| {
        let order = electronegativity(skeleton.atoms[atom as usize].element);
        let (charge, _) = mesomer.states[atom as usize].system;
        if charge < 0 { order } else { -order }
    };
    for start in (0..skeleton.len() as u32).filter(|&atom| is_mobile(atom)) {
        if std::mem::replace(&mut seen[start as usize], true) {
            continue;
        }
        let mut reached = vec![start];
        let mut at = 0;
        while let Some(&here) = reached.get(at) {
            at += 1;
            for &(to, bond) in skeleton.arcs(here) {
                if mesomer.orders[bond as usize] == MOBILE && !seen[to as usize] {
                    seen[to as usize] = true;
                    reached.push(to);
                }
            }
        }
        reached.retain(|&atom| is_mobile(atom));
        let most = reached.iter().map(|&atom| preference(atom)).max();
        for &atom in &reached {
            bears[atom as usize] = Some(preference(atom)) == most;
        }
    }
    bears
}

/// The order of electronegativity on Pauling's scale among the elements that bear mobile charges.
fn electronegativity(element: Element) -> i8 {
    match element {
        Element::FLUORINE => 7,
        Element::OXYGEN => 6,
        Element::CHLORINE => 5,
        Element::NITROGEN => 4,
        Element::BROMINE => 3,
        Element::SULFUR => 2,
        Element::CARBON => 1,
        _ => 0,
    }
}

/// The most π bonds over mobile bonds that an atom of mobile charge has in any placement.
fn most_pi_bonds(skeleton: &Skeleton, mesomer: &Mesomer, atom: u32) -> u8 {
    let record = &skeleton.atoms[atom as usize];
    let neutral = neutral_valence(record.element);
    let fixed: i32 = skeleton
        .arcs(atom)
        .iter()
        .map(|&(_, bond)| match mesomer.orders[bond as usize] {
            order @ 1..=4 => i32::from(order),
            MOBILE => 1,
            _ => 0,
        })
        .sum();
    let (charge, _) = mesomer.states[atom as usize].system;
    let lends_pair = charge > 0 && neutral < 4 && record.element.group() != Some(13);
    let room = neutral - fixed - i32::from(record.hydrogens) + i32::from(lends_pair);
    room.clamp(1, 2) as u8
}
