//! Which components of a record a mass spectrometer sees.

use molkin_graph::{Element, Key, Molecule};

use crate::{Axes, Axis, Normaliser, Structure};

use super::composition::Composition;

/// What a record has in common with the other forms of its compound.
#[derive(Debug, Clone, PartialEq)]
pub(super) struct Side {
    /// The components that may be seen.
    pub(super) components: Vec<Component>,
    /// Equal for records that are one compound but for salt, charge, isotopes and stereo.
    pub(super) family: Key,
}

impl Side {
    /// The components without counter-ions and solvents. Where those are not found within the limits all
    /// are taken.
    pub(super) fn of(normaliser: &mut Normaliser, structure: &Structure) -> Self {
        let molecule = structure.molecule();
        let is_plain = molecule.is_connected() && molecule.atoms().all(|atom| atom.charge == 0);
        if is_plain {
            return Self {
                components: ionising(molecule),
                family: structure.canonical().constitution_key(),
            };
        }
        let salt = Axes::from([Axis::Salt]);
        let components = match normaliser.overlook(structure, salt) {
            Ok(form) => ionising(form.structure().molecule()),
            Err(_) => ionising(molecule),
        };
        let family = match normaliser.overlook(structure, salt.with(Axis::Charge)) {
            Ok(form) => form.structure().canonical().constitution_key(),
            Err(_) => structure.canonical().constitution_key(),
        };
        Self { components, family }
    }
}

/// A component of a record.
#[derive(Debug, Clone, PartialEq, Eq)]
pub(super) struct Component {
    /// Neutral, as far as protons can settle a charge: an ammonium ion gives one away, a carboxylate
    /// takes one up. What is left is a charge of its own, as of a quaternary ammonium ion.
    pub(super) neutral: Composition,
    /// Atoms other than hydrogen.
    size: usize,
}

/// The components of what is left of a record without counter-ions and solvents: each may be the one that
/// is seen. In order of size, equal ones once.
fn ionising(molecule: &Molecule) -> Vec<Component> {
    let parts = molecule.components().unwrap_or_default();
    let mut all: Vec<Component> = parts
        .iter()
        .map(|part| Component::of(&part.molecule))
        .collect();
    all.sort_by(|a, b| b.size.cmp(&a.size).then_with(|| a.neutral.cmp(&b.neutral)));
    all.dedup();
    all
}

impl Component {
    fn of(molecule: &Molecule) -> Self {
        let drawn = Composition::of_atoms(molecule.atoms());
        let is_hydrogen = |index| {
            let atom = molecule.atom(index);
            atom.is_some_and(|atom| atom.element == Element::HYDROGEN)
        };
        let cations = (0..)
            .zip(molecule.atoms())
            .filter(|(_, atom)| atom.charge > 0);
        let removable = cations.map(|(index, atom)| {
            let written = molecule
                .neighbours(index)
                .filter(|&(other, _)| is_hydrogen(other));
            i32::from(atom.hydrogens) + written.count() as i32
        });
        // Positive: so many protons go; negative: so many come.
        let protons = drawn.charge().min(removable.sum());
        let size = molecule
            .atoms()
            .filter(|atom| atom.element != Element::HYDROGEN);
        Self {
            neutral: drawn.with_protons(-protons),
            size: size.count(),
        }
    }
}

#[cfg(test)]
mod tests {
    use molkin_formats::smiles;
    use molkin_graph::{Limits, Orderer};
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
    #[case::larger_counter_ion("CCN.Cc1ccc(cc1)S(=O)(=O)O", "C2H7N")]
    #[case::two_alike("c1ccccc1C(=O)O.c1ccccc1CN", "C7H6O2 C7H9N")]
    #[case::no_carbon("[Na+].[Cl-]", "ClH Na+")]
    fn components(#[case] text: &str, #[case] expected: &str) {
        let mut orderer = Orderer::new(Limits::default());
        let structure = Structure::new(&mut orderer, smiles::parse(text).unwrap()).unwrap();
        let mut normaliser = Normaliser::new(Limits::default());
        let mut found: Vec<String> = Side::of(&mut normaliser, &structure)
            .components
            .iter()
            .map(|component| component.neutral.formula().to_string())
            .collect();
        found.sort();
        assert_eq!(found.join(" "), expected);
    }
}
