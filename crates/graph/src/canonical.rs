//! The canonical view of a molecule: symmetry, stereo, claims and keys, from one place.

mod colour;
mod comparison;
mod dependence;
mod elements;
mod form;
mod identity;
mod normal;
mod placement;
mod samples;

#[cfg(test)]
mod tests;

use thiserror::Error;

use crate::{
    Key, Limits, Molecule,
    claims::{self, Claims, Extent, Solver, Variable},
    key::{Digester, Named},
    mesomer::{self, Mesomer},
    order::{Coloured, Labeller, Labelling, Unit},
    skeleton::Skeleton,
    stereo::{self, Perception},
    tautomer,
};

pub use comparison::{Arrangement, arrangement};
pub use elements::{Dropped, Mark, Remark, StereoElement};
pub use form::{CanonicalForm, FormAtom, FormStereo};
pub use identity::Identity;
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
    /// Of equivalent centres some are given an arrangement and some are not, in a record with
    /// arrangements about metals; such records are not compared yet.
    #[error(
        "of equivalent centres beside an arrangement about a metal only some are marked; such records are not compared yet"
    )]
    PartlyMarkedCentres,
    /// A stereo group names an arrangement about a metal; or two groups of different kinds share
    /// bridgeheads that determine each other; or a record with stereo groups is compared where either
    /// record has an arrangement about a metal or a cage marked in a way that no cage can have.
    #[error(
        "stereo groups meet an arrangement about a metal, or bridgeheads that cannot be inverted apart; such records are not compared"
    )]
    StereoGroups,
    /// Too many stereo groups, and unmarked elements beside them, in positions that symmetry relates.
    #[error(
        "more than {limit} stereo groups and unmarked elements in positions related by symmetry"
    )]
    TooManyPieces {
        /// The limit.
        limit: u32,
    },
    /// The stereo groups of the record stand for too many sets of stereoisomers to tell apart.
    #[error("the stereo groups stand for too many sets of stereoisomers")]
    TooManySamples,
    /// A vertex has more neighbours than the search can count.
    #[error("an atom has more than 511 neighbours")]
    TooManyNeighbours,
    /// The stop flag was raised.
    #[error("stopped from outside")]
    Stopped,
    /// An atom's charge, isotope or hydrogen count is outside what a certificate holds.
    #[error("charge, isotope or hydrogen count of atom {} (from 1) is out of range", atom + 1)]
    OutOfRange {
        /// The atom, from 0.
        atom: u32,
    },
}

/// Computes canonical views; owns the scratch memory. One per thread.
#[derive(Debug, Default)]
pub struct Orderer {
    pub(crate) limits: Limits,
    labeller: Labeller,
    graph: Coloured,
    mesomer: mesomer::Scratch,
    stereo: stereo::Scratch,
    claims: claims::Scratch,
    form: form::Scratch,
    digester: Digester,
    pub(crate) tautomer: tautomer::Scratch,
}

/// The canonical view of one molecule.
#[derive(Debug, Clone, Default)]
pub struct Canonical {
    pub(crate) skeleton: Skeleton,
    pub(crate) mesomer: Mesomer,
    pub(crate) perception: Perception,
    pub(crate) variables: Vec<Variable>,
    pub(crate) claims: Claims,
    /// Without isotopes and stereo.
    constitution: Labelling,
    /// With isotopes, without stereo; only where the record has isotopes.
    isotopic: Labelling,
    has_isotopes: bool,
    /// With the marks that count; only where the record was asked for them.
    marked: Labelling,
    has_marks: bool,
    constitution_key: Key,
    labelled_constitution_key: Key,
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

    /// An orderer that takes no shortcuts in perception: normal forms of mesomers are always found by
    /// the general way, and an [`Identity`] is found as all of the [`Canonical`] view. It answers the
    /// same, slowly; tests hold the shortcuts to it.
    pub fn without_shortcuts(limits: Limits) -> Self {
        let mut orderer = Self::new(limits);
        orderer.mesomer.no_shortcuts = true;
        orderer
    }

    /// The limits.
    pub fn limits(&self) -> &Limits {
        &self.limits
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
        let mut canonical = Canonical::default();
        self.order_into(molecule, &mut canonical)?;
        Ok(canonical)
    }

