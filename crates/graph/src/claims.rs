//! Claims: the set of stereoisomers that a record stands for, compared and keyed as a set.
//!
//! The marks of a record fix some elements and leave others free. Its stereoisomers are the
//! assignments it allows, up to automorphisms of the constitution. Two records may mark different
//! elements and still allow the same set, so the set itself is brought into normal form:
//!
//! * An element is *free* when inverting it maps the set onto itself. Free elements carry no mark in
//!   the normal form. Which elements are free is decided exactly; it depends on the set alone.
//! * What remains is a list of assignments of the other elements, one for each canonical certificate
//!   in the set. For almost every record it has one member; only unmarked elements that an
//!   automorphism takes to marked ones make it longer, up to a limit.
//!
//! Records with stereo groups stand for sets of samples, see [`family`] and [`grouped`].

use crate::{order::Generators, stereo::Perception};

mod action;
mod family;
mod grouped;
mod orbits;
mod pieces;
mod place;
mod primes;
mod roles;
mod solve;
mod space;
mod status;
mod symmetries;
mod variables;

pub(crate) use family::{Alternative, Family, leaves_room};
pub(crate) use grouped::{Point, masked, most_pieces};
pub(crate) use pieces::{Freedom, Piece, of_groups};
pub(crate) use place::{Place, place};
pub(crate) use roles::Roles;
pub(crate) use solve::{Claims, Extent, Scratch, Solver};
pub(crate) use space::{Space, Vector};
pub(crate) use status::Status;
pub(crate) use symmetries::Symmetries;
pub(crate) use variables::{Variable, list_variables};

/// Per variable: whether some automorphism inverts it and leaves all others as they are.
pub(crate) fn never_stereogenic(
    generators: &Generators,
    perception: &Perception,
    variables: &[Variable],
) -> Vec<bool> {
    action::Action::of(generators, perception, variables).never_stereogenic(variables.len())
}
