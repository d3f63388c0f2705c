//! Lines of a source whose line ends may be mixed.

use std::io::{self, BufRead, ErrorKind};

/// Reads lines that end in LF, CR LF or CR. Memory follows the bytes read, up to the limit for one
/// line.
#[derive(Debug)]
pub(super) struct Lines<R> {
    source: R,
    buffer: Vec<u8>,
    number: u32,
    limit: usize,
    /// The last line ended in CR: an LF that comes next belongs to it. It isn't waited for, so that
    /// a line is handed out as soon as it is there.
    after_return: bool,
}

/// One line without its end.
#[derive(Debug, PartialEq, Eq)]
pub(super) enum Line<'a> {
    Whole(&'a [u8]),
    /// The start of a line that exceeds the limit; the rest of it has been passed over.
    TooLong(&'a [u8]),
}

/// UTF-8 signature that some editors put in front of a text.
const SIGNATURE: &[u8] = b"\xEF\xBB\xBF";

impl<R: BufRead> Lines<R> {
    pub(super) fn new(source: R, limit: usize) -> Self {
        Self {
            source,
            buffer: Vec::new(),
            number: 0,
            limit,
            after_return: false,
        }
    }

    /// The number of the line read last, from 1; 0 before the first.
    pub(super) fn number(&self) -> u32 {
        self.number
    }

    /// The next line, or `None` at the end of the source.
    pub(super) fn next(&mut self) -> io::Result<Option<Line<'_>>> {
        self.buffer.clear();
        let mut length = 0_usize;
        let ended = loop {
            let mut chunk = match self.source.fill_buf() {
                Err(error) if error.kind() == ErrorKind::Interrupted => continue,
                other => other?,
            };
            let mut taken = 0;
            if std::mem::take(&mut self.after_return) && chunk.first() == Some(&b'\n') {
                chunk = &chunk[1..];
                taken = 1;
            }
            if chunk.is_empty() && taken == 0 {
                break false;
            }
            let end = chunk.iter().position(|&byte| matches!(byte, b'\n' | b'\r'));
            let line = &chunk[..end.unwrap_or(chunk.len())];
            length = length.saturating_add(line.len());
            // One byte more than the limit is room for the signature check and shows the excess.
            let room = self
                .limit
                .saturating_add(SIGNATURE.len() + 1)
                .saturating_sub(self.buffer.len());
            self.buffer.extend_from_slice(&line[..line.len().min(room)]);
            taken += line.len();
            if let Some(end) = end {
                self.after_return = chunk[end] == b'\r';
                self.source.consume(taken + 1);
                break true;
            }
            self.source.consume(taken);
        };
        if length == 0 && !ended {
            return Ok(None);
        }
        self.number = self.number.saturating_add(1);
        let mut line = self.buffer.as_slice();
        if self.number == 1 && line.starts_with(SIGNATURE) {
            line = &line[SIGNATURE.len()..];
            length -= SIGNATURE.len();
        }
        Ok(Some(match line.get(..self.limit) {
            Some(start) if length > self.limit => Line::TooLong(start),
            _ => Line::Whole(line),
        }))
    }
}

#[cfg(test)]
mod tests {
    use std::io::BufReader;

    use rstest::rstest;

    use super::*;

    fn collect(text: &[u8], limit: usize, chunk: usize) -> Vec<(String, bool)> {
        let mut lines = Lines::new(BufReader::with_capacity(chunk, text), limit);
        let mut found = Vec::new();
        while let Some(line) = lines.next().unwrap() {
            let (text, whole) = match line {
                Line::Whole(text) => (text, true),
                Line::TooLong(text) => (text, false),
            };
            found.push((String::from_utf8_lossy(text).into_owned(), whole));
        }
        found
    }

    /// The same lines whatever the size of the pieces in which they come.
    #[rstest]
    #[case::lf(b"a\nb\n\nc\n")]
    #[case::crlf(b"a\r\nb\r\n\r\nc")]
    #[case::cr(b"a\rb\r\rc\r")]
    #[case::mixed(b"a\nb\r\n\rc")]
    #[case::signature(b"\xEF\xBB\xBFa\nb\n\r\nc")]
    fn line_ends_mix(#[case] text: &[u8], #[values(1, 2, 3, 64)] chunk: usize) {
        let lines: Vec<_> = collect(text, 9, chunk)
            .into_iter()
            .map(|(text, _)| text)
            .collect();
        assert_eq!(lines, ["a", "b", "", "c"]);
    }

    #[rstest]
    fn a_line_beyond_the_limit_leaves_the_next_ones_alone(#[values(1, 2, 64)] chunk: usize) {
        let lines = collect(b"abc\r\nabcd\rabcdefghijkl\nx", 3, chunk);
        let expected = [("abc", true), ("abc", false), ("abc", false), ("x", true)];
        assert_eq!(
            lines,
            expected.map(|(text, whole)| (text.to_owned(), whole))
        );
    }
}
