//! Fields of fixed columns.

use nom::{Parser, character::complete::i32 as signed, combinator::all_consuming};

use crate::{ReadErrorKind, Span, molfile::block::Fault};

/// The largest coordinate taken. A field of ten columns holds less than a million as written by the
/// format; the bound keeps later arithmetic finite.
const FARTHEST: f64 = 1e7;

/// The bytes of one field without blanks round them, and the columns it takes.
#[derive(Debug, Clone, Copy)]
pub(crate) struct Field<'a> {
    text: &'a [u8],
    span: Span,
}

impl<'a> Field<'a> {
    pub(crate) fn new(bytes: &'a [u8], span: Span) -> Self {
        Self {
            text: bytes.trim_ascii(),
            span,
        }
    }

    pub(crate) fn text(&self) -> &'a [u8] {
        self.text
    }

    pub(crate) fn span(&self) -> Span {
        self.span
    }

    pub(crate) fn fault(&self, kind: ReadErrorKind) -> Fault {
        Fault::new(kind, self.span)
    }

    /// A whole number within bounds, or 0 where the field is blank.
    pub(crate) fn number(&self, what: &'static str, least: i32, most: i32) -> Result<i32, Fault> {
        if self.text.is_empty() {
            Ok(0)
        } else {
            self.stated(what, least, most)
        }
    }

    /// A whole number within bounds that has to be there.
    pub(crate) fn stated(&self, what: &'static str, least: i32, most: i32) -> Result<i32, Fault> {
        if self.text.is_empty() {
            return Err(self.fault(ReadErrorKind::MissingField { what }));
        }
        let digits = self.text.strip_prefix(b"-").unwrap_or(self.text);
        if digits.is_empty() || !digits.iter().all(u8::is_ascii_digit) {
            return Err(self.fault(ReadErrorKind::BadNumber { what }));
        }
        // What has the form of a number and is none is too large.
        let parsed: Option<i32> = all_consuming(signed::<_, nom::error::Error<_>>)
            .parse(self.text)
            .map(|(_, value)| value)
            .ok();
        parsed
            .filter(|value| (least..=most).contains(value))
            .ok_or_else(|| {
                let (least, most) = (i64::from(least), i64::from(most));
                self.fault(ReadErrorKind::NumberOutOfRange { what, least, most })
            })
    }

    /// A coordinate, or 0 where the field is blank. `NaN`, `inf` and what overflows are refused.
    pub(crate) fn coordinate(&self) -> Result<f64, Fault> {
        if self.text.is_empty() {
            return Ok(0.0);
        }
        let what = "the coordinate";
        // Keeps out the names of infinity and of what is no number, which parse too.
        let numeric = |byte: &u8| matches!(byte, b'0'..=b'9' | b'+' | b'-' | b'.' | b'e' | b'E');
        let value: Option<f64> = std::str::from_utf8(self.text)
            .ok()
            .filter(|text| text.as_bytes().iter().all(numeric))
            .and_then(|text| text.parse().ok());
        let value = value.ok_or_else(|| self.fault(ReadErrorKind::BadNumber { what }))?;
        if value.abs() <= FARTHEST {
            return Ok(value);
        }
        let bound = FARTHEST as i64;
        Err(self.fault(ReadErrorKind::NumberOutOfRange {
            what,
            least: -bound,
            most: bound,
        }))
    }
}

/// Text of unknown encoding: UTF-8, or else Latin-1, in which every byte is a character.
pub(crate) fn decode(bytes: &[u8]) -> String {
    match std::str::from_utf8(bytes) {
        Ok(text) => text.to_owned(),
        Err(_) => bytes.iter().map(|&byte| char::from(byte)).collect(),
    }
}

#[cfg(test)]
mod tests {
    use rstest::rstest;

    use super::*;

    fn field(text: &str) -> Field<'_> {
        Field::new(text.as_bytes(), Span::new(1, 1, 3))
    }

    #[rstest]
    #[case("  7", Some(7))]
    #[case("   ", Some(0))]
    #[case(" -3", Some(-3))]
    #[case("999", None)]
    #[case("1 2", None)]
    #[case("+1", None)]
    #[case("0x1", None)]
    #[case("-", None)]
    #[case("99999999999", None)]
    fn whole_numbers(#[case] text: &str, #[case] expected: Option<i32>) {
        assert_eq!(field(text).number("the charge", -15, 15).ok(), expected);
    }

    #[rstest]
    #[case("    1.2500", Some(1.25))]
    #[case("-0.5", Some(-0.5))]
    #[case("3", Some(3.0))]
    #[case("1e3", Some(1000.0))]
    #[case("          ", Some(0.0))]
    #[case("nan", None)]
    #[case("inf", None)]
    #[case("-Infinity", None)]
    #[case("1e99", None)]
    #[case("1e999", None)]
    #[case("1.0 2.0", None)]
    #[case("1,5", None)]
    fn coordinates(#[case] text: &str, #[case] expected: Option<f64>) {
        assert_eq!(field(text).coordinate().ok(), expected);
    }

    #[test]
    fn bytes_that_are_no_utf8_are_latin_1() {
        assert_eq!(decode("é".as_bytes()), "é");
        assert_eq!(decode(b"caf\xe9"), "café");
    }
}
