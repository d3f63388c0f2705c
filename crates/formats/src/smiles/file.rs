//! Files of SMILES: one record per line.

use std::{borrow::Cow, io::BufRead};

use super::{ReadOptions, Reader};
use crate::{
    ReadError, ReadErrorKind, Record, Span,
    lines::{Line, Lines},
    raw::RawText,
};

/// The records of a SMILES file, one for each line.
///
/// A line is a SMILES, white space and a name, and ends in LF, CR LF or CR. Every line counts as a
/// record, a blank or unreadable one too; only the empty text after the last line end does not.
/// Reading goes on after a record that fails, and ends after an error of the source itself
/// ([`ReadErrorKind::Io`]). Memory follows the longest line, up to the limit.
///
/// # Examples
/// ```
/// use molkin_formats::smiles::{ReadOptions, Records};
///
/// let file = "CCO ethanol\nC1CC broken\nO water\n";
/// let records: Vec<_> = Records::new(file.as_bytes(), ReadOptions::default()).collect();
/// assert_eq!(records.len(), 3);
/// assert_eq!(records[1].as_ref().unwrap_err().to_string(),
///     "2:2: ring label 1 is opened and never closed");
/// assert_eq!(records[2].as_ref().unwrap().name, "water");
/// ```
#[derive(Debug)]
pub struct Records<R> {
    lines: Lines<R>,
    reader: Reader,
    limit: usize,
    /// The line at hand.
    raw: RawText,
    ended: bool,
}

impl<R: BufRead> Records<R> {
    /// The records of a source.
    pub fn new(source: R, options: ReadOptions) -> Self {
        let limit = options.limits.line_bytes.min(options.limits.record_bytes);
        Self {
            lines: Lines::new(source, limit),
            reader: Reader::new(options),
            limit,
            raw: RawText::default(),
            ended: false,
        }
    }

    /// The number of the line read last, from 1; 0 before the first.
    pub fn line(&self) -> u32 {
        self.lines.number()
    }

    /// The name on the line read last, also where its SMILES could not be read.
    pub fn title(&self) -> String {
        title(&self.raw).into_owned()
    }

    /// Cuts the next line out of the source; false at its end.
    ///
    /// # Errors
    /// Those of the source itself, after which nothing more is read.
    pub(crate) fn cut(&mut self, raw: &mut RawText) -> Result<bool, ReadError> {
        let number = self.lines.number().saturating_add(1);
        raw.begin(number);
        if self.ended {
            return Ok(false);
        }
        let (line, whole) = match self.lines.next() {
            Ok(Some(Line::Whole(line))) => (line, true),
            Ok(Some(Line::TooLong(line))) => (line, false),
            Ok(None) => {
                self.ended = true;
                return Ok(false);
            }
            Err(error) => {
                self.ended = true;
                return Err(ReadError::of_source(&error, number));
            }
        };
        raw.text.extend_from_slice(line);
        if !whole {
            let kind = ReadErrorKind::LineTooLong { limit: self.limit };
            let span = Span::at_offset(number, self.limit, 0);
            raw.fault = Some(ReadError::new(kind, span, line));
        }
        Ok(true)
    }
}

/// The name on a line: what follows the first white space.
pub(crate) fn title(raw: &RawText) -> Cow<'_, str> {
    let line = &raw.text;
    let white = line.iter().position(u8::is_ascii_whitespace);
    let rest = white.map_or(&[][..], |at| &line[at..]);
    String::from_utf8_lossy(rest.trim_ascii())
}

/// Parses a line in place of a record that is done with, whose storage is reused.
pub(crate) fn parse_line(
    raw: &mut RawText,
    reader: &mut Reader,
    outcome: &mut Result<Record, ReadError>,
) {
    if let Some(fault) = raw.fault.take() {
        *outcome = Err(fault);
        return;
    }
    // A record is some hundred bytes: it stays where it is.
    if outcome.is_err() {
        *outcome = Ok(Record::default());
    }
    if let Ok(record) = outcome
        && let Err(error) = reader.read_into(&raw.text, raw.first_line, record)
    {
        *outcome = Err(error);
    }
}

impl<R: BufRead> Iterator for Records<R> {
    type Item = Result<Record, ReadError>;

    fn next(&mut self) -> Option<Self::Item> {
        let mut raw = std::mem::take(&mut self.raw);
        let cut = self.cut(&mut raw);
        let outcome = match cut {
            Ok(true) => {
                let mut outcome = Ok(Record::default());
                parse_line(&mut raw, &mut self.reader, &mut outcome);
                Some(outcome)
            }
            Ok(false) => None,
            Err(failure) => Some(Err(failure)),
        };
        self.raw = raw;
        outcome
    }
}
