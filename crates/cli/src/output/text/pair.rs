//! A compared pair.

use std::io::{self, Write};

use molkin_relate::wire::{Apart, Bonds, Branching, Group, Pair, Prepared, StereoEntry, Which};

use crate::output::style::{Role, Style};

use super::{
    atoms::{Labels, MOBILE},
    excerpt, fault, group as group_in_words,
    layout::{HARD_BLANK, labelled, sentence},
    place,
};

/// Writes a pair: the verdict, the two records, what differs, notes.
pub(crate) fn write(
    out: &mut impl Write,
    style: Style,
    pair: &Pair,
    sides: [&Prepared; 2],
) -> io::Result<()> {
    let verdict = pair.summary.as_deref().unwrap_or("No verdict.");
    writeln!(out, "{}", style.paint(Role::Verdict, verdict))?;
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
        Differences { pair, labels }.write(out, style)?;
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
    let place = place(&input.source, input.record, &input.name);
    labelled(out, style, label, &place)?;
    if let (Some(formula), Some(smiles)) = (&input.formula, &input.smiles) {
        labelled(
            out,
            style,
            (None, ""),
            &format!("{formula}{HARD_BLANK} {smiles}"),
        )?;
    }
    if let Some(form) = &input.form {
        labelled(
            out,
            style,
            (None, ""),
            &format!("compared as{HARD_BLANK} {form}"),
        )?;
    }
    if let Some(error) = prepared.error() {
        labelled(out, style, (None, "error"), &fault(error))?;
    }
    excerpt(out, prepared)
}

/// What differs between two structures.
struct Differences<'p> {
    pair: &'p Pair,
    labels: [Labels<'p>; 2],
}

impl Differences<'_> {
    fn write(&self, out: &mut impl Write, style: Style) -> io::Result<()> {
        // The verdict has the first already.
        let findings = self.pair.findings.iter().flatten().skip(1);
        for (at, finding) in findings.enumerate() {
            let label = if at == 0 { "besides" } else { "" };
            labelled(out, style, (None, label), &finding.text)?;
        }
        if let Some(bonds) = &self.pair.bonds {
            self.bonds(out, style, bonds)?;
        }
        self.hydrogens(out, style)?;
        for entry in self.pair.stereo.iter().flatten() {
            labelled(out, style, (None, "stereo"), &self.stereo(entry))?;
        }
        if let Some(branching) = &self.pair.branch_points {
            self.branching(out, style, 0, &branching.a)?;
            self.branching(out, style, 1, &branching.b)?;
        }
        self.map(out, style)
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
        list(out, style, (Some(Role::OfA), "only in A"), only_in_a)?;
        list(out, style, (Some(Role::OfB), "only in B"), only_in_b)?;
        let changed = bonds.order_changed.iter().map(|&[in_a, in_b]| {
            let [a, b] = &self.labels;
            format!("{} → {}", a.bond(in_a), b.bond(in_b))
        });
        let mut changed: Vec<String> = changed.collect();
        if changed.iter().any(|text| text.contains(MOBILE)) {
            let last = changed.pop().unwrap_or_default();
            changed.push(format!("{last} (: is a mobile bond)"));
        }
        list(out, style, (None, "order, A → B"), changed.into_iter())?;
        if !bonds.minimal && self.pair.relation == Some("constitutional") {
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
        list(out, style, (None, "hydrogens, A → B"), entries)
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

    fn branching(
        &self,
        out: &mut impl Write,
        style: Style,
        side: usize,
        branching: &Branching,
    ) -> io::Result<()> {
        let labels = &self.labels[side];
        let (role, branches, chain) = match side {
            0 => (Role::OfA, "branches in A", "chain in A"),
            _ => (Role::OfB, "branches in B", "chain in B"),
        };
        let points = branching.points.iter().map(|point| {
            let mut parts = Vec::new();
            if point.ring_bonds > 0 {
                parts.push(counted(point.ring_bonds, "ring bond"));
            }
            let sizes: Vec<String> = point.branches.iter().map(usize::to_string).collect();
            match sizes.len() {
                0 => {}
                1 => parts.push(format!("a branch of {}", sizes.join(""))),
                _ => parts.push(format!("branches of {}", sizes.join(", "))),
            }
            format!("{} ({})", labels.atom(point.atom), parts.join(", "))
        });
        list(out, style, (Some(role), branches), points)?;
        for atoms in &branching.chains {
            let text = format!("{} atoms: {}", atoms.len(), labels.chain(atoms));
            labelled(out, style, (Some(role), chain), &text)?;
        }
        Ok(())
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
        list(out, style, (None, "atoms, A → B"), entries)
    }
}

/// Writes a list on one labelled line, or nothing for an empty one.
fn list(
    out: &mut impl Write,
    style: Style,
    label: (Option<Role>, &str),
    items: impl Iterator<Item = String>,
) -> io::Result<()> {
    let items: Vec<String> = items.map(|item| item.replace(' ', HARD_BLANK)).collect();
    if items.is_empty() {
        return Ok(());
    }
    labelled(out, style, label, &items.join(", "))
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
