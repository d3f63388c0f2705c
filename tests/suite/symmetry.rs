//! What holds for any pair: mirror symmetry of verdict and explanation, the least distance.

use molkin_graph::Limits;
use molkin_relate::{
    Explanation, HydrogenDifference, Relation, StereoChange, Structure, explain, findings::Finding,
};
use molkin_tests::{
    Comparer, Numbers, Tally, definition_pairs, first_word, least_distance, mirrored, read_text,
    renumbered, shared, small_isomers, stated_distance,
};

/// The same explanation seen from the other side.
fn turned(explanation: &Explanation) -> Explanation {
    let mut turned = explanation.clone();
    turned.atom_map = explanation.atom_map.iter().map(|&(a, b)| (b, a)).collect();
    turned.atom_map.sort_unstable();
    if let Some(bonds) = &mut turned.bonds {
        std::mem::swap(&mut bonds.only_in_a, &mut bonds.only_in_b);
        for (a, b) in &mut bonds.order_changed {
            std::mem::swap(a, b);
        }
        bonds.order_changed.sort_unstable();
    }
    for entry in &mut turned.hydrogens {
        *entry = HydrogenDifference {
            a: entry.b,
            b: entry.a,
            count_a: entry.count_b,
            count_b: entry.count_a,
        };
    }
    turned.hydrogens.sort_unstable_by_key(|entry| entry.a);
    turned.left_over.reverse();
    turned.findings = turned.findings.into_iter().map(Finding::mirrored).collect();
    turned
        .branching
        .iter_mut()
        .for_each(|sides| sides.reverse());
    turned.rings.iter_mut().for_each(|sides| sides.reverse());
    let groups = turned.functional_groups.iter_mut();
    groups.for_each(|sides| sides.reverse());
    for entry in &mut turned.stereo {
        std::mem::swap(&mut entry.a, &mut entry.b);
        entry.groups.reverse();
        entry.labels.reverse();
        entry.change = match entry.change {
            StereoChange::MarkedOnlyInA => StereoChange::MarkedOnlyInB,
            StereoChange::MarkedOnlyInB => StereoChange::MarkedOnlyInA,
            other => other,
        };
    }
    turned
        .stereo
        .sort_by(|x, y| (&x.a, x.geometry.as_str()).cmp(&(&y.a, y.geometry.as_str())));
    turned
}

/// What must be so between a map and what it is said to keep.
fn check_map(a: &Structure, b: &Structure, found: &Explanation) -> Result<(), String> {
    let Some(bonds) = &found.bonds else {
        return Ok(());
    };
    let images: std::collections::BTreeMap<u32, u32> = found.atom_map.iter().copied().collect();
    let distinct: std::collections::BTreeSet<u32> = images.values().copied().collect();
    if images.len() != found.atom_map.len() || distinct.len() != images.len() {
        return Err("the map is not one-to-one".to_owned());
    }
    let element = |side: &Structure, atom: u32| side.molecule().atom(atom).map(|a| a.element);
    if images.iter().any(|(&x, &y)| element(a, x) != element(b, y)) {
        return Err("the map changes an element".to_owned());
    }
    let apart = bonds.only_in_a.len() + bonds.only_in_b.len();
    if apart < bonds.at_least || (bonds.minimal && apart != bonds.at_least) {
        return Err(format!("{apart} bonds apart, at least {}", bonds.at_least));
    }
    Ok(())
}

fn check(comparer: &mut Comparer, a: &str, b: &str) -> Result<(), String> {
    let limits = Limits::default();
    let (a, b) = (comparer.structure(a)?, comparer.structure(b)?);
    let verdict = comparer.relate(&a, &b)?;
    if comparer.relate(&b, &a)? != verdict {
        return Err("the verdict depends on the order".to_owned());
    }
    let forth = explain(&a, &b, verdict.relation, &limits);
    check_map(&a, &b, &forth)?;
    let back = explain(&b, &a, verdict.relation, &limits);
    if turned(&turned(&forth)) != turned(&back) {
        return Err(format!("{forth:?}\nthe other way round\n{back:?}"));
    }
    for side in [&a, &b] {
        if comparer.relate(side, side)?.relation != Relation::Identical {
            return Err("a structure and itself differ".to_owned());
        }
    }
    Ok(())
}

#[test]
fn both_directions_mirror_each_other() {
    let mut pairs: Vec<(String, String)> = definition_pairs()
        .into_iter()
        .map(|pair| (pair.a, pair.b))
        .collect();
    if let Some(folder) = shared("relations") {
        for prefix in ["", "claims_"] {
            let [a, b] =
                ["a.smi", "b.smi"].map(|file| read_text(&folder.join(format!("{prefix}{file}"))));
            let lines = a
                .lines()
                .zip(b.lines())
                .step_by(if prefix.is_empty() { 30 } else { 4 });
            pairs.extend(lines.map(|(a, b)| (first_word(a).to_owned(), first_word(b).to_owned())));
        }
    }
    let mut comparer = Comparer::default();
    let mut tally = Tally::new("both directions");
    for (a, b) in &pairs {
        let outcome = check(&mut comparer, a, b);
        tally.value(outcome.map_err(|error| format!("{a}  {b}\n    {error}")));
    }
    let there = shared("relations").is_some();
    tally.finish(if there { 750 } else { 200 });
}

#[test]
fn the_mirror_image_of_the_mirror_image_is_the_compound() {
    let mut comparer = Comparer::default();
    let mut tally = Tally::new("mirror images");
    for text in definition_pairs()
        .into_iter()
        .flat_map(|pair| [pair.a, pair.b])
    {
        let mut outcome = || {
            let molecule = comparer.molecule(&text)?;
            let image = mirrored(&molecule);
            let own = comparer.prepare(molecule.clone())?;
            let other = comparer.prepare(image.clone())?;
            let verdict = comparer.relate(&own, &other)?.relation;
            let word = verdict.kind().unwrap_or(verdict.as_str());
            if !["identical", "enantiomers", "undetermined", "unresolved"].contains(&word) {
                return Err(format!("{word} with its mirror image"));
            }
            if comparer.key(&mirrored(&image))? != own.canonical().compound_key() {
                return Err("mirrored twice it has another key".to_owned());
            }
            Ok(())
        };
        let outcome = outcome();
        tally.value(outcome.map_err(|error| format!("{text}: {error}")));
    }
    tally.finish(400);
}

#[test]
fn the_distance_of_small_isomers_is_the_least() {
    let limits = Limits::default();
    let mut numbers = Numbers::new(6);
    let mut comparer = Comparer::default();
    let mut tally = Tally::new("small isomers");
    while tally.cases() < 500 {
        let atoms = 3 + numbers.below(6);
        let pair = small_isomers(&mut numbers, atoms);
        let [a, b] = pair.map(|molecule| {
            let copy = renumbered(&molecule, &mut numbers);
            comparer.prepare(copy).unwrap()
        });
        let relation = comparer.relate(&a, &b).unwrap().relation;
        if relation != Relation::Constitutional {
            continue;
        }
        let explanation = explain(&a, &b, relation, &limits);
        let stated = stated_distance(&explanation);
        let least = least_distance(&a, &b);
        let proved = explanation
            .bonds
            .as_ref()
            .is_some_and(|bonds| bonds.minimal);
        tally.case(proved && stated == Some(least), || {
            format!(
                "{stated:?}, not {least:?}: {:?} {:?}",
                a.molecule(),
                b.molecule()
            )
        });
    }
    tally.finish(500);
}
