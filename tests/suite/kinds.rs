//! Kinds: fixtures/pairs/kinds.tsv, the tables of docs/definitions.md, and what must hold of all pairs.

use std::collections::{BTreeMap, BTreeSet};

use molkin_formats::source::{Format, ReadOptions, Records};
use molkin_graph::{Element, Limits, Orderer};
use molkin_relate::{
    Kind, Normaliser, Structure, functional_groups, kinds, same_apart_from,
    wire::{self, Prepared, compare},
};
use molkin_tests::{
    Comparer, KindPair, Numbers, Tally, definition_kinds, first_word, fixture_kinds,
    other_kekule_form, read_text, renumbered, shared, with_hydrogens_written,
};
use rstest::rstest;

fn kinds_of(comparer: &mut Comparer, a: &Structure, b: &Structure) -> Result<Vec<Kind>, String> {
    let relation = comparer.relate(a, b)?.relation;
    let mut normaliser = Normaliser::new(Limits::default());
    // Where a form is not found the kinds do without it, as in output.
    let apart = same_apart_from(&mut normaliser, relation, a, b).unwrap_or_default();
    let found = kinds(relation, [a, b], apart, &Limits::default());
    found.map_err(|error| error.to_string())
}

fn words(kinds: &[Kind]) -> Vec<&'static str> {
    kinds.iter().map(|kind| kind.as_str()).collect()
}

/// Both directions, other drawings of both sides, and each side with itself.
fn check(comparer: &mut Comparer, pair: &KindPair, numbers: &mut Numbers) -> Result<(), String> {
    let sides = [comparer.structure(&pair.a)?, comparer.structure(&pair.b)?];
    let mut redrawn = Vec::new();
    for side in &sides {
        let drawn = other_kekule_form(side.molecule(), numbers);
        let drawn = renumbered(&with_hydrogens_written(&drawn), numbers);
        redrawn.push(comparer.prepare(drawn)?);
    }
    let [a, b] = &sides;
    for (x, y) in [(a, b), (b, a), (&redrawn[0], b), (&redrawn[1], &redrawn[0])] {
        let found = kinds_of(comparer, x, y)?;
        if words(&found) != pair.aspects {
            return Err(format!("{:?}, expected {:?}", words(&found), pair.aspects));
        }
    }
    for side in &sides {
        if !kinds_of(comparer, side, side)?.is_empty() {
            return Err("a structure and itself have a kind".to_owned());
        }
    }
    Ok(())
}

#[rstest]
#[case("fixtures/pairs/kinds.tsv", fixture_kinds(), 95)]
#[case("docs/definitions.md", definition_kinds(), 40)]
fn pairs_have_the_kinds_stated(
    #[case] source: &'static str,
    #[case] pairs: Vec<KindPair>,
    #[case] at_least: usize,
) {
    let mut comparer = Comparer::default();
    let mut numbers = Numbers::new(31);
    let mut tally = Tally::new(source);
    let mut names = BTreeSet::new();
    let mut of_kind: BTreeMap<String, usize> = BTreeMap::new();
    for pair in &pairs {
        assert!(names.insert(&pair.name), "{} twice", pair.name);
        *of_kind.entry(pair.aspects[0].clone()).or_default() += 1;
        let outcome = check(&mut comparer, pair, &mut numbers);
        tally.value(outcome.map_err(|error| format!("{}: {error}", pair.name)));
    }
    tally.finish(at_least);
    let few: Vec<_> = of_kind.iter().filter(|&(_, &count)| count < 5).collect();
    assert!(few.is_empty(), "fewer than five pairs: {few:?}");
    assert_eq!(of_kind.len(), 12, "{:?}", of_kind.keys());
}

