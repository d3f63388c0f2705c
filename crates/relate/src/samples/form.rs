//! Whether two records are forms of one compound.

use molkin_graph::Key;

use crate::Structure;

/// The axes, fewest first, that make two records one when they are overlooked: `salt`, `charge`,
/// `tautomer`, `isotope`, `stereo`. `None` where nothing does.
pub(super) fn same_apart_from(_: &Structure, _: &Structure) -> Option<Vec<&'static str>> {
    None
}

/// The key of what a record has in common with its other forms and stereoisomers.
pub(super) fn family(structure: &Structure) -> Key {
    structure.canonical().constitution_key()
}
