//! The stereo axis: arrangement in space, and what is claimed about it, left out wholly.

use molkin_graph::Revision;

use crate::Structure;

use super::{Change, FormError, Outcome};

/// Leaves out all marks, stereo groups and arrangements about metals.
pub(super) fn normalise(structure: &Structure) -> Result<Option<Outcome>, FormError> {
    let molecule = structure.molecule();
    let unmarked = molecule.drawn_stereo().is_empty()
        && molecule.drawn_coordination().is_empty()
        && molecule.remembered_stereo().is_empty()
        && molecule.stereo_groups().is_empty();
    if unmarked {
        return Ok(None);
    }
    let mut revision = Revision::of(molecule);
    revision.clear_stereo();
    Ok(Some(Outcome {
        revised: revision.finish()?,
        changes: vec![Change::Stereo],
    }))
}
