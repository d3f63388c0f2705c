//! Which acid gives its proton first, and which base takes one first.
//!
//! Classes of common practice, by the order of their pKa (textbook); within a class the canonical order
//! decides. They are asked only where fixed charges have to be balanced: a betaine keeps the carboxylate,
//! sodium hydrogen phosphate the proton on phosphate.

use molkin_graph::Element;

use super::view::{Site, View, is_chalcogen};

/// The last class of acids that a fixed organic cation deprotonates: carnitine and lecithin are inner
/// salts, choline and quaternary phenols are cations.
pub(super) const LAST_STRONG: u8 = 4;

/// The class of an atom that was drawn as an anion and is no acid of the table: methyl lithium.
pub(super) const DRAWN_ANION: u8 = 8;

/// The class of an acid, strongest first.
pub(super) fn acidity(view: &View, at: u32) -> Option<u8> {
    let site = view.site(at);
    if site.hydrogens == 0 || site.charge > 0 {
        return None;
    }
    match site.element.symbol() {
        // Hydrohalic acids.
        "Cl" | "Br" | "I" if site.bonds.is_empty() => Some(0),
        "F" if site.bonds.is_empty() => Some(2),
        "O" | "S" | "Se" | "Te" => chalcogen_acidity(view, at),
        "N" => nitrogen_acidity(view, at),
        // Hydrogen cyanide.
        "C" if view
            .neighbours(at)
            .any(|(other, bond)| bond.order == 3 && other.element == Element::NITROGEN) =>
        {
            Some(6)
        }
        _ => None,
    }
}

fn chalcogen_acidity(view: &View, at: u32) -> Option<u8> {
    let site = view.site(at);
    let Some(bond) = site.bonds.first() else {
        // Hydrogen sulfide before water.
        return Some(if site.element == Element::OXYGEN {
            7
        } else {
            6
        });
    };
    if site.bonds.len() > 1 {
        return None;
    }
    let centre = view.site(bond.to);
    let others = || {
        view.neighbours(bond.to)
            .filter(|(other, _)| other.source != site.source)
    };
    let oxo = others()
        .filter(|(other, bond)| bond.order == 2 && is_chalcogen(other.element))
        .count();
    let ionised = others().any(|(other, _)| is_chalcogen(other.element) && other.charge < 0);
    Some(match centre.element.symbol() {
        // Sulfonic, sulfuric and perchloric acids; the second step of sulfuric acid.
        "S" | "Se" | "Te" | "Cl" | "Br" | "I" if oxo >= 2 => u8::from(ionised),
        // Sulfinic, sulfurous, phosphoric and phosphonic acids, and their second steps.
        "S" | "Se" | "Te" | "P" | "As" if oxo >= 1 => {
            if ionised {
                4
            } else {
                1
            }
        }
        // Nitric and nitrous acid.
        "N" if centre.charge > 0 && oxo >= 1 => 0,
        "N" if oxo >= 1 => 2,
        // Carboxylic acids and what replaces their oxygens.
        "C" if oxo >= 1 => {
            if ionised {
                5
            } else {
                2
            }
        }
        // Vinylogous acids: 1,3-diketones, hydroxyquinones, tetronic acids.
        "C" if is_vinylogous(view, bond.to) => 3,
        // Phenols and enols before alcohols.
        "C" if centre.is_saturated() => 7,
        _ => 6,
    })
}

/// Whether a carbon has a fixed double bond to the neighbour of a carbonyl group.
fn is_vinylogous(view: &View, at: u32) -> bool {
    let carbonyl = |at: u32| {
        let mut neighbours = view.neighbours(at);
        neighbours.any(|(other, bond)| bond.order == 2 && is_chalcogen(other.element))
    };
    let bonds = view.site(at).bonds.iter();
    let double = bonds.filter(|bond| bond.order == 2 && !bond.mobile);
    double
        .flat_map(|bond| view.site(bond.to).bonds.iter())
        .any(|bond| {
            bond.to != at && view.site(bond.to).element == Element::CARBON && carbonyl(bond.to)
        })
}

