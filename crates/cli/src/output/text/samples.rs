//! A tray in words: what needs a person first.

use std::io::{self, Write};

use molkin_relate::{
    samples::Verdict,
    wire::{HypothesisEntry, SampleEntry, Tray},
};

use crate::output::style::{Role, Style};

use super::layout::{labelled, printable};

/// Writes the summary: the tray, what may have happened, the flagged samples by verdict, and which of the
/// others were not fully compared.
pub(crate) fn write(
    out: &mut impl Write,
    style: Style,
    tray: &Tray,
    samples: &[SampleEntry],
    hypotheses: &[HypothesisEntry],
) -> io::Result<()> {
    for sentence in tray.caution.split_inclusive(". ") {
        writeln!(out, "{}", sentence.trim_end())?;
    }
    writeln!(
        out,
        "In the sentences A is what the label says, B what came.\n"
    )?;
    let counts = format!("{} samples, {} flagged", tray.samples, tray.flagged);
    writeln!(out, "{}", style.paint(Role::Verdict, &counts))?;
    for count in &tray.verdicts {
        let verdict = Verdict::ALL
            .into_iter()
            .find(|v| v.as_str() == count.verdict);
        let words = verdict.map_or(count.verdict, Verdict::in_words);
        writeln!(out, "  {:>5}  {words}", count.samples)?;
    }
    if !hypotheses.is_empty() {
        writeln!(
            out,
            "\n{}",
            style.paint(Role::Verdict, "What may have happened")
        )?;
    }
    for entry in hypotheses {
        hypothesis(out, style, entry)?;
    }
    for verdict in Verdict::ALL {
        let own = samples
            .iter()
            .filter(|entry| entry.verdict == verdict.as_str());
        let own: Vec<&SampleEntry> = own.collect();
        if own.is_empty() || verdict == Verdict::Agrees {
            continue;
        }
        writeln!(out, "\n{}", style.paint(Role::Verdict, &heading(verdict)))?;
        for entry in own {
            sample(out, style, entry)?;
        }
    }
    Ok(())
}

fn heading(verdict: Verdict) -> String {
    let words = verdict.in_words();
    let mut letters = words.chars();
    let first = letters.next().map(|letter| letter.to_ascii_uppercase());
    first.into_iter().chain(letters).collect()
}

fn hypothesis(out: &mut impl Write, style: Style, entry: &HypothesisEntry) -> io::Result<()> {
    let label = format!("{} {}", entry.number, short(entry.cause));
    let mut text = format!("[{:.2}] {}", entry.score, printable(&entry.sentence));
    if !entry.alternatives.is_empty() {
        let others: Vec<String> = entry.alternatives.iter().map(usize::to_string).collect();
        text.push_str(&format!(" Or else: {}.", others.join(", ")));
    }
    labelled(out, style, (None, &label), &text)
}

/// A cause that fits the margin.
fn short(cause: &str) -> &str {
    match cause {
        "one-structure-several-labels" => "one structure",
        "one-label-several-structures" => "one label",
        other => other,
    }
}

fn sample(out: &mut impl Write, style: Style, entry: &SampleEntry) -> io::Result<()> {
    let mut place = match entry.id.as_str() {
        "" => format!("line {}", entry.line),
        id => printable(id),
    };
    if !entry.well.is_empty() {
        place.push_str(&format!(" {}", printable(&entry.well)));
    }
    let mut text = printable(&entry.sentence);
    if !entry.hypotheses.is_empty() {
        let numbers: Vec<String> = entry.hypotheses.iter().map(usize::to_string).collect();
        text.push_str(&format!(" See {} above.", numbers.join(", ")));
    }
    if !entry.remark.is_empty() {
        text.push_str(&format!(" Remark: {}", printable(&entry.remark)));
    }
    labelled(out, style, (None, &place), &text)
}
