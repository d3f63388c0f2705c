//! SDF: molfiles with data items, one record after another.
//!
//! ```text
//! record := molfile item* "$$$$"
//! item   := ">" … "<" name ">" …  value-line*  blank-line
//! ```
//! Records are read one at a time. A record that fails leaves those after it alone: reading goes on
//! behind the next line that is `$$$$`.

mod data;

use std::io::BufRead;

use crate::{
    ReadError, ReadErrorKind, Record, Span,
    lines::Lines,
    molfile::{self, Block, ReadOptions, decode},
    raw::RawText,
};

/// The records of an SDF source.
///
/// Lines end in LF, CR LF or CR, also mixed. An empty stretch between two `$$$$` lines is a record
/// too, and fails; blank lines after the last `$$$$` are not, and that `$$$$` may be missing. Lines
/// in errors and notes count from the start of the source. After an error of the source itself
/// ([`ReadErrorKind::Io`]) nothing more is read. Memory follows the longest record, up to the
/// limit.
///
/// # Examples
/// ```
/// use molkin_formats::{molfile::ReadOptions, sdf::Records};
///
/// let file = "water\n\n\n  1  0  0  0  0  0            999 V2000
///     0.0000    0.0000    0.0000 O   0  0
/// M  END
/// >  <batch>
/// 17
///
/// $$$$
/// broken
/// $$$$
/// ";
/// let mut records = Records::new(file.as_bytes(), ReadOptions::default());
/// let water = records.next().ok_or("a record")??;
/// assert_eq!(water.properties, [("batch".to_owned(), "17".to_owned())]);
/// let error = records.next().ok_or("a record")?.unwrap_err();
/// assert_eq!(error.to_string(),
///     "12:1: the record ends where the program line of a molfile is expected");
/// assert_eq!(records.title(), "broken");
/// assert!(records.next().is_none());
/// # Ok::<(), Box<dyn std::error::Error>>(())
/// ```
#[derive(Debug)]
pub struct Records<R> {
    lines: Lines<R>,
    options: ReadOptions,
    /// The record at hand.
    raw: RawText,
    ended: bool,
    /// Whether a source without any text is a record that fails.
    one_expected: bool,
}

/// Why the lines of a record stopped.
enum Stop {
    /// At `$$$$`.
    Delimiter,
    /// At the end of the source.
    End,
}

impl<R: BufRead> Records<R> {
    /// The records of a source.
    pub fn new(source: R, options: ReadOptions) -> Self {
        Self {
            lines: Lines::new(source, options.limits.line_bytes),
            options,
            raw: RawText::default(),
            ended: false,
            one_expected: false,
        }
    }

    /// The records of a molfile: at least one. Whatever follows a `$$$$` line is read too.
    pub(crate) fn of_molfile(source: R, options: ReadOptions) -> Self {
        Self {
            one_expected: true,
            ..Self::new(source, options)
        }
    }

    /// The name line of the record read last, whether it could be read or not; empty before the
    /// first.
    pub fn title(&self) -> String {
        title(&self.raw)
    }

    /// Cuts the next record out of the source; false at its end.
    ///
    /// # Errors
    /// Those of the source itself, after which nothing more is read.
    pub(crate) fn cut(&mut self, raw: &mut RawText) -> Result<bool, ReadError> {
        let before = self.lines.number();
        raw.begin(before.saturating_add(1));
        if self.ended {
            return Ok(false);
        }
        match self.collect(raw) {
            Ok(stop) => {
                self.ended = matches!(stop, Stop::End);
                let nothing = self.ended && raw.fault.is_none() && raw.text.trim_ascii().is_empty();
                Ok(!nothing || (before == 0 && self.one_expected))
            }
            Err(error) => {
                self.ended = true;
                let line = self.lines.number().saturating_add(1);
                Err(ReadError::of_source(&error, line))
            }
        }
    }

    /// Collects the lines of the next record; a fault if they exceed a limit.
    fn collect(&mut self, raw: &mut RawText) -> std::io::Result<Stop> {
        let limit = self.options.limits.record_bytes;
        loop {
            let start = raw.text.len();
            let Some(whole) = self.lines.append(&mut raw.text)? else {
                return Ok(Stop::End);
            };
            let line = &raw.text[start..];
            if whole && line.trim_ascii_end() == b"$$$$" {
                raw.text.truncate(start);
                return Ok(Stop::Delimiter);
            }
            if raw.fault.is_none() {
                if whole && raw.text.len() < limit {
                    raw.text.push(b'\n');
                    continue;
                }
                let kind = match whole {
                    true => ReadErrorKind::RecordTooLong { limit },
                    false => ReadErrorKind::LineTooLong {
                        limit: self.options.limits.line_bytes,
                    },
                };
                let offset = if whole { 0 } else { line.len() };
                let span = Span::at_offset(self.lines.number(), offset, 0);
                raw.fault = Some(ReadError::new(kind, span, line));
            }
            raw.text.truncate(start);
        }
    }
}

/// The name line of a record.
pub(crate) fn title(raw: &RawText) -> String {
    let line = Block::new(&raw.text, 1).lines().next();
    line.map_or_else(String::new, |line| decode(line.text.trim_ascii()))
}

/// Parses a record that has been cut out, with its `properties` or without.
pub(crate) fn parse(
    raw: &mut RawText,
    options: &ReadOptions,
    properties: bool,
) -> Result<Record, ReadError> {
    if let Some(fault) = raw.fault.take() {
        return Err(fault);
    }
    let block = Block::new(&raw.text, raw.first_line);
    let mut lines = block.lines();
    let mut record =
        molfile::read(&mut lines, options, raw.text.len()).map_err(|fault| block.error(fault))?;
    data::read(&mut lines, &mut record, properties);
    Ok(record)
}

impl<R: BufRead> Iterator for Records<R> {
    type Item = Result<Record, ReadError>;

    fn next(&mut self) -> Option<Self::Item> {
        let mut raw = std::mem::take(&mut self.raw);
        let outcome = match self.cut(&mut raw) {
            Ok(true) => Some(parse(&mut raw, &self.options, true)),
            Ok(false) => None,
            Err(failure) => Some(Err(failure)),
        };
        self.raw = raw;
        outcome
    }
}

#[cfg(test)]
mod tests;
