//! One sample by itself.

use molkin_graph::{Limits, OrderError};

use crate::{
    Axes, Axis, Normaliser, Relation, Structure, Verdict as Related, explain, kinds, relate,
    same_apart_from, wire::Error, words,
};

use super::{
    Sample, Verdict,
    component::Side,
    measured::{self, MassCheck},
    sentences,
};

/// What there is to say about one sample.
#[derive(Debug, Clone, PartialEq)]
pub struct Judgement {
    /// The verdict.
    pub verdict: Verdict,
    /// What decided, in sentences; A is the label, B what came.
    pub sentence: String,
    /// How the two structures are related.
    pub relation: Option<Relation>,
    /// The kind of that relation.
    pub kind: Option<&'static str>,
    /// The axes that make the two one when they are overlooked.
    pub form: Axes,
    /// The measured m/z beside the label and beside what came.
    pub masses: [Option<MassCheck>; 2],
    /// Whether the measured formula is that of the label, and that of what came.
    pub formulae: [Option<bool>; 2],
    /// Why there is no relation although both structures could be read.
    pub error: Option<Error>,
    /// What the label and what came have in common with their other forms.
    pub(super) sides: [Option<Side>; 2],
}

/// Judges samples; owns the scratch memory. One per thread.
#[derive(Debug)]
pub struct Judge {
    normaliser: Normaliser,
    limits: Limits,
    brief: bool,
}

/// What two structures are to each other.
struct Comparison {
    related: Related,
    kind: Option<&'static str>,
    form: Axes,
    summary: String,
}

/// A tray has many samples: the search for the atom map of one takes this part of its usual steps at
/// most. Where it is not proved least the sentence says so.
const MAP_PART: u64 = 10;

impl Judge {
    /// A judge within the given limits. A brief one leaves out what needs an atom map.
    pub fn new(limits: Limits, brief: bool) -> Self {
        let limits = Limits {
            map_steps: limits.map_steps / MAP_PART,
            ..limits
        };
        Self {
            normaliser: Normaliser::new(limits),
            limits,
            brief,
        }
    }

    /// Judges a sample.
    pub fn judge(&mut self, sample: &Sample) -> Judgement {
        let structures = [sample.label_structure(), sample.received_structure()];
        let sides = structures.map(|side| Some(Side::of(&mut self.normaliser, side?)));
        let measurement = sample.measurement.as_ref();
        let masses = sides
            .each_ref()
            .map(|side| measurement?.check(side.as_ref()?));
        let formula = sample.formula.as_ref();
        let formulae = [0, 1].map(|at| {
            let (structure, side) = (structures[at]?, sides[at].as_ref()?);
            Some(measured::formula_fits(formula?, structure, side))
        });
        let compared = match structures {
            [Some(label), Some(received)] => self.compare(label, received).map(Some),
            _ => Ok(None),
        };
        let mut judgement = Judgement {
            verdict: Verdict::Unreadable,
            sentence: String::new(),
            relation: None,
            kind: None,
            form: Axes::NONE,
            masses,
            formulae,
            error: None,
            sides,
        };
        match compared {
            Ok(compared) => judgement.settle(sample, compared),
            Err(error) => {
                let error = crate::PrepareError::from(error);
                judgement.sentence = format!("The two structures cannot be compared: {error}.");
                judgement.error = Some(Error::without_place(error.code(), error.to_string()));
            }
        }
        judgement
    }

    fn compare(
        &mut self,
        label: &Structure,
        received: &Structure,
    ) -> Result<Comparison, OrderError> {
        let limits = &self.limits;
        let structures = [label, received];
        let related = relate(self.normaliser.orderer(), label, received)?;
        // Forms and kinds that take too many steps are left out of the sentence.
        let form = same_apart_from(&mut self.normaliser, related.relation, label, received);
        let form = form.unwrap_or_default();
        let substances = form.and_then(|axes| {
            let sentence = words::forms::substances(&mut self.normaliser, structures, axes);
            sentence.unwrap_or_default()
        });
        let kinds = kinds(related.relation, structures, form, limits).unwrap_or_default();
        let kind = kinds.first().copied();
        let explained = (related.relation != Relation::Identical && !self.brief)
            .then(|| explain(label, received, related.relation, limits));
        let mut summary = words::summary(
            structures,
            &related,
            kind,
            substances.as_deref(),
            explained.as_ref(),
        );
        let constituted = matches!(
            related.relation,
            Relation::NotIsomers | Relation::Constitutional
        );
        if let Some(axes) = form.filter(|_| constituted && substances.is_none()) {
            summary.push_str(&format!(" They are one compound apart from {axes}."));
        }
        Ok(Comparison {
            related,
            kind: kind.map(crate::Kind::as_str),
            form: form.unwrap_or(Axes::NONE),
            summary,
        })
    }
}

impl Judgement {
    /// Whether a measurement contradicts the label (0) or what came (1).
    pub(super) fn contradicts(&self, side: usize) -> bool {
        let mass = self.masses.get(side).and_then(Option::as_ref);
        let formula = self.formulae.get(side).copied().flatten();
        mass.is_some_and(|check| !check.fits) || formula == Some(false)
    }

    /// Whether anything measured was held against a side.
    fn is_measured(&self, side: usize) -> bool {
        let mass = self.masses.get(side).is_some_and(Option::is_some);
        mass || self.formulae.get(side).copied().flatten().is_some()
    }

    fn settle(&mut self, sample: &Sample, compared: Option<Comparison>) {
        let structural = compared.as_ref().map(Comparison::verdict);
        self.verdict = self.overall(sample, structural);
        if let Some(compared) = compared {
            self.relation = Some(compared.related.relation);
            self.kind = compared.kind;
            self.form = compared.form;
            self.sentence = compared.summary;
        }
        self.sentence = sentences::of_sample(sample, self);
    }

    fn overall(&self, sample: &Sample, structural: Option<Verdict>) -> Verdict {
        let unreadable = sample.errors().next().is_some();
        match structural {
            Some(Verdict::AnotherCompound) => Verdict::AnotherCompound,
            Some(_) if self.contradicts(0) => Verdict::MeasurementContradicts,
            Some(verdict @ (Verdict::Isomer | Verdict::StereoDiffers)) => verdict,
            _ if unreadable => Verdict::Unreadable,
            Some(verdict) => verdict,
            None if self.contradicts(0) || self.contradicts(1) => Verdict::MeasurementContradicts,
            None if self.is_measured(0) => Verdict::Agrees,
            None => Verdict::NothingToCompare,
        }
    }
}

impl Comparison {
    /// The verdict by the structures alone.
    fn verdict(&self) -> Verdict {
        let overlooked_stereo = self.form.contains(Axis::Stereo);
        match self.related.relation {
            Relation::Identical if self.related.open => Verdict::AgreesButOpen,
            Relation::Identical => Verdict::Agrees,
            Relation::Stereo(_) => Verdict::StereoDiffers,
            _ if overlooked_stereo => Verdict::StereoDiffers,
            _ if !self.form.is_empty() => Verdict::AgreesButForm,
            Relation::Constitutional => Verdict::Isomer,
            Relation::NotIsomers => Verdict::AnotherCompound,
        }
    }
}
