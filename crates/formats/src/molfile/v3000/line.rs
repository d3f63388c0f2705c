//! Lines of a version 3000 table: the prefix taken off, continued lines joined.

use std::borrow::Cow;

use crate::{
    ReadErrorKind, Span,
    molfile::{
        block::{Fault, Line, Lines},
        field::Field,
        v3000::{section::Section, word::Words},
    },
};

/// What every line of a table starts with; a blank and the text follow.
const PREFIX: &[u8] = b"M  V30";

/// One line as the format means it, which may be several lines of the file.
#[derive(Debug)]
pub(super) struct Entry<'a> {
    text: Cow<'a, [u8]>,
    /// Where the text starts.
    first: Piece,
    /// Where each continuation starts, by offset.
    more: Vec<Piece>,
}

/// A stretch of an entry: where it starts in the entry, and where in the file.
#[derive(Debug, Clone, Copy)]
struct Piece {
    offset: usize,
    line: u32,
    indent: usize,
}

impl<'a> Entry<'a> {
    /// Takes the line that starts with `line`, and its continuations from `lines`. A `-` at the end
    /// of a line joins the next one without a blank.
    fn read(line: Line<'a>, lines: &mut Lines<'a>) -> Result<Self, Fault> {
        let (text, indent) = content(line)?;
        let first = Piece {
            offset: 0,
            line: line.number,
            indent,
        };
        let mut entry = Self {
            text: Cow::Borrowed(text),
            first,
            more: Vec::new(),
        };
        while let Some(kept) = entry.text.strip_suffix(b"-").map(<[u8]>::len) {
            let line = demand(lines, "a line that continues the one before")?;
            let (text, indent) = content(line)?;
            let joined = entry.text.to_mut();
            joined.truncate(kept);
            entry.more.push(Piece {
                offset: kept,
                line: line.number,
                indent,
            });
            joined.extend_from_slice(text);
        }
        Ok(entry)
    }

    pub(super) fn text(&self) -> &[u8] {
        &self.text
    }

    pub(super) fn words(&self) -> Words<'_> {
        Words::new(self)
    }

    /// The bytes between two offsets, for pointing at those of them that are on the first line.
    pub(super) fn field(&self, start: usize, end: usize) -> Field<'_> {
        let bytes = self.text.get(start..end).unwrap_or_default();
        Field::new(bytes, self.place(start, end))
    }

    /// The same for bytes that have no blanks round them.
    pub(super) fn word(&self, start: usize, end: usize) -> Field<'_> {
        let bytes = self.text.get(start..end).unwrap_or_default();
        Field::of_word(bytes, self.place(start, end))
    }

    fn place(&self, start: usize, end: usize) -> Span {
        // Most entries are one line.
        if self.more.is_empty() {
            let column = self.first.indent.saturating_add(start);
            return Span::at_offset(self.first.line, column, end.saturating_sub(start));
        }
        let next = self.more.partition_point(|piece| piece.offset <= start);
        let piece = match next.checked_sub(1) {
            Some(last) => self.more.get(last).copied().unwrap_or(self.first),
            None => self.first,
        };
        let stop = self
            .more
            .get(next)
            .map_or(end, |after| after.offset.min(end));
        let column = piece
            .indent
            .saturating_add(start.saturating_sub(piece.offset));
        let width = stop.saturating_sub(start);
        Span::at_offset(piece.line, column, width)
    }

    /// All of it, as far as the first line goes.
    pub(super) fn span(&self) -> Span {
        self.field(0, self.text.len()).span()
    }

    /// The section that the line begins or ends.
    pub(super) fn bracket(&self) -> Result<Option<Bracket<'_>>, Fault> {
        // Most lines are neither, and their first word is looked at by who reads them.
        if !matches!(
            self.text.trim_ascii_start().first(),
            Some(b'B' | b'E') | None
        ) {
            return Ok(None);
        }
        let mut words = self.words();
        let begins = match words.demand("the content of the line")?.value().text() {
            b"BEGIN" => true,
            b"END" => false,
            _ => return Ok(None),
        };
        let name = words.demand("the name of the section")?.value();
        Ok(Some(Bracket { begins, name }))
    }
}

/// `BEGIN` or `END` and the name of a section.
#[derive(Debug, Clone, Copy)]
pub(super) struct Bracket<'a> {
    pub(super) begins: bool,
    pub(super) name: Field<'a>,
}

/// The entries of a table.
#[derive(Debug)]
pub(super) struct Body<'l, 'a> {
    lines: &'l mut Lines<'a>,
}

