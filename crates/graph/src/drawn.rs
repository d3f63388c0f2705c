//! Stereo marks as a record draws them, before symmetry says which of them count.

/// What is attached at one position of a stereo element.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub enum Ligand {
    /// An atom, by index.
    Atom(u32),
    /// A hydrogen that is not an atom of its own.
    Hydrogen,
    /// A lone pair.
    LonePair,
}

/// The geometry that a stereo element fixes.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub enum Shape {
    /// Four ligands about one centre.
    Tetrahedral,
    /// A double bond, or an odd number of cumulated ones: two ligands at each end, in one plane.
    DoubleBond,
    /// An allene, or a longer even number of cumulated double bonds: two ligands at each end, in
    /// two planes at right angles.
    Axis,
}

/// Which of the two arrangements of its ordered ligands an element has.
///
/// * Tetrahedral and axis: `Even` when, seen from the first ligand, the second, third and fourth
///   run anticlockwise (`@` in OpenSMILES).
/// * Double bond, ligands `[a1, a2, b1, b2]`: `Even` when `a1` and `b1` are on the same side.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub enum Parity {
    /// The arrangement described above.
    Even,
    /// The other one.
    Odd,
}

impl Parity {
    /// `Odd` for `true`.
    pub fn from_odd(odd: bool) -> Self {
        if odd { Self::Odd } else { Self::Even }
    }

    /// Whether this is `Odd`.
    pub fn is_odd(self) -> bool {
        self == Self::Odd
    }

    /// The other arrangement.
    #[must_use]
    pub fn inverted(self) -> Self {
        Self::from_odd(!self.is_odd())
    }
}

/// One stereo mark of a record.
///
/// `parity` is `None` where the record says outright that the arrangement is unknown (a wavy or
/// crossed bond); that means the same as no mark.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub struct DrawnStereo {
    /// The geometry.
    pub shape: Shape,
    /// The centre twice (tetrahedral), or the two ends of the double bond or axis.
    pub centres: [u32; 2],
    /// The ligands; for a double bond or axis the first two sit on `centres[0]`, the others on
    /// `centres[1]`.
    pub ligands: [Ligand; 4],
    /// The arrangement, or `None` where the record says it is unknown.
    pub parity: Option<Parity>,
}
