//! One described record.

use molkin_graph::{
    Element, GroupKind, Label, Labelling, Limits, Mark, Molecule, StereoElement, average_mass,
    monoisotopic_mass,
};
use serde::Serialize;

use crate::{Geometry, Structure, remarks};

use super::{Error, Note, Prepared, VERSION, numbers};

/// What is known about one record. Either `errors` or the fields from `formula` on are there.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct Describe {
    /// Contract version.
    pub version: u32,
    /// File name, `-`, or the SMILES text as given.
    pub source: String,
    /// Number of the record in its source, from 1.
    pub record: u64,
    /// Name or title; empty where there is none.
    pub name: String,
    /// Formula in Hill order.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub formula: Option<String>,
    /// Masses, where every element has one.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub masses: Option<Masses>,
    /// Rings plus π bonds.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub unsaturation: Option<Unsaturation>,
    /// Canonical SMILES.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub smiles: Option<String>,
    /// Key of the constitution: no stereo, no isotopes.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub constitution_key: Option<String>,
    /// Key of the compound: isotopes and all claims about stereo.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub compound_key: Option<String>,
    /// Whether the record stands for more than one possible sample.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub open: Option<bool>,
    /// Stereo elements.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub stereo: Option<Vec<Stereo>>,
    /// Remarks.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub notes: Option<Vec<Note>>,
    /// Why the record could not be described.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub errors: Option<Vec<Error>>,
}

/// Masses in dalton, that of the electrons included.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct Masses {
    /// From standard atomic weights, stated isotopes by their own mass.
    pub average: f64,
    /// Of the most abundant isotopes, stated ones as stated.
    pub monoisotopic: f64,
}

/// Degree of unsaturation.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct Unsaturation {
    /// Counted on the drawing.
    pub exact: i64,
    /// By the textbook formula, where it applies.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub textbook: Option<f64>,
}

/// A stereo element.
#[derive(Debug, Clone, PartialEq, Eq, Serialize)]
pub struct Stereo {
    /// Centre or ends.
    pub atoms: Vec<u32>,
    /// `tetrahedral`, `double-bond`, `axis`, `square-planar`, `trigonal-bipyramidal` or `octahedral`.
    pub element: &'static str,
    /// CIP label, where it has one.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub label: Option<&'static str>,
    /// `given`, `absent`, or `idle`: on a bridgehead, and says nothing about the compound.
    pub mark: &'static str,
    /// The stereo group of the mark, where it has one.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub group: Option<Group>,
    /// Centre or ends of each element without which this one were not stereogenic; none where that is
    /// not worked out.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub depends_on: Option<Vec<Vec<u32>>>,
}

/// A stereo group.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Serialize)]
pub struct Group {
    /// `and`, `or` or `relative`.
    pub kind: &'static str,
    /// Equal for the elements of one group; from 1.
    pub number: usize,
}

/// Describes a record in the terms of the contract; what cannot be described comes with `errors`.
pub fn describe(prepared: &Prepared, limits: &Limits) -> Describe {
    let input = prepared.input();
    let mut described = Describe {
        version: VERSION,
        source: input.source.clone(),
        record: input.record,
        name: input.name.clone(),
        formula: input.formula.clone(),
        masses: None,
        unsaturation: None,
        smiles: input.smiles.clone(),
        constitution_key: None,
        compound_key: None,
        open: None,
        stereo: None,
        notes: None,
        errors: None,
    };
    match prepared.parts() {
        Err(error) => described.errors = Some(vec![error.clone()]),
        Ok((structure, notes)) => {
            let labels = structure.canonical().labels(limits);
            described.fill(structure, &labels, limits);
            let unlabelled = remarks::unlabelled(structure, &labels);
            let note = |noted| Note::of(structure.molecule(), noted);
            let own = remarks::meso(structure).into_iter().chain(unlabelled);
            described.notes = Some(notes.iter().cloned().chain(own.map(note)).collect());
        }
    }
    described
}

