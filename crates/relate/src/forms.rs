//! Forms of one compound: salts, protonation states, tautomers, isotope labels, stereo.
//!
//! Each axis is a pure function from a structure to a normalised one, with a report of what it changed;
//! applied twice it changes nothing more. Overlooking some axes means comparing what they leave. No axis
//! but `stereo` makes opposed marks equal: where an axis erases a marked place, the mark stays with the
//! normalised molecule ([`molkin_graph::Molecule::remembered_stereo`]) and counts for its key.

mod apart;
mod axes;
mod charge;
mod isotope;
mod salt;
mod stereo;
mod tautomer;

#[cfg(test)]
mod tests;

use std::{borrow::Cow, sync::Arc};

use molkin_graph::{BuildError, DrawnStereo, Limits, Mark, Orderer, Revised, Revision};
use thiserror::Error;

use crate::{PrepareError, Structure};

pub use apart::same_apart_from;
pub use axes::{Axes, AxesError, Axis};
pub use salt::{CounterIons, CounterIonsError, Kind as ListedKind, Listed};

/// Why a record has no form on some axes. There is never a weaker one instead.
#[derive(Debug, Clone, PartialEq, Eq, Error)]
#[non_exhaustive]
pub enum FormError {
    /// The normalised molecule cannot be ordered.
    #[error(transparent)]
    Prepare(#[from] PrepareError),
    /// The work on an axis reached its limit.
    #[error("the {axis} form was not found within the step limit")]
    StepLimit {
        /// The axis.
        axis: Axis,
    },
    /// An axis made more of its own form, so the form would depend on what was drawn.
    #[error("the {axis} form is not settled")]
    Unsettled {
        /// The axis.
        axis: Axis,
    },
    /// The axis is not built yet.
    #[error("the axis {axis} is not built yet")]
    NotBuilt {
        /// The axis.
        axis: Axis,
    },
    /// A rule led to something that is no molecule.
    #[error(transparent)]
    Build(#[from] BuildError),
}

impl FormError {
    /// A stable name of the kind of error, in kebab-case.
    pub fn code(&self) -> &'static str {
        match self {
            Self::Prepare(error) => error.code(),
            Self::StepLimit { .. } => "form-step-limit",
            Self::Unsettled { .. } => "form-not-settled",
            Self::NotBuilt { .. } => "axis-not-built",
            Self::Build(_) => "form-not-built",
        }
    }
}

/// What an axis changed in a record. Atoms are indices of the molecule that came in.
#[derive(Debug, Clone, PartialEq, Eq)]
#[non_exhaustive]
pub enum Change {
    /// A component was taken away.
    Component {
        /// Its atoms.
        atoms: Vec<u32>,
        /// What it was.
        what: Removed,
    },
    /// Protons were added to an atom, or taken away.
    Protons {
        /// The atom.
        atom: u32,
        /// How many; negative for protons taken away.
        change: i8,
    },
    /// Hydrogens of an atom went to where all tautomers have them, or came from there.
    MobileHydrogens {
        /// The atom.
        atom: u32,
        /// How many; negative for hydrogens that went.
        change: i8,
    },
    /// A mass number was left out.
    Isotope {
        /// The atom.
        atom: u32,
    },
    /// The stereo marks were left out.
    Stereo,
}

/// A component that was taken away.
#[derive(Debug, Clone, PartialEq, Eq)]
#[non_exhaustive]
pub enum Removed {
    /// A listed counter-ion or solvent.
    Listed(Listed),
    /// One more of a parent that is left.
    Copy,
    /// A proton on its own.
    Proton,
}

impl Change {
    /// The same in terms of the molecule before.
    fn traced(self, sources: &[u32]) -> Self {
        let traced = |atom: u32| sources.get(atom as usize).copied().unwrap_or(atom);
        match self {
            Self::Component { atoms, what } => Self::Component {
                atoms: atoms.into_iter().map(traced).collect(),
                what,
            },
            Self::Protons { atom, change } => Self::Protons {
                atom: traced(atom),
                change,
            },
            Self::MobileHydrogens { atom, change } => Self::MobileHydrogens {
                atom: traced(atom),
                change,
            },
            Self::Isotope { atom } => Self::Isotope { atom: traced(atom) },
            Self::Stereo => Self::Stereo,
        }
    }
}

/// What one axis made of a molecule.
#[derive(Debug)]
struct Outcome {
    revised: Revised,
    changes: Vec<Change>,
}

/// A record with some axes overlooked.
#[derive(Debug, Clone)]
pub struct Form<'s> {
    structure: Cow<'s, Structure>,
    changes: Vec<(Axis, Change)>,
}

