//! The molecules that every stage takes, by name.

use molkin_formats::smiles;
use molkin_graph::{Canonical, Limits, Molecule, Orderer};

/// A drug-sized molecule, a natural product with eight centres, a sugar, a salt, a peptide with seven
/// residues, a highly symmetric cage, a long chain.
pub(crate) const NAMES: [&str; 7] = [
    "imatinib",
    "cholesterol",
    "sugar",
    "citrate",
    "peptide",
    "dodecahedrane",
    "chain-500",
];

/// How many atoms they have, hydrogens aside.
const ATOMS: [usize; 7] = [37, 28, 23, 16, 30, 20, 500];

pub(crate) fn text(name: &str) -> String {
    match name {
        "imatinib" => "Cc1ccc(cc1Nc1nccc(n1)-c1cccnc1)NC(=O)c1ccc(cc1)CN1CCN(C)CC1".to_owned(),
        "cholesterol" => {
            "CC(C)CCC[C@@H](C)[C@H]1CC[C@@H]2[C@@]1(CC[C@H]3[C@H]2CC=C4[C@@]3(CC[C@@H](C4)O)C)C"
                .to_owned()
        }
        "sugar" => {
            "OC[C@H]1O[C@@H](OC[C@H]2O[C@@H](O)[C@H](O)[C@@H](O)[C@@H]2O)[C@H](O)[C@@H](O)[C@@H]1O"
                .to_owned()
        }
        "citrate" => "[Na+].[Na+].[Na+].[O-]C(=O)CC(O)(CC([O-])=O)C([O-])=O".to_owned(),
        "peptide" => {
            "NCC(=O)N[C@@H](C)C(=O)N[C@@H](CO)C(=O)NCC(=O)N[C@@H](C)C(=O)NCC(=O)O".to_owned()
        }
        "dodecahedrane" => "C12C3C4C5C1C1C6C2C2C3C3C4C4C5C1C1C6C2C3C41".to_owned(),
        "chain-500" => "C".repeat(500),
        other => panic!("no input {other}"),
    }
}

pub(crate) fn molecule(name: &str) -> Molecule {
    let molecule = smiles::parse(&text(name)).unwrap();
    assert_eq!(molecule.atom_count(), atom_count(name), "{name}");
    molecule
}

pub(crate) fn atom_count(name: &str) -> usize {
    let place = NAMES.iter().position(|known| *known == name);
    ATOMS[place.unwrap()]
}

pub(crate) fn canonical(name: &str) -> Canonical {
    Orderer::new(Limits::default())
        .order(&molecule(name))
        .unwrap()
}
