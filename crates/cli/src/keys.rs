//! `molkin keys`.

use std::{
    io::{self, Write},
    num::NonZeroUsize,
};

use molkin_formats::source::{Parser, RawRecord, ReadOptions, RecordOutcome};
use molkin_graph::Limits;
use molkin_relate::{Axis, wire::KeyRows};

use crate::{
    args::{Keys, TableFormat},
    forms::Forms,
    input,
    output::csv,
    records::{self, Entries, Inputs},
    report::Report,
};

/// Writes one row for every record of every input, in order.
pub(crate) fn run(options: &Keys, report: &mut Report) -> io::Result<()> {
    let TableFormat::Csv = options.format;
    let forms = match Forms::new(&options.forms) {
        Ok(forms) => forms,
        Err(message) => return report.trouble(message),
    };
    if forms.overlook.contains(Axis::OpenStereo) {
        return report.trouble("open-stereo is about two records: keys cannot overlook it");
    }
    report.out().write_all(csv::HEADER)?;
    let reading = input::read_options(&options.reading);
    let inputs = Inputs::new(&options.inputs, &reading);
    let work = Rows {
        reading: &reading,
        forms,
        further: !options.brief,
    };
    records::each(&work, inputs, &options.working, report, |report, row| {
        report.out().write_all(row)
    })
}

/// From records to rows.
struct Rows<'r> {
    reading: &'r ReadOptions,
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
        text: &mut Vec<u8>,
    ) -> io::Result<bool> {
        scratch.parser.parse_into(record, &mut scratch.outcome);
        let row = scratch.rows.row(source, &scratch.outcome);
        csv::write_row(text, row)?;
        Ok(row.status == "ok")
    }
}
