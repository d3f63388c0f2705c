//! Files of SMILES: one record per line.

use std::io::BufRead;

use super::{ReadOptions, Reader};
use crate::{
    ReadError, ReadErrorKind, Record, Span,
    lines::{Line, Lines},
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
            ended: false,
        }
    }

    /// The number of the line read last, from 1; 0 before the first.
    pub fn line(&self) -> u32 {
        self.lines.number()
    }

    /// The name on the line read last, also where its SMILES could not be read.
    pub fn title(&self) -> String {
        let line = self.lines.current();
        let white = line.iter().position(u8::is_ascii_whitespace);
        let rest = white.map_or(&[][..], |at| &line[at..]);
        String::from_utf8_lossy(rest.trim_ascii()).into_owned()
    }
}

impl<R: BufRead> Iterator for Records<R> {
    type Item = Result<Record, ReadError>;

    fn next(&mut self) -> Option<Self::Item> {
        if self.ended {
            return None;
        }
        let number = self.lines.number().saturating_add(1);
        match self.lines.next() {
            Ok(Some(Line::Whole(text))) => Some(self.reader.read(text, number)),
            Ok(Some(Line::TooLong(text))) => {
                let kind = ReadErrorKind::LineTooLong { limit: self.limit };
                let span = Span::at_offset(number, self.limit, 0);
                Some(Err(ReadError::new(kind, span, text)))
            }
            Ok(None) => {
                self.ended = true;
                None
            }
            Err(error) => {
                self.ended = true;
                Some(Err(ReadError::of_source(&error, number)))
            }
        }
    }
}
