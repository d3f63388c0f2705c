//! Tables as columns (Apache Parquet), which engines for large tables read.

use std::{io, sync::Arc};

use parquet::{
    basic::{Compression, ConvertedType, Repetition, Type as Physical},
    data_type::{BoolType, ByteArray, ByteArrayType, DataType, Int64Type},
    errors::ParquetError,
    file::{
        properties::WriterProperties,
        writer::{SerializedColumnWriter, SerializedFileWriter},
    },
    schema::types::{Type, TypePtr},
};

use super::table::{ColumnKind, TableColumn, TableRow, Value};

/// Rows that are held in memory and written together.
const ROW_GROUP: usize = 1 << 16;

/// Writes rows. Every column is optional in the schema: an absent value is null. Texts are UTF-8, numbers
/// signed integers of 64 bits, since not every engine reads unsigned ones.
///
/// # Examples
/// ```
/// use molkin_relate::wire::{KeyRow, ParquetTable};
///
/// let mut table = ParquetTable::new::<KeyRow>()?;
/// table.write(&KeyRow::default())?;
/// let mut file = table.take()?;
/// file.extend(table.finish()?);
/// assert!(file.starts_with(b"PAR1") && file.ends_with(b"PAR1"));
/// # Ok::<(), std::io::Error>(())
/// ```
pub struct ParquetTable {
    writer: SerializedFileWriter<Vec<u8>>,
    columns: Vec<Cells>,
    rows: usize,
}

impl ParquetTable {
    /// A table with the columns of `R`.
    ///
    /// # Errors
    /// Those of the writer.
    pub fn new<R: TableRow>() -> io::Result<Self> {
        let properties = WriterProperties::builder()
            .set_compression(Compression::SNAPPY)
            .set_created_by(concat!("molkin ", env!("CARGO_PKG_VERSION")).to_owned());
        let schema = schema(R::COLUMNS).map_err(error)?;
        let writer = SerializedFileWriter::new(Vec::new(), schema, Arc::new(properties.build()));
        Ok(Self {
            writer: writer.map_err(error)?,
            columns: R::COLUMNS.iter().map(Cells::new).collect(),
            rows: 0,
        })
    }

    /// Adds a row of the type that the table was made for.
    ///
    /// # Errors
    /// Those of the writer.
    pub fn write(&mut self, row: &impl TableRow) -> io::Result<()> {
        for (cells, value) in self.columns.iter_mut().zip(row.values()) {
            cells.push(value);
        }
        self.rows += 1;
        match self.rows {
            ROW_GROUP => self.write_rows().map_err(error),
            _ => Ok(()),
        }
    }

    /// Bytes of the file that are ready since they were taken last.
    ///
    /// # Errors
    /// Those of the writer.
    pub fn take(&mut self) -> io::Result<Vec<u8>> {
        self.writer.flush()?;
        Ok(std::mem::take(self.writer.inner_mut()))
    }

    /// Ends the table; the last bytes of the file.
    ///
    /// # Errors
    /// Those of the writer.
    pub fn finish(mut self) -> io::Result<Vec<u8>> {
        self.write_rows().map_err(error)?;
        self.writer.into_inner().map_err(error)
    }

    fn write_rows(&mut self) -> Result<(), ParquetError> {
        if self.rows == 0 {
            return Ok(());
        }
        let mut group = self.writer.next_row_group()?;
        for cells in &mut self.columns {
            if let Some(mut column) = group.next_column()? {
                cells.write(&mut column)?;
                column.close()?;
            }
        }
        group.close()?;
        self.rows = 0;
        Ok(())
    }
}

fn schema(columns: &[TableColumn]) -> Result<TypePtr, ParquetError> {
    let fields = columns.iter().map(|column| {
        let (physical, converted) = match column.kind {
            ColumnKind::Text => (Physical::BYTE_ARRAY, ConvertedType::UTF8),
            ColumnKind::Number => (Physical::INT64, ConvertedType::NONE),
            ColumnKind::Truth => (Physical::BOOLEAN, ConvertedType::NONE),
        };
        let field = Type::primitive_type_builder(column.name, physical)
            .with_converted_type(converted)
            .with_repetition(Repetition::OPTIONAL);
        field.build().map(Arc::new)
    });
    let fields = fields.collect::<Result<_, _>>()?;
    let table = Type::group_type_builder("table").with_fields(fields);
    table.build().map(Arc::new)
}

