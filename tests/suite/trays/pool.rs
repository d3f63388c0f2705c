//! Structures to make trays of.

use std::{
    collections::{BTreeMap, HashSet},
    sync::Arc,
};

use molkin_formats::{Record, source::RecordOutcome};
use molkin_graph::{
    Atom, BondOrder, Element, Limits, Molecule, MoleculeBuilder, Orderer, monoisotopic_mass,
};
use molkin_relate::wire::Prepared;
use molkin_tests::{collection, mirrored};

/// Compounds of different constitution.
pub(super) struct Pool {
    pub(super) compounds: Vec<Compound>,
    /// Those of one formula, where there are several.
    pub(super) isomers: Vec<Vec<usize>>,
}

/// A compound, and relatives of it.
pub(super) struct Compound {
    pub(super) record: Arc<Prepared>,
    /// Its mirror image, where that is another compound.
    pub(super) mirror: Option<Arc<Prepared>>,
    /// With a molecule of hydrogen chloride.
    pub(super) salt: Arc<Prepared>,
    /// Place among [`Pool::isomers`].
    pub(super) formula: Option<usize>,
    /// m/z of the protonated molecule.
    pub(super) mz: f64,
}

impl Pool {
    /// Neutral compounds of one component from open collections, where they are there.
    pub(super) fn new() -> Option<Self> {
        let mut orderer = Orderer::new(Limits::default());
        let mut constitutions = HashSet::new();
        let mut compounds: Vec<Compound> = Vec::new();
        let mut formulae: BTreeMap<String, Vec<usize>> = BTreeMap::new();
        for file in ["vendor.smi", "actives.smi.gz"] {
            for outcome in collection(file)? {
                let Ok(record) = outcome.unwrap().result else {
                    continue;
                };
                let Some(compound) = Compound::new(&mut orderer, record.molecule) else {
                    continue;
                };
                let structure = compound.record.structure().unwrap();
                if constitutions.insert(structure.canonical().constitution_key()) {
                    let formula = structure.formula().to_string();
                    formulae.entry(formula).or_default().push(compounds.len());
                    compounds.push(compound);
                }
            }
        }
        let several = formulae.into_values().filter(|list| list.len() > 1);
        let isomers: Vec<Vec<usize>> = several.collect();
        for (number, list) in isomers.iter().enumerate() {
            for &compound in list {
                compounds[compound].formula = Some(number);
            }
        }
        Some(Self { compounds, isomers })
    }
}

impl Compound {
    fn new(orderer: &mut Orderer, molecule: Molecule) -> Option<Self> {
        let charged = molecule.charge() != 0;
        let labelled = molecule.atoms().any(|atom| atom.isotope.is_some());
        let carbon = molecule.formula().count(Element::CARBON) > 0;
        if charged || labelled || !carbon || molecule.atom_count() > 50 || parts(&molecule) > 1 {
            return None;
        }
        let record = prepared(orderer, molecule.clone())?;
        let mirror = prepared(orderer, mirrored(&molecule))?;
        let own = |prepared: &Prepared| prepared.structure().unwrap().canonical().compound_key();
        let mirror = (own(&mirror) != own(&record)).then_some(mirror);
        let salt = prepared(orderer, hydrochloride(&molecule))?;
        let proton = [(Element::HYDROGEN, None, 1)];
        let formula = molecule.formula();
        let atoms = formula
            .iter()
            .map(|(element, count)| (element, None, count));
        let mz = monoisotopic_mass(atoms.chain(proton), 1).ok()?.dalton();
        Some(Self {
            record,
            mirror,
            salt,
            formula: None,
            mz,
        })
    }
}

fn prepared(orderer: &mut Orderer, molecule: Molecule) -> Option<Arc<Prepared>> {
    let outcome = RecordOutcome {
        result: Ok(Record {
            molecule,
            ..Record::default()
        }),
        ..RecordOutcome::default()
    };
    let prepared = Prepared::new(orderer, "pool", outcome);
    prepared.structure()?;
    Some(Arc::new(prepared))
}

/// Connected parts.
fn parts(molecule: &Molecule) -> usize {
    let mut root: Vec<usize> = (0..molecule.atom_count()).collect();
    let mut parts = root.len();
    for (a, b, _) in molecule.bonds() {
        let find = |root: &[usize], mut at: usize| {
            while root[at] != at {
                at = root[at];
            }
            at
        };
        let (a, b) = (find(&root, a as usize), find(&root, b as usize));
        if a != b {
            root[a] = b;
            parts -= 1;
        }
    }
    parts
}

fn hydrochloride(molecule: &Molecule) -> Molecule {
    let mut builder = MoleculeBuilder::new();
    for atom in molecule.atoms() {
        builder.add_atom(*atom);
    }
    for (a, b, order) in molecule.bonds() {
        builder.add_bond(a, b, order).unwrap();
    }
    for mark in molecule.drawn_stereo() {
        builder.add_stereo(*mark);
    }
    for group in molecule.stereo_groups() {
        builder.add_group(group.clone());
    }
    let chlorine = builder.add_atom(Atom::new(Element::CHLORINE));
    let hydrogen = builder.add_atom(Atom::new(Element::HYDROGEN));
    builder
        .add_bond(chlorine, hydrogen, BondOrder::Single)
        .unwrap();
    builder.build().unwrap()
}