impl Form<'_> {
    /// The normalised structure: the record itself where nothing was to be changed.
    pub fn structure(&self) -> &Structure {
        &self.structure
    }

    /// The normalised structure.
    pub fn into_structure(self) -> Structure {
        self.structure.into_owned()
    }

    /// What was changed, axis by axis.
    pub fn changes(&self) -> &[(Axis, Change)] {
        &self.changes
    }
}

/// Finds forms; owns the scratch memory. One per thread.
#[derive(Debug)]
pub struct Normaliser {
    orderer: Orderer,
    counter_ions: Option<Arc<CounterIons>>,
}

impl From<Orderer> for Normaliser {
    /// A normaliser that works with an orderer and within its limits.
    fn from(orderer: Orderer) -> Self {
        Self {
            orderer,
            counter_ions: None,
        }
    }
}

impl Normaliser {
    /// A normaliser within the given limits.
    pub fn new(limits: Limits) -> Self {
        Self {
            orderer: Orderer::new(limits),
            counter_ions: None,
        }
    }

    /// The orderer, for other work between forms.
    pub fn orderer(&mut self) -> &mut Orderer {
        &mut self.orderer
    }

    /// The orderer alone.
    pub fn into_orderer(self) -> Orderer {
        self.orderer
    }

    /// The same with other counter-ions and solvents than those of [`CounterIons::standard`].
    #[must_use]
    pub fn with_counter_ions(self, counter_ions: Arc<CounterIons>) -> Self {
        Self {
            counter_ions: Some(counter_ions),
            ..self
        }
    }

    /// The form of a record with some axes overlooked. What two records have in common apart from these
    /// axes shows in the keys of their forms: those of isotopes and of stereo are left out first, for
    /// what they erase must not hinder the others.
    ///
    /// # Errors
    /// [`FormError`].
    pub fn overlook<'s>(
        &mut self,
        structure: &'s Structure,
        axes: Axes,
    ) -> Result<Form<'s>, FormError> {
        const ORDER: [Axis; 6] = [
            Axis::Stereo,
            Axis::Isotope,
            Axis::Salt,
            Axis::Charge,
            Axis::Tautomer,
            Axis::RingChain,
        ];
        let mut form = Form {
            structure: Cow::Borrowed(structure),
            changes: Vec::new(),
        };
        let mut sources: Option<Vec<u32>> = None;
        for axis in ORDER.into_iter().filter(|&axis| axes.contains(axis)) {
            let Some(outcome) = self.apply(&form.structure, axis)? else {
                continue;
            };
            let traced = outcome.changes.into_iter().map(|change| match &sources {
                Some(sources) => change.traced(sources),
                None => change,
            });
            form.changes.extend(traced.map(|change| (axis, change)));
            let Revised {
                molecule,
                sources: own,
            } = match &sources {
                Some(before) => outcome.revised.traced(before),
                None => outcome.revised,
            };
            sources = Some(own);
            form.structure = Cow::Owned(Structure::new(&mut self.orderer, molecule)?);
        }
        Ok(form)
    }

    fn apply(&mut self, structure: &Structure, axis: Axis) -> Result<Option<Outcome>, FormError> {
        match axis {
            Axis::Stereo => stereo::normalise(structure),
            Axis::OpenStereo => Ok(None),
            Axis::Isotope => isotope::normalise(structure),
            Axis::Salt => {
                let known = || {
                    self.counter_ions
                        .get_or_insert_with(CounterIons::standard)
                        .clone()
                };
                salt::normalise(&mut self.orderer, known, structure)
            }
            Axis::Charge => charge::normalise(&mut self.orderer, structure),
            Axis::Tautomer => tautomer::normalise(&mut self.orderer, structure),
            Axis::RingChain => Err(FormError::NotBuilt { axis }),
        }
    }
}

/// A revision of a structure that remembers every mark that counts in it: those of places that can
/// bear them afterwards are put there, those of places that cannot are kept apart.
fn remembering(structure: &Structure) -> Revision {
    let mut revision = Revision::of(structure.molecule());
    for element in structure.canonical().stereo_elements() {
        if let Mark::Given(parity) = element.mark {
            revision.remember(DrawnStereo {
                shape: element.shape,
                centres: element.centres,
                ligands: element.ligands,
                parity: Some(parity),
            });
        }
    }
    revision
}
