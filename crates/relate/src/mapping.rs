//! The atom map of least distance between two structures.
//!
//! The distance of a map is, in this order of weight: (i) bonds between non-hydrogen atoms that only one structure has,
//! (ii) kept bonds whose order differs, (iii) the summed difference in hydrogen count, (iv) atoms that differ in charge,
//! isotope or radical. Finding the least distance is a quadratic assignment problem. It is solved exactly by branch and
//! bound:
//!
//! - `pairs` lists what may be laid on what, `bound` turns it into one linear assignment per element (`assignment`) over
//!   small neighbour matchings (`local`). The reward of a kept bond is shared between its two ends, and shares move until
//!   the bound is tight: first by the dual ascent for quadratic assignment of Hahn & Grant, Oper. Res. 46, 912 (1998),
//!   applied to graphs, then along subgradients (`descent`), which come near to the least bound of all shares.
//! - `search` branches on one atom at a time and leaves out what `symmetry` shows to be a repetition; `node` says what is
//!   done in between, `stage` what is proved one after the other.
//! - `grow` and `polish` give good maps early. They decide nothing. `choice` looks for a better one
//!   of the same distance, `coherence` says which is better, `arrangement` what becomes of stereo elements.
//! - Where the formulae differ, each side gets absent atoms for what only the other has: without bonds and without cost.
//!
//! Invariant of the whole module: atom indices come from `problem`, which checks every index of the input, and pair and
//! slot indices come from `pairs`, which is built from it. All other files index by them without a test.

mod arrangement;
mod assignment;
mod bound;
mod choice;
mod coherence;
mod descent;
mod domain;
mod goal;
mod grow;
mod local;
mod meter;
mod node;
mod pairs;
mod polish;
mod problem;
mod search;
mod shares;
mod stage;
mod structures;
mod symmetry;

#[cfg(test)]
mod oracle;
#[cfg(test)]
mod tests;

use std::sync::atomic::AtomicBool;

use self::{meter::Meter, problem::Problem};

pub(crate) use self::structures::{Heavy, sides};
pub use self::{
    arrangement::{Arm, Arrangement},
    structures::map_structures,
};

/// One structure as the search sees it: non-hydrogen atoms in canonical order.
///
/// The first three lists, of atoms, are equally long. The order decides which of several equally good maps is returned, never the
/// distance.
#[derive(Debug, Clone, Default, PartialEq, Eq, PartialOrd, Ord)]
pub struct Side {
    /// Atomic number of each atom, or any other label that a map must keep.
    pub elements: Vec<u8>,
    /// Hydrogens on each atom.
    pub hydrogens: Vec<u8>,
    /// Charge, isotope and radical of each atom as one label: equal label, nothing differs.
    pub marks: Vec<u32>,
    /// Both atoms and the order class of each bond. Only equality of classes counts; mobile bonds are a class of their own.
    pub bonds: Vec<(u32, u32, u8)>,
    /// The functional group that each atom belongs to, as a label that equal groups share, 0 for none; atoms of groups that
    /// are bonded to each other are in one. It has no part in the distance. May be empty.
    pub groups: Vec<u32>,
    /// The stereo elements that are marked. They have no part in the distance.
    pub stereo: Vec<Arrangement>,
    /// Automorphisms, each as the atoms that it moves with their images, ascending. What they exchange is equally far from
    /// everything, but not in stereo.
    pub symmetries: Vec<Vec<(u32, u32)>>,
}

/// How far a map is from an isomorphism. Compares in the order of the fields.
#[derive(Debug, Clone, Copy, Default, PartialEq, Eq, PartialOrd, Ord)]
pub struct Distance {
    /// (i) Bonds that only one structure has.
    pub bonds: u32,
    /// (ii) Kept bonds whose order class differs.
    pub orders: u32,
    /// (iii) Sum of the differences in hydrogen count.
    pub hydrogens: u32,
    /// (iv) Atoms whose marks differ.
    pub marks: u32,
}

/// Which parts of a [`Distance`] are proved least, each with the parts before it held at their least.
///
/// A part is proved only if those before it are.
#[derive(Debug, Clone, Copy, Default, PartialEq, Eq)]
pub struct Proved {
    /// (i) is least.
    pub bonds: bool,
    /// (ii) is least.
    pub orders: bool,
    /// (iii) is least.
    pub hydrogens: bool,
}

/// The best map found, its distance, and what is known about it.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Mapping {
    /// Atoms of the first and of the second structure, by the first.
    pub pairs: Vec<(u32, u32)>,
    /// Atoms of the first structure that are mapped on nothing, as it has more of their element.
    pub left_over_a: Vec<u32>,
    /// Atoms of the second structure that are mapped on nothing.
    pub left_over_b: Vec<u32>,
    /// The bonds of both structures together.
    pub all_bonds: u32,
    /// The distance of this map.
    pub distance: Distance,
    /// Which parts of the distance are least.
    pub proved: Proved,
    /// No map has fewer bonds that only one structure has.
    pub bonds_at_least: u32,
    /// The search steps that were spent; at most a little above the budget.
    pub steps: u64,
}

/// How much the search may spend.
#[derive(Debug, Clone, Copy)]
pub struct Effort<'s> {
    /// Budget in steps. A step is one small neighbour matching or as much other work, some 70 ns; it is counted, not
    /// timed, so that results repeat.
    pub steps: u64,
    /// Raised from outside to end the search early, as if the budget had ended.
    pub stop: Option<&'s AtomicBool>,
}

