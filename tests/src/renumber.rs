//! The same molecule drawn otherwise: in another order, or with its hydrogens as atoms.

use molkin_graph::{
    Atom, BondOrder, CanonicalForm, DrawnCoordination, DrawnStereo, Element, FormStereo, Ligand,
    Molecule, MoleculeBuilder, Parity, Shape, StereoGroup,
};

use crate::Numbers;

/// A molecule with atoms, bonds, the ends of bonds, marks and the ligands of marks in random order.
///
/// # Panics
/// If the molecule cannot be rebuilt.
pub fn renumbered(molecule: &Molecule, numbers: &mut Numbers) -> Molecule {
    let order = numbers.order(molecule.atom_count());
    let place = inverse(&order);
    let mut builder = MoleculeBuilder::new();
    let atoms: Vec<Atom> = molecule.atoms().copied().collect();
    for &old in &order {
        builder.add_atom(atoms[old as usize]);
    }
    let mut bonds: Vec<_> = molecule.bonds().collect();
    numbers.shuffle(&mut bonds);
    for (a, b, order) in bonds {
        let (a, b) = (place[a as usize], place[b as usize]);
        let (a, b) = if numbers.coin() { (a, b) } else { (b, a) };
        builder.add_bond(a, b, order).unwrap();
    }
    let mut marks = molecule.drawn_stereo().to_vec();
    numbers.shuffle(&mut marks);
    for mark in marks {
        let (centres, ligands, odd) = reordered(mark.shape, mark.centres, mark.ligands, numbers);
        builder.add_stereo(DrawnStereo {
            shape: mark.shape,
            centres: centres.map(|atom| place[atom as usize]),
            ligands: ligands.map(|ligand| moved(ligand, &place)),
            parity: mark
                .parity
                .map(|parity| Parity::from_odd(parity.is_odd() ^ odd)),
        });
    }
    for mark in molecule.drawn_coordination() {
        builder.add_coordination(moved_coordination(mark, &place));
    }
    for group in molecule.stereo_groups() {
        let mut atoms: Vec<u32> = group.atoms.iter().map(|&a| place[a as usize]).collect();
        numbers.shuffle(&mut atoms);
        builder.add_group(StereoGroup {
            kind: group.kind,
            atoms,
        });
    }
    builder.build().unwrap()
}

/// A form with its atoms in random order, which is canonical no longer. Written, it gives another
/// spelling of the same molecule.
pub fn renumbered_form(form: &CanonicalForm, numbers: &mut Numbers) -> CanonicalForm {
    let order = numbers.order(form.atoms.len());
    let place = inverse(&order);
    let mut bonds: Vec<(u32, u32, u8)> = form
        .bonds
        .iter()
        .map(|&(a, b, order)| {
            let (a, b) = (place[a as usize], place[b as usize]);
            (a.min(b), a.max(b), order)
        })
        .collect();
    bonds.sort_unstable();
    let mut stereo: Vec<FormStereo> = form
        .stereo
        .iter()
        .map(|mark| {
            let (centres, ligands, odd) =
                reordered(mark.shape, mark.centres, mark.ligands, numbers);
            FormStereo {
                shape: mark.shape,
                centres: centres.map(|atom| place[atom as usize]),
                ligands: ligands.map(|ligand| moved(ligand, &place)),
                parity: Parity::from_odd(mark.parity.is_odd() ^ odd),
            }
        })
        .collect();
    stereo.sort_by_key(|mark| mark.centres);
    let coordination = form.coordination.iter();
    let mut coordination: Vec<_> = coordination
        .map(|mark| moved_coordination(mark, &place))
        .collect();
    coordination.sort_by_key(|mark| mark.centre);
    CanonicalForm {
        atoms: order.iter().map(|&old| form.atoms[old as usize]).collect(),
        bonds,
        stereo,
        coordination,
        groups: form.groups.clone(),
    }
}

/// A molecule with every hydrogen as an atom of its own.
///
/// # Panics
/// If the molecule cannot be rebuilt.
pub fn with_hydrogens_written(molecule: &Molecule) -> Molecule {
    let mut builder = MoleculeBuilder::new();
    for atom in molecule.atoms() {
        builder.add_atom(Atom {
            hydrogens: 0,
            ..*atom
        });
    }
    for (a, b, order) in molecule.bonds() {
        builder.add_bond(a, b, order).unwrap();
    }
    let mut first = vec![None; molecule.atom_count()];
    for (host, atom) in (0u32..).zip(molecule.atoms()) {
        for _ in 0..atom.hydrogens {
            let hydrogen = builder.add_atom(Atom::new(Element::HYDROGEN));
            builder.add_bond(host, hydrogen, BondOrder::Single).unwrap();
            first[host as usize].get_or_insert(hydrogen);
        }
    }
    for mark in molecule.drawn_stereo() {
        let mut mark = *mark;
        for (at, ligand) in mark.ligands.iter_mut().enumerate() {
            if *ligand == Ligand::Hydrogen {
                let host = mark.centres[at / 2];
                *ligand = first[host as usize].map_or(*ligand, Ligand::Atom);
            }
        }
        builder.add_stereo(mark);
    }
    for mark in molecule.drawn_coordination() {
        let mut mark = mark.clone();
        for ligand in &mut mark.ligands {
            if *ligand == Ligand::Hydrogen {
                *ligand = first[mark.centre as usize].map_or(*ligand, Ligand::Atom);
            }
        }
        builder.add_coordination(mark);
    }
    for group in molecule.stereo_groups() {
        builder.add_group(group.clone());
    }
    builder.build().unwrap()
}

/// The places at which the numbers of an order stand.
fn inverse(order: &[u32]) -> Vec<u32> {
    let mut place = vec![0; order.len()];
    for (new, &old) in (0..).zip(order) {
        place[old as usize] = new;
    }
    place
}

fn moved(ligand: Ligand, place: &[u32]) -> Ligand {
    match ligand {
        Ligand::Atom(atom) => Ligand::Atom(place[atom as usize]),
        other => other,
    }
}

fn moved_coordination(mark: &DrawnCoordination, place: &[u32]) -> DrawnCoordination {
    let ligands = mark.ligands.iter();
    DrawnCoordination {
        polyhedron: mark.polyhedron,
        centre: place[mark.centre as usize],
        ligands: ligands.map(|&ligand| moved(ligand, place)).collect(),
    }
}

/// Centres and ligands in another order, and whether the parity changes with it.
fn reordered(
    shape: Shape,
    mut centres: [u32; 2],
    mut ligands: [Ligand; 4],
    numbers: &mut Numbers,
) -> ([u32; 2], [Ligand; 4], bool) {
    let mut odd = false;
    if shape == Shape::Tetrahedral {
        for index in (1..4).rev() {
            let other = numbers.below(index + 1);
            ligands.swap(index, other);
            odd ^= other != index;
        }
        return (centres, ligands, odd);
    }
    for end in [0, 2] {
        if numbers.coin() {
            ligands.swap(end, end + 1);
            odd = !odd;
        }
    }
    // Both ends at once: an even permutation of four ligands, and the same sides of a double bond.
    if numbers.coin() {
        centres.swap(0, 1);
        ligands.rotate_left(2);
    }
    (centres, ligands, odd)
}
