//! Pieces: elements whose values are left open together.

use crate::{GroupKind, Molecule, OrderError, skeleton::Skeleton, stereo::Perception};

use super::{Variable, action};

/// What a sample has of the two arrangements of a piece.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord)]
pub(crate) enum Freedom {
    /// One, the other, or both: an unmarked element, or a group of relative configuration.
    Any,
    /// Both.
    And,
    /// One of them.
    Or,
}

impl Freedom {
    fn of(kind: GroupKind) -> Self {
        match kind {
            GroupKind::And => Self::And,
            GroupKind::Or => Self::Or,
            GroupKind::Relative => Self::Any,
        }
    }

    /// The kind of stereo group.
    pub(crate) fn group(self) -> GroupKind {
        match self {
            Self::And => GroupKind::And,
            Self::Or => GroupKind::Or,
            Self::Any => GroupKind::Relative,
        }
    }
}

/// Variables that are inverted together.
#[derive(Debug, Clone, PartialEq, Eq)]
pub(crate) struct Piece {
    pub(crate) freedom: Freedom,
    /// Ascending.
    pub(crate) variables: Vec<usize>,
}

impl Piece {
    /// An unmarked variable.
    pub(crate) fn unmarked(variable: usize) -> Self {
        Self {
            freedom: Freedom::Any,
            variables: vec![variable],
        }
    }
}

/// The marked variables of each stereo group of a record. Bridgeheads that determine each other are
/// one variable, so groups that share it are one group.
///
/// # Errors
/// [`OrderError::StereoGroups`] where a group names an arrangement about a metal, or where groups of
/// two kinds share a variable.
pub(crate) fn of_groups(
    skeleton: &Skeleton,
    perception: &Perception,
    variables: &[Variable],
    molecule: &Molecule,
) -> Result<Vec<Piece>, OrderError> {
    let mut pieces: Vec<Piece> = Vec::new();
    if molecule.stereo_groups().is_empty() {
        return Ok(pieces);
    }
    let member = action::membership(perception.candidates.len(), variables);
    for group in molecule.stereo_groups() {
        let freedom = Freedom::of(group.kind);
        let mut own = Vec::new();
        // A hydrogen is in no element, though it is written into its neighbour's.
        let named = group.atoms.iter();
        for &atom in named.filter(|&&atom| skeleton.folded[atom as usize].is_none()) {
            let home = skeleton.home[atom as usize];
            if perception.placed.iter().any(|placed| placed.centre == home) {
                return Err(OrderError::StereoGroups);
            }
            own.extend(marked_at(home, perception, variables, &member));
        }
        own.sort_unstable();
        own.dedup();
        while let Some(at) = pieces
            .iter()
            .position(|p| p.variables.iter().any(|v| own.contains(v)))
        {
            let other = pieces.remove(at);
            if other.freedom != freedom {
                return Err(OrderError::StereoGroups);
            }
            own.extend(other.variables);
            own.sort_unstable();
            own.dedup();
        }
        if !own.is_empty() {
            pieces.push(Piece {
                freedom,
                variables: own,
            });
        }
    }
    Ok(pieces)
}

/// The marked variables that a group means by an atom: its centre or axis, else its double bond.
fn marked_at(
    atom: u32,
    perception: &Perception,
    variables: &[Variable],
    member: &[(usize, bool)],
) -> Vec<usize> {
    let at = |chiral: bool| {
        let candidates = perception.candidates.iter().zip(member);
        candidates
            .filter(|&(candidate, &(variable, _))| {
                candidate.centres.contains(&atom)
                    && candidate.is_chiral() == chiral
                    && variables[variable].odd.is_some()
            })
            .map(|(_, &(variable, _))| variable)
            .collect::<Vec<usize>>()
    };
    let chiral = at(true);
    if chiral.is_empty() { at(false) } else { chiral }
}
