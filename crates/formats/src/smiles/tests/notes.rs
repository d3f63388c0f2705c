use rstest::rstest;

use super::{read, read_strictly};

/// Text, code, atoms and column of its only note, and whether strict reading refuses it.
#[rstest]
#[case::carbon_five("CC(C)(C)(C)C", "unusual-valence", &[1], 2, true)]
#[case::nitrogen_four("CN(=O)C", "unusual-valence", &[1], 2, true)]
#[case::oxonium_uncharged("C[O](C)C", "unusual-valence", &[1], 2, true)]
#[case::thiabenzene("Cs1ccccc1", "unusual-valence", &[1], 2, true)]
#[case::isotope_zero("[0CH4]", "isotope-zero", &[0], 1, false)]
#[case::isotope_unknown("C[99CH3]", "unknown-isotope", &[1], 2, false)]
#[case::two_signs("[Ca++]", "repeated-charge-sign", &[0], 1, false)]
#[case::three_signs("[Al+++]", "repeated-charge-sign", &[0], 1, true)]
#[case::molecular_hydrogen("[HH]", "hydrogen-on-hydrogen", &[0], 1, true)]
#[case::tellurophene("[te]1cccc1", "nonstandard-aromatic-symbol", &[0], 1, true)]
#[case::leading_zero("C1CC%01", "ring-label-leading-zero", &[2], 5, false)]
#[case::late_label("C(C)1CC1", "ring-label-after-branch", &[0], 5, true)]
#[case::leading_dot(".C", "misplaced-dot", &[], 1, true)]
#[case::trailing_dot("C.", "misplaced-dot", &[0], 2, true)]
#[case::trailing_dot_in_branch("C(C.)C", "misplaced-dot", &[1], 4, true)]
#[case::double_dot("C..C", "misplaced-dot", &[0], 3, true)]
#[case::unpaired("C/C=C", "unpaired-mark", &[0, 1], 2, true)]
#[case::contradictory("C/C(\\F)=C/F", "contradictory-marks", &[1, 3], 3, true)]
#[case::too_few_ligands("C[C@](F)Cl", "meaningless-stereo-tag", &[1], 2, true)]
#[case::too_many_hydrogens("C[C@H2]F", "meaningless-stereo-tag", &[1], 2, true)]
#[case::secondary_phosphane("C[P@H]F", "meaningless-stereo-tag", &[1], 2, true)]
#[case::no_cumulene("C[C@AL1](F)(Cl)Br", "meaningless-stereo-tag", &[1], 2, true)]
#[case::off_centre("FC=[C@]=C=CCl", "meaningless-stereo-tag", &[2], 4, true)]
#[case::allene_with_two_hydrogens("C=[C@]=CF", "meaningless-stereo-tag", &[1], 3, true)]
#[case::five_ligands("S[As@@](F)(Cl)(Br)C=O", "stereo-tag-short", &[1], 2, false)]
#[case::six_ligands("C[Co@](F)(Cl)(Br)(I)S", "stereo-tag-short", &[1], 2, false)]
#[case::three_in_a_square("N[Pt@SP1](F)", "meaningless-stereo-tag", &[1], 2, true)]
#[case::no_lone_pair("F[P@TB1](F)(Cl)Br", "meaningless-stereo-tag", &[1], 2, true)]
#[case::two_vacancies("F[Xe@OH1](F)(F)F", "meaningless-stereo-tag", &[1], 2, true)]
#[case::redundant("F/C(/Br)=C/Cl", "redundant-mark", &[1], 5, false)]
#[case::redundant_at_the_end("F/C=C(/Cl)\\Br", "redundant-mark", &[2], 11, false)]
#[case::redundant_in_a_row("C/C=C(/F)\\C=C\\C", "redundant-mark", &[2], 7, false)]
#[case::redundant_ring_label("F/C(/Br)=C/1.Cl1", "redundant-mark", &[1], 5, false)]
#[case::extension("CC |$;$| x", "extension-ignored", &[], 4, true)]
#[case::empty("", "no-atoms", &[], 1, false)]
#[case::bracket_aromatic("[Te]1:c:c:c:c1", "aromatic-bond-outside-aromatic", &[0, 1], 6, true)]
fn one_note(
    #[case] text: &str,
    #[case] code: &str,
    #[case] atoms: &[u32],
    #[case] column: u32,
    #[case] refused: bool,
) {
    let notes = read(text).notes;
    let [note] = &notes[..] else {
        panic!("{text}: {notes:?}")
    };
    let found = (note.code, &note.atoms[..], note.span.unwrap().column);
    assert_eq!(found, (code, atoms, column), "{text}");
    match read_strictly(text) {
        Ok(record) => assert!(!refused && record.notes == notes, "{text}"),
        Err(error) => {
            assert!(refused, "{text}: {error}");
            assert_eq!((error.code(), error.span()), (code, note.span.unwrap()));
        }
    }
}

#[rstest]
#[case::end("C/C(C)=C/C")]
#[case::hetero("CN(=O)=O")]
#[case::perchlorate("OCl(=O)(=O)=O")]
#[case::sulfone("CS(C)(=O)=O")]
#[case::hydroxide("[OH-].[Na+]")]
#[case::bridging("B1[H]B[H]1")]
#[case::both_slopes_needed("C/C=C(/C=C/C)\\C=C/C")]
#[case::square("N[Pt@SP1](N)(Cl)Cl")]
#[case::seesaw("F[S@TB1](F)(Cl)Br")]
fn no_notes(#[case] text: &str) {
    assert_eq!(read(text).notes, [], "{text}");
    assert!(read_strictly(text).is_ok(), "{text}");
}
