//! What form of one compound two records are, in words.

use std::collections::BTreeMap;

use crate::{
    Axes, Axis, Change, Explanation, Form, FormError, ListedKind, Normaliser, Removed, Structure,
};

/// "B is the dihydrochloride of A", "B has one proton more than A": how two records that are the same apart
/// from some axes differ as substances. `None` where only mobile hydrogens, isotopes or stereo differ.
pub(crate) fn substances(
    normaliser: &mut Normaliser,
    [a, b]: [&Structure; 2],
    apart: Axes,
) -> Result<Option<String>, FormError> {
    let sentence = if apart.contains(Axis::Salt) {
        let axes = Axes::from([Axis::Salt]);
        let forms = [normaliser.overlook(a, axes)?, normaliser.overlook(b, axes)?];
        salts(forms.each_ref().map(substance))
    } else if apart.contains(Axis::Charge) && a.formula() != b.formula() {
        Some(protons(a, b))
    } else {
        None
    };
    let said = if apart.contains(Axis::Salt) {
        Axis::Salt
    } else {
        Axis::Charge
    };
    let rest = apart.iter().filter(|&axis| axis != said);
    let rest: Vec<&str> = rest.map(Axis::as_str).collect();
    Ok(sentence.map(|sentence| match rest.as_slice() {
        [] => sentence,
        rest => format!("{sentence}, apart from {}", rest.join(" and ")),
    }))
}

fn salts(substances: [Option<String>; 2]) -> Option<String> {
    match substances {
        [None, Some(b)] => Some(format!("B is the {b} of A")),
        [Some(a), None] => Some(format!("A is the {a} of B")),
        [Some(a), Some(b)] if a != b => Some(format!("A is the {a} and B the {b} of one compound")),
        [Some(both), Some(_)] => Some(format!("both are the {both} of one compound")),
        [None, None] => None,
    }
}

fn protons(a: &Structure, b: &Structure) -> String {
    let charges = [a, b].map(|side| side.formula().charge());
    let more = charges[1] - charges[0];
    let words = match more.unsigned_abs() {
        1 => "one proton".to_owned(),
        count => format!("{count} protons"),
    };
    let than = if more > 0 { "more" } else { "less" };
    format!("B has {words} {than} than A")
}

/// "hydrochloride monohydrate": what was taken away from a parent.
fn substance(form: &Form<'_>) -> Option<String> {
    let charged = form.structure().formula().charge() > 0;
    let mut parents = 1_usize;
    let mut counts: BTreeMap<(u8, String), usize> = BTreeMap::new();
    for (_, change) in form.changes() {
        match change {
            Change::Component {
                what: Removed::Copy,
                ..
            } => parents += 1,
            Change::Component {
                what: Removed::Listed(listed),
                ..
            } => {
                let salt = if charged { &listed.ion } else { &listed.salt };
                let place = match listed.kind {
                    ListedKind::Solvent => 2,
                    ListedKind::Acid | ListedKind::MineralAcid => 0,
                    _ => 1,
                };
                *counts.entry((place, salt.clone())).or_default() += 1;
            }
            _ => {}
        }
    }
    let parts = counts
        .into_iter()
        .map(|((place, name), count)| match place {
            0 => prefixed(count, parents, &name),
            1 => format!("{} salt", prefixed(count, parents, &name)),
            _ if name == "hydrate" => match (count, parents) {
                (1, 1) => "monohydrate".to_owned(),
                _ => prefixed(count, parents, &name),
            },
            _ => prefixed(count, parents, &name),
        });
    let parts: Vec<String> = parts.collect();
    (!parts.is_empty()).then(|| parts.join(" "))
}

/// "dihydrochloride", "hemisulfate", "bis(trometamol)", "acetate (4:3)".
fn prefixed(count: usize, parents: usize, name: &str) -> String {
    const PLAIN: [&str; 6] = ["", "di", "tri", "tetra", "penta", "hexa"];
    const COMPOUND: [&str; 6] = ["", "bis", "tris", "tetrakis", "pentakis", "hexakis"];
    let simple = !name.contains([' ', '-', ',']);
    match (count, parents) {
        (1, 2) => format!("hemi{name}"),
        (3, 2) => format!("sesqui{name}"),
        (_, 1) if (1..=6).contains(&count) => {
            let (plain, compound) = (PLAIN[count - 1], COMPOUND[count - 1]);
            match compound {
                "" => name.to_owned(),
                _ if simple && !name.starts_with("di") && !name.starts_with("tri") => {
                    format!("{plain}{name}")
                }
                _ => format!("{compound}({name})"),
            }
        }
        _ => format!("{name} ({count}:{parents})"),
    }
}

/// "the hydrogen is on N1 in A and on N3 in B": where a map puts the hydrogens that moved.
pub(super) fn moved_hydrogens(
    [a, b]: [&Structure; 2],
    explained: &Explanation,
    what: &str,
) -> Option<String> {
    let (mut in_a, mut in_b) = (Vec::new(), Vec::new());
    for entry in &explained.hydrogens {
        if entry.count_a > entry.count_b {
            in_a.push(atom(a, entry.a)?);
        } else {
            in_b.push(atom(b, entry.b)?);
        }
    }
    match (in_a.len(), in_b.len()) {
        (0, _) | (_, 0) => None,
        (1, 1) => Some(format!(
            "the {what} is on {} in A and on {} in B",
            in_a[0], in_b[0]
        )),
        _ => Some(format!(
            "{what}s are on {} in A and on {} in B",
            super::listed(&in_a),
            super::listed(&in_b)
        )),
    }
}

/// "N3".
fn atom(structure: &Structure, index: u32) -> Option<String> {
    let molecule = structure.molecule();
    let symbol = molecule.atom(index)?.element.symbol();
    Some(format!("{symbol}{}", molecule.number(index)))
}
