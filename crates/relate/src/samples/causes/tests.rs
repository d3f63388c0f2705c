//! Trays made for the purpose.

use std::sync::Arc;

use molkin_formats::{Record, smiles, source::RecordOutcome};
use molkin_graph::{Limits, Orderer};
use rstest::rstest;

use crate::{
    samples::{Judge, Judgement, Measurement, Sample, Tolerance},
    wire::Prepared,
};

use super::{Hypothesis, causes};

fn prepared(text: &str) -> Option<Arc<Prepared>> {
    if text == "-" {
        return None;
    }
    let outcome = RecordOutcome {
        result: Ok(Record {
            molecule: smiles::parse(text).unwrap(),
            ..Record::default()
        }),
        ..RecordOutcome::default()
    };
    let mut orderer = Orderer::new(Limits::default());
    Some(Arc::new(Prepared::new(&mut orderer, "tray", outcome)))
}

/// A sample from `well label received m/z`, `-` for what is missing.
fn sample(text: &str) -> Sample {
    let fields: Vec<&str> = text.split_whitespace().collect();
    Sample {
        id: fields[0].to_owned(),
        well: fields[0].to_owned(),
        label: prepared(fields[1]),
        received: prepared(fields[2]),
        measurement: fields.get(3).map(|mz| Measurement {
            mz: mz.parse().unwrap(),
            adduct: "[M+H]+".parse().ok(),
            tolerance: Tolerance::Ppm(10.0),
        }),
        ..Sample::default()
    }
}

fn judged(lines: &[&str]) -> Vec<(Sample, Judgement)> {
    let mut judge = Judge::new(Limits::default(), true);
    let samples = lines.iter().map(|line| sample(line));
    samples
        .map(|sample| {
            let judgement = judge.judge(&sample);
            (sample, judgement)
        })
        .collect()
}

/// `cause score: explained | involved`.
fn found(lines: &[&str]) -> Vec<String> {
    let tray = judged(lines);
    let names = |samples: &[usize]| -> String {
        let names: Vec<&str> = samples.iter().map(|&at| tray[at].0.id.as_str()).collect();
        names.join(" ")
    };
    let written = |h: &Hypothesis| {
        let ambiguous = if h.is_ambiguous { "?" } else { "" };
        format!(
            "{}{ambiguous} {:.2}: {} | {}",
            h.cause.as_str(),
            h.score,
            names(&h.explains),
            names(&h.involves)
        )
    };
    causes(&tray).iter().map(written).collect()
}

// m/z of protonated ethylamine 46.0651, propylamine 60.0808, butylamine 74.0964 (sums of AME2020 masses).
#[rstest]
#[case::nothing(&["A1 CCN NCC", "A2 CCO -", "A3 C CO"], &[])]
#[case::swap(&["A1 CCN CCO", "A5 CCO CCN", "A7 C C"], &["swap 1.00: A1 A5 | "])]
#[case::swap_of_hands(
    &["A1 C[C@H](N)F C[C@@H](N)F", "C5 C[C@@H](N)F C[C@H](N)F"],
    &["swap 1.00: A1 C5 | "]
)]
#[case::swap_but_for_a_salt(
    &["A1 CCN CCO", "C5 CCO CCN.Cl"],
    &["swap 0.75: A1 C5 | "]
)]
#[case::swap_by_mass(
    &["A1 CCN - 60.0808", "C5 CCCN - 46.0651"],
    &["swap 1.00: A1 C5 | "]
)]
#[case::swap_by_mass_of_isomers(
    &["A1 CCN - 60.0808", "C5 CCCN - 46.0651", "C7 CC(C)N - 60.0808"],
    &["swap 0.75: A1 C5 | "]
)]
#[case::swap_half_seen(&["A1 CCN CCO", "C5 CCO -"], &["swap 0.50: A1 | C5"])]
#[case::swap_with_one_of_two(
    &["A1 CCN CCO", "C5 CCO -", "E7 CCO -"],
    &["swap? 0.25: A1 | C5 E7"]
)]
#[case::swap_and_another_fault(&["A1 CCN CCO", "C5 CCO C"], &["swap 0.50: A1 | C5"])]
#[case::swap_of_like_samples(
    &["A1 CCN CCO", "C1 CCN CCO", "E5 CCO CCN"],
    &["swap? 0.50: A1 C1 E5 | "]
)]
#[case::cycle(
    &["A1 CCN CCO", "C5 CCO CCC", "E7 CCC CCN"],
    &["cycle 1.00: A1 C5 E7 | "]
)]
#[case::cycle_half_seen(
    &["A1 CCN CCO", "C5 CCO CCC", "E7 CCC -"],
    &["cycle 0.67: A1 C5 | E7"]
)]
#[case::row_round(
    &["A1 C CCC", "A2 CC C", "A3 CCC CC"],
    &["shift 1.00: A1 A2 A3 | "]
)]
#[case::row_not_round(
    &["A1 C CCCCC", "A2 CC C", "A3 CCC CC", "A4 CCCC CCC"],
    &["shift 0.75: A2 A3 A4 | A1"]
)]
#[case::column_upward(
    &["A1 C CC", "B1 CC CCC", "C1 CCC CCCC", "D1 CCCC CCO"],
    &["shift 0.75: C1 B1 A1 | D1"]
)]
#[case::row_with_a_gap(
    &["A1 C CO", "A2 CC C", "A3 CCC -", "A4 CCCC CCC", "A5 CCO CCCC"],
    &["shift 0.60: A2 A4 A5 | A3 A1"]
)]
#[case::beside(
    &["A1 CCN CCN", "A2 CCO CCN"],
    &["one-structure-several-labels 1.00: A2 | A1", "neighbour 1.00: A2 | A1"]
)]
#[case::several_labels(
    &["A1 CCN CCCl", "C5 CCO CCCl"],
    &["one-structure-several-labels 1.00: A1 C5 | "]
)]
#[case::several_labels_by_mass(
    &["A1 CCN - 99.0", "C5 CCO - 99.0001"],
    &["one-structure-several-labels 1.00: A1 C5 | "]
)]
#[case::several_structures(
    &["A1 CCN CCN", "C5 CCN CCCl"],
    &["one-label-several-structures 1.00: C5 | A1"]
)]
#[case::true_duplicates(&["A1 CCN CCN", "C5 CCN CCN"], &[])]
fn hypotheses(#[case] lines: &[&str], #[case] expected: &[&str]) {
    assert_eq!(found(lines), expected);
}

#[test]
fn alternatives_name_each_other() {
    let found = causes(&judged(&["A1 CCN CCN", "A2 CCO CCN"]));
    assert_eq!(found[0].alternatives, [1]);
    assert_eq!(found[1].alternatives, [0]);
}

/// The same tray in another order of its rows gives the same hypotheses.
#[test]
fn the_order_of_rows_does_not_matter() {
    let mut lines = vec![
        "A1 CCN CCO",
        "C5 CCO CCC",
        "E7 CCC CCN",
        "B1 CF CCl",
        "B8 CCl CF",
        "D1 CBr CI",
    ];
    let mut first = found(&lines);
    first.sort();
    for _ in 0..lines.len() {
        lines.rotate_left(1);
        let again = found(&lines);
        assert_eq!(again.len(), first.len());
        assert!(again.iter().any(|h| h.starts_with("swap 1.00")));
        assert!(again.iter().any(|h| h.starts_with("cycle 1.00")));
    }
}
