//! Labelled pairs of real structures: ../shared/data/relations.

use std::collections::BTreeMap;

use molkin_relate::{Relation, Structure};
use molkin_tests::{Comparer, Table, Tally, first_word, read_text, shared, workspace};
use rstest::rstest;

/// Rows whose label the published definitions contradict: verdict and reason by row.
fn disputed(set: &str) -> BTreeMap<String, String> {
    let table = Table::read(&workspace("fixtures/disputed/relations.tsv"));
    table
        .columns(["set", "row", "verdict", "reason"])
        .filter(|[own, ..]| *own == set)
        .map(|[_, row, verdict, reason]| {
            assert!(!reason.is_empty(), "row {row} gives no reason");
            (row.to_owned(), verdict.to_owned())
        })
        .collect()
}

/// Keys must say what the verdict says.
fn check_keys(a: &Structure, b: &Structure, relation: Relation) -> Result<(), String> {
    let (a, b) = (a.canonical(), b.canonical());
    let same_compound = a.compound_key() == b.compound_key();
    if same_compound != (relation == Relation::Identical) {
        return Err(format!(
            "{relation:?}, compound keys equal: {same_compound}"
        ));
    }
    let same_constitution = a.constitution_key() == b.constitution_key();
    let isotopomers = a.same_constitution(b) && !a.same_labelled_constitution(b);
    let expected = match relation {
        Relation::NotIsomers => return Ok(()),
        Relation::Constitutional => isotopomers,
        _ => true,
    };
    if same_constitution != expected {
        return Err(format!(
            "{relation:?}, constitution keys equal: {same_constitution}"
        ));
    }
    Ok(())
}

fn verdict(comparer: &mut Comparer, a: &str, b: &str) -> Result<(String, String), String> {
    let (a, b) = (comparer.structure(a)?, comparer.structure(b)?);
    let verdict = comparer.relate(&a, &b)?;
    let mirror = comparer.relate(&b, &a)?;
    if verdict != mirror {
        return Err(format!("{verdict:?}, the other way round {mirror:?}"));
    }
    check_keys(&a, &b, verdict.relation)?;
    let kind = verdict.relation.kind().unwrap_or_default();
    Ok((verdict.relation.as_str().to_owned(), kind.to_owned()))
}

#[rstest]
#[case("relations", "", 12_568)]
#[case("claims", "claims_", 716)]
fn labelled_pairs(#[case] set: &'static str, #[case] prefix: &str, #[case] stated: usize) {
    let Some(folder) = shared("relations") else {
        return;
    };
    let [a, b, truth] = ["a.smi", "b.smi", "truth.tsv"]
        .map(|file| read_text(&folder.join(format!("{prefix}{file}"))));
    let mut disputed = disputed(set);
    assert!(
        disputed.len() * 1000 <= stated,
        "more than 0.1 % are disputed"
    );
    let mut comparer = Comparer::default();
    let mut tally = Tally::new(set);
    for ((a, b), label) in a.lines().zip(b.lines()).zip(truth.lines()) {
        let (a, b) = (first_word(a), first_word(b));
        let mut fields = label.split('\t').map(str::to_owned);
        let [row, relation, kind] = [(); 3].map(|()| fields.next().unwrap_or_default());
        let outcome = verdict(&mut comparer, a, b).and_then(|(found, found_kind)| {
            let good = found == relation && (kind.is_empty() || kind == found_kind);
            let found = format!("{found} {found_kind}").trim_end().to_owned();
            match (good, disputed.remove(&row)) {
                (true, None) => Ok(()),
                (true, Some(_)) => Err("listed as disputed, but as labelled".to_owned()),
                (false, Some(listed)) if listed == found => Ok(()),
                (false, _) => Err(format!("{found}, labelled {relation} {kind}")),
            }
        });
        tally.value(outcome.map_err(|error| format!("row {row}: {error}\n    {a}\n    {b}")));
    }
    assert!(disputed.is_empty(), "not met: {disputed:?}");
    tally.finish(stated);
}
