//! A described record.

use std::io::{self, Write};

use molkin_relate::wire::{Describe, Prepared, Stereo};

use crate::output::style::{Role, Style};

use super::{
    atoms::Labels,
    fault,
    layout::{labelled, sentence},
    place,
};

/// Writes a record: its place, then one fact a line.
pub(crate) fn write(
    out: &mut impl Write,
    style: Style,
    described: &Describe,
    prepared: &Prepared,
) -> io::Result<()> {
    let place = place(&described.source, described.record, &described.name);
    writeln!(out, "{}", style.paint(Role::Verdict, &place))?;
    for (label, text) in facts(described) {
        labelled(out, style, (None, label), &text)?;
    }
    if let Some(structure) = prepared.structure() {
        let labels = Labels::new(structure);
        for entry in described.stereo.iter().flatten() {
            let text = element(&labels, entry);
            labelled(out, style, (None, "stereo"), &text)?;
        }
    }
    for note in described.notes.iter().flatten() {
        let text = format!("{} [{}]", sentence(&note.text), note.code);
        labelled(out, style, (None, "note"), &text)?;
    }
    for error in described.errors.iter().flatten() {
        labelled(out, style, (None, "error"), &fault(error))?;
    }
    super::excerpt(out, prepared)?;
    writeln!(out)
}

/// "C3: tetrahedral, marked, r, depends on C2 and C4".
fn element(labels: &Labels<'_>, entry: &Stereo) -> String {
    let mark = match entry.mark {
        "given" => "marked",
        "absent" => "unmarked",
        "idle" => "idle mark",
        other => other,
    };
    let mut text = format!(
        "{}: {}, {mark}",
        labels.element(&entry.atoms),
        entry.element
    );
    if let Some(label) = entry.label {
        text.push_str(&format!(", {label}"));
    }
    if let Some(group) = entry.group {
        text.push_str(&format!(", {}", super::group(group)));
    }
    let supports = entry.depends_on.iter().flatten();
    let supports: Vec<String> = supports.map(|atoms| labels.element(atoms)).collect();
    if let Some((last, rest)) = supports.split_last() {
        let and = if rest.is_empty() { "" } else { " and " };
        text.push_str(&format!(", depends on {}{and}{last}", rest.join(", ")));
    }
    text
}

fn facts(described: &Describe) -> Vec<(&'static str, String)> {
    let mut facts = Vec::new();
    let mut add = |label, text: Option<String>| facts.extend(text.map(|text| (label, text)));
    add("formula", described.formula.clone());
    if let Some(masses) = &described.masses {
        add(
            "mass",
            Some(format!(
                "{:.3} average, {:.5} monoisotopic",
                masses.average, masses.monoisotopic
            )),
        );
    }
    if let Some(unsaturation) = &described.unsaturation {
        // The two differ where atoms have more bonds than the textbook formula reckons with.
        let textbook = unsaturation
            .textbook
            .filter(|&value| value != unsaturation.exact as f64);
        let aside = textbook.map_or_else(String::new, |value| {
            format!(" (by the textbook formula {value})")
        });
        add(
            "rings + π bonds",
            Some(format!("{}{aside}", unsaturation.exact)),
        );
    }
    add("SMILES", described.smiles.clone());
    add("constitution key", described.constitution_key.clone());
    add("compound key", described.compound_key.clone());
    let open = "The record stands for more than one possible sample.";
    add(
        "open",
        (described.open == Some(true)).then(|| open.to_owned()),
    );
    facts
}
