//! Maps between structures: what the search sees of them, and its result in the numbers of the input.

use molkin_graph::{Element, Ligand, Limits, Mark, NormalAtom};

use crate::{FunctionalGroup, Structure, functional_groups};

use super::{Arm, Arrangement, Effort, Mapping, MappingError, Side, map_atoms};

/// The order class of a mobile bond, beside 1 to 4.
const MOBILE: u8 = 5;

/// Non-hydrogen atoms and bonds of a record in canonical order.
pub(crate) struct Heavy {
    pub(crate) atoms: Vec<NormalAtom>,
    pub(crate) bonds: Vec<(u32, u32, u8)>,
    /// Marked stereo elements.
    stereo: Vec<Arrangement>,
    /// Automorphisms of the constitution: moved atoms with their images.
    symmetries: Vec<Vec<(u32, u32)>>,
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
        let moved = |&(from, to): &(u32, u32)| Some((place[from as usize]?, place[to as usize]?));
        let symmetries = structure.canonical().automorphisms().into_iter();
        let symmetries = symmetries.map(|symmetry| symmetry.iter().filter_map(moved).collect());
        let symmetries = symmetries.filter(|symmetry: &Vec<_>| !symmetry.is_empty());
        Self {
            stereo: arrangements(structure, &atoms),
            atoms,
            bonds,
            symmetries: symmetries.collect(),
        }
    }
}

/// The marked stereo elements of a record on its non-hydrogen atoms.
fn arrangements(structure: &Structure, atoms: &[NormalAtom]) -> Vec<Arrangement> {
    let elements = structure.canonical().stereo_elements();
    if elements.is_empty() {
        return Vec::new();
    }
    let molecule = structure.molecule();
    let places = places(structure, atoms);
    let place = |atom: u32| places.get(atom as usize).copied().flatten();
    let arm = |ligand: Ligand| match ligand {
        Ligand::LonePair => Arm::LonePair,
        Ligand::Hydrogen => Arm::Hydrogen(0),
        Ligand::Atom(atom) => match place(atom) {
            Some(place) => Arm::Atom(place),
            None => Arm::Hydrogen(molecule.atom(atom).and_then(|own| own.isotope).unwrap_or(0)),
        },
    };
    let marked = elements.iter().filter_map(|element| {
        let Mark::Given(parity) = element.mark else {
            return None;
        };
        let [first, second] = element.centres.map(place);
        Some(Arrangement {
            centres: [first?, second?],
            arms: element.ligands.map(arm),
            odd: parity.is_odd(),
        })
    });
    marked.collect()
}

/// For each atom of the record its place among the given ones.
fn places(structure: &Structure, atoms: &[NormalAtom]) -> Vec<Option<u32>> {
    let mut places = vec![None; structure.molecule().atom_count()];
    for (place, atom) in (0..).zip(atoms) {
        places[atom.source as usize] = Some(place);
    }
    places
}

/// A label for the functional group of each atom, equal for equal groups of either side; nothing where the groups of a side
/// are not known.
fn group_labels(
    structures: [&Structure; 2],
    heavy: [&Heavy; 2],
    groups: &[Option<Vec<FunctionalGroup>>; 2],
) -> [Vec<u32>; 2] {
    let [Some(own), Some(others)] = groups else {
        return [Vec::new(), Vec::new()];
    };
    let all = own.iter().chain(others);
    let mut known: Vec<&[u64]> = all.map(|group| group.certificate.as_slice()).collect();
    known.sort_unstable();
    known.dedup();
    let mut side = 0;
    [own, others].map(|groups| {
        let places = places(structures[side], &heavy[side].atoms);
        let mut labels = vec![0; heavy[side].atoms.len()];
        side += 1;
        for group in groups {
            let label = known.partition_point(|&other| other < group.certificate.as_slice());
            for place in group.atoms.iter().filter_map(|&atom| places[atom as usize]) {
                labels[place as usize] = label as u32 + 1;
            }
        }
        labels
    })
}

/// What an atom carries beside element and hydrogens.
type AtomMark = (Option<i8>, Option<u8>, Option<u16>, [u8; 3]);

fn mark(atom: &NormalAtom) -> AtomMark {
    (atom.charge, atom.open, atom.isotope, atom.labelled)
}

/// Both sides for the search; equal marks get equal numbers, whichever side they are on.
pub(crate) fn sides(
    structures: [&Structure; 2],
    heavy: [&Heavy; 2],
    groups: &[Option<Vec<FunctionalGroup>>; 2],
) -> [Side; 2] {
    let all = heavy.iter().flat_map(|side| &side.atoms);
    let mut known: Vec<AtomMark> = all.map(mark).collect();
    known.sort_unstable();
    known.dedup();
    let number =
        |atom: &NormalAtom| known.binary_search(&mark(atom)).unwrap_or_else(|at| at) as u32;
    let side = |(side, groups): (&Heavy, Vec<u32>)| Side {
        elements: side
            .atoms
            .iter()
            .map(|atom| atom.element.number())
            .collect(),
        hydrogens: side.atoms.iter().map(|atom| atom.hydrogens).collect(),
        marks: side.atoms.iter().map(number).collect(),
        bonds: side.bonds.clone(),
        groups,
        stereo: side.stereo.clone(),
        symmetries: side.symmetries.clone(),
    };
    let [left, right] = heavy;
    let [groups_left, groups_right] = group_labels(structures, heavy, groups);
    [(left, groups_left), (right, groups_right)].map(side)
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
    let groups = [a, b].map(|side| functional_groups(side, limits).ok());
    let [first, second] = sides([a, b], [&left, &right], &groups);
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
