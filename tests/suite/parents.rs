//! Parents of salts and solvates against a reference library.

use std::collections::{BTreeMap, BTreeSet};

use molkin_graph::Limits;
use molkin_relate::{Axes, Axis, Normaliser, Structure};
use molkin_tests::{Comparer, Table, Tally, collection, workspace};
use rstest::rstest;

/// Differences that were judged: cause by set and record.
fn settled(set: &str) -> BTreeMap<u64, String> {
    let table = Table::read(&workspace("fixtures/disputed/parents.tsv"));
    let rows = table.columns(["set", "record", "cause"]);
    let own = rows.filter(|[name, ..]| *name == set);
    own.map(|[_, record, cause]| (record.parse().unwrap(), cause.to_owned()))
        .collect()
}

/// The parents of the reference library, by record.
fn reference(set: &str) -> BTreeMap<u64, String> {
    let table = Table::read(&workspace("fixtures/parents/reference.tsv.gz"));
    let rows = table.columns(["set", "record", "parent"]);
    let own = rows.filter(|[name, ..]| *name == set);
    own.map(|[_, record, parent]| (record.parse().unwrap(), parent.to_owned()))
        .collect()
}

/// Constitution keys are compared: what a drawing says about stereo is another matter.
fn agrees(
    comparer: &mut Comparer,
    normaliser: &mut Normaliser,
    record: &Structure,
    parent: &str,
) -> Result<bool, String> {
    let axes = Axes::from([Axis::Salt, Axis::Charge]);
    let form = normaliser.overlook(record, axes);
    let form = form.map_err(|error| error.to_string())?;
    let parent = comparer.structure(parent)?;
    let keys = [form.structure(), &parent].map(|side| side.canonical().constitution_key());
    Ok(keys[0] == keys[1])
}

#[rstest]
#[case("drugs", "drugs.csv", 1_900)]
#[case("hard", "hard.sdf.gz", 1_100)]
fn parents_are_those_of_the_reference_library(
    #[case] set: &'static str,
    #[case] file: &'static str,
    #[case] at_least: usize,
) {
    let Some(records) = collection(file) else {
        return;
    };
    let (settled, reference) = (settled(set), reference(set));
    let mut comparer = Comparer::default();
    let mut normaliser = Normaliser::new(Limits::default());
    let mut tally = Tally::new(set);
    let mut differing = BTreeSet::new();
    for (number, outcome) in (1..).zip(records) {
        let Ok(record) = outcome.unwrap().result else {
            continue;
        };
        let parent = &reference[&number];
        let Ok(structure) = comparer.prepare(record.molecule) else {
            continue;
        };
        let outcome = agrees(&mut comparer, &mut normaliser, &structure, parent);
        let agreed = tally.value(outcome.map_err(|error| format!("{number}: {error}")));
        if agreed == Some(false) {
            differing.insert(number);
        }
    }
    tally.finish(at_least);
    eprintln!("{set}: {} parents differ", differing.len());
    let judged: BTreeSet<u64> = settled.keys().copied().collect();
    let new: Vec<&u64> = differing.difference(&judged).collect();
    let gone: Vec<&u64> = judged.difference(&differing).collect();
    assert!(new.is_empty(), "not judged: {new:?}");
    assert!(gone.is_empty(), "agree by now: {gone:?}");
}
