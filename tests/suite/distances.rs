//! Atom maps of real pairs, against what is known of them, and how many are proved: ../shared/data/relations.
//!
//! Samples run everywhere; with MOLKIN_FULL=1 the whole sets do. How many maps are proved within the default budget is a
//! committed number. Steps are counted, not time, so it holds on every machine; it may rise, not fall.

use std::{collections::BTreeMap, env, time::Instant};

use molkin_graph::Limits;
use molkin_relate::{
    Relation,
    mapping::{Mapping, map_structures},
};
use molkin_tests::{Comparer, Tally, first_word, read_text, shared};
use rstest::rstest;

/// The published row of a pair, and our map: whether they agree.
type Check = fn(&[usize], &Mapping) -> Result<(), String>;

/// No more bonds differ than the substituents that were moved have: one on each side for each.
fn as_near_as_moved(row: &[usize], found: &Mapping) -> Result<(), String> {
    let apart = found.distance.bonds as usize;
    if apart > 2 * row[1] {
        return Err(format!("{apart} bonds apart by {} moves", row[1]));
    }
    all_mapped(&row[2..], found)
}

/// At least as many bonds are kept as a connected common subgraph has.
fn as_much_as_common(row: &[usize], found: &Mapping) -> Result<(), String> {
    let kept = (found.all_bonds - found.distance.bonds) as usize / 2;
    if kept < row[1] {
        return Err(format!("{kept} bonds kept, {} known", row[1]));
    }
    Ok(())
}

fn nothing_known(_: &[usize], found: &Mapping) -> Result<(), String> {
    all_mapped(&[found.pairs.len()], found)
}

/// Isomers leave no atom over.
fn all_mapped(atoms: &[usize], found: &Mapping) -> Result<(), String> {
    let left_over = found.left_over_a.len() + found.left_over_b.len();
    if left_over > 0 || Some(&found.pairs.len()) != atoms.first() {
        return Err(format!(
            "{} atoms mapped, {left_over} left over",
            found.pairs.len()
        ));
    }
    Ok(())
}

/// A set of pairs: the files' prefix, which rows are taken, and how many must be proved in (i) and in all parts.
struct Set {
    name: &'static str,
    prefix: &'static str,
    check: Check,
    /// One of so many constitutional rows.
    every: usize,
    pairs: usize,
    /// One of so many of these is in the sample.
    sampled: usize,
    proved: Proved,
    proved_in_sample: Proved,
    /// Steps of half the pairs, and of 99 % of them: at most so many. A step takes 80 ns.
    steps: Option<[u64; 2]>,
}

#[derive(Debug, Default, PartialEq)]
struct Proved {
    bonds: usize,
    all: usize,
}

/// One to three substituents of a drug-sized structure stand elsewhere.
const MOVED: Set = Set {
    name: "moved",
    prefix: "moved_",
    check: as_near_as_moved,
    every: 1,
    pairs: 600,
    sampled: 1,
    proved: Proved {
        bonds: 600,
        all: 600,
    },
    proved_in_sample: Proved {
        bonds: 600,
        all: 600,
    },
    steps: Some([5_000, 60_000]),
};

/// Arbitrary isomers.
const COMMON: Set = Set {
    name: "common",
    prefix: "common_",
    check: as_much_as_common,
    every: 1,
    pairs: 300,
    sampled: 10,
    proved: Proved {
        bonds: 299,
        all: 283,
    },
    proved_in_sample: Proved { bonds: 30, all: 29 },
    steps: None,
};

/// Constitutional isomers of all sorts.
const CONSTITUTIONAL: Set = Set {
    name: "constitutional",
    prefix: "",
    check: nothing_known,
    every: 6,
    pairs: 1000,
    sampled: 40,
    proved: Proved {
        bonds: 986,
        all: 943,
    },
    proved_in_sample: Proved { bonds: 25, all: 24 },
    steps: None,
};

