//! What may have happened on a tray, from samples that do not agree.
//!
//! Compounds on labels are the vertices of a graph; a sample that holds another labelled compound than
//! its own is an edge from the one to the other. Exchanged labels are its closed walks, and all else is
//! local: lines of a plate, neighbours, compounds and labels that occur several times. So the work
//! follows the number of samples; no sample is held against each other one.

mod exchange;
mod holdings;
mod plate;
mod sentences;
mod shared;

#[cfg(test)]
mod tests;

use std::collections::BTreeSet;

use super::{Judgement, Sample};

use exchange::{Edge, Exchange};
use holdings::{Holdings, Level};

/// A sort of cause.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub enum Cause {
    /// Two samples hold each other's compound.
    Swap,
    /// Three or more samples hold each other's compounds in a circle.
    Cycle,
    /// The samples along a row or column of a plate sit one place further.
    Shift,
    /// Samples with different labels hold one compound.
    OneStructureSeveralLabels,
    /// Samples with one label hold different compounds.
    OneLabelSeveralStructures,
    /// A sample holds the compound of the label in a well beside it.
    Neighbour,
}

impl Cause {
    /// The word of the output contract.
    pub fn as_str(self) -> &'static str {
        match self {
            Self::Swap => "swap",
            Self::Cycle => "cycle",
            Self::Shift => "shift",
            Self::OneStructureSeveralLabels => "one-structure-several-labels",
            Self::OneLabelSeveralStructures => "one-label-several-structures",
            Self::Neighbour => "neighbour",
        }
    }
}

/// What the least certain of the records that speak for a hypothesis is.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub enum Evidence {
    /// Equal compounds.
    Structure,
    /// Compounds that are equal but for stereo or form.
    Form,
    /// Measured masses or formulae, or formulae of records.
    Mass,
}

impl Evidence {
    /// The word of the output contract.
    pub fn as_str(self) -> &'static str {
        match self {
            Self::Structure => "structure",
            Self::Form => "form",
            Self::Mass => "mass",
        }
    }
}

/// An analysis that would decide.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub enum Analysis {
    /// A mass spectrum: the compounds in question differ in mass.
    MassSpectrum,
    /// NMR, or chromatography beside a reference sample: isomers have one mass.
    Nmr,
    /// Chiral chromatography, optical rotation or NOE: stereoisomers.
    Stereo,
    /// Content of counter-ion, water or isotope: forms of one compound.
    Content,
}

impl Analysis {
    /// The word of the output contract.
    pub fn as_str(self) -> &'static str {
        match self {
            Self::MassSpectrum => "mass-spectrum",
            Self::Nmr => "nmr",
            Self::Stereo => "stereo-analysis",
            Self::Content => "content",
        }
    }
}

/// Something that may have happened, and what it would explain.
#[derive(Debug, Clone, PartialEq)]
pub struct Hypothesis {
    /// What may have happened.
    pub cause: Cause,
    /// The samples whose disagreement it explains, by place in the tray; those of a swap, a cycle or a
    /// shift in the order in which compounds moved.
    pub explains: Vec<usize>,
    /// Samples that have part in it otherwise: they do not disagree, nobody knows what they hold, or what
    /// they hold is on no label.
    pub involves: Vec<usize>,
    /// What speaks for it.
    pub evidence: Evidence,
    /// How much of what it predicts the records bear out, from 0 to 1: the mean over the samples that it
    /// explains, and those that it would but for what is not known, of 1 where what came is the compound
    /// predicted, 1/2 where it is that but for stereo or form, 1/k by mass alone where k compounds on the
    /// tray have that mass, and 0 where nothing is known. Where n samples of one kind could each have
    /// had the part, it is divided by n.
    pub score: f64,
    /// What would decide.
    pub analyses: Vec<Analysis>,
    /// The same in sentences.
    pub sentence: String,
    /// Places in the list of other hypotheses that explain some of the same samples.
    pub alternatives: Vec<usize>,
    /// Whether the records do not say which samples took which part.
    pub is_ambiguous: bool,
}

/// Hypotheses for the samples of a tray with their judgements, the best first. None is chosen where
/// several explain a sample.
pub fn causes(tray: &[(Sample, Judgement)]) -> Vec<Hypothesis> {
    let holdings = Holdings::new(tray);
    let shifts = plate::shifts(&holdings);
    let mut found = exchanges(&holdings);
    // A line that moved on and closes on itself is a circle as well; that says no more.
    let moved: Vec<BTreeSet<usize>> = shifts.iter().map(Hypothesis::all).collect();
    found.retain(|hypothesis| {
        let samples = hypothesis.all();
        !moved.iter().any(|shift| samples.is_subset(shift))
    });
    let closed = found.iter().filter(|hypothesis| hypothesis.is_closed());
    let settled: BTreeSet<usize> = shifts
        .iter()
        .chain(closed)
        .flat_map(|hypothesis| hypothesis.explains.iter().copied())
        .collect();
    found.extend(shifts);
    let left = |sample: usize| !settled.contains(&sample);
    found.extend(plate::neighbours(&holdings, left));
    found.extend(shared::several_labels(&holdings, left));
    found.extend(shared::several_structures(&holdings, left));
    found.extend(shared::one_mass(&holdings, left));
    finish(tray, &holdings, found)
}

