//! `molkin describe`.

use std::{io, num::NonZeroUsize};

use molkin_formats::source::{Parser, RawRecord, ReadOptions};
use molkin_graph::{Limits, Orderer};
use molkin_relate::wire::{self, Prepared};

use crate::{
    args::{Describe, Format},
    input,
    output::{Style, json, text},
    records::{self, Entries, Inputs},
    report::Report,
};

/// Describes every record of every input, in order.
pub(crate) fn run(options: &Describe, report: &mut Report) -> io::Result<()> {
    let mut objects = json::Objects::new(options.format);
    let reading = input::read_options(&options.reading);
    let inputs = Inputs::new(&options.inputs, &reading);
    let work = Descriptions {
        reading: &reading,
        format: options.format,
        style: report.style(),
    };
    records::each(&work, inputs, &options.working, report, |report, object| {
        objects.write(report.out(), object)
    })?;
    objects.finish(report.out())
}

/// From records to descriptions.
struct Descriptions<'r> {
    reading: &'r ReadOptions,
    format: Format,
    style: Style,
}

impl Entries for Descriptions<'_> {
    type Made = Vec<u8>;
    type Scratch = (Parser, Orderer);

    const CHUNK: NonZeroUsize = NonZeroUsize::MIN.saturating_add(63);

    fn scratch(&self) -> (Parser, Orderer) {
        let orderer = Orderer::new(Limits::default());
        (Parser::new(self.reading), orderer)
    }

    fn write(
        &self,
        (parser, orderer): &mut (Parser, Orderer),
        source: &str,
        record: &mut RawRecord,
        text: &mut Vec<u8>,
    ) -> io::Result<bool> {
        text.clear();
        let outcome = parser.parse(std::mem::take(record));
        let prepared = Prepared::new(orderer, source, outcome);
        let described = wire::describe(&prepared, &Limits::default());
        match self.format {
            Format::Text => text::describe::write(text, self.style, &described, &prepared)?,
            Format::Json | Format::Jsonl => serde_json::to_writer(text, &described)?,
        }
        Ok(described.errors.is_none())
    }
}
