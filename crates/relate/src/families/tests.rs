//! Groups of small sets of records.

use std::num::NonZeroUsize;

use molkin_formats::{
    smiles,
    source::{Format, ReadOptions, Records},
};
use molkin_graph::{Limits, Orderer};
use rstest::rstest;

use super::*;
use crate::{Axes, Axis, Normaliser, Relation, StereoKind, Structure, parallel::Plan, relate};

const PLAN: Plan = Plan {
    threads: NonZeroUsize::MIN,
    chunk: NonZeroUsize::MIN,
};

/// Groups the lines of a SMILES file, with a change to what was read of each.
fn grouped(text: &str, memory: usize, change: impl Fn(&mut Gathered)) -> (Vec<Grouped>, Counts) {
    let options = ReadOptions::default();
    let limits = Limits::default();
    let axes = Axes::from([Axis::Salt, Axis::Charge]);
    let mut reading = Reading::new(&options, limits).with_forms(Normaliser::new(limits), axes);
    let mut gatherer = Gatherer::new(memory).unwrap();
    let mut records = Records::new("test", text.as_bytes(), Format::Smiles, options.clone());
    while let Some(raw) = records.cut() {
        let mut gathered = reading.read(raw.unwrap());
        change(&mut gathered);
        gatherer.add(&gathered).unwrap();
    }
    let families = gatherer.group(&options, limits, PLAN).unwrap();
    let counts = families.counts().clone();
    (
        families.into_records().map(Result::unwrap).collect(),
        counts,
    )
}

/// The numbers of groups in a column; 0 where there is none.
fn numbers(records: &[Grouped], column: Column) -> Vec<u64> {
    let number = |record: &Grouped| record.group(column).map_or(0, |group| group.number);
    records.iter().map(number).collect()
}

/// Duplicates, enantiomers with a record that may be either, an isomer, a salt and its parent, and what
/// cannot be read.
const MIXED: &str = "\
C[C@H](N)C(=O)O
CC(=O)O
OC(=O)[C@H](C)N
CC(N)C(=O)O
C1CC
C[C@@H](N)C(=O)O
CC(=O)[O-].[Na+]
NCCC(=O)O
OC(C)=O
CC(O)F
FC(C)O
";

#[test]
fn every_sort_of_group() {
    let (records, counts) = grouped(MIXED, 1 << 20, |_| {});
    let column = |column| numbers(&records, column);
    assert_eq!(
        column(Column::Duplicates),
        [1, 2, 1, 0, 0, 0, 0, 0, 2, 0, 0]
    );
    assert_eq!(
        column(Column::PossibleDuplicates),
        [1, 0, 1, 1, 0, 1, 0, 0, 0, 2, 2]
    );
    assert_eq!(column(Column::Stereo), [1, 0, 1, 1, 0, 1, 0, 0, 0, 0, 0]);
    assert_eq!(column(Column::Forms), [0, 1, 0, 0, 0, 0, 1, 0, 1, 0, 0]);
    assert_eq!(column(Column::Isomers), [1, 0, 1, 1, 0, 1, 0, 1, 0, 0, 0]);
    assert_eq!((counts.records, counts.failed, counts.distinct), (11, 1, 7));
    assert_eq!(
        counts.sizes(Column::PossibleDuplicates).collect::<Vec<_>>(),
        [(2, 1), (4, 1)]
    );
    assert!(records[4].message.starts_with("5:2: ring-not-closed"));
}

#[test]
fn what_a_record_is_to_the_first_of_its_closest_group() {
    let (records, _) = grouped(MIXED, 1 << 20, |_| {});
    let closest = |at: usize, before| {
        let (column, group) = records[at].closest(before)?;
        Some((column, group.first, group.kinship))
    };
    let identical = |open| Kinship::Identical { open };
    let stereo = |kind| Some((Column::PossibleDuplicates, 0, Kinship::Stereo(kind)));
    assert_eq!(closest(0, 9), None);
    assert_eq!(closest(3, 9), stereo(StereoKind::Undetermined));
    assert_eq!(closest(5, 9), stereo(StereoKind::Enantiomers));
    assert_eq!(closest(6, 9), Some((Column::Forms, 1, Kinship::NotIsomers)));
    assert_eq!(
        closest(7, 9),
        Some((Column::Isomers, 0, Kinship::Constitutional))
    );
    assert_eq!(
        closest(8, 9),
        Some((Column::Duplicates, 1, identical(false)))
    );
    assert_eq!(
        closest(10, 99),
        Some((Column::PossibleDuplicates, 9, identical(true)))
    );
    // Told only about the first record.
    assert_eq!(closest(8, 1), None);
}

