use rstest::rstest;

use super::{as_drawn, assert_written, write};

#[rstest]
#[case::as_it_is("N[C@@H](C)O", "N[C@@H](C)O")]
#[case::branches_change_places("N[C@@](CC)(F)O", "N[C@@](F)(O)CC")]
#[case::hydrogen_first("[C@H](F)(Cl)Br", "[C@H](F)(Cl)Br")]
#[case::hydrogen_from_behind("F[C@]([H])(Cl)Br", "F[C@]([H])(Cl)Br")]
#[case::ring("C1CCO[C@]1(F)Cl", "C1CCO[C@]1(F)Cl")]
#[case::ring_opens_at_the_atom("[C@]1(F)(Cl)CCCO1", "[C@]1(F)(Cl)CCCO1")]
#[case::sulfoxide("C[S@](=O)CC", "C[S@](=O)CC")]
#[case::sulfoxide_first("[S@](C)(=O)CC", "[S@](C)(=O)CC")]
#[case::sulfonium("F[S@@+](CC)C", "F[S@+](C)CC")]
#[case::isotope_and_charge("C[15N@@+](F)(CC)Cl", "C[15N@+](F)(Cl)CC")]
#[case::allene("FC=[C@]=CCl", "FC=[C@]=CCl")]
#[case::allene_branches("FC(CC)=[C@]=C(N)O", "FC(CC)=[C@]=C(N)O")]
#[case::allene_in_the_middle("[C@](=CCl)=CF", "[C@](=CCl)=CF")]
#[case::allene_ends_change_places("[C@](=C(C)CC)=CF", "[C@](=CF)=C(C)CC")]
#[case::pentatetraene("FC=C=[C@@]=C=CCl", "FC=C=[C@@]=C=CCl")]
fn tags(#[case] text: &str, #[case] expected: &str) {
    assert_written(text, expected);
}

#[rstest]
#[case::trans("F/C=C/F", "F/C=C/F")]
#[case::first_mark_leans_forward("F\\C=C\\F", "F/C=C/F")]
#[case::cis("F\\C=C/F", "F/C=C\\F")]
#[case::in_a_branch("C(\\F)=C/F", "C(/F)=C\\F")]
#[case::one_mark_an_end_is_enough("F/C(/Cl)=C(/F)Cl", "F/C(Cl)=C(/F)Cl")]
#[case::mark_moves_to_the_chain("FC(/Cl)=C/F", "F/C(Cl)=C/F")]
#[case::oxime("C/C(F)=N/O", "C/C(F)=N/O")]
#[case::azo("C/N=N\\C", "C/N=N\\C")]
#[case::butatriene("F/C=C=C=C/F", "F/C=C=C=C/F")]
#[case::ring_of_eight("C1CC/C=C\\CCC1", "C1CC/C=C\\CCC1")]
#[case::two_sets_have_a_first_mark_each("C\\C=C\\CC/C=C/C", "C/C=C/CC/C=C/C")]
#[case::shared_bond("F/C=C/C=C\\F", "F/C=C/C=C\\F")]
#[case::shared_bond_rather_than_substituent("F/C=C(C)/C=C/F", "F/C=C(C)/C=C/F")]
#[case::marked_and_not("F/C=C/C=CF", "F/C=C/C=CF")]
#[case::not_and_marked("FC=C/C=C/F", "FC=C/C=C/F")]
#[case::between_two_unmarked("FC=C/C=C/C=CF", "FC=C/C=C/C=CF")]
fn slopes(#[case] text: &str, #[case] expected: &str) {
    assert_written(text, expected);
}

/// The double bond in the middle would be marked by its neighbours.
#[rstest]
#[case::substituents_carry("F/C=C(C)/C=C/C(C)=C/F", "F/C=C(\\C)C=CC(/C)=C/F", [4, 5])]
#[case::hydrogen_carries("F/C=C/C=C/C=C/F", "F/C=C/C=CC(/[H])=C/F", [3, 4])]
#[case::ring_bond_carries("C1C/C=C/C=C/C(=C/F)CC1", "C1C/C=C/C=CC(=C/F)/CC1", [4, 5])]
fn no_mark_by_accident(#[case] text: &str, #[case] expected: &str, #[case] unmarked: [u32; 2]) {
    let mut form = as_drawn(text);
    let before = form.stereo.len();
    form.stereo.retain(|element| element.centres != unmarked);
    assert_eq!(form.stereo.len(), before - 1);
    let written = write(&form);
    assert_eq!((written.text.as_str(), written.lost), (expected, vec![]));
}

/// Only bonds beside the double bond of the ring can carry slopes; a mark on it says nothing.
#[test]
fn small_rings_may_be_marked() {
    let mut form = as_drawn("C/N=N/C1=C(CC1)/N=N/C");
    form.stereo.retain(|element| element.centres != [3, 4]);
    assert_eq!(form.stereo.len(), 2);
    let written = write(&form);
    assert_eq!(written.text, "C/N=N/C1=C(CC1)/N=N/C");
    assert!(written.lost.is_empty());
}
