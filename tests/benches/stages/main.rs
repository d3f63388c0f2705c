//! One bench for each stage from text to an explanation: `cargo bench -p molkin-tests`.
//!
//! Every stage takes the same named inputs, so that a slow stage shows. What a stage must give is
//! asserted outside the timed part. Results and how they were taken: docs/performance.md.
#![allow(
    clippy::panic,
    clippy::unwrap_used,
    reason = "a bench fails by panicking"
)]

mod explain;
mod inputs;
mod keys;
mod molfiles;
mod order;
mod read;
mod relate;
mod write;

fn main() {
    divan::main();
}
