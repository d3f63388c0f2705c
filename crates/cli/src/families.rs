//! `molkin families`.

mod rows;
mod summary;

use std::{ffi::OsString, io, num::NonZeroUsize};

use molkin_formats::source::{RawRecord, ReadOptions};
use molkin_graph::Limits;
use molkin_relate::{
    Axis,
    families::{Families, Gathered, Gatherer, Reading},
    parallel::Plan,
    wire::Sources,
};

use crate::{
    args,
    forms::Forms,
    input,
    records::{self, Entries, Inputs},
    report::Report,
    run::Failure,
};

/// Records that go to a thread at once: passing these on costs a small part of one.
const CHUNK: NonZeroUsize = NonZeroUsize::MIN.saturating_add(255);

/// Groups the records of every input and writes one row for each, in order.
pub(crate) fn run(options: &args::Families, report: &mut Report) -> Result<(), Failure> {
    if !report.prepare_table(&options.table)? {
        return Ok(());
    }
    let forms = match Forms::new(&options.forms) {
        Ok(forms) => forms,
        Err(message) => return Ok(report.trouble(message)?),
    };
    if forms.overlook.contains(Axis::OpenStereo) {
        report.trouble("open-stereo is about two records: families cannot overlook it")?;
        return Ok(());
    }
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
        records::each(work, inputs, working, report, |_, read: &mut Arrived| {
            if read.gathered.index() == 1 {
                sources.begin(gatherer.records(), &read.source);
            }
            gatherer.add(&read.gathered).map_err(|error| {
                failure = Some(error);
                io::Error::other("temporary files")
            })
        })
        .map_err(|error| failure.map_or(Failure::Output(error), Failure::Temporary))
    }
}

/// From records to their keys.
struct Read<'r> {
    reading: &'r ReadOptions,
    forms: Forms,
}

/// A record, with the name of its source where it is the first one there.
#[derive(Default)]
struct Arrived {
    source: String,
    gathered: Gathered,
}

impl Entries for Read<'_> {
    type Made = Arrived;
    type Scratch = Reading;

    const CHUNK: NonZeroUsize = CHUNK;

    fn scratch(&self) -> Reading {
        let limits = Limits::default();
        let normaliser = self.forms.normaliser(limits);
        Reading::new(self.reading, limits).with_forms(normaliser, self.forms.overlook)
    }

    fn write(
        &self,
        reading: &mut Reading,
        source: &str,
        record: &mut RawRecord,
        made: &mut Arrived,
    ) -> io::Result<bool> {
        reading.read_into(record, &mut made.gathered);
        if made.gathered.index() == 1 {
            source.clone_into(&mut made.source);
        }
        Ok(made.gathered.is_fine())
    }
}
