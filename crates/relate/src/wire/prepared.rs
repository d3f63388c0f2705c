//! A record made ready, once, for everything the contract can say about it.

use molkin_formats::{
    ReadError,
    smiles::{self, Lost},
    source::RecordOutcome,
};
use molkin_graph::{Molecule, Orderer};

use crate::{
    Axes, Normaliser, Structure,
    remarks::{self, Noted, atoms_in_words},
};

use super::{Error, Input, Note};

/// A record of a source, read and ordered, or the reason why it could not be.
///
/// # Examples
/// ```
/// use molkin_formats::source::{Format, ReadOptions, Records};
/// use molkin_graph::{Limits, Orderer};
/// use molkin_relate::wire::{Prepared, compare};
///
/// let limits = Limits::default();
/// let mut orderer = Orderer::new(limits);
/// let file = "CCO ethanol\nCOC dimethyl ether\n";
/// let mut sides = Vec::new();
/// for outcome in Records::new("two.smi", file.as_bytes(), Format::Smiles, ReadOptions::default()) {
///     sides.push(Prepared::new(&mut orderer, "two.smi", outcome?));
/// }
/// let pair = compare(&mut orderer, &limits, [&sides[0], &sides[1]], false);
/// assert_eq!(pair.relation, Some("constitutional"));
/// assert_eq!(pair.b.name, "dimethyl ether");
/// # Ok::<(), Box<dyn std::error::Error>>(())
/// ```
#[derive(Debug, Clone)]
pub struct Prepared {
    input: Input,
    outcome: Result<Ready, Failure>,
}

#[derive(Debug, Clone)]
struct Ready {
    structure: Structure,
    notes: Vec<Note>,
    /// Axes that the structure leaves out.
    overlooked: Axes,
}

#[derive(Debug, Clone)]
struct Failure {
    error: Error,
    read: Option<ReadError>,
}

impl Prepared {
    /// Prepares one record of `source`. What cannot be read, or ordered within the limits, is kept
    /// as an error; this function does not fail.
    pub fn new(orderer: &mut Orderer, source: &str, outcome: RecordOutcome) -> Self {
        let mut input = Input {
            source: source.to_owned(),
            record: outcome.index,
            name: outcome.name,
            formula: None,
            smiles: None,
            form: None,
        };
        let record = match outcome.result {
            Ok(record) => record,
            Err(error) => {
                let failure = Failure {
                    error: Error::from(&error),
                    read: Some(error),
                };
                return Self {
                    input,
                    outcome: Err(failure),
                };
            }
        };
        let outcome = match Structure::new(orderer, record.molecule) {
            Err(error) => Err(Failure {
                error: Error::without_place(error.code(), error.to_string()),
                read: None,
            }),
            Ok(structure) => {
                let written = smiles::write(&structure.canonical().form());
                let own = remarks::of_record(&structure);
                let lost = lost_in_smiles(&structure, &written.lost);
                let molecule = structure.molecule();
                let read = record.notes.iter();
                let read = read.map(|note| Note::of_reader(molecule, note));
                let ours = own.into_iter().chain(lost);
                let notes = read.chain(ours.map(|noted| Note::of(molecule, noted)));
                let notes = notes.collect();
                input.formula = Some(structure.formula().to_string());
                input.smiles = Some(written.text);
                Ok(Ready {
                    structure,
                    notes,
                    overlooked: Axes::NONE,
                })
            }
        };
        Self { input, outcome }
    }

    /// The record with some axes overlooked: what is said about its structure is then said of its form.
    #[must_use]
    pub fn overlooking(mut self, normaliser: &mut Normaliser, axes: Axes) -> Self {
        if let Ok(ready) = &mut self.outcome {
            match normaliser.overlook(&ready.structure, axes) {
                Ok(form) => {
                    let structure = form.into_structure();
                    let written = smiles::write(&structure.canonical().form());
                    self.input.form = Some(written.text);
                    ready.structure = structure;
                    ready.overlooked = axes;
                }
                Err(error) => {
                    self.outcome = Err(Failure {
                        error: Error::without_place(error.code(), error.to_string()),
                        read: None,
                    });
                }
            }
        }
        self
    }

    /// The axes that are overlooked.
    pub(super) fn overlooked(&self) -> Axes {
        let ready = self.outcome.as_ref();
        ready.map_or(Axes::NONE, |ready| ready.overlooked)
    }

    /// Where the record came from, and what it is.
    pub fn input(&self) -> &Input {
        &self.input
    }

    /// The structure; `None` where there is an error.
    pub fn structure(&self) -> Option<&Structure> {
        Some(&self.outcome.as_ref().ok()?.structure)
    }

    /// Why there is no structure.
    pub fn error(&self) -> Option<&Error> {
        Some(&self.outcome.as_ref().err()?.error)
    }

    /// The reader's error, which can show the place, where it is that.
    pub fn read_error(&self) -> Option<&ReadError> {
        self.outcome.as_ref().err()?.read.as_ref()
    }

    /// The structure and what is to be noted about it, or the error.
    pub(super) fn parts(&self) -> Result<(&Structure, &[Note]), &Error> {
        match &self.outcome {
            Ok(ready) => Ok((&ready.structure, &ready.notes)),
            Err(failure) => Err(&failure.error),
        }
    }
}

/// What canonical SMILES could not say.
fn lost_in_smiles(structure: &Structure, lost: &[Lost]) -> Vec<Noted> {
    if lost.is_empty() {
        return Vec::new();
    }
    // The writer numbers atoms by the canonical form.
    let order: Vec<u32> = structure.canonical().order().collect();
    let molecule = structure.molecule();
    lost.iter()
        .map(|lost| noted(molecule, lost, &order))
        .collect()
}

fn noted(molecule: &Molecule, lost: &Lost, order: &[u32]) -> Noted {
    let sources = |places: &[u32]| -> Vec<u32> {
        let atoms = places
            .iter()
            .filter_map(|&at| order.get(at as usize).copied());
        let mut atoms: Vec<u32> = atoms.collect();
        atoms.sort_unstable();
        atoms.dedup();
        atoms
    };
    let arrangement = |atoms: Vec<u32>| Noted {
        code: "smiles-loses-stereo",
        text: format!(
            "SMILES cannot say the arrangement at {}.",
            atoms_in_words(molecule, &atoms)
        ),
        atoms,
    };
    match lost {
        Lost::Arrangement { centres, .. } => arrangement(sources(centres)),
        Lost::Coordination { centre, .. } => arrangement(sources(&[*centre])),
        Lost::Bond { atoms, .. } => {
            let atoms = sources(atoms);
            let text = format!(
                "SMILES has no symbol for the coordination or hydrogen bond between {}.",
                atoms_in_words(molecule, &atoms)
            );
            Noted {
                code: "smiles-loses-bond",
                atoms,
                text,
            }
        }
        Lost::StereoGroups => Noted {
            code: "smiles-loses-groups",
            atoms: Vec::new(),
            text: "SMILES cannot say stereo groups: it shows one arrangement of them.".to_owned(),
        },
        Lost::RingLabels { .. } => Noted {
            code: "smiles-ring-labels",
            atoms: Vec::new(),
            text: "The SMILES needs more than 99 ring labels at once, beyond the standard."
                .to_owned(),
        },
        _ => Noted {
            code: "smiles-loses",
            atoms: Vec::new(),
            text: "SMILES cannot say all of this record.".to_owned(),
        },
    }
}
