use rstest::rstest;

use super::{hydrogens, read};

/// Hydrogens of the first atom written without brackets that is not a methyl group.
#[rstest]
#[case::methane("C", 0, 4)]
#[case::methyl_chloride("ClC", 0, 0)]
#[case::hydrogen_chloride("Cl", 0, 1)]
#[case::borane("B", 0, 3)]
#[case::ammonia("N", 0, 3)]
#[case::water("O", 0, 2)]
#[case::phosphane("P", 0, 3)]
#[case::sulfane("S", 0, 2)]
#[case::hydrogen_iodide("I", 0, 1)]
#[case::trimethylphosphane("CP(C)C", 1, 0)]
#[case::phosphane_oxide("P(=O)(C)C", 0, 1)]
#[case::sulfur_three("S(C)(C)C", 0, 1)]
#[case::sulfoxide("CS(=O)C", 1, 0)]
#[case::sulfur_five("CS(C)(C)(C)C", 1, 1)]
#[case::nitro("CN(=O)=O", 1, 0)]
#[case::nitrogen_four("CN(=O)C", 1, 1)]
#[case::perchloric("O=Cl(=O)(=O)O", 1, 0)]
#[case::carbon_five("CC(C)(C)(C)C", 1, 0)]
#[case::fluorine_three("F(F)F", 0, 0)]
#[case::wildcard("C*C", 1, 0)]
#[case::bracket_carbon("[C]C", 0, 0)]
#[case::bracket_amine("C[NH2]", 1, 2)]
#[case::triple("C#N", 0, 1)]
#[case::quadruple("C$C", 0, 0)]
fn implicit_hydrogens(#[case] text: &str, #[case] atom: usize, #[case] expected: u8) {
    assert_eq!(hydrogens(&read(text).molecule)[atom], expected, "{text}");
}

#[rstest]
#[case::benzene("c1ccccc1", &[1, 1, 1, 1, 1, 1])]
#[case::naphthalene("c1ccc2ccccc2c1", &[1, 1, 1, 0, 1, 1, 1, 1, 0, 1])]
#[case::pyridine("n1ccccc1", &[0, 1, 1, 1, 1, 1])]
#[case::pyrrole("[nH]1cccc1", &[1, 1, 1, 1, 1])]
#[case::methylpyrrole("Cn1cccc1", &[3, 0, 1, 1, 1, 1])]
#[case::furan("o1cccc1", &[0, 1, 1, 1, 1])]
#[case::pyridone("O=c1cc[nH]cc1", &[0, 0, 1, 1, 1, 1, 1])]
#[case::pyridine_oxide("O=n1ccccc1", &[0, 0, 1, 1, 1, 1, 1])]
#[case::thiophene_dioxide("O=s1(=O)cccc1", &[0, 0, 0, 1, 1, 1, 1])]
#[case::borabenzene("b1ccccc1", &[0, 1, 1, 1, 1, 1])]
#[case::borinine("Cb1cccccc1", &[3, 0, 1, 1, 1, 1, 1, 1])]
#[case::phosphinine("p1ccccc1", &[0, 1, 1, 1, 1, 1])]
#[case::written_double_bonds("c1=cc=cc=c1", &[1, 1, 1, 1, 1, 1])]
fn aromatic_hydrogens(#[case] text: &str, #[case] expected: &[u8]) {
    let text = text.to_owned();
    assert_eq!(hydrogens(&read(&text).molecule), expected, "{text}");
}
