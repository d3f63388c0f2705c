//! One bench for each stage of a comparison: `cargo bench -p molkin-tests`.
//!
//! Every stage takes the same named inputs, so that a slow stage shows. What a stage must give is
//! asserted outside the timed part. Results and how they were taken: docs/performance.md.
#![allow(
    clippy::panic,
    clippy::unwrap_used,
    reason = "a bench fails by panicking"
)]

use divan::{AllocProfiler, Bencher, black_box};
use molkin_formats::{Record, molfile, smiles};
use molkin_graph::{Canonical, CanonicalForm, Limits, Molecule, Orderer};
use molkin_relate::{Relation, StereoKind, Structure, explain, relate};
use molkin_tests::{Comparer, read_text, workspace};

/// Counts allocations, so that a stage which forgets to reuse its memory shows.
#[global_allocator]
static ALLOCATOR: AllocProfiler = AllocProfiler::system();

/// A drug-sized molecule, a highly symmetric cage, a long chain, many stereo elements.
const INPUTS: [&str; 4] = ["imatinib", "dodecahedrane", "chain-1000", "sugar"];

fn text(name: &str) -> String {
    match name {
        "imatinib" => "Cc1ccc(cc1Nc1nccc(n1)-c1cccnc1)NC(=O)c1ccc(cc1)CN1CCN(C)CC1".to_owned(),
        "dodecahedrane" => "C12C3C4C5C1C1C6C2C2C3C3C4C4C5C1C1C6C2C3C41".to_owned(),
        "chain-1000" => "C".repeat(1_000),
        "sugar" => {
            "OC[C@H]1O[C@@H](OC[C@H]2O[C@@H](O)[C@H](O)[C@@H](O)[C@@H]2O)[C@H](O)[C@@H](O)[C@@H]1O"
                .to_owned()
        }
        other => panic!("no input {other}"),
    }
}

fn molecule(name: &str) -> Molecule {
    smiles::parse(&text(name)).unwrap()
}

fn structures(pair: [&str; 2]) -> [Structure; 2] {
    let mut comparer = Comparer::default();
    pair.map(|text| comparer.structure(text).unwrap())
}

#[divan::bench(args = INPUTS)]
fn read_smiles(bencher: Bencher<'_, '_>, name: &str) {
    let text = text(name);
    let mut reader = smiles::Reader::default();
    assert!(reader.read(&text, 1).is_ok());
    bencher.bench_local(|| reader.read(black_box(&text), 1));
}

#[divan::bench]
fn read_molfile(bencher: Bencher<'_, '_>) {
    let text = read_text(&workspace("fixtures/demo/label.mol"));
    assert_eq!(
        molfile::parse(text.as_bytes())
            .unwrap()
            .molecule
            .atom_count(),
        10
    );
    bencher.bench_local(|| molfile::parse(black_box(text.as_bytes())));
}

#[divan::bench(args = INPUTS)]
fn order(bencher: Bencher<'_, '_>, name: &str) {
    let molecule = molecule(name);
    let mut orderer = Orderer::new(Limits::default());
    let canonical = orderer.order(&molecule).unwrap();
    assert_eq!(canonical.order().len(), molecule.atom_count());
    bencher.bench_local(|| orderer.order(black_box(&molecule)));
}

#[divan::bench(args = INPUTS)]
fn write_smiles(bencher: Bencher<'_, '_>, name: &str) {
    let form = Orderer::new(Limits::default())
        .order(&molecule(name))
        .unwrap()
        .form();
    assert!(smiles::write(&form).lost.is_empty());
    bencher.bench_local(|| smiles::write(black_box(&form)));
}

/// From text to keys and canonical text as a long run does it, all memory reused.
#[divan::bench(args = INPUTS)]
fn record_after_record(bencher: Bencher<'_, '_>, name: &str) {
    let text = text(name);
    let mut reader = smiles::Reader::default();
    let mut orderer = Orderer::new(Limits::default());
    let mut writer = smiles::Writer::default();
    let mut record = Record::default();
    let mut view = Canonical::default();
    let mut form = CanonicalForm::default();
    let mut written = smiles::Written::default();
    let mut run = || {
        reader.read_into(black_box(&text), 1, &mut record).unwrap();
        orderer.order_into(&record.molecule, &mut view).unwrap();
        orderer.form_into(&view, &mut form);
        writer.write_into(&form, &mut written);
        view.compound_key()
    };
    let key = run();
    assert_eq!(run(), key);
    bencher.bench_local(run);
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

fn main() {
    divan::main();
}
