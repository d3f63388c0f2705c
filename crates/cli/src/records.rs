//! Every record of every input, one after another.

use std::{ffi::OsString, io, num::NonZeroUsize, sync::Arc};

use molkin_formats::source::{RawRecord, ReadOptions};
use molkin_relate::parallel::{Plan, Work, in_order};

use crate::{
    args::Working,
    exit::Status,
    input::{self, Input},
    progress::Progress,
    report::Report,
};

/// What is made of each record.
pub(crate) trait Entries: Sync {
    /// What is made: storage that is filled again and again.
    type Made: Default + Send;
    /// What a thread keeps from one record to the next.
    type Scratch;

    /// The most records that go to a thread at once: passing these on costs a small part of the work.
    const CHUNK: NonZeroUsize;

    /// Scratch for one thread.
    fn scratch(&self) -> Self::Scratch;

    /// Makes it of a record of `source`, in place of one before. Returns whether all went well.
    fn write(
        &self,
        scratch: &mut Self::Scratch,
        source: &str,
        record: &mut RawRecord,
        made: &mut Self::Made,
    ) -> io::Result<bool>;
}

/// The place of what comes from the inputs: a record of a source, or trouble.
#[derive(Default)]
struct Arrival {
    /// The name of the source.
    source: Arc<str>,
    record: RawRecord,
    /// An input cannot be opened, or has broken off: there is no record then.
    trouble: Option<String>,
}

/// The place of what becomes of an arrival.
#[derive(Default)]
struct Entry<M> {
    made: M,
    outcome: Outcome,
}

#[derive(Default)]
enum Outcome {
    /// All went well.
    #[default]
    Fine,
    /// The record failed, and what was made says so.
    Failed,
    /// Nothing was made.
    Unwritten(io::Error),
    /// There was no record.
    Trouble(String),
}

/// Entries, as work to be shared out.
struct Writing<'e, E>(&'e E);

impl<E: Entries> Work for Writing<'_, E> {
    type Item = Arrival;
    type Output = Entry<E::Made>;
    type Scratch = E::Scratch;

    fn scratch(&self) -> E::Scratch {
        self.0.scratch()
    }

    fn run(&self, scratch: &mut E::Scratch, arrival: &mut Arrival, entry: &mut Self::Output) {
        if let Some(message) = arrival.trouble.take() {
            entry.outcome = Outcome::Trouble(message);
            return;
        }
        let (source, record) = (&arrival.source, &mut arrival.record);
        entry.outcome = match self.0.write(scratch, source, record, &mut entry.made) {
            Ok(true) => Outcome::Fine,
            Ok(false) => Outcome::Failed,
            Err(error) => Outcome::Unwritten(error),
        };
    }

    fn bytes(arrival: &Arrival) -> usize {
        arrival.record.bytes()
    }
}

/// Hands what is made of each record of each input to `write`, in order. Inputs that cannot be opened
/// or that break off are reported in their place, and the next one is read. Ends with the count of
/// records that failed.
pub(crate) fn each<E: Entries>(
    entries: &E,
    inputs: Inputs<'_>,
    working: &Working,
    report: &mut Report,
    mut write: impl FnMut(&mut Report, &mut E::Made) -> io::Result<()>,
) -> io::Result<()> {
    let plan = Plan {
        threads: working.threads(),
        chunk: E::CHUNK,
    };
    let (mut records, mut failed) = (0_u64, 0_u64);
    let arrivals = inputs.watched(report.progress());
    in_order(&Writing(entries), plan, arrivals, |entry| {
        match std::mem::take(&mut entry.outcome) {
            Outcome::Trouble(message) => return report.trouble(message),
            Outcome::Unwritten(error) => return Err(error),
            Outcome::Fine => {}
            Outcome::Failed => {
                failed += 1;
                report.count(Status::Trouble);
            }
        }
        records += 1;
        report.progress().done();
        write(report, &mut entry.made)
    })?;
    if failed > 0 {
        report.trouble(format_args!("{failed} of {records} records failed"))?;
    }
    Ok(())
}

/// The records of all inputs, each opened when it is its turn.
pub(crate) struct Inputs<'a> {
    arguments: std::slice::Iter<'a, OsString>,
    options: &'a ReadOptions,
    length: Option<u64>,
    open: Option<(Arc<str>, Input)>,
    /// Bytes of the inputs that are done with.
    before: u64,
    standard_taken: bool,
}

impl<'a> Inputs<'a> {
    /// The inputs that arguments mean.
    pub(crate) fn new(arguments: &'a [OsString], options: &'a ReadOptions) -> Self {
        let lengths = arguments.iter().map(|argument| input::length(argument));
        Self {
            arguments: arguments.iter(),
            options,
            length: lengths.sum(),
            open: None,
            before: 0,
            standard_taken: false,
        }
    }

    /// Tells how far it has come.
    fn watched(mut self, progress: &Progress) -> impl FnMut(&mut Arrival) -> bool + use<'a> {
        let progress = progress.clone();
        progress.expect(self.length);
        move |arrival| {
            let arrived = self.next_into(arrival);
            let open = self.open.as_ref();
            let taken = open.map_or(0, |(_, input)| input.bytes_taken());
            progress.reach(self.before + taken);
            arrived
        }
    }

    fn open(&mut self, argument: &OsString) -> Result<(), String> {
        if input::is_standard(argument) && std::mem::replace(&mut self.standard_taken, true) {
            return Err("standard input (-) can be read only once".to_owned());
        }
        let input = Input::open(argument, self.options.clone());
        let input = input.map_err(|error| error.to_string())?;
        self.open = Some((input.name().into(), input));
        Ok(())
    }
}

impl Inputs<'_> {
    /// The next record or trouble, in place of what came before; false where there is no more.
    fn next_into(&mut self, arrival: &mut Arrival) -> bool {
        loop {
            let Some((source, input)) = &mut self.open else {
                let Some(argument) = self.arguments.next() else {
                    return false;
                };
                match self.open(argument) {
                    Ok(()) => continue,
                    Err(message) => {
                        arrival.trouble = Some(message);
                        return true;
                    }
                }
            };
            if input.next_into(&mut arrival.record) {
                // Threads that share a name wait for each other to count it.
                if !Arc::ptr_eq(&arrival.source, source) {
                    arrival.source = Arc::clone(source);
                }
                return true;
            }
            self.before += input.bytes_taken();
            let failure = input.failure().map(ToString::to_string);
            self.open = None;
            if failure.is_some() {
                arrival.trouble = failure;
                return true;
            }
        }
    }
}
