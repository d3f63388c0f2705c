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

/// What comes from the inputs, and what becomes of it.
pub(crate) enum Event<T> {
    /// A record of a source.
    Record {
        /// The name of the source.
        source: Arc<str>,
        /// The record, or what was made of it.
        record: T,
    },
    /// An input cannot be opened, or has broken off.
    Trouble(String),
}

impl<T> Event<T> {
    /// Works on a record and lets trouble pass.
    pub(crate) fn map<U>(self, work: impl FnOnce(&str, T) -> U) -> Event<U> {
        match self {
            Self::Record { source, record } => Event::Record {
                record: work(&source, record),
                source,
            },
            Self::Trouble(message) => Event::Trouble(message),
        }
    }
}

impl Event<RawRecord> {
    /// Memory, roughly.
    pub(crate) fn bytes(&self) -> usize {
        match self {
            Self::Record { record, .. } => record.bytes(),
            Self::Trouble(message) => message.len(),
        }
    }
}

/// What was made of a record.
pub(crate) struct Made<T = Vec<u8>> {
    /// What is to be written.
    pub(crate) content: io::Result<T>,
    /// Whether all went well.
    pub(crate) fine: bool,
}

/// Records that go to a thread at once: passing these on costs a small part of one.
pub(crate) const CHUNK: NonZeroUsize = NonZeroUsize::MIN.saturating_add(63);

/// Works on each record of each input and hands what was made of it to `write`, in order, with the name
/// of the input. Inputs that cannot be opened or that break off are reported in their place, and the next one is read.
/// Ends with the count of records that failed.
pub(crate) fn each<W, T>(
    work: &W,
    inputs: Inputs<'_>,
    working: &Working,
    report: &mut Report,
    mut write: impl FnMut(&mut Report, &str, T) -> io::Result<()>,
) -> io::Result<()>
where
    T: Send,
    W: Work<Item = Event<RawRecord>, Output = Event<Made<T>>>,
{
    let plan = Plan {
        threads: working.threads(),
        chunk: CHUNK,
    };
    let (mut records, mut failed) = (0_u64, 0_u64);
    let items = inputs.watched(report.progress());
    in_order(work, plan, items, |event| match event {
        Event::Trouble(message) => report.trouble(message),
        Event::Record { source, record } => {
            records += 1;
            if !record.fine {
                failed += 1;
                report.count(Status::Trouble);
            }
            report.progress().done();
            write(report, &source, record.content?)
        }
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
    fn watched(mut self, progress: &Progress) -> impl Iterator<Item = Event<RawRecord>> + use<'a> {
        let progress = progress.clone();
        progress.expect(self.length);
        std::iter::from_fn(move || {
            let event = self.next()?;
            let open = self.open.as_ref();
            let taken = open.map_or(0, |(_, input)| input.bytes_taken());
            progress.reach(self.before + taken);
            Some(event)
        })
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

impl Iterator for Inputs<'_> {
    type Item = Event<RawRecord>;

    fn next(&mut self) -> Option<Self::Item> {
        loop {
            let Some((source, input)) = &mut self.open else {
                let argument = self.arguments.next()?;
                match self.open(argument) {
                    Ok(()) => continue,
                    Err(message) => return Some(Event::Trouble(message)),
                }
            };
            if let Some(record) = input.next() {
                let source = Arc::clone(source);
                return Some(Event::Record { source, record });
            }
            self.before += input.bytes_taken();
            let failure = input.failure().map(ToString::to_string);
            self.open = None;
            if let Some(message) = failure {
                return Some(Event::Trouble(message));
            }
        }
    }
}
