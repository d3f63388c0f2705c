//! The tautomer axis: where mobile hydrogens sit.

use molkin_graph::{
    BondOrder, Mark, OrderError, Orderer, Revised, Revision, StereoElement, Tautomer,
};

use crate::{PrepareError, Relation, StereoKind, Structure, relate};

use super::{Axis, Change, FormError, Outcome, remembering};

/// Brings mobile hydrogens to where every tautomer of the record has them.
///
/// Where regions allow a shift of oxidation states, as for a saturated ring beside an azole, the
/// tautomer that stands for the class may lie in a narrower one. Such a record has no form: it is an
/// error, never a key that follows the drawing.
pub(super) fn normalise(
    orderer: &mut Orderer,
    structure: &Structure,
) -> Result<Option<Outcome>, FormError> {
    let Some(outcome) = step(orderer, structure)? else {
        return Ok(None);
    };
    let form = Structure::new(orderer, outcome.revised.molecule.clone())?;
    let Some(again) = step(orderer, &form)? else {
        return Ok(Some(outcome));
    };
    let again = Structure::new(orderer, again.revised.molecule)?;
    if form.canonical().same_compound(again.canonical()) {
        Ok(Some(outcome))
    } else {
        Err(FormError::Unsettled {
            axis: Axis::Tautomer,
        })
    }
}

/// The form, not checked.
fn step(orderer: &mut Orderer, structure: &Structure) -> Result<Option<Outcome>, FormError> {
    let mut revision = remembering(structure);
    // A mark that counts for nothing as drawn is not to count elsewhere.
    let elements = structure.canonical().stereo_elements();
    let given = |element: &&StereoElement| matches!(element.mark, Mark::Given(_));
    let places: Vec<[u32; 2]> = elements
        .iter()
        .filter(given)
        .map(|e| ascending(e.centres))
        .collect();
    revision.retain_stereo(|mark| places.contains(&ascending(mark.centres)));
    let marked = revision.finish()?;
    let found = orderer.tautomer(&marked.molecule).map_err(out_of_steps)?;
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

/// Whether two forms are the same but for marks that either side bears at places which some tautomer
/// lacks, and whose marks do not contradict each other: a ketone with a marked α centre and its enol, an
/// enol with a marked double bond and its ketone.
pub(super) fn agree(
    orderer: &mut Orderer,
    a: &Structure,
    b: &Structure,
) -> Result<bool, FormError> {
    let verdict = relate(orderer, a, b).map_err(PrepareError::from)?;
    if verdict.relation != Relation::Stereo(StereoKind::Undetermined) {
        return Ok(false);
    }
    let [Some(a), Some(b)] = [everywhere(orderer, a)?, everywhere(orderer, b)?] else {
        return Ok(false);
    };
    Ok(a.canonical().same_compound(b.canonical()))
}

/// The form with the marks alone that every tautomer bears; `None` where stereo groups, or centres that
/// are not tetrahedral, hold marks together.
fn everywhere(orderer: &mut Orderer, form: &Structure) -> Result<Option<Structure>, FormError> {
    let molecule = form.molecule();
    if !molecule.stereo_groups().is_empty() || !molecule.drawn_coordination().is_empty() {
        return Ok(None);
    }
    let found = orderer.tautomer(molecule).map_err(out_of_steps)?;
    let erased = found.map(|tautomer| tautomer.erased).unwrap_or_default();
    let mut revision = Revision::of(molecule);
    revision.clear_stereo();
    let marks = molecule.drawn_stereo().iter();
    let marks = marks.chain(molecule.remembered_stereo());
    for mark in marks.filter(|mark| !erased.contains(&ascending(mark.centres))) {
        revision.remember(*mark);
    }
    let stripped = Structure::new(orderer, revision.finish()?.molecule)?;
    let normalised = normalise(orderer, &stripped)?;
    Ok(Some(match normalised {
        Some(outcome) => Structure::new(orderer, outcome.revised.molecule)?,
        None => stripped,
    }))
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

#[cfg(test)]
mod tests {
    use molkin_graph::{Limits, Orderer};
    use rstest::rstest;

    use crate::{Normaliser, forms::tests::structure, relate, same_apart_from};

    /// Rules by name as in Dhaked, Guasch & Nicklaus, J. Chem. Inf. Model. 2020, 60, 1253; near misses are
    /// decisions of docs/definitions.md.
    #[rstest]
    #[case::keto_enol("CC(=O)C", "CC(O)=C", Some("tautomer"))]
    #[case::lactam_lactim("O=c1cccc[nH]1", "Oc1ccccn1", Some("tautomer"))]
    #[case::annular("Cc1c[nH]cn1", "Cc1cnc[nH]1", Some("tautomer"))]
    #[case::thioamide("CC(N)=S", "CC(S)=N", Some("tautomer"))]
    #[case::imine_enamine("CC(=NC)C", "CC(NC)=C", Some("tautomer"))]
    #[case::nitroso_oxime("CC(C)=NO", "CC(C)N=O", Some("tautomer"))]
    #[case::nitro_aci("CC[N+](=O)[O-]", "CC=[N+](O)[O-]", Some("tautomer"))]
    #[case::cyanamide("CNC#N", "CN=C=N", Some("tautomer"))]
    #[case::phosphite("COP(=O)OC", "COP(O)OC", Some("tautomer"))]
    #[case::adenine("Nc1ncnc2[nH]cnc12", "Nc1ncnc2nc[nH]c12", Some("tautomer"))]
    #[case::marked_enol("CC(=O)CC(C)=O", "C/C(O)=C/C(C)=O", Some("tautomer"))]
    #[case::enol_of_a_marked_ketone("C[C@@H]1CCCCC1=O", "CC1=C(O)CCCC1", Some("tautomer"))]
    #[case::opposed_centres("C[C@@H]1CCCCC1=O", "C[C@H]1CCCCC1=O", Some("stereo"))]
    #[case::allyl_alcohol("C=CCO", "CCC=O", None)]
    #[case::glyceraldehyde("OCC(O)C=O", "OCC(=O)CO", None)]
    #[case::enol_drawn_of_an_acid("CC(=O)O", "C=C(O)O", Some("tautomer"))]
    #[case::hydrocarbons("CCC=CC", "CCCC=C", None)]
    fn pairs(#[case] a: &str, #[case] b: &str, #[case] expected: Option<&str>) {
        let mut orderer = Orderer::new(Limits::default());
        let mut normaliser = Normaliser::new(Limits::default());
        let (a, b) = (structure(a), structure(b));
        let relation = relate(&mut orderer, &a, &b).unwrap().relation;
        let apart = same_apart_from(&mut normaliser, relation, &a, &b).unwrap();
        assert_eq!(apart.map(|axes| axes.to_string()).as_deref(), expected);
    }
}