#[rstest]
#[case::moved(&MOVED)]
#[case::common(&COMMON)]
#[case::constitutional(&CONSTITUTIONAL)]
fn maps_are_as_good_as_known_ones(#[case] set: &Set) {
    let Some(folder) = shared("relations") else {
        return;
    };
    let [a, b, truth] = ["a.smi", "b.smi", "truth.tsv"]
        .map(|file| read_text(&folder.join(format!("{}{file}", set.prefix))));
    let full = env::var("MOLKIN_FULL").is_ok_and(|value| value == "1");
    let (sampled, least) = if full {
        (1, &set.proved)
    } else {
        (set.sampled, &set.proved_in_sample)
    };
    let rows = a.lines().zip(b.lines()).zip(truth.lines());
    // Only the set without a prefix has other relations too.
    let rows = rows.filter(|(_, row)| !set.prefix.is_empty() || row.contains("\tconstitutional"));
    let rows = rows.step_by(set.every).take(set.pairs).step_by(sampled);
    let mut comparer = Comparer::default();
    let mut tally = Tally::new(set.name);
    let mut found = Vec::new();
    for ((a, b), row) in rows {
        let outcome = explain(&mut comparer, [a, b], row, set.check);
        found.extend(
            tally.value(outcome.map_err(|error| format!("{row}: {error}\n    {a}\n    {b}"))),
        );
    }
    tally.finish(set.pairs / sampled);
    report(set.name, &found);
    let proved = Proved {
        bonds: found.iter().filter(|found| found.0.proved.bonds).count(),
        all: found
            .iter()
            .filter(|found| found.0.proved.hydrogens)
            .count(),
    };
    assert!(
        proved.bonds >= least.bonds && proved.all >= least.all,
        "{proved:?}, but {least:?} are stated"
    );
    if let Some(most) = set.steps {
        let mut steps: Vec<u64> = found.iter().map(|found| found.0.steps).collect();
        steps.sort_unstable();
        let taken = [50, 99].map(|percent| steps[steps.len() * percent / 100]);
        assert!(
            taken[0] <= most[0] && taken[1] <= most[1],
            "{taken:?} steps"
        );
    }
}

/// The map of a pair and the milliseconds it took.
fn explain(
    comparer: &mut Comparer,
    pair: [&str; 2],
    row: &str,
    check: Check,
) -> Result<(Mapping, f64), String> {
    let row: Vec<usize> = row
        .split('\t')
        .map_while(|field| field.parse().ok())
        .collect();
    let a = comparer.structure(first_word(pair[0]))?;
    let b = comparer.structure(first_word(pair[1]))?;
    let relation = comparer.relate(&a, &b)?.relation;
    if relation != Relation::Constitutional {
        return Err(format!("{relation:?}"));
    }
    let start = Instant::now();
    let found = map_structures(&a, &b, &Limits::default()).map_err(|error| error.to_string())?;
    let time = start.elapsed().as_secs_f64() * 1e3;
    check(&row, &found)?;
    Ok((found, time))
}

/// A table by distance (i): pairs, how many are proved in each part, steps and times. It is the source of the one in
/// docs/performance.md.
pub(crate) fn report(name: &str, found: &[(Mapping, f64)]) {
    let mut bins: BTreeMap<u32, Vec<&(Mapping, f64)>> = BTreeMap::new();
    for one in found {
        bins.entry(one.0.distance.bonds.div_ceil(4) * 4)
            .or_default()
            .push(one);
    }
    for (most, bin) in bins {
        eprintln!("{}", line(&format!("{name}, (i) up to {most}"), &bin));
    }
    let all: Vec<&(Mapping, f64)> = found.iter().collect();
    eprintln!("{}", line(&format!("{name}, all"), &all));
}

fn line(name: &str, found: &[&(Mapping, f64)]) -> String {
    let count = |proved: fn(&Mapping) -> bool| found.iter().filter(|one| proved(&one.0)).count();
    let mut steps: Vec<u64> = found.iter().map(|one| one.0.steps / 1000).collect();
    let mut times: Vec<f64> = found.iter().map(|one| one.1).collect();
    steps.sort_unstable();
    times.sort_unstable_by(f64::total_cmp);
    let at = |percent: usize| (found.len() * percent / 100).min(found.len() - 1);
    format!(
        "| {name} | {} | {} | {} | {} | {} / {} | {:.1} / {:.0} |",
        found.len(),
        count(|map| map.proved.bonds),
        count(|map| map.proved.orders),
        count(|map| map.proved.hydrogens),
        steps[at(50)],
        steps[at(99)],
        times[at(50)],
        times[at(99)],
    )
}
