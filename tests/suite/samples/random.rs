//! Random molecules with random statements, against the lists of their samples.

use std::collections::{BTreeMap, BTreeSet};

use molkin_formats::smiles::write;
use molkin_graph::{Key, Limits, Parity};
use molkin_relate::Structure;
use molkin_tests::{Comparer, Markings, Numbers, Tally, is_full_run, mirrored, renumbered};

use super::statement::{Statement, expected};

const FRAGMENTS: [&str; 12] = [
    "C(C)O",
    "C(F)O",
    "C(C)C(C)O",
    "C(O)C(F)Cl",
    "C",
    "O",
    "C=CC",
    "CC(C)N",
    "C(=O)C(C)O",
    "F",
    "C(C)C",
    "C(O)C=CF",
];

/// Ways to put fragments together; most of them give equal fragments equal places.
const HUBS: [(&str, usize); 17] = [
    ("{}C{}", 2),
    ("N({})({}){}", 3),
    ("C({})({})({})O", 3),
    ("C1({})CC1{}", 2),
    ("C1({})CCC({})CC1", 2),
    ("C1({})C({})C1{}", 3),
    ("C1({})CC({})CC({})C1", 3),
    ("C1({})C({})C({})C1{}", 4),
    ("C({})C=C{}", 2),
    ("c1c({})cc({})cc1{}", 3),
    ("O({}){}", 2),
    ("C({})(O)C({})F", 2),
    ("C{}.C{}", 2),
    ("C1({})CC2(C1)CC({})C2", 2),
    ("C({})(F)O", 1),
    ("C{}.C{}.C{}.C{}.C{}.C{}", 6),
    ("N({})C({})C(O){}", 3),
];

fn random_smiles(numbers: &mut Numbers) -> String {
    assembled(&FRAGMENTS, numbers)
}

/// Fragments in a hub, most of them alike.
fn assembled(fragments: &[&str], numbers: &mut Numbers) -> String {
    let (hub, holes) = HUBS[numbers.below(HUBS.len())];
    let first = fragments[numbers.below(fragments.len())];
    let mut text = hub.to_owned();
    for _ in 0..holes {
        let fragment = if numbers.below(4) > 0 {
            first
        } else {
            fragments[numbers.below(fragments.len())]
        };
        text = text.replacen("{}", fragment, 1);
    }
    text
}

/// 300 molecules, or 2,000 with `MOLKIN_FULL` set.
#[test]
fn groups_against_all_samples() {
    let most = if is_full_run() { 2_000 } else { 300 };
    let mut comparer = Comparer::default();
    let mut numbers = Numbers::new(4);
    let mut tally = Tally::new("samples");
    let mut molecules = 0;
    while molecules < most {
        let text = random_smiles(&mut numbers);
        let molecule = comparer.molecule(&text).unwrap();
        let elements = comparer.order(&molecule).unwrap().stereo_elements();
        let markings = Markings::new(&molecule, &elements);
        // A cage's bridgeheads are one element, which the list does not know.
        let cages = elements
            .iter()
            .map(|e| e.variable)
            .collect::<BTreeSet<_>>()
            .len()
            < elements.len();
        if cages || elements.iter().any(|e| e.quiet) || !(1..=6).contains(&markings.places()) {
            continue;
        }
        molecules += 1;
        compare_all(
            &text,
            &markings,
            &[],
            &mut comparer,
            &mut numbers,
            &mut tally,
        );
    }
    tally.finish(90 * most);
}

/// Fragments with elements of other sorts: cages, nitrogen in a ring of three, axes, double bonds,
/// mobile bonds, sulfur, isotopes.
const SORTS: [&str; 16] = [
    "C1CC2CC1CC2=O",
    "C12CC(=O)C(CC1)C2",
    "N1CC1C",
    "C1CN1C",
    "C=C=CC",
    "C=C=C=CC",
    "C=CC",
    "C=NO",
    "S(=O)C",
    "C([13CH3])C",
    "C([2H])C",
    "C([18OH])O",
    "C(C)O",
    "C(O)C(F)Cl",
    "C=C[CH2]",
    "C1CC(C)C1",
];

/// Seeds of [`sorts_of_elements`]: one, or eight with `MOLKIN_FULL` set.
fn seeds() -> std::ops::Range<u64> {
    5..if is_full_run() { 13 } else { 6 }
}

/// 150 molecules of each seed.
#[test]
fn sorts_of_elements_against_all_samples() {
    let mut comparer = Comparer::default();
    let mut tally = Tally::new("samples of all sorts");
    for seed in seeds() {
        let mut numbers = Numbers::new(seed);
        let mut molecules = 0;
        while molecules < 150 {
            let text = assembled(&SORTS, &mut numbers);
            let Ok(molecule) = comparer.molecule(&text) else {
                continue;
            };
            let elements = comparer.order(&molecule).unwrap().stereo_elements();
            let markings = Markings::independent(&molecule, &elements);
            if !(1..=6).contains(&markings.places()) {
                continue;
            }
            molecules += 1;
            let quiet: BTreeSet<u32> = elements
                .iter()
                .filter(|element| element.quiet)
                .map(|element| element.centres[0])
                .collect();
            let quiet: Vec<usize> = (0..markings.places())
                .filter(|&at| quiet.contains(&markings.centre(at)))
                .collect();
            compare_all(
                &text,
                &markings,
                &quiet,
                &mut comparer,
                &mut numbers,
                &mut tally,
            );
        }
    }
    tally.finish(10_000 * seeds().count());
}

