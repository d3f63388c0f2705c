//! Numbers of isomers: published sequences, complete sets, textbook cases.

use std::collections::{BTreeMap, BTreeSet};

use molkin_graph::{Key, Molecule, Remark};
use molkin_tests::{
    Comparer, Markings, Table, Tally, Tree, alkanes, all_markings, is_full_run, mirrored,
    read_text, shared,
};
use rstest::rstest;

/// Sets in which bond-shift forms of 4n rings are one structure, with the number of structures.
const FEWER: [(&str, usize); 6] = [
    ("C6H6", 214),
    ("C6H6O", 2217),
    ("C7H8", 1022),
    ("C7H10", 574),
    ("C8H8", 7342),
    ("C8H10", 4650),
];

#[test]
fn complete_sets_have_as_many_keys_as_isomers() {
    let Some(folder) = shared("counts/complete_sets") else {
        return;
    };
    let index = Table::read(&folder.join("index.tsv"));
    let fewer = BTreeMap::from(FEWER);
    let mut comparer = Comparer::default();
    let mut tally = Tally::new("complete sets");
    for [formula, records] in index.columns(["formula", "records"]) {
        let text = read_text(&folder.join(format!("{formula}.smi.gz")));
        let keys: BTreeSet<Key> = text
            .lines()
            .map(|line| comparer.canonical(line.trim()).unwrap().constitution_key())
            .collect();
        let lines = text.lines().count();
        let expected = fewer.get(formula).copied().unwrap_or(lines);
        let good = keys.len() == expected && lines.to_string() == records;
        tally.case(good, || {
            format!("{formula}: {} keys of {lines}, not {expected}", keys.len())
        });
    }
    tally.finish(32);
}

/// OEIS A000602 and A000628, from one carbon atom on.
const CONSTITUTIONS: [usize; 14] = [1, 1, 1, 2, 3, 5, 9, 18, 35, 75, 159, 355, 802, 1858];
const STEREOISOMERS: [usize; 14] = [1, 1, 1, 2, 3, 5, 11, 24, 55, 136, 345, 900, 2412, 6563];
/// Carbon atoms up to which the default run counts.
const CONSTITUTIONS_BY_DEFAULT: usize = 12;
const STEREOISOMERS_BY_DEFAULT: usize = 11;

#[test]
fn alkanes_are_as_many_as_published() {
    let up_to = |default: usize| {
        if is_full_run() {
            CONSTITUTIONS.len()
        } else {
            default
        }
    };
    let found = alkanes(up_to(CONSTITUTIONS_BY_DEFAULT));
    let counts: Vec<usize> = found.iter().map(BTreeMap::len).collect();
    assert_eq!(counts, CONSTITUTIONS[..counts.len()]);
    let mut comparer = Comparer::default();
    let mut stereoisomers = |size: &BTreeMap<Key, Tree>| -> usize {
        let counts = size.values().map(|tree| {
            let marked = all_markings(&tree.molecule());
            distinct(&mut comparer, marked).0
        });
        counts.sum()
    };
    let sizes = found[..up_to(STEREOISOMERS_BY_DEFAULT)].iter();
    let counts: Vec<usize> = sizes.map(&mut stereoisomers).collect();
    eprintln!("alkanes with stereoisomers: {counts:?}");
    assert_eq!(counts, STEREOISOMERS[..counts.len()]);
}

/// The number of compounds, and the number when mirror images count once.
fn distinct(
    comparer: &mut Comparer,
    molecules: impl IntoIterator<Item = Molecule>,
) -> (usize, usize) {
    let mut keys = BTreeSet::new();
    let mut pairs = BTreeSet::new();
    for molecule in molecules {
        let key = comparer.key(&molecule).unwrap();
        let image = comparer.key(&mirrored(&molecule)).unwrap();
        keys.insert(key);
        pairs.insert(key.min(image));
    }
    (keys.len(), pairs.len())
}

/// Every marking of carbon atoms, double bonds and axes, but those that a cage cannot have.
fn stereoisomers(comparer: &mut Comparer, text: &str) -> (usize, usize) {
    let canonical = comparer.canonical(text).unwrap();
    let molecule = comparer.molecule(text).unwrap();
    let markings = Markings::new(&molecule, &canonical.stereo_elements());
    let marked = markings.full().map(|marks| markings.marked(&marks));
    let possible: Vec<Molecule> = marked
        .filter(|marked| {
            let remarks = comparer.order(marked).unwrap().remarks();
            let impossible = |remark: &Remark| matches!(remark, Remark::ImpossibleCage { .. });
            !remarks.iter().any(impossible)
        })
        .collect();
    distinct(comparer, possible)
}

