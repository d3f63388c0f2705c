//! Compounds that several labels share, and labels that several compounds share.

use std::collections::{BTreeMap, BTreeSet};

use super::{
    Cause, Evidence, Hypothesis,
    holdings::{Content, Holdings},
};

/// Compounds found under several labels.
pub(super) fn several_labels(
    holdings: &Holdings<'_>,
    left: impl Fn(usize) -> bool,
) -> Vec<Hypothesis> {
    let held = |sample: usize| Some((holdings.held(sample)?, holdings.samples[sample].label?));
    groups(holdings, Cause::OneStructureSeveralLabels, left, held)
}

/// Labels under which several compounds were found.
pub(super) fn several_structures(
    holdings: &Holdings<'_>,
    left: impl Fn(usize) -> bool,
) -> Vec<Hypothesis> {
    let labelled = |sample: usize| Some((holdings.samples[sample].label?, holdings.held(sample)?));
    groups(holdings, Cause::OneLabelSeveralStructures, left, labelled)
}

/// Samples with different labels that have one mass, which no label has. Samples are of one mass with the
/// next in order of mass where the two are within their tolerances.
pub(super) fn one_mass(holdings: &Holdings<'_>, left: impl Fn(usize) -> bool) -> Vec<Hypothesis> {
    let samples = 0..holdings.samples.len();
    let left = samples.filter(|&at| holdings.samples[at].differs && left(at));
    let mut masses: Vec<(f64, f64, usize)> = left
        .filter_map(|at| {
            let (mass, width) = holdings.foreign_mass(at)?;
            Some((mass, width, at))
        })
        .collect();
    masses.sort_by(|a, b| a.0.total_cmp(&b.0).then(a.2.cmp(&b.2)));
    let groups = masses.chunk_by(|a, b| b.0 - a.0 <= a.1.max(b.1));
    let by_mass = |at: usize| matches!(holdings.samples[at].content, Content::ByMass(_));
    let several = groups.filter(|group| {
        let labels: BTreeSet<Option<u32>> = group
            .iter()
            .map(|&(.., at)| holdings.samples[at].label)
            .collect();
        // Records that agree are told by their compounds.
        labels.len() > 1 && group.iter().any(|&(.., at)| by_mass(at))
    });
    let hypothesis = |group: &[(f64, f64, usize)]| {
        let mut explains: Vec<usize> = group.iter().map(|&(.., at)| at).collect();
        explains.sort_unstable();
        Hypothesis {
            evidence: Evidence::Mass,
            ..Hypothesis::new(Cause::OneStructureSeveralLabels, explains)
        }
    };
    several.map(hypothesis).collect()
}

/// Groups of samples that share the first of two compounds and differ in the second, if any of those
/// that are left over is among them.
fn groups(
    holdings: &Holdings<'_>,
    cause: Cause,
    left: impl Fn(usize) -> bool,
    compounds: impl Fn(usize) -> Option<(u32, u32)>,
) -> Vec<Hypothesis> {
    let mut groups: BTreeMap<u32, Vec<(usize, u32)>> = BTreeMap::new();
    for sample in 0..holdings.samples.len() {
        if let Some((shared, other)) = compounds(sample) {
            groups.entry(shared).or_default().push((sample, other));
        }
    }
    let several = groups.into_values().filter(|group| {
        let others: BTreeSet<u32> = group.iter().map(|&(_, other)| other).collect();
        others.len() > 1
    });
    let hypothesis = |group: Vec<(usize, u32)>| {
        let samples = group.into_iter().map(|(sample, _)| sample);
        let explained = |sample: &usize| holdings.samples[*sample].differs && left(*sample);
        let (explains, involves): (Vec<usize>, Vec<usize>) = samples.partition(explained);
        let by_mass = |&at: &usize| matches!(holdings.samples[at].content, Content::ByMass(_));
        let evidence = match explains.iter().chain(&involves).any(by_mass) {
            true => Evidence::Mass,
            false => Evidence::Structure,
        };
        (!explains.is_empty()).then(|| Hypothesis {
            involves,
            evidence,
            ..Hypothesis::new(cause, explains)
        })
    };
    several.filter_map(hypothesis).collect()
}
