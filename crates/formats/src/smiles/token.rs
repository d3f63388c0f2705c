//! The tokens longer than a byte or two, read with nom: bracket atoms and ring labels.

use nom::{
    IResult, Parser,
    bytes::complete::{tag, take_while_m_n, take_while1},
    character::complete::digit1,
    combinator::opt,
    error::{ErrorKind, ParseError},
    sequence::preceded,
};

use crate::ReadErrorKind;

mod bracket;
mod stereo_tag;
mod symbol;

pub(super) use bracket::{BracketAtom, bracket_atom};

/// Why a token is refused: what is left of the text at that place, and how wide the fault is.
#[derive(Debug)]
pub(super) struct Refusal<'a> {
    pub(super) rest: &'a [u8],
    pub(super) width: usize,
    pub(super) kind: ReadErrorKind,
}

/// What a token parser gives.
type Token<'a, T> = IResult<&'a [u8], T, Refusal<'a>>;

impl<'a> Refusal<'a> {
    fn failure(rest: &'a [u8], width: usize, kind: ReadErrorKind) -> nom::Err<Self> {
        nom::Err::Failure(Self { rest, width, kind })
    }

    fn unexpected(rest: &'a [u8], expected: &'static str) -> nom::Err<Self> {
        let (kind, width) = unexpected(rest, expected);
        Self::failure(rest, width, kind)
    }
}

impl<'a> ParseError<&'a [u8]> for Refusal<'a> {
    fn from_error_kind(rest: &'a [u8], _: ErrorKind) -> Self {
        // An optional part that is absent comes through here: it must cost nothing.
        let kind = ReadErrorKind::Malformed {
            expected: "a symbol of the notation",
        };
        Self {
            rest,
            width: 1,
            kind,
        }
    }

    fn append(_: &'a [u8], _: ErrorKind, other: Self) -> Self {
        other
    }
}

/// The fault of a text that goes on with something else than `expected`, and its width.
pub(super) fn unexpected(rest: &[u8], expected: &'static str) -> (ReadErrorKind, usize) {
    // A character is at most four bytes.
    let head = &rest[..rest.len().min(4)];
    match String::from_utf8_lossy(head).chars().next() {
        None => (ReadErrorKind::UnexpectedEnd { expected }, 0),
        Some(char::REPLACEMENT_CHARACTER) => (
            ReadErrorKind::Unexpected {
                found: char::REPLACEMENT_CHARACTER,
                expected,
            },
            1,
        ),
        Some(found) => (
            ReadErrorKind::Unexpected { found, expected },
            found.len_utf8(),
        ),
    }
}

/// A number without a sign, at most `most`. Leading zeros are allowed.
fn number<'a>(input: &'a [u8], what: &'static str, most: u32) -> Token<'a, u32> {
    let (rest, digits) = digit1(input)?;
    let value = digits.iter().fold(0u32, |value, digit| {
        value
            .saturating_mul(10)
            .saturating_add(u32::from(digit - b'0'))
    });
    if value > most {
        let kind = ReadErrorKind::NumberOutOfRange {
            what,
            least: 0,
            most: i64::from(most),
        };
        return Err(Refusal::failure(input, digits.len(), kind));
    }
    Ok((rest, value))
}

/// A ring label: a digit, or `%` and two digits.
pub(super) fn ring_label(input: &[u8]) -> Token<'_, u8> {
    let (rest, percent) = opt(tag(&b"%"[..])).parse(input)?;
    if percent.is_some() && rest.starts_with(b"(") {
        let what = "a ring label in parentheses";
        return Err(Refusal::failure(
            input,
            2,
            ReadErrorKind::Unsupported { what },
        ));
    }
    let count = if percent.is_some() { 2 } else { 1 };
    let mut digits =
        take_while_m_n::<_, _, Refusal<'_>>(count, count, |byte: u8| byte.is_ascii_digit());
    match digits.parse(rest) {
        Ok((rest, digits)) => Ok((
            rest,
            digits
                .iter()
                .fold(0, |value, digit| value * 10 + (digit - b'0')),
        )),
        Err(_) => {
            let read = rest.iter().take_while(|byte| byte.is_ascii_digit()).count();
            Err(Refusal::unexpected(
                &rest[read.min(rest.len())..],
                "two digits after %",
            ))
        }
    }
}

/// The number after an atom class colon, which has no chemical meaning: any number of digits.
fn atom_class(input: &[u8]) -> Token<'_, ()> {
    let (rest, colon) = opt(tag(&b":"[..])).parse(input)?;
    if colon.is_none() {
        return Ok((rest, ()));
    }
    match digit1::<_, Refusal<'_>>(rest) {
        Ok((rest, _)) => Ok((rest, ())),
        Err(_) => Err(Refusal::unexpected(rest, "the number of an atom class")),
    }
}

/// `H` and at most one digit.
fn hydrogens(input: &[u8]) -> Token<'_, u8> {
    let digit = take_while_m_n(0, 1, |byte: u8| byte.is_ascii_digit());
    let (rest, count) = opt(preceded(tag(&b"H"[..]), digit)).parse(input)?;
    let count = match count {
        None => 0,
        Some([]) => 1,
        Some(digits) => digits.iter().fold(0, |_, digit| digit - b'0'),
    };
    Ok((rest, count))
}

/// A charge and whether it is written with more than one sign.
fn charge(input: &[u8]) -> Token<'_, (i8, usize)> {
    const MOST: u32 = 15;
    let Some(&sign @ (b'+' | b'-')) = input.first() else {
        return Ok((input, (0, 0)));
    };
    let (rest, signs) = take_while1(|byte: u8| byte == sign).parse(input)?;
    let kind = || ReadErrorKind::NumberOutOfRange {
        what: "a charge",
        least: -15,
        most: 15,
    };
    let (rest, size) = match (signs.len(), rest.first()) {
        (1, Some(b'0'..=b'9')) => {
            let (after, size) = number(rest, "a charge", u32::MAX)?;
            (after, size)
        }
        (count, _) => (rest, u32::try_from(count).unwrap_or(u32::MAX)),
    };
    if size > MOST {
        return Err(Refusal::failure(input, input.len() - rest.len(), kind()));
    }
    let size = i8::try_from(size).unwrap_or(i8::MAX);
    Ok((rest, (if sign == b'+' { size } else { -size }, signs.len())))
}