/// Exchanges, the finest level first: those that are seen in full, then those that are not.
fn exchanges(holdings: &Holdings<'_>) -> Vec<Hypothesis> {
    let mut explained: BTreeSet<usize> = BTreeSet::new();
    let mut found = Vec::new();
    let mut open = Vec::new();
    for level in Level::ALL {
        let edges = holdings.edges(level);
        let edges: Vec<Edge> = edges.filter(|e| !explained.contains(&e.sample)).collect();
        let (exchanges, rest) = exchange::exchanges(edges);
        for exchange in exchanges {
            explained.extend(&exchange.samples);
            found.push(of_exchange(holdings, level, exchange));
        }
        open.push((level, rest));
    }
    for (level, mut rest) in open {
        rest.retain(|edge| !explained.contains(&edge.sample));
        for chain in exchange::chains(&rest) {
            let ends = holdings.bereft(level, chain.end);
            if !ends.is_empty() {
                explained.extend(&chain.samples);
                found.push(half_seen(holdings, level, chain.samples, ends));
            }
        }
    }
    found
}

impl Hypothesis {
    fn new(cause: Cause, explains: Vec<usize>) -> Self {
        Self {
            cause,
            explains,
            involves: Vec::new(),
            evidence: Evidence::Structure,
            score: 1.0,
            analyses: Vec::new(),
            sentence: String::new(),
            alternatives: Vec::new(),
            is_ambiguous: false,
        }
    }

    fn all(&self) -> BTreeSet<usize> {
        let samples = self.explains.iter().chain(&self.involves);
        samples.copied().collect()
    }

    /// Whether all samples that have part in it are seen to disagree as it says.
    fn is_closed(&self) -> bool {
        self.involves.is_empty()
    }
}

fn of_exchange(holdings: &Holdings<'_>, level: Level, exchange: Exchange) -> Hypothesis {
    let Exchange { samples, ways } = exchange;
    let cause = match samples.len() {
        2 => Cause::Swap,
        _ if ways.is_swap => Cause::Swap,
        _ => Cause::Cycle,
    };
    let strengths = samples
        .iter()
        .map(|&sample| holdings.strength_at(level, sample));
    let mean = strengths.sum::<f64>() / samples.len() as f64;
    Hypothesis {
        evidence: holdings.evidence(level, &samples),
        score: mean / ways.count as f64,
        is_ambiguous: ways.count > 1,
        ..Hypothesis::new(cause, samples)
    }
}

/// A walk that would close if a sample of which nothing is known held the compound that is missing, or
/// one whose content is on no label had held it.
fn half_seen(
    holdings: &Holdings<'_>,
    level: Level,
    samples: Vec<usize>,
    ends: Vec<usize>,
) -> Hypothesis {
    let cause = match samples.len() {
        1 => Cause::Swap,
        _ => Cause::Cycle,
    };
    let strengths = samples
        .iter()
        .map(|&sample| holdings.strength_at(level, sample));
    let mean = strengths.sum::<f64>() / (samples.len() + 1) as f64;
    Hypothesis {
        evidence: holdings.evidence(level, &samples),
        score: mean / ends.len() as f64,
        is_ambiguous: ends.len() > 1,
        involves: ends,
        ..Hypothesis::new(cause, samples)
    }
}

/// Sorts, numbers and words the hypotheses.
fn finish(
    tray: &[(Sample, Judgement)],
    holdings: &Holdings<'_>,
    mut found: Vec<Hypothesis>,
) -> Vec<Hypothesis> {
    found.sort_by(|a, b| {
        let size = b.explains.len().cmp(&a.explains.len());
        b.score
            .total_cmp(&a.score)
            .then(size)
            .then_with(|| a.cause.cmp(&b.cause))
            .then_with(|| a.explains.cmp(&b.explains))
            .then_with(|| a.involves.cmp(&b.involves))
    });
    let mut of_sample: Vec<Vec<usize>> = vec![Vec::new(); tray.len()];
    for (number, hypothesis) in found.iter().enumerate() {
        for &sample in &hypothesis.explains {
            of_sample[sample].push(number);
        }
    }
    for (number, hypothesis) in found.iter_mut().enumerate() {
        let others = hypothesis.explains.iter().flat_map(|&s| &of_sample[s]);
        let others: BTreeSet<usize> = others.copied().filter(|&other| other != number).collect();
        hypothesis.alternatives = others.into_iter().collect();
        hypothesis.analyses = holdings.analyses(&hypothesis.explains);
        hypothesis.sentence = sentences::of_hypothesis(tray, holdings, hypothesis);
    }
    found
}
