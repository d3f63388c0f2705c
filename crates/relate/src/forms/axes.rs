//! The axes on which records of one compound may differ.

use std::{fmt, str::FromStr};

use thiserror::Error;

/// An axis: what a registry may overlook when it asks whether two records are of one compound.
/// Definitions: docs/definitions.md.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub enum Axis {
    /// Counter-ions, solvents and their ratio, with the protons that make the salt.
    Salt,
    /// How far each component is protonated.
    Charge,
    /// Where mobile hydrogens sit.
    Tautomer,
    /// A switch of [`Axis::Tautomer`]: chains that close to rings count as well.
    RingChain,
    /// Isotopes: how many and where.
    Isotope,
    /// Arrangement in space, and what is claimed about it.
    Stereo,
    /// A switch for pairs: stereo where one of two records leaves it open, and the other says what it
    /// allows. No form of one record shows it.
    OpenStereo,
}

impl Axis {
    /// All axes, in the order in which they are written.
    pub const ALL: [Self; 7] = [
        Self::Salt,
        Self::Charge,
        Self::Tautomer,
        Self::RingChain,
        Self::Isotope,
        Self::Stereo,
        Self::OpenStereo,
    ];

    /// The word of the output contract and of the command line.
    pub fn as_str(self) -> &'static str {
        match self {
            Self::Salt => "salt",
            Self::Charge => "charge",
            Self::Tautomer => "tautomer",
            Self::RingChain => "ring-chain",
            Self::Isotope => "isotope",
            Self::Stereo => "stereo",
            Self::OpenStereo => "open-stereo",
        }
    }

    fn bit(self) -> u8 {
        1 << self as u8
    }
}

impl fmt::Display for Axis {
    fn fmt(&self, out: &mut fmt::Formatter<'_>) -> fmt::Result {
        out.pad(self.as_str())
    }
}

/// A word that names no axis.
#[derive(Debug, Clone, PartialEq, Eq, Error)]
#[error(
    "'{word}' is no axis; the axes are salt, charge, tautomer, ring-chain, isotope, stereo and open-stereo, separated by commas"
)]
pub struct AxesError {
    word: String,
}

/// A set of axes.
///
/// # Examples
/// ```
/// use molkin_relate::{Axes, Axis};
///
/// let axes: Axes = "stereo,salt".parse()?;
/// assert!(axes.contains(Axis::Salt));
/// assert_eq!(axes.to_string(), "salt,stereo");
/// assert_eq!("ring-chain".parse(), Ok(Axes::from([Axis::Tautomer, Axis::RingChain])));
/// # Ok::<(), molkin_relate::AxesError>(())
/// ```
#[derive(Debug, Clone, Copy, Default, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub struct Axes(u8);

impl Axes {
    /// No axis.
    pub const NONE: Self = Self(0);

    /// Whether no axis is in the set.
    pub fn is_empty(self) -> bool {
        self.0 == 0
    }

    /// How many axes are in the set; [`Axis::RingChain`] is none of its own.
    pub fn len(self) -> usize {
        (self.0 & !Axis::RingChain.bit()).count_ones() as usize
    }

    /// Whether an axis is in the set.
    pub fn contains(self, axis: Axis) -> bool {
        self.0 & axis.bit() != 0
    }

    /// The set with one axis more. A switch brings its axis along.
    #[must_use]
    pub fn with(self, axis: Axis) -> Self {
        let switched = match axis {
            Axis::RingChain => Axis::Tautomer.bit(),
            _ => 0,
        };
        Self(self.0 | axis.bit() | switched)
    }

    /// The axes in the order in which they are written.
    pub fn iter(self) -> impl Iterator<Item = Axis> {
        let all = Axis::ALL.into_iter();
        all.filter(move |&axis| self.contains(axis))
    }
}

impl FromIterator<Axis> for Axes {
    fn from_iter<I: IntoIterator<Item = Axis>>(axes: I) -> Self {
        axes.into_iter().fold(Self::NONE, Self::with)
    }
}

impl<const N: usize> From<[Axis; N]> for Axes {
    fn from(axes: [Axis; N]) -> Self {
        axes.into_iter().collect()
    }
}

impl FromStr for Axes {
    type Err = AxesError;

    fn from_str(text: &str) -> Result<Self, AxesError> {
        let named = |word: &str| {
            let mut all = Axis::ALL.into_iter();
            all.find(|axis| axis.as_str() == word)
                .ok_or_else(|| AxesError {
                    word: word.to_owned(),
                })
        };
        text.split(',').map(|word| named(word.trim())).collect()
    }
}

impl fmt::Display for Axes {
    fn fmt(&self, out: &mut fmt::Formatter<'_>) -> fmt::Result {
        for (at, axis) in self.iter().enumerate() {
            let comma = if at == 0 { "" } else { "," };
            write!(out, "{comma}{axis}")?;
        }
        Ok(())
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn words_make_a_set() {
        let axes: Axes = "tautomer, salt,tautomer".parse().unwrap();
        assert_eq!(axes, Axes::from([Axis::Salt, Axis::Tautomer]));
        assert_eq!(
            (axes.to_string().as_str(), axes.len()),
            ("salt,tautomer", 2)
        );
    }

    #[test]
    fn other_words_are_refused() {
        for text in ["", "salts", "salt,,charge", "Salt"] {
            assert!(text.parse::<Axes>().is_err(), "{text}");
        }
    }

    #[test]
    fn every_word_names_its_axis() {
        for axis in Axis::ALL {
            let axes: Axes = axis.as_str().parse().unwrap();
            assert!(axes.contains(axis));
            assert_eq!(axes.len(), 1);
        }
    }
}
