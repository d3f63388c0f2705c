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
    /// An allene, or a longer even number of cumulated double bonds, or a single bond about which
    /// rotation is hindered: two ligands at each end, in two planes.
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

/// The polyhedron of ligands about a centre that is not tetrahedral, with its positions in order.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub enum Polyhedron {
    /// Four positions in the order in which they go round the square.
    SquarePlanar,
    /// First axial, second axial, then three equatorial ones that run anticlockwise seen from the
    /// first axial position.
    TrigonalBipyramidal,
    /// Top, bottom, then four that run anticlockwise seen from the top.
    Octahedral,
}

impl Polyhedron {
    /// How many positions it has: 4, 5 or 6.
    pub fn positions(self) -> usize {
        match self {
            Self::SquarePlanar => 4,
            Self::TrigonalBipyramidal => 5,
            Self::Octahedral => 6,
        }
    }
}

/// The arrangement of ligands about a centre that is not tetrahedral, as a record gives it.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct DrawnCoordination {
    /// The polyhedron.
    pub polyhedron: Polyhedron,
    /// The centre.
    pub centre: u32,
    /// The ligands by position; as many as the polyhedron has positions.
    pub ligands: Vec<Ligand>,
}

/// How the marks of a group of stereo elements are meant (CTfile: enhanced stereochemistry).
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub enum GroupKind {
    /// Both the drawn arrangement and that with the whole group inverted are present.
    And,
    /// The drawn arrangement or that with the whole group inverted: one of the two.
    Or,
    /// The drawn arrangement, that with the whole group inverted, or both: only the configuration
    /// relative to each other is known.
    Relative,
}

/// A group of stereo elements whose marks are meant relative to each other.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct StereoGroup {
    /// How the group is meant.
    pub kind: GroupKind,
    /// The centres; for a double bond or axis either end stands for it.
    pub atoms: Vec<u32>,
}
