//! A tray of labelled samples: an object for the tray, one for each sample, one for each hypothesis.

use serde::Serialize;

use crate::{
    Axis,
    samples::{Analysis, Hypothesis, Judgement, MassCheck, Sample, Verdict},
};

use super::{Error, Input, VERSION};

/// What everybody who reads a verdict on a sample must know.
pub const CAUTION: &str = "This compares records, not the contents of vials: treat a flagged sample as unknown until analysed. The site's procedures, local rules and a qualified chemist decide.";

/// The tray as a whole.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct Tray {
    /// Contract version.
    pub version: u32,
    /// `tray`.
    #[serde(rename = "type")]
    pub kind: &'static str,
    /// [`CAUTION`].
    pub caution: &'static str,
    /// The file, or `-`.
    pub source: String,
    /// How many samples there are.
    pub samples: usize,
    /// How many of them are flagged.
    pub flagged: usize,
    /// How many hypotheses follow.
    pub hypotheses: usize,
    /// How many samples have each verdict, the gravest first; verdicts without samples are left out.
    pub verdicts: Vec<VerdictCount>,
}

/// How often a verdict occurs.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Serialize)]
pub struct VerdictCount {
    /// The verdict.
    pub verdict: &'static str,
    /// Samples with it.
    pub samples: usize,
}

/// A sample.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct SampleEntry {
    /// Contract version.
    pub version: u32,
    /// `sample`.
    #[serde(rename = "type")]
    pub kind: &'static str,
    /// The line of the table on which it begins, from 1.
    pub line: u32,
    /// What it is called.
    pub id: String,
    /// Its plate.
    pub plate: String,
    /// Its well.
    pub well: String,
    /// The verdict, in kebab-case.
    pub verdict: &'static str,
    /// The verdict in plain words.
    pub words: &'static str,
    /// Whether it is to be treated as unknown.
    pub flagged: bool,
    /// What decided, in sentences; A is the label, B what came.
    pub sentence: String,
    /// How the two structures are related, where both could be read.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub relation: Option<&'static str>,
    /// The kind of that relation.
    #[serde(rename = "kind", skip_serializing_if = "Option::is_none")]
    pub relation_kind: Option<&'static str>,
    /// The axes apart from which the two are one compound, where they are.
    #[serde(skip_serializing_if = "Vec::is_empty")]
    pub same_apart_from: Vec<&'static str>,
    /// What the label says.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub label: Option<Input>,
    /// What came.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub received: Option<Input>,
    /// The measured m/z.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub mz: Option<MassEntry>,
    /// The measured formula.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub formula: Option<FormulaEntry>,
    /// What else stands in the row.
    pub remark: String,
    /// Numbers of the hypotheses that explain it, from 1.
    pub hypotheses: Vec<usize>,
    /// What could not be read or compared.
    #[serde(skip_serializing_if = "Vec::is_empty")]
    pub errors: Vec<Error>,
}

/// A measured m/z.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct MassEntry {
    /// As measured.
    pub measured: f64,
    /// The tolerance, in words.
    pub tolerance: String,
    /// Beside the label.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub label: Option<ExpectedMass>,
    /// Beside what came.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub received: Option<ExpectedMass>,
}

/// What a structure would give.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct ExpectedMass {
    /// The ion.
    pub adduct: String,
    /// Formula of the component that ionises.
    pub component: String,
    /// The m/z.
    pub expected: f64,
    /// `monoisotopic`, or `highest` where only the highest peak fits.
    pub peak: &'static str,
    /// How far the measured one lies above it.
    pub ppm: f64,
    /// Whether that is within the tolerance.
    pub fits: bool,
    /// The main peaks: m/z and height, the highest being 100.
    pub peaks: Vec<[f64; 2]>,
}

/// A measured formula.
#[derive(Debug, Clone, PartialEq, Eq, Serialize)]
pub struct FormulaEntry {
    /// As measured, in Hill order.
    pub measured: String,
    /// Whether it is that of the label.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub label_fits: Option<bool>,
    /// Whether it is that of what came.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub received_fits: Option<bool>,
}