impl Default for Effort<'_> {
    fn default() -> Self {
        Self {
            steps: 3_000_000,
            stop: None,
        }
    }
}

/// Why two structures cannot be mapped.
#[derive(Debug, Clone, Copy, PartialEq, Eq, thiserror::Error)]
#[non_exhaustive]
pub enum MappingError {
    /// The lists of a side that should be equally long are not.
    #[error("a structure has {elements} elements, {hydrogens} hydrogen counts and {marks} marks")]
    UnequalLists {
        /// Length of the list of elements.
        elements: usize,
        /// Length of the list of hydrogen counts.
        hydrogens: usize,
        /// Length of the list of marks.
        marks: usize,
    },
    /// A stereo element or a symmetry names an atom that is not there.
    #[error("a stereo element or a symmetry names atom {atom}, which is not there")]
    NoSuchAtom {
        /// The atom.
        atom: u32,
    },
    /// A bond names an atom that is not there, joins an atom to itself, or occurs twice.
    #[error(
        "bond {index} joins atoms {first} and {second}, which is not possible or was said before"
    )]
    BadBond {
        /// Place in the list of bonds, sorted by atoms.
        index: usize,
        /// The lower atom.
        first: u32,
        /// The higher atom.
        second: u32,
    },
}

impl Mapping {
    /// The same map from the second structure to the first.
    fn inverse(mut self) -> Self {
        for pair in &mut self.pairs {
            *pair = (pair.1, pair.0);
        }
        self.pairs.sort_unstable();
        std::mem::swap(&mut self.left_over_a, &mut self.left_over_b);
        self
    }

    /// Whether the structures are too far apart for their differences to be told one by one: at least a third of all bonds
    /// of both, and more than six, are in one only, however the atoms are mapped. Six are three moves, which can be told of
    /// the smallest.
    ///
    /// # Returns
    /// Nothing where the search ended too early to tell: the best map found is that far, but a nearer one may exist.
    pub fn is_unrelated(&self) -> Option<bool> {
        const FEW: u32 = 6;
        let far = |bonds: u32| 3 * u64::from(bonds) >= u64::from(self.all_bonds) && bonds > FEW;
        match (far(self.bonds_at_least), far(self.distance.bonds)) {
            (true, _) => Some(true),
            (false, false) => Some(false),
            (false, true) => None,
        }
    }
}

/// Finds the map of least distance from `a` to `b`.
///
/// As many atoms are mapped as the elements allow; where one structure has more atoms of an element, some of them are left
/// over, and their bonds are bonds that only this structure has.
///
/// # Returns
/// The map, its distance and which parts of it are proved least. With the sides exchanged the result is the inverse map.
/// Of equally distant maps that were met, one is taken that cuts the fewest ring bonds, of these one that keeps most of the
/// functional groups, of these one that disturbs the fewest stereo elements, of these one that leaves the fewest pieces, of
/// these the one with the lexicographically least list of pairs (of the lesser side). Not all equally distant maps are met. When the budget ends first, the best map found is returned and the open parts are not `proved`.
/// # Errors
/// See [`MappingError`].
/// # Complexity
/// Exponential at worst, cut off by the budget. Memory grows with the product of the two bond counts up to a fixed limit;
/// structures beyond it get a map from a linear method, proved only if it happens to be perfect.
/// # Examples
/// ```
/// use molkin_relate::mapping::{Effort, Side, map_atoms};
///
/// // Chloroethane and bromomethane.
/// let a = Side {
///     elements: vec![6, 6, 17],
///     hydrogens: vec![3, 2, 0],
///     marks: vec![0; 3],
///     bonds: vec![(0, 1, 1), (1, 2, 1)],
///     ..Side::default()
/// };
/// let b = Side {
///     elements: vec![6, 35],
///     hydrogens: vec![3, 0],
///     marks: vec![0; 2],
///     bonds: vec![(0, 1, 1)],
///     ..Side::default()
/// };
/// let found = map_atoms(&a, &b, &Effort::default())?;
/// assert_eq!(found.pairs, [(0, 0)]);
/// assert_eq!((found.left_over_a, found.left_over_b), (vec![1, 2], vec![1]));
/// # Ok::<(), molkin_relate::mapping::MappingError>(())
/// ```
pub fn map_atoms(a: &Side, b: &Side, effort: &Effort<'_>) -> Result<Mapping, MappingError> {
    let (a, b) = (problem::normal(a), problem::normal(b));
    // Solving always from the lesser side makes the two directions mirror each other.
    let swapped = b < a;
    let (left, right) = if swapped { (&b, &a) } else { (&a, &b) };
    let problem = Problem::new(left, right)?;
    let mut meter = Meter::new(effort);
    let solution = stage::solve(&problem, &mut meter);
    let mut mapping = Mapping {
        pairs: Vec::new(),
        left_over_a: Vec::new(),
        left_over_b: Vec::new(),
        all_bonds: problem.all_bonds() as u32,
        distance: solution.distance,
        proved: solution.proved,
        bonds_at_least: solution.bonds_at_least,
        steps: solution.steps,
    };
    for (atom, &image) in (0..).zip(&solution.image) {
        let absent = (problem.left.is_absent(atom), problem.right.is_absent(image));
        match absent {
            (false, false) => mapping.pairs.push((atom, image)),
            (false, true) => mapping.left_over_a.push(atom),
            (true, _) => mapping.left_over_b.push(image),
        }
    }
    mapping.left_over_b.sort_unstable();
    Ok(if swapped { mapping.inverse() } else { mapping })
}
