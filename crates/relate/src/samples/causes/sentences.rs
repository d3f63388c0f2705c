//! Hypotheses in sentences.

use crate::samples::{Judgement, Sample};

use super::{Analysis, Cause, Evidence, Hypothesis, holdings::Holdings};

/// Names listed before the rest is counted.
const LISTED: usize = 12;

/// What may have happened, what speaks for it, what is not known, and what would decide.
pub(super) fn of_hypothesis(
    tray: &[(Sample, Judgement)],
    holdings: &Holdings<'_>,
    hypothesis: &Hypothesis,
) -> String {
    let names = |samples: &[usize]| {
        let known = samples.iter().filter_map(|&at| tray.get(at));
        listed(&known.map(|(sample, _)| name(sample)).collect::<Vec<_>>())
    };
    let (explains, involves) = (names(&hypothesis.explains), names(&hypothesis.involves));
    let mut text = what(
        hypothesis,
        &explains,
        &involves,
        instead(holdings, hypothesis),
    );
    text.push_str(match hypothesis.evidence {
        Evidence::Structure => "",
        Evidence::Form => " Stereo or form aside, that is.",
        Evidence::Mass => " Masses or formulae say so; isomers would have the same.",
    });
    let analyses: Vec<&str> = hypothesis.analyses.iter().map(|a| in_words(*a)).collect();
    if !analyses.is_empty() {
        text.push_str(&format!(" What would decide: {}.", analyses.join("; ")));
    }
    text
}

/// What is known of samples whose compound may have gone elsewhere.
fn instead(holdings: &Holdings<'_>, hypothesis: &Hypothesis) -> &'static str {
    match hypothesis.involves.iter().all(|&at| holdings.is_unseen(at)) {
        true => "of which nothing is known",
        false => "which holds, as far as is known, what is on no label",
    }
}

fn what(hypothesis: &Hypothesis, explains: &str, involves: &str, instead: &str) -> String {
    let half_seen = !hypothesis.involves.is_empty();
    let hold = match hypothesis.explains.len() {
        1 => "holds",
        _ => "hold",
    };
    match hypothesis.cause {
        Cause::Swap if half_seen => format!(
            "{explains} {hold} what the label says of {involves}, {instead}: they may have been exchanged."
        ),
        Cause::Swap if hypothesis.is_ambiguous => format!(
            "Among {explains} two compounds were exchanged; which sample with which the records do not say."
        ),
        Cause::Swap => format!("{explains} hold each other's compound: an exchange explains it."),
        Cause::Cycle if half_seen => format!(
            "{explains} each hold what the label of the next says, the last that of {involves}, {instead}: they may have been exchanged in a circle."
        ),
        Cause::Cycle if hypothesis.is_ambiguous => format!(
            "Among {explains} compounds were exchanged in more than one way; the records do not say which."
        ),
        Cause::Cycle => format!(
            "{explains} each hold what the label of the next says, the last that of the first: an exchange in a circle explains it."
        ),
        Cause::Shift if half_seen => format!(
            "{explains} each hold what the label one place before says, as in a line that sits one place further than its labels. Part of it, as far as can be said: {involves}."
        ),
        Cause::Shift => format!(
            "{explains} each hold what the label one place before says, as in a line that sits one place further than its labels."
        ),
        Cause::OneStructureSeveralLabels if half_seen => {
            format!("{explains} {hold} the compound of {involves} under another label.")
        }
        Cause::OneStructureSeveralLabels => {
            format!("{explains} hold one compound under different labels.")
        }
        Cause::OneLabelSeveralStructures if half_seen => {
            format!("{explains} {hold} another compound than {involves} under the same label.")
        }
        Cause::OneLabelSeveralStructures => {
            format!("{explains} hold different compounds under one label.")
        }
        Cause::Neighbour => {
            format!("{explains} holds what the label of {involves} says, the well beside it.")
        }
    }
}

fn in_words(analysis: Analysis) -> &'static str {
    match analysis {
        Analysis::MassSpectrum => "a mass spectrum of each, since their masses differ",
        Analysis::Nmr => {
            "NMR, or chromatography beside a reference sample, since isomers have one mass"
        }
        Analysis::Stereo => {
            "chiral chromatography or optical rotation, for diastereomers NMR, since stereoisomers have one mass"
        }
        Analysis::Content => "the content of counter-ion, water or isotope",
    }
}

/// "P-014 (A3)".
fn name(sample: &Sample) -> String {
    let place = match (sample.plate.trim(), sample.well.trim()) {
        ("", "") => String::new(),
        ("", well) => well.to_owned(),
        (plate, "") => plate.to_owned(),
        (plate, well) => format!("{plate} {well}"),
    };
    match (sample.id.trim(), place.is_empty()) {
        ("", true) => format!("line {}", sample.line),
        ("", false) => place,
        (id, true) => id.to_owned(),
        (id, false) => format!("{id} ({place})"),
    }
}

fn listed(names: &[String]) -> String {
    match names {
        [] => String::new(),
        [one] => one.clone(),
        names if names.len() > LISTED => format!(
            "{} and {} more",
            names[..LISTED - 1].join(", "),
            names.len() - LISTED + 1
        ),
        [rest @ .., last] => format!("{} and {last}", rest.join(", ")),
    }
}
