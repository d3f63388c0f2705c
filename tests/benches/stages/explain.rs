//! What makes the difference: the atom map and what follows from it.

use divan::{Bencher, black_box};
use molkin_graph::Limits;
use molkin_relate::{Relation, explain};

use crate::relate::structures;

/// Drug-sized constitutional isomers: one substituent elsewhere, and a rearranged skeleton.
const ISOMERS: [(&str, [&str; 2], usize); 2] = [
    (
        "substituent",
        [
            "Cc1ccc(cc1Nc1nccc(n1)-c1cccnc1)NC(=O)c1ccc(cc1)CN1CCN(C)CC1",
            "Cc1ccc(cc1Nc1nccc(n1)-c1ccncc1)NC(=O)c1ccc(cc1)CN1CCN(C)CC1",
        ],
        2,
    ),
    (
        "skeleton",
        ["CC(C)Cc1ccc(cc1)C(C)C(=O)O", "CCCCc1ccc(cc1)CCOC=O"],
        4,
    ),
];

#[divan::bench(args = ISOMERS.map(|(name, ..)| name))]
fn explain_pair(bencher: Bencher<'_, '_>, name: &str) {
    let pair = ISOMERS.iter().find(|pair| pair.0 == name);
    let &(_, texts, apart) = pair.unwrap();
    let [a, b] = structures(texts);
    let limits = Limits::default();
    let bonds = explain(&a, &b, Relation::Constitutional, &limits)
        .bonds
        .unwrap();
    assert_eq!(
        (bonds.only_in_a.len() + bonds.only_in_b.len(), bonds.minimal),
        (apart, true)
    );
    bencher.bench_local(|| {
        explain(
            black_box(&a),
            black_box(&b),
            Relation::Constitutional,
            &limits,
        )
    });
}
