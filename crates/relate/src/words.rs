//! The verdict in plain sentences.

mod groups;

use molkin_graph::Limits;

use crate::{Explanation, Kind, Relation, StereoKind, Structure, Verdict};

/// One or two sentences for a chemist.
pub(crate) fn summary(
    [a, b]: [&Structure; 2],
    verdict: &Verdict,
    kind: Option<Kind>,
    explained: Option<&Explanation>,
    limits: &Limits,
) -> String {
    match verdict.relation {
        Relation::Identical if verdict.open => {
            "The two records say the same, but they leave stereo open: the samples may still differ.".to_owned()
        }
        Relation::Identical => "The two records are the same compound.".to_owned(),
        Relation::Stereo(kind) => stereo(kind, explained),
        Relation::Constitutional => {
            // What needs more than the kind is left out of brief output.
            let groups = explained.and_then(|_| groups::difference(a, b, limits));
            constitutional(a, kind, groups, explained)
        }
        Relation::NotIsomers => not_isomers(a, b, kind),
    }
}

fn stereo(kind: StereoKind, explained: Option<&Explanation>) -> String {
    let verdict = match kind {
        StereoKind::Enantiomers => "Enantiomers: mirror images that do not coincide.",
        StereoKind::Diastereomers => {
            "Diastereomers: the same connectivity, a different arrangement in space, and not mirror images."
        }
        StereoKind::Composition => {
            "Composition: the same connectivity, and always a stereoisomer in common, but not the same mixture."
        }
        StereoKind::Undetermined => {
            "Undetermined: the same connectivity; as marked, the two may or may not be the same stereoisomer."
        }
        StereoKind::Unresolved => {
            "Unresolved: surely different stereoisomers, but the marks do not settle whether they are mirror images."
        }
    };
    let count = explained.map_or(0, |e| e.stereo.len());
    match count {
        0 => verdict.to_owned(),
        1 => format!("{verdict} One stereo element differs."),
        n => format!("{verdict} {n} stereo elements differ."),
    }
}

fn constitutional(
    a: &Structure,
    kind: Option<Kind>,
    groups: Option<String>,
    explained: Option<&Explanation>,
) -> String {
    let what = match kind {
        Some(Kind::Isotopomers) => ", with the same isotopes in other places".to_owned(),
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

fn counted(count: usize, noun: &str) -> String {
    match count {
        0 => format!("no {noun}"),
        1 => format!("one {noun}"),
        n => format!("{n} {noun}s"),
    }
}

fn not_isomers(a: &Structure, b: &Structure, kind: Option<Kind>) -> String {
    let (left, right) = (a.formula(), b.formula());
    if kind == Some(Kind::Homologues) {
        format!(
            "Not isomers but homologues: the same functional groups, and formulae that differ by CH2 units ({left} and {right})."
        )
    } else if left != right {
        let same_atoms = left.iter().eq(right.iter());
        let why = if same_atoms {
            "the net charge differs"
        } else {
            "the molecular formulae differ"
        };
        format!("Not isomers: {why} ({left} and {right}).")
    } else {
        format!("Not isomers: the same elements ({left}), but a different isotopic composition.")
    }
}
