//! One row.

use std::ops::Range;

use crate::Span;

/// The fields of a row.
#[derive(Debug, Default)]
pub(super) struct Row {
    pub(super) first_line: u32,
    /// How many fields there are, those that are not kept included.
    pub(super) count: usize,
    pub(super) fields: Vec<Field>,
    /// Their values, one after another.
    pub(super) values: Vec<u8>,
    /// The field that is being read.
    pub(super) open: Field,
}

/// A field of a row.
#[derive(Debug, Clone, Default)]
pub(super) struct Field {
    /// Where in the values of the row its own stands.
    pub(super) value: Range<usize>,
    /// Where in the lines it stands, quotes included.
    pub(super) raw: Range<usize>,
    /// The line on which it begins, and where that starts.
    pub(super) line: u32,
    pub(super) line_start: usize,
}

impl Row {
    pub(super) fn clear(&mut self) {
        self.count = 0;
        self.fields.clear();
        self.values.clear();
        self.open = Field::default();
    }

    /// The fields with their values.
    pub(super) fn fields(&self) -> impl Iterator<Item = (&Field, &[u8])> {
        let fields = self.fields.iter();
        fields.map(|field| (field, &self.values[field.value.clone()]))
    }

    /// The field in a column.
    pub(super) fn field(&self, column: usize) -> Option<(&Field, &[u8])> {
        let field = self.fields.get(column)?;
        Some((field, &self.values[field.value.clone()]))
    }

    /// Makes the places in the lines count from a place in them.
    pub(super) fn rebase(&mut self, start: usize) {
        for field in &mut self.fields {
            field.raw = field.raw.start - start..field.raw.end - start;
            field.line_start -= start;
        }
    }

    /// Bytes of memory set aside.
    #[cfg(test)]
    pub(super) fn capacity(&self) -> usize {
        self.values.capacity() + self.fields.capacity() * size_of::<Field>()
    }
}

/// The line on which a field begins, among the lines in which it stands.
pub(super) fn line_of<'l>(lines: &'l [u8], field: &Field) -> &'l [u8] {
    let line = &lines[field.line_start..];
    let end = line.iter().position(|&byte| byte == b'\n');
    &line[..end.unwrap_or(line.len())]
}

impl Field {
    /// An empty field at these places.
    pub(super) fn new(value: usize, raw: usize, line: u32, line_start: usize) -> Self {
        Self {
            value: value..value,
            raw: raw..raw,
            line,
            line_start,
        }
    }

    /// The place where the field begins.
    pub(super) fn start(&self) -> Span {
        Span::at_offset(self.line, self.raw.start - self.line_start, 0)
    }

    /// The whole field, quotes included.
    pub(super) fn span(&self) -> Span {
        Span::at_offset(self.line, self.raw.start - self.line_start, self.raw.len())
    }

    /// The place of a stretch of the value: exact where the file has the value as it is, or else the
    /// whole field.
    pub(super) fn part(&self, offset: usize, width: usize) -> Span {
        let quotes = self.raw.len() - self.value.len();
        let start = self.raw.start - self.line_start + offset;
        match quotes {
            0 => Span::at_offset(self.line, start, width),
            2 => Span::at_offset(self.line, start + 1, width),
            _ => self.span(),
        }
    }
}
