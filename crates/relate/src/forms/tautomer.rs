//! The tautomer axis: where mobile hydrogens sit.

use molkin_graph::{
    BondOrder, Limits, Mark, OrderError, Orderer, Revised, Revision, StereoElement, Tautomer,
};

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
    // A mark that counts for nothing as drawn is not to count elsewhere.
    let elements = structure.canonical().stereo_elements();
    let given = |element: &&StereoElement| matches!(element.mark, Mark::Given(_));
    let places: Vec<[u32; 2]> = elements.iter().filter(given).map(|e| ascending(e.centres)).collect();
    revision.retain_stereo(|mark| places.contains(&ascending(mark.centres)));
    let marked = revision.finish()?;
    let found = orderer
        .tautomer(&marked.molecule)
        .map_err(out_of_steps)?;
    let Some(tautomer) = found else {
        return Ok(None);
    };
    let mut revision = Revision::of(&marked.molecule);
    apply(&mut revision, &tautomer);
    let mut revised = revision.finish()?;
    for atom in &mut revised.sources {
        *atom = marked.sources.get(*atom as usize).copied().unwrap_or(*atom);
    }
    Ok(Some(outcome(structure, revised)))
}

fn ascending([a, b]: [u32; 2]) -> [u32; 2] {
    [a.min(b), a.max(b)]
}

fn out_of_steps(error: OrderError) -> FormError {
    match error {
        OrderError::StepLimit { .. } => FormError::StepLimit {
            axis: Axis::Tautomer,
        },
        other => FormError::Prepare(other.into()),
    }
}

/// Lists the hydrogens that moved.
fn outcome(structure: &Structure, revised: Revised) -> Outcome {
    let before = Revision::of(structure.molecule());
    let atoms = revised.molecule.atoms().zip(&revised.sources);
    let changes = atoms.filter_map(|(after, &atom)| {
        let before = before.atom(atom)?;
        let change = after.hydrogens as i8 - before.hydrogens as i8;
        (change != 0).then_some(Change::MobileHydrogens { atom, change })
    });
    Outcome {
        changes: changes.collect(),
        revised,
    }
}

/// Makes the tautomer that stands for the class of the one that the revision started from.
fn apply(revision: &mut Revision, tautomer: &Tautomer) {
    for own in &tautomer.atoms {
        if let Some(atom) = revision.atom_mut(own.atom) {
            atom.hydrogens = own.hydrogens;
            atom.charge = own.charge;
        }
    }
    for &(a, b, pairs) in &tautomer.bonds {
        let mut bonds = revision.bonds().iter();
        let at = bonds.position(|&(x, y, _)| [x, y] == [a, b] || [y, x] == [a, b]);
        if let Some(at) = at {
            revision.set_bond(at, BondOrder::from_pairs(pairs));
        }
    }
}
