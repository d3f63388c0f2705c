//! Fields of fixed columns.

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
            text: trim(bytes),
            span,
        }
    }

    /// A field whose bytes have no blanks round them.
    pub(crate) fn of_word(text: &'a [u8], span: Span) -> Self {
        Self { text, span }
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
        match self.text {
            // Most fields of most lines; 0 is within the bounds of every field that may be blank.
            b"" | b"0" => Ok(0),
            _ => self.stated(what, least, most),
        }
    }

    /// A whole number within bounds that has to be there.
    pub(crate) fn stated(&self, what: &'static str, least: i32, most: i32) -> Result<i32, Fault> {
        if self.text.is_empty() {
            return Err(self.fault(ReadErrorKind::MissingField { what }));
        }
        let positive = self.text.strip_prefix(b"-");
        let digits = positive.unwrap_or(self.text);
        let (size, rest) = leading_number(0, digits);
        if digits.is_empty() || !rest.is_empty() {
            return Err(self.fault(ReadErrorKind::BadNumber { what }));
        }
        let size = i32::try_from(size)
            .ok()
            .filter(|_| digits.len() <= MOST_DIGITS);
        let value = size.map(|size| if positive.is_some() { -size } else { size });
        // What has the form of a number and is none is too large.
        value
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
        let value = match decimal(self.text) {
            Some(value) => value,
            None => {
                number(self.text).ok_or_else(|| self.fault(ReadErrorKind::BadNumber { what }))?
            }
        };
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

/// The number that the digits in front of a text continue, and the text behind them. It is the
/// right one for up to [`MOST_DIGITS`] in all.
fn leading_number(mut number: u64, mut text: &[u8]) -> (u64, &[u8]) {
    while let [digit @ b'0'..=b'9', rest @ ..] = text {
        number = number
            .wrapping_mul(10)
            .wrapping_add(u64::from(digit - b'0'));
        text = rest;
    }
    (number, text)
}

/// Digits that make a number of 64 bits, whatever they are.
const MOST_DIGITS: usize = 19;

/// A number of at most 15 digits and point, as nearly all coordinates are written. Digits and power
/// of ten are exact, so the quotient is the nearest number, as that of the general way is, which
/// takes three times as long.
fn decimal(text: &[u8]) -> Option<f64> {
    const LONGEST: usize = 15;
    const POWERS: [f64; LONGEST] = [
        1e0, 1e1, 1e2, 1e3, 1e4, 1e5, 1e6, 1e7, 1e8, 1e9, 1e10, 1e11, 1e12, 1e13, 1e14,
    ];
    let positive = text.strip_prefix(b"-");
    let text = positive.unwrap_or(text);
    let (whole, rest) = leading_number(0, text);
    let fraction = match rest {
        [] => rest,
        [b'.', fraction @ ..] => fraction,
        _ => return None,
    };
    let (value, rest) = leading_number(whole, fraction);
    if !rest.is_empty() || text.len() > LONGEST || matches!(text, b"" | b".") {
        return None;
    }
    // The point is one of the bytes of a text with a fraction.
    let size = value as f64 / POWERS[fraction.len()];
    Some(if positive.is_some() { -size } else { size })
}

/// Without the blanks round it. Most bytes are no control characters: one comparison tells.
fn trim(mut text: &[u8]) -> &[u8] {
    let is_blank = |byte: &u8| *byte <= b' ' && byte.is_ascii_whitespace();
    while let [first, rest @ ..] = text
        && is_blank(first)
    {
        text = rest;
    }
    while let [rest @ .., last] = text
        && is_blank(last)
    {
        text = rest;
    }
    text
}

/// Any number. The names of infinity and of what is no number parse too and are kept out.
fn number(text: &[u8]) -> Option<f64> {
    let numeric = |byte: &u8| matches!(byte, b'0'..=b'9' | b'+' | b'-' | b'.' | b'e' | b'E');
    let text = std::str::from_utf8(text).ok()?;
    let text = Some(text).filter(|text| text.as_bytes().iter().all(numeric))?;
    text.parse().ok()
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

    /// The quick way gives the very number that the general one does, or leaves the text to it.
    #[test]
    fn decimals_are_the_nearest_numbers() {
        let mut state = 1_u64;
        let mut quick = 0;
        for _ in 0..20_000 {
            // Knuth, The Art of Computer Programming 2, 3.3.4.
            state = state
                .wrapping_mul(6_364_136_223_846_793_005)
                .wrapping_add(1);
            let digits = (state >> 8) % 10_u64.pow((state % 18) as u32 + 1);
            let mut text = digits.to_string();
            let point = (state >> 40) as usize % (text.len() + 2);
            if point < text.len() {
                text.insert(point, '.');
            }
            if state.count_ones().is_multiple_of(2) {
                text.insert(0, '-');
            }
            if let Some(value) = decimal(text.as_bytes()) {
                quick += 1;
                let expected: f64 = text.parse().unwrap();
                assert_eq!(value.to_bits(), expected.to_bits(), "{text}");
            }
        }
        assert!(quick > 10_000, "{quick} numbers");
        for text in ["", "-", ".", "-.", "1.2.3", "1-", "+1", "1e3", "--1", " 1"] {
            assert_eq!(decimal(text.as_bytes()), None, "{text}");
        }
    }

    #[test]
    fn bytes_that_are_no_utf8_are_latin_1() {
        assert_eq!(decode("é".as_bytes()), "é");
        assert_eq!(decode(b"caf\xe9"), "café");
    }
}
