//! What the text says, before chemistry is read into it: atoms, bonds, and for each atom the order
//! in which its bonds are written. Flat arrays that a reader reuses from record to record.

use molkin_graph::BondOrder;

mod atom;

pub(super) use self::atom::{AtomSyntax, AtomToken, StereoTag, TagClass};

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

impl BondKind {
    /// Electron pairs as they count towards the valence, one for a bond of an aromatic system.
    fn pairs(self) -> u32 {
        match self {
            Self::Order(order) => u32::from(order.pairs()),
            Self::Delocalised | Self::Open => 1,
        }
    }
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
    /// How many double bonds make use of the slope.
    pub(super) uses: u8,
    pub(super) offset: u32,
    pub(super) width: u32,
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
        let place = self.places.len() as u32;
        self.places.push(Place {
            other: NONE,
            bond: NONE,
            next: NONE,
        });
        self.append(atom, place);
        place
    }

    /// Puts a place behind the others of its atom.
    #[inline]
    fn append(&mut self, atom: u32, place: u32) {
        let last = self.atoms[atom as usize].append(place);
        if let Some(last) = self.places.get_mut(last as usize) {
            last.next = place;
        }
    }

    /// Adds a bond between two atoms, last in the text order of both so far.
    #[inline]
    pub(super) fn link(&mut self, a: u32, b: u32, kind: BondKind, slope: Slope, place: (u32, u32)) {
        let bond = self.bonds.len() as u32;
        let first = self.places.len() as u32;
        self.places.extend([b, a].map(|other| Place {
            other,
            bond,
            next: NONE,
        }));
        let pairs = kind.pairs();
        for (atom, place) in [(a, first), (b, first + 1)] {
            self.atoms[atom as usize].count(kind, pairs);
            self.append(atom, place);
        }
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
        for atom in ends {
            self.atoms[atom as usize].count(kind, kind.pairs());
        }
        self.push_bond(ends, kind, slope, place);
    }

    #[inline]
    fn push_bond(&mut self, ends: [u32; 2], kind: BondKind, slope: Slope, place: (u32, u32)) {
        self.has_slopes |= slope != Slope::Unmarked;
        self.has_open |= kind == BondKind::Open;
        let (offset, width) = place;
        self.bonds.push(BondSyntax {
            ends,
            kind,
            slope,
            uses: 0,
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