/// A hypothesis.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct HypothesisEntry {
    /// Contract version.
    pub version: u32,
    /// `hypothesis`.
    #[serde(rename = "type")]
    pub kind: &'static str,
    /// From 1, the best first.
    pub number: usize,
    /// What may have happened.
    pub cause: &'static str,
    /// The samples that it explains.
    pub explains: Vec<SampleName>,
    /// Samples that have part in it otherwise.
    pub involves: Vec<SampleName>,
    /// What speaks for it: `structure`, `form` or `mass`.
    pub evidence: &'static str,
    /// From 0 to 1.
    pub score: f64,
    /// Whether the records do not say which samples took which part.
    pub ambiguous: bool,
    /// Numbers of other hypotheses that explain some of the same samples.
    pub alternatives: Vec<usize>,
    /// Analyses that would decide.
    pub analyses: Vec<&'static str>,
    /// The same in sentences.
    pub sentence: String,
}

/// Which sample.
#[derive(Debug, Clone, PartialEq, Eq, Serialize)]
pub struct SampleName {
    /// The line of the table on which it begins.
    pub line: u32,
    /// What it is called.
    pub id: String,
}

/// A sample as a row of a table: the columns of `molkin samples --format csv`, in their order. Later
/// columns are added at the end.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct SampleRow {
    /// The line of the tray.
    pub line: u32,
    /// What it is called.
    pub id: String,
    /// Its plate.
    pub plate: String,
    /// Its well.
    pub well: String,
    /// The verdict.
    pub verdict: &'static str,
    /// Whether it is flagged.
    pub flagged: bool,
    /// Relation of the structures.
    pub relation: &'static str,
    /// Kind of the relation.
    pub kind: &'static str,
    /// Axes of form, separated by blanks.
    pub same_apart_from: String,
    /// Canonical SMILES of the label.
    pub label_smiles: String,
    /// Canonical SMILES of what came.
    pub received_smiles: String,
    /// The measured m/z.
    pub mz: String,
    /// The ion.
    pub adduct: String,
    /// The m/z expected of the label or, without one, of what came.
    pub mz_expected: String,
    /// How far the measured one lies above it.
    pub ppm: String,
    /// Whether that is within the tolerance.
    pub mz_fits: String,
    /// Whether the measured formula is that of the label or, without one, of what came.
    pub formula_fits: String,
    /// Numbers of hypotheses with their causes, separated by `; `.
    pub hypotheses: String,
    /// What decided.
    pub sentence: String,
    /// What else stands in the tray's row.
    pub remark: String,
    /// What could not be read, separated by `; `.
    pub message: String,
}

impl Tray {
    /// The tray from a source.
    pub fn new(source: &str, tray: &[(Sample, Judgement)], hypotheses: usize) -> Self {
        let count = |verdict: Verdict| VerdictCount {
            verdict: verdict.as_str(),
            samples: tray.iter().filter(|(_, j)| j.verdict == verdict).count(),
        };
        let flagged = tray.iter().filter(|(_, j)| j.verdict.is_flagged());
        let verdicts = Verdict::ALL.into_iter().map(count);
        Self {
            version: VERSION,
            kind: "tray",
            caution: CAUTION,
            source: source.to_owned(),
            samples: tray.len(),
            flagged: flagged.count(),
            hypotheses,
            verdicts: verdicts.filter(|count| count.samples > 0).collect(),
        }
    }
}

impl SampleEntry {
    /// A sample, its judgement, and the numbers of the hypotheses that explain it.
    pub fn new(sample: &Sample, judgement: &Judgement, hypotheses: Vec<usize>) -> Self {
        let [label, received] = &judgement.masses;
        let mz = sample.measurement.as_ref().map(|measurement| MassEntry {
            measured: measurement.mz,
            tolerance: measurement.tolerance.to_string(),
            label: label.as_ref().map(ExpectedMass::of),
            received: received.as_ref().map(ExpectedMass::of),
        });
        let [label_fits, received_fits] = judgement.formulae;
        let formula = sample.formula.as_ref().map(|formula| FormulaEntry {
            measured: formula.formula().to_string(),
            label_fits,
            received_fits,
        });
        let verdict = judgement.verdict;
        let errors = sample.errors().chain(&judgement.error);
        Self {
            version: VERSION,
            kind: "sample",
            line: sample.line,
            id: sample.id.clone(),
            plate: sample.plate.clone(),
            well: sample.well.clone(),
            verdict: verdict.as_str(),
            words: verdict.in_words(),
            flagged: verdict.is_flagged(),
            sentence: judgement.sentence.clone(),
            relation: judgement.relation.map(|relation| relation.as_str()),
            relation_kind: judgement.kind,
            same_apart_from: judgement.form.iter().map(Axis::as_str).collect(),
            label: sample.label.as_ref().map(|label| label.input().clone()),
            received: sample.received.as_ref().map(|side| side.input().clone()),
            mz,
            formula,
            remark: sample.remark.clone(),
            hypotheses,
            errors: errors.cloned().collect(),
        }
    }
}

