//! On which everyday analysis two compounds can be told apart. Common practice of the laboratory, not a
//! procedure: it says which sort of method can see the difference at all.

use molkin_graph::{Element, Formula, Molecule, monoisotopic_mass};

use crate::{Explanation, Kind, LeftOver, Relation, StereoKind, Structure, Verdict};

/// One sentence, or none for records of the same compound.
pub(crate) fn analysis(
    [a, b]: [&Structure; 2],
    verdict: &Verdict,
    kind: Option<Kind>,
    explained: &Explanation,
) -> Option<String> {
    let text = match verdict.relation {
        Relation::Identical if !verdict.open => return None,
        Relation::Identical => UNMARKED.to_owned(),
        Relation::Stereo(StereoKind::Enantiomers) => "Equal in mass, NMR and achiral chromatography; only a chiral method (chiral chromatography, optical rotation or circular dichroism against a reference) tells enantiomers apart.".to_owned(),
        Relation::Stereo(StereoKind::Diastereomers) => "Mass alone cannot tell: it is equal. NMR and achiral chromatography can.".to_owned(),
        Relation::Stereo(StereoKind::Composition) => "Mass alone cannot tell: it is equal. Chiral chromatography gives the ratio of enantiomers, NMR or achiral chromatography that of diastereomers.".to_owned(),
        Relation::Stereo(StereoKind::Undetermined | StereoKind::Unresolved) => UNMARKED.to_owned(),
        Relation::Constitutional if kind == Some(Kind::ProtonTransfer) => "One compound with its protons elsewhere: pH and the medium decide where they sit, so a solution does not tell the two apart.".to_owned(),
        Relation::Constitutional if kind == Some(Kind::Tautomers) => "Tautomers may turn into each other: a solution of either may show the same mixture in NMR and chromatography.".to_owned(),
        Relation::Constitutional if kind == Some(Kind::Isotopomers) => "Equal mass; NMR of the labelled nuclei, or the masses of fragments, show where the isotopes sit.".to_owned(),
        Relation::Constitutional => "Mass alone cannot tell: it is equal. NMR and achiral chromatography can.".to_owned(),
        Relation::NotIsomers => by_mass(a, b, kind, explained),
    };
    Some(text)
}

/// Where the records leave stereo open, analysis comes first.
const UNMARKED: &str = "Equal mass, and the records leave stereo open: NMR and achiral chromatography tell diastereomers apart, only a chiral method enantiomers.";

/// Salts, solvates and their ratio.
const COUNTER_ION: &str = "What both contain agrees, so mass and NMR of it do; an assay of the counter-ion or the solvent tells them apart.";

/// Protons come and go.
const CHARGE: &str = "One compound in two charge states, which follow from pH and counter-ion; an assay of the counter-ion tells them apart.";

fn by_mass(a: &Structure, b: &Structure, kind: Option<Kind>, explained: &Explanation) -> String {
    match kind {
        Some(Kind::Isotopologues) => {
            return "Isotopologues differ in mass; chromatography hardly separates them."
                .to_owned();
        }
        Some(Kind::SaltOrSolvate) => return COUNTER_ION.to_owned(),
        Some(Kind::ChargeState) => return CHARGE.to_owned(),
        _ => {}
    }
    // Counter-ions that no table lists.
    let common = !explained.atom_map.is_empty();
    if common && only_protons_moved([a.formula(), b.formula()], explained) {
        let same_atoms = explained.left_over.iter().all(Vec::is_empty);
        return if same_atoms { CHARGE } else { COUNTER_ION }.to_owned();
    }
    match [a, b].map(|side| mass(side.molecule())) {
        [Some(one), Some(other)] if (one - other).abs() < NOMINAL => {
            format!(
                "Equal nominal mass; accurate mass ({one:.4} and {other:.4}), NMR and chromatography tell them apart."
            )
        }
        [Some(one), Some(other)] => {
            format!("Mass tells them apart (monoisotopic {one:.4} and {other:.4}).")
        }
        _ => "Mass tells them apart.".to_owned(),
    }
}

/// Masses nearer than this have one nominal mass.
const NOMINAL: f64 = 0.5;

fn mass(molecule: &Molecule) -> Option<f64> {
    let nuclides = molecule.atoms().flat_map(|atom| {
        let hydrogens = (Element::HYDROGEN, None, u32::from(atom.hydrogens));
        [(atom.element, atom.isotope, 1), hydrogens]
    });
    let mass = monoisotopic_mass(nuclides, molecule.charge()).ok()?;
    Some(mass.dalton())
}

/// Whether nothing differs but whole components (counter-ions, solvents, their ratio) and protons.
pub(super) fn only_protons_moved([a, b]: [&Formula; 2], explained: &Explanation) -> bool {
    let Some(bonds) = &explained.bonds else {
        return false;
    };
    let [pieces_a, pieces_b] = &explained.left_over;
    let charge =
        |pieces: &[LeftOver]| -> i32 { pieces.iter().map(|piece| piece.formula.charge()).sum() };
    let charges = (a.charge() - charge(pieces_a)) - (b.charge() - charge(pieces_b));
    let protons = explained.hydrogens.iter();
    let protons: i32 = protons
        .map(|entry| i32::from(entry.count_a) - i32::from(entry.count_b))
        .sum();
    let whole = |side: usize, list: &[(u32, u32)]| {
        let own = |atom: u32| {
            let mut pieces = explained.left_over[side].iter();
            pieces.any(|piece| piece.on.is_empty() && piece.atoms.binary_search(&atom).is_ok())
        };
        list.iter().all(|&(x, y)| own(x) && own(y))
    };
    charges == protons
        && (bonds.order_changed.is_empty() || protons != 0)
        && whole(0, &bonds.only_in_a)
        && whole(1, &bonds.only_in_b)
}
