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

/// The line with a number, at or behind the start of a field, among the lines in which it stands.
pub(super) fn line_at<'l>(lines: &'l [u8], field: &Field, line: u32) -> &'l [u8] {
    let mut lines = lines[field.line_start..].split(|&byte| byte == b'\n');
    let ahead = line.saturating_sub(field.line) as usize;
    lines.nth(ahead).unwrap_or_default()
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

    /// Where in the file a place of the value stands that is counted behind its first `blanks`
    /// bytes: exact where the file has the value as it is, or else the whole field.
    pub(super) fn place(&self, span: Span, blanks: usize) -> Span {
        let quote = match self.raw.len() - self.value.len() {
            0 => 0,
            2 => 1,
            _ => return self.span(),
        };
        let line = self.line.saturating_add(span.line.saturating_sub(1));
        if line > self.line {
            return Span { line, ..span };
        }
        let column = (span.column as usize).saturating_sub(1);
        let start = self.raw.start - self.line_start + quote + blanks;
        Span::at_offset(line, start + column, span.width as usize)
    }
}
