//! Which components of a record a mass spectrometer sees.

use molkin_graph::{Element, Molecule};

use super::composition::Composition;

/// A component of a record.
#[derive(Debug, Clone, PartialEq, Eq)]
pub(super) struct Component {
    /// As drawn.
    pub(super) drawn: Composition,
    /// Neutral, as far as protons can settle a charge: an ammonium ion gives one away, a carboxylate
    /// takes one up. What is left is a charge of its own, as of a quaternary ammonium ion.
    pub(super) neutral: Composition,
    /// Atoms other than hydrogen.
    size: usize,
}

/// The components that may be seen: those with carbon and at least half as many non-hydrogen atoms as
/// the largest of these; of a record without carbon all. Counter-ions and solvents are smaller, as a
/// rule; where they are not, each that is left may be the one that is seen. In order of size, equal ones
/// once.
pub(super) fn ionising(molecule: &Molecule) -> Vec<Component> {
    let mut all: Vec<Component> = parts(molecule)
        .iter()
        .map(|atoms| Component::of(molecule, atoms))
        .collect();
    let organic = |component: &Component| component.drawn.has(Element::CARBON);
    if all.iter().any(organic) {
        all.retain(organic);
    }
    let largest = all.iter().map(|component| component.size).max();
    all.retain(|component| Some(2 * component.size) >= largest);
    all.sort_by(|a, b| b.size.cmp(&a.size).then_with(|| a.drawn.cmp(&b.drawn)));
    all.dedup();
    all
}

impl Component {
    fn of(molecule: &Molecule, atoms: &[u32]) -> Self {
        let list = || atoms.iter().filter_map(|&atom| molecule.atom(atom));
        let drawn = Composition::of_atoms(list());
        let removable: u32 = list()
            .zip(atoms)
            .filter(|(atom, _)| atom.charge > 0)
            .map(|(atom, &index)| {
                let written = molecule.neighbours(index).filter(|&(other, _)| {
                    molecule
                        .atom(other)
                        .is_some_and(|atom| atom.element == Element::HYDROGEN)
                });
                u32::from(atom.hydrogens) + written.count() as u32
            })
            .sum();
        let most = i32::try_from(removable).unwrap_or(i32::MAX);
        // Positive: so many protons go; negative: so many come.
        let protons = drawn.charge().min(most);
        let size = list()
            .filter(|atom| atom.element != Element::HYDROGEN)
            .count();
        Self {
            neutral: drawn.clone().with_protons(-protons),
            drawn,
            size,
        }
    }
}

/// The atoms of each connected part, in order of their first atoms.
fn parts(molecule: &Molecule) -> Vec<Vec<u32>> {
    let count = molecule.atom_count();
    let mut seen = vec![false; count];
    let mut parts = Vec::new();
    for start in 0..count {
        if std::mem::replace(&mut seen[start], true) {
            continue;
        }
        let mut part = vec![start as u32];
        let mut at = 0;
        while let Some(&atom) = part.get(at) {
            at += 1;
            for (next, _) in molecule.neighbours(atom) {
                if !std::mem::replace(&mut seen[next as usize], true) {
                    part.push(next);
                }
            }
        }
        parts.push(part);
    }
    parts
}

#[cfg(test)]
mod tests {
    use molkin_formats::smiles;
    use rstest::rstest;

    use super::*;

    #[rstest]
    #[case::plain("CCO", "C2H6O")]
    #[case::hydrochloride("CCN.Cl", "C2H7N")]
    #[case::ionic("CC[NH3+].[Cl-]", "C2H7N")]
    #[case::written_hydrogens("CC[N+]([H])([H])[H].[Cl-]", "C2H7N")]
    #[case::carboxylate("CC(=O)[O-].[Na+]", "C2H4O2")]
    #[case::two_protons("[O-]C(=O)C(=O)[O-].[Na+].[Na+]", "C2H2O4")]
    #[case::quaternary("C[N+](C)(C)C.[Br-]", "C4H12N+")]
    #[case::zwitterion("[NH3+]CC(=O)[O-]", "C2H5NO2")]
    #[case::betaine("C[N+](C)(C)CC(=O)[O-]", "C5H11NO2")]
    #[case::hydrate("OC(=O)CC(O)(CC(=O)O)C(=O)O.O", "C6H8O7")]
    #[case::half_acid("CCCCCCN.CCCCCCN.OS(=O)(=O)O", "C6H15N")]
    #[case::two_alike("c1ccccc1C(=O)O.c1ccccc1CN", "C7H6O2 C7H9N")]
    #[case::no_carbon("[Na+].[Cl-]", "ClH Na+")]
    fn components(#[case] text: &str, #[case] expected: &str) {
        let mut found: Vec<String> = ionising(&smiles::parse(text).unwrap())
            .iter()
            .map(|component| component.neutral.formula().to_string())
            .collect();
        found.sort();
        assert_eq!(found.join(" "), expected);
    }
}
