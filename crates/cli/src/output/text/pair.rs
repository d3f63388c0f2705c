//! A compared pair.

use std::io::{self, Write};

use molkin_relate::wire::{
    Apart, Bonds, Finding, Group, Pair, Piece, Prepared, StereoEntry, Which,
};

use crate::output::style::{Role, Style};

use super::{
    atoms::{Labels, MOBILE},
    beside, excerpt, fault, group as group_in_words,
    layout::{Extent, LINE, fitting, labelled, paragraph, sentence},
    place,
};

/// Writes a pair: the verdict, the two records, what differs, notes.
pub(crate) fn write(
    out: &mut impl Write,
    style: Style,
    extent: Extent,
    pair: &Pair,
    sides: [&Prepared; 2],
) -> io::Result<()> {
    let verdict = pair.summary.as_deref().unwrap_or("No verdict.");
    paragraph(out, style, Role::Verdict, verdict)?;
    record(out, style, Which::A, sides[0])?;
    record(out, style, Which::B, sides[1])?;
    if let Some(axes) = &pair.overlooked {
        labelled(out, style, (None, "overlooked"), &axes.join(", "))?;
    }
    if let Apart::Axes(Some(axes)) = &pair.same_apart_from
        && !axes.is_empty()
        && pair.relation != Some("stereo")
    {
        labelled(out, style, (None, "same apart from"), &axes.join(", "))?;
    }
    for error in pair.errors.iter().flatten().filter(|e| e.input.is_none()) {
        labelled(out, style, (None, "error"), &fault(error))?;
    }
    if let [Some(a), Some(b)] = sides.map(Prepared::structure) {
        let labels = [Labels::new(a), Labels::new(b)];
        let differences = Differences {
            pair,
            labels,
            extent,
        };
        differences.write(out, style)?;
    }
    if let Some(analysis) = &pair.analysis {
        labelled(out, style, (None, "common practice"), analysis)?;
    }
    for note in pair.notes.iter().flatten() {
        let label = match note.input {
            Some(Which::A) => "note on A",
            Some(Which::B) => "note on B",
            None => "note",
        };
        let text = format!("{} [{}]", sentence(&note.text), note.code);
        labelled(out, style, (None, label), &text)?;
    }
    Ok(())
}

fn record(out: &mut impl Write, style: Style, which: Which, prepared: &Prepared) -> io::Result<()> {
    let label = match which {
        Which::A => (Some(Role::OfA), "A"),
        Which::B => (Some(Role::OfB), "B"),
    };
    let input = prepared.input();
    let mut place = place(&input.source, input.record, &input.name);
    if let Some(formula) = &input.formula {
        place.push_str(&format!(" ({formula})"));
    }
    labelled(out, style, label, &place)?;
    if let Some(smiles) = &input.smiles {
        labelled(out, style, (None, ""), &broken(smiles))?;
    }
    if let Some(form) = &input.form {
        labelled(out, style, (None, ""), &format!("compared as {form}"))?;
    }
    if let Some(error) = prepared.error() {
        labelled(out, style, (None, "error"), &fault(error))?;
    }
    excerpt(out, prepared)
}

/// A SMILES with blanks where it is too long for a line.
fn broken(smiles: &str) -> String {
    let characters: Vec<char> = smiles.chars().collect();
    let lines = characters
        .chunks(LINE)
        .map(|line| line.iter().collect::<String>());
    lines.collect::<Vec<_>>().join(" ")
}

/// What differs between two structures.
struct Differences<'p> {
    pair: &'p Pair,
    labels: [Labels<'p>; 2],
    extent: Extent,
}

