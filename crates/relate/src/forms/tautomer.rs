//! The tautomer axis: where mobile hydrogens sit.

use molkin_graph::{BondOrder, Limits, OrderError, Orderer, Revision, Tautomer};

use crate::Structure;

use super::{Axis, Change, FormError, Outcome, remembering};

/// Brings mobile hydrogens to where every tautomer of the record has them.
pub(super) fn normalise(
    orderer: &mut Orderer,
    _limits: &Limits,
    structure: &Structure,
    _ring_chain: bool,
) -> Result<Option<Outcome>, FormError> {
    let mut revision = remembering(structure);
    revision.retain_stereo(|_| false);
    let marked = revision.clone().finish()?;
    let found = orderer
        .tautomer(&marked.molecule)
        .map_err(|error| match error {
            OrderError::StepLimit { .. } => FormError::StepLimit {
                axis: Axis::Tautomer,
            },
            other => FormError::Prepare(other.into()),
        })?;
    let Some(tautomer) = found else {
        return Ok(None);
    };
    let changes = apply(&mut revision, &tautomer, &marked.sources);
    Ok(Some(Outcome {
        revised: revision.finish()?,
        changes,
    }))
}

/// Makes the tautomer that stands for the class of the one that the revision started from.
fn apply(revision: &mut Revision, tautomer: &Tautomer, sources: &[u32]) -> Vec<Change> {
    let source = |atom: u32| sources.get(atom as usize).copied().unwrap_or(atom);
    let mut changes = Vec::new();
    for own in &tautomer.atoms {
        let index = source(own.atom);
        if let Some(atom) = revision.atom_mut(index) {
            let change = own.hydrogens as i8 - atom.hydrogens as i8;
            atom.hydrogens = own.hydrogens;
            atom.charge = own.charge;
            if change != 0 {
                changes.push(Change::MobileHydrogens {
                    atom: index,
                    change,
                });
            }
        }
    }
    for &(a, b, pairs) in &tautomer.bonds {
        let ends = [source(a), source(b)];
        let mut bonds = revision.bonds().iter();
        let at = bonds.position(|&(x, y, _)| [x, y] == ends || [y, x] == ends);
        if let Some(at) = at {
            revision.set_bond(at, BondOrder::from_pairs(pairs));
        }
    }
    changes
}
