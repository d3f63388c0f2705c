//! What CIP labels cost beside the canonical order, record by record:
//! `cargo bench -p molkin-tests --bench labels`.
//!
//! Each figure is the best of five, both in one run. Results: docs/labels.md.
#![allow(
    clippy::print_stdout,
    clippy::unwrap_used,
    reason = "a bench prints, and fails by panicking"
)]

use std::{hint::black_box, time::Instant};

use molkin_graph::Limits;
use molkin_tests::{Comparer, first_word, read_text, shared};

const FILES: [(&str, usize); 3] = [
    ("collections/chiral.smi.gz", 20),
    ("collections/natural_products.smi.gz", 20),
    ("cip/compounds.smi", 1),
];
const SLOWEST: usize = 8;

/// One record: microseconds for labels and for the order, and its text.
struct Cost {
    labels: f64,
    order: f64,
    text: String,
}

fn main() {
    for (file, step) in FILES {
        let Some(path) = shared(file) else { continue };
        let text = read_text(&path);
        let mut comparer = Comparer::default();
        let lines = text.lines().step_by(step).map(first_word);
        let mut costs: Vec<Cost> = lines.filter_map(|text| cost(&mut comparer, text)).collect();
        println!("{file}: {} records, median, 90 %, 99 %", costs.len());
        report("labels, µs", &costs, |cost| cost.labels);
        report("order, µs", &costs, |cost| cost.order);
        report("ratio", &costs, |cost| cost.labels / cost.order);
        costs.sort_by(|a, b| b.labels.total_cmp(&a.labels));
        for cost in &costs[..SLOWEST] {
            println!(
                "  {:.0} against {:.0} µs: {}",
                cost.labels, cost.order, cost.text
            );
        }
    }
}

fn cost(comparer: &mut Comparer, text: &str) -> Option<Cost> {
    let molecule = comparer.molecule(text).ok()?;
    let canonical = comparer.order(&molecule).ok()?;
    let limits = Limits::default();
    Some(Cost {
        labels: best(|| drop(black_box(canonical.labels(&limits)))),
        order: best(|| drop(black_box(comparer.order(&molecule)))),
        text: text.to_owned(),
    })
}

/// The least of five, in microseconds.
fn best(mut work: impl FnMut()) -> f64 {
    let times = (0..5).map(|_| {
        let start = Instant::now();
        work();
        start.elapsed().as_secs_f64() * 1e6
    });
    times.min_by(f64::total_cmp).unwrap()
}

fn report(name: &str, costs: &[Cost], of: impl Fn(&Cost) -> f64) {
    let mut values: Vec<f64> = costs.iter().map(of).collect();
    values.sort_by(f64::total_cmp);
    let at = |share: usize| values[values.len() * share / 100];
    println!("  {name}: {:.2}, {:.2}, {:.2}", at(50), at(90), at(99));
}
