//! Bond orders as drawn.

/// The order of a bond in one drawn valence structure.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub enum BondOrder {
    /// One electron pair.
    Single = 1,
    /// Two electron pairs.
    Double = 2,
    /// Three electron pairs.
    Triple = 3,
    /// Four electron pairs (`$` in SMILES).
    Quadruple = 4,
    /// A bond from a donor to a metal that takes no valence (CTfile type 9).
    Coordination = 6,
    /// A hydrogen bond (CTfile type 10).
    Hydrogen = 0,
}

impl BondOrder {
    /// The number of electron pairs that count as valence: 1 to 4, and none for coordination and
    /// hydrogen bonds.
    pub fn pairs(self) -> u8 {
        match self {
            Self::Coordination | Self::Hydrogen => 0,
            other => other as u8,
        }
    }

    /// The class of the bond in identity, one number for each order.
    pub(crate) fn class(self) -> u8 {
        self as u8
    }

    /// The order with the given number of electron pairs, if it is 1 to 4.
    pub fn from_pairs(pairs: u8) -> Option<Self> {
        match pairs {
            1 => Some(Self::Single),
            2 => Some(Self::Double),
            3 => Some(Self::Triple),
            4 => Some(Self::Quadruple),
            _ => None,
        }
    }
}
