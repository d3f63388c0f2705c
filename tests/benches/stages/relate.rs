//! Verdicts on prepared structures.

use divan::{Bencher, black_box};
use molkin_graph::{Limits, Orderer};
use molkin_relate::{Relation, StereoKind, Structure, relate};
use molkin_tests::Comparer;

use crate::inputs;

pub(crate) fn structures(pair: [&str; 2]) -> [Structure; 2] {
    let mut comparer = Comparer::default();
    pair.map(|text| comparer.structure(text).unwrap())
}

/// Each input against itself.
#[divan::bench(args = inputs::NAMES)]
fn relate_equal(bencher: Bencher<'_, '_>, name: &str) {
    let text = inputs::text(name);
    let [a, b] = structures([&text, &text]);
    let mut orderer = Orderer::new(Limits::default());
    let verdict = relate(&mut orderer, &a, &b).unwrap();
    assert_eq!(verdict.relation, Relation::Identical);
    bencher.bench_local(|| relate(&mut orderer, black_box(&a), black_box(&b)));
}

/// Two spellings, two enantiomers, an open centre against a marked one.
const PAIRS: [(&str, [&str; 2], Relation); 3] = [
    (
        "identical",
        ["OC(=O)[C@@H](N)Cc1ccccc1", "c1ccccc1C[C@H](N)C(O)=O"],
        Relation::Identical,
    ),
    (
        "enantiomers",
        ["OC(=O)[C@@H](N)Cc1ccccc1", "OC(=O)[C@H](N)Cc1ccccc1"],
        Relation::Stereo(StereoKind::Enantiomers),
    ),
    (
        "undetermined",
        ["OC(=O)C(N)Cc1ccccc1", "OC(=O)[C@H](N)Cc1ccccc1"],
        Relation::Stereo(StereoKind::Undetermined),
    ),
];

#[divan::bench(args = PAIRS.map(|(name, ..)| name))]
fn relate_pair(bencher: Bencher<'_, '_>, name: &str) {
    let pair = PAIRS.iter().find(|pair| pair.0 == name);
    let &(_, texts, expected) = pair.unwrap();
    let [a, b] = structures(texts);
    let mut orderer = Orderer::new(Limits::default());
    let verdict = relate(&mut orderer, &a, &b).unwrap();
    assert_eq!(verdict.relation, expected);
    bencher.bench_local(|| relate(&mut orderer, black_box(&a), black_box(&b)));
}
