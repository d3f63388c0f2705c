//! Tables: comma-separated values, objects one to a line, or columns.

use std::io::{self, Write};

use molkin_relate::wire::{ParquetTable, TableRow, VERSION, Value};
use serde::ser::{SerializeMap as _, Serializer as _};

use super::csv;
use crate::args::TableFormat;

/// A row as far as a thread by itself can bring it.
#[derive(Debug)]
pub(crate) struct Made<R> {
    line: Vec<u8>,
    /// Columns need all rows together.
    row: Option<R>,
}

impl<R> Default for Made<R> {
    fn default() -> Self {
        let line = Vec::new();
        Self { line, row: None }
    }
}

impl<R: TableRow + Clone> Made<R> {
    /// Makes it of a row, in place of the one before.
    pub(crate) fn fill(&mut self, format: TableFormat, row: &R) -> io::Result<()> {
        self.line.clear();
        match format {
            TableFormat::Csv => write_line(&mut self.line, row),
            TableFormat::Jsonl => write_object(&mut self.line, row),
            TableFormat::Parquet => {
                self.row = Some(row.clone());
                Ok(())
            }
        }
    }
}

/// Fields go in one by one, as nothing but texts and numbers needs the generality of a serializer, which
/// took longer than reading a record does.
fn write_line(line: &mut Vec<u8>, row: &impl TableRow) -> io::Result<()> {
    for (at, value) in row.values().enumerate() {
        if at > 0 {
            line.push(b',');
        }
        match value {
            Value::Absent => {}
            Value::Text(text) => csv::write_field(line, text),
            Value::Word(word) => line.extend_from_slice(word.as_bytes()),
            Value::Number(number) => write!(line, "{number}")?,
            Value::Truth(truth) => write!(line, "{truth}")?,
        }
    }
    line.push(b'\n');
    Ok(())
}

/// A row as an object of those values that are there.
fn write_object<R: TableRow>(line: &mut Vec<u8>, row: &R) -> io::Result<()> {
    let mut serializer = serde_json::Serializer::new(&mut *line);
    let mut map = serializer.serialize_map(None)?;
    map.serialize_entry("version", &VERSION)?;
    for (column, value) in R::COLUMNS.iter().zip(row.values()) {
        match value {
            Value::Absent => {}
            Value::Text(text) | Value::Word(text) => map.serialize_entry(column.name, text)?,
            Value::Number(number) => map.serialize_entry(column.name, &number)?,
            Value::Truth(truth) => map.serialize_entry(column.name, &truth)?,
        }
    }
    map.end()?;
    line.push(b'\n');
    Ok(())
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
                let names = R::COLUMNS.iter().map(|column| column.name);
                writeln!(out, "{}", names.collect::<Vec<_>>().join(","))?;
                None
            }
        };
        Ok(Self { columns })
    }

    /// Writes a row.
    pub(crate) fn write<R: TableRow>(
        &mut self,
        out: &mut impl Write,
        made: &Made<R>,
    ) -> io::Result<()> {
        out.write_all(&made.line)?;
        if let (Some(columns), Some(row)) = (&mut self.columns, &made.row) {
            columns.write(row)?;
            out.write_all(&columns.take()?)?;
        }
        Ok(())
    }

    /// Ends the table.
    pub(crate) fn finish(self, out: &mut impl Write) -> io::Result<()> {
        match self.columns {
            Some(columns) => out.write_all(&columns.finish()?),
            None => Ok(()),
        }
    }
}

#[cfg(test)]
mod tests {
    use molkin_relate::wire::KeyRow;

    use super::*;

    /// The writer of the csv crate is the reference.
    #[test]
    fn lines_are_those_of_a_general_writer() {
        let texts = [
            "",
            "a",
            "a b",
            "a,b",
            "\"",
            "say \"no\", he",
            "two\nlines",
            "\r",
            "é;'\t#",
            "x\"y\"\"",
        ];
        let mut made = Made::default();
        for (at, first) in texts.into_iter().enumerate() {
            for second in texts {
                let row = KeyRow {
                    source: first.to_owned(),
                    record: (at * 1_000) as u64,
                    name: second.to_owned(),
                    status: "ok",
                    smiles: "C[C@H](O)/C=C/F".to_owned(),
                    message: first.to_owned(),
                    open: Some(at % 2 == 0),
                    ..KeyRow::default()
                };
                made.fill(TableFormat::Csv, &row).unwrap();
                let mut writer = ::csv::Writer::from_writer(Vec::new());
                let fields = row.values().map(|value| match value {
                    Value::Absent => String::new(),
                    Value::Text(text) | Value::Word(text) => text.to_owned(),
                    Value::Number(number) => number.to_string(),
                    Value::Truth(truth) => truth.to_string(),
                });
                writer.write_record(fields).unwrap();
                let expected = writer.into_inner().unwrap();
                assert_eq!(made.line, expected);
            }
        }
    }
}
