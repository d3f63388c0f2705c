//! What makes the difference between two records.

mod branching;
mod constitution;
mod coordination;
mod functional;
mod left_over;
pub mod moves;
mod named;
mod rings;
mod stereo;
mod stereo_groups;

use molkin_graph::Limits;

use crate::{FunctionalGroup, Relation, Structure};

pub use branching::{BranchPoint, Branching};
pub use constitution::{BondDifference, HydrogenDifference};
pub use left_over::LeftOver;
pub(crate) use left_over::surplus;
pub use rings::{RingJoin, RingSystem};
pub use stereo::{Geometry, StereoChange, StereoDifference};

/// What accounts for a relation, on the atoms of both records (from 0, in input order).
#[derive(Debug, Clone, PartialEq, Eq, Default)]
pub struct Explanation {
    /// The atom map: non-hydrogen atoms of A and of B, by A's number. Empty for identical records.
    pub atom_map: Vec<(u32, u32)>,
    /// Bonds kept, lost and changed under the map.
    pub bonds: Option<BondDifference>,
    /// Mapped atoms that carry different numbers of hydrogens.
    pub hydrogens: Vec<HydrogenDifference>,
    /// What the map leaves over of A and of B; nothing of isomers.
    pub left_over: [Vec<LeftOver>; 2],
    /// Branch points and main chains of both records, where constitution differs.
    pub branching: Option<[Branching; 2]>,
    /// The ring systems of both records, where constitution differs.
    pub rings: Option<[Vec<RingSystem>; 2]>,
    /// Functional groups that A has more often than B, and B than A, where constitution differs. `None`
    /// also where a group is too symmetric for the step limit.
    pub functional_groups: Option<[Vec<FunctionalGroup>; 2]>,
    /// What moved, the most telling first; nothing for records too far apart to tell it piece by piece.
    pub findings: Vec<moves::Finding>,
    /// Stereo elements that differ under the map.
    pub stereo: Vec<StereoDifference>,
    /// Whether the map is proved to disturb as few stereo elements as any.
    pub stereo_least: bool,
    /// Steps that the search for the map took.
    pub steps: u64,
}

/// Explains a relation that [`crate::relate`] found.
///
/// Where the constitution differs it searches for the atom map of least distance (docs/definitions.md)
/// within `limits.map_steps`; where the budget ends first, the best map found is given and
/// [`BondDifference::minimal`] is false. Records of different formula have atoms left over. For stereo relations it takes, of the maps that keep the
/// constitution, one that disturbs the fewest stereo elements. `explain(a, b)` and `explain(b, a)`
/// mirror each other.
///
/// # Examples
/// ```
/// use molkin_formats::smiles;
/// use molkin_graph::{Limits, Orderer};
/// use molkin_relate::{Relation, Structure, explain};
///
/// let limits = Limits::default();
/// let mut orderer = Orderer::new(limits.clone());
/// let a = Structure::new(&mut orderer, smiles::parse("CCCO")?)?;
/// let b = Structure::new(&mut orderer, smiles::parse("CC(O)C")?)?;
/// let explanation = explain(&a, &b, Relation::Constitutional, &limits);
/// let bonds = explanation.bonds.unwrap_or_default();
/// assert_eq!((bonds.only_in_a.len(), bonds.only_in_b.len()), (1, 1));
/// assert!(bonds.minimal);
/// # Ok::<(), Box<dyn std::error::Error>>(())
/// ```
pub fn explain(a: &Structure, b: &Structure, relation: Relation, limits: &Limits) -> Explanation {
    match relation {
        Relation::Identical => Explanation {
            stereo_least: true,
            ..Explanation::default()
        },
        Relation::Constitutional | Relation::NotIsomers => constitution::explain(a, b, limits),
        Relation::Stereo(_) => stereo::explain(a, b, limits),
    }
}
