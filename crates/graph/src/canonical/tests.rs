//! Keys, order and limits on atom lists.

use crate::{
    Atom, BondOrder, DrawnStereo, Element, Ligand, Limits, Mark, Molecule, MoleculeBuilder,
    OrderError, Orderer, Parity, Shape,
    sketch::{canonical, molecule},
};

/// CHFClBr with the hydrogen counted or drawn as an atom.
fn haloform(parity: Parity, drawn_hydrogen: bool) -> Molecule {
    let mut builder = MoleculeBuilder::new();
    let hydrogens = u8::from(!drawn_hydrogen);
    let carbon = builder.add_atom(Atom {
        hydrogens,
        ..Atom::new(Element::CARBON)
    });
    let halogens = [Element::FLUORINE, Element::CHLORINE, Element::BROMINE].map(|element| {
        let atom = builder.add_atom(Atom::new(element));
        builder.add_bond(carbon, atom, BondOrder::Single).unwrap();
        Ligand::Atom(atom)
    });
    let hydrogen = if drawn_hydrogen {
        let atom = builder.add_atom(Atom::new(Element::HYDROGEN));
        builder.add_bond(carbon, atom, BondOrder::Single).unwrap();
        Ligand::Atom(atom)
    } else {
        Ligand::Hydrogen
    };
    let [f, cl, br] = halogens;
    builder.add_stereo(DrawnStereo {
        shape: Shape::Tetrahedral,
        centres: [carbon, carbon],
        ligands: [hydrogen, f, cl, br],
        parity: Some(parity),
    });
    builder.build().unwrap()
}

#[test]
fn a_hydrogen_is_the_same_drawn_or_counted() {
    let mut orderer = Orderer::new(Limits::default());
    let counted = orderer.order(&haloform(Parity::Even, false)).unwrap();
    let drawn = orderer.order(&haloform(Parity::Even, true)).unwrap();
    let mirror = orderer.order(&haloform(Parity::Odd, true)).unwrap();
    assert_eq!(counted.compound_key(), drawn.compound_key());
    assert_ne!(counted.compound_key(), mirror.compound_key());
    assert_eq!(counted.constitution_key(), mirror.constitution_key());
    assert_eq!(
        counted.labelled_constitution_key(),
        counted.constitution_key()
    );
    assert_eq!(counted.form(), drawn.form());
    let elements = mirror.stereo_elements();
    assert_eq!(elements.len(), 1);
    assert!(matches!(elements[0].mark, Mark::Given(_)));
}

/// Where a label sits is part of the labelled constitution and of no other.
#[test]
fn labels_are_in_the_labelled_constitution_alone() {
    let mut orderer = Orderer::new(Limits::default());
    let mut propane = |labelled: Option<u32>| {
        let mut builder = MoleculeBuilder::new();
        for atom in 0..3 {
            builder.add_atom(Atom {
                hydrogens: if atom == 1 { 2 } else { 3 },
                isotope: (labelled == Some(atom)).then_some(13),
                ..Atom::new(Element::CARBON)
            });
        }
        builder.add_bond(0, 1, BondOrder::Single).unwrap();
        builder.add_bond(1, 2, BondOrder::Single).unwrap();
        let view = orderer.order(&builder.build().unwrap()).unwrap();
        (view.constitution_key(), view.labelled_constitution_key())
    };
    let [plain, first, second, third] = [None, Some(0), Some(1), Some(2)].map(&mut propane);
    assert!([first, second, third].iter().all(|keys| keys.0 == plain.0));
    assert_eq!(plain.0, plain.1);
    assert_eq!(first.1, third.1);
    assert_ne!(first.1, second.1);
    assert_ne!(first.1, plain.1);
}

#[test]
fn a_reused_view_holds_nothing_of_the_last_molecule() {
    let mut orderer = Orderer::new(Limits::default());
    let marked = haloform(Parity::Odd, false);
    let plain = molecule(&[("C", 0, 3), ("C", 0, 3)], &[(0, 1, 1)]);
    let fresh = orderer.order(&plain).unwrap();
    let mut view = orderer.order(&marked).unwrap();
    orderer.order_into(&plain, &mut view).unwrap();
    assert_eq!(view.compound_key(), fresh.compound_key());
    assert_eq!(view.form(), fresh.form());
    assert!(view.stereo_elements().is_empty() && !view.is_open());
}

#[test]
fn the_step_limit_is_an_error_and_not_a_weaker_key() {
    let limits = Limits {
        order_steps: 2,
        ..Limits::default()
    };
    let ring: Vec<_> = (0..6).map(|i| (i, (i + 1) % 6, 1)).collect();
    let cyclohexane = molecule(&[("C", 0, 2); 6], &ring);
    let outcome = Orderer::new(limits).order(&cyclohexane);
    assert_eq!(outcome.err(), Some(OrderError::StepLimit { limit: 2 }));
}

#[test]
fn dihydrogen_in_all_drawings() {
    let one = canonical(&[("H", 0, 1)], &[]);
    let two = canonical(&[("H", 0, 0), ("H", 0, 0)], &[(0, 1, 1)]);
    assert_eq!(one.compound_key(), two.compound_key());
}

#[test]
fn values_out_of_range_are_refused() {
    let mut builder = MoleculeBuilder::new();
    builder.add_atom(Atom {
        isotope: Some(1200),
        ..Atom::new(Element::CARBON)
    });
    let outcome = Orderer::new(Limits::default()).order(&builder.build().unwrap());
    assert_eq!(outcome.err(), Some(OrderError::OutOfRange { atom: 0 }));
}

/// 1,4-dimethylcyclohexane has two stereoisomers, 1,4-dimethylcyclohexane with one mark says
/// nothing, and norbornane's bridgeheads are not stereogenic (design: forced bridgeheads).
#[test]
fn norbornane_has_no_stereo_and_camphor_one_element() {
    let norbornane = canonical(
        &[
            ("C", 0, 1),
            ("C", 0, 2),
            ("C", 0, 2),
            ("C", 0, 1),
            ("C", 0, 2),
            ("C", 0, 2),
            ("C", 0, 2),
        ],
        &[
            (0, 1, 1),
            (1, 2, 1),
            (2, 3, 1),
            (3, 4, 1),
            (4, 5, 1),
            (5, 0, 1),
            (0, 6, 1),
            (3, 6, 1),
        ],
    );
    assert!(norbornane.stereo_elements().is_empty() && !norbornane.is_open());
    let norcamphor = canonical(
        &[
            ("C", 0, 1),
            ("C", 0, 0),
            ("C", 0, 2),
            ("C", 0, 1),
            ("C", 0, 2),
            ("C", 0, 2),
            ("C", 0, 2),
            ("O", 0, 0),
        ],
        &[
            (0, 1, 1),
            (1, 2, 1),
            (2, 3, 1),
            (3, 4, 1),
            (4, 5, 1),
            (5, 0, 1),
            (0, 6, 1),
            (3, 6, 1),
            (1, 7, 2),
        ],
    );
    let elements = norcamphor.stereo_elements();
    assert_eq!(elements.len(), 2);
    assert_eq!(elements[0].variable, elements[1].variable);
    assert!(norcamphor.is_open());
}