impl<'l, 'a> Body<'l, 'a> {
    pub(super) fn new(lines: &'l mut Lines<'a>) -> Self {
        Self { lines }
    }

    /// The next entry, which the format demands.
    pub(super) fn demand(&mut self, expected: &'static str) -> Result<Entry<'a>, Fault> {
        let line = demand(self.lines, expected)?;
        Entry::read(line, self.lines)
    }

    /// The next entry of a section that holds no other ones; `None` at its end.
    pub(super) fn next_in(&mut self, section: Section) -> Result<Option<Entry<'a>>, Fault> {
        let entry = self.demand(section.end())?;
        match entry.bracket()? {
            None => {}
            Some(bracket) if !bracket.begins && bracket.name.text() == section.name() => {
                return Ok(None);
            }
            Some(_) => return Err(misplaced(&entry, section.end())),
        }
        Ok(Some(entry))
    }

    /// Passes over the rest of a section.
    pub(super) fn skip(&mut self, section: Section) -> Result<(), Fault> {
        loop {
            let entry = self.demand(section.end())?;
            let bracket = entry.bracket()?;
            if bracket.is_some_and(|b| !b.begins && b.name.text() == section.name()) {
                return Ok(());
            }
        }
    }

    /// The next entry after the table; a line without the prefix is returned as it is.
    pub(super) fn after_table(&mut self) -> Result<After<'a>, Fault> {
        let line = self.lines.demand("M  END")?;
        if line.is_end() {
            return Ok(After::End);
        }
        if line.text.starts_with(PREFIX) {
            return Entry::read(line, self.lines).map(After::Entry);
        }
        Ok(After::Other(line))
    }
}

/// What may stand behind a table.
#[derive(Debug)]
pub(super) enum After<'a> {
    /// `M  END`.
    End,
    /// A line of the format.
    Entry(Entry<'a>),
    /// Any other line.
    Other(Line<'a>),
}

/// The fault of a line that stands where `expected` should.
pub(super) fn misplaced(entry: &Entry<'_>, expected: &'static str) -> Fault {
    Fault::new(ReadErrorKind::Malformed { expected }, entry.span())
}

/// The next line, which has to be before `M  END`.
fn demand<'a>(lines: &mut Lines<'a>, expected: &'static str) -> Result<Line<'a>, Fault> {
    let line = lines.demand(expected)?;
    if line.is_end() {
        let kind = ReadErrorKind::UnexpectedEnd { expected };
        return Err(Fault::new(kind, line.span()));
    }
    Ok(line)
}

/// The text behind the prefix, and the bytes in front of it.
fn content(line: Line<'_>) -> Result<(&[u8], usize), Fault> {
    let text = line.text.trim_ascii_end();
    match text.strip_prefix(PREFIX) {
        Some([b' ', text @ ..]) => Ok((text, PREFIX.len() + 1)),
        Some([]) => Ok((&[], PREFIX.len())),
        _ => {
            let expected = "a line that starts with M  V30";
            Err(Fault::new(
                ReadErrorKind::Malformed { expected },
                line.span(),
            ))
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::molfile::block::Block;

    #[test]
    fn continued_lines_are_joined_and_keep_their_places() {
        let text = b"M  V30 1 C 0.-\r\nM  V30 5 0 -\nM  V30 0 CHG=1\nM  V30 2";
        let mut lines = Block::new(text, 7).lines();
        let mut body = Body::new(&mut lines);
        let entry = body.demand("an entry").unwrap();
        assert_eq!(entry.text(), b"1 C 0.5 0 0 CHG=1");
        // The coordinate starts on the first line and ends on the second.
        assert_eq!(entry.field(4, 7).text(), b"0.5");
        assert_eq!(entry.field(4, 7).span(), Span::new(7, 12, 2));
        assert_eq!(entry.field(6, 7).span(), Span::new(8, 8, 1));
        assert_eq!(entry.field(12, 17).span(), Span::new(9, 10, 5));
        assert_eq!(body.demand("an entry").unwrap().span(), Span::new(10, 8, 1));
        assert!(body.demand("an entry").is_err());
    }

    #[test]
    fn a_continuation_without_end_is_an_error() {
        for text in [
            "M  V30 1 -",
            "M  V30 1 -\nM  END",
            "M  V30 1 -\n1",
            "M  V301",
        ] {
            let mut lines = Block::new(text.as_bytes(), 1).lines();
            assert!(Body::new(&mut lines).demand("an entry").is_err(), "{text}");
        }
    }
}
