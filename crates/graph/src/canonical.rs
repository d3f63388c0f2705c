//! The canonical view of a molecule: symmetry, stereo, claims and keys, from one place.

mod colour;
mod comparison;
mod elements;
mod form;
mod normal;
mod placement;

use thiserror::Error;

use crate::{
    Key, Limits, Molecule,
    claims::{self, Claims, Solver, Variable},
    mesomer::Mesomer,
    order::{Coloured, Labeller, Labelling},
    skeleton::Skeleton,
    stereo::Perception,
};

pub use comparison::{Arrangement, arrangement};
pub use elements::{Dropped, Mark, Remark, StereoElement};
pub use form::{CanonicalForm, FormAtom, FormStereo};
pub use normal::{NormalAtom, NormalBond, NormalForm};

/// Why a record has no canonical order. There is never a weaker key instead.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Error)]
#[non_exhaustive]
pub enum OrderError {
    /// The canonical search reached its step limit.
    #[error("canonical order not found within {limit} steps")]
    StepLimit {
        /// The limit.
        limit: u64,
    },
    /// Too many unmarked stereo elements that symmetry relates to marked ones.
    #[error(
        "more than {limit} unmarked stereo elements in positions related by symmetry to marked ones"
    )]
    TooManyOpenElements {
        /// The limit.
        limit: u32,
    },
    /// The record has more atoms than the limit.
    #[error("more than {limit} atoms")]
    TooManyAtoms {
        /// The limit.
        limit: usize,
    },
    /// An atom's charge, isotope or hydrogen count is outside what a certificate holds.
    #[error("charge, isotope or hydrogen count of atom {atom} is out of range")]
    OutOfRange {
        /// The atom, from 0.
        atom: u32,
    },
}

/// Computes canonical views; owns the scratch memory. One per thread.
#[derive(Debug, Default)]
pub struct Orderer {
    limits: Limits,
    labeller: Labeller,
    graph: Coloured,
}

/// The canonical view of one molecule.
#[derive(Debug, Clone)]
pub struct Canonical {
    pub(crate) skeleton: Skeleton,
    pub(crate) mesomer: Mesomer,
    pub(crate) perception: Perception,
    pub(crate) variables: Vec<Variable>,
    pub(crate) claims: Claims,
    /// Without isotopes and stereo.
    constitution: Labelling,
    /// With isotopes, without stereo.
    pub(crate) bare: Labelling,
    /// With the marks that count: the order canonical text is written in.
    pub(crate) written: Labelling,
    constitution_key: Key,
    compound_key: Key,
}

impl Orderer {
    /// An orderer with the given limits.
    pub fn new(limits: Limits) -> Self {
        Self {
            limits,
            ..Self::default()
        }
    }

    /// Finds the canonical view of a molecule.
    ///
    /// # Errors
    /// [`OrderError`]: a limit was reached, or a number is out of range.
    ///
    /// # Complexity
    /// Close to linear on molecules; exponential only on graphs made to be hard, and then bounded by
    /// [`Limits::order_steps`].
    ///
    /// # Source
    /// McKay & Piperno, J. Symb. Comput. 2014, 60, 94; the treatment of stereo and of open claims is
    /// described in docs/architecture.md.
    pub fn order(&mut self, molecule: &Molecule) -> Result<Canonical, OrderError> {
        if molecule.atom_count() > self.limits.atoms {
            return Err(OrderError::TooManyAtoms {
                limit: self.limits.atoms,
            });
        }
        let mut skeleton = Skeleton::default();
        skeleton.load(molecule);
        let mut mesomer = Mesomer::default();
        mesomer.load(&mut skeleton);
        let mut steps = 0;
        let constitution = self.label(&skeleton, &mesomer, false, &mut steps)?;
        let labelled = skeleton
            .atoms
            .iter()
            .any(|atom| atom.isotope.is_some() || atom.labelled > 0);
        let bare = if labelled {
            self.label(&skeleton, &mesomer, true, &mut steps)?
        } else {
            constitution.clone()
        };
        let mut perception = Perception::default();
        perception.load(&skeleton, &mesomer, molecule.drawn_stereo());
        perception.keep_unequal_axes(&skeleton, &bare.generators);
        let variables = claims::variables(&perception);
        let outcome = Solver {
            graph: &mut self.graph,
            labeller: &mut self.labeller,
            perception: &perception,
            variables: &variables,
            step_limit: self.limits.order_steps,
            steps: &mut steps,
            open_limit: self.limits.open_elements,
        }
        .solve(&bare)?;
        let constitution_key = Key::of(0, std::iter::once(&constitution.certificate[..]));
        let certificates = outcome.claims.certificates.iter().map(Vec::as_slice);
        let compound_key = Key::of(1, certificates);
        Ok(Canonical {
            skeleton,
            mesomer,
            perception,
            variables,
            claims: outcome.claims,
            constitution,
            bare,
            written: outcome.written,
            constitution_key,
            compound_key,
        })
    }

    fn label(
        &mut self,
        skeleton: &Skeleton,
        mesomer: &Mesomer,
        isotopes: bool,
        steps: &mut u64,
    ) -> Result<Labelling, OrderError> {
        colour::load(&mut self.graph, skeleton, mesomer, isotopes)?;
        let mut labelling = Labelling::default();
        let limit = self.limits.order_steps;
        self.labeller
            .label(&self.graph, limit, steps, &mut labelling)
            .map_err(|_| OrderError::StepLimit { limit })?;
        Ok(labelling)
    }
}

impl Canonical {
    /// The key of the constitution: no stereo, no isotopes.
    pub fn constitution_key(&self) -> Key {
        self.constitution_key
    }

    /// The key of the compound: isotopes and everything the record claims about stereo. Two records
    /// are identical exactly when it is equal.
    pub fn compound_key(&self) -> Key {
        self.compound_key
    }

    /// Whether both records have the same constitution, isotopes aside; on certificates, not keys.
    pub fn same_constitution(&self, other: &Self) -> bool {
        self.constitution.certificate == other.constitution.certificate
    }

    /// Whether both records have the same constitution, isotopes included.
    pub fn same_labelled_constitution(&self, other: &Self) -> bool {
        self.bare.certificate == other.bare.certificate
    }

    /// Whether both records stand for the same set of stereoisomers; on certificates, not keys.
    pub fn same_compound(&self, other: &Self) -> bool {
        self.claims.certificates == other.claims.certificates
    }

    /// Whether the record stands for more than one possible sample, or leaves out what its notation
    /// cannot say.
    pub fn is_open(&self) -> bool {
        self.claims.open || !self.perception.undrawable.is_empty()
    }

    /// The atoms of the molecule, terminal hydrogens aside, in canonical order.
    pub fn order(&self) -> impl ExactSizeIterator<Item = u32> + '_ {
        self.written
            .order
            .iter()
            .map(|&atom| self.skeleton.atoms[atom as usize].source)
    }
}
