//! End-to-end tests of the three libraries through their public interfaces.
//!
//! Tests on `../shared/data` end with a message where it is absent. Every test states how many
//! cases it runs and fails on fewer.
#![forbid(unsafe_code)]
#![allow(
    clippy::panic,
    clippy::print_stderr,
    clippy::unwrap_used,
    reason = "a test fails by panicking and says what it did"
)]

mod bounds;
mod cip_labels;
mod claims;
mod collections;
mod coordination;
mod counts;
mod ctfile;
mod damaged;
mod demo;
mod dependences;
mod distances;
mod drawings;
mod findings;
mod fixtures;
mod forms;
mod golden;
mod graphs;
mod graphs_growth;
mod graphs_plain;
mod graphs_reference;
mod hostile;
mod kinds;
mod label_examples;
mod label_laws;
mod mirror;
mod moves;
mod moves_built;
mod pages;
mod parents;
mod relations;
mod relatives;
mod renumbering;
mod samples;
mod shortcuts;
mod smiles;
mod stability;
mod symmetry;
mod tautomers;
mod trays;
