//! Faults and remarks while one record is read, by byte offset.

use crate::{Note, ReadErrorKind, Span};

/// A stretch of the text: first byte and number of bytes, from 0.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(super) struct Extent {
    pub(super) offset: usize,
    pub(super) width: usize,
}

impl Extent {
    pub(super) fn new(offset: usize, width: usize) -> Self {
        Self { offset, width }
    }

    pub(super) fn on(self, line: u32) -> Span {
        Span::at_offset(line, self.offset, self.width)
    }
}

/// Why reading stops. Becomes a [`crate::ReadError`] once, at the end.
#[derive(Debug)]
pub(super) struct Fault {
    pub(super) kind: ReadErrorKind,
    pub(super) extent: Extent,
    pub(super) related: Option<Extent>,
}

impl Fault {
    pub(super) fn new(kind: ReadErrorKind, offset: usize, width: usize) -> Self {
        Self {
            kind,
            extent: Extent::new(offset, width),
            related: None,
        }
    }

    pub(super) fn with_related(mut self, offset: usize, width: usize) -> Self {
        self.related = Some(Extent::new(offset, width));
        self
    }
}

/// Collects the notes of one record.
#[derive(Debug)]
pub(super) struct Remarks {
    strict: bool,
    line: u32,
    notes: Vec<Note>,
}

impl Remarks {
    /// `notes` is storage to be reused; it should be empty.
    pub(super) fn new(strict: bool, line: u32, notes: Vec<Note>) -> Self {
        Self {
            strict,
            line,
            notes,
        }
    }

    pub(super) fn into_notes(self) -> Vec<Note> {
        self.notes
    }

    /// Adds a note; in strict reading it is a fault.
    pub(super) fn note(
        &mut self,
        code: &'static str,
        atoms: &[u32],
        extent: Extent,
        text: impl Into<String>,
    ) -> Result<(), Fault> {
        let text = text.into();
        if self.strict {
            let text = text.into();
            let kind = ReadErrorKind::NotStandard { code, text };
            return Err(Fault {
                kind,
                extent,
                related: None,
            });
        }
        self.note_allowed(code, atoms, extent, text);
        Ok(())
    }

    /// Adds a note on something that the standard expressly calls valid; it stands in strict reading
    /// too.
    pub(super) fn note_allowed(
        &mut self,
        code: &'static str,
        atoms: &[u32],
        extent: Extent,
        text: impl Into<String>,
    ) {
        self.notes.push(Note {
            code,
            atoms: atoms.to_vec(),
            span: Some(extent.on(self.line)),
            text: text.into(),
        });
    }
}