/// Rows that don't fit into memory, and keys that say nothing, lead to the same groups.
#[rstest]
#[case::spilled(0, |_: &mut Gathered| {})]
#[case::one_compound_key(1 << 20, |read: &mut Gathered| {
    if let Some(keys) = &mut read.keys { keys.compound = [7, 7]; }
})]
#[case::one_key_for_all(1 << 20, |read: &mut Gathered| {
    if let Some(keys) = &mut read.keys { (keys.compound, keys.family) = ([7, 7], [7, 7]); }
})]
fn identity_is_not_concluded_from_keys(#[case] memory: usize, #[case] change: fn(&mut Gathered)) {
    let (expected, counts) = grouped(MIXED, 1 << 20, |_| {});
    let (found, other_counts) = grouped(MIXED, memory, change);
    for column in [
        Column::Duplicates,
        Column::PossibleDuplicates,
        Column::Stereo,
    ] {
        assert_eq!(
            numbers(&found, column),
            numbers(&expected, column),
            "{column:?}"
        );
        assert_eq!(other_counts.groups(column), counts.groups(column));
    }
    assert_eq!(other_counts.distinct, counts.distinct);
}

/// The structures of the committed pairs.
fn structures_of_pairs() -> Vec<String> {
    let folder = concat!(env!("CARGO_MANIFEST_DIR"), "/../../fixtures/pairs");
    let mut tables: Vec<_> = std::fs::read_dir(folder)
        .unwrap()
        .map(|entry| entry.unwrap().path())
        .collect();
    tables.sort();
    let texts = tables
        .iter()
        .map(|path| std::fs::read_to_string(path).unwrap());
    texts
        .flat_map(|text| {
            let rows = text.lines().skip(1).map(str::to_owned);
            rows.collect::<Vec<_>>()
        })
        .flat_map(|row| {
            let cells = row.split('\t').skip(1).take(2).map(str::to_owned);
            cells.collect::<Vec<_>>()
        })
        .collect()
}

/// Every pair of the committed structures stands in the groups that [`relate`] puts it in.
#[test]
fn groups_are_those_of_all_pairs() {
    let texts = structures_of_pairs();
    let (records, _) = grouped(&(texts.join("\n") + "\n"), 0, |_| {});
    let mut orderer = Orderer::new(Limits::default());
    let structures: Vec<Option<Structure>> = texts
        .iter()
        .map(|text| Structure::new(&mut orderer, smiles::parse(text).ok()?).ok())
        .collect();
    let together = |a: usize, b: usize, column| {
        let number = |at: usize| records[at].group(column).map(|group| group.number);
        number(a).is_some() && number(a) == number(b)
    };
    let mut pairs = 0;
    for (b, second) in structures.iter().enumerate() {
        for (a, first) in structures[..b].iter().enumerate() {
            let (Some(first), Some(second)) = (first, second) else {
                continue;
            };
            pairs += 1;
            let verdict = relate(&mut orderer, first, second).unwrap();
            let is = |column| together(a, b, column);
            let context = format!("{} {} {verdict:?}", texts[a], texts[b]);
            let same = verdict.relation == Relation::Identical;
            assert_eq!(is(Column::Duplicates), same && !verdict.open, "{context}");
            let stereo = matches!(verdict.relation, Relation::Stereo(_));
            // Identical records are in a family if it has another compound.
            assert!(!stereo || is(Column::Stereo), "{context}");
            assert!(!is(Column::Stereo) || stereo || same, "{context}");
            let possible = verdict.relation == Relation::Stereo(StereoKind::Undetermined);
            let possible = possible || (same && verdict.open);
            assert!(!possible || is(Column::PossibleDuplicates), "{context}");
            let isomers = verdict.relation == Relation::Constitutional;
            assert!(!isomers || is(Column::Isomers), "{context}");
            let other = verdict.relation == Relation::NotIsomers;
            assert!(!(is(Column::Isomers) && other), "{context}");
        }
    }
    assert!(pairs > 200_000, "{pairs} pairs");
}

/// Where records cannot be compared within the limits, they are in no group and say so.
#[test]
fn what_cannot_be_compared_is_told() {
    let (options, limits) = (ReadOptions::default(), Limits::default());
    let mut reading = Reading::new(&options, limits);
    let mut gatherer = Gatherer::new(1 << 20).unwrap();
    let text = "C12C3C4C1C5C2C3C45\nC14C5C2C3C5C1C3C24\nC=Cc1ccccc1\n";
    let mut records = Records::new("test", text.as_bytes(), Format::Smiles, options.clone());
    while let Some(raw) = records.cut() {
        gatherer.add(&reading.read(raw.unwrap())).unwrap();
    }
    let few = Limits {
        order_steps: 1,
        ..limits
    };
    let families = gatherer.group(&options, few, PLAN).unwrap();
    let records: Vec<Grouped> = families.into_records().map(Result::unwrap).collect();
    let undecided: Vec<bool> = records.iter().map(|record| record.undecided).collect();
    assert_eq!(undecided, [true, true, false]);
    assert_eq!(numbers(&records, Column::Duplicates), [0; 3]);
    let closest = records[1].closest(9).map(|(_, group)| group.kinship);
    assert_eq!(closest, Some(Kinship::NotCompared));
}
