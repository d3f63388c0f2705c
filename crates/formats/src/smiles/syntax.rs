//! What the text says, before chemistry is read into it: atoms, bonds, and for each atom the order
//! in which its bonds are written. Flat arrays that a reader reuses from record to record.

use molkin_graph::{Atom, BondOrder, Element};

/// Stands for "no atom", "no bond" or "no place".
pub(super) const NONE: u32 = u32::MAX;

/// A bond as its symbol, or the absence of one, gives it.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(super) enum BondSymbol {
    Elided,
    Order(BondOrder),
    Aromatic,
    /// `/`, or `\` where `up` is false: a single bond with a slope.
    Directional {
        up: bool,
    },
}

/// How the order of a bond is known.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(super) enum BondKind {
    Order(BondOrder),
    /// Left to the aromatic system.
    Delocalised,
    /// Elided between an aromatic symbol and a wildcard: delocalised in a ring, single elsewhere.
    Open,
}

/// Where the second atom of a bond lies, seen from the first.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(super) enum Slope {
    Unmarked,
    Above,
    Below,
    /// The two ends of a ring bond contradict each other.
    Contradictory,
}

impl Slope {
    pub(super) fn above(up: bool) -> Self {
        if up { Self::Above } else { Self::Below }
    }
}

/// A bond.
#[derive(Debug, Clone, Copy)]
pub(super) struct BondSyntax {
    /// In text order; for a ring bond the atom that opened the label comes first.
    pub(super) ends: [u32; 2],
    pub(super) kind: BondKind,
    pub(super) slope: Slope,
    /// Whether a double bond has made use of the slope.
    pub(super) used: bool,
    pub(super) offset: u32,
    pub(super) width: u32,
}

/// Which arrangement a stereo tag speaks of.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(super) enum TagClass {
    /// `@` or `@@`: what the number of ligands suggests.
    Plain,
    Tetrahedral,
    Allene,
}

/// The stereo tag of a bracket atom.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(super) struct StereoTag {
    pub(super) class: TagClass,
    pub(super) clockwise: bool,
}

/// An atom as its own text gives it.
#[derive(Debug, Clone, Copy)]
pub(super) struct AtomToken {
    pub(super) atom: Atom,
    pub(super) aromatic: bool,
    pub(super) bracket: bool,
    pub(super) tag: Option<StereoTag>,
}

