//! One atom as a record gives it.

use crate::Element;

/// An atom with everything a record fixes about it before any bond order is interpreted.
///
/// Open valences (radicals) are not stored: they follow from element, charge, hydrogens and bonds.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub struct Atom {
    /// The element; [`Element::WILDCARD`] for an unknown atom.
    pub element: Element,
    /// The mass number where the record gives one. `Some(0)` differs from `None`.
    pub isotope: Option<u16>,
    /// Formal charge in units of the elementary charge, as drawn.
    pub charge: i8,
    /// Hydrogens attached without being atoms of their own.
    pub hydrogens: u8,
    /// Spin multiplicity where the record states one (1 singlet, 2 doublet, 3 triplet). It is
    /// reported and never decides identity.
    pub multiplicity: Option<u8>,
}

impl Atom {
    /// A neutral atom of natural isotopic composition without hydrogens.
    pub fn new(element: Element) -> Self {
        Self {
            element,
            isotope: None,
            charge: 0,
            hydrogens: 0,
            multiplicity: None,
        }
    }
}
