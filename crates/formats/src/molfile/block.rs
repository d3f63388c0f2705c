//! The text of one record, taken line by line.

use memchr::memchr2;

use crate::{ReadError, ReadErrorKind, Span, molfile::field::Field};

/// What is wrong and where; [`Block::error`] adds the source line.
#[derive(Debug)]
pub(crate) struct Fault {
    kind: ReadErrorKind,
    span: Span,
    related: Option<Span>,
}

impl Fault {
    pub(crate) fn new(kind: ReadErrorKind, span: Span) -> Self {
        Self {
            kind,
            span,
            related: None,
        }
    }

    pub(crate) fn with_related(mut self, related: Span) -> Self {
        self.related = Some(related);
        self
    }
}

/// The bytes of one record and the number of its first line in the source.
#[derive(Debug, Clone, Copy)]
pub(crate) struct Block<'a> {
    text: &'a [u8],
    first_line: u32,
}

impl<'a> Block<'a> {
    pub(crate) fn new(text: &'a [u8], first_line: u32) -> Self {
        Self { text, first_line }
    }

    pub(crate) fn lines(&self) -> Lines<'a> {
        Lines {
            rest: self.text,
            next: self.first_line,
        }
    }

    /// The error of a fault. Walks the record once to find the line, which only failing records
    /// pay.
    pub(crate) fn error(&self, fault: Fault) -> ReadError {
        let line = self.lines().find(|line| line.number == fault.span.line);
        let error = ReadError::new(fault.kind, fault.span, line.map_or(&[], |line| line.text));
        match fault.related {
            Some(related) => error.with_related(related),
            None => error,
        }
    }
}

/// One line without its end.
#[derive(Debug, Clone, Copy)]
pub(crate) struct Line<'a> {
    pub(crate) number: u32,
    pub(crate) text: &'a [u8],
}

impl<'a> Line<'a> {
    /// The bytes from a column (from 1) on; what the line is too short for is blank.
    pub(crate) fn field(&self, column: usize, width: usize) -> Field<'a> {
        let length = self.text.len();
        let start = column.saturating_sub(1).min(length);
        let end = start.saturating_add(width).min(length);
        let bytes = self.text.get(start..end).unwrap_or_default();
        // A missing field is pointed at where the line ends.
        Field::new(bytes, Span::at_offset(self.number, start, bytes.len()))
    }

    /// The line without its last blanks, for pointing at all of it.
    pub(crate) fn span(&self) -> Span {
        Span::at_offset(self.number, 0, self.text.trim_ascii_end().len())
    }

    pub(crate) fn is_blank(&self) -> bool {
        self.text.trim_ascii().is_empty()
    }

    /// Whether this is the last line of a molfile.
    pub(crate) fn is_end(&self) -> bool {
        self.text.trim_ascii_end() == b"M  END"
    }
}

/// Splits at LF, CR LF and CR, mixed as they come.
#[derive(Debug, Clone)]
pub(crate) struct Lines<'a> {
    rest: &'a [u8],
    next: u32,
}

impl<'a> Lines<'a> {
    /// The start of the next line.
    pub(crate) fn place(&self) -> Span {
        Span::new(self.next, 1, 0)
    }

    /// A bound on the lines of at least `length` bytes that may follow, for making room.
    pub(crate) fn at_most(&self, length: usize) -> usize {
        self.rest.len() / length
    }

    /// The next line, which the format demands.
    pub(crate) fn demand(&mut self, expected: &'static str) -> Result<Line<'a>, Fault> {
        let end = self.place();
        self.next()
            .ok_or_else(|| Fault::new(ReadErrorKind::UnexpectedEnd { expected }, end))
    }

    /// The next line without taking it.
    pub(crate) fn peek(&self) -> Option<Line<'a>> {
        self.clone().next()
    }
}

impl<'a> Iterator for Lines<'a> {
    type Item = Line<'a>;

    fn next(&mut self) -> Option<Line<'a>> {
        if self.rest.is_empty() {
            return None;
        }
        let length = memchr2(b'\n', b'\r', self.rest);
        let (text, rest) = self.rest.split_at(length.unwrap_or(self.rest.len()));
        self.rest = rest
            .strip_prefix(b"\r\n")
            .or_else(|| rest.strip_prefix(b"\n"))
            .or_else(|| rest.strip_prefix(b"\r"))
            .unwrap_or_default();
        let number = self.next;
        self.next = self.next.saturating_add(1);
        Some(Line { number, text })
    }
}

#[cfg(test)]
mod tests {
    use rstest::rstest;

    use super::*;

    #[rstest]
    #[case::lf("a\nb\n", &["a", "b"])]
    #[case::crlf("a\r\n\r\nb", &["a", "", "b"])]
    #[case::cr("a\r\rb\r", &["a", "", "b"])]
    #[case::mixed("a\rb\nc\r\nd", &["a", "b", "c", "d"])]
    #[case::lf_then_cr("a\n\rb", &["a", "", "b"])]
    #[case::empty("", &[])]
    fn line_ends_mix(#[case] text: &str, #[case] expected: &[&str]) {
        let lines: Vec<_> = Block::new(text.as_bytes(), 5).lines().collect();
        let texts: Vec<_> = lines.iter().map(|line| line.text).collect();
        assert_eq!(
            texts,
            expected
                .iter()
                .map(|text| text.as_bytes())
                .collect::<Vec<_>>()
        );
        assert!(
            lines
                .iter()
                .zip(5..)
                .all(|(line, number)| line.number == number)
        );
    }

    #[test]
    fn fields_beyond_the_line_are_blank() {
        let line = Line {
            number: 3,
            text: b"  1  2",
        };
        assert_eq!(line.field(4, 3).text(), b"2");
        assert_eq!(line.field(4, 3).span(), Span::new(3, 4, 3));
        assert_eq!(line.field(7, 3).text(), b"");
        assert_eq!(line.field(7, 3).span(), Span::new(3, 7, 0));
    }
}
