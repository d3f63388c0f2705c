//! `molkin keys`.

use std::io;

use molkin_formats::source::{Parser, RawRecord, ReadOptions, RecordOutcome};
use molkin_graph::Limits;
use molkin_relate::{
    parallel::Work,
    wire::{KeyRow, KeyRows},
};

use crate::{
    args::{Keys, TableFormat},
    forms::Forms,
    input,
    output::table::{self, Lines, Table},
    records::{self, Event, Inputs, Made},
    report::Report,
};

/// Writes one row for every record of every input, in order.
pub(crate) fn run(options: &Keys, report: &mut Report) -> io::Result<()> {
    let format = options.table.format;
    if !report.prepare_table(&options.table)? {
        return Ok(());
    }
    let forms = match Forms::new(&options.forms) {
        Ok(forms) => forms,
        Err(message) => return report.trouble(message),
    };
    let mut table = Table::begin::<KeyRow>(format, report.out())?;
    let reading = input::read_options(&options.reading);
    let inputs = Inputs::new(&options.inputs, &reading);
    let work = Rows {
        reading: &reading,
        format,
        forms,
        further: !options.brief,
    };
    records::each(&work, inputs, &options.working, report, |report, _, row| {
        table.write(report.out(), &row)
    })?;
    table.finish(report.out())
}

/// From records to rows.
struct Rows<'r> {
    reading: &'r ReadOptions,
    format: TableFormat,
    forms: Forms,
    /// Whether there are keys of parents and tautomers.
    further: bool,
}

struct Scratch {
    parser: Parser,
    outcome: RecordOutcome,
    rows: KeyRows,
    lines: Lines,
}

impl Work for Rows<'_> {
    type Item = Event<RawRecord>;
    type Output = Event<Made<table::Made<KeyRow>>>;
    type Scratch = Scratch;

    fn scratch(&self) -> Scratch {
        let limits = Limits::default();
        Scratch {
            parser: Parser::new(self.reading),
            outcome: RecordOutcome::default(),
            lines: Lines::new(self.format),
            rows: KeyRows::new(limits).with_forms(
                self.forms.normaliser(limits),
                self.forms.overlook,
                self.further,
            ),
        }
    }

    fn run(&self, scratch: &mut Scratch, event: Event<RawRecord>) -> Self::Output {
        event.map(|source, raw| {
            scratch.parser.parse_into(raw, &mut scratch.outcome);
            let row = scratch.rows.row(source, &mut scratch.outcome);
            Made {
                fine: row.status == "ok",
                content: scratch.lines.make(row),
            }
        })
    }

    fn bytes(event: &Event<RawRecord>) -> usize {
        event.bytes()
    }
}
