//! `molkin compare`.

mod by_name;
mod by_place;
mod tally;
mod verdicts;

use std::{
    ffi::OsStr,
    io::{self, Write},
    num::NonZeroUsize,
};

use molkin_formats::source::ReadOptions;
use molkin_graph::Limits;
use molkin_relate::parallel::{Plan, in_order};

use crate::{
    args::{Compare, Format, PairBy},
    forms::Forms,
    input::{self, Input},
    output::{CAUTION, json::Objects, text::Extent},
    report::Report,
};

use self::{
    tally::Tally,
    verdicts::{Side, Verdicts},
};

/// Compares two inputs.
pub(crate) fn run(options: &Compare, report: &mut Report) -> io::Result<()> {
    if input::is_standard(&options.a) && input::is_standard(&options.b) {
        return report.trouble("standard input (-) can be only one of the two");
    }
    let forms = match Forms::new(&options.forms) {
        Ok(forms) => forms,
        Err(message) => return report.trouble(message),
    };
    let reading = input::read_options(&options.reading);
    let opened = (
        open(&options.a, &reading, report)?,
        open(&options.b, &reading, report)?,
    );
    let (Some(a), Some(b)) = opened else {
        return Ok(());
    };
    let lengths = [&options.a, &options.b].map(|argument| input::length(argument));
    report.progress().expect(lengths.into_iter().sum());
    let mut comparison = Comparison::new(options, &reading, forms, report);
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
    reading: &'r ReadOptions,
    forms: Forms,
    limits: Limits,
    brief: bool,
    extent: Extent,
    format: Format,
    threads: NonZeroUsize,
    objects: Objects,
    tally: Tally,
}

impl<'r> Comparison<'r> {
    fn new(
        options: &Compare,
        reading: &'r ReadOptions,
        forms: Forms,
        report: &'r mut Report,
    ) -> Self {
        let mut limits = Limits::default();
        if let Some(steps) = options.steps {
            limits.map_steps = steps;
        }
        Self {
            report,
            reading,
            forms,
            limits,
            brief: options.brief,
            extent: if options.full {
                Extent::Full
            } else {
                Extent::Screen
            },
            format: options.format,
            threads: options.working.threads(),
            objects: Objects::new(options.format),
            tally: Tally::default(),
        }
    }

    /// What turns pairs of records from these sources into results.
    fn verdicts<'v>(&self, sources: [&'v str; 2]) -> Verdicts<'v>
    where
        'r: 'v,
    {
        Verdicts {
            sources,
            reading: self.reading,
            forms: self.forms.clone(),
            limits: self.limits,
            brief: self.brief,
            extent: self.extent,
            format: self.format,
            style: self.report.style(),
        }
    }

    /// Compares pairs and writes the results, in order.
    fn pairs<'v>(
        &mut self,
        verdicts: &Verdicts<'v>,
        mut pairs: impl Iterator<Item = [Side<'v>; 2]>,
    ) -> io::Result<()> {
        // An atom map may take thousands of times as long as a pair without one.
        let chunk = if self.brief { 32 } else { 1 };
        let plan = Plan {
            threads: self.threads,
            chunk: NonZeroUsize::new(chunk).unwrap_or(NonZeroUsize::MIN),
        };
        let Self {
            report,
            objects,
            tally,
            ..
        } = self;
        let next = |pair: &mut Option<_>| {
            *pair = pairs.next();
            pair.is_some()
        };
        in_order(verdicts, plan, next, |verdict| {
            let Some(verdict) = verdict.take() else {
                return Ok(());
            };
            tally.add(verdict.outcome);
            report.count(verdict.outcome.status());
            report.progress().done();
            objects.write(report.out(), &verdict.text?)
        })
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
