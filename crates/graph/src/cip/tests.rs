//! Rules one by one, on the least molecules that need them.

use rstest::rstest;

use crate::{
    Atom, BondOrder, Canonical, DrawnStereo, Element, Ligand, Limits, Molecule, MoleculeBuilder,
    Orderer, Parity, Shape,
};

use super::Labelling;

fn order(molecule: &Molecule) -> Canonical {
    Orderer::new(Limits::default()).order(molecule).unwrap()
}

fn letters(canonical: &Canonical, limits: &Limits) -> Vec<&'static str> {
    let labels = canonical.labels(limits).into_iter();
    labels
        .map(|labelling| labelling.label().map_or("-", |label| label.as_str()))
        .collect()
}

/// A centre with four ligands, element and mass number each, in the order of an even mark.
fn centre(ligands: [(Element, Option<u16>); 4]) -> Molecule {
    let mut builder = MoleculeBuilder::new();
    let carbon = builder.add_atom(Atom::new(Element::CARBON));
    let ligands = ligands.map(|(element, isotope)| {
        let hydrogens = if element == Element::CARBON { 3 } else { 0 };
        let ligand = builder.add_atom(Atom {
            isotope,
            hydrogens,
            ..Atom::new(element)
        });
        builder.add_bond(carbon, ligand, BondOrder::Single).unwrap();
        Ligand::Atom(ligand)
    });
    builder.add_stereo(DrawnStereo {
        shape: Shape::Tetrahedral,
        centres: [carbon, carbon],
        ligands,
        parity: Some(Parity::Even),
    });
    builder.build().unwrap()
}

/// Falling ranks, anticlockwise seen from the highest: S. Isotopes are told apart by Rule 2 with
/// natural hydrogen between protium and deuterium (Hanson et al. 2018).
#[rstest]
#[case([(Element::BROMINE, None), (Element::CHLORINE, None), (Element::FLUORINE, None), (Element::HYDROGEN, None)], "S")]
#[case([(Element::CHLORINE, None), (Element::BROMINE, None), (Element::FLUORINE, None), (Element::HYDROGEN, None)], "R")]
#[case([(Element::CHLORINE, None), (Element::CARBON, None), (Element::HYDROGEN, Some(2)), (Element::HYDROGEN, None)], "S")]
#[case([(Element::CHLORINE, None), (Element::CARBON, None), (Element::HYDROGEN, None), (Element::HYDROGEN, Some(1))], "S")]
#[case([(Element::CHLORINE, Some(37)), (Element::CHLORINE, None), (Element::CHLORINE, Some(35)), (Element::CARBON, None)], "S")]
fn numbers_then_masses(#[case] ligands: [(Element, Option<u16>); 4], #[case] expected: &str) {
    let canonical = order(&centre(ligands));
    assert_eq!(letters(&canonical, &Limits::default()), [expected]);
}

/// 2,4-Dichloropentan-3-ol, CHCl(CH₃)–CH(OH)–CHCl(CH₃), with given parities of the
/// outer centres, from the middle outward.
fn pentane(outer: [Parity; 2]) -> Molecule {
    let mut builder = MoleculeBuilder::new();
    let carbon = |hydrogens| Atom {
        hydrogens,
        ..Atom::new(Element::CARBON)
    };
    let middle = builder.add_atom(carbon(1));
    let oxygen = builder.add_atom(Atom {
        hydrogens: 1,
        ..Atom::new(Element::OXYGEN)
    });
    let join = |builder: &mut MoleculeBuilder, a, b| {
        builder.add_bond(a, b, BondOrder::Single).unwrap();
    };
    join(&mut builder, middle, oxygen);
    let branches = outer.map(|parity| {
        let inner = builder.add_atom(carbon(1));
        let chlorine = builder.add_atom(Atom::new(Element::CHLORINE));
        let methyl = builder.add_atom(carbon(3));
        join(&mut builder, middle, inner);
        join(&mut builder, inner, chlorine);
        join(&mut builder, inner, methyl);
        let ligands = [chlorine, middle, methyl].map(Ligand::Atom);
        builder.add_stereo(DrawnStereo {
            shape: Shape::Tetrahedral,
            centres: [inner, inner],
            ligands: [ligands[0], ligands[1], ligands[2], Ligand::Hydrogen],
            parity: Some(parity),
        });
        Ligand::Atom(inner)
    });
    builder.add_stereo(DrawnStereo {
        shape: Shape::Tetrahedral,
        centres: [middle, middle],
        ligands: [
            Ligand::Atom(oxygen),
            branches[0],
            branches[1],
            Ligand::Hydrogen,
        ],
        parity: Some(Parity::Even),
    });
    builder.build().unwrap()
}

/// P-92.6: R precedes S, and the label of a centre that only this settles is lower case.
#[rstest]
#[case([Parity::Odd, Parity::Even], ["s", "R", "S"])]
#[case([Parity::Even, Parity::Odd], ["r", "S", "R"])]
fn unlike_branches(#[case] outer: [Parity; 2], #[case] expected: [&str; 3]) {
    let canonical = order(&pentane(outer));
    assert_eq!(letters(&canonical, &Limits::default()), expected);
}

#[test]
fn a_label_beyond_the_limit_is_absent_and_says_so() {
    let canonical = order(&pentane([Parity::Odd, Parity::Even]));
    let limits = Limits {
        label_steps: 60,
        ..Limits::default()
    };
    let labels = canonical.labels(&limits);
    assert_eq!(labels[0], Labelling::OverLimit);
    assert!(labels[1].label().is_some());
}
