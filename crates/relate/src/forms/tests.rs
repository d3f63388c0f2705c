//! Marks that a form erases, and what every form has to hold to.

use molkin_formats::smiles;
use molkin_graph::{BondOrder, Limits, Orderer};
use rstest::rstest;

use super::*;

pub(super) fn structure(text: &str) -> Structure {
    let mut orderer = Orderer::new(Limits::default());
    Structure::new(&mut orderer, smiles::parse(text).unwrap()).unwrap()
}

pub(super) fn key(text: &str) -> String {
    structure(text).canonical().compound_key().to_string()
}

pub(super) fn overlooked(text: &str, axes: &str) -> String {
    let structure = structure(text);
    let mut normaliser = Normaliser::new(Limits::default());
    let form = normaliser
        .overlook(&structure, axes.parse().unwrap())
        .unwrap();
    form.structure().canonical().compound_key().to_string()
}

/// The enol of a ketone: the hydrogen of atom `carbon` goes to atom `oxygen`, through `middle`.
fn enol(text: &str, [carbon, middle, oxygen]: [u32; 3]) -> String {
    let ketone = structure(text);
    let mut revision = remembering(&ketone);
    revision.atom_mut(carbon).unwrap().hydrogens -= 1;
    revision.atom_mut(oxygen).unwrap().hydrogens += 1;
    let at = |a: u32, b: u32| {
        let mut bonds = revision.bonds().iter();
        bonds
            .position(|&(x, y, _)| [x, y] == [a, b] || [x, y] == [b, a])
            .unwrap()
    };
    let (single, double) = (at(carbon, middle), at(middle, oxygen));
    revision.set_bond(single, Some(BondOrder::Double));
    revision.set_bond(double, Some(BondOrder::Single));
    let molecule = revision.finish().unwrap().molecule;
    let mut orderer = Orderer::new(Limits::default());
    let structure = Structure::new(&mut orderer, molecule).unwrap();
    structure.canonical().compound_key().to_string()
}

#[test]
fn an_erased_centre_keeps_its_mark() {
    let right = enol("C[C@@H]1CCCCC1=O", [1, 6, 7]);
    let left = enol("C[C@H]1CCCCC1=O", [1, 6, 7]);
    let open = enol("CC1CCCCC1=O", [1, 6, 7]);
    assert_ne!(right, left);
    assert_ne!(right, open);
    assert_eq!(right, enol("O=C1CCCC[C@H]1C", [6, 1, 0]));
    assert_eq!(open, overlooked("CC1CCCCC=1O", "salt"));
}

/// 2,6-Dimethylcyclohexanone has two such centres that are alike; one is erased, the other is not.
#[test]
fn an_erased_mark_has_its_place() {
    let cis = enol("C[C@H]1CCC[C@@H](C)C1=O", [1, 7, 8]);
    let trans = enol("C[C@H]1CCC[C@H](C)C1=O", [1, 7, 8]);
    assert_ne!(cis, trans);
    // The cis ketone is meso: with either carbon erased its enols are enantiomers.
    assert_ne!(cis, enol("C[C@H]1CCC[C@@H](C)C1=O", [5, 7, 8]));
    assert_eq!(trans, enol("C[C@H]1CCC[C@H](C)C1=O", [5, 7, 8]));
}

#[rstest]
#[case::label("[2H]C", "C", "isotope")]
#[case::label_on_hydrogen("[2H]O[2H]", "O", "isotope")]
#[case::centre_by_label("C[C@@H]([2H])O", "CCO", "isotope")]
#[case::marks("C[C@H](N)C(=O)O", "CC(N)C(=O)O", "stereo")]
#[case::marks_and_labels("[13CH3][C@H](N)C(=O)O", "CC(N)C(=O)O", "isotope,stereo")]
fn overlooked_axes_make_them_equal(#[case] a: &str, #[case] b: &str, #[case] axes: &str) {
    assert_ne!(overlooked(a, "salt"), overlooked(b, "salt"));
    assert_eq!(overlooked(a, axes), overlooked(b, axes));
}
