//! One side of a comparison, prepared once.

use molkin_graph::{
    Canonical, CanonicalForm, Element, Formula, Key, Limits, Molecule, OrderError, Orderer,
};
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
    /// Prepares a molecule. For many that are needed one at a time see [`Preparer`].
    ///
    /// # Errors
    /// [`PrepareError::NotOneStructure`] for unknown atoms, [`PrepareError::Order`] when a limit is
    /// reached.
    pub fn new(orderer: &mut Orderer, mut molecule: Molecule) -> Result<Self, PrepareError> {
        let mut structure = Self::empty();
        structure.fill(orderer, &mut molecule)?;
        Ok(structure)
    }

    /// Storage, no structure yet.
    fn empty() -> Self {
        Self {
            molecule: Molecule::default(),
            canonical: Canonical::default(),
            formula: Formula::default(),
            isotopes: Vec::new(),
        }
    }

    /// Prepares a molecule in place of the one that is held, and exchanges the two. After an error
    /// nothing here has a meaning.
    fn fill(&mut self, orderer: &mut Orderer, molecule: &mut Molecule) -> Result<(), PrepareError> {
        let unknown = |(atom, index)| (atom == Element::WILDCARD).then_some(index);
        let elements = molecule.atoms().map(|atom| atom.element);
        let atoms: Vec<u32> = elements.zip(0..).filter_map(unknown).collect();
        if !atoms.is_empty() {
            return Err(PrepareError::NotOneStructure { atoms });
        }
        std::mem::swap(&mut self.molecule, molecule);
        orderer.order_into(&self.molecule, &mut self.canonical)?;
        self.molecule.formula_into(&mut self.formula);
        isotopes(&self.molecule, &mut self.isotopes);
        Ok(())
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

fn isotopes(molecule: &Molecule, counts: &mut Vec<(Element, u16, u32)>) {
    counts.clear();
    let stated = molecule
        .atoms()
        .filter_map(|atom| Some((atom.element, atom.isotope?, 1)));
    counts.extend(stated);
    counts.sort_unstable();
    counts.dedup_by(|next, kept| {
        let same = (next.0, next.1) == (kept.0, kept.1);
        kept.2 += u32::from(same);
        same
    });
}

/// Prepares one structure after another in the same memory; owns the scratch. One per thread.
///
/// # Examples
/// ```
/// use molkin_formats::{Record, smiles::Reader};
/// use molkin_graph::Limits;
/// use molkin_relate::Preparer;
///
/// let mut reader = Reader::default();
/// let mut record = Record::default();
/// let mut preparer = Preparer::new(Limits::default());
/// let mut keys = Vec::new();
/// for (line, text) in (1..).zip(["OCC", "CCO", "COC"]) {
///     reader.read_into(text, line, &mut record)?;
///     let structure = preparer.prepare(&mut record.molecule)?;
///     keys.push(structure.canonical().compound_key());
/// }
/// assert_eq!(keys[0], keys[1]);
/// assert_ne!(keys[0], keys[2]);
/// # Ok::<(), Box<dyn std::error::Error>>(())
/// ```
#[derive(Debug)]
pub struct Preparer {
    orderer: Orderer,
    structure: Structure,
}

impl Preparer {
    /// A preparer with the given limits.
    pub fn new(limits: Limits) -> Self {
        Self {
            orderer: Orderer::new(limits),
            structure: Structure::empty(),
        }
    }

    /// Prepares a molecule, and leaves in its place the storage of the one before for the next to be
    /// read into; what that holds has no meaning.
    ///
    /// # Errors
    /// As [`Structure::new`].
    pub fn prepare(&mut self, molecule: &mut Molecule) -> Result<&Structure, PrepareError> {
        self.structure.fill(&mut self.orderer, molecule)?;
        Ok(&self.structure)
    }

    /// The structure prepared last, and its canonical form in place of one whose memory is reused.
    pub fn form_into(&mut self, form: &mut CanonicalForm) -> &Structure {
        self.orderer.form_into(&self.structure.canonical, form);
        &self.structure
    }
}
