//! A molecule as the charge axis sees it: one placement of its charges, and where they can be as well.

use std::collections::{BTreeMap, BTreeSet};

use molkin_graph::{BondOrder, Canonical, Element};

/// An atom, by its position in canonical order.
#[derive(Debug, Clone)]
pub(super) struct Site {
    /// The atom's index in the molecule.
    pub(super) source: u32,
    pub(super) element: Element,
    pub(super) hydrogens: u8,
    /// Charge in the placement that is written.
    pub(super) charge: i8,
    /// Whether the charge is elsewhere in other best placements.
    pub(super) mobile: bool,
    /// Neighbour, order in the placement that is written, and whether the bond is mobile.
    pub(super) bonds: Vec<Bond>,
    pub(super) in_ring: bool,
    /// The least position of its orbit in the constitution, isotopes and stereo left aside.
    pub(super) orbit: u32,
}

/// A bond as one of its ends has it.
#[derive(Debug, Clone, Copy)]
pub(super) struct Bond {
    pub(super) to: u32,
    pub(super) order: u8,
    pub(super) mobile: bool,
    pub(super) in_ring: bool,
}

impl Site {
    /// Electron pairs in its bonds to other atoms.
    pub(super) fn pairs(&self) -> u32 {
        let pairs = self.bonds.iter().map(|bond| match bond.order {
            order @ 1..=4 => u32::from(order),
            _ => 0,
        });
        pairs.sum()
    }

    /// Whether it is a carbon or heteroatom that can bear one hydrogen more without a charge.
    pub(super) fn has_room(&self) -> bool {
        let Some(valence) = valence(self.element) else {
            return false;
        };
        self.pairs() + u32::from(self.hydrogens) < valence
    }

    /// Whether it has only single bonds, none of them mobile.
    pub(super) fn is_saturated(&self) -> bool {
        let mut bonds = self.bonds.iter();
        bonds.all(|bond| bond.order <= 1 && !bond.mobile)
    }
}

/// Bonds of the neutral hydride of an element that can be an acid or a base (IUPAC Red Book 2005,
/// IR-6.2: parent hydrides).
fn valence(element: Element) -> Option<u32> {
    let symbol = element.symbol();
    Some(match symbol {
        "C" => 4,
        "N" | "P" | "As" => 3,
        "O" | "S" | "Se" | "Te" => 2,
        "F" | "Cl" | "Br" | "I" => 1,
        _ => return None,
    })
}

/// All atoms in canonical order.
#[derive(Debug)]
pub(super) struct View {
    pub(super) sites: Vec<Site>,
}

impl View {
    pub(super) fn of(canonical: &Canonical) -> Self {
        let (normal, form) = (canonical.normal_form(), canonical.form());
        let orbits = canonical.constitution_orbits();
        let atoms = normal.atoms.iter().zip(&form.atoms).zip(orbits);
        let mut sites: Vec<Site> = atoms
            .map(|((atom, placed), orbit)| Site {
                source: atom.source,
                element: atom.element,
                hydrogens: atom.hydrogens,
                charge: placed.charge,
                mobile: atom.charge.is_none(),
                bonds: Vec::new(),
                in_ring: false,
                orbit,
            })
            .collect();
        let mut orders = BTreeMap::new();
        for &(a, b, order) in &form.bonds {
            orders.insert((a, b), order);
        }
        for bond in &normal.bonds {
            let ends = (bond.a.min(bond.b), bond.a.max(bond.b));
            let order = orders
                .get(&ends)
                .copied()
                .unwrap_or(BondOrder::Single as u8);
            for (from, to) in [(bond.a, bond.b), (bond.b, bond.a)] {
                let site = &mut sites[from as usize];
                site.in_ring |= bond.in_ring;
                site.bonds.push(Bond {
                    to,
                    order,
                    mobile: bond.order.is_none(),
                    in_ring: bond.in_ring,
                });
            }
        }
        Self { sites }
    }

    pub(super) fn site(&self, at: u32) -> &Site {
        &self.sites[at as usize]
    }

    pub(super) fn positions(&self) -> std::ops::Range<u32> {
        0..self.sites.len() as u32
    }

    /// Neighbours with the bonds to them.
    pub(super) fn neighbours(&self, at: u32) -> impl Iterator<Item = (&Site, Bond)> {
        let bonds = self.site(at).bonds.iter();
        bonds.map(|&bond| (self.site(bond.to), bond))
    }

    /// How many kinds of atoms there are: the fewer, the more symmetric.
    pub(super) fn orbit_count(&self) -> usize {
        let orbits = self.sites.iter().map(|site| site.orbit);
        orbits.collect::<BTreeSet<u32>>().len()
    }

    /// Carbonyl and thiocarbonyl groups of acids, esters and amides.
    pub(super) fn acyl_groups(&self) -> usize {
        let acyl = |at: u32| {
            self.site(at).element == Element::CARBON
                && self.neighbours(at).any(|(other, bond)| {
                    bond.order == 2 && is_chalcogen(other.element) && other.bonds.len() == 1
                })
                && self.neighbours(at).any(|(other, bond)| {
                    bond.order == 1
                        && (other.element == Element::NITROGEN || is_chalcogen(other.element))
                })
        };
        self.positions().filter(|&at| acyl(at)).count()
    }
}

/// Oxygen, sulfur, selenium, tellurium.
pub(super) fn is_chalcogen(element: Element) -> bool {
    element.group() == Some(16)
}
