//! What the map between records of different formula leaves over, piece by piece.

use molkin_graph::{Element, Formula};

use crate::{Structure, mapping::Heavy};

use super::moves::name;

/// Connected atoms of one record that have no partner in the other; atoms from 0.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct LeftOver {
    /// The atoms, ascending.
    pub atoms: Vec<u32>,
    /// Their formula, hydrogens and charges as drawn included.
    pub formula: Formula,
    /// The mapped atoms that they are bonded to, ascending. None: the piece is a component of its own.
    pub on: Vec<u32>,
    /// What the trade calls it, where it hangs on one place and the table of substituents has it.
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
            let outward = atoms.iter().flat_map(|&atom| {
                let near = neighbours[atom as usize].iter();
                near.map(move |&(to, order)| (atom, to, order))
            });
            let outward = outward.filter(|&(_, to, _)| mapped[to as usize]);
            pieces.push(piece(
                structure,
                heavy,
                &atoms,
                &outward.collect::<Vec<_>>(),
            ));
        }
    }
    pieces.sort_unstable_by(|one, other| one.atoms.cmp(&other.atoms));
    pieces
}

/// Describes connected atoms by their places, with the bonds to mapped atoms: own end, other end, order.
fn piece(
    structure: &Structure,
    heavy: &Heavy,
    positions: &[u32],
    outward: &[(u32, u32, u8)],
) -> LeftOver {
    let source = |position: u32| heavy.atoms[position as usize].source;
    let mut on: Vec<u32> = outward.iter().map(|&(_, to, _)| source(to)).collect();
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
    let name = match *outward {
        [(through, _, order)] => name(heavy, positions, through, order),
        _ => None,
    };
    LeftOver {
        atoms,
        formula: Formula::new(counts, charge),
        on,
        name,
    }
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
