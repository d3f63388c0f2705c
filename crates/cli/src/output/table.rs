//! Tables: comma-separated values (RFC 4180, but lines end in LF), objects one to a line, or columns.

use std::{
    fmt::Write as _,
    io::{self, Write},
};

use csv::{Terminator, Writer, WriterBuilder};
use molkin_relate::wire::{ParquetTable, TableRow, VERSION, Value};
use serde::ser::{SerializeMap as _, Serializer as _};

use crate::args::TableFormat;

/// A row as far as a thread by itself can bring it.
pub(crate) enum Made<R> {
    /// Its text.
    Line(Vec<u8>),
    /// The row: columns need all rows together.
    Row(R),
}

/// Makes lines of rows; one per thread.
pub(crate) struct Lines {
    format: TableFormat,
    /// Text of a number.
    number: String,
}

impl Lines {
    pub(crate) fn new(format: TableFormat) -> Self {
        let number = String::new();
        Self { format, number }
    }

    /// The line of a row, if lines are what is wanted.
    pub(crate) fn make<R: TableRow + Clone>(&mut self, row: &R) -> io::Result<Made<R>> {
        Ok(match self.format {
            TableFormat::Csv => Made::Line(self.values(row)?),
            TableFormat::Jsonl => Made::Line(object(row)?),
            TableFormat::Parquet => Made::Row(row.clone()),
        })
    }

    fn values(&mut self, row: &impl TableRow) -> io::Result<Vec<u8>> {
        let mut writer = csv_writer();
        for value in row.values() {
            match value {
                Value::Absent => writer.write_field("")?,
                Value::Text(text) => writer.write_field(text)?,
                Value::Number(number) => {
                    self.number.clear();
                    // Writing to a string does not fail.
                    let _ = write!(self.number, "{number}");
                    writer.write_field(&self.number)?;
                }
                Value::Truth(truth) => writer.write_field(if truth { "true" } else { "false" })?,
            }
        }
        end(writer)
    }
}

fn csv_writer() -> Writer<Vec<u8>> {
    WriterBuilder::new()
        .terminator(Terminator::Any(b'\n'))
        .buffer_capacity(1 << 10)
        .from_writer(Vec::new())
}

/// Ends the line of a writer.
fn end(mut writer: Writer<Vec<u8>>) -> io::Result<Vec<u8>> {
    writer.write_record(None::<&[u8]>)?;
    writer
        .into_inner()
        .map_err(|error| io::Error::new(error.error().kind(), error.to_string()))
}

/// A row as an object of those values that are there.
fn object<R: TableRow>(row: &R) -> io::Result<Vec<u8>> {
    let mut line = Vec::new();
    let mut serializer = serde_json::Serializer::new(&mut line);
    let mut map = serializer.serialize_map(None)?;
    map.serialize_entry("version", &VERSION)?;
    for (column, value) in R::COLUMNS.iter().zip(row.values()) {
        match value {
            Value::Absent => {}
            Value::Text(text) => map.serialize_entry(column.name, text)?,
            Value::Number(number) => map.serialize_entry(column.name, &number)?,
            Value::Truth(truth) => map.serialize_entry(column.name, &truth)?,
        }
    }
    map.end()?;
    line.push(b'\n');
    Ok(line)
}

/// Writes the rows of one table, in order.
pub(crate) struct Table {
    columns: Option<ParquetTable>,
}

impl Table {
    /// Begins a table of rows of this type.
    pub(crate) fn begin<R: TableRow>(
        format: TableFormat,
        out: &mut impl Write,
    ) -> io::Result<Self> {
        let columns = match format {
            TableFormat::Parquet => Some(ParquetTable::new::<R>()?),
            TableFormat::Jsonl => None,
            TableFormat::Csv => {
                let mut writer = csv_writer();
                for column in R::COLUMNS {
                    writer.write_field(column.name)?;
                }
                out.write_all(&end(writer)?)?;
                None
            }
        };
        Ok(Self { columns })
    }

    /// Writes a row.
    pub(crate) fn write<R: TableRow>(
        &mut self,
        out: &mut impl Write,
        row: &Made<R>,
    ) -> io::Result<()> {
        match (row, &mut self.columns) {
            (Made::Line(line), _) => out.write_all(line),
            (Made::Row(row), Some(columns)) => {
                columns.write(row)?;
                out.write_all(&columns.take()?)
            }
            // Rows are made for columns only.
            (Made::Row(_), None) => Ok(()),
        }
    }

    /// Ends the table.
    pub(crate) fn finish(self, out: &mut impl Write) -> io::Result<()> {
        match self.columns {
            Some(columns) => out.write_all(&columns.finish()?),
            None => Ok(()),
        }
    }
}
