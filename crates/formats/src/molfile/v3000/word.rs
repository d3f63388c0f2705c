//! The words of an entry: values by position, then `KEY=value`.

use crate::{
    ReadErrorKind,
    molfile::{block::Fault, field::Field, v3000::line::Entry},
};

/// One word. A value in quotation marks, parentheses or square brackets may hold blanks.
#[derive(Debug, Clone, Copy)]
pub(super) struct Word<'e> {
    entry: &'e Entry<'e>,
    key: &'e [u8],
    value: Field<'e>,
    /// The offsets of the value.
    start: usize,
    end: usize,
}

impl<'e> Word<'e> {
    /// What stands before the `=`; empty without one.
    pub(super) fn key(&self) -> &'e [u8] {
        self.key
    }

    /// The value as it is written.
    pub(super) fn value(&self) -> Field<'e> {
        self.value
    }

    /// The numbers of a list `(n v1 … vn)`.
    pub(super) fn list(&self) -> Result<impl Iterator<Item = Field<'e>> + use<'e>, Fault> {
        let text = self.value().text();
        let malformed = || {
            let expected = "a list: a count and as many numbers in parentheses";
            self.value().fault(ReadErrorKind::Malformed { expected })
        };
        if !(text.starts_with(b"(") && text.ends_with(b")") && text.len() > 1) {
            return Err(malformed());
        }
        let (entry, start, end) = (self.entry, self.start + 1, self.end - 1);
        let mut members = Members { entry, start, end };
        let count = members.next().ok_or_else(malformed)?;
        let stated = count.stated("the length of the list", 0, i32::MAX)?;
        let held = members.clone().count();
        if usize::try_from(stated).is_ok_and(|stated| stated != held) {
            return Err(malformed());
        }
        Ok(members)
    }
}

/// What blanks separate between two offsets.
#[derive(Debug, Clone)]
struct Members<'e> {
    entry: &'e Entry<'e>,
    start: usize,
    end: usize,
}

impl<'e> Iterator for Members<'e> {
    type Item = Field<'e>;

    fn next(&mut self) -> Option<Field<'e>> {
        let text = self.entry.text().get(..self.end)?;
        let start = skip(text, self.start, is_blank);
        let end = skip(text, start, |byte| !is_blank(byte));
        self.start = end;
        (start < end).then(|| self.entry.field(start, end))
    }
}

/// The words of an entry in order.
#[derive(Debug)]
pub(super) struct Words<'e> {
    entry: &'e Entry<'e>,
    text: &'e [u8],
    at: usize,
}

impl<'e> Words<'e> {
    pub(super) fn new(entry: &'e Entry<'e>) -> Self {
        let text = entry.text();
        Self { entry, text, at: 0 }
    }

    /// The next value by position, which has to be there.
    pub(super) fn demand(&mut self, what: &'static str) -> Result<Word<'e>, Fault> {
        let place = match self.next() {
            Some(Ok(word)) if word.key.is_empty() => return Ok(word),
            Some(Ok(word)) => word.value(),
            Some(Err(fault)) => return Err(fault),
            None => {
                let end = self.entry.text().len();
                self.entry.field(end, end)
            }
        };
        Err(place.fault(ReadErrorKind::MissingField { what }))
    }
}

impl<'e> Iterator for Words<'e> {
    type Item = Result<Word<'e>, Fault>;

    fn next(&mut self) -> Option<Self::Item> {
        let text = self.text;
        let first = skip(text, self.at, is_blank);
        if first >= text.len() {
            return None;
        }
        // A key starts with a letter; most words are numbers.
        let key = match text.get(first) {
            Some(byte) if byte.is_ascii_alphabetic() => key(text, first),
            _ => &[],
        };
        let start = if key.is_empty() {
            first
        } else {
            first + key.len() + 1
        };
        let Some(end) = value_end(text, start) else {
            self.at = text.len();
            let expected = "a value with its closing mark";
            let open = self.entry.field(start, text.len());
            return Some(Err(open.fault(ReadErrorKind::Malformed { expected })));
        };
        self.at = end;
        Some(Ok(Word {
            entry: self.entry,
            key,
            value: self.entry.word(start, end),
            start,
            end,
        }))
    }
}

/// The letters, digits and `_` from an offset on, if `=` follows; or else nothing.
fn key(text: &[u8], first: usize) -> &[u8] {
    let end = skip(text, first, |byte| {
        byte.is_ascii_alphanumeric() || byte == b'_'
    });
    match text.get(end) {
        Some(b'=') => text.get(first..end).unwrap_or_default(),
        _ => &[],
    }
}

/// Where the value that starts at an offset ends; `None` where its closing mark is missing.
fn value_end(text: &[u8], start: usize) -> Option<usize> {
    match text.get(start) {
        Some(b'"') => closing_quote(text, start + 1),
        Some(b'(') => closing_bracket(text, start, b'(', b')'),
        Some(b'[') => closing_bracket(text, start, b'[', b']'),
        _ => Some(skip(text, start, |byte| !is_blank(byte))),
    }
}

/// Behind the quotation mark that closes; two in a row stand for one in the text.
fn closing_quote(text: &[u8], mut at: usize) -> Option<usize> {
    loop {
        at += text.get(at..)?.iter().position(|&byte| byte == b'"')? + 1;
        if text.get(at) != Some(&b'"') {
            return Some(at);
        }
        at += 1;
    }
}

fn closing_bracket(text: &[u8], start: usize, open: u8, close: u8) -> Option<usize> {
    let mut depth = 0_usize;
    for (at, &byte) in text.iter().enumerate().skip(start) {
        if byte == open {
            depth += 1;
        } else if byte == close {
            depth -= 1;
            if depth == 0 {
                return Some(at + 1);
            }
        }
    }
    None
}

/// The first offset from `at` on whose byte is of another kind.
fn skip(text: &[u8], at: usize, kind: impl Fn(u8) -> bool) -> usize {
    let mut rest = text.get(at..).unwrap_or_default();
    while let [byte, more @ ..] = rest
        && kind(*byte)
    {
        rest = more;
    }
    text.len() - rest.len()
}

/// Whether a byte separates words. One comparison tells for nearly all that don't.
fn is_blank(byte: u8) -> bool {
    byte <= b' ' && byte.is_ascii_whitespace()
}
