//! `molkin describe`.

use std::io;

use molkin_graph::{Limits, Orderer};
use molkin_relate::wire::{self, Prepared};

use crate::{
    args::{Describe, Format},
    input,
    output::{json::Objects, text},
    report::Report,
};

/// Describes every record of every input, in order.
pub(crate) fn run(options: &Describe, report: &mut Report) -> io::Result<()> {
    let limits = Limits::default();
    let mut orderer = Orderer::new(limits);
    let mut objects = Objects::new(options.format);
    let reading = input::read_options(&options.reading);
    let inputs = &options.inputs;
    input::each_record(inputs, &reading, report, |report, source, outcome| {
        let prepared = Prepared::new(&mut orderer, source, outcome);
        let described = wire::describe(&prepared, &limits);
        match options.format {
            Format::Text => {
                let style = report.style();
                text::describe::write(report.out(), style, &described, &prepared)?;
            }
            Format::Json | Format::Jsonl => objects.write(report.out(), &described)?,
        }
        Ok(described.errors.is_none())
    })?;
    objects.finish(report.out())
}
