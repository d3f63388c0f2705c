//! The stereo tag of a bracket atom.

use nom::{Parser, bytes::complete::tag, combinator::opt};

use super::{Refusal, Token, number};
use crate::{
    ReadErrorKind,
    smiles::syntax::{StereoTag, TagClass},
};

/// A class of tags: its letters, how many numbers it has, the tags in words, and what they are read
/// as or else the name of what is not read.
struct Class {
    letters: &'static [u8],
    most: u32,
    tags: &'static str,
    meaning: Result<TagClass, &'static str>,
}

const CLASSES: [Class; 5] = [
    Class {
        letters: b"TH",
        most: 2,
        tags: "@TH1 or @TH2",
        meaning: Ok(TagClass::Tetrahedral),
    },
    Class {
        letters: b"AL",
        most: 2,
        tags: "@AL1 or @AL2",
        meaning: Ok(TagClass::Allene),
    },
    Class {
        letters: b"SP",
        most: 3,
        tags: "@SP1 to @SP3",
        meaning: Err("square-planar"),
    },
    Class {
        letters: b"TB",
        most: 20,
        tags: "@TB1 to @TB20",
        meaning: Err("trigonal-bipyramidal"),
    },
    Class {
        letters: b"OH",
        most: 30,
        tags: "@OH1 to @OH30",
        meaning: Err("octahedral"),
    },
];

/// Reads `@`, `@@` or a tag of a named class, if there is one.
pub(super) fn stereo_tag(input: &[u8]) -> Token<'_, Option<StereoTag>> {
    let (rest, at) = opt(tag(&b"@"[..])).parse(input)?;
    if at.is_none() {
        return Ok((input, None));
    }
    let (rest, second) = opt(tag(&b"@"[..])).parse(rest)?;
    if second.is_some() {
        return Ok((
            rest,
            Some(StereoTag {
                class: TagClass::Plain,
                clockwise: true,
            }),
        ));
    }
    match CLASSES.iter().find(|class| rest.starts_with(class.letters)) {
        Some(class) => named(class, input, &rest[class.letters.len()..]),
        None => Ok((
            rest,
            Some(StereoTag {
                class: TagClass::Plain,
                clockwise: false,
            }),
        )),
    }
}

/// The number of a named class. `start` is where its `@` stands.
fn named<'a>(class: &Class, start: &'a [u8], input: &'a [u8]) -> Token<'a, Option<StereoTag>> {
    let (rest, number) = opt(|text| number(text, "a stereo tag", u32::MAX)).parse(input)?;
    let width = start.len() - rest.len();
    let refuse = |kind| Err(Refusal::failure(start, width, kind));
    let Some(number) = number.filter(|number| (1..=class.most).contains(number)) else {
        return refuse(ReadErrorKind::BadStereoTag {
            expected: class.tags,
        });
    };
    match class.meaning {
        Ok(meaning) => Ok((
            rest,
            Some(StereoTag {
                class: meaning,
                clockwise: number == 2,
            }),
        )),
        Err(class) => refuse(ReadErrorKind::UnsupportedStereo { class }),
    }
}
