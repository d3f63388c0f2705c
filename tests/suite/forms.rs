//! Forms of one compound: pairs with a registrar's decision, and what must hold of all forms.

use std::collections::BTreeSet;

use molkin_graph::{Key, Limits};
use molkin_relate::{Axes, Axis, Normaliser, Structure, kinds, same_apart_from};
use molkin_tests::{
    Comparer, FormPair, Numbers, Tally, collection, definition_forms, first_word, fixture_forms,
    is_full_run, other_kekule_form, read_text, renumbered, shared, with_hydrogens_written,
};
use rstest::rstest;

/// All sets of the five axes.
fn all_sets() -> impl Iterator<Item = Axes> {
    const AXES: [Axis; 5] = [
        Axis::Salt,
        Axis::Charge,
        Axis::Tautomer,
        Axis::Isotope,
        Axis::Stereo,
    ];
    (0_u32..1 << AXES.len()).map(|bits| {
        let chosen = (0..).zip(AXES).filter(|&(at, _)| bits >> at & 1 == 1);
        chosen.map(|(_, axis)| axis).collect()
    })
}

fn key(normaliser: &mut Normaliser, structure: &Structure, axes: Axes) -> Result<Key, String> {
    let form = normaliser.overlook(structure, axes);
    let form = form.map_err(|error| format!("{axes}: {error}"))?;
    Ok(form.structure().canonical().compound_key())
}

fn check(comparer: &mut Comparer, pair: &FormPair, numbers: &mut Numbers) -> Result<(), String> {
    let sides = [comparer.structure(&pair.a)?, comparer.structure(&pair.b)?];
    let mut redrawn = Vec::new();
    for side in &sides {
        let drawn = other_kekule_form(side.molecule(), numbers);
        let drawn = renumbered(&with_hydrogens_written(&drawn), numbers);
        redrawn.push(comparer.prepare(drawn)?);
    }
    let [a, b] = &sides;
    let mut normaliser = Normaliser::new(Limits::default());
    for (x, y) in [(a, b), (b, a), (&redrawn[0], b), (&redrawn[1], &redrawn[0])] {
        let relation = comparer.relate(x, y)?.relation;
        let apart = same_apart_from(&mut normaliser, relation, x, y);
        let apart = apart.map_err(|error| error.to_string())?;
        let found = kinds(relation, [x, y], apart, &Limits::default());
        let found = found.map_err(|error| error.to_string())?;
        let kind = found.first().map(|kind| kind.as_str());
        let apart = apart.map(|axes| axes.to_string());
        let expected = (&*pair.relation, pair.kind.as_deref(), &pair.apart);
        if (relation.as_str(), kind, &apart) != expected {
            return Err(format!(
                "{relation:?} {kind:?} {apart:?}, expected {expected:?}"
            ));
        }
    }
    // What the decision says shows in the keys of the forms.
    if let Some(apart) = &pair.apart {
        let axes = match apart.as_str() {
            "" => Axes::NONE,
            axes => axes.parse().map_err(|error| format!("{error}"))?,
        };
        let keys = [a, b].map(|side| key(&mut normaliser, side, axes));
        if keys[0] != keys[1] {
            return Err(format!("the keys differ: {keys:?}"));
        }
    }
    Ok(())
}

#[rstest]
#[case("fixtures/pairs/forms.tsv", fixture_forms(), 100)]
#[case("docs/definitions.md", definition_forms(), 40)]
fn pairs_are_decided_as_stated(
    #[case] source: &'static str,
    #[case] pairs: Vec<FormPair>,
    #[case] at_least: usize,
) {
    let mut comparer = Comparer::default();
    let mut numbers = Numbers::new(41);
    let mut tally = Tally::new(source);
    let mut names = BTreeSet::new();
    for pair in &pairs {
        assert!(names.insert(&pair.name), "{} twice", pair.name);
        let outcome = check(&mut comparer, pair, &mut numbers);
        tally.value(outcome.map_err(|error| {
            let FormPair { name, a, b, .. } = pair;
            format!("{name}: {error}\n    {a}\n    {b}")
        }));
    }
    tally.finish(at_least);
}

