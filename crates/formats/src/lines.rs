//! Lines of a source, read one at a time and bounded.

use std::{
    io::{self, BufRead, Read},
    ops::Range,
};

/// Reads lines that end in LF or CRLF. Memory follows the bytes read, up to the limit for one line.
#[derive(Debug)]
pub(crate) struct Lines<R> {
    source: R,
    buffer: Vec<u8>,
    number: u32,
    limit: usize,
    /// Where in the buffer the line read last stands, its end left out.
    current: Range<usize>,
}

/// One line without its end.
#[derive(Debug, PartialEq, Eq)]
pub(crate) enum Line<'a> {
    /// A complete line.
    Whole(&'a [u8]),
    /// The start of a line that exceeds the limit; the rest of it has been passed over.
    TooLong(&'a [u8]),
}

/// UTF-8 signature that some editors put in front of a text.
const SIGNATURE: &[u8] = b"\xEF\xBB\xBF";

impl<R: BufRead> Lines<R> {
    /// Lines of at most `limit` bytes each, their ends not counted.
    pub(crate) fn new(source: R, limit: usize) -> Self {
        Self {
            source,
            buffer: Vec::new(),
            number: 0,
            limit,
            current: 0..0,
        }
    }

    /// The number of the line read last, from 1.
    pub(crate) fn number(&self) -> u32 {
        self.number
    }

    /// The line read last, or its start if it was too long; empty before the first.
    pub(crate) fn current(&self) -> &[u8] {
        &self.buffer[self.current.clone()]
    }

    /// The next line, or `None` at the end of the source.
    pub(crate) fn next(&mut self) -> io::Result<Option<Line<'_>>> {
        self.buffer.clear();
        self.current = 0..0;
        // Two more than the limit, so that CRLF after a line of just that length is still seen.
        let most = (self.limit as u64).saturating_add(2);
        self.source
            .by_ref()
            .take(most)
            .read_until(b'\n', &mut self.buffer)?;
        if self.buffer.is_empty() {
            return Ok(None);
        }
        self.number = self.number.saturating_add(1);
        let signed = self.number == 1 && self.buffer.starts_with(SIGNATURE);
        let start = if signed { SIGNATURE.len() } else { 0 };
        let ended = self.buffer.strip_suffix(b"\n");
        let line = ended.unwrap_or(&self.buffer);
        let end = line.strip_suffix(b"\r").unwrap_or(line).len();
        if end - start <= self.limit {
            self.current = start..end;
            return Ok(Some(Line::Whole(self.current())));
        }
        if ended.is_none() {
            self.source.skip_until(b'\n')?;
        }
        self.current = start..start + self.limit;
        Ok(Some(Line::TooLong(self.current())))
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn collect(text: &str, limit: usize) -> Vec<(u32, String, bool)> {
        let mut lines = Lines::new(text.as_bytes(), limit);
        let mut found = Vec::new();
        while let Some(line) = lines.next().unwrap() {
            let (text, whole) = match line {
                Line::Whole(text) => (text, true),
                Line::TooLong(text) => (text, false),
            };
            let text = String::from_utf8_lossy(text).into_owned();
            found.push((lines.number(), text, whole));
        }
        found
    }

    #[test]
    fn line_ends_are_taken_off() {
        let expected = ["a", "b", "", "c"].map(str::to_owned);
        for text in ["a\nb\n\nc\n", "a\r\nb\r\n\r\nc", "\u{feff}a\nb\n\nc"] {
            let found: Vec<String> = collect(text, 9)
                .into_iter()
                .map(|(_, text, _)| text)
                .collect();
            assert_eq!(found, expected, "{text:?}");
        }
    }

    #[test]
    fn a_line_beyond_the_limit_leaves_the_next_ones_alone() {
        let found = collect("abc\r\nabcd\nabcdefgh\nx", 3);
        let expected = [
            (1, "abc", true),
            (2, "abc", false),
            (3, "abc", false),
            (4, "x", true),
        ];
        let expected = expected.map(|(number, text, whole)| (number, text.to_owned(), whole));
        assert_eq!(found, expected);
    }
}
