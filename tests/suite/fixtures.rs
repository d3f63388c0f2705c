//! Committed pairs: fixtures/pairs and the tables of docs/definitions.md.

use std::collections::BTreeSet;

use molkin_tests::{Comparer, Pair, Tally, definition_pairs, fixture_pairs};
use rstest::rstest;

/// Both directions, and each side with itself.
fn check(comparer: &mut Comparer, pair: &Pair) -> Result<(), String> {
    let sides = [&pair.a, &pair.b].map(|text| comparer.structure(text));
    let [a, b] = sides;
    let (a, b) = (a?, b?);
    for (x, y) in [(&a, &b), (&b, &a)] {
        let verdict = comparer.relate(x, y)?;
        if !pair.expected.holds(&verdict) {
            return Err(format!("{verdict:?}, expected {:?}", pair.expected));
        }
    }
    for side in [&a, &b] {
        let verdict = comparer.relate(side, side)?;
        if verdict.relation.as_str() != "identical" {
            return Err(format!("a structure and itself: {verdict:?}"));
        }
    }
    let same_key = a.canonical().compound_key() == b.canonical().compound_key();
    if same_key != (pair.expected.relation == "identical") {
        return Err(format!("compound keys equal: {same_key}"));
    }
    Ok(())
}

fn check_all(name: &'static str, pairs: &[Pair], at_least: usize) {
    let mut comparer = Comparer::default();
    let mut tally = Tally::new(name);
    let mut names = BTreeSet::new();
    for pair in pairs {
        assert!(names.insert(&pair.name), "{} twice", pair.name);
        let outcome = check(&mut comparer, pair);
        tally.value(outcome.map_err(|error| {
            let Pair { name, a, b, .. } = pair;
            format!("{name}: {error}\n    {a}\n    {b}")
        }));
    }
    tally.finish(at_least);
}

#[rstest]
#[case("not-isomers")]
#[case("constitutional")]
#[case("enantiomers")]
#[case("diastereomers")]
#[case("undetermined")]
#[case("unresolved")]
#[case("identical")]
fn fixture_pairs_are_related_as_stated(#[case] file: &'static str) {
    check_all(file, &fixture_pairs(file), 24);
}

#[test]
fn pairs_of_the_definitions_are_related_as_stated() {
    check_all("definitions", &definition_pairs(), 200);
}
