//! Tautomers by rule: single shifts of a hydrogen, written apart from the library's method.

use molkin_graph::{Atom, BondOrder, Element, Molecule, Revision};

/// All molecules one shift away: H–X–Y=Z becomes X=Y–Z–H. X and Z are nitrogen, oxygen, sulfur or
/// selenium, one of them may be carbon as docs/definitions.md has it; Y is carbon or nitrogen. Marks of
/// stereo are left out.
///
/// # Panics
/// If a shift cannot be carried out.
pub fn shifted(molecule: &Molecule) -> Vec<Molecule> {
    let mut found = Vec::new();
    for x in 0..molecule.atom_count() as u32 {
        if !gives(molecule, x) {
            continue;
        }
        for (y, first) in molecule.neighbours(x) {
            if first != BondOrder::Single || !is_between(molecule, y) {
                continue;
            }
            for (z, second) in molecule.neighbours(y) {
                let hetero = is_hetero(molecule, x) || is_hetero(molecule, z);
                let enol = [x, z].iter().any(|&end| is_acyl_bond(molecule, end, y));
                if z != x && second == BondOrder::Double && hetero && !enol && takes(molecule, z) {
                    found.push(shift(molecule, [x, y, z]));
                }
            }
        }
    }
    found
}

fn atom(molecule: &Molecule, index: u32) -> Atom {
    *molecule.atom(index).unwrap()
}

fn is_hetero(molecule: &Molecule, index: u32) -> bool {
    [Element::NITROGEN, Element::OXYGEN, Element::SULFUR, Element::SELENIUM]
        .contains(&atom(molecule, index).element)
}

fn is_between(molecule: &Molecule, index: u32) -> bool {
    [Element::CARBON, Element::NITROGEN].contains(&atom(molecule, index).element)
}

/// Electron pairs and hydrogens.
fn valence(molecule: &Molecule, index: u32) -> u8 {
    let bonds = molecule.neighbours(index).map(|(_, order)| order.pairs());
    bonds.sum::<u8>() + atom(molecule, index).hydrogens
}

fn is_ordinary(molecule: &Molecule, index: u32) -> bool {
    let own = atom(molecule, index);
    let expected = match own.element {
        Element::CARBON => 4,
        Element::NITROGEN => 3,
        _ => 2,
    };
    let metal = |(to, _): (u32, BondOrder)| atom(molecule, to).element.is_metal();
    own.charge == 0
        && valence(molecule, index) == expected
        && !molecule.neighbours(index).any(metal)
}

fn gives(molecule: &Molecule, index: u32) -> bool {
    let single = |(_, order)| order == BondOrder::Single;
    atom(molecule, index).hydrogens > 0
        && is_ordinary(molecule, index)
        && (is_hetero(molecule, index)
            || (is_mobile_carbon(molecule, index) && molecule.neighbours(index).all(single)))
}

fn takes(molecule: &Molecule, index: u32) -> bool {
    is_ordinary(molecule, index)
        && (is_hetero(molecule, index) || is_mobile_carbon(molecule, index))
}

/// Carbon with no hydroxy or thiol group (or their keto forms) and no amino group outside rings.
fn is_mobile_carbon(molecule: &Molecule, index: u32) -> bool {
    let terminal = |to: u32| {
        atom(molecule, to).element.group() == Some(16) && molecule.neighbours(to).nth(1).is_none()
    };
    let carbon = |(to, _): (u32, BondOrder)| atom(molecule, to).element == Element::CARBON;
    let amine = |to: u32| {
        atom(molecule, to).element == Element::NITROGEN
            && molecule.neighbours(to).all(carbon)
            && !in_ring(molecule, index, to, 8)
    };
    atom(molecule, index).element == Element::CARBON
        && !molecule.neighbours(index).any(|(to, _)| terminal(to) || amine(to))
}

/// Whether a bond outside rings joins carbon to a carboxylic acid, ester or amide group.
fn is_acyl_bond(molecule: &Molecule, c: u32, acyl: u32) -> bool {
    let element = |index: u32| atom(molecule, index).element;
    let oxygen = |to: u32| element(to) == Element::OXYGEN && molecule.neighbours(to).count() == 1;
    let hetero = |to: u32| [Element::NITROGEN, Element::OXYGEN].contains(&element(to));
    let others = || molecule.neighbours(acyl).map(|(to, _)| to);
    [c, acyl].iter().all(|&index| element(index) == Element::CARBON)
        && others().any(oxygen)
        && others().filter(|&to| hetero(to)).count() >= 2
        && !in_ring(molecule, c, acyl, u32::MAX)
}

/// Whether a bond is in a ring of up to a number of atoms.
fn in_ring(molecule: &Molecule, a: u32, b: u32, largest: u32) -> bool {
    let mut reached = std::collections::BTreeSet::from([a]);
    for _ in 1..largest.min(molecule.atom_count() as u32) {
        let next = reached.iter().flat_map(|&at| {
            let others = molecule.neighbours(at).map(|(to, _)| to);
            others.filter(move |&to| [at, to] != [a, b])
        });
        reached = reached.iter().copied().chain(next).collect();
    }
    reached.contains(&b)
}

fn shift(molecule: &Molecule, [x, y, z]: [u32; 3]) -> Molecule {
    let mut revision = Revision::of(molecule);
    revision.clear_stereo();
    for (index, change) in [(x, -1), (z, 1)] {
        let own = revision.atom_mut(index).unwrap();
        own.hydrogens = own.hydrogens.checked_add_signed(change).unwrap();
    }
    let at = |a: u32, b: u32| {
        let mut bonds = molecule.bonds();
        let found = bonds.position(|(p, q, _)| [p, q] == [a, b] || [q, p] == [a, b]);
        found.unwrap()
    };
    let (first, second) = (at(x, y), at(y, z));
    revision.set_bond(first, Some(BondOrder::Double));
    revision.set_bond(second, Some(BondOrder::Single));
    revision.finish().unwrap().molecule
}
