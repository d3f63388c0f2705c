//! What a record is to the first record of its group.

use crate::StereoKind;

/// What a record is to the first one of its group.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord)]
pub enum Kinship {
    /// It is the first.
    First,
    /// The same, however drawn. With `open`, both stand for more than one possible sample.
    Identical {
        /// The samples may still be different compounds.
        open: bool,
    },
    /// The same labelled constitution.
    Stereo(StereoKind),
    /// The same formula.
    Constitutional,
    /// Another formula.
    NotIsomers,
    /// The two could not be compared within the limits.
    NotCompared,
}

/// All there are; the code of one is its place here.
const ALL: [Kinship; 11] = [
    Kinship::First,
    Kinship::Identical { open: false },
    Kinship::Identical { open: true },
    Kinship::Stereo(StereoKind::Enantiomers),
    Kinship::Stereo(StereoKind::Diastereomers),
    Kinship::Stereo(StereoKind::Composition),
    Kinship::Stereo(StereoKind::Undetermined),
    Kinship::Stereo(StereoKind::Unresolved),
    Kinship::Constitutional,
    Kinship::NotIsomers,
    Kinship::NotCompared,
];

impl Kinship {
    pub(super) fn code(self) -> u64 {
        let place = ALL.iter().position(|&kinship| kinship == self);
        place.unwrap_or(ALL.len() - 1) as u64
    }

    pub(super) fn of_code(code: u64) -> Self {
        let place = usize::try_from(code).ok();
        let kinship = place.and_then(|place| ALL.get(place));
        kinship.copied().unwrap_or(Self::NotCompared)
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn codes_can_be_read() {
        for kinship in ALL {
            assert_eq!(Kinship::of_code(kinship.code()), kinship);
        }
    }
}
