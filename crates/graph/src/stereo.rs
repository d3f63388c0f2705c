//! Stereo elements: which places of a molecule can be stereogenic, and what a record marks there.
//!
//! This stage looks at each place and its surroundings only. Whether symmetry makes a place
//! stereogenic, and what the marks then claim, is decided in [`crate::claims`].

mod bridgehead;
mod coordination;
mod double_bond;
mod labile;
mod marks;
mod remembered;
mod tetrahedral;
mod undrawable;

use crate::{
    Molecule, Parity, Shape,
    mesomer::Mesomer,
    order::{Placed, Unit},
    skeleton::Skeleton,
};

pub(crate) use bridgehead::Cage;
use marks::Mark;
use tetrahedral::Eligible;
pub use undrawable::Undrawable;

/// Ligands that are no atoms, as numbers above every atom. Hydrogens by isotope first.
pub(crate) mod slot {
    /// Hydrogen of natural composition; mass numbers 1, 2 and 3 follow.
    pub(crate) const HYDROGEN: u32 = u32::MAX - 8;
    /// A lone pair.
    pub(crate) const LONE_PAIR: u32 = u32::MAX - 1;
}

/// A place that can carry a mark.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(crate) struct Candidate {
    pub(crate) shape: Shape,
    /// Skeleton atoms.
    pub(crate) centres: [u32; 2],
    /// Skeleton atoms or [`slot`] numbers.
    pub(crate) ligands: [u32; 4],
    /// The mark, if there is one.
    pub(crate) parity: Option<Parity>,
    /// A mark counts here, but its absence leaves nothing open.
    pub(crate) quiet: bool,
    /// The place is none of the molecule's own: a mark that was erased here counts.
    pub(crate) remembered: bool,
}

impl Candidate {
    /// The unit for the canonical search with a given parity.
    pub(crate) fn unit(&self, odd: bool) -> Unit {
        let shape = match self.shape {
            Shape::Tetrahedral => 0,
            Shape::DoubleBond => 1,
            Shape::Axis => 2,
        };
        let colour = if self.remembered { shape + 3 } else { shape };
        Unit {
            centres: self.centres,
            ligands: self.ligands,
            odd,
            colour,
        }
    }

    /// Whether reflection in a mirror inverts the element.
    pub(crate) fn is_chiral(&self) -> bool {
        self.shape != Shape::DoubleBond
    }
}

/// Why a mark of the record counts for nothing.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord)]
#[non_exhaustive]
pub enum Dropped {
    /// The atom or bond cannot be stereogenic: not enough different ligands, or not such an atom.
    NotStereogenic,
    /// An amine nitrogen, which inverts.
    AmineNitrogen,
    /// A C=N bond of an amidine, guanidine, imidate or N–H imine.
    LabileDoubleBond,
    /// Phosphorus or sulfur whose mark depends on which oxygen bears a hydrogen.
    MobileHydrogen,
    /// A mobile or ring double bond whose smallest ring has fewer than eight members.
    SmallRing,
    /// The mark does not fit the ligands that the atom has.
    Misfit,
}

/// All candidates of a molecule and what became of its marks.
#[derive(Debug, Default, Clone)]
pub(crate) struct Perception {
    pub(crate) candidates: Vec<Candidate>,
    /// Sets of bridgeheads that determine each other.
    pub(crate) cages: Vec<Cage>,
    /// Marks that fell away, by skeleton atom.
    pub(crate) dropped: Vec<(Dropped, [u32; 2])>,
    /// Cages whose marks no cage can have: they count as drawn.
    pub(crate) impossible: Vec<Vec<u32>>,
    pub(crate) undrawable: Vec<Undrawable>,
    /// Arrangements about centres that are not tetrahedral.
    pub(crate) placed: Vec<Placed>,
    /// How many of the candidates are the molecule's own tetrahedral ones: these come first, by atom.
    tetrahedral: usize,
    /// Centres, the lower first, of all others, and candidates; sorted.
    places: Vec<([u32; 2], usize)>,
}

/// Scratch that is reused from one molecule to the next.
#[derive(Debug, Default)]
pub(crate) struct Scratch {
    marks: Vec<Mark>,
    /// Per atom: what it is as a possible centre.
    eligible: Vec<Option<Eligible>>,
    bridgeheads: bridgehead::Scratch,
    /// Atoms that the search for a small ring has seen.
    seen: Vec<u32>,
}

impl Perception {
    /// Finds all candidates and puts the record's marks on them.
    pub(crate) fn load(
        &mut self,
        skeleton: &Skeleton,
        mesomer: &Mesomer,
        molecule: &Molecule,
        scratch: &mut Scratch,
    ) {
        let Scratch {
            marks,
            eligible,
            bridgeheads,
            seen,
        } = scratch;
        self.candidates.clear();
        self.dropped.clear();
        self.impossible.clear();
        self.cages.clear();
        self.undrawable.clear();
        marks::on_skeleton(marks, skeleton, molecule.drawn_stereo());
        tetrahedral::find(self, skeleton, mesomer, marks, eligible, bridgeheads);
        self.tetrahedral = self.candidates.len();
        double_bond::find(self, skeleton, mesomer, marks, seen);
        let places = self.candidates.iter().enumerate().skip(self.tetrahedral);
        self.places.clear();
        self.places
            .extend(places.map(|(index, c)| (ascending(c.centres), index)));
        self.places.sort_unstable();
        marks::apply(self, skeleton, mesomer, marks, seen);
        bridgehead::bind(self, bridgeheads);
        coordination::load(self, skeleton, molecule.drawn_coordination());
    }

    /// The candidate at a tetrahedral centre (given twice) or a pair of ends.
    pub(crate) fn candidate_at(&self, centres: [u32; 2]) -> Option<usize> {
        let tetrahedral = &self.candidates[..self.tetrahedral];
        if centres[0] == centres[1]
            && let Ok(index) =
                tetrahedral.binary_search_by_key(&centres[0], |candidate| candidate.centres[0])
        {
            return Some(index);
        }
        let at = self
            .places
            .binary_search_by_key(&ascending(centres), |place| place.0)
            .ok()?;
        Some(self.places[at].1)
    }
}

fn ascending([a, b]: [u32; 2]) -> [u32; 2] {
    [a.min(b), a.max(b)]
}
