//! Lines of a source, read one at a time and bounded.

use std::io::{self, BufRead, ErrorKind};

use memchr::memchr2;

/// Reads lines that end in LF, CR LF or CR, also mixed, and takes off a UTF-8 signature in front.
/// Memory follows the bytes read, up to the limit for one line.
#[derive(Debug)]
pub(crate) struct Lines<R> {
    source: R,
    /// The line read last by [`Lines::next`].
    buffer: Vec<u8>,
    number: u32,
    limit: usize,
    /// The last line ended in CR: an LF that comes next belongs to it. It isn't waited for, so that
    /// a line is handed out as soon as it is there.
    after_return: bool,
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
            after_return: false,
        }
    }

    /// The number of the line read last, from 1; 0 before the first.
    pub(crate) fn number(&self) -> u32 {
        self.number
    }

    /// The line read last, or its start if it was too long; empty before the first.
    pub(crate) fn current(&self) -> &[u8] {
        &self.buffer
    }

    /// The next line, or `None` at the end of the source.
    pub(crate) fn next(&mut self) -> io::Result<Option<Line<'_>>> {
        let mut buffer = std::mem::take(&mut self.buffer);
        buffer.clear();
        let outcome = self.append(&mut buffer);
        self.buffer = buffer;
        Ok(outcome?.map(|whole| match whole {
            true => Line::Whole(self.current()),
            false => Line::TooLong(self.current()),
        }))
    }

    /// Appends the next line to a text, without its end and as far as the limit allows. Whether that is
    /// all of it; `None` at the end of the source.
    pub(crate) fn append(&mut self, text: &mut Vec<u8>) -> io::Result<Option<bool>> {
        let start = text.len();
        let Some(mut length) = self.fill(text)? else {
            return Ok(None);
        };
        self.number = self.number.saturating_add(1);
        if self.number == 1 && text[start..].starts_with(SIGNATURE) {
            text.drain(start..start + SIGNATURE.len());
            length -= SIGNATURE.len();
        }
        let whole = length <= self.limit;
        if !whole {
            text.truncate(start + self.limit);
        }
        Ok(Some(whole))
    }

    /// Reads through the next line end and appends what precedes it, as far as there is room. Its
    /// length, or `None` at the end of the source.
    fn fill(&mut self, text: &mut Vec<u8>) -> io::Result<Option<usize>> {
        // Room for the signature, so that a line of just the limit may follow it.
        let mut room = self.limit.saturating_add(SIGNATURE.len());
        let mut length = 0_usize;
        loop {
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
                return Ok((length > 0).then_some(length));
            }
            let end = memchr2(b'\n', b'\r', chunk);
            let line = &chunk[..end.unwrap_or(chunk.len())];
            length = length.saturating_add(line.len());
            let kept = line.len().min(room);
            text.extend_from_slice(&line[..kept]);
            room -= kept;
            taken += line.len();
            if let Some(end) = end {
                self.after_return = chunk[end] == b'\r';
                self.source.consume(taken + 1);
                return Ok(Some(length));
            }
            self.source.consume(taken);
        }
    }
}

#[cfg(test)]
mod tests {
    use std::io::{BufReader, Read};

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
    #[case::end_missing(b"a\r\nb\n\nc")]
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

    /// A signature is none of the line's bytes, and only the first line has one.
    #[rstest]
    fn a_signature_does_not_count(#[values(1, 2, 64)] chunk: usize) {
        let lines = collect(b"\xEF\xBB\xBFabc\n\xEF\xBB\xBF\n", 3, chunk);
        assert_eq!(lines[0], ("abc".to_owned(), true));
        assert_eq!(lines[1], ("\u{feff}".to_owned(), true));
        let lines = collect(b"\xEF\xBB\xBFabcd", 3, chunk);
        assert_eq!(lines, [("abc".to_owned(), false)]);
        assert_eq!(collect(b"\xEF\xBB\xBF", 3, chunk), [(String::new(), true)]);
    }

    #[test]
    fn the_current_line_and_its_number() {
        let mut lines = Lines::new(&b"a\rbc\r\n"[..], 9);
        assert_eq!((lines.number(), lines.current()), (0, &b""[..]));
        for (number, text) in [(1, b"a".as_slice()), (2, b"bc")] {
            assert!(lines.next().unwrap().is_some());
            assert_eq!((lines.number(), lines.current()), (number, text));
        }
        assert!(lines.next().unwrap().is_none());
        assert_eq!((lines.number(), lines.current()), (2, &b""[..]));
    }

    /// A gigabyte without a line end takes no more memory than the limit.
    #[test]
    fn memory_follows_the_limit() {
        let source = BufReader::new(std::io::repeat(b'(').take(1 << 30));
        let mut lines = Lines::new(source, 1 << 20);
        assert!(matches!(lines.next(), Ok(Some(Line::TooLong(_)))));
        assert!(lines.buffer.capacity() <= 4 << 20);
        assert!(matches!(lines.next(), Ok(None)));
    }
}
