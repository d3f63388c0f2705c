//! Why a record could not be read, and where.

use std::{fmt, io};

use thiserror::Error;

use crate::{Span, excerpt::Excerpt};

mod kind;

pub use kind::ReadErrorKind;

/// The first fault of a record.
///
/// Displays as `line:column: message`; [`ReadError::render`] adds the source line with carets under
/// the place.
///
/// # Examples
/// ```
/// let error = molkin_formats::smiles::parse("C1CC=O").unwrap_err();
/// assert_eq!(error.code(), "ring-not-closed");
/// assert_eq!(error.span().column, 2);
/// assert_eq!(error.to_string(), "1:2: ring label 1 is opened and never closed");
/// ```
#[derive(Debug, Clone, PartialEq, Eq, Error)]
#[error("{}:{}: {kind}", span.line, span.column)]
pub struct ReadError {
    kind: ReadErrorKind,
    span: Span,
    related: Option<Span>,
    excerpt: Excerpt,
}

impl ReadError {
    /// An error at a place. `line` is the source line that the span lies on; a long one is kept
    /// only round the span.
    pub fn new(kind: ReadErrorKind, span: Span, line: &[u8]) -> Self {
        Self {
            kind,
            span,
            related: None,
            excerpt: Excerpt::new(line, span),
        }
    }

    /// The same error with a second place that belongs to it, such as the first end of a ring bond.
    #[must_use]
    pub fn with_related(mut self, related: Span) -> Self {
        self.related = Some(related);
        self
    }

    /// A failure of the source itself at a line.
    pub(crate) fn of_source(error: &io::Error, line: u32) -> Self {
        let kind = ReadErrorKind::Io {
            kind: error.kind(),
            message: error.to_string().into(),
        };
        Self::new(kind, Span::new(line, 1, 0), b"")
    }

    /// The same error for a text that is part of another one: `moved` says where its places are
    /// there, and `line` gives the lines there by their numbers.
    #[cfg(feature = "table")]
    pub(crate) fn moved<'a>(
        self,
        moved: impl Fn(Span) -> Span,
        line: impl Fn(u32) -> &'a [u8],
    ) -> Self {
        let span = moved(self.span);
        Self {
            related: self.related.map(&moved),
            ..Self::new(self.kind, span, line(span.line))
        }
    }

    /// What is wrong.
    pub fn kind(&self) -> &ReadErrorKind {
        &self.kind
    }

    /// The stable name of the kind of fault, in kebab-case.
    pub fn code(&self) -> &'static str {
        self.kind.code()
    }

    /// What the format asks for at the place, where that can be said in a few words.
    pub fn expected(&self) -> Option<&'static str> {
        self.kind.expected()
    }

    /// Where it is wrong.
    pub fn span(&self) -> Span {
        self.span
    }

    /// A second place that belongs to the fault, if any.
    pub fn related(&self) -> Option<Span> {
        self.related
    }

    /// The source line, shortened round the span when it is long.
    pub fn excerpt(&self) -> &str {
        self.excerpt.text()
    }

    /// The message followed by the source line and carets under the place; dashes mark the related
    /// place where it is on the same stretch of that line.
    pub fn render(&self) -> impl fmt::Display + '_ {
        Rendered(self)
    }
}

struct Rendered<'a>(&'a ReadError);

impl fmt::Display for Rendered<'_> {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        let error = self.0;
        let number = error.span.line.to_string();
        let related = error
            .related
            .filter(|related| related.line == error.span.line);
        writeln!(f, "{error}")?;
        writeln!(f, "{number} | {}", error.excerpt.text())?;
        write!(
            f,
            "{:width$} | {}",
            "",
            error.excerpt.underline(error.span, related),
            width = number.len()
        )
    }
}
