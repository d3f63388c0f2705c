//! Numbers of isomers: published sequences, complete sets, textbook cases.

use std::collections::{BTreeMap, BTreeSet};

use molkin_graph::Key;
use molkin_tests::{Comparer, Table, Tally, alkanes, all_markings, mirrored, read_text, shared};
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
const CONSTITUTIONS: [usize; 12] = [1, 1, 1, 2, 3, 5, 9, 18, 35, 75, 159, 355];
const STEREOISOMERS: [usize; 10] = [1, 1, 1, 2, 3, 5, 11, 24, 55, 136];

#[test]
fn alkanes_are_as_many_as_published() {
    let found = alkanes(CONSTITUTIONS.len());
    let counts: Vec<usize> = found.iter().map(BTreeMap::len).collect();
    assert_eq!(counts, CONSTITUTIONS);
    let mut comparer = Comparer::default();
    let drawings = found[..STEREOISOMERS.len()].iter().map(|size| {
        let marked = size.values().map(|tree| {
            let molecule = tree.molecule();
            let keys: BTreeSet<Key> = all_markings(&molecule)
                .iter()
                .map(|marked| comparer.key(marked).unwrap())
                .collect();
            keys.len()
        });
        marked.sum()
    });
    assert_eq!(drawings.collect::<Vec<usize>>(), STEREOISOMERS);
}

/// Every marking of the carbon atoms; how many compounds, and how many when mirror images count once.
#[rstest]
#[case::inositols("OC1C(O)C(O)C(O)C(O)C1O", 9, 8)]
#[case::tartaric_acids("OC(=O)C(O)C(O)C(=O)O", 3, 2)]
#[case::aldohexoses("OCC(O)C(O)C(O)C(O)C=O", 16, 8)]
#[case::truxillic_acids("OC(=O)C1C(c2ccccc2)C(C(=O)O)C1c1ccccc1", 5, 5)]
#[case::truxinic_acids("OC(=O)C1C(C(=O)O)C(c2ccccc2)C1c1ccccc1", 10, 6)]
fn textbook_stereoisomers(
    #[case] text: &str,
    #[case] compounds: usize,
    #[case] without_mirror_images: usize,
) {
    let mut comparer = Comparer::default();
    let molecule = comparer.molecule(text).unwrap();
    let mut keys = BTreeSet::new();
    let mut pairs = BTreeSet::new();
    for marked in all_markings(&molecule) {
        let key = comparer.key(&marked).unwrap();
        let image = comparer.key(&mirrored(&marked)).unwrap();
        keys.insert(key);
        pairs.insert(key.min(image));
    }
    assert_eq!(
        (keys.len(), pairs.len()),
        (compounds, without_mirror_images)
    );
}