impl AtomToken {
    /// An atom written without brackets; its hydrogens follow from its bonds.
    #[inline]
    pub(super) fn bare(element: Element, aromatic: bool) -> Self {
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
pub(super) struct AtomSyntax {
    pub(super) atom: Atom,
    pub(super) tag: Option<StereoTag>,
    pub(super) aromatic: bool,
    pub(super) bracket: bool,
    /// Whether it is bonded to an atom before it in its chain; that bond is then its first one.
    pub(super) preceded: bool,
    /// Whether a branch has been opened at it.
    pub(super) branched: bool,
    /// Whether one of its bonds is delocalised.
    pub(super) delocalised: bool,
    /// Whether one of its bonds is written as double, triple or quadruple.
    pub(super) multiple: bool,
    pub(super) degree: u32,
    /// The sum of its bond orders, a delocalised bond counted as 1.
    pub(super) order_sum: u32,
    pub(super) offset: u32,
    pub(super) width: u32,
    first: u32,
    last: u32,
}

impl AtomSyntax {
    /// An atom without bonds yet; `place` is the offset and width of its text.
    #[inline]
    pub(super) fn new(token: AtomToken, preceded: bool, place: (u32, u32)) -> Self {
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

    /// Whether an aromatic bond symbol belongs here by the standard.
    pub(super) fn may_be_aromatic(&self) -> bool {
        self.aromatic || self.is_wildcard()
    }

    fn is_wildcard(&self) -> bool {
        self.atom.element == Element::WILDCARD
    }
}

/// One end of a bond, in the list of the atom that it sits on.
#[derive(Debug, Clone, Copy)]
struct Place {
    other: u32,
    bond: u32,
    next: u32,
}

/// Atoms and bonds of one record. Indices into `atoms` and `bonds` are made by [`Syntax::push_atom`]
/// and [`Syntax::link`] only, so they always exist.
#[derive(Debug, Default)]
pub(super) struct Syntax {
    pub(super) atoms: Vec<AtomSyntax>,
    pub(super) bonds: Vec<BondSyntax>,
    places: Vec<Place>,
    pub(super) has_tags: bool,
    pub(super) has_slopes: bool,
    pub(super) has_open: bool,
}

impl Syntax {
    pub(super) fn clear(&mut self) {
        self.atoms.clear();
        self.bonds.clear();
        self.places.clear();
        self.has_tags = false;
        self.has_slopes = false;
        self.has_open = false;
    }

    #[inline]
    pub(super) fn push_atom(&mut self, atom: AtomSyntax) -> u32 {
        self.has_tags |= atom.tag.is_some();
        self.atoms.push(atom);
        (self.atoms.len() - 1) as u32
    }

    /// Takes the next place in the text order of the atom's bonds, to be filled by
    /// [`Syntax::link_places`].
    pub(super) fn reserve_place(&mut self, atom: u32) -> u32 {
        self.push_place(atom, NONE, NONE)
    }

    #[inline]
    fn push_place(&mut self, atom: u32, other: u32, bond: u32) -> u32 {
        let place = self.places.len() as u32;
        self.places.push(Place {
            other,
            bond,
            next: NONE,
        });
        let owner = &mut self.atoms[atom as usize];
        let last = std::mem::replace(&mut owner.last, place);
        if last == NONE {
            owner.first = place;
        } else {
            self.places[last as usize].next = place;
        }
        place
    }

    /// Adds a bond between two atoms, last in the text order of both so far.
    #[inline]
    pub(super) fn link(&mut self, a: u32, b: u32, kind: BondKind, slope: Slope, place: (u32, u32)) {
        let bond = self.bonds.len() as u32;
        self.push_place(a, b, bond);
        self.push_place(b, a, bond);
        self.push_bond([a, b], kind, slope, place);
    }

    /// Adds a bond whose two places have been reserved.
    pub(super) fn link_places(
        &mut self,
        ends: [u32; 2],
        places: [u32; 2],
        kind: BondKind,
        slope: Slope,
        place: (u32, u32),
    ) {
        let bond = self.bonds.len() as u32;
        for (place, other) in places.into_iter().zip([ends[1], ends[0]]) {
            let place = &mut self.places[place as usize];
            place.other = other;
            place.bond = bond;
        }
        self.push_bond(ends, kind, slope, place);
    }

    #[inline]
    fn push_bond(&mut self, ends: [u32; 2], kind: BondKind, slope: Slope, place: (u32, u32)) {
        let pairs = match kind {
            BondKind::Order(order) => u32::from(order.pairs()),
            BondKind::Delocalised | BondKind::Open => 1,
        };
        for atom in ends {
            let atom = &mut self.atoms[atom as usize];
            atom.degree += 1;
            atom.order_sum += pairs;
            atom.multiple |= pairs > 1;
            atom.delocalised |= kind == BondKind::Delocalised;
        }
        self.has_slopes |= slope != Slope::Unmarked;
        self.has_open |= kind == BondKind::Open;
        let (offset, width) = place;
        self.bonds.push(BondSyntax {
            ends,
            kind,
            slope,
            used: false,
            offset,
            width,
        });
    }

    /// What a bond without a symbol is: delocalised between aromatic atoms, single otherwise.
    #[inline]
    pub(super) fn elided_kind(&self, a: u32, b: u32) -> BondKind {
        let (a, b) = (&self.atoms[a as usize], &self.atoms[b as usize]);
        match (a.aromatic, b.aromatic) {
            (true, true) => BondKind::Delocalised,
            (true, false) if b.is_wildcard() => BondKind::Open,
            (false, true) if a.is_wildcard() => BondKind::Open,
            _ => BondKind::Order(BondOrder::Single),
        }
    }

    /// What a bond symbol means between two atoms; `None` for an aromatic symbol at an atom that is
    /// not aromatic and without brackets: its hydrogens cannot be told.
    pub(super) fn bond_kind(&self, symbol: BondSymbol, a: u32, b: u32) -> Option<BondKind> {
        match symbol {
            BondSymbol::Order(order) => Some(BondKind::Order(order)),
            BondSymbol::Directional { .. } => Some(BondKind::Order(BondOrder::Single)),
            BondSymbol::Elided => Some(self.elided_kind(a, b)),
            BondSymbol::Aromatic => {
                let fits = |atom: &AtomSyntax| atom.bracket || atom.may_be_aromatic();
                let both = fits(&self.atoms[a as usize]) && fits(&self.atoms[b as usize]);
                both.then_some(BondKind::Delocalised)
            }
        }
    }

    /// Says what an [`BondKind::Open`] bond is.
    pub(super) fn settle(&mut self, bond: u32, delocalised: bool) {
        let bond = &mut self.bonds[bond as usize];
        if !delocalised {
            bond.kind = BondKind::Order(BondOrder::Single);
            return;
        }
        bond.kind = BondKind::Delocalised;
        for atom in bond.ends {
            self.atoms[atom as usize].delocalised = true;
        }
    }

    /// The neighbours of an atom in the order in which their bonds are written, each with its bond.
    pub(super) fn neighbours(&self, atom: u32) -> impl Iterator<Item = (u32, u32)> + '_ {
        let mut place = self.atoms[atom as usize].first;
        std::iter::from_fn(move || {
            let here = self.places.get(place as usize)?;
            place = here.next;
            Some((here.other, here.bond))
        })
    }

    /// The neighbour and bond at a place, and the place after it; `None` past the last one.
    pub(super) fn step(&self, place: u32) -> Option<(u32, u32, u32)> {
        self.places
            .get(place as usize)
            .map(|here| (here.other, here.bond, here.next))
    }

    /// The first place of an atom.
    pub(super) fn first_place(&self, atom: u32) -> u32 {
        self.atoms[atom as usize].first
    }

    /// Whether a bond is written as double.
    pub(super) fn is_double(&self, bond: u32) -> bool {
        self.bonds[bond as usize].kind == BondKind::Order(BondOrder::Double)
    }

    /// Whether an atom lies inside a row of cumulated double bonds: two of them and nothing else.
    pub(super) fn is_cumulated(&self, atom: u32) -> bool {
        let here = &self.atoms[atom as usize];
        here.degree == 2
            && here.atom.hydrogens == 0
            && self.neighbours(atom).all(|(_, bond)| self.is_double(bond))
    }
}