fn nitrogen_acidity(view: &View, at: u32) -> Option<u8> {
    if is_tetrazole(view, at) {
        return Some(3);
    }
    let acyls = |sulfur: bool| {
        view.neighbours(at).filter(move |(other, _)| {
            let kind = if sulfur {
                other.element.symbol() == "S"
            } else {
                other.element == Element::CARBON
            };
            kind && other
                .bonds
                .iter()
                .any(|bond| bond.order == 2 && is_chalcogen(view.site(bond.to).element))
        })
    };
    let (sulfonyls, carbonyls) = (acyls(true).count(), acyls(false).count());
    let site = view.site(at);
    if sulfonyls + carbonyls >= 2 {
        Some(5)
    } else if sulfonyls == 1 || (site.in_ring && carbonyls == 1) {
        Some(6)
    } else if carbonyls == 1 || (site.in_ring && has_unsaturated_neighbour(view, at)) {
        Some(7)
    } else {
        None
    }
}

fn has_unsaturated_neighbour(view: &View, at: u32) -> bool {
    view.neighbours(at).any(|(other, _)| !other.is_saturated())
}

/// Whether a nitrogen is in a ring of five with at least four nitrogens.
fn is_tetrazole(view: &View, at: u32) -> bool {
    let ring = |from: u32| {
        let bonds = view.site(from).bonds.iter();
        bonds.filter(|bond| bond.in_ring).map(|bond| bond.to)
    };
    let nitrogens = |atoms: [u32; 5]| {
        let atoms = atoms.iter();
        atoms
            .filter(|&&at| view.site(at).element == Element::NITROGEN)
            .count()
    };
    ring(at).any(|a| {
        ring(a).filter(|&b| b != at).any(|b| {
            ring(b).filter(|&c| c != a && c != at).any(|c| {
                let mut last = ring(c).filter(|&d| d != b && d != a && d != at);
                last.any(|d| ring(d).any(|end| end == at) && nitrogens([at, a, b, c, d]) >= 4)
            })
        })
    })
}

/// The class of a base, strongest first.
pub(super) fn basicity(view: &View, at: u32) -> Option<u8> {
    let site = view.site(at);
    if site.charge != 0 || site.mobile || site.bonds.is_empty() {
        return None;
    }
    match site.element.symbol() {
        "N" if site.is_saturated() && site.pairs() + u32::from(site.hydrogens) == 3 => {
            amine_basicity(view, at)
        }
        "N" if site.pairs() + u32::from(site.hydrogens) == 3 && site.bonds.len() <= 2 => {
            imine_basicity(view, at)
        }
        "P" if site.is_saturated() && site.pairs() + u32::from(site.hydrogens) == 3 => Some(4),
        _ => None,
    }
}

fn amine_basicity(view: &View, at: u32) -> Option<u8> {
    let plain = |site: &Site| site.element == Element::CARBON || site.element == Element::HYDROGEN;
    let mut others = view.neighbours(at).map(|(other, _)| other);
    if !others.all(plain) {
        return None;
    }
    if !has_unsaturated_neighbour(view, at) {
        return Some(1);
    }
    // Anilines, but no amides, amidines or nitrogens of aromatic rings.
    let held = view.neighbours(at).any(|(other, _)| {
        !other.is_saturated()
            && other.bonds.iter().any(|bond| {
                let next = view.site(bond.to);
                next.source != view.site(at).source && !plain(next) && bond.order == 2
            })
    });
    (!held && !view.site(at).in_ring).then_some(3)
}

fn imine_basicity(view: &View, at: u32) -> Option<u8> {
    let site = view.site(at);
    if site.bonds.iter().any(|bond| bond.order == 3) {
        return None;
    }
    // A neighbour with an amino group: amidines and guanidines.
    let amidine = view.neighbours(at).any(|(carbon, bond)| {
        (bond.order == 2 || bond.mobile)
            && carbon.bonds.iter().any(|bond| {
                let next = view.site(bond.to);
                next.source != site.source
                    && next.element == Element::NITROGEN
                    && next.is_saturated()
            })
    });
    Some(if amidine && !site.in_ring { 0 } else { 2 })
}
