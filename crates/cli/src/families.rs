//! `molkin families`.

mod rows;
mod summary;

use std::{ffi::OsString, io};

use molkin_formats::source::{RawRecord, ReadOptions};
use molkin_graph::Limits;
use molkin_relate::{
    families::{Families, Gathered, Gatherer, Reading},
    parallel::{Plan, Work},
    wire::Sources,
};

use crate::{
    args,
    forms::Forms,
    input,
    records::{self, CHUNK, Event, Inputs, Made},
    report::Report,
    run::Failure,
};

/// Groups the records of every input and writes one row for each, in order.
pub(crate) fn run(options: &args::Families, report: &mut Report) -> Result<(), Failure> {
    if !report.prepare_table(&options.table)? {
        return Ok(());
    }
    let forms = match Forms::new(&options.forms) {
        Ok(forms) => forms,
        Err(message) => return Ok(report.trouble(message)?),
    };
    let reading = input::read_options(&options.reading);
    let work = Read {
        reading: &reading,
        forms,
    };
    let Some(gathering) = Gathering::of(options, &work, report)? else {
        return Ok(());
    };
    let Gathering {
        gatherer,
        sources,
        held,
    } = gathering;
    let plan = Plan {
        threads: options.working.threads(),
        chunk: CHUNK,
    };
    let families = gatherer.group(&reading, Limits::default(), plan);
    let families: Families = families.map_err(Failure::Temporary)?;
    let counts = families.counts().clone();
    rows::Listing {
        options,
        reading: &reading,
        plan,
        sources: &sources,
        held,
    }
    .write(families, report)?;
    summary::write(options, &counts, held, report)
}

/// All records that have been read.
struct Gathering {
    gatherer: Gatherer,
    sources: Sources,
    /// How many of the first ones belong to files held, where there are such files.
    held: Option<u64>,
}

impl Gathering {
    /// Reads the files held and then the others; `None` if the arguments are wrong, which has been said.
    fn of(
        options: &args::Families,
        work: &Read<'_>,
        report: &mut Report,
    ) -> Result<Option<Self>, Failure> {
        let all = options.against.iter().chain(&options.inputs);
        if all.filter(|argument| input::is_standard(argument)).count() > 1 {
            report.trouble("standard input (-) can be read only once")?;
            return Ok(None);
        }
        let memory = options.memory.saturating_mul(1 << 20);
        let mut gathering = Self {
            gatherer: Gatherer::new(memory).map_err(Failure::Temporary)?,
            sources: Sources::default(),
            held: None,
        };
        if !options.against.is_empty() {
            gathering.read(&options.against, options, work, report)?;
            gathering.held = Some(gathering.gatherer.records());
        }
        gathering.read(&options.inputs, options, work, report)?;
        Ok(Some(gathering))
    }

    fn read(
        &mut self,
        inputs: &[OsString],
        options: &args::Families,
        work: &Read<'_>,
        report: &mut Report,
    ) -> Result<(), Failure> {
        let Self {
            gatherer, sources, ..
        } = self;
        let mut failure = None;
        let inputs = Inputs::new(inputs, work.reading);
        let working = &options.working;
        records::each(
            work,
            inputs,
            working,
            report,
            |_, source, read: Box<Gathered>| {
                if read.index() == 1 {
                    sources.begin(gatherer.records(), source);
                }
                gatherer.add(&read).map_err(|error| {
                    failure = Some(error);
                    io::Error::other("temporary files")
                })
            },
        )
        .map_err(|error| failure.map_or(Failure::Output(error), Failure::Temporary))
    }
}

/// From records to their keys.
struct Read<'r> {
    reading: &'r ReadOptions,
    forms: Forms,
}

impl Work for Read<'_> {
    type Item = Event<RawRecord>;
    type Output = Event<Made<Box<Gathered>>>;
    type Scratch = Reading;

    fn scratch(&self) -> Reading {
        let limits = Limits::default();
        let normaliser = self.forms.normaliser(limits);
        Reading::new(self.reading, limits).with_forms(normaliser, self.forms.overlook)
    }

    fn run(&self, reading: &mut Reading, event: Event<RawRecord>) -> Self::Output {
        event.map(|_, raw| {
            let gathered = reading.read(raw);
            Made {
                fine: gathered.is_fine(),
                content: Ok(Box::new(gathered)),
            }
        })
    }

    fn bytes(event: &Event<RawRecord>) -> usize {
        event.bytes()
    }
}