/// What a column has in the rows at hand.
struct Cells {
    /// 1 where there is a value.
    levels: Vec<i16>,
    values: Values,
}

enum Values {
    Texts(Vec<ByteArray>),
    Numbers(Vec<i64>),
    Truths(Vec<bool>),
}

impl Cells {
    fn new(column: &TableColumn) -> Self {
        let values = match column.kind {
            ColumnKind::Text => Values::Texts(Vec::new()),
            ColumnKind::Number => Values::Numbers(Vec::new()),
            ColumnKind::Truth => Values::Truths(Vec::new()),
        };
        let levels = Vec::new();
        Self { levels, values }
    }

    fn push(&mut self, value: Value<'_>) {
        let there = match (&mut self.values, value) {
            (Values::Texts(texts), Value::Text(text) | Value::Word(text)) => {
                texts.push(ByteArray::from(text));
                true
            }
            (Values::Numbers(numbers), Value::Number(number)) => {
                numbers.push(i64::try_from(number).unwrap_or(i64::MAX));
                true
            }
            (Values::Truths(truths), Value::Truth(truth)) => {
                truths.push(truth);
                true
            }
            _ => false,
        };
        self.levels.push(i16::from(there));
    }

    /// Writes the values and forgets them.
    fn write(&mut self, column: &mut SerializedColumnWriter<'_>) -> Result<(), ParquetError> {
        let levels = &mut self.levels;
        match &mut self.values {
            Values::Texts(texts) => write::<ByteArrayType>(column, texts, levels),
            Values::Numbers(numbers) => write::<Int64Type>(column, numbers, levels),
            Values::Truths(truths) => write::<BoolType>(column, truths, levels),
        }
    }
}

fn write<T: DataType>(
    column: &mut SerializedColumnWriter<'_>,
    values: &mut Vec<T::T>,
    levels: &mut Vec<i16>,
) -> Result<(), ParquetError> {
    column
        .typed::<T>()
        .write_batch(values, Some(levels), None)?;
    values.clear();
    levels.clear();
    Ok(())
}

fn error(error: ParquetError) -> io::Error {
    io::Error::other(error)
}

#[cfg(test)]
mod tests {
    use parquet::{
        file::reader::{FileReader, SerializedFileReader},
        record::RowAccessor,
    };

    use super::*;

    struct Example(u64);

    impl TableRow for Example {
        const COLUMNS: &'static [TableColumn] = &[
            TableColumn::text("name"),
            TableColumn::number("number"),
            TableColumn::truth("even"),
        ];

        fn values(&self) -> impl Iterator<Item = Value<'_>> {
            let Self(number) = *self;
            let name = Value::text(if number % 3 == 0 { "" } else { "é" });
            let even = (!number.is_multiple_of(5)).then_some(number.is_multiple_of(2));
            [name, Value::Number(number), Value::from(even)].into_iter()
        }
    }

    /// Read back by the reader of the same crate; docs/scaling.md says what another engine makes of it.
    #[test]
    fn rows_are_read_back() {
        let mut table = ParquetTable::new::<Example>().unwrap();
        let mut bytes = Vec::new();
        let count = ROW_GROUP as u64 + 1_000;
        for number in 0..count {
            table.write(&Example(number)).unwrap();
            bytes.extend(table.take().unwrap());
        }
        bytes.extend(table.finish().unwrap());
        let reader = SerializedFileReader::new(bytes::Bytes::from(bytes)).unwrap();
        assert_eq!(reader.num_row_groups(), 2);
        let mut read = 0;
        for (number, row) in (0_i64..).zip(reader.get_row_iter(None).unwrap()) {
            let row = row.unwrap();
            assert_eq!(
                row.get_string(0).ok().map(String::as_str),
                (number % 3 != 0).then_some("é")
            );
            assert_eq!(row.get_long(1).unwrap(), number);
            assert_eq!(
                row.get_bool(2).ok(),
                (number % 5 != 0).then_some(number % 2 == 0)
            );
            read += 1;
        }
        assert_eq!(read, count);
    }

    #[test]
    fn a_table_without_rows_is_one() {
        let table = ParquetTable::new::<Example>().unwrap();
        let bytes = table.finish().unwrap();
        let reader = SerializedFileReader::new(bytes::Bytes::from(bytes)).unwrap();
        assert_eq!(reader.metadata().file_metadata().num_rows(), 0);
        assert_eq!(
            reader
                .metadata()
                .file_metadata()
                .schema_descr()
                .num_columns(),
            3
        );
    }
}
