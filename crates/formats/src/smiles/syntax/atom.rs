//! Atoms and their stereo tags as the text gives them.

use molkin_graph::{Atom, Element, Polyhedron};

use super::{BondKind, NONE};

/// Which arrangement a stereo tag speaks of.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(in crate::smiles) enum TagClass {
    /// `@` or `@@`: what the number of ligands suggests.
    Plain,
    Tetrahedral,
    Allene,
    Polyhedral(Polyhedron),
}

/// The stereo tag of a bracket atom.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(in crate::smiles) struct StereoTag {
    pub(in crate::smiles) class: TagClass,
    /// From 1 to as many as the class has; `@` is 1 and `@@` is 2.
    pub(in crate::smiles) number: u8,
}

/// An atom as its own text gives it.
#[derive(Debug, Clone, Copy)]
pub(in crate::smiles) struct AtomToken {
    pub(in crate::smiles) atom: Atom,
    pub(in crate::smiles) aromatic: bool,
    pub(in crate::smiles) bracket: bool,
    pub(in crate::smiles) tag: Option<StereoTag>,
}

impl AtomToken {
    /// An atom written without brackets; its hydrogens follow from its bonds.
    #[inline]
    pub(in crate::smiles) fn bare(element: Element, aromatic: bool) -> Self {
        Self {
            atom: Atom::new(element),
            aromatic,
            bracket: false,
            tag: None,
        }
    }
}

/// An atom.
#[derive(Debug, Clone, Copy)]
pub(in crate::smiles) struct AtomSyntax {
    pub(in crate::smiles) atom: Atom,
    pub(in crate::smiles) tag: Option<StereoTag>,
    pub(in crate::smiles) aromatic: bool,
    pub(in crate::smiles) bracket: bool,
    /// Whether it is bonded to an atom before it in its chain; that bond is then its first one.
    pub(in crate::smiles) preceded: bool,
    /// Whether a branch has been opened at it.
    pub(in crate::smiles) branched: bool,
    /// Whether one of its bonds is delocalised.
    pub(in crate::smiles) delocalised: bool,
    /// Whether one of its bonds is written as double, triple or quadruple.
    pub(in crate::smiles) multiple: bool,
    pub(in crate::smiles) degree: u32,
    /// The sum of its bond orders, a delocalised bond counted as 1.
    pub(in crate::smiles) order_sum: u32,
    pub(in crate::smiles) offset: u32,
    pub(in crate::smiles) width: u32,
    /// Its first and last place.
    pub(super) first: u32,
    last: u32,
}

impl AtomSyntax {
    /// An atom without bonds yet; `place` is the offset and width of its text.
    #[inline]
    pub(in crate::smiles) fn new(token: AtomToken, preceded: bool, place: (u32, u32)) -> Self {
        Self {
            atom: token.atom,
            tag: token.tag,
            aromatic: token.aromatic,
            bracket: token.bracket,
            preceded,
            branched: false,
            delocalised: false,
            multiple: false,
            degree: 0,
            order_sum: 0,
            offset: place.0,
            width: place.1,
            first: NONE,
            last: NONE,
        }
    }

    /// Counts a bond of so many pairs.
    #[inline]
    pub(super) fn count(&mut self, kind: BondKind, pairs: u32) {
        self.degree += 1;
        self.order_sum += pairs;
        self.multiple |= pairs > 1;
        self.delocalised |= kind == BondKind::Delocalised;
    }

    /// Puts a place behind the others of the atom and returns the one before it, or [`NONE`].
    #[inline]
    pub(super) fn append(&mut self, place: u32) -> u32 {
        let last = std::mem::replace(&mut self.last, place);
        if last == NONE {
            self.first = place;
        }
        last
    }

    /// Whether an aromatic bond symbol belongs here by the standard.
    pub(in crate::smiles) fn may_be_aromatic(&self) -> bool {
        self.aromatic || self.is_wildcard()
    }

    pub(super) fn is_wildcard(&self) -> bool {
        self.atom.element == Element::WILDCARD
    }
}
