//! Whole tables as text, for those that read their columns themselves.

use super::{Delimiter, HeaderError, rows::MOST_COLUMNS, rows::Rows};
use crate::{ReadError, ReadErrorKind, Span, molfile::decode};
use molkin_graph::Limits;

/// A table as text: the titles of its columns, and its rows.
///
/// Rows and fields are those of [`super::Records`], but no column has a meaning yet. Text is UTF-8,
/// or Latin-1 where a field is not valid UTF-8, or UTF-16 with a byte order mark.
///
/// # Examples
/// ```
/// use molkin_formats::table::{Delimiter, Sheet};
/// use molkin_graph::Limits;
///
/// let text = b"id;well;m/z\nP-1;A1;136.02\nP-2;A2\n";
/// let sheet = Sheet::read(text, Delimiter::Detected, &Limits::default())?;
/// assert_eq!(sheet.column("Well"), Some(1));
/// assert_eq!(sheet.rows[0].fields, ["P-1", "A1", "136.02"]);
/// let fault = sheet.rows[1].fault.as_ref().ok_or("a fault")?;
/// assert_eq!((sheet.rows[1].line, fault.code()), (3, "field-count"));
/// # Ok::<(), Box<dyn std::error::Error>>(())
/// ```
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Sheet {
    /// The titles of the columns.
    pub titles: Vec<String>,
    /// The rows below the titles.
    pub rows: Vec<SheetRow>,
}

/// A row of a [`Sheet`].
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct SheetRow {
    /// The line on which it begins, from 1.
    pub line: u32,
    /// Its fields as far as they could be read, no more than there are titles.
    pub fields: Vec<String>,
    /// Why it cannot be read, or not as the titles have it.
    pub fault: Option<ReadError>,
}

impl Sheet {
    /// Reads a table.
    ///
    /// # Errors
    /// [`HeaderError`] if there is no header, or one that cannot be read. Rows that cannot be read are
    /// no errors: they say it themselves.
    pub fn read(text: &[u8], delimiter: Delimiter, limits: &Limits) -> Result<Self, HeaderError> {
        let transcoded = from_utf16(text);
        let text = transcoded.as_deref().unwrap_or(text);
        let of_source = |error: &std::io::Error| ReadError::of_source(error, 1);
        let mut rows = Rows::new(text, delimiter, *limits).map_err(|error| of_source(&error))?;
        if !rows.read().map_err(|error| of_source(&error))?? {
            return Err(HeaderError::Empty);
        }
        if rows.row().count > MOST_COLUMNS {
            let limit = MOST_COLUMNS;
            return Err(HeaderError::TooManyColumns { limit });
        }
        let titles = rows.row().fields();
        let titles: Vec<String> = titles
            .map(|(_, title)| decode(title.trim_ascii()))
            .collect();
        rows.keep(titles.len() + 1);
        let mut sheet = Self {
            titles,
            rows: Vec::new(),
        };
        while let Some(row) = sheet
            .next_row(&mut rows)
            .map_err(|error| of_source(&error))?
        {
            sheet.rows.push(row);
        }
        Ok(sheet)
    }

    fn next_row(&self, rows: &mut Rows<&[u8]>) -> std::io::Result<Option<SheetRow>> {
        match rows.read()? {
            Ok(false) => return Ok(None),
            Ok(true) => {}
            Err(fault) => {
                return Ok(Some(SheetRow {
                    line: fault.span().line,
                    fields: Vec::new(),
                    fault: Some(fault),
                }));
            }
        }
        let row = rows.row();
        let (found, expected) = (row.count, self.titles.len());
        let fault = (found != expected).then(|| {
            let kind = ReadErrorKind::FieldCount { found, expected };
            ReadError::new(kind, Span::new(row.first_line, 1, 0), b"")
        });
        let fields = row.fields().take(expected);
        Ok(Some(SheetRow {
            line: row.first_line,
            fields: fields.map(|(_, value)| decode(value)).collect(),
            fault,
        }))
    }

