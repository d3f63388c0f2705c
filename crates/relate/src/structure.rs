//! One side of a comparison, prepared once.

use molkin_graph::{Canonical, Element, Formula, Key, Molecule, OrderError, Orderer};
use thiserror::Error;

/// Why a record cannot be compared.
#[derive(Debug, Clone, PartialEq, Eq, Error)]
#[non_exhaustive]
pub enum PrepareError {
    /// The record has unknown atoms, so it is not one structure.
    #[error("the record has unknown atoms (*), so it is not one structure")]
    NotOneStructure {
        /// The unknown atoms, from 0.
        atoms: Vec<u32>,
    },
    /// No canonical order within the limits.
    #[error(transparent)]
    Order(#[from] OrderError),
}

impl PrepareError {
    /// A stable name of the kind of error, in kebab-case.
    pub fn code(&self) -> &'static str {
        match self {
            Self::NotOneStructure { .. } => "not-one-structure",
            Self::Order(OrderError::StepLimit { .. }) => "order-step-limit",
            Self::Order(OrderError::TooManyOpenElements { .. }) => "open-element-limit",
            Self::Order(OrderError::TooManyAtoms { .. }) => "atom-limit",
            Self::Order(OrderError::TooManyNeighbours) => "neighbour-limit",
            Self::Order(OrderError::Stopped) => "stopped",
            Self::Order(OrderError::TooManyPieces { .. }) => "stereo-group-limit",
            Self::Order(OrderError::TooManySamples) => "sample-limit",
            Self::Order(OrderError::StereoGroups) => "stereo-groups",
            Self::Order(OrderError::PartlyMarkedCentres) => "partly-marked-centres",
            Self::Order(_) => "out-of-range",
        }
    }
}

/// A molecule with its canonical view: what every comparison starts from.
#[derive(Debug, Clone)]
pub struct Structure {
    molecule: Molecule,
    canonical: Canonical,
    formula: Formula,
    isotopes: Vec<(Element, u16, u32)>,
}

impl Structure {
    /// Prepares a molecule.
    ///
    /// # Errors
    /// [`PrepareError::NotOneStructure`] for unknown atoms, [`PrepareError::Order`] when a limit is
    /// reached.
    pub fn new(orderer: &mut Orderer, molecule: Molecule) -> Result<Self, PrepareError> {
        check_is_one_structure(&molecule)?;
        Ok(Self {
            canonical: orderer.order(&molecule)?,
            formula: molecule.formula(),
            isotopes: isotopes(&molecule),
            molecule,
        })
    }

    /// The molecule as drawn.
    pub fn molecule(&self) -> &Molecule {
        &self.molecule
    }

    /// The molecule, without what was found out about it.
    pub fn into_molecule(self) -> Molecule {
        self.molecule
    }

    /// Its canonical view.
    pub fn canonical(&self) -> &Canonical {
        &self.canonical
    }

    /// Its formula; isotopes count as their element.
    pub fn formula(&self) -> &Formula {
        &self.formula
    }

    /// How many atoms of each stated nuclide the record has: element, mass number, count; sorted.
    pub fn isotopes(&self) -> &[(Element, u16, u32)] {
        &self.isotopes
    }

    /// The key of formula and isotopes: equal for isomers.
    pub fn isomer_key(&self) -> Key {
        Key::of_formula(&self.formula, &self.isotopes)
    }
}

/// Refuses molecules with unknown atoms.
pub(crate) fn check_is_one_structure(molecule: &Molecule) -> Result<(), PrepareError> {
    let unknown = |(atom, index)| (atom == Element::WILDCARD).then_some(index);
    let elements = molecule.atoms().map(|atom| atom.element);
    let atoms: Vec<u32> = elements.zip(0..).filter_map(unknown).collect();
    if atoms.is_empty() {
        Ok(())
    } else {
        Err(PrepareError::NotOneStructure { atoms })
    }
}

pub(crate) fn isotopes(molecule: &Molecule) -> Vec<(Element, u16, u32)> {
    let stated = molecule
        .atoms()
        .filter_map(|atom| Some((atom.element, atom.isotope?, 1)));
    let mut counts: Vec<(Element, u16, u32)> = stated.collect();
    counts.sort_unstable();
    counts.dedup_by(|next, kept| {
        let same = (next.0, next.1) == (kept.0, kept.1);
        kept.2 += u32::from(same);
        same
    });
    counts
}
