//! Rows: fields, and where each stands in the file.

use std::io::{self, BufRead};

use csv_core::{ReadFieldResult, ReaderBuilder, Terminator};
use molkin_graph::Limits;

use super::{
    Delimiter, header,
    raw::RawRow,
    row::{self, Field, Row},
};
use crate::{
    ReadError, ReadErrorKind, Span,
    lines::{Line, Lines},
};

/// Reads one row after another. Lines that are empty are none.
///
/// A quote that is never closed would take the rest of the file for its field. Its row ends in an
/// error, and the lines after its first one are read again as rows; but not more bytes than have
/// been read since that was last done, so that the work stays linear. Memory follows the longest
/// row, up to the limit.
#[derive(Debug)]
pub(super) struct Rows<R> {
    lines: Lines<R>,
    limits: Limits,
    parser: csv_core::Reader,
    /// Lines of the source, each ended by LF: those of the row at hand and, after one that failed,
    /// those to be read again.
    held: Vec<u8>,
    /// Where in `held` the row at hand starts.
    start: usize,
    /// Where in `held` the next line starts.
    next: usize,
    /// The number of the line taken last.
    number: u32,
    /// Bytes that may be read again.
    credit: usize,
    row: Row,
    /// The most fields of a row that are kept.
    keep: usize,
}

/// The most columns of a table.
pub(super) const MOST_COLUMNS: usize = 1 << 14;

enum Taken {
    Line,
    TooLong,
    End,
}

impl<R: BufRead> Rows<R> {
    /// The rows of a source.
    pub(super) fn new(source: R, delimiter: Delimiter, limits: Limits) -> io::Result<Self> {
        let mut rows = Self {
            lines: Lines::new(source, limits.line_bytes.min(limits.record_bytes)),
            limits,
            parser: csv_core::Reader::new(),
            held: Vec::new(),
            start: 0,
            next: 0,
            number: 0,
            credit: 0,
            row: Row::default(),
            keep: MOST_COLUMNS,
        };
        let delimiter = match delimiter {
            Delimiter::Byte(byte) => byte,
            Delimiter::Detected => header::delimiter(rows.first_line()?),
        };
        rows.parser = ReaderBuilder::new()
            .delimiter(delimiter)
            .terminator(Terminator::Any(b'\n'))
            .build();
        Ok(rows)
    }

    /// The first line that is not empty, which is read again.
    fn first_line(&mut self) -> io::Result<&[u8]> {
        loop {
            self.begin();
            let before = self.number;
            let taken = self.take_line()?;
            let empty = self.held == b"\n";
            if matches!(taken, Taken::Line) && empty {
                continue;
            }
            if matches!(taken, Taken::Line) {
                self.next = self.start;
                self.number = before;
            }
            return Ok(&self.held);
        }
    }

    /// Keeps no more fields of a row than these; the others are counted. A row may be as long as a
    /// record, and a field takes many times the memory of its delimiter.
    pub(super) fn keep(&mut self, fields: usize) {
        self.keep = fields;
    }

    /// The number of the line read last, from 1; 0 before the first.
    pub(super) fn line(&self) -> u32 {
        self.number
    }

    /// Reads the next row; false at the end of the source. A row that fails leaves those after it
    /// alone.
    pub(super) fn read(&mut self) -> io::Result<Result<bool, ReadError>> {
        self.begin();
        loop {
            let line_start = self.next;
            match self.take_line()? {
                Taken::Line => {}
                Taken::TooLong => return Ok(Err(self.line_too_long())),
                Taken::End if line_start == self.start => return Ok(Ok(false)),
                Taken::End => {
                    let open = self.row.open.clone();
                    return Ok(Err(self.refuse(ReadErrorKind::QuoteNotClosed, &open)));
                }
            }
            if line_start == self.start {
                if self.next == line_start + 1 {
                    self.begin();
                    continue;
                }
                self.row.first_line = self.number;
            }
            if self.parse(line_start) {
                return Ok(match self.runaway() {
                    Some(field) => Err(self.refuse(ReadErrorKind::QuoteNotClosed, &field)),
                    None => Ok(true),
                });
            }
            let limit = self.limits.record_bytes;
            if self.next - self.start > limit {
                let open = self.row.open.clone();
                return Ok(Err(
                    self.refuse(ReadErrorKind::RecordTooLong { limit }, &open)
                ));
            }
        }
    }

    fn refuse(&mut self, kind: ReadErrorKind, field: &Field) -> ReadError {
        let error = ReadError::new(kind, field.start(), self.line_of(field));
        self.give_up();
        error
    }

