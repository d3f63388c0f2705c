//! How two molecules are related, and what makes the difference.
//!
//! [`relate`] is cheap and gives the verdict; [`explain()`] finds what accounts for it; [`wire`] is the
//! output contract of docs/output.md. With the feature `parallel`, module `parallel` shares work out
//! among threads.
#![forbid(unsafe_code)]

mod constitution;
mod explain;
mod forms;
mod groups;
mod kinds;
pub mod mapping;
mod relation;
mod remarks;
pub mod samples;
mod structure;
mod words;

#[cfg(feature = "families")]
pub mod families;
#[cfg(feature = "parallel")]
pub mod parallel;
pub mod wire;

pub use crate::{
    explain::{
        BondDifference, BranchPoint, Branching, Explanation, Geometry, HydrogenDifference,
        LeftOver, RingJoin, RingSystem, StereoChange, StereoDifference, explain,
    },
    forms::{
        Axes, AxesError, Axis, Change, CounterIons, CounterIonsError, Form, FormError, Listed,
        ListedKind, Normaliser, Removed, same_apart_from,
    },
    groups::{FunctionalGroup, functional_groups},
    kinds::{Kind, kinds},
    relation::{Relation, StereoKind, Verdict, relate},
    structure::{PrepareError, Structure},
};
pub use explain::moves as findings;
