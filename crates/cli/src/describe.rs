//! `molkin describe`.

use std::io;

use molkin_formats::source::{Parser, RawRecord, ReadOptions};
use molkin_graph::{Limits, Orderer};
use molkin_relate::{
    parallel::Work,
    wire::{self, Prepared},
};

use crate::{
    args::{Describe, Format},
    input,
    output::{Style, json, text},
    records::{self, Event, Inputs, Made},
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
    records::each(&work, inputs, &options.working, report, |report, _, object: Vec<u8>| {
        objects.write(report.out(), &object)
    })?;
    objects.finish(report.out())
}

/// From records to descriptions.
struct Descriptions<'r> {
    reading: &'r ReadOptions,
    format: Format,
    style: Style,
}

impl Descriptions<'_> {
    fn text(&self, described: &wire::Describe, prepared: &Prepared) -> io::Result<Vec<u8>> {
        let mut text = Vec::new();
        match self.format {
            Format::Text => text::describe::write(&mut text, self.style, described, prepared)?,
            Format::Json | Format::Jsonl => serde_json::to_writer(&mut text, described)?,
        }
        Ok(text)
    }
}

impl Work for Descriptions<'_> {
    type Item = Event<RawRecord>;
    type Output = Event<Made>;
    type Scratch = (Parser, Orderer);

    fn scratch(&self) -> (Parser, Orderer) {
        let orderer = Orderer::new(Limits::default());
        (Parser::new(self.reading), orderer)
    }

    fn run(
        &self,
        (parser, orderer): &mut (Parser, Orderer),
        event: Event<RawRecord>,
    ) -> Event<Made> {
        event.map(|source, raw| {
            let prepared = Prepared::new(orderer, source, parser.parse(raw));
            let described = wire::describe(&prepared, &Limits::default());
            Made {
                content: self.text(&described, &prepared),
                fine: described.errors.is_none(),
            }
        })
    }

    fn bytes(event: &Event<RawRecord>) -> usize {
        event.bytes()
    }
}
