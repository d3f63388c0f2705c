//! The isotope axis: total labels and positions.

use molkin_graph::Revision;

use crate::Structure;

use super::{Change, FormError, Outcome};

/// Leaves out all mass numbers. An arrangement that exists by them alone is part of where the labels
/// sit, so it falls away with them.
pub(super) fn normalise(structure: &Structure) -> Result<Option<Outcome>, FormError> {
    let molecule = structure.molecule();
    let labelled = (0..).zip(molecule.atoms());
    let labelled = labelled.filter_map(|(index, atom)| atom.isotope.map(|_| index));
    let labelled: Vec<u32> = labelled.collect();
    if labelled.is_empty() {
        return Ok(None);
    }
    let mut revision = Revision::of(molecule);
    for &atom in &labelled {
        if let Some(atom) = revision.atom_mut(atom) {
            atom.isotope = None;
        }
    }
    let changes = labelled.into_iter().map(|atom| Change::Isotope { atom });
    Ok(Some(Outcome {
        revised: revision.finish()?,
        changes: changes.collect(),
    }))
}
