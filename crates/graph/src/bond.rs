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
}

impl BondOrder {
    /// The number of electron pairs: 1 to 4.
    pub fn pairs(self) -> u8 {
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