    /// Forgets the row at hand.
    fn begin(&mut self) {
        if self.next == self.held.len() {
            self.held.clear();
            self.next = 0;
        } else if self.next > self.held.len() / 2 {
            // What moves is less than what goes.
            self.held.drain(..self.next);
            self.next = 0;
        }
        self.start = self.next;
        self.parser.reset();
        self.row.clear();
    }

    /// Takes the next line, one to be read again first.
    fn take_line(&mut self) -> io::Result<Taken> {
        let rest = &self.held[self.next..];
        if let Some(end) = rest.iter().position(|&byte| byte == b'\n') {
            self.next += end + 1;
            self.number = self.number.saturating_add(1);
            return Ok(Taken::Line);
        }
        let taken = match self.lines.next()? {
            None => return Ok(Taken::End),
            Some(Line::TooLong(_)) => Taken::TooLong,
            Some(Line::Whole(line)) => {
                self.held.extend_from_slice(line);
                self.held.push(b'\n');
                self.credit = self.credit.saturating_add(line.len() + 1);
                self.next = self.held.len();
                Taken::Line
            }
        };
        self.number = self.lines.number();
        Ok(taken)
    }

    /// Takes the fields off a line; whether the row ends with it.
    fn parse(&mut self, line_start: usize) -> bool {
        let row = &mut self.row;
        let mut at = line_start;
        let mut filled = row.open.value.end;
        if line_start == self.start {
            row.open = Field::new(0, line_start, self.number, line_start);
        }
        // A value is no longer than its field; one more so that there is always room.
        row.values.resize(filled + (self.next - at) + 1, 0);
        while at < self.next {
            let input = &self.held[at..self.next];
            let (result, read, written) = self.parser.read_field(input, &mut row.values[filled..]);
            at += read;
            filled += written;
            row.open.value.end = filled;
            let ReadFieldResult::Field { record_end } = result else {
                continue;
            };
            // The last byte is the delimiter or the line end.
            row.open.raw.end = at - 1;
            let next = Field::new(filled, at, self.number, line_start);
            let field = std::mem::replace(&mut row.open, next);
            row.count += 1;
            if row.fields.len() < self.keep {
                row.fields.push(field);
            }
            if record_end {
                return true;
            }
        }
        false
    }

    /// After a row that failed: reads its lines again, save the first, if that can be afforded.
    fn give_up(&mut self) {
        let lines = &self.held[self.start..self.next];
        let Some(first) = lines.iter().position(|&byte| byte == b'\n') else {
            return;
        };
        let again = lines.len() - (first + 1);
        if let Some(credit) = self.credit.checked_sub(again) {
            self.credit = credit;
            self.next = self.start + first + 1;
            self.number = self.row.first_line;
        }
    }

    fn line_too_long(&mut self) -> ReadError {
        let limit = self.limits.line_bytes.min(self.limits.record_bytes);
        let span = Span::at_offset(self.number, limit, 0);
        let error = ReadError::new(
            ReadErrorKind::LineTooLong { limit },
            span,
            self.lines.current(),
        );
        self.give_up();
        error
    }
}

impl<R> Rows<R> {
    /// The row read last.
    pub(super) fn row(&self) -> &Row {
        &self.row
    }

    /// Bytes of memory set aside.
    #[cfg(test)]
    pub(super) fn capacity(&self) -> usize {
        self.held.capacity() + self.row.capacity()
    }

    /// A field of several lines with more behind its closing quote than blanks. That quote was
    /// meant to open another field: the rows between would be lost in this one.
    fn runaway(&self) -> Option<Field> {
        let several = self.number > self.row.first_line;
        let mut fields = self.row.fields.iter().filter(|_| several);
        let found = fields.find(|field| {
            let raw = &self.held[field.raw.clone()];
            raw.contains(&b'\n') && !is_closed(raw)
        });
        found.cloned()
    }

    /// The line on which a field begins.
    fn line_of(&self, field: &Field) -> &[u8] {
        row::line_at(&self.held, field, field.line)
    }

    /// Exchanges the row read last, and its lines, for the storage of one that is done with.
    pub(super) fn hand_over(&mut self, raw: &mut RawRow) {
        raw.raw.begin(self.row.first_line);
        let lines = &self.held[self.start..self.next];
        raw.raw.text.extend_from_slice(lines);
        std::mem::swap(&mut self.row, &mut raw.row);
        raw.row.rebase(self.start);
    }
}

/// Whether a quoted field ends with its closing quote and blanks: whatever quotes are in it are
/// doubled.
fn is_closed(field: &[u8]) -> bool {
    let inner = field.trim_ascii_end().strip_prefix(b"\"");
    let Some(inner) = inner.and_then(|inner| inner.strip_suffix(b"\"")) else {
        return false;
    };
    let mut quotes = inner.split(|&byte| byte != b'"');
    quotes.all(|run| run.len() % 2 == 0)
}
