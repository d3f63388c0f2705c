//! The stereo tag of a bracket atom.

use molkin_graph::Polyhedron;
use nom::{Parser, bytes::complete::tag, combinator::opt};

use super::{Refusal, Token, number};
use crate::{
    ReadErrorKind,
    smiles::syntax::{StereoTag, TagClass},
};

/// A class of tags: its letters, how many numbers it has, the tags in words, and what they speak of.
struct Class {
    letters: &'static [u8],
    most: u8,
    tags: &'static str,
    meaning: TagClass,
}

const CLASSES: [Class; 5] = [
    Class {
        letters: b"TH",
        most: 2,
        tags: "@TH1 or @TH2",
        meaning: TagClass::Tetrahedral,
    },
    Class {
        letters: b"AL",
        most: 2,
        tags: "@AL1 or @AL2",
        meaning: TagClass::Allene,
    },
    Class {
        letters: b"SP",
        most: 3,
        tags: "@SP1 to @SP3",
        meaning: TagClass::Polyhedral(Polyhedron::SquarePlanar),
    },
    Class {
        letters: b"TB",
        most: 20,
        tags: "@TB1 to @TB20",
        meaning: TagClass::Polyhedral(Polyhedron::TrigonalBipyramidal),
    },
    Class {
        letters: b"OH",
        most: 30,
        tags: "@OH1 to @OH30",
        meaning: TagClass::Polyhedral(Polyhedron::Octahedral),
    },
];

/// Reads `@`, `@@` or a tag of a named class, if there is one.
pub(super) fn stereo_tag(input: &[u8]) -> Token<'_, Option<StereoTag>> {
    let (rest, at) = opt(tag(&b"@"[..])).parse(input)?;
    if at.is_none() {
        return Ok((input, None));
    }
    let plain = |number| {
        Some(StereoTag {
            class: TagClass::Plain,
            number,
        })
    };
    let (rest, second) = opt(tag(&b"@"[..])).parse(rest)?;
    if second.is_some() {
        return Ok((rest, plain(2)));
    }
    match CLASSES.iter().find(|class| rest.starts_with(class.letters)) {
        Some(class) => named(class, input, &rest[class.letters.len()..]),
        None => Ok((rest, plain(1))),
    }
}

/// The number of a named class. `start` is where its `@` stands.
fn named<'a>(class: &Class, start: &'a [u8], input: &'a [u8]) -> Token<'a, Option<StereoTag>> {
    let (rest, number) = opt(|text| number(text, "a stereo tag", u32::MAX)).parse(input)?;
    let number = number.and_then(|number| u8::try_from(number).ok());
    match number.filter(|number| (1..=class.most).contains(number)) {
        Some(number) => Ok((
            rest,
            Some(StereoTag {
                class: class.meaning,
                number,
            }),
        )),
        None => {
            let kind = ReadErrorKind::BadStereoTag {
                expected: class.tags,
            };
            Err(Refusal::failure(start, start.len() - rest.len(), kind))
        }
    }
}
