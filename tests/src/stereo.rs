//! Molecules with other marks.

use std::collections::BTreeMap;

use molkin_graph::{
    Canonical, DrawnStereo, Element, Label, Ligand, Limits, Molecule, MoleculeBuilder, Parity,
    Polyhedron, Shape, StereoElement, StereoGroup,
};

/// The mirror image.
///
/// # Panics
/// If the molecule cannot be rebuilt.
pub fn mirrored(molecule: &Molecule) -> Molecule {
    let marks = molecule.drawn_stereo().iter().map(|mark| DrawnStereo {
        parity: match mark.shape {
            Shape::DoubleBond => mark.parity,
            _ => mark.parity.map(Parity::inverted),
        },
        ..*mark
    });
    let coordination = molecule.drawn_coordination().iter().map(|mark| {
        let mut mark = mark.clone();
        // A plane through the axis that holds one of the other positions exchanges two of them.
        match mark.polyhedron {
            Polyhedron::SquarePlanar => {}
            Polyhedron::TrigonalBipyramidal => mark.ligands.swap(3, 4),
            Polyhedron::Octahedral => mark.ligands.swap(3, 5),
        }
        mark
    });
    let mut builder = skeleton(molecule);
    marks.for_each(|mark| builder.add_stereo(mark));
    coordination.for_each(|mark| builder.add_coordination(mark));
    for group in molecule.stereo_groups() {
        builder.add_group(group.clone());
    }
    builder.build().unwrap()
}

/// The places of a molecule that may carry marks, itself left unmarked.
#[derive(Debug)]
pub struct Markings<'m> {
    molecule: &'m Molecule,
    places: Vec<DrawnStereo>,
    /// Per place the centres that it stands for.
    named: Vec<Vec<u32>>,
}

impl<'m> Markings<'m> {
    /// All carbon atoms with four ligands, at most one of them hydrogen, whether or not symmetry
    /// makes centres of them; and the double bonds and axes among `elements`.
    pub fn new(molecule: &'m Molecule, elements: &[StereoElement]) -> Self {
        let centres = (0u32..).zip(molecule.atoms()).filter_map(|(index, atom)| {
            let neighbours = molecule.neighbours(index);
            let mut ligands: Vec<Ligand> = neighbours.map(|(n, _)| Ligand::Atom(n)).collect();
            if atom.hydrogens == 1 {
                ligands.push(Ligand::Hydrogen);
            }
            let carbon = atom.element == Element::CARBON && atom.hydrogens <= 1;
            Some(DrawnStereo {
                shape: Shape::Tetrahedral,
                centres: [index, index],
                ligands: ligands.try_into().ok().filter(|_| carbon)?,
                parity: None,
            })
        });
        let others = elements
            .iter()
            .filter(|element| element.shape != Shape::Tetrahedral)
            .map(|element| DrawnStereo {
                shape: element.shape,
                centres: element.centres,
                ligands: element.ligands,
                parity: None,
            });
        let places: Vec<DrawnStereo> = centres.chain(others).collect();
        Self {
            molecule,
            named: places.iter().map(|own| own.centres.to_vec()).collect(),
            places,
        }
    }

    /// One place for each element that is independent of the others: of bridgeheads that determine
    /// each other the first.
    pub fn independent(molecule: &'m Molecule, elements: &[StereoElement]) -> Self {
        let mut own: BTreeMap<usize, (DrawnStereo, Vec<u32>)> = BTreeMap::new();
        for element in elements {
            let place = DrawnStereo {
                shape: element.shape,
                centres: element.centres,
                ligands: element.ligands,
                parity: None,
            };
            let (_, named) = own.entry(element.variable).or_insert((place, Vec::new()));
            named.extend(element.centres);
        }
        let (places, named) = own.into_values().unzip();
        Self {
            molecule,
            places,
            named,
        }
    }

    /// The number of places.
    pub fn places(&self) -> usize {
        self.places.len()
    }

    /// The number of atoms.
    pub fn atoms(&self) -> u32 {
        self.molecule.atom_count() as u32
    }

