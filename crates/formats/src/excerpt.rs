//! The part of a source line that an error shows.

use crate::Span;

/// Bytes kept before the span, and from its start on, of a long line.
const BEFORE: usize = 40;
const AFTER: usize = 60;

/// A stretch of one source line and where it starts.
#[derive(Debug, Clone, PartialEq, Eq)]
pub(crate) struct Excerpt {
    text: Box<str>,
    /// For a shortened line: bytes left out in front.
    skipped: u32,
}

/// Stands for what is left out.
const ELLIPSIS: &str = "...";

impl Excerpt {
    /// The line, or the stretch of it round the span. Every byte that is not printable ASCII
    /// becomes one `?`, so that byte columns stay columns.
    pub(crate) fn new(line: &[u8], span: Span) -> Self {
        let line = line.trim_ascii_end();
        let column = (span.column as usize).saturating_sub(1).min(line.len());
        let long = line.len() > BEFORE + AFTER;
        let start = if long {
            column.saturating_sub(BEFORE)
        } else {
            0
        };
        let end = if long {
            line.len().min(column + AFTER)
        } else {
            line.len()
        };
        let mut text = String::with_capacity(end - start + 2 * ELLIPSIS.len());
        if start > 0 {
            text.push_str(ELLIPSIS);
        }
        text.extend(line[start..end].iter().map(|&byte| printable(byte)));
        if end < line.len() {
            text.push_str(ELLIPSIS);
        }
        Self {
            text: text.into(),
            skipped: u32::try_from(start).unwrap_or(u32::MAX),
        }
    }

    /// The text to show.
    pub(crate) fn text(&self) -> &str {
        &self.text
    }

    /// A line of blanks with `^` under the span and `-` under the related one.
    pub(crate) fn underline(&self, span: Span, related: Option<Span>) -> String {
        let mut marks = Vec::new();
        if let Some(related) = related {
            self.mark(&mut marks, related, b'-');
        }
        self.mark(&mut marks, span, b'^');
        String::from_utf8_lossy(&marks).into_owned()
    }

    fn mark(&self, marks: &mut Vec<u8>, span: Span, sign: u8) {
        let shift = if self.skipped > 0 { ELLIPSIS.len() } else { 0 };
        let Some(start) = (span.column as usize).checked_sub(1 + self.skipped as usize) else {
            return;
        };
        let start = start + shift;
        if start > self.text.len() {
            return;
        }
        let end = (start + (span.width as usize).max(1)).min(self.text.len().max(start + 1));
        if marks.len() < end {
            marks.resize(end, b' ');
        }
        marks[start..end].fill(sign);
    }
}

fn printable(byte: u8) -> char {
    match byte {
        b'\t' => ' ',
        b' '..=b'~' => char::from(byte),
        _ => '?',
    }
}
