use molkin_graph::{Ligand, Parity, Shape};
use rstest::rstest;

use super::{Written, as_drawn, rewritten, write};
use crate::smiles::{Lost, parse};

#[test]
fn a_mark_on_a_bond_written_as_single_is_lost() {
    let mut form = as_drawn("C/C=C/C");
    form.bonds.iter_mut().for_each(|bond| bond.2 = 1);
    let lost = Lost::Arrangement {
        shape: Shape::DoubleBond,
        centres: [1, 2],
    };
    let Written { text, lost: found } = write(&form);
    assert_eq!((text.as_str(), found), ("C[CH][CH]C", vec![lost]));
}

#[test]
fn a_tag_that_does_not_fit_its_ligands_is_lost() {
    let mut form = as_drawn("C[C@H](F)Cl");
    form.bonds.pop();
    let written = write(&form);
    let lost = Lost::Arrangement {
        shape: Shape::Tetrahedral,
        centres: [1, 1],
    };
    assert_eq!(written.lost, [lost]);
    assert!(!written.text.contains('@'));
}

/// Only the bonds of the ring can carry slopes, and round it the sides fit where single bonds and
/// trans double bonds together are even in number. One mark less does not help: a double bond
/// between two marked ones is marked as well.
#[rstest]
#[case("N1=NN=NN=NN=N1", 0, 0)]
#[case("N1=NN=NN=NN=N1", 1, 2)]
#[case("N1=NN=NN=NN=N1", 2, 0)]
#[case("N1=NN=NN=NN=N1", 3, 2)]
#[case("N1=NN=NN=NN=NN=N1", 3, 0)]
#[case("N1=NN=NN=NN=NN=N1", 4, 2)]
fn contradictions_round_a_ring(#[case] text: &str, #[case] trans: usize, #[case] lost: usize) {
    let mut form = as_drawn(text);
    let template = as_drawn("N/N=N/N").stereo[0];
    let count = form.atoms.len() as u32;
    for (at, first) in (0..count).step_by(2).enumerate() {
        let mut element = template;
        let bonded = |atom: u32| Ligand::Atom(atom % count);
        element.centres = [first, first + 1];
        element.ligands = [
            bonded(first + count - 1),
            Ligand::LonePair,
            bonded(first + 2),
            Ligand::LonePair,
        ];
        element.parity = Parity::from_odd(at < trans);
        form.stereo.push(element);
    }
    let written = write(&form);
    assert_eq!(written.lost.len(), lost, "{}", written.text);
    let read = parse(&written.text).unwrap();
    assert_eq!(read.drawn_stereo().len(), form.stereo.len() - lost);
}

#[test]
fn labels_beyond_the_standard_are_told() {
    let written = write(&super::structure::flower(101));
    assert_eq!(written.lost, [Lost::RingLabels { highest: 101 }]);
    assert!(written.text.contains("%99%(100)%(101)(CC1)"));
    assert!(rewritten("C1CC1").lost.is_empty());
}

/// As in a small ring, but here the mark would count.
#[test]
fn a_mark_that_would_mark_its_neighbour_is_lost() {
    let mut form = as_drawn("C/N=N/C(F)=C(F)/N=N/C");
    form.stereo.retain(|element| element.centres != [3, 5]);
    assert_eq!(form.stereo.len(), 2);
    let lost = Lost::Arrangement {
        shape: Shape::DoubleBond,
        centres: [7, 8],
    };
    let written = write(&form);
    assert_eq!(written.text, "C/N=N/C(F)=C(F)N=NC");
    assert_eq!(written.lost, [lost]);
}
