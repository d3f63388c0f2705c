//! Drawings that are one structure, and near misses, on atom lists. The full table with sources is
//! in docs/definitions.md and is tested from there.

use rstest::rstest;

use crate::sketch::canonical;

type Atoms<'a> = &'a [(&'a str, i8, u8)];
type Bonds<'a> = &'a [(u32, u32, u8)];

#[rstest]
#[case::nitro(
    &[("C", 0, 3), ("N", 0, 0), ("O", 0, 0), ("O", 0, 0)], &[(0, 1, 1), (1, 2, 2), (1, 3, 2)],
    &[("C", 0, 3), ("N", 1, 0), ("O", -1, 0), ("O", 0, 0)], &[(0, 1, 1), (1, 2, 1), (1, 3, 2)],
    true
)]
#[case::sulfoxide(
    &[("C", 0, 3), ("S", 0, 0), ("O", 0, 0), ("C", 0, 3)], &[(0, 1, 1), (1, 2, 2), (1, 3, 1)],
    &[("C", 0, 3), ("S", 1, 0), ("O", -1, 0), ("C", 0, 3)], &[(0, 1, 1), (1, 2, 1), (1, 3, 1)],
    true
)]
#[case::azide(
    &[("C", 0, 3), ("N", 0, 0), ("N", 1, 0), ("N", -1, 0)], &[(0, 1, 1), (1, 2, 2), (2, 3, 2)],
    &[("C", 0, 3), ("N", -1, 0), ("N", 1, 0), ("N", 0, 0)], &[(0, 1, 1), (1, 2, 1), (2, 3, 3)],
    true
)]
#[case::allyl_radical_is_one_either_end(
    &[("C", 0, 2), ("C", 0, 1), ("C", 0, 1), ("C", 0, 3)], &[(0, 1, 1), (1, 2, 2), (2, 3, 1)],
    &[("C", 0, 2), ("C", 0, 1), ("C", 0, 1), ("C", 0, 3)], &[(0, 1, 2), (1, 2, 1), (2, 3, 1)],
    true
)]
#[case::carboxylate_oxygens_are_alike(
    &[("C", 0, 3), ("C", 0, 0), ("O", 0, 0), ("O", -1, 0)], &[(0, 1, 1), (1, 2, 2), (1, 3, 1)],
    &[("C", 0, 3), ("C", 0, 0), ("O", -1, 0), ("O", 0, 0)], &[(0, 1, 1), (1, 2, 1), (1, 3, 2)],
    true
)]
#[case::carbon_monoxide(
    &[("C", -1, 0), ("O", 1, 0)], &[(0, 1, 3)],
    &[("C", 0, 0), ("O", 0, 0)], &[(0, 1, 2)],
    true
)]
#[case::amide_and_its_zwitterion(
    &[("C", 0, 1), ("O", 0, 0), ("N", 0, 2)], &[(0, 1, 2), (0, 2, 1)],
    &[("C", 0, 1), ("O", -1, 0), ("N", 1, 2)], &[(0, 1, 1), (0, 2, 2)],
    true
)]
#[case::ketone_is_not_its_enol(
    &[("C", 0, 3), ("C", 0, 1), ("O", 0, 0)], &[(0, 1, 1), (1, 2, 2)],
    &[("C", 0, 2), ("C", 0, 1), ("O", 0, 1)], &[(0, 1, 2), (1, 2, 1)],
    false
)]
#[case::butadienes(
    &[("C", 0, 2), ("C", 0, 1), ("C", 0, 1), ("C", 0, 2)], &[(0, 1, 2), (1, 2, 1), (2, 3, 2)],
    &[("C", 0, 2), ("C", 0, 0), ("C", 0, 1), ("C", 0, 3)], &[(0, 1, 2), (1, 2, 2), (2, 3, 1)],
    false
)]
fn one_structure_or_two(
    #[case] atoms: Atoms,
    #[case] bonds: Bonds,
    #[case] other_atoms: Atoms,
    #[case] other_bonds: Bonds,
    #[case] same: bool,
) {
    let (a, b) = (canonical(atoms, bonds), canonical(other_atoms, other_bonds));
    assert_eq!(a.same_constitution(&b), same);
    assert_eq!(a.constitution_key() == b.constitution_key(), same);
    if same {
        assert_eq!(a.form(), b.form());
    }
}

/// Six-membered rings of carbon with every pattern of double bonds that fills the valences: the two
/// of benzene are one, and all its bonds are mobile.
#[test]
fn benzene_has_one_form() {
    let atoms = [("C", 0, 1); 6];
    let ring = |first: u8| -> Vec<(u32, u32, u8)> {
        (0..6)
            .map(|i| {
                (
                    i,
                    (i + 1) % 6,
                    if (i as u8 + first).is_multiple_of(2) {
                        2
                    } else {
                        1
                    },
                )
            })
            .collect()
    };
    let (a, b) = (canonical(&atoms, &ring(0)), canonical(&atoms, &ring(1)));
    assert!(a.same_compound(&b));
    assert!(
        a.normal_form()
            .bonds
            .iter()
            .all(|bond| bond.order.is_none())
    );
}

/// Acetate's charge is on both oxygens; acetic acid's hydrogen is on one.
#[test]
fn mobile_charge_and_fixed_hydrogen() {
    let acetate = canonical(
        &[("C", 0, 3), ("C", 0, 0), ("O", 0, 0), ("O", -1, 0)],
        &[(0, 1, 1), (1, 2, 2), (1, 3, 1)],
    );
    let mobile = acetate
        .normal_form()
        .atoms
        .iter()
        .filter(|atom| atom.charge.is_none())
        .count();
    assert_eq!(mobile, 2);
    let acid = canonical(
        &[("C", 0, 3), ("C", 0, 0), ("O", 0, 0), ("O", 0, 1)],
        &[(0, 1, 1), (1, 2, 2), (1, 3, 1)],
    );
    assert!(
        acid.normal_form()
            .atoms
            .iter()
            .all(|atom| atom.charge == Some(0))
    );
}
