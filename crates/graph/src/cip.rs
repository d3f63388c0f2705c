//! CIP labels: R, S, E, Z, M, P and their kin, from the sequence rules.
//!
//! The rules are those of the IUPAC recommendations of 2013 (P-92), sharpened as Hanson, Mayfield,
//! Vainio, Yerin, Redkin and Musacchio propose (J. Chem. Inf. Model. 2018, 58, 1755): ligands are
//! compared in the hierarchical digraph by rules 1a, 1b, 2, 3, 4a, 4b, 4c, 5 and 6, each exhausted
//! before the next. Labels are for reports. They never take part in identity.

mod atoms;
mod auxiliary;
mod budget;
mod decision;
mod digraph;
mod likeness;
mod ranking;
mod rules;
#[cfg(test)]
mod tests;
mod units;

use std::fmt;

use crate::{Canonical, Limits, StereoElement};

use self::{atoms::Atoms, budget::Budget, digraph::Digraph, units::Unit};

/// A stereodescriptor.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub enum Label {
    /// A chirality centre, `R`.
    R,
    /// A chirality centre, `S`.
    S,
    /// A pseudoasymmetric centre, `r`.
    PseudoR,
    /// A pseudoasymmetric centre, `s`.
    PseudoS,
    /// A chirality axis, `M`.
    M,
    /// A chirality axis, `P`.
    P,
    /// A pseudoasymmetric axis, `m`.
    PseudoM,
    /// A pseudoasymmetric axis, `p`.
    PseudoP,
    /// A double bond, `E`.
    E,
    /// A double bond, `Z`.
    Z,
    /// A double bond whose geometry reflection changes, `e` (seqTrans).
    ReflectedE,
    /// A double bond whose geometry reflection changes, `z` (seqCis).
    ReflectedZ,
}

impl Label {
    /// The letter.
    pub fn as_str(self) -> &'static str {
        match self {
            Self::R => "R",
            Self::S => "S",
            Self::PseudoR => "r",
            Self::PseudoS => "s",
            Self::M => "M",
            Self::P => "P",
            Self::PseudoM => "m",
            Self::PseudoP => "p",
            Self::E => "E",
            Self::Z => "Z",
            Self::ReflectedE => "e",
            Self::ReflectedZ => "z",
        }
    }

    /// Whether reflection changes it.
    fn is_chiral(self) -> bool {
        self.handedness().is_some()
    }

    /// Whether it is a centre or axis that reflection leaves alone.
    fn is_pseudoasymmetric(self) -> bool {
        matches!(
            self,
            Self::PseudoR | Self::PseudoS | Self::PseudoM | Self::PseudoP
        )
    }

    /// Of labels that reflection changes, whether it is R or one that goes with R.
    fn handedness(self) -> Option<bool> {
        match self {
            Self::R | Self::M | Self::ReflectedZ => Some(true),
            Self::S | Self::P | Self::ReflectedE => Some(false),
            _ => None,
        }
    }
}

impl fmt::Display for Label {
    fn fmt(&self, formatter: &mut fmt::Formatter<'_>) -> fmt::Result {
        formatter.pad(self.as_str())
    }
}

/// What the sequence rules say about a stereo element.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Labelling {
    /// The element has this label.
    Labelled(Label),
    /// The element is not marked.
    Unmarked,
    /// The rules do not tell its ligands apart, as far as the record gives them.
    Undecided,
    /// [`Limits::label_steps`] was reached.
    OverLimit,
}

impl Labelling {
    /// The label, if there is one.
    pub fn label(self) -> Option<Label> {
        match self {
            Self::Labelled(label) => Some(label),
            _ => None,
        }
    }
}

impl Canonical {
    /// The CIP labels of the stereo elements, in the order of [`Canonical::stereo_elements`].
    ///
    /// They depend on nothing in the drawing: neither on the numbering nor on the placement of mobile
    /// bonds and charges.
    ///
    /// # Source
    /// IUPAC 2013, P-92; Hanson et al., J. Chem. Inf. Model. 2018, 58, 1755. docs/labels.md says where
    /// they leave a choice.
    ///
    /// # Complexity
    /// The digraph grows as far as ligands are alike; at most
    /// [`Limits::label_steps`] in all.
    pub fn labels(&self, limits: &Limits) -> Vec<Labelling> {
        let units = self.units(&self.stereo_elements(), false);
        self.label_all(&units, &[], limits)
    }

    /// The CIP labels of the bridgeheads whose marks say nothing, in the order of
    /// [`Canonical::idle_bridgeheads`]. The stereo elements and these bridgeheads act in them as
    /// auxiliary descriptors; no label of a stereo element hangs on them, since their marks say nothing
    /// about the compound.
    ///
    /// # Complexity
    /// As [`Canonical::labels`], with the same number of steps once more.
    pub fn idle_bridgehead_labels(&self, limits: &Limits) -> Vec<Labelling> {
        let idle = self.idle_bridgeheads();
        if idle.is_empty() {
            return Vec::new();
        }
        let counting = self.units(&self.stereo_elements(), false);
        self.label_all(&self.units(&idle, true), &counting, limits)
    }

    fn units(&self, elements: &[StereoElement], idle: bool) -> Vec<Option<Unit>> {
        let unit = |element| Unit::new(self, element, idle);
        elements.iter().map(unit).collect()
    }

    /// The labels of units; `others` act as auxiliary descriptors beside them.
    fn label_all(
        &self,
        units: &[Option<Unit>],
        others: &[Option<Unit>],
        limits: &Limits,
    ) -> Vec<Labelling> {
        let marked: Vec<Unit> = units.iter().chain(others).flatten().cloned().collect();
        if marked.is_empty() {
            return vec![Labelling::Unmarked; units.len()];
        }
        let atoms = Atoms::new(&self.skeleton, &self.mesomer);
        let labelling = |unit: &Option<Unit>| match unit {
            Some(unit) => label(&atoms, unit, &marked, limits),
            None => Labelling::Unmarked,
        };
        units.iter().map(labelling).collect()
    }
}

fn label(atoms: &Atoms, unit: &Unit, units: &[Unit], limits: &Limits) -> Labelling {
    let mut budget = Budget::share(limits, units.len());
    let roots = unit.ends[..unit.end_count()].iter();
    let mut digraphs: Vec<Digraph<'_>> = roots.map(|&root| Digraph::new(atoms, root)).collect();
    match decision::label(&mut digraphs, unit, units, &mut budget) {
        Ok(Some(label)) => Labelling::Labelled(label),
        Ok(None) => Labelling::Undecided,
        Err(budget::Exhausted) => Labelling::OverLimit,
    }
}
