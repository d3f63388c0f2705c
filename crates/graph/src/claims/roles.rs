//! What automorphisms of the constitution make of each variable.

use crate::{order::Labelling, stereo::Perception};

use super::{
    Piece, Variable,
    action::Action,
    orbits::Orbits,
    place::{Place, canonical_place},
    symmetries::Symmetries,
};

/// The part that each variable plays, whatever a record marks.
#[derive(Debug)]
pub(crate) struct Roles {
    pub(super) orbits: Orbits,
    /// Per variable: an automorphism inverts it and leaves all others as they are.
    pub(crate) never: Vec<bool>,
    /// Per variable that no automorphism moves or inverts: its place, and whether its even value is
    /// odd there.
    pub(crate) settled: Vec<Option<(Place, bool)>>,
    /// The automorphisms one by one, if they are few.
    pub(crate) symmetries: Option<Symmetries>,
}

impl Roles {
    pub(crate) fn of(bare: &Labelling, perception: &Perception, variables: &[Variable]) -> Self {
        let action = Action::of(&bare.generators, perception, variables);
        let touched = action.touched(variables.len());
        let settled = variables.iter().zip(touched).map(|(variable, touched)| {
            (!touched).then(|| canonical_place(variable, perception, bare))?
        });
        let never = action.never_stereogenic(variables.len());
        Self {
            settled: settled.collect(),
            orbits: Orbits::of(&action, variables.len()),
            symmetries: Symmetries::of(&action, &never, bare, perception, variables),
            never,
        }
    }

    /// Whether all variables of a piece are settled.
    pub(crate) fn settles(&self, piece: &Piece) -> bool {
        piece.variables.iter().all(|&v| self.settled[v].is_some())
    }

    /// Whether how many elements of the variable's orbit are odd is even or odd in a stereoisomer
    /// whatever automorphisms do: no automorphism inverts any in place.
    pub(crate) fn keeps_count(&self, variable: usize) -> bool {
        !self.orbits.inverts(variable)
    }
}
