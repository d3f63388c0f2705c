//! CIP labels of compounds whose names say them.
//!
//! Names and sections of the IUPAC recommendations of 2013 are from memory: textbook knowledge that is
//! older than this project. Atoms count from 1; both ends of a double bond or axis are named.

use molkin_tests::{Comparer, all_labels};
use rstest::rstest;

#[rstest]
#[case("P-103.1.3", "L-alanine", "C[C@H](N)C(=O)O", "2S")]
#[case("P-103.1.3", "D-alanine", "C[C@@H](N)C(=O)O", "2R")]
#[case("P-103.1.3", "L-serine", "N[C@@H](CO)C(=O)O", "2S")]
#[case("P-103.1.3", "L-cysteine", "N[C@@H](CS)C(=O)O", "2R")]
#[case("P-103.1.3", "L-selenocysteine", "N[C@@H](C[SeH])C(=O)O", "2R")]
#[case(
    "P-103.1.3",
    "L-threonine (2S,3R)",
    "C[C@@H](O)[C@H](N)C(=O)O",
    "2R 4S"
)]
#[case(
    "P-103.1.3",
    "L-isoleucine (2S,3S)",
    "CC[C@H](C)[C@H](N)C(=O)O",
    "3S 5S"
)]
#[case(
    "P-103.1.3",
    "L-allo-isoleucine (2S,3R)",
    "CC[C@@H](C)[C@H](N)C(=O)O",
    "3R 5S"
)]
#[case("P-103.1.3", "L-proline", "OC(=O)[C@@H]1CCCN1", "4S")]
#[case(
    "P-103.1.3",
    "4-hydroxy-L-proline (2S,4R)",
    "O[C@H]1CN[C@@H](C1)C(=O)O",
    "2R 5S"
)]
#[case("P-103.1.3", "D-penicillamine (S)", "CC(C)(S)[C@@H](N)C(=O)O", "5S")]
#[case("P-102.3.2", "D-glyceraldehyde", "OC[C@@H](O)C=O", "3R")]
#[case("P-102.3.2", "D-erythrose (2R,3R)", "OC[C@@H](O)[C@@H](O)C=O", "3R 5R")]
#[case("P-102.3.2", "D-threose (2S,3R)", "OC[C@@H](O)[C@H](O)C=O", "3R 5S")]
#[case(
    "P-102.3.2",
    "D-ribose (2R,3R,4R)",
    "OC[C@@H](O)[C@@H](O)[C@@H](O)C=O",
    "3R 5R 7R"
)]
#[case(
    "P-102.3.2",
    "D-arabinose (2S,3R,4R)",
    "OC[C@@H](O)[C@@H](O)[C@H](O)C=O",
    "3R 5R 7S"
)]
#[case(
    "P-102.3.2",
    "D-xylose (2R,3S,4R)",
    "OC[C@@H](O)[C@H](O)[C@@H](O)C=O",
    "3R 5S 7R"
)]
#[case(
    "P-102.3.2",
    "D-glucose (2R,3S,4R,5R)",
    "OC[C@@H](O)[C@@H](O)[C@H](O)[C@@H](O)C=O",
    "3R 5R 7S 9R"
)]
#[case(
    "P-102.3.2",
    "D-mannose (2S,3S,4R,5R)",
    "OC[C@@H](O)[C@@H](O)[C@H](O)[C@H](O)C=O",
    "3R 5R 7S 9S"
)]
#[case(
    "P-102.3.2",
    "D-galactose (2R,3S,4S,5R)",
    "OC[C@@H](O)[C@H](O)[C@H](O)[C@@H](O)C=O",
    "3R 5S 7S 9R"
)]
#[case(
    "P-102.3.2",
    "D-fructose (3S,4R,5R)",
    "OC[C@@H](O)[C@@H](O)[C@H](O)C(=O)CO",
    "3R 5R 7S"
)]
#[case(
    "P-102.5.6",
    "β-D-glucopyranose (2R,3R,4S,5S,6R)",
    "OC[C@H]1O[C@@H](O)[C@H](O)[C@@H](O)[C@@H]1O",
    "3R 5R 7R 9S 11S"
)]
#[case(
    "P-102.5.6",
    "α-D-glucopyranose (2S,3R,4S,5S,6R)",
    "OC[C@H]1O[C@H](O)[C@H](O)[C@@H](O)[C@@H]1O",
    "3R 5S 7R 9S 11S"
)]
#[case(
    "P-92.6",
    "ribitol (2R,3s,4S)",
    "OC[C@H](O)[C@H](O)[C@H](O)CO",
    "3S 5s 7R"
)]
#[case(
    "P-92.6",
    "xylitol (2R,3r,4S)",
    "OC[C@H](O)[C@@H](O)[C@H](O)CO",
    "3S 5r 7R"
)]
#[case(
    "P-93.4.1.2",
    "D-arabinitol (2R,4R)",
    "OC[C@@H](O)C(O)[C@H](O)CO",
    "3R 7R"
)]
#[case(
    "P-93.4.1.2",
    "galactitol (2R,3S,4R,5S)",
    "OC[C@@H](O)[C@H](O)[C@H](O)[C@@H](O)CO",
    "3R 5S 7R 9S"
)]
#[case("P-65.1.2.2", "L-lactic acid", "C[C@H](O)C(=O)O", "2S")]
#[case("P-65.1.2.2", "L-malic acid", "OC(=O)C[C@H](O)C(=O)O", "5S")]
#[case(
    "P-65.1.2.2",
    "L-tartaric acid (2R,3R)",
    "OC(=O)[C@H](O)[C@@H](O)C(=O)O",
    "4R 6R"
)]
#[case(
    "P-65.1.2.2",
    "meso-tartaric acid (2R,3S)",
    "OC(=O)[C@H](O)[C@H](O)C(=O)O",
    "4R 6S"
)]
#[case("P-93.1.1", "(R)-butan-2-ol", "CC[C@@H](C)O", "3R")]
#[case("P-91.3", "(R)-bromochlorofluoromethane", "F[C@H](Cl)Br", "2R")]
#[case("P-92.2.1", "(R)-1-phenylethanol", "C[C@@H](O)c1ccccc1", "2R")]
#[case("P-92.2.1", "(S)-nicotine", "CN1CCC[C@H]1c1cccnc1", "6S")]
#[case("P-92.2.1", "(R)-limonene", "CC1=CC[C@@H](CC1)C(C)=C", "5R")]
#[case("P-92.2.1", "(R)-carvone", "CC1=CC[C@H](CC1=O)C(C)=C", "5R")]
#[case("P-92.2.1", "(S)-ibuprofen", "CC(C)Cc1ccc(cc1)[C@H](C)C(=O)O", "11S")]
#[case("P-92.2.1", "(S)-naproxen", "COc1ccc2cc(ccc2c1)[C@H](C)C(=O)O", "13S")]
#[case("P-92.2.1", "(R)-adrenaline", "CNC[C@H](O)c1ccc(O)c(O)c1", "4R")]
#[case("P-92.2.1", "levodopa", "N[C@@H](Cc1ccc(O)c(O)c1)C(=O)O", "2S")]
#[case(
    "P-93.1.2",
    "(1R,2S)-ephedrine",
    "CN[C@@H](C)[C@H](O)c1ccccc1",
    "3S 5R"
)]
#[case(
    "P-93.1.2",
    "(1R,2R)-pseudoephedrine",
    "CN[C@H](C)[C@H](O)c1ccccc1",
    "3R 5R"
)]
#[case(
    "P-93.5.1",
    "(1R,2S,5R)-menthol",
    "CC(C)[C@@H]1CC[C@@H](C)C[C@H]1O",
    "4S 7R 10R"
)]
#[case(
    "P-93.5.2.1",
    "(1R,4R)-camphor",
    "CC1(C)[C@@H]2CC[C@@]1(C)C(=O)C2",
    "4R 7R"
)]
#[case(
    "P-93.5.4",
    "cholesterol (3S,8S,9S,10R,13R,14S,17R,20R)",
    "C[C@H](CCCC(C)C)[C@H]1CC[C@@H]2[C@@]1(CC[C@H]3[C@H]2CC=C4[C@@]3(CC[C@@H](C4)O)C)C",
    "2R 9R 12S 13R 16S 17S 21R 24S"
)]
#[case(
    "P-93.5.2",
    "penicillin G (2S,5R,6R)",
    "CC1(C)S[C@@H]2[C@H](NC(=O)Cc3ccccc3)C(=O)N2[C@H]1C(=O)O",
    "5R 6R 20S"
)]
#[case("P-92.3", "(S)-(1-2H)ethanol", "C[C@@H](O)[2H]", "2S")]
#[case("P-93.3.3", "(R)-methyl phenyl sulfoxide", "C[S@@](=O)c1ccccc1", "2R")]
#[case(
    "P-93.3.3",
    "esomeprazole (S)",
    "COc1ccc2[nH]c(nc2c1)[S@@](=O)Cc1ncc(C)c(OC)c1C",
    "12S"
)]
#[case(
    "P-93.5.1.1",
    "cis-1,2-dimethylcyclohexane (1R,2S)",
    "C[C@H]1CCCC[C@H]1C",
    "2S 7R"
)]
#[case(
    "P-93.5.1.1",
    "trans-1,2-dimethylcyclohexane (1R,2R)",
    "C[C@@H]1CCCC[C@H]1C",
    "2R 7R"
)]
#[case(
    "P-93.5.1.1",
    "cis-4-methylcyclohexan-1-ol (1s,4s)",
    "O[C@@H]1CC[C@H](C)CC1",
    "2s 5s"
)]
#[case(
    "P-93.5.1.1",
    "trans-4-methylcyclohexan-1-ol (1r,4r)",
    "O[C@H]1CC[C@H](C)CC1",
    "2r 5r"
)]
#[case(
    "P-93.5.1.1",
    "cis-cyclobutane-1,3-diol (1s,3s)",
    "O[C@H]1C[C@@H](O)C1",
    "2s 4s"
)]
#[case("P-93.4.2", "maleic acid", "OC(=O)/C=C\\C(=O)O", "4Z 5Z")]
#[case("P-93.4.2", "fumaric acid", "OC(=O)/C=C/C(=O)O", "4E 5E")]
#[case("P-93.4.2", "tiglic acid (E)", "C/C=C(\\C)C(=O)O", "2E 3E")]
#[case("P-93.4.2", "angelic acid (Z)", "C/C=C(/C)C(=O)O", "2Z 3Z")]
#[case("P-93.4.2", "(E)-stilbene", "c1ccccc1/C=C/c1ccccc1", "7E 8E")]
#[case("P-93.4.2", "oleic acid (9Z)", "CCCCCCCC/C=C\\CCCCCCCC(=O)O", "9Z 10Z")]
#[case("P-93.4.2", "(E)-cinnamic acid", "OC(=O)/C=C/c1ccccc1", "4E 5E")]
#[case("P-93.4.2", "geranial (2E)", "O=C/C=C(\\C)CCC=C(C)C", "3E 4E")]
#[case("P-93.4.2", "neral (2Z)", "O=C/C=C(/C)CCC=C(C)C", "3Z 4Z")]
#[case(
    "P-93.4.2",
    "(Z)-1-bromo-1-chloro-2-fluoroethene",
    "F/C=C(/Cl)Br",
    "2Z 3Z"
)]
#[case("P-93.4.2", "(E)-azobenzene", "c1ccccc1/N=N/c1ccccc1", "7E 8E")]
#[case("P-93.4.2", "(E)-acetaldoxime", "C/C=N/O", "2E 3E")]
#[case(
    "P-93.4.2",
    "tamoxifen (Z)",
    "CC/C(=C(\\c1ccccc1)/c1ccc(cc1)OCCN(C)C)/c1ccccc1",
    "3Z 4Z"
)]
#[case("P-93.4.2.4", "(R)-linalool", "CC(C)=CCC[C@@](C)(O)C=C", "7R")]
#[case("P-93.5.1.4", "(E)-cyclooctene", "C1CCC/C=C/CC1", "5E 6E")]
#[case("P-93.4.2", "(M)-penta-2,3-diene", "CC=[C@]=CC", "2M 4M")]
#[case("P-93.4.2.3", "(Z)-hexa-2,3,4-triene", "C/C=C=C=C\\C", "2Z 5Z")]
#[case("P-93.5.2.3", "(1R,4S)-norbornene", "C=1[C@@H]2CC[C@H](C1)C2", "2R 5S")]
#[case(
    "P-93.5.2.3",
    "(1R,4S)-norbornene, one end marked",
    "C=1[C@H]2CCC(C1)C2",
    "2S 5R"
)]
#[case(
    "P-93.5.2.3",
    "(1R,5S)-tropan-3-one",
    "O=C1C[C@H]2CC[C@@H](C1)N2C",
    "4R 7S"
)]
#[case(
    "P-93.5.2.3",
    "adamantane, three like ligands",
    "C1[C@H]2C[C@H]3C[C@@H]1C[C@@H](C2)C3",
    ""
)]
fn labels_are_those_of_the_name(
    #[case] section: &str,
    #[case] name: &str,
    #[case] text: &str,
    #[case] expected: &str,
) {
    let canonical = Comparer::default().canonical(text).unwrap();
    let labelled = all_labels(&canonical).into_iter();
    let mut found: Vec<(u32, String)> = labelled
        .flat_map(|(centres, label)| centres.map(|atom| (atom + 1, label.to_string())))
        .collect();
    found.sort();
    found.dedup();
    let found: Vec<String> = found
        .iter()
        .map(|(atom, label)| format!("{atom}{label}"))
        .collect();
    assert_eq!(found.join(" "), expected, "{name} ({section})");
}