    /// As [`Orderer::order`], into a view whose memory is reused. After an error the view holds
    /// nothing of use.
    ///
    /// # Errors
    /// As [`Orderer::order`].
    pub fn order_into(
        &mut self,
        molecule: &Molecule,
        view: &mut Canonical,
    ) -> Result<(), OrderError> {
        let steps = self.order_constitution(molecule, view)?;
        self.order_stereo(molecule, view, steps, Extent::All)?;
        self.set_keys(view);
        Ok(())
    }

    /// Finds the stereo elements, the claims and the order with them.
    fn order_stereo(
        &mut self,
        molecule: &Molecule,
        view: &mut Canonical,
        mut steps: u64,
        extent: Extent,
    ) -> Result<(), OrderError> {
        view.has_marks = true;
        let bare = if view.has_isotopes {
            &view.isotopic
        } else {
            &view.constitution
        };
        let scratch = &mut self.stereo;
        view.perception
            .load(&view.skeleton, &view.mesomer, molecule, scratch);
        if extent == Extent::All {
            view.perception
                .find_undrawable(&view.skeleton, &view.mesomer, &bare.generators);
        }
        view.perception.remember(
            &view.skeleton,
            &bare.generators,
            molecule.remembered_stereo(),
        );
        claims::list_variables(&view.perception, &mut view.variables);
        // Arrangements about metals are given, not open: they are part of the graph whose
        // automorphisms relate the other elements.
        let placed = if view.perception.placed.is_empty() {
            None
        } else {
            self.keep_effective(&mut view.perception, &view.variables, bare, &mut steps)?;
            self.graph.placed.clone_from(&view.perception.placed);
            let mut labelling = Labelling::default();
            self.labeller
                .label(&mut self.graph, &self.limits, &mut steps, &mut labelling)?;
            Some(labelling)
        };
        let mut solver = Solver {
            graph: &mut self.graph,
            labeller: &mut self.labeller,
            perception: &view.perception,
            variables: &view.variables,
            limits: &self.limits,
            steps: &mut steps,
        };
        let bare = placed.as_ref().unwrap_or(bare);
        let groups =
            claims::of_groups(&view.skeleton, &view.perception, &view.variables, molecule)?;
        let (claims, written) = (&mut view.claims, &mut view.marked);
        if groups.is_empty() {
            solver.solve(bare, extent, &mut self.claims, claims, written)?;
        } else {
            solver.solve_groups(bare, groups, claims, written)?;
        }
        Ok(())
    }

    /// Finds the normal form and the order without stereo; returns the steps that took.
    fn order_constitution(
        &mut self,
        molecule: &Molecule,
        view: &mut Canonical,
    ) -> Result<u64, OrderError> {
        self.perceive(molecule, view)?;
        self.label_constitution(view)
    }

    /// Loads the skeleton and its normal form.
    pub(crate) fn perceive(
        &mut self,
        molecule: &Molecule,
        view: &mut Canonical,
    ) -> Result<(), OrderError> {
        if molecule.atom_count() > self.limits.atoms {
            return Err(OrderError::TooManyAtoms {
                limit: self.limits.atoms,
            });
        }
        view.skeleton.load(molecule);
        let scratch = &mut self.mesomer;
        view.mesomer.load(&mut view.skeleton, &self.limits, scratch)
    }

    /// Finds the orders of what was perceived, and of that alone: no keys.
    pub(crate) fn order_perceived(
        &mut self,
        molecule: &Molecule,
        view: &mut Canonical,
    ) -> Result<(), OrderError> {
        let steps = self.label_constitution(view)?;
        self.order_stereo(molecule, view, steps, Extent::All)
    }

    fn label_constitution(&mut self, view: &mut Canonical) -> Result<u64, OrderError> {
        let Canonical {
            skeleton,
            mesomer,
            constitution,
            isotopic,
            has_isotopes,
            ..
        } = view;
        let mut steps = 0;
        self.label(skeleton, mesomer, false, &mut steps, constitution)?;
        let mut atoms = skeleton.atoms.iter();
        *has_isotopes = atoms.any(|atom| atom.isotope.is_some() || atom.labelled > 0);
        if *has_isotopes {
            self.label(skeleton, mesomer, true, &mut steps, isotopic)?;
        }
        Ok(steps)
    }

