//! Atom maps of real constitutional isomers, against what is known of them: ../shared/data/relations.

use molkin_graph::Limits;
use molkin_relate::{Explanation, Relation, explain};
use molkin_tests::{Comparer, Tally, first_word, read_text, shared};
use rstest::rstest;

/// The published row of a pair, and the explanation of ours: whether they agree.
type Check = fn(&[usize], &Explanation) -> Result<(), String>;

/// No more bonds differ than the substituents that were moved have: one on each side for each.
fn as_near_as_moved(row: &[usize], found: &Explanation) -> Result<(), String> {
    let bonds = found.bonds.as_ref().ok_or("no bonds")?;
    let apart = bonds.only_in_a.len() + bonds.only_in_b.len();
    if apart > 2 * row[1] {
        return Err(format!("{apart} bonds apart by {} moves", row[1]));
    }
    if found.atom_map.len() != row[2] {
        return Err(format!(
            "{} of {} atoms mapped",
            found.atom_map.len(),
            row[2]
        ));
    }
    Ok(())
}

/// At least as many bonds are kept as a connected common subgraph has.
fn as_much_as_common(row: &[usize], found: &Explanation) -> Result<(), String> {
    let bonds = found.bonds.as_ref().ok_or("no bonds")?;
    if bonds.kept < row[1] {
        return Err(format!("{} bonds kept, {} known", bonds.kept, row[1]));
    }
    if bonds.kept + bonds.only_in_a.len() != row[2] {
        return Err(format!("{bonds:?} do not add up to {}", row[2]));
    }
    Ok(())
}

#[rstest]
#[case::moved("moved", as_near_as_moved, 600)]
#[case::common("common", as_much_as_common, 300)]
fn maps_are_as_good_as_known_ones(
    #[case] set: &'static str,
    #[case] check: Check,
    #[case] stated: usize,
) {
    let Some(folder) = shared("relations") else {
        return;
    };
    let [a, b, truth] = ["a.smi", "b.smi", "truth.tsv"]
        .map(|file| read_text(&folder.join(format!("{set}_{file}"))));
    let limits = Limits::default();
    let mut comparer = Comparer::default();
    let mut tally = Tally::new(set);
    let mut proved = 0;
    for ((a, b), row) in a.lines().zip(b.lines()).zip(truth.lines()) {
        let row: Vec<usize> = row
            .split('\t')
            .map_while(|field| field.parse().ok())
            .collect();
        let mut outcome = || {
            let a = comparer.structure(first_word(a))?;
            let b = comparer.structure(first_word(b))?;
            let relation = comparer.relate(&a, &b)?.relation;
            if relation != Relation::Constitutional {
                return Err(format!("{relation:?}"));
            }
            let explanation = explain(&a, &b, relation, &limits);
            proved += usize::from(
                explanation
                    .bonds
                    .as_ref()
                    .is_some_and(|bonds| bonds.minimal),
            );
            check(&row, &explanation)
        };
        let outcome = outcome();
        tally.value(outcome.map_err(|error| format!("row {}: {error}\n    {a}\n    {b}", row[0])));
    }
    eprintln!("{set}: {proved} proved minimal");
    tally.finish(stated);
}
