//! Maps between structures: what the search sees of them, and its result in the numbers of the input.

use molkin_graph::{Element, Limits, NormalAtom};

use crate::Structure;

use super::{Effort, Mapping, MappingError, Side, map_atoms};

/// The order class of a mobile bond, beside 1 to 4.
const MOBILE: u8 = 5;

/// Non-hydrogen atoms and bonds of a record in canonical order.
pub(crate) struct Heavy {
    pub(crate) atoms: Vec<NormalAtom>,
    pub(crate) bonds: Vec<(u32, u32, u8)>,
}

impl Heavy {
    pub(crate) fn of(structure: &Structure) -> Self {
        let form = structure.canonical().normal_form();
        let mut place = vec![None; form.atoms.len()];
        let mut atoms = Vec::new();
        for (slot, atom) in place.iter_mut().zip(&form.atoms) {
            if atom.element != Element::HYDROGEN {
                *slot = Some(atoms.len() as u32);
                atoms.push(*atom);
            }
        }
        let mut bonds: Vec<(u32, u32, u8)> = form
            .bonds
            .iter()
            .filter_map(|bond| {
                let (a, b) = (place[bond.a as usize]?, place[bond.b as usize]?);
                Some((a.min(b), a.max(b), bond.order.unwrap_or(MOBILE)))
            })
            .collect();
        bonds.sort_unstable();
        Self { atoms, bonds }
    }
}

/// What an atom carries beside element and hydrogens.
type AtomMark = (Option<i8>, Option<u8>, Option<u16>, [u8; 3]);

fn mark(atom: &NormalAtom) -> AtomMark {
    (atom.charge, atom.open, atom.isotope, atom.labelled)
}

/// Both sides for the search; equal marks get equal numbers, whichever side they are on.
pub(crate) fn sides(left: &Heavy, right: &Heavy) -> [Side; 2] {
    let mut known: Vec<AtomMark> = left.atoms.iter().chain(&right.atoms).map(mark).collect();
    known.sort_unstable();
    known.dedup();
    [left, right].map(|side| Side {
        elements: side
            .atoms
            .iter()
            .map(|atom| atom.element.number())
            .collect(),
        hydrogens: side.atoms.iter().map(|atom| atom.hydrogens).collect(),
        marks: side
            .atoms
            .iter()
            .map(|atom| known.binary_search(&mark(atom)).unwrap_or_else(|at| at) as u32)
            .collect(),
        bonds: side.bonds.clone(),
    })
}

/// Finds the map of least distance between two structures, of one formula or of two; atoms from 0 in input order.
///
/// # Returns
/// As [`map_atoms`], within `limits.map_steps`. The canonical order decides which of several equally good maps is given.
/// # Errors
/// See [`MappingError`]; structures as the readers build them give none.
/// # Examples
/// ```
/// use molkin_formats::smiles;
/// use molkin_graph::{Limits, Orderer};
/// use molkin_relate::{Structure, mapping::map_structures};
///
/// let limits = Limits::default();
/// let mut orderer = Orderer::new(limits);
/// let toluene = Structure::new(&mut orderer, smiles::parse("Cc1ccccc1")?)?;
/// let benzene = Structure::new(&mut orderer, smiles::parse("c1ccccc1")?)?;
/// let found = map_structures(&toluene, &benzene, &limits)?;
/// assert_eq!(found.left_over_a, [0]);
/// assert_eq!((found.distance.bonds, found.proved.bonds), (1, true));
/// # Ok::<(), Box<dyn std::error::Error>>(())
/// ```
pub fn map_structures(
    a: &Structure,
    b: &Structure,
    limits: &Limits,
) -> Result<Mapping, MappingError> {
    let [left, right] = [a, b].map(Heavy::of);
    let [first, second] = sides(&left, &right);
    let effort = Effort {
        steps: limits.map_steps,
        stop: limits.stop,
    };
    let mut mapping = map_atoms(&first, &second, &effort)?;
    for pair in &mut mapping.pairs {
        let (x, y) = (pair.0 as usize, pair.1 as usize);
        *pair = (left.atoms[x].source, right.atoms[y].source);
    }
    mapping.pairs.sort_unstable();
    for (list, side) in [
        (&mut mapping.left_over_a, &left),
        (&mut mapping.left_over_b, &right),
    ] {
        for atom in list.iter_mut() {
            *atom = side.atoms[*atom as usize].source;
        }
        list.sort_unstable();
    }
    Ok(mapping)
}
