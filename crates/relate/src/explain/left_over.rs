//! What the map between records of different formula leaves over, piece by piece.

use molkin_graph::{Element, Formula};

use crate::{Structure, mapping::Heavy};

/// Connected atoms of one record that have no partner in the other; atoms from 0.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct LeftOver {
    /// The atoms, ascending.
    pub atoms: Vec<u32>,
    /// Their formula, hydrogens and charges as drawn included.
    pub formula: Formula,
    /// The mapped atoms that they are bonded to, ascending. None: the piece is a component of its own.
    pub on: Vec<u32>,
    /// What the trade calls it, where it is a single atom on one place.
    pub name: Option<&'static str>,
}

/// The pieces of one side, by their lowest atom. `mapped` says of each atom whether it has a partner.
pub(super) fn pieces(structure: &Structure, heavy: &Heavy, mapped: &[bool]) -> Vec<LeftOver> {
    if mapped.iter().all(|&mapped| mapped) {
        return Vec::new();
    }
    let neighbours = neighbours(heavy);
    let mut done = mapped.to_vec();
    let mut pieces = Vec::new();
    for start in 0..heavy.atoms.len() {
        if !std::mem::replace(&mut done[start], true) {
            let mut atoms = vec![start as u32];
            let mut at = 0;
            while let Some(&atom) = atoms.get(at) {
                at += 1;
                for &(to, _) in &neighbours[atom as usize] {
                    if !std::mem::replace(&mut done[to as usize], true) {
                        atoms.push(to);
                    }
                }
            }
            let outward = atoms.iter().flat_map(|&atom| &neighbours[atom as usize]);
            let outward = outward.filter(|&&(to, _)| mapped[to as usize]);
            let outward: Vec<(u32, u8)> = outward.copied().collect();
            pieces.push(piece(structure, heavy, &atoms, &outward));
        }
    }
    pieces.sort_unstable_by(|one, other| one.atoms.cmp(&other.atoms));
    pieces
}

/// Describes connected atoms by their places, with the mapped atoms next to them and the bonds between.
fn piece(
    structure: &Structure,
    heavy: &Heavy,
    positions: &[u32],
    outward: &[(u32, u8)],
) -> LeftOver {
    let source = |position: u32| heavy.atoms[position as usize].source;
    let mut on: Vec<u32> = outward.iter().map(|&(to, _)| source(to)).collect();
    on.sort_unstable();
    on.dedup();
    let mut atoms: Vec<u32> = positions.iter().map(|&atom| source(atom)).collect();
    atoms.sort_unstable();
    let counts = positions.iter().flat_map(|&position| {
        let atom = &heavy.atoms[position as usize];
        [
            (atom.element, 1),
            (Element::HYDROGEN, u32::from(atom.hydrogens)),
        ]
    });
    let charge = atoms
        .iter()
        .filter_map(|&atom| structure.molecule().atom(atom));
    let charge = charge.map(|atom| i32::from(atom.charge)).sum();
    let name = match (positions, outward, charge) {
        (&[only], &[(_, order)], 0) => {
            let atom = &heavy.atoms[only as usize];
            name(atom.element, atom.hydrogens, order)
        }
        _ => None,
    };
    LeftOver {
        atoms,
        formula: Formula::new(counts, charge),
        on,
        name,
    }
}

/// The name of a group of one non-hydrogen atom, bound by a bond of this order.
fn name(element: Element, hydrogens: u8, order: u8) -> Option<&'static str> {
    Some(match (element, hydrogens, order) {
        (Element::CARBON, 3, 1) => "methyl",
        (Element::CARBON, 2, 2) => "methylidene",
        (Element::NITROGEN, 2, 1) => "amino",
        (Element::OXYGEN, 1, 1) => "hydroxy",
        (Element::OXYGEN, 0, 2) => "oxo",
        (Element::SULFUR, 1, 1) => "sulfanyl",
        (Element::SULFUR, 0, 2) => "sulfanylidene",
        (Element::FLUORINE, 0, 1) => "fluorine",
        (Element::CHLORINE, 0, 1) => "chlorine",
        (Element::BROMINE, 0, 1) => "bromine",
        (Element::IODINE, 0, 1) => "iodine",
        _ => return None,
    })
}

/// For each atom its neighbours, with the order class of the bond.
fn neighbours(heavy: &Heavy) -> Vec<Vec<(u32, u8)>> {
    let mut neighbours = vec![Vec::new(); heavy.atoms.len()];
    for &(a, b, order) in &heavy.bonds {
        neighbours[a as usize].push((b, order));
        neighbours[b as usize].push((a, order));
    }
    neighbours
}

/// What each formula has more than the other, charges aside: CH2 of a homologue.
pub(crate) fn surplus(a: &Formula, b: &Formula) -> [Formula; 2] {
    let more = |own: &Formula, other: &Formula| {
        let counts = own.iter();
        let counts =
            counts.map(|(element, count)| (element, count.saturating_sub(other.count(element))));
        Formula::new(counts.collect::<Vec<_>>(), 0)
    };
    [more(a, b), more(b, a)]
}
