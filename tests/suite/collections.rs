//! Collections of real structures: what is read, and what canonical SMILES keeps.

use std::collections::BTreeMap;

use molkin_formats::{smiles, source::RecordOutcome};
use molkin_graph::Canonical;
use molkin_tests::{Comparer, Table, Tally, collection, workspace};
use rstest::rstest;

/// The reason for each refused record of a file, by its number.
fn refusals(file: &str) -> BTreeMap<u64, String> {
    let table = Table::read(&workspace("fixtures/refused/collections.tsv"));
    table
        .columns(["file", "record", "code", "reason"])
        .filter(|[own, ..]| *own == file)
        .map(|[_, record, code, reason]| {
            assert!(!reason.is_empty(), "{file} {record} gives no reason");
            (record.parse().unwrap(), code.to_owned())
        })
        .collect()
}

/// The canonical view of a record, or the code of the error.
fn view(comparer: &mut Comparer, outcome: RecordOutcome) -> Result<Canonical, String> {
    let record = outcome.result.map_err(|error| error.code().to_owned())?;
    let structure = comparer.prepare(record.molecule)?;
    Ok(structure.canonical().clone())
}

/// Canonical SMILES gives the same key and the same text, what it says to have lost aside.
fn read_back(comparer: &mut Comparer, canonical: &Canonical) -> Result<bool, String> {
    let written = smiles::write(&canonical.form());
    if !written.lost.is_empty() {
        return Ok(false);
    }
    let again = comparer.canonical(&written.text)?;
    if again.compound_key() != canonical.compound_key() {
        return Err(format!("{}: another key", written.text));
    }
    let text = smiles::write(&again.form()).text;
    if text != written.text {
        return Err(format!("{}: becomes {text}", written.text));
    }
    Ok(true)
}

#[rstest]
#[case::drugs("drugs.csv", 1_935)]
#[case::natural_products("natural_products.smi.gz", 50_000)]
#[case::chiral("chiral.smi.gz", 81_030)]
#[case::actives("actives.smi.gz", 10_000)]
#[case::vendor("vendor.smi", 9_999)]
#[case::hard("hard.sdf.gz", 1_181)]
#[case::solubility("solubility.sdf.gz", 1_025)]
#[case::nci("nci200.sdf.gz", 200)]
#[case::mols("mols.1000.sdf.gz", 1_000)]
fn collections_are_read_and_written(#[case] file: &'static str, #[case] stated: usize) {
    let Some(records) = collection(file) else {
        return;
    };
    let mut refusals = refusals(file);
    assert!(
        refusals.len() * 1000 <= stated,
        "less than 99.9 % of {file} is read"
    );
    let mut comparer = Comparer::default();
    let mut tally = Tally::new(file);
    let mut lost = 0;
    for outcome in records {
        let outcome = outcome.unwrap();
        let index = outcome.index;
        let name = outcome.name.clone();
        let result = match (view(&mut comparer, outcome), refusals.remove(&index)) {
            (Ok(canonical), None) => {
                let kept = read_back(&mut comparer, &canonical);
                lost += usize::from(kept == Ok(false));
                kept.map(|_| ())
            }
            (Ok(_), Some(_)) => Err("listed as refused, but read".to_owned()),
            (Err(code), Some(listed)) if code == listed => Ok(()),
            (Err(code), _) => Err(code),
        };
        tally.value(result.map_err(|error| format!("{file} record {index} {name}: {error}")));
    }
    eprintln!("{file}: {lost} records lose something as SMILES, and say so");
    assert!(refusals.is_empty(), "not met: {refusals:?}");
    tally.finish(stated);
}