    /// The molecule with the given marks, one for each place.
    ///
    /// # Panics
    /// If the molecule cannot be rebuilt.
    pub fn marked(&self, marks: &[Option<Parity>]) -> Molecule {
        let mut builder = skeleton(self.molecule);
        for (place, &parity) in self.places.iter().zip(marks) {
            builder.add_stereo(DrawnStereo { parity, ..*place });
        }
        builder.build().unwrap()
    }

    /// The molecule with the given marks and stereo groups.
    ///
    /// # Panics
    /// If the molecule cannot be rebuilt.
    pub fn grouped(&self, marks: &[Option<Parity>], groups: &[StereoGroup]) -> Molecule {
        let mut builder = skeleton(self.molecule);
        for (place, &parity) in self.places.iter().zip(marks) {
            builder.add_stereo(DrawnStereo { parity, ..*place });
        }
        for group in groups {
            builder.add_group(group.clone());
        }
        builder.build().unwrap()
    }

    /// The atom by which a stereo group names a place.
    pub fn centre(&self, place: usize) -> u32 {
        self.places[place].centres[0]
    }

    /// All atoms by which a stereo group may name a place.
    pub fn names(&self, place: usize) -> &[u32] {
        &self.named[place]
    }

    /// Every way to mark all places; 2 to the number of places.
    pub fn full(&self) -> impl Iterator<Item = Vec<Option<Parity>>> + use<> {
        completions(&vec![None; self.places()])
    }
}

/// Every way to give the marks that are left open.
///
/// # Panics
/// If twenty or more are open.
pub fn completions(marks: &[Option<Parity>]) -> impl Iterator<Item = Vec<Option<Parity>>> + use<> {
    let marks = marks.to_vec();
    let open: Vec<usize> = (0..marks.len()).filter(|&at| marks[at].is_none()).collect();
    assert!(open.len() < 20, "too many combinations");
    (0u32..1 << open.len()).map(move |choice| {
        let mut full = marks.clone();
        for (bit, &at) in open.iter().enumerate() {
            full[at] = Some(Parity::from_odd(choice >> bit & 1 == 1));
        }
        full
    })
}

/// A molecule with every combination of marks on its carbon atoms; see [`Markings::new`].
///
/// # Panics
/// If the molecule cannot be rebuilt, or has twenty such atoms.
pub fn all_markings(molecule: &Molecule) -> Vec<Molecule> {
    let markings = Markings::new(molecule, &[]);
    let full = markings.full();
    full.map(|marks| markings.marked(&marks)).collect()
}

/// A molecule with other stereo groups.
///
/// # Panics
/// If the molecule cannot be rebuilt.
pub fn grouped(molecule: &Molecule, groups: &[StereoGroup]) -> Molecule {
    let mut builder = skeleton(molecule);
    for mark in molecule.drawn_stereo() {
        builder.add_stereo(*mark);
    }
    for mark in molecule.drawn_coordination() {
        builder.add_coordination(mark.clone());
    }
    for group in groups {
        builder.add_group(group.clone());
    }
    builder.build().unwrap()
}

/// Atoms and bonds of a molecule, without marks.
fn skeleton(molecule: &Molecule) -> MoleculeBuilder {
    let mut builder = MoleculeBuilder::new();
    for atom in molecule.atoms() {
        builder.add_atom(*atom);
    }
    for (a, b, order) in molecule.bonds() {
        builder.add_bond(a, b, order).unwrap();
    }
    builder
}

/// The centres, or ends, that have a CIP label, and the labels: those of the stereo elements, and those
/// of bridgeheads whose marks say nothing about the compound.
pub fn all_labels(canonical: &Canonical) -> Vec<([u32; 2], Label)> {
    let limits = Limits::default();
    let counting = canonical.stereo_elements().into_iter();
    let idle = canonical.idle_bridgeheads().into_iter();
    let counting = counting.zip(canonical.labels(&limits));
    let idle = idle.zip(canonical.idle_bridgehead_labels(&limits));
    counting
        .chain(idle)
        .filter_map(|(element, labelling)| Some((element.centres, labelling.label()?)))
        .collect()
}
