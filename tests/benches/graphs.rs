//! Time to order plain graphs: `cargo bench -p molkin-tests --bench graphs -- FILE...`, files of
//! graph6 or sparse6. One line a file: name, graphs, ordered ones, steps, processor seconds (best
//! of several rounds, reading aside). `tests/scripts/beside_nauty.py` sets the lines beside another program's.
#![allow(
    clippy::print_stdout,
    clippy::unwrap_used,
    reason = "a bench prints, and fails by panicking"
)]

use std::{
    path::Path,
    time::{Duration, Instant},
};

use molkin_graph::{GraphOrderer, Limits};
use molkin_tests::Graph;

/// A round takes this long at the least: processor time is counted in coarse steps.
const LONG: Duration = Duration::from_millis(100);

/// Rounds go on until they took this long together, but there are at least three.
const ENOUGH: Duration = Duration::from_millis(400);

/// The time this thread had a processor for, or the time of day where that is not known.
enum Clock {
    Processor(Duration),
    Day(Instant),
}

impl Clock {
    fn now() -> Self {
        processor_time().map_or_else(|| Self::Day(Instant::now()), Self::Processor)
    }

    fn elapsed(&self) -> Duration {
        match self {
            Self::Processor(start) => processor_time().unwrap().saturating_sub(*start),
            Self::Day(start) => start.elapsed(),
        }
    }
}

/// What Linux counts in nanoseconds.
fn processor_time() -> Option<Duration> {
    let text = std::fs::read_to_string("/proc/thread-self/schedstat").ok()?;
    let nanoseconds = text.split(' ').next()?.parse().ok()?;
    Some(Duration::from_nanos(nanoseconds))
}

fn main() {
    // Cargo adds options of its own.
    let files = std::env::args()
        .skip(1)
        .filter(|arg| !arg.starts_with("--"));
    for file in files {
        let graphs = Graph::read(Path::new(&file));
        let colours = vec![0; graphs.iter().map(|g| g.vertices).max().unwrap_or(0) as usize];
        let mut orderer = GraphOrderer::new(Limits::default());
        let (mut best, mut spent, mut rounds) = (Duration::MAX, Duration::ZERO, 0);
        let (mut ordered, mut steps) = (0u64, 0u64);
        let mut repeats = 1u32;
        while rounds < 3 || spent < ENOUGH {
            (ordered, steps) = (0, 0);
            let (day, start) = (Instant::now(), Clock::now());
            for graph in std::iter::repeat_n(&graphs, repeats as usize).flatten() {
                let own = &colours[..graph.vertices as usize];
                if let Ok(order) = orderer.order(own, &graph.edges) {
                    ordered += 1;
                    steps += order.steps;
                }
            }
            let time = start.elapsed() / repeats;
            if day.elapsed() < LONG {
                // Too short for the clock.
                repeats *= 2;
                continue;
            }
            (best, spent, rounds) = (best.min(time), spent + time, rounds + 1);
        }
        let seconds = best.as_secs_f64();
        let (ordered, steps) = (ordered / u64::from(repeats), steps / u64::from(repeats));
        println!("{file}\t{}\t{ordered}\t{steps}\t{seconds}", graphs.len());
    }
}