impl Differences<'_> {
    fn write(&self, out: &mut impl Write, style: Style) -> io::Result<()> {
        self.findings(out, style)?;
        // Of what is unrelated, single differences say nothing.
        let bonds = self.pair.bonds.as_ref();
        let told = bonds.filter(|bonds| self.is_full() || bonds.unrelated != Some(true));
        if let Some(bonds) = told {
            self.left_over(out, style)?;
            self.bonds(out, style, bonds)?;
            // Where it is told what moved, hydrogens follow from it.
            if self.is_full() || self.pair.findings.is_none() {
                self.hydrogens(out, style)?;
            }
        }
        for entry in self.pair.stereo.iter().flatten() {
            labelled(out, style, (None, "stereo"), &self.stereo(entry))?;
        }
        beside::write(out, style, self.extent, self.pair, &self.labels)?;
        if told.is_some() {
            self.map(out, style)?;
        }
        Ok(())
    }

    fn is_full(&self) -> bool {
        self.extent == Extent::Full
    }

    fn list(
        &self,
        out: &mut impl Write,
        style: Style,
        label: (Option<Role>, &str),
        items: impl Iterator<Item = String>,
    ) -> io::Result<()> {
        let items: Vec<String> = items.collect();
        if items.is_empty() {
            return Ok(());
        }
        labelled(out, style, label, &fitting(items, self.extent, LINE))
    }

    /// What moved beside what the verdict says, and what is the same.
    fn findings(&self, out: &mut impl Write, style: Style) -> io::Result<()> {
        let Some([_, between @ .., last]) = self.pair.findings.as_deref() else {
            return Ok(());
        };
        // What became of functional groups is in their row.
        let told = |found: &&Finding| self.is_full() || found.kind != "group-changed";
        let between: Vec<&Finding> = between.iter().filter(told).collect();
        let shown = match self.extent {
            Extent::Full => between.len(),
            Extent::Screen => between.len().min(SCREEN_FINDINGS),
        };
        let mut lines: Vec<String> = between.iter().map(|found| found.text.clone()).collect();
        lines.truncate(shown);
        if shown < between.len() {
            let more = counted(between.len() - shown, "more difference");
            lines.push(format!("{more} (--full)."));
        }
        lines.push(last.text.clone());
        for (at, line) in lines.iter().enumerate() {
            let label = if at == 0 { "besides" } else { "" };
            labelled(out, style, (None, label), line)?;
        }
        Ok(())
    }

    /// "methyl (C7) on C6".
    fn left_over(&self, out: &mut impl Write, style: Style) -> io::Result<()> {
        let Some(left_over) = &self.pair.left_over else {
            return Ok(());
        };
        let sides = [
            (Role::OfA, "left over in A", &left_over.a.pieces),
            (Role::OfB, "left over in B", &left_over.b.pieces),
        ];
        for (labels, (role, label, pieces)) in self.labels.iter().zip(sides) {
            let pieces = pieces.iter().map(|piece| left_over_piece(labels, piece));
            self.list(out, style, (Some(role), label), pieces)?;
        }
        Ok(())
    }

    fn bonds(&self, out: &mut impl Write, style: Style, bonds: &Bonds) -> io::Result<()> {
        let only_in_a = bonds
            .only_in_a
            .iter()
            .map(|&bond| self.labels[0].bond(bond));
        let only_in_b = bonds
            .only_in_b
            .iter()
            .map(|&bond| self.labels[1].bond(bond));
        self.list(out, style, (Some(Role::OfA), "only in A"), only_in_a)?;
        self.list(out, style, (Some(Role::OfB), "only in B"), only_in_b)?;
        let changed = bonds.order_changed.iter().map(|&[in_a, in_b]| {
            let [a, b] = &self.labels;
            format!("{} → {}", a.bond(in_a), b.bond(in_b))
        });
        let mut changed: Vec<String> = changed.collect();
        if changed.iter().any(|text| text.contains(MOBILE)) {
            let last = changed.pop().unwrap_or_default();
            changed.push(format!("{last} (: is a mobile bond)"));
        }
        self.list(out, style, (None, "order, A → B"), changed.into_iter())?;
        if !bonds.minimal && self.pair.relation != Some("stereo") {
            let mut text =
                "The search ended at its budget; another map may change less.".to_owned();
            if bonds.at_least > 0 {
                let least = counted(bonds.at_least, "bond");
                text.push_str(&format!(" In any map at least {least} differ."));
            }
            text.push_str(" --steps N looks further.");
            labelled(out, style, (None, "not proved least"), &text)?;
        }
        Ok(())
    }

    fn hydrogens(&self, out: &mut impl Write, style: Style) -> io::Result<()> {
        let [a, b] = &self.labels;
        let entries = self.pair.hydrogens.iter().flatten().map(|entry| {
            let (count_a, count_b) = (entry.count_a, entry.count_b);
            let (atom_a, atom_b) = (a.atom(entry.a), b.atom(entry.b));
            format!(
                "{atom_a} {} → {atom_b} {}",
                hydrogens(count_a),
                hydrogens(count_b)
            )
        });
        self.list(out, style, (None, "hydrogens, A → B"), entries)
    }

    fn stereo(&self, entry: &StereoEntry) -> String {
        let [a, b] = &self.labels;
        let element = match entry.element {
            "tetrahedral" => "centre",
            "double-bond" => "double bond",
            other => other,
        };
        let labels = [entry.label_a, entry.label_b];
        let change = match (entry.change, entry.element) {
            ("inverted", "double-bond") => format!("opposite geometry{}", in_both(labels)),
            ("inverted", _) => format!("inverted{}", in_both(labels)),
            ("marked-only-in-a", _) => {
                let other = unmarked(entry, b, &entry.b);
                format!("{} in A, {other} in B", labels[0].unwrap_or("marked"))
            }
            ("marked-only-in-b", _) => {
                let other = unmarked(entry, a, &entry.a);
                format!("{other} in A, {} in B", labels[1].unwrap_or("marked"))
            }
            ("group-differs", _) => {
                let said = |group: Option<Group>| {
                    group.map_or_else(|| "absolute".to_owned(), group_in_words)
                };
                let (in_a, in_b) = (said(entry.group_a), said(entry.group_b));
                // Numbers are those of each record: the same one may hold other elements.
                let aside = if in_a == in_b { " of other extent" } else { "" };
                format!("{in_a} in A, {in_b}{aside} in B{}", in_both(labels))
            }
            (other, _) => format!("{other}{}", in_both(labels)),
        };
        let (in_a, in_b) = (a.element(&entry.a), b.element(&entry.b));
        format!("{in_a} → {in_b}: {element}, {change}")
    }

    fn map(&self, out: &mut impl Write, style: Style) -> io::Result<()> {
        let Some(map) = self.pair.atom_map.as_deref().filter(|map| !map.is_empty()) else {
            return Ok(());
        };
        if map.iter().all(|[a, b]| a == b) {
            return labelled(
                out,
                style,
                (None, "atoms, A → B"),
                "the same numbers in both",
            );
        }
        let [left, right] = &self.labels;
        let entries = map
            .iter()
            .map(|&[a, b]| format!("{} → {}", left.atom(a), right.atom(b)));
        if !self.is_full() && map.len() > SHORTEST_HIDDEN_MAP {
            let text = format!(
                "{} atoms are laid on each other (--full lists them)",
                map.len()
            );
            return labelled(out, style, (None, "atoms, A → B"), &text);
        }
        self.list(out, style, (None, "atoms, A → B"), entries)
    }
}

