use rstest::rstest;

use super::{bonds, fault, read};

fn double_bonds(text: &str) -> usize {
    bonds(&read(text).molecule)
        .iter()
        .filter(|bond| bond.contains('='))
        .count()
}

#[rstest]
#[case::benzene("c1ccccc1", 3)]
#[case::benzene_colons("c:1:c:c:c:c:c:1", 3)]
#[case::cyclobutadiene("c1ccc1", 2)]
#[case::cyclooctatetraene("c1ccccccc1", 4)]
#[case::naphthalene("c1ccc2ccccc2c1", 5)]
#[case::azulene("c1ccc2cccc2cc1", 5)]
#[case::pyridinium("C[n+]1ccccc1", 3)]
#[case::pyridine_oxide("[O-][n+]1ccccc1", 3)]
#[case::pyridine_oxide_uncharged("O=n1ccccc1", 4)]
#[case::thiophene("s1cccc1", 2)]
#[case::thiophene_oxide("O=s1cccc1", 3)]
#[case::thiopyrylium("[s+]1ccccc1", 3)]
#[case::pyrylium("[o+]1ccccc1", 3)]
#[case::selenophene("[se]1cccc1", 2)]
#[case::arsenine("[as]1ccccc1", 3)]
#[case::tellurophene("[te]1cccc1", 2)]
#[case::cyclopentadienide("[cH-]1cccc1", 2)]
#[case::tropylium("[cH+]1cccccc1", 3)]
#[case::phenyl_cation("[c+]1ccccc1", 3)]
#[case::phenyl_radical("[c]1ccccc1", 3)]
#[case::carbene("Cn1ccn(C)[c]1", 1)]
#[case::imidazolide("[n-]1ccnc1", 2)]
#[case::borole("[bH]1cccc1", 2)]
#[case::pyridone("O=c1cc[nH]cc1", 3)]
#[case::quinone("O=c1ccc(=O)cc1", 4)]
#[case::biphenyl("c1ccccc1c2ccccc2", 6)]
#[case::biphenyl_written("c1ccccc1-c2ccccc2", 6)]
#[case::fulvalene("c1cccc1c1cccc1", 5)]
#[case::wildcard_needed("*1ccccc1", 3)]
#[case::wildcard_not_needed("*1cccc1", 2)]
#[case::wildcard_substituent("*c1ccccc1", 3)]
#[case::wildcard_in_side_ring("c1ccc2c(c1)C*2", 3)]
#[case::slopes_in_ring("C/C=c1/s/c(=C/C)[nH]c1=O", 3)]
#[case::bracket_without_symbol("[Te]1:c:c:c:c:1", 2)]
fn a_kekule_structure_is_found(#[case] text: &str, #[case] expected: usize) {
    assert_eq!(double_bonds(text), expected, "{text}");
}

#[rstest]
#[case::pyrrole_without_hydrogen("n1cccc1", "no-kekule-structure")]
#[case::imidazole_without_hydrogen("c1cncn1", "no-kekule-structure")]
#[case::pyridone_without_hydrogen("O=c1ccncc1", "no-kekule-structure")]
#[case::odd_ring("c1cccc1", "no-kekule-structure")]
#[case::written_single_bonds("c-1-c-c-c-c-c-1", "no-kekule-structure")]
#[case::chain("cc", "aromatic-outside-ring")]
#[case::alone("c", "aromatic-outside-ring")]
#[case::substituent("c1ccccc1c", "aromatic-outside-ring")]
#[case::chain_nitrogen("Cn(C)C", "aromatic-outside-ring")]
#[case::plain_symbols("C:1:C:C:C:C:C:1", "aromatic-bond-outside-aromatic")]
#[case::boron_four("Cb1(C)ccccc1", "aromatic-valence")]
#[case::iodine("c1ccc[i]c1", "not-aromatic")]
fn no_kekule_structure_is_an_error(#[case] text: &str, #[case] code: &str) {
    assert_eq!(fault(text).code(), code, "{text}");
}