    /// The column of this title: as written, or else whatever its case.
    pub fn column(&self, title: &str) -> Option<usize> {
        super::header::find(&self.titles, title)
    }

    /// The column whose title comes first in a list of usual ones, each in lower case without blanks,
    /// `-` and `_`. Columns of which `taken` is true have their meaning already.
    pub fn usual_column(&self, usual: &[&str], taken: impl Fn(usize) -> bool) -> Option<usize> {
        super::header::usual(&self.titles, usual, taken)
    }
}

/// Text of two bytes a character, recognised by its byte order mark, as UTF-8.
fn from_utf16(text: &[u8]) -> Option<Vec<u8>> {
    let unit: fn([u8; 2]) -> u16 = match text.get(..2)? {
        [0xff, 0xfe] => u16::from_le_bytes,
        [0xfe, 0xff] => u16::from_be_bytes,
        _ => return None,
    };
    let (pairs, _) = text[2..].as_chunks::<2>();
    let units = pairs.iter().map(|pair| unit(*pair));
    let characters = char::decode_utf16(units);
    let text: String = characters
        .map(|character| character.unwrap_or(char::REPLACEMENT_CHARACTER))
        .collect();
    Some(text.into_bytes())
}

#[cfg(test)]
mod tests {
    use super::*;

    fn read(text: &[u8]) -> Sheet {
        Sheet::read(text, Delimiter::Detected, &Limits::default()).unwrap()
    }

    #[test]
    fn text_of_two_bytes_a_character() {
        let text = "id\twell\nÄ 1\t\"A\n1\"\n";
        for order in [u16::to_le_bytes, u16::to_be_bytes] {
            let units = std::iter::once(0xfeff).chain(text.encode_utf16());
            let sheet = read(&units.flat_map(order).collect::<Vec<u8>>());
            assert_eq!(sheet.titles, ["id", "well"]);
            assert_eq!(sheet.rows[0].fields, ["Ä 1", "A\n1"]);
        }
    }

    #[test]
    fn rows_that_do_not_fit_keep_what_was_read() {
        let sheet = read(b"id,well,x\nP,A1\nQ,A2,1,2\n\nR,\"A3\nS,A4,5\n");
        let rows: Vec<(u32, usize, bool)> = sheet
            .rows
            .iter()
            .map(|row| (row.line, row.fields.len(), row.fault.is_some()))
            .collect();
        assert_eq!(
            rows,
            [(2, 2, true), (3, 3, true), (5, 0, true), (6, 3, false)]
        );
    }

    #[test]
    fn columns_by_title() {
        let sheet = read(b"Sample ID,Well,well\n");
        assert_eq!(sheet.column("well"), Some(2));
        assert_eq!(sheet.column("WELL"), Some(1));
        assert_eq!(sheet.column("plate"), None);
        assert_eq!(
            sheet.usual_column(&["well", "sampleid"], |at| at == 1),
            Some(2)
        );
        assert_eq!(sheet.usual_column(&["sampleid"], |at| at == 0), None);
    }

    #[test]
    fn structures_in_fields_have_places_in_the_table() {
        let mut reader = crate::smiles::Reader::default();
        let options = crate::molfile::ReadOptions::default();
        let mut read = |text| super::super::parse_field(text, 7, &mut reader, &options);
        assert_eq!(read(" CCO ").unwrap().molecule.atom_count(), 3);
        let error = read("  CC(").unwrap_err();
        assert_eq!((error.span().line, error.span().column), (7, 5));
        let error = read("\n\n\n  1  0  0  0  0  0            999 V2000\n    0.0000    0.0000    0.0000 Xx  0  0\nM  END").unwrap_err();
        assert_eq!((error.span().line, error.code()), (11, "unknown-element"));
    }

    #[test]
    fn a_table_without_titles_is_an_error() {
        let limits = Limits::default();
        assert_eq!(
            Sheet::read(b"", Delimiter::Detected, &limits),
            Err(HeaderError::Empty)
        );
    }
}
