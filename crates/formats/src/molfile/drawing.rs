//! A drawing: what the lines of a molfile say, before any chemistry.
//!
//! Every version of the format fills this; [`crate::molfile::lower`] makes a molecule of it.

use molkin_graph::{Element, StereoGroup};

use crate::{Note, Span};

/// What one molfile draws.
#[derive(Debug, Default)]
pub(super) struct Drawing {
    pub(super) atoms: Vec<DrawnAtom>,
    pub(super) bonds: Vec<DrawnBond>,
    /// Atoms without bonds that stand in the midst of others and are none, in order.
    pub(super) placeholders: Vec<u32>,
    /// The chiral flag of the counts line.
    pub(super) chiral: bool,
    /// Groups of centres with relative marks.
    pub(super) groups: Vec<StereoGroup>,
    /// Whether the record says of any centre whether its mark is absolute or relative. Then the
    /// chiral flag says nothing.
    pub(super) grouped: bool,
    pub(super) notes: Vec<Note>,
}

/// One atom.
#[derive(Debug, Clone, Copy)]
pub(super) struct DrawnAtom {
    /// Where the symbol stands.
    pub(super) span: Span,
    pub(super) position: [f64; 3],
    pub(super) element: Element,
    pub(super) isotope: Option<u16>,
    pub(super) charge: i8,
    pub(super) radical: Radical,
    /// The valence with all hydrogens, where the record states it.
    pub(super) valence: Option<u8>,
}

/// The electrons that an open shell takes out of the valence.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Default)]
pub(super) enum Radical {
    #[default]
    None,
    Singlet,
    Doublet,
    Triplet,
}

impl Radical {
    /// From the number that the format uses.
    pub(super) fn from_code(code: i32) -> Option<Self> {
        match code {
            0 => Some(Self::None),
            1 => Some(Self::Singlet),
            2 => Some(Self::Doublet),
            3 => Some(Self::Triplet),
            _ => None,
        }
    }

    /// Electrons that make no bond.
    pub(super) fn electrons(self) -> u8 {
        match self {
            Self::None => 0,
            Self::Doublet => 1,
            Self::Singlet | Self::Triplet => 2,
        }
    }

    /// The spin multiplicity.
    pub(super) fn multiplicity(self) -> Option<u8> {
        match self {
            Self::None => None,
            Self::Singlet => Some(1),
            Self::Doublet => Some(2),
            Self::Triplet => Some(3),
        }
    }
}

/// One bond.
#[derive(Debug, Clone, Copy)]
pub(super) struct DrawnBond {
    /// Where its line stands.
    pub(super) span: Span,
    /// Atoms as indices from 0; a wedge has its narrow end at the first.
    pub(super) ends: [u32; 2],
    pub(super) kind: BondKind,
    pub(super) mark: BondMark,
}

/// The bond types that belong to a structure.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(super) enum BondKind {
    Single,
    Double,
    Triple,
    Aromatic,
    /// From a donor to a metal; takes no valence.
    Coordination,
    /// A hydrogen bond; takes no valence.
    Hydrogen,
}

impl BondKind {
    /// Bonding electron pairs that count as valence, those of the aromatic system aside.
    pub(super) fn pairs(self) -> u32 {
        match self {
            Self::Coordination | Self::Hydrogen => 0,
            Self::Single | Self::Aromatic => 1,
            Self::Double => 2,
            Self::Triple => 3,
        }
    }
}

/// How a bond is drawn.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(super) enum BondMark {
    Plain,
    /// A solid wedge: the wide end is nearer to the reader.
    Up,
    /// A hashed wedge.
    Down,
    /// A wavy single bond, or a crossed double bond.
    Either,
}