    fn set_keys(&mut self, view: &mut Canonical) {
        let digester = &mut self.digester;
        let own = &view.constitution.certificate;
        let constitution = digester.first(own);
        view.constitution_key = Key::of(Named::Constitution, std::iter::once(constitution));
        view.labelled_constitution_key = if view.has_isotopes {
            let digest = digester.digest(&view.isotopic.certificate, own);
            Key::of(Named::Constitution, std::iter::once(digest))
        } else {
            view.constitution_key
        };
        // Most records have neither isotopes nor stereo: one certificate serves both keys.
        let mut digest = |certificate: &[u64]| {
            let known = certificate == own;
            if known {
                constitution
            } else {
                digester.digest(certificate, own)
            }
        };
        view.compound_key = if view.has_marks {
            let certificates = view.claims.certificates.iter();
            Key::of(Named::Compound, certificates.map(digest))
        } else {
            let bare = digest(&view.bare().certificate);
            Key::of(Named::Compound, std::iter::once(bare))
        };
    }

    /// Leaves out arrangements that make no difference: all that the ligands could have give the
    /// same compound.
    fn keep_effective(
        &mut self,
        perception: &mut Perception,
        variables: &[Variable],
        bare: &Labelling,
        steps: &mut u64,
    ) -> Result<(), OrderError> {
        let never = claims::never_stereogenic(&bare.generators, perception, variables);
        let counting: Vec<Unit> = variables
            .iter()
            .zip(never)
            .filter(|(_, never)| !never)
            .filter_map(|(variable, _)| Some((&variable.members, variable.odd?)))
            .flat_map(|(members, odd)| {
                members
                    .iter()
                    .map(move |&(index, opposite)| (index, odd ^ opposite))
            })
            .map(|(index, odd)| perception.candidates[index].unit(odd))
            .collect();
        let mut at = 0;
        while at < perception.placed.len() {
            self.graph.units.clone_from(&counting);
            self.graph.placed.clone_from(&perception.placed);
            let own = &perception.placed[at];
            let mut seen: Option<Labelling> = None;
            let mut differs = false;
            for ligands in own.polyhedron.arrangements(&own.ligands) {
                self.graph.placed[at].ligands = ligands;
                let mut labelling = Labelling::default();
                self.labeller
                    .label(&mut self.graph, &self.limits, steps, &mut labelling)?;
                if seen
                    .as_ref()
                    .is_some_and(|first| first.certificate != labelling.certificate)
                {
                    differs = true;
                    break;
                }
                seen = Some(labelling);
            }
            if differs {
                at += 1;
            } else {
                perception.placed.remove(at);
            }
        }
        self.graph.units.clear();
        Ok(())
    }

    fn label(
        &mut self,
        skeleton: &Skeleton,
        mesomer: &Mesomer,
        isotopes: bool,
        steps: &mut u64,
        labelling: &mut Labelling,
    ) -> Result<(), OrderError> {
        colour::load(&mut self.graph, skeleton, mesomer, isotopes)?;
        self.labeller
            .label(&mut self.graph, &self.limits, steps, labelling)
    }
}

impl Canonical {
    /// The order with isotopes and without stereo.
    pub(crate) fn bare(&self) -> &Labelling {
        if self.has_isotopes {
            &self.isotopic
        } else {
            &self.constitution
        }
    }

    /// The order with the marks that count: the one that canonical text is written in.
    pub(crate) fn written(&self) -> &Labelling {
        if self.has_marks {
            &self.marked
        } else {
            self.bare()
        }
    }

    /// Forgets what is known of the stereo of a record before.
    fn forget_stereo(&mut self) {
        self.has_marks = false;
        self.variables.clear();
        self.claims.clear();
        self.perception.placed.clear();
    }

    /// The key of the constitution: no stereo, no isotopes.
    pub fn constitution_key(&self) -> Key {
        self.constitution_key
    }

    /// The key of the constitution with its isotopes, no stereo: that of all stereoisomers of the record.
    /// Without isotopes it is the constitution key.
    pub fn labelled_constitution_key(&self) -> Key {
        self.labelled_constitution_key
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
        self.bare().certificate == other.bare().certificate
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
        self.written()
            .order
            .iter()
            .map(|&atom| self.skeleton.atoms[atom as usize].source)
    }
}
