//! `molkin keys`.

use std::{io, num::NonZeroUsize};

use molkin_formats::source::{Parser, RawRecord, ReadOptions, RecordOutcome};
use molkin_graph::Limits;
use molkin_relate::{
    Axis,
    wire::{KeyRow, KeyRows},
};

use crate::{
    args::{Keys, TableFormat},
    forms::Forms,
    input,
    output::table::{Made, Table},
    records::{self, Entries, Inputs},
    report::Report,
};

/// Writes one row for every record of every input, in order.
pub(crate) fn run(options: &Keys, report: &mut Report) -> io::Result<()> {
    let format = options.table.format;
    let forms = match Forms::new(&options.forms) {
        Ok(forms) => forms,
        Err(message) => return report.trouble(message),
    };
    if forms.overlook.contains(Axis::OpenStereo) {
        return report.trouble("open-stereo is about two records: keys cannot overlook it");
    }
    if !report.prepare_table(&options.table)? {
        return Ok(());
    }
    let mut table = Table::begin::<KeyRow>(format, report.out())?;
    let reading = input::read_options(&options.reading);
    let inputs = Inputs::new(&options.inputs, &reading);
    let work = Rows {
        reading: &reading,
        format,
        forms,
        further: !options.brief,
    };
    records::each(&work, inputs, &options.working, report, |report, row| {
        table.write(report.out(), row)
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
}

impl Entries for Rows<'_> {
    type Made = Made<KeyRow>;
    type Scratch = Scratch;

    const CHUNK: NonZeroUsize = NonZeroUsize::MIN.saturating_add(255);

    fn scratch(&self) -> Scratch {
        let limits = Limits::default();
        Scratch {
            parser: Parser::new(self.reading),
            outcome: RecordOutcome::default(),
            rows: KeyRows::new(limits).with_forms(
                self.forms.normaliser(limits),
                self.forms.overlook,
                self.further,
            ),
        }
    }

    fn write(
        &self,
        scratch: &mut Scratch,
        source: &str,
        record: &mut RawRecord,
        made: &mut Made<KeyRow>,
    ) -> io::Result<bool> {
        scratch.parser.parse_into(record, &mut scratch.outcome);
        let row = scratch.rows.row(source, &scratch.outcome);
        made.fill(self.format, row)?;
        Ok(row.status == "ok")
    }
}