/// Real pairs: the same kinds both ways round, and functional groups that hold every heteroatom, share
/// no atom and do not depend on the drawing.
#[test]
fn real_pairs() {
    let Some([left, right]) = ["a", "b"]
        .map(|side| shared(&format!("relations/{side}.smi")))
        .into_iter()
        .collect::<Option<Vec<_>>>()
        .and_then(|paths| <[_; 2]>::try_from(paths).ok())
    else {
        return;
    };
    let (left, right) = (read_text(&left), read_text(&right));
    let mut comparer = Comparer::default();
    let mut numbers = Numbers::new(37);
    let mut tally = Tally::new("kinds of real pairs");
    let mut counts: BTreeMap<&str, usize> = BTreeMap::new();
    for (a, b) in left.lines().zip(right.lines()).step_by(5) {
        let texts = [a, b].map(|line| first_word(line).to_owned());
        let outcome = real_pair(&mut comparer, &texts, &mut numbers);
        let kind = tally.value(outcome.map_err(|error| format!("{texts:?}: {error}")));
        *counts.entry(kind.flatten().unwrap_or("none")).or_default() += 1;
    }
    eprintln!("{counts:?}");
    tally.finish(2_400);
}

fn real_pair(
    comparer: &mut Comparer,
    [a, b]: &[String; 2],
    numbers: &mut Numbers,
) -> Result<Option<&'static str>, String> {
    let (a, b) = (comparer.structure(a)?, comparer.structure(b)?);
    let found = kinds_of(comparer, &a, &b)?;
    let mirrored = kinds_of(comparer, &b, &a)?;
    if found != mirrored {
        return Err(format!("{found:?}, the other way round {mirrored:?}"));
    }
    let redrawn = renumbered(&other_kekule_form(a.molecule(), numbers), numbers);
    let redrawn = comparer.prepare(redrawn)?;
    if certificates(&a)? != certificates(&redrawn)? {
        return Err("a new drawing has other functional groups".to_owned());
    }
    Ok(found.first().map(|kind| kind.as_str()))
}

fn certificates(structure: &Structure) -> Result<Vec<Vec<u64>>, String> {
    let groups = functional_groups(structure, &Limits::default());
    let groups = groups.map_err(|error| error.to_string())?;
    let mut within = BTreeSet::new();
    if !groups
        .iter()
        .flat_map(|group| &group.atoms)
        .all(|atom| within.insert(*atom))
    {
        return Err("an atom is in two groups".to_owned());
    }
    let carbon_or_hydrogen = [Element::CARBON, Element::HYDROGEN];
    let mut atoms = (0..).zip(structure.molecule().atoms());
    if let Some((missed, _)) = atoms.find(|(index, atom)| {
        !carbon_or_hydrogen.contains(&atom.element) && !within.contains(index)
    }) {
        return Err(format!("heteroatom {missed} is in no group"));
    }
    let mut certificates: Vec<_> = groups.into_iter().map(|group| group.certificate).collect();
    certificates.sort_unstable();
    Ok(certificates)
}

/// Where the limit is reached there is a relation, no kind, and a note.
#[test]
fn a_kind_beyond_the_limit_is_null_with_a_note() {
    let limits = Limits::default();
    let mut orderer = Orderer::new(limits);
    let file = "CCOC(=O)CCN a\nCCCOC(=O)CN b\n";
    let records = Records::new(
        "two.smi",
        file.as_bytes(),
        Format::Smiles,
        ReadOptions::default(),
    );
    let sides: Vec<Prepared> = records
        .map(|outcome| Prepared::new(&mut orderer, "two.smi", outcome.unwrap()))
        .collect();
    let short = Limits {
        order_steps: 1,
        ..limits
    };
    let mut compared =
        |limits: &Limits| compare(&mut orderer, limits, [&sides[0], &sides[1]], true);
    let pair = compared(&limits);
    assert_eq!(pair.kind, wire::Kind::Verdict(Some("positional")));
    let pair = compared(&short);
    assert_eq!(pair.relation, Some("constitutional"));
    assert_eq!(pair.kind, wire::Kind::Verdict(None));
    assert_eq!(pair.aspects, Some(Vec::new()));
    let codes: Vec<String> = pair
        .notes
        .unwrap()
        .into_iter()
        .map(|note| note.code)
        .collect();
    assert_eq!(codes, ["kind-limit"]);
}