impl ExpectedMass {
    fn of(check: &MassCheck) -> Self {
        Self {
            adduct: check.adduct.clone(),
            component: check.component.clone(),
            expected: check.expected,
            peak: if check.is_highest {
                "highest"
            } else {
                "monoisotopic"
            },
            ppm: check.ppm,
            fits: check.fits,
            peaks: check
                .peaks
                .iter()
                .map(|peak| [peak.mz, peak.height])
                .collect(),
        }
    }
}

impl HypothesisEntry {
    /// A hypothesis about a tray; `number` counts from 1.
    pub fn new(tray: &[(Sample, Judgement)], hypothesis: &Hypothesis, number: usize) -> Self {
        let names = |samples: &[usize]| -> Vec<SampleName> {
            let known = samples.iter().filter_map(|&at| tray.get(at));
            let name = |(sample, _): &(Sample, Judgement)| SampleName {
                line: sample.line,
                id: sample.id.clone(),
            };
            known.map(name).collect()
        };
        let analyses = hypothesis.analyses.iter().copied();
        Self {
            version: VERSION,
            kind: "hypothesis",
            number,
            cause: hypothesis.cause.as_str(),
            explains: names(&hypothesis.explains),
            involves: names(&hypothesis.involves),
            evidence: hypothesis.evidence.as_str(),
            score: hypothesis.score,
            ambiguous: hypothesis.is_ambiguous,
            alternatives: hypothesis.alternatives.iter().map(|at| at + 1).collect(),
            analyses: analyses.map(Analysis::as_str).collect(),
            sentence: hypothesis.sentence.clone(),
        }
    }
}

impl SampleRow {
    /// The row of a sample; `hypotheses` are all of the tray.
    pub fn new(entry: &SampleEntry, hypotheses: &[Hypothesis]) -> Self {
        let smiles = |side: &Option<Input>| {
            let smiles = side.as_ref().and_then(|input| input.smiles.clone());
            smiles.unwrap_or_default()
        };
        let mass = entry.mz.as_ref();
        let expected = mass.and_then(|mass| mass.label.as_ref().or(mass.received.as_ref()));
        let of_expected =
            |text: fn(&ExpectedMass) -> String| expected.map_or_else(String::new, text);
        let formula = entry.formula.as_ref();
        let formula_fits = formula.and_then(|formula| formula.label_fits.or(formula.received_fits));
        let cause = |&number: &usize| {
            let hypothesis = number.checked_sub(1).and_then(|at| hypotheses.get(at))?;
            Some(format!("{number} {}", hypothesis.cause.as_str()))
        };
        let causes: Vec<String> = entry.hypotheses.iter().filter_map(cause).collect();
        let errors = entry.errors.iter();
        let errors: Vec<String> = errors
            .map(|e| format!("{}: {}", e.code, e.message))
            .collect();
        Self {
            line: entry.line,
            id: entry.id.clone(),
            plate: entry.plate.clone(),
            well: entry.well.clone(),
            verdict: entry.verdict,
            flagged: entry.flagged,
            relation: entry.relation.unwrap_or_default(),
            kind: entry.relation_kind.unwrap_or_default(),
            same_apart_from: entry.same_apart_from.join(" "),
            label_smiles: smiles(&entry.label),
            received_smiles: smiles(&entry.received),
            mz: mass.map_or_else(String::new, |mass| mass.measured.to_string()),
            adduct: of_expected(|mass| mass.adduct.clone()),
            mz_expected: of_expected(|mass| format!("{:.5}", mass.expected)),
            ppm: of_expected(|mass| format!("{:.1}", mass.ppm)),
            mz_fits: of_expected(|mass| mass.fits.to_string()),
            formula_fits: formula_fits.map_or_else(String::new, |fits| fits.to_string()),
            hypotheses: causes.join("; "),
            sentence: entry.sentence.clone(),
            remark: entry.remark.clone(),
            message: errors.join("; "),
        }
    }
}