/// Findings that a screen has room for beside the one of the verdict.
const SCREEN_FINDINGS: usize = 2;

/// Maps of more atoms take more than two lines.
const SHORTEST_HIDDEN_MAP: usize = 14;

/// "methyl (C7) on C6", "Na+ (Na5)".
fn left_over_piece(labels: &Labels<'_>, piece: &Piece) -> String {
    let named = |atoms: &[u32]| {
        let names: Vec<String> = atoms.iter().map(|&atom| labels.atom(atom)).collect();
        names.join(", ")
    };
    let what = piece.name.unwrap_or(&piece.formula);
    let on = match piece.on.is_empty() {
        true => String::new(),
        false => format!(" on {}", named(&piece.on)),
    };
    format!("{what} ({}){on}", named(&piece.atoms))
}

/// ": R in A, S in B", or nothing without labels.
fn in_both(labels: [Option<&str>; 2]) -> String {
    match labels {
        [Some(a), Some(b)] if a == b => format!(": {a} in both"),
        [Some(a), Some(b)] => format!(": {a} in A, {b} in B"),
        [Some(a), None] => format!(": {a} in A"),
        [None, Some(b)] => format!(": {b} in B"),
        [None, None] => String::new(),
    }
}

/// What a side that does not mark an element makes of it. Arrangements about centres that are not
/// tetrahedral are known by their marks alone.
fn unmarked(entry: &StereoEntry, side: &Labels<'_>, atoms: &[u32]) -> &'static str {
    let may_lapse = matches!(entry.element, "tetrahedral" | "double-bond" | "axis");
    match may_lapse && !side.is_stereogenic(atoms) {
        true => "not stereogenic",
        false => "open",
    }
}

fn hydrogens(count: u8) -> String {
    match count {
        0 => "(no H)".to_owned(),
        n => format!("({n} H)"),
    }
}

fn counted(count: usize, noun: &str) -> String {
    match count {
        1 => format!("1 {noun}"),
        n => format!("{n} {noun}s"),
    }
}
