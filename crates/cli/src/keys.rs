//! `molkin keys`.

use std::io;

use molkin_graph::{Limits, Orderer};
use molkin_relate::wire;

use crate::{
    args::{Keys, TableFormat},
    exit::Status,
    input,
    output::csv::Table,
    report::Report,
};

/// Writes one row for every record of every input, in order.
pub(crate) fn run(options: &Keys, report: &mut Report) -> io::Result<()> {
    let TableFormat::Csv = options.format;
    let mut table = Table::default();
    let mut orderer = Orderer::new(Limits::default());
    table.header(report.out())?;
    let reading = input::read_options(&options.reading);
    let inputs = &options.inputs;
    input::each_record(inputs, &reading, report, |report, source, outcome| {
        let row = wire::key_row(&mut orderer, source, outcome);
        if row.status != "ok" {
            report.count(Status::Trouble);
        }
        table.row(report.out(), &row)?;
        Ok(row.status == "ok")
    })
}