/// Beyond a limit a record or a pair ends in an error, never in another answer.
#[test]
fn limits_end_in_errors() {
    let mut comparer = Comparer::default();
    let mut tally = Tally::new("limits");
    let mut numbers = Numbers::new(6);
    let mut errors = 0;
    for _ in 0..200 {
        let text = random_smiles(&mut numbers);
        let molecule = comparer.molecule(&text).unwrap();
        let elements = comparer.order(&molecule).unwrap().stereo_elements();
        let markings = Markings::new(&molecule, &elements);
        if markings.places() == 0 {
            continue;
        }
        let mut tight = Comparer::new(Limits {
            stereo_pieces: numbers.below(4) as u32,
            open_elements: numbers.below(3) as u32,
            order_steps: [500, 5_000, 100_000_000][numbers.below(3)],
            ..Limits::default()
        });
        let sides: Vec<Structure> = (0..4)
            .map(|_| {
                let said = Statement::random(markings.places(), &mut numbers);
                let molecule = said.molecule(&markings, &mut numbers);
                let side = comparer.prepare(molecule.clone()).unwrap();
                match tight.key(&molecule) {
                    Ok(key) => tally.case(key == side.canonical().compound_key(), || {
                        format!("{text}: {said:?}")
                    }),
                    Err(_) => errors += 1,
                }
                side
            })
            .collect();
        for a in &sides {
            for b in &sides {
                match tight.relate(a, b) {
                    Ok(found) => {
                        let known = comparer.relate(a, b).unwrap();
                        let same = (found.relation, found.open) == (known.relation, known.open);
                        tally.case(same, || format!("{text}: {found:?}, else {known:?}"));
                    }
                    Err(_) => errors += 1,
                }
            }
        }
    }
    assert!(errors > 100, "{errors} errors");
    tally.finish(1_000);
}

fn compare_all(
    text: &str,
    markings: &Markings<'_>,
    quiet: &[usize],
    comparer: &mut Comparer,
    numbers: &mut Numbers,
    tally: &mut Tally,
) {
    let places = markings.places();
    let mut keys: BTreeMap<Key, usize> = BTreeMap::new();
    let mut isomers = Vec::new();
    let mut images: BTreeMap<usize, Key> = BTreeMap::new();
    for bits in 0u32..1 << places {
        let marks: Vec<_> = (0..places)
            .map(|at| Some(Parity::from_odd(bits >> at & 1 == 1)))
            .collect();
        let marked = markings.marked(&marks);
        let next = keys.len();
        let number = *keys.entry(comparer.key(&marked).unwrap()).or_insert(next);
        images.insert(number, comparer.key(&mirrored(&marked)).unwrap());
        isomers.push(number);
    }
    let mirror = |set: u64| -> u64 {
        (0..64)
            .filter(|at| set >> at & 1 == 1)
            .fold(0, |sum, at| sum | 1 << keys[&images[&at]])
    };
    let mut statements: Vec<Statement> =
        (0..4).map(|_| Statement::random(places, numbers)).collect();
    for _ in 0..8 {
        let from = numbers.below(statements.len());
        statements.push(statements[from].changed(numbers));
    }
    let listed: Vec<(Statement, Structure, BTreeSet<u64>)> = statements
        .into_iter()
        .filter_map(|statement| {
            let samples = statement.samples(&|bits| isomers[bits as usize])?;
            let molecule = statement.molecule(markings, numbers);
            let structure = comparer
                .prepare(molecule.clone())
                .unwrap_or_else(|error| panic!("{text}: {error} {statement:?}"));
            let other = comparer.order(&renumbered(&molecule, numbers)).unwrap();
            let own = structure.canonical();
            let said = [own, &other].map(|view| {
                let form = view.form();
                (view.compound_key(), write(&form).text, form.groups)
            });
            let kept = said[0] == said[1];
            tally.case(kept, || format!("{text}, renumbered: {statement:?}"));
            Some((statement, structure, samples))
        })
        .collect();
    for (said_a, a, samples_a) in &listed {
        for (said_b, b, samples_b) in &listed {
            let verdict = comparer.relate(a, b).unwrap();
            let found = (
                verdict.relation.kind().unwrap_or(verdict.relation.as_str()),
                verdict.open,
            );
            let wanted = expected(samples_a, samples_b, &mirror);
            let good = if [said_a, said_b].iter().any(|said| said.leaves_open(quiet)) {
                // What is quiet and unmarked counts for less than the samples say.
                let decided = |word| matches!(word, "identical" | "undetermined");
                let back = comparer.relate(b, a).unwrap();
                (verdict.relation, verdict.open) == (back.relation, back.open)
                    && (found.0 == wanted.0 || !decided(found.0) && !decided(wanted.0))
            } else {
                found == wanted
            };
            tally.case(good, || {
                format!("{text}: {found:?}, expected {wanted:?}\n{said_a:?}\n{said_b:?}")
            });
            let same_key = a.canonical().compound_key() == b.canonical().compound_key();
            tally.case(same_key == (samples_a == samples_b), || {
                format!("{text}: keys equal {same_key}\n{said_a:?}\n{said_b:?}")
            });
        }
    }
}
