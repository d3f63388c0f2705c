//! What the normal form of a set says about each element, and about the set as a whole.

use std::collections::BTreeSet;

use crate::OrderError;

use super::{
    orbits::Orbits,
    solve::{Member, Solver, Trial},
};

/// What became of a variable.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(crate) enum Status {
    /// Its mark counts.
    Marked,
    /// Unmarked, and inverting it gives another stereoisomer.
    Unmarked,
    /// Not stereogenic here: marks on it say nothing.
    NotStereogenic,
}

impl Solver<'_> {
    /// Whether some inversion of a free element gives another stereoisomer from one of the given
    /// assignments. If none does from an assignment, it allows one stereoisomer: each further
    /// inversion starts from an equivalent assignment.
    pub(super) fn is_open<'a>(
        &mut self,
        assignments: impl Iterator<Item = &'a [bool]>,
        orbits: &Orbits,
        free: &[bool],
        never: &[bool],
        trial: &mut Trial,
    ) -> Result<bool, OrderError> {
        let variables = self.variables;
        let counts = |v: usize| free[v] && !never[v] && !variables[v].quiet;
        if (0..free.len()).any(|v| counts(v) && !orbits.inverts(v)) {
            return Ok(true);
        }
        if !(0..free.len()).any(counts) {
            return Ok(false);
        }
        for assignment in assignments {
            let value = |v: usize| (!free[v] || counts(v)).then(|| assignment[v]);
            let mut base = std::mem::take(&mut trial.base);
            self.label_into(value, &mut base)?;
            trial.load_orbits(&base, self);
            trial.base = base;
            let Trial {
                orbits: own,
                base,
                flipped,
                ..
            } = &mut *trial;
            for v in (0..free.len()).filter(|&v| counts(v) && own.root[v] == v) {
                self.label_into(|w| value(w).map(|odd| odd ^ (w == v)), flipped)?;
                if flipped.certificate != base.certificate {
                    return Ok(true);
                }
            }
        }
        Ok(false)
    }

    /// Whether the listed assignments differ in more than elements whose absence leaves nothing open.
    pub(super) fn differs_beside_quiet(
        &mut self,
        found: &[Member],
        free: &[bool],
    ) -> Result<bool, OrderError> {
        let variables = self.variables;
        let quiet = |v: usize| variables[v].quiet && variables[v].odd.is_none();
        if found.len() < 2 || !(0..free.len()).any(|v| !free[v] && quiet(v)) {
            return Ok(found.len() > 1);
        }
        let mut certificates = BTreeSet::new();
        for member in found {
            let value = |v: usize| (!free[v] && !quiet(v)).then(|| member.assignment[v]);
            certificates.insert(self.label(value)?.certificate);
        }
        Ok(certificates.len() > 1)
    }

    /// Lists what each variable is in this record. An unmarked one counts as stereogenic unless an
    /// automorphism inverts it and leaves all other elements, marked or not, as they are.
    pub(super) fn list_statuses(
        &mut self,
        orbits: &Orbits,
        free: &[bool],
        never: &[bool],
        statuses: &mut Vec<Status>,
    ) -> Result<(), OrderError> {
        statuses.clear();
        for v in 0..free.len() {
            statuses.push(if !free[v] {
                if self.variables[v].odd.is_some() {
                    Status::Marked
                } else {
                    Status::Unmarked
                }
            } else if never[v] {
                Status::NotStereogenic
            } else if !orbits.inverts(v) || self.is_stereogenic(v, free, never)? {
                Status::Unmarked
            } else {
                Status::NotStereogenic
            });
        }
        Ok(())
    }

    fn is_stereogenic(
        &mut self,
        v: usize,
        free: &[bool],
        never: &[bool],
    ) -> Result<bool, OrderError> {
        let variables = self.variables;
        let colours = self.graph.colours_mut().to_vec();
        // Each other unmarked element keeps its place: its centres get a colour of their own, above
        // all bits that atoms use.
        for (index, variable) in variables.iter().enumerate() {
            if free[index] && !never[index] && index != v {
                for &(candidate, _) in &variable.members {
                    for centre in self.perception.candidates[candidate].centres {
                        self.graph.colours_mut()[centre as usize] = !(index as u64);
                    }
                }
            }
        }
        let value = |w: usize| match variables[w].odd {
            _ if never[w] => None,
            Some(odd) if !free[w] => Some(odd),
            _ => Some(false),
        };
        let even = self.label(value);
        let odd = self.label(|w| value(w).map(|odd| odd ^ (w == v)));
        self.graph.colours_mut().copy_from_slice(&colours);
        Ok(even?.certificate != odd?.certificate)
    }
}
