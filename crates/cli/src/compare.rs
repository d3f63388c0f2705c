//! `molkin compare`.

mod by_name;
mod by_place;
mod tally;

use std::{
    ffi::OsStr,
    io::{self, Write},
};

use molkin_formats::source::{ReadOptions, RecordOutcome};
use molkin_graph::{Limits, Orderer};
use molkin_relate::wire::{self, Pair, Prepared};

use crate::{
    args::{Compare, Format, PairBy},
    exit::Status,
    input::{self, Input},
    output::{CAUTION, json::Objects, text},
    report::Report,
};

use tally::Tally;

/// Compares two inputs.
pub(crate) fn run(options: &Compare, report: &mut Report) -> io::Result<()> {
    if input::is_standard(&options.a) && input::is_standard(&options.b) {
        return report.trouble("standard input (-) can be only one of the two");
    }
    let reading = input::read_options(&options.reading);
    let opened = (
        open(&options.a, &reading, report)?,
        open(&options.b, &reading, report)?,
    );
    let (Some(a), Some(b)) = opened else {
        return Ok(());
    };
    let mut comparison = Comparison::new(options, report);
    match options.by {
        None => by_place::compare(&mut comparison, a, b)?,
        Some(PairBy::Name) => by_name::compare(&mut comparison, a, b)?,
    }
    comparison.finish()
}

fn open(argument: &OsStr, reading: &ReadOptions, report: &mut Report) -> io::Result<Option<Input>> {
    match Input::open(argument, reading.clone()) {
        Ok(input) => Ok(Some(input)),
        Err(error) => report.trouble(error).map(|()| None),
    }
}

/// A comparison under way.
struct Comparison<'r> {
    report: &'r mut Report,
    orderer: Orderer,
    limits: Limits,
    brief: bool,
    format: Format,
    objects: Objects,
    tally: Tally,
}

impl<'r> Comparison<'r> {
    fn new(options: &Compare, report: &'r mut Report) -> Self {
        let mut limits = Limits::default();
        if let Some(steps) = options.steps {
            limits.map_steps = steps;
        }
        Self {
            report,
            orderer: Orderer::new(limits),
            limits,
            brief: options.brief,
            format: options.format,
            objects: Objects::new(options.format),
            tally: Tally::default(),
        }
    }

    /// Makes a record ready.
    fn prepare(&mut self, source: &str, outcome: RecordOutcome) -> Prepared {
        Prepared::new(&mut self.orderer, source, outcome)
    }

    /// Compares two records and writes the result.
    fn pair(&mut self, sides: [&Prepared; 2]) -> io::Result<()> {
        let pair = wire::compare(&mut self.orderer, &self.limits, sides, self.brief);
        self.tally.add(&pair);
        self.report.count(status(&pair));
        match self.format {
            Format::Text => {
                let style = self.report.style();
                let out = self.report.out();
                text::pair::write(out, style, &pair, sides)?;
                writeln!(out)
            }
            Format::Json | Format::Jsonl => self.objects.write(self.report.out(), &pair),
        }
    }

    /// Says why an input broke off, if it did; whether it did.
    fn broke_off(&mut self, input: &Input) -> io::Result<bool> {
        match input.failure() {
            Some(failure) => self.report.trouble(failure).map(|()| true),
            None => Ok(false),
        }
    }

    fn finish(self) -> io::Result<()> {
        let Self {
            report,
            format,
            objects,
            tally,
            ..
        } = self;
        objects.finish(report.out())?;
        if tally.pairs() == 0 {
            return Ok(());
        }
        if format == Format::Text {
            if tally.pairs() > 1 {
                writeln!(report.out(), "{tally}")?;
            }
            writeln!(report.out(), "{CAUTION}")?;
        } else {
            if tally.pairs() > 1 {
                report.say(&tally)?;
            }
            report.say(CAUTION)?;
        }
        Ok(())
    }
}

fn status(pair: &Pair) -> Status {
    match pair.relation {
        Some("identical") => Status::Same,
        Some(_) => Status::Different,
        None => Status::Trouble,
    }
}
