//! What the end-to-end tests and benches share.
//!
//! Everything goes through the public interfaces of the three libraries. Committed cases lie in
//! `fixtures/` and on the pages of `docs/`; published data that cannot be committed lie beside the
//! repository, in `../shared/data`, and tests on them say so and end where it is absent.
#![forbid(unsafe_code)]
#![allow(
    clippy::panic,
    clippy::unwrap_used,
    reason = "a helper of a test fails by panicking"
)]

mod alkanes;
mod collections;
mod comparer;
mod distance;
mod extent;
mod forms;
mod graph6;
mod kekule;
mod kinds;
mod lines;
mod molfile;
mod moves;
mod numbers;
mod pairs;
mod renumber;
mod shortcuts;
mod small;
mod spelling;
mod stereo;
mod tally;
mod tautomers;
mod text;

pub mod fuzz;

pub use crate::{
    alkanes::{Tree, alkanes},
    collections::collection,
    comparer::Comparer,
    distance::{least_distance, stated_distance},
    extent::is_full_run,
    forms::{FormPair, definition_forms, fixture_forms},
    graph6::Graph,
    kekule::other_kekule_form,
    kinds::{KindPair, definition_kinds, fixture_kinds},
    lines::check_lines,
    molfile::{molfiles, renumbered_molfile},
    moves::{Readings, SubstituentNames},
    numbers::Numbers,
    pairs::{Expected, Pair, definition_pairs, fixture_pairs, grouped_pairs},
    renumber::{renumbered, renumbered_form, with_hydrogens_written},
    shortcuts::Shortcuts,
    small::small_isomers,
    spelling::random_spelling,
    stereo::{Markings, all_labels, all_markings, completions, grouped, mirrored},
    tally::Tally,
    tautomers::shifted,
    text::{Table, first_word, read_text, shared, workspace},
};

/// The programs of the README, compiled and run.
#[cfg(doctest)]
#[doc = include_str!("../../README.md")]
struct Readme;