/// Overlooking some axes and then others is overlooking all of them, and doing it twice changes nothing.
fn one_by_one(normaliser: &mut Normaliser, structure: &Structure) -> Result<(), String> {
    for axes in all_sets() {
        let whole = key(normaliser, structure, axes)?;
        for axis in axes.iter() {
            let error = |error| format!("{axis} of {axes}: {error}");
            let first = normaliser.overlook(structure, Axes::from([axis]));
            let first = first.map_err(|e| error(e.to_string()))?;
            if key(normaliser, first.structure(), axes)? != whole {
                return Err(format!("{axes}: {axis} first leads elsewhere"));
            }
            let all = normaliser.overlook(structure, axes);
            let all = all.map_err(|e| error(e.to_string()))?;
            if key(normaliser, all.structure(), Axes::from([axis]))? != whole {
                return Err(format!("{axes}: {axis} once more leads elsewhere"));
            }
        }
    }
    Ok(())
}

/// A salt of which `charge` leaves an anion, so that it asks for the strongest acid of the tautomer that
/// stands for the class, not of that which was drawn: the two axes are not independent there.
const DEPENDENT: [&str; 1] = ["[Na+].[O-]C1=NC(=O)C(N1)(c1ccccc1)c1ccccc1"];

#[test]
fn the_order_of_axes_does_not_matter() {
    let mut comparer = Comparer::default();
    let mut normaliser = Normaliser::new(Limits::default());
    let mut tally = Tally::new("orders of axes");
    for pair in fixture_forms() {
        for text in [&pair.a, &pair.b] {
            let structure = comparer.structure(text);
            let outcome = structure.and_then(|own| one_by_one(&mut normaliser, &own));
            if DEPENDENT.contains(&text.as_str()) {
                // Fails when one starts to pass, so that the list stays true.
                tally.case(outcome.is_err(), || format!("{text}: no longer dependent"));
                continue;
            }
            tally.value(outcome.map_err(|error| format!("{text}: {error}")));
        }
    }
    tally.finish(200);
}

#[test]
fn the_order_of_axes_does_not_matter_for_drugs() {
    let Some(records) = collection("drugs.csv") else {
        return;
    };
    let mut comparer = Comparer::default();
    let mut normaliser = Normaliser::new(Limits::default());
    let mut tally = Tally::new("orders of axes, drugs");
    let step = if is_full_run() { 1 } else { 20 };
    for (number, outcome) in (1..).zip(records).step_by(step) {
        let record = outcome.unwrap().result.unwrap();
        let structure = comparer.prepare(record.molecule);
        let outcome = structure.and_then(|own| one_by_one(&mut normaliser, &own));
        tally.value(outcome.map_err(|error| format!("{number}: {error}")));
    }
    tally.finish(90);
}

/// The keys of all axes do not depend on numbering, Kekulé form or how hydrogens are written.
fn keys_stay(
    comparer: &mut Comparer,
    normaliser: &mut Normaliser,
    text: &str,
    numbers: &mut Numbers,
) -> Result<(), String> {
    let own = comparer.structure(text)?;
    let drawn = other_kekule_form(own.molecule(), numbers);
    let copy = comparer.prepare(renumbered(&drawn, numbers))?;
    for axes in [
        "salt",
        "charge",
        "tautomer",
        "isotope",
        "stereo",
        "salt,charge",
    ] {
        let axes: Axes = axes.parse().unwrap();
        let keys = [&own, &copy].map(|side| key(normaliser, side, axes));
        if keys[0] != keys[1] {
            return Err(format!("{axes}: {keys:?}"));
        }
    }
    Ok(())
}

#[rstest]
#[case("collections/drugs.csv", 3, 600)]
#[case("collections/vendor.smi", 100, 99)]
#[case("collections/actives.smi.gz", 50, 190)]
#[case("collections/natural_products.smi.gz", 500, 99)]
#[case("collections/chiral.smi.gz", 500, 160)]
fn keys_of_forms_are_renumbering_proof(
    #[case] file: &'static str,
    #[case] step: usize,
    #[case] at_least: usize,
) {
    let Some(path) = shared(file) else {
        return;
    };
    let text = read_text(&path);
    let mut comparer = Comparer::default();
    let mut normaliser = Normaliser::new(Limits::default());
    let mut numbers = Numbers::new(43);
    let mut tally = Tally::new(file);
    let lines = text.lines().filter(|line| *line != "smiles");
    for line in lines.step_by(if is_full_run() { 1 } else { step }) {
        let text = first_word(line);
        let outcome = keys_stay(&mut comparer, &mut normaliser, text, &mut numbers);
        tally.value(outcome.map_err(|error| format!("{text}: {error}")));
    }
    tally.finish(at_least);
}
