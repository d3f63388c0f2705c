//! One sample by itself.

use molkin_graph::{Limits, OrderError, Orderer};

use crate::{Relation, Structure, Verdict as Related, explain, kinds, relate, wire::Error, words};

use super::{
    Sample, Verdict, form,
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
    pub form: Vec<&'static str>,
    /// The measured m/z beside the label and beside what came.
    pub masses: [Option<MassCheck>; 2],
    /// Whether the measured formula is that of the label, and that of what came.
    pub formulae: [Option<bool>; 2],
    /// Why there is no relation although both structures could be read.
    pub error: Option<Error>,
}

/// Judges samples; owns the scratch memory. One per thread.
#[derive(Debug)]
pub struct Judge {
    orderer: Orderer,
    limits: Limits,
    brief: bool,
}

/// What two structures are to each other.
struct Comparison {
    related: Related,
    kind: Option<&'static str>,
    form: Vec<&'static str>,
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
            orderer: Orderer::new(limits),
            limits,
            brief,
        }
    }

    /// Judges a sample.
    pub fn judge(&mut self, sample: &Sample) -> Judgement {
        let sides = [sample.label_structure(), sample.received_structure()];
        let measurement = sample.measurement.as_ref();
        let masses = sides.map(|side| measurement?.check(side?.molecule()));
        let formula = sample.formula.as_ref();
        let formulae = sides.map(|side| Some(measured::formula_fits(formula?, side?.molecule())));
        let compared = match sides {
            [Some(label), Some(received)] => self.compare(label, received).map(Some),
            _ => Ok(None),
        };
        let mut judgement = Judgement {
            verdict: Verdict::Unreadable,
            sentence: String::new(),
            relation: None,
            kind: None,
            form: Vec::new(),
            masses,
            formulae,
            error: None,
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
        let related = relate(&mut self.orderer, label, received)?;
        let differ = related.relation != Relation::Identical;
        let form = match differ {
            true => form::same_apart_from(label, received).unwrap_or_default(),
            false => Vec::new(),
        };
        // A kind that takes too many steps is left out of the sentence.
        let kinds = kinds(related.relation, label, received, limits).unwrap_or_default();
        let kind = kinds.first().copied();
        let explained =
            (differ && !self.brief).then(|| explain(label, received, related.relation, limits));
        Ok(Comparison {
            related,
            kind: kind.map(crate::Kind::as_str),
            form,
            summary: words::summary(
                [label, received],
                &related,
                kind,
                explained.as_ref(),
                limits,
            ),
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
        let overlooked_stereo = self.form.contains(&"stereo");
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
