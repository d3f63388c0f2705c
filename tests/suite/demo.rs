//! The demo scenario: what its page says is so, and every relation and kind occurs.

use std::collections::{BTreeMap, BTreeSet};

use molkin_formats::{Record, source};
use molkin_relate::Structure;
use molkin_tests::{Comparer, Tally, read_text, workspace};

/// Every record of a file by name: the structure, or why there is none.
fn structures(comparer: &mut Comparer, file: &str) -> Vec<(String, Result<Structure, String>)> {
    let path = workspace(&format!("fixtures/demo/{file}"));
    let records = source::Records::open(&path, source::ReadOptions::default()).unwrap();
    records
        .map(|outcome| {
            let outcome = outcome.unwrap();
            let record: Result<Record, _> = outcome.result.map_err(|error| error.to_string());
            let structure = record.and_then(|record| comparer.prepare(record.molecule));
            (outcome.name, structure)
        })
        .collect()
}

/// What a cell of the page says first: a relation or kind, and whether it is open.
fn stated(cell: &str) -> Option<(String, bool)> {
    let (words, _) = cell.split_once(':').unwrap_or((cell, ""));
    let open = words.contains("open");
    let word = words.split([' ', ',']).next()?;
    match word {
        "constitutional" | "enantiomers" | "diastereomers" | "undetermined" | "unresolved"
        | "identical" => Some((word.to_owned(), open)),
        "not" => Some(("not-isomers".to_owned(), open)),
        "an" => Some(("error".to_owned(), open)),
        _ => None,
    }
}

fn found(
    comparer: &mut Comparer,
    a: &Result<Structure, String>,
    b: &Result<Structure, String>,
) -> (String, bool) {
    let (Ok(a), Ok(b)) = (a, b) else {
        return ("error".to_owned(), false);
    };
    let verdict = comparer.relate(a, b).unwrap();
    let relation = verdict.relation;
    let word = relation.kind().unwrap_or(relation.as_str());
    (word.to_owned(), verdict.open)
}

/// The rows of the page's tables, as their cells without code marks.
fn page_rows() -> Vec<Vec<String>> {
    let page = read_text(&workspace("fixtures/demo/README.md"));
    page.lines()
        .filter_map(|line| line.strip_prefix('|')?.strip_suffix('|'))
        .map(|row| {
            let cells = row.split('|');
            cells.map(|cell| cell.trim().replace('`', "")).collect()
        })
        .collect()
}

#[test]
fn the_demo_is_as_its_page_says() {
    let mut comparer = Comparer::default();
    let mut tally = Tally::new("demo");
    let mut occurring = BTreeSet::new();
    let by_name = |list: Vec<(String, Result<Structure, String>)>| -> BTreeMap<_, _> {
        list.into_iter().collect()
    };
    let held = by_name(structures(&mut comparer, "held.smi"));
    let delivered = by_name(structures(&mut comparer, "vendor.sdf"));
    for row in page_rows() {
        let expected = stated(row.last().unwrap());
        let (a, b) = match &row[..] {
            [label, arrived, _] if label.ends_with(".mol") => {
                let mut first = |file: &str| structures(&mut comparer, file).remove(0).1;
                (first(label), first(arrived))
            }
            [code, _] => match (held.get(code), delivered.get(code)) {
                (Some(a), Some(b)) => (a.clone(), b.clone()),
                (a, b) if code.starts_with("QM-") => {
                    let one = a.is_some() != b.is_some();
                    tally.case(one && expected.is_none(), || format!("{row:?}"));
                    continue;
                }
                _ => continue,
            },
            _ => continue,
        };
        let found = found(&mut comparer, &a, &b);
        tally.case(expected.as_ref() == Some(&found), || {
            format!("{row:?}: {found:?}")
        });
        occurring.insert(found.0);
    }
    let all = [
        "constitutional",
        "diastereomers",
        "enantiomers",
        "error",
        "identical",
        "not-isomers",
        "undetermined",
        "unresolved",
    ];
    assert_eq!(
        occurring.iter().map(String::as_str).collect::<Vec<_>>(),
        all
    );
    tally.finish(24);
}
