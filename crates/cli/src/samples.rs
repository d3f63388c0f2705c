//! `molkin samples`.

mod cells;
mod columns;
mod held;
mod read;

use std::{
    ffi::OsStr,
    fs,
    io::{self, Read, Write},
    num::NonZeroUsize,
    path::Path,
};

use molkin_formats::table::{Delimiter, Sheet};
use molkin_graph::Limits;
use molkin_relate::{
    parallel::{Plan, Work, in_order},
    samples::{Adduct, Hypothesis, Judge, Judgement, Sample, Tolerance, causes},
    wire::{self, HypothesisEntry, SampleEntry, SampleRow},
};

use crate::{
    args::{Samples, SamplesFormat},
    exit::Status,
    input,
    output::{csv, text},
    report::Report,
};

use self::{
    cells::Cells,
    columns::Columns,
    held::Held,
    read::{Reader, Scratch},
};

/// Samples that go to a thread at once.
const CHUNK: NonZeroUsize = NonZeroUsize::MIN.saturating_add(7);

/// Judges every sample of a tray and what may have happened on it.
pub(crate) fn run(options: &Samples, report: &mut Report) -> io::Result<()> {
    let Some((sheet, columns, reader)) = prepare(options, report)? else {
        return Ok(());
    };
    let work = Judging {
        reader,
        brief: options.brief,
    };
    let plan = Plan {
        threads: options.working.threads(),
        chunk: CHUNK,
    };
    let mut tray = Vec::with_capacity(sheet.rows.len());
    let rows = (1..).zip(sheet.rows);
    let mut rows = rows.map(|(record, row)| columns.cells(record, row));
    let fill = |cells: &mut Option<Cells>| {
        *cells = rows.next();
        cells.is_some()
    };
    in_order(&work, plan, fill, |judged| {
        report.progress().done();
        tray.extend(judged.take());
        io::Result::Ok(())
    })?;
    let hypotheses = causes(&tray);
    if tray
        .iter()
        .any(|(_, judgement)| judgement.verdict.is_flagged())
    {
        report.count(Status::Different);
    }
    let source = options.tray.to_string_lossy();
    write(&source, &tray, &hypotheses, options.format, report)
}

/// Reads the table and what goes with it; says what is wrong where that fails.
fn prepare(options: &Samples, report: &mut Report) -> io::Result<Option<(Sheet, Columns, Reader)>> {
    let outcome = open(options);
    match outcome {
        Ok(opened) => Ok(Some(opened)),
        Err(message) => report.trouble(message).map(|()| None),
    }
}

fn open(options: &Samples) -> Result<(Sheet, Columns, Reader), String> {
    let name = options.tray.to_string_lossy();
    let text = text_of(&options.tray).map_err(|error| format!("{name}: {error}"))?;
    let sheet = Sheet::read(&text, Delimiter::Detected, &Limits::default())
        .map_err(|error| format!("{name}: {error}"))?;
    let columns =
        Columns::find(&sheet, &options.columns).map_err(|error| format!("{name}: {error}"))?;
    let adduct: Option<Result<Adduct, _>> = options.ion.as_ref().map(|text| text.parse());
    let adduct = adduct
        .transpose()
        .map_err(|error| format!("--ion: {error}"))?;
    let tolerance: Tolerance = options
        .within
        .parse()
        .map_err(|error| format!("--within: {error}"))?;
    let reading = input::structure_options(&options.chemistry);
    let held = match &options.held {
        Some(file) => Some(Held::read(file, &reading)?),
        None => None,
    };
    let folder = Path::new(&options.tray).parent().unwrap_or(Path::new(""));
    let reader = Reader {
        source: name.into_owned(),
        folder: folder.to_owned(),
        held,
        reading,
        adduct,
        tolerance,
    };
    Ok((sheet, columns, reader))
}

fn text_of(tray: &OsStr) -> io::Result<Vec<u8>> {
    if input::is_standard(tray) {
        let mut text = Vec::new();
        io::stdin().lock().read_to_end(&mut text)?;
        return Ok(text);
    }
    fs::read(tray)
}

/// From rows to judged samples.
struct Judging {
    reader: Reader,
    brief: bool,
}

impl Work for Judging {
    type Item = Option<Cells>;
    type Output = Option<(Sample, Judgement)>;
    type Scratch = (Scratch, Judge);

    fn scratch(&self) -> (Scratch, Judge) {
        let judge = Judge::new(Limits::default(), self.brief);
        (Scratch::new(&self.reader), judge)
    }

    fn run(
        &self,
        (scratch, judge): &mut (Scratch, Judge),
        cells: &mut Option<Cells>,
        judged: &mut Option<(Sample, Judgement)>,
    ) {
        *judged = cells.take().map(|cells| {
            let sample = self.reader.sample(scratch, cells);
            let judgement = judge.judge(&sample);
            (sample, judgement)
        });
    }

    fn bytes(cells: &Option<Cells>) -> usize {
        cells.as_ref().map_or(0, Cells::bytes)
    }
}

fn write(
    source: &str,
    tray: &[(Sample, Judgement)],
    hypotheses: &[Hypothesis],
    format: SamplesFormat,
    report: &mut Report,
) -> io::Result<()> {
    let head = wire::Tray::new(source, tray, hypotheses.len());
    let mut of_sample: Vec<Vec<usize>> = vec![Vec::new(); tray.len()];
    for (number, hypothesis) in (1..).zip(hypotheses) {
        for &at in &hypothesis.explains {
            if let Some(numbers) = of_sample.get_mut(at) {
                numbers.push(number);
            }
        }
    }
    let samples = tray.iter().zip(of_sample);
    let samples: Vec<SampleEntry> = samples
        .map(|((sample, judgement), numbers)| SampleEntry::new(sample, judgement, numbers))
        .collect();
    let entries = hypotheses.iter().zip(1..);
    let entries: Vec<HypothesisEntry> = entries
        .map(|(hypothesis, number)| HypothesisEntry::new(tray, hypothesis, number))
        .collect();
    let style = report.style();
    let out = report.out();
    match format {
        SamplesFormat::Text => text::samples::write(out, style, &head, &samples, &entries),
        SamplesFormat::Csv => {
            writeln!(out, "# {}", head.caution)?;
            let rows = samples
                .iter()
                .map(|entry| SampleRow::new(entry, hypotheses));
            csv::write_rows(out, &csv::SAMPLE_COLUMNS, rows)
        }
        SamplesFormat::Jsonl => {
            line(out, &head)?;
            samples.iter().try_for_each(|entry| line(out, entry))?;
            entries.iter().try_for_each(|entry| line(out, entry))
        }
    }
}

fn line(out: &mut impl Write, object: &impl serde::Serialize) -> io::Result<()> {
    serde_json::to_writer(&mut *out, object)?;
    out.write_all(b"\n")
}
