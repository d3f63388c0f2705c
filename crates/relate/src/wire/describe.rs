//! One described record.

use molkin_formats::{
    Record,
    smiles::{self, Lost},
};
use molkin_graph::{Element, Mark, Molecule, Orderer, average_mass, monoisotopic_mass};
use serde::Serialize;

use crate::{
    Structure,
    remarks::{self, Noted, atoms_in_words},
};

use super::{Error, Note, VERSION, element_name, from_one};

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
    /// `tetrahedral`, `double-bond` or `axis`.
    pub element: &'static str,
    /// `given` or `absent`.
    pub mark: &'static str,
}

/// Describes a record in the terms of the contract; what cannot be described comes with `errors`.
pub fn describe(
    orderer: &mut Orderer,
    source: &str,
    number: u64,
    name: &str,
    outcome: Result<Record, Error>,
) -> Describe {
    let mut described = Describe {
        version: VERSION,
        source: source.to_owned(),
        record: number,
        name: name.to_owned(),
        formula: None,
        masses: None,
        unsaturation: None,
        smiles: None,
        constitution_key: None,
        compound_key: None,
        open: None,
        stereo: None,
        notes: None,
        errors: None,
    };
    match outcome {
        Err(error) => described.errors = Some(vec![error]),
        Ok(record) => {
            described.name = record.name;
            match Structure::new(orderer, record.molecule) {
                Err(error) => {
                    described.errors = Some(vec![Error {
                        input: None,
                        line: None,
                        column: None,
                        code: error.code().to_owned(),
                        message: error.to_string(),
                    }]);
                }
                Ok(structure) => {
                    let read = record.notes.iter().map(|note| Note::of_reader(note, None));
                    described.fill(&structure, read.collect());
                }
            }
        }
    }
    described
}

impl Describe {
    fn fill(&mut self, structure: &Structure, mut notes: Vec<Note>) {
        let canonical = structure.canonical();
        let written = smiles::write(&canonical.form());
        notes.extend(
            remarks::of_record(structure)
                .into_iter()
                .map(|n| Note::of(n, None)),
        );
        let order: Vec<u32> = canonical.order().collect();
        notes.extend(
            written
                .lost
                .iter()
                .map(|lost| Note::of(lost_in_smiles(lost, &order), None)),
        );
        self.formula = Some(structure.formula().to_string());
        self.masses = masses(structure.molecule());
        let unsaturation = structure.molecule().unsaturation();
        self.unsaturation = Some(Unsaturation {
            exact: unsaturation.exact,
            textbook: unsaturation
                .textbook_doubled
                .map(|doubled| doubled as f64 / 2.0),
        });
        self.smiles = Some(written.text);
        self.constitution_key = Some(canonical.constitution_key().to_string());
        self.compound_key = Some(canonical.compound_key().to_string());
        self.open = Some(canonical.is_open());
        self.stereo = Some(
            canonical
                .stereo_elements()
                .iter()
                .map(|element| {
                    let [a, b] = element.centres;
                    let atoms = if a == b {
                        vec![a]
                    } else {
                        vec![a.min(b), a.max(b)]
                    };
                    Stereo {
                        atoms: from_one(&atoms),
                        element: element_name(element.shape),
                        mark: match element.mark {
                            Mark::Given(_) => "given",
                            Mark::Absent => "absent",
                        },
                    }
                })
                .collect(),
        );
        self.notes = Some(notes);
    }
}

/// What canonical SMILES could not say; `order` gives the atoms of the record in canonical order.
fn lost_in_smiles(lost: &Lost, order: &[u32]) -> Noted {
    match lost {
        Lost::Arrangement { centres, .. } => {
            let mut atoms: Vec<u32> = centres
                .iter()
                .filter_map(|&at| order.get(at as usize).copied())
                .collect();
            atoms.sort_unstable();
            atoms.dedup();
            let text = format!(
                "SMILES cannot say the arrangement at {}.",
                atoms_in_words(&atoms)
            );
            Noted {
                code: "smiles-loses-stereo",
                atoms,
                text,
            }
        }
        _ => Noted {
            code: "smiles-ring-labels",
            atoms: Vec::new(),
            text: "The SMILES needs more than 99 ring labels at once, beyond the standard."
                .to_owned(),
        },
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