impl Describe {
    fn fill(&mut self, structure: &Structure, labels: &[Labelling], limits: &Limits) {
        let canonical = structure.canonical();
        self.masses = masses(structure.molecule());
        let unsaturation = structure.molecule().unsaturation();
        self.unsaturation = Some(Unsaturation {
            exact: unsaturation.exact,
            textbook: unsaturation
                .textbook_doubled
                .map(|doubled| doubled as f64 / 2.0),
        });
        self.constitution_key = Some(canonical.constitution_key().to_string());
        self.compound_key = Some(canonical.compound_key().to_string());
        self.open = Some(canonical.is_open());
        let elements = canonical.stereo_elements();
        let metals = canonical.coordination_elements();
        let molecule = structure.molecule();
        let metals = metals.iter().map(|element| Stereo {
            atoms: numbers(molecule, &[element.centre]),
            element: Geometry::Coordination(element.polyhedron).as_str(),
            label: None,
            mark: "given",
            group: None,
            depends_on: None,
        });
        let elements = elements.iter().zip(labels);
        let elements =
            elements.map(|(element, labelling)| Stereo::of(molecule, element, labelling.label()));
        let mut elements: Vec<Stereo> = elements.collect();
        for (element, supports) in elements
            .iter_mut()
            .zip(canonical.dependences().unwrap_or_default())
        {
            let supports = supports.into_iter().map(|ends| centres(molecule, ends));
            element.depends_on = Some(supports.collect());
        }
        put_idle_bridgeheads(&mut elements, structure, limits);
        self.stereo = Some(elements.into_iter().chain(metals).collect());
    }
}

/// Adds bridgeheads whose marks say nothing about the compound, with their labels; those that are open
/// have an entry already.
fn put_idle_bridgeheads(entries: &mut Vec<Stereo>, structure: &Structure, limits: &Limits) {
    let canonical = structure.canonical();
    let labels = canonical.idle_bridgehead_labels(limits);
    for (element, labelling) in canonical.idle_bridgeheads().iter().zip(labels) {
        let mut own = Stereo::of(structure.molecule(), element, labelling.label());
        own.mark = "idle";
        match entries.iter_mut().find(|entry| entry.atoms == own.atoms) {
            Some(entry) => {
                own.depends_on = entry.depends_on.take();
                *entry = own;
            }
            None => entries.push(own),
        }
    }
}

impl Stereo {
    fn of(molecule: &Molecule, element: &StereoElement, label: Option<Label>) -> Self {
        Self {
            atoms: centres(molecule, element.centres),
            element: Geometry::Element(element.shape).as_str(),
            label: label.map(Label::as_str),
            mark: match element.mark {
                Mark::Given(_) => "given",
                Mark::Absent => "absent",
            },
            group: element.group.map(Group::of),
            depends_on: None,
        }
    }
}

impl Group {
    pub(super) fn of((kind, number): (GroupKind, usize)) -> Self {
        Self {
            kind: match kind {
                GroupKind::And => "and",
                GroupKind::Or => "or",
                GroupKind::Relative => "relative",
            },
            number: number + 1,
        }
    }
}

/// The numbers of a centre, or of both ends.
fn centres(molecule: &Molecule, [a, b]: [u32; 2]) -> Vec<u32> {
    match a == b {
        true => numbers(molecule, &[a]),
        false => numbers(molecule, &[a.min(b), a.max(b)]),
    }
}

fn masses(molecule: &Molecule) -> Option<Masses> {
    let nuclides = || {
        let atoms = molecule.atoms().map(|atom| (atom.element, atom.isotope, 1));
        let hydrogens = molecule
            .atoms()
            .map(|atom| (Element::HYDROGEN, None, u32::from(atom.hydrogens)));
        atoms.chain(hydrogens)
    };
    let charge = molecule.charge();
    let average = average_mass(nuclides(), charge).ok()?.dalton();
    let monoisotopic = monoisotopic_mass(nuclides(), charge).ok()?.dalton();
    Some(Masses {
        average,
        monoisotopic,
    })
}
