//! Remarks on records and pairs: a stable code, the atoms, a sentence.

use molkin_graph::{Dropped, GraphError, Labelling, Mark, Molecule, Remark, Shape, Undrawable};

use crate::{FormError, Relation, Structure};

/// A remark about one record. Atoms from 0; in the text they have their numbers.
#[derive(Debug, Clone, PartialEq, Eq)]
pub(crate) struct Noted {
    pub(crate) code: &'static str,
    pub(crate) atoms: Vec<u32>,
    pub(crate) text: String,
}

/// "atom 3", "atoms 3 and 4", "atoms 3, 4 and 7".
pub(crate) fn atoms_in_words(molecule: &Molecule, atoms: &[u32]) -> String {
    let numbers = atoms.iter().map(|&atom| molecule.number(atom).to_string());
    let numbers: Vec<String> = numbers.collect();
    match numbers.as_slice() {
        [] => "no atom".to_owned(),
        [one] => format!("atom {one}"),
        [rest @ .., last] => format!("atoms {} and {last}", rest.join(", ")),
    }
}

/// What is to be said about a record on its own.
pub(crate) fn of_record(structure: &Structure) -> Vec<Noted> {
    structure
        .canonical()
        .remarks()
        .iter()
        .filter_map(|remark| of_remark(structure.molecule(), remark))
        .collect()
}

fn of_remark(molecule: &Molecule, remark: &Remark) -> Option<Noted> {
    let (code, atoms, text) = match remark {
        Remark::MarkDropped { reason, atoms } => {
            let (code, why) = dropped(*reason);
            let text = format!(
                "The stereo mark at {} counts for nothing: {why}.",
                atoms_in_words(molecule, atoms)
            );
            (code, atoms.clone(), text)
        }
        Remark::MarkIdle { atoms } => (
            "mark-idle",
            atoms.clone(),
            format!(
                "The stereo mark at {} says nothing: by symmetry, or because other elements are unmarked, both arrangements give the same.",
                atoms_in_words(molecule, atoms)
            ),
        ),
        Remark::ImpossibleCage { atoms } => (
            "impossible-cage",
            atoms.clone(),
            format!(
                "The bridgeheads ({}) are marked in a way that rings of this size cannot have; the marks count as drawn.",
                atoms_in_words(molecule, atoms)
            ),
        ),
        Remark::PartlyMarkedMobileBonds { atoms } => (
            "partly-marked-mobile-bonds",
            atoms.clone(),
            format!(
                "Only some of the mobile double bonds carry a mark; those at {} do not.",
                atoms_in_words(molecule, atoms)
            ),
        ),
        Remark::BondShiftRing { atoms } => (
            "bond-shift",
            atoms.clone(),
            format!(
                "The two bond-shift forms of the ring ({}) count as one structure.",
                atoms_in_words(molecule, atoms)
            ),
        ),
        Remark::NotDrawn(Undrawable::HinderedAxis { atoms }) => (
            "axis-not-marked",
            atoms.to_vec(),
            format!(
                "Rotation about the bond between {} may be hindered; the record does not say which arrangement is meant.",
                atoms_in_words(molecule, atoms)
            ),
        ),
        Remark::NotDrawn(Undrawable::MetalCentre { atom }) => (
            "metal-not-marked",
            vec![*atom],
            format!(
                "The arrangement about the metal (atom {}) is not said by this record.",
                molecule.number(*atom)
            ),
        ),
        _ => return None,
    };
    Some(Noted { code, atoms, text })
}

fn dropped(reason: Dropped) -> (&'static str, &'static str) {
    match reason {
        Dropped::AmineNitrogen => ("mark-on-amine-nitrogen", "amine nitrogen inverts"),
        Dropped::LabileDoubleBond => (
            "mark-on-labile-double-bond",
            "the geometry of this double bond is not kept",
        ),
        Dropped::MobileHydrogen => (
            "mark-depends-on-mobile-hydrogen",
            "it depends on which of two like atoms bears a hydrogen",
        ),
        Dropped::SmallRing => (
            "mark-in-small-ring",
            "in a ring of fewer than eight atoms there is no choice",
        ),
        Dropped::Misfit => ("mark-misfit", "it does not fit the ligands that are drawn"),
        _ => ("mark-not-stereogenic", "the place cannot be stereogenic"),
    }
}