/// Compounds, and compounds when mirror images count once. Sources: Eliel and Wilen,
/// *Stereochemistry of Organic Compounds*, 1994 (from memory), where no other is named; the counts of
/// flat ring systems also follow from Burnside's lemma with the rotations of the flat ring, of
/// which those about an axis in its plane turn up into down.
#[rstest]
// Chains: 2^(n-1) with the two ends alike.
#[case::tartaric_acids("OC(=O)C(O)C(O)C(=O)O", 3, 2)]
#[case::tetroses("OCC(O)C(O)C=O", 4, 2)]
#[case::pentoses("OCC(O)C(O)C(O)C=O", 8, 4)]
#[case::hexoses("OCC(O)C(O)C(O)C(O)C=O", 16, 8)]
#[case::hexuloses("OCC(=O)C(O)C(O)C(O)CO", 8, 4)]
#[case::pentitols("OCC(O)C(O)C(O)CO", 4, 3)]
#[case::hexitols("OCC(O)C(O)C(O)C(O)CO", 10, 6)]
#[case::heptitols("OCC(O)C(O)C(O)C(O)C(O)CO", 16, 10)]
// One ring.
#[case::dimethylcyclopropane("CC1CC1C", 3, 2)]
#[case::trimethylcyclopropane("CC1C(C)C1C", 2, 2)]
#[case::truxillic_acids("OC(=O)C1C(c2ccccc2)C(C(=O)O)C1c1ccccc1", 5, 5)]
#[case::truxinic_acids("OC(=O)C1C(C(=O)O)C(c2ccccc2)C1c1ccccc1", 10, 6)]
#[case::tetramethylcyclobutane("CC1C(C)C(C)C1C", 4, 4)]
#[case::cyclohexane_1_2_diol("OC1CCCCC1O", 3, 2)]
#[case::cyclohexane_1_3_diol("OC1CCCC(O)C1", 3, 2)]
#[case::cyclohexane_1_4_diol("OC1CCC(O)CC1", 2, 2)]
#[case::trimethylcyclohexane_1_2_3("CC1CCCC(C)C1C", 4, 3)]
#[case::trimethylcyclohexane_1_2_4("CC1CCC(C)CC1C", 8, 4)]
#[case::trimethylcyclohexane_1_3_5("CC1CC(C)CC(C)C1", 2, 2)]
#[case::benzene_hexachlorides("ClC1C(Cl)C(Cl)C(Cl)C(Cl)C1Cl", 9, 8)]
#[case::menthols("CC1CCC(C(C)C)C(O)C1", 8, 4)]
// Annulated rings. Five perhydroanthracenes, six perhydrophenanthrenes: Linstead, J. Chem. Soc.
// 1942 (from memory).
#[case::decalins("C1CCC2CCCCC2C1", 2, 2)]
#[case::hydrindanes("C1CCC2CCCC2C1", 3, 2)]
#[case::bicyclo_3_3_0_octanes("C1CC2CCCC2C1", 2, 2)]
#[case::perhydroanthracenes("C1CCC2CC3CCCCC3CC2C1", 7, 5)]
#[case::perhydrophenanthrenes("C1CCC2C(C1)CCC1CCCCC21", 10, 6)]
#[case::cholestanols("CC(C)CCCC(C)C1CCC2C1(C)CCC1C2CCC2CC(O)CCC12C", 512, 256)]
// Spiro rings. The diols: Gerlach, Helv. Chim. Acta 1968 (from memory).
#[case::spirononanediols("OC1CCCC12CCCC2O", 6, 3)]
#[case::spirononanediones("O=C1CCCC12CCCC2=O", 2, 1)]
#[case::fecht_acid("OC(=O)C1CC2(C1)CC(C(=O)O)C2", 2, 1)]
#[case::dispiro_para("OC1CC2(C1)CC1(C2)CC(O)C1", 2, 2)]
// Cages whose bridgeheads determine each other.
#[case::camphor("CC12CCC(C1(C)C)CC2=O", 2, 1)]
#[case::borneols("CC12CCC(C1(C)C)CC2O", 4, 2)]
#[case::norbornanediols("OC1C(O)C2CCC1C2", 4, 3)]
#[case::tropines("CN1C2CCC1CC(O)C2", 2, 2)]
// Double bonds and axes.
#[case::muconic_acids("OC(=O)C=CC=CC(=O)O", 3, 3)]
#[case::octatrienes("CC=CC=CC=CC", 6, 6)]
#[case::pseudoasymmetric_dienol("CC=CC(O)C=CC", 4, 3)]
#[case::pentadiene("CC=C=CC", 2, 1)]
#[case::hexatriene("CC=C=C=CC", 2, 2)]
// Stereogenic only through each other. The acid: Perkin, Pope and Wallach, J. Chem. Soc. 1909.
#[case::cyclohexylidene_acetic_acid("CC1CCC(=CC(=O)O)CC1", 2, 1)]
#[case::diethylidenecyclobutane("CC=C1CC(=CC)C1", 2, 2)]
#[case::diethylidene_spiroheptane("CC=C1CC2(C1)CC(=CC)C2", 2, 1)]
fn textbook_stereoisomers(
    #[case] text: &str,
    #[case] compounds: usize,
    #[case] without_mirror_images: usize,
) {
    let counts = stereoisomers(&mut Comparer::default(), text);
    assert_eq!(counts, (compounds, without_mirror_images));
}

/// Rings (CHOH)n from n = 3: by Burnside's lemma as above; nine inositols.
const RING_POLYOLS: [usize; 8] = [2, 4, 4, 9, 10, 22, 30, 62];

#[test]
fn ring_polyols_are_as_many_as_their_necklaces() {
    let mut comparer = Comparer::default();
    let counts: Vec<usize> = (3..=10)
        .map(|size| {
            let text = format!("OC1{}C1O", "C(O)".repeat(size - 2));
            stereoisomers(&mut comparer, &text).0
        })
        .collect();
    assert_eq!(counts, RING_POLYOLS);
}
