//! The verdict in plain sentences.

mod analysis;
pub(crate) mod forms;
mod functional;
pub(crate) mod moves;
mod places;
mod relatives;
mod stereo;
mod stereo_groups;

#[cfg(test)]
mod tests;

use crate::{
    BondDifference, Explanation, Kind, Relation, Structure, Verdict,
    findings::{Change, Finding},
};

pub(crate) use analysis::analysis;

/// One or two sentences for a chemist.
pub(crate) fn summary(
    [a, b]: [&Structure; 2],
    verdict: &Verdict,
    kind: Option<Kind>,
    substances: Option<&str>,
    explained: Option<&Explanation>,
) -> String {
    match verdict.relation {
        Relation::Identical if verdict.open => {
            "The two records say the same, but they leave stereo open: the samples may still differ.".to_owned()
        }
        Relation::Identical => "The two records are the same compound.".to_owned(),
        Relation::Stereo(kind) => stereo::summary(a, b, kind, explained),
        Relation::Constitutional => {
            let groups = explained.and_then(|found| found.functional_groups.as_ref());
            let groups = groups.and_then(functional::difference);
            constitutional([a, b], kind, groups, explained)
        }
        Relation::NotIsomers => relatives::summary([a, b], kind, substances, explained),
    }
}

fn constitutional(
    [a, b]: [&Structure; 2],
    kind: Option<Kind>,
    groups: Option<String>,
    explained: Option<&Explanation>,
) -> String {
    let what = match kind {
        Some(Kind::Isotopomers) => ", with the same isotopes in other places".to_owned(),
        Some(Kind::ProtonTransfer) => {
            let moved = explained.and_then(|e| forms::moved_hydrogens([a, b], e, "proton"));
            let moved = moved.unwrap_or_else(|| "a proton sits elsewhere".to_owned());
            format!("; proton transfer: {moved}")
        }
        Some(Kind::Tautomers) => {
            let moved = explained.and_then(|e| forms::moved_hydrogens([a, b], e, "hydrogen"));
            let moved = moved.unwrap_or_else(|| "a mobile hydrogen sits elsewhere".to_owned());
            format!("; tautomers: {moved}")
        }
        Some(Kind::RingChain) => ", but a chain of one is closed to a ring in the other".to_owned(),
        Some(Kind::Functional) => {
            let groups = groups.map(|groups| format!(" ({groups})"));
            format!(
                ", but other functional groups{}",
                groups.unwrap_or_default()
            )
        }
        Some(Kind::Skeletal) => ", but another carbon skeleton".to_owned(),
        Some(Kind::Positional) => " and the same functional groups, but in other places".to_owned(),
        _ => ", but the atoms are connected differently".to_owned(),
    };
    let formula = a.formula();
    let verdict = format!("Constitutional isomers: the same formula {formula}{what}.");
    let Some(bonds) = explained.and_then(|e| e.bonds.as_ref()) else {
        return verdict;
    };
    let findings = explained.map_or(&[][..], |explained| &explained.findings);
    if let Some(told) = foremost([a, b], findings, bonds.minimal) {
        return format!("{verdict} {told}");
    }
    if bonds.unrelated == Some(true) {
        return format!("{verdict} {}", unrelated(bonds));
    }
    let (only_a, only_b) = (bonds.only_in_a.len(), bonds.only_in_b.len());
    let differences = match (only_a + only_b, bonds.order_changed.len()) {
        (0, 0) => {
            return format!(
                "{verdict} All bonds agree; hydrogens, charges or isotopes sit elsewhere."
            );
        }
        (0, changed) => format!("{} of different order", counted(changed, "bond")),
        _ => format!(
            "{} only in A and {} only in B",
            counted(only_a, "bond"),
            counted(only_b, "bond")
        ),
    };
    if bonds.minimal {
        format!("{verdict} The least difference: {differences}.")
    } else {
        format!("{verdict} One way to see it, not proved the least: {differences}.")
    }
}

/// Why single differences are not told.
fn unrelated(bonds: &BondDifference) -> String {
    let all = 2 * bonds.kept + bonds.only_in_a.len() + bonds.only_in_b.len();
    format!(
        "They are unrelated in structure: however the atoms are laid on each other, at least {} of their {all} bonds belong to one only.",
        bonds.at_least
    )
}

/// The most telling finding, and how many there are beside it.
fn foremost(structures: [&Structure; 2], findings: &[Finding], minimal: bool) -> Option<String> {
    let [first, others @ ..] = findings else {
        return None;
    };
    let sentence = moves::sentence(structures, first);
    let sentence = sentence.trim_end_matches('.');
    // Groups are named with the verdict.
    let others = others
        .iter()
        .filter(|finding| !matches!(finding.change, Change::Groups(_)));
    let beside = match others.count() {
        0 => String::new(),
        1 => "; one more difference".to_owned(),
        n => format!("; {n} more differences"),
    };
    Some(if minimal {
        format!("{sentence}{beside}.")
    } else {
        let sentence = moves::within(sentence);
        format!("One way to see it, not proved the least: {sentence}{beside}.")
    })
}

/// "C2", "C2 and C3", "C2, C3 and C5".
fn listed(items: &[String]) -> String {
    match items {
        [] => String::new(),
        [one] => one.clone(),
        [rest @ .., last] => format!("{} and {last}", rest.join(", ")),
    }
}

fn counted(count: usize, noun: &str) -> String {
    match count {
        0 => format!("no {noun}"),
        1 => format!("one {noun}"),
        n => format!("{n} {noun}s"),
    }
}