/// The remark that open, undetermined and unresolved records get: what each leaves unmarked.
pub(crate) fn unmarked(structure: &Structure) -> Option<Noted> {
    let mut atoms: Vec<u32> = structure
        .canonical()
        .stereo_elements()
        .iter()
        .filter(|element| element.mark == Mark::Absent && !element.quiet)
        .flat_map(|element| element.centres)
        .collect();
    atoms.sort_unstable();
    atoms.dedup();
    (!atoms.is_empty()).then(|| Noted {
        code: "unmarked-stereo",
        text: format!(
            "Stereogenic but unmarked: {}.",
            atoms_in_words(structure.molecule(), &atoms)
        ),
        atoms,
    })
}

/// The remark on a meso compound.
pub(crate) fn meso(structure: &Structure) -> Option<Noted> {
    if structure.canonical().is_meso() != Some(true) {
        return None;
    }
    let elements = structure.canonical().stereo_elements();
    let centres = elements.iter().filter(|element| {
        element.shape == Shape::Tetrahedral && matches!(element.mark, Mark::Given(_))
    });
    let atoms: Vec<u32> = centres.map(|element| element.centres[0]).collect();
    Some(Noted {
        code: "meso",
        text: format!(
            "A meso compound: it has stereocentres ({}), but its mirror image is itself.",
            atoms_in_words(structure.molecule(), &atoms)
        ),
        atoms,
    })
}

/// The remarks on marked elements without a CIP label. `labels` are those of the stereo elements.
pub(crate) fn unlabelled(structure: &Structure, labels: &[Labelling]) -> Vec<Noted> {
    let elements = structure.canonical().stereo_elements();
    let atoms = |of: Labelling| {
        let found = elements
            .iter()
            .zip(labels)
            .filter(|&(_, label)| *label == of);
        let mut atoms: Vec<u32> = found.flat_map(|(element, _)| element.centres).collect();
        atoms.sort_unstable();
        atoms.dedup();
        atoms
    };
    let metals = structure.canonical().coordination_elements();
    let metals: Vec<u32> = metals.iter().map(|element| element.centre).collect();
    let causes = [
        (
            "label-limit",
            atoms(Labelling::OverLimit),
            "the step limit was reached",
        ),
        (
            "label-undecided",
            atoms(Labelling::Undecided),
            "the sequence rules do not rank the ligands as far as the record marks them",
        ),
        (
            "label-undefined",
            metals,
            "R and S are for tetrahedral centres",
        ),
    ];
    let without_label = causes.into_iter().filter(|(_, atoms, _)| !atoms.is_empty());
    without_label
        .map(|(code, atoms, why)| Noted {
            code,
            text: format!(
                "No CIP label at {}: {why}.",
                atoms_in_words(structure.molecule(), &atoms)
            ),
            atoms,
        })
        .collect()
}

/// Remarks on a pair as such.
pub(crate) fn of_pair(a: &Structure, b: &Structure, relation: Relation) -> Vec<Noted> {
    let mut notes = Vec::new();
    if relation == Relation::Constitutional && metal_bonds(a) != metal_bonds(b) {
        notes.push(Noted {
            code: "metal-bonds-differ",
            atoms: Vec::new(),
            text: "One record draws a bond to a metal where the other draws ions or none; metals keep their bonds as drawn.".to_owned(),
        });
    }
    if relation == Relation::Identical && multiplicities(a) != multiplicities(b) {
        notes.push(Noted {
            code: "multiplicity-differs",
            atoms: Vec::new(),
            text: "The records state different spin multiplicities; these do not decide identity."
                .to_owned(),
        });
    }
    notes
}

/// Why a pair has a relation and no kind.
pub(crate) fn kind_not_found(error: &GraphError) -> Noted {
    Noted {
        code: "kind-limit",
        atoms: Vec::new(),
        text: format!("The kind was not found: {error}."),
    }
}

/// Why it is not known on which axes two records differ.
pub(crate) fn forms_not_found(error: &FormError) -> Noted {
    Noted {
        code: "forms-limit",
        atoms: Vec::new(),
        text: format!("Whether the records are forms of one compound was not found: {error}."),
    }
}

fn metal_bonds(structure: &Structure) -> usize {
    let is_metal = |atom: u32| {
        structure
            .molecule()
            .atom(atom)
            .is_some_and(|atom| atom.element.is_metal())
    };
    structure
        .molecule()
        .bonds()
        .filter(|&(a, b, _)| is_metal(a) || is_metal(b))
        .count()
}

fn multiplicities(structure: &Structure) -> Vec<u8> {
    let mut list: Vec<u8> = structure
        .molecule()
        .atoms()
        .filter_map(|atom| atom.multiplicity)
        .collect();
    list.sort_unstable();
    list
}
