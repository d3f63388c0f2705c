//! The normal form of a set of stereoisomers.

use crate::{
    Limits, OrderError,
    order::{Coloured, Labeller, Labelling},
    stereo::Perception,
};

use super::{Piece, Status, Variable, action::Action, orbits::Orbits};

/// The set of stereoisomers in normal form.
#[derive(Debug, Default, Clone)]
pub(crate) struct Claims {
    /// Per variable: inverting it maps the set onto itself.
    pub(crate) free: Vec<bool>,
    /// Assignments of the variables that are not free, one for each certificate. Free variables have
    /// an arbitrary value.
    pub(crate) assignments: Vec<Vec<bool>>,
    /// The certificates, sorted; the set is determined by them.
    pub(crate) certificates: Vec<Vec<u64>>,
    /// Whether the set has more than one stereoisomer, quiet elements aside.
    pub(crate) open: bool,
    pub(crate) statuses: Vec<Status>,
    /// Per variable: the arrangement that canonical text gives it, if any.
    pub(crate) shown: Vec<Option<bool>>,
    /// The stereo groups that make a difference, with the variables that count.
    pub(crate) groups: Vec<Piece>,
}

/// Unmarked elements that are listed at the most, whatever the limits say: 2 to this power.
pub(super) const MOST_OPEN: u32 = 24;

/// Labels one molecule under changing marks.
pub(crate) struct Solver<'a> {
    pub(crate) graph: &'a mut Coloured,
    pub(crate) labeller: &'a mut Labeller,
    pub(crate) perception: &'a Perception,
    pub(crate) variables: &'a [Variable],
    pub(crate) limits: &'a Limits,
    pub(crate) steps: &'a mut u64,
}

impl Solver<'_> {
    /// Canonical labelling with marks on the variables that `mark` gives one.
    pub(crate) fn label(
        &mut self,
        mark: impl Fn(usize) -> Option<bool>,
    ) -> Result<Labelling, OrderError> {
        self.graph.units.clear();
        for (index, variable) in self.variables.iter().enumerate() {
            if let Some(odd) = mark(index) {
                for &(candidate, opposite) in &variable.members {
                    let unit = self.perception.candidates[candidate].unit(odd ^ opposite);
                    self.graph.units.push(unit);
                }
            }
        }
        let mut labelling = Labelling::default();
        self.labeller
            .label(self.graph, self.limits, self.steps, &mut labelling)?;
        Ok(labelling)
    }

    /// Finds the normal form, and the labelling to write the record from. `bare` is the labelling of
    /// the same graph without any marks.
    pub(crate) fn solve(
        &mut self,
        bare: &Labelling,
        claims: &mut Claims,
        written: &mut Labelling,
    ) -> Result<(), OrderError> {
        if self.variables.is_empty() {
            claims.clear();
            claims.assignments.push(Vec::new());
            claims.certificates.push(bare.certificate.clone());
            written.clone_from(bare);
            return Ok(());
        }
        let action = Action::of(&bare.generators, self.perception, self.variables);
        let orbits = Orbits::of(&action, self.variables.len());
        let never = action.never_stereogenic(self.variables.len());
        let marked: Vec<bool> = self.variables.iter().map(|v| v.odd.is_some()).collect();
        let mut free = self.surely_free(&orbits, &never, &marked);
        let assignments = self.assignments(&free)?;
        let mut found = self.distinct(assignments, &free, bare)?;
        let more = self.further_free(&found, &orbits, &free)?;
        if !more.is_empty() {
            for variable in more {
                free[variable] = true;
            }
            let assignments = found.into_iter().map(|member| member.assignment).collect();
            found = self.distinct(assignments, &free, bare)?;
        }
        *written = self.written(bare, &found, &free)?;
        claims.statuses = self.statuses(&orbits, &free, &never)?;
        let beside_quiet = self.differs_beside_quiet(&found, &free)?;
        (claims.assignments, claims.certificates) = found
            .into_iter()
            .map(|m| (m.assignment, m.labelling.certificate))
            .unzip();
        // Where the set has several members it is open by that; else the inversions of one tell.
        let first = claims.assignments.get(..1).unwrap_or_default();
        claims.open = beside_quiet || self.is_open(first, &orbits, &free, &never)?;
        let shown = self.variables.iter().zip(&free);
        let shown = shown.map(|(variable, &free)| variable.odd.filter(|_| !free));
        claims.shown = shown.collect();
        claims.groups.clear();
        claims.free = free;
        Ok(())
    }

    /// Variables that are free without a doubt: never stereogenic, or unmarked with all their
    /// images.
    pub(super) fn surely_free(
        &self,
        orbits: &Orbits,
        never: &[bool],
        marked: &[bool],
    ) -> Vec<bool> {
        let marked = |v: usize| marked[v] && !never[v];
        let mut orbit_marked = vec![false; self.variables.len()];
        for v in (0..self.variables.len()).filter(|&v| marked(v)) {
            orbit_marked[orbits.root[v]] = true;
        }
        (0..self.variables.len())
            .map(|v| never[v] || !orbit_marked[orbits.root[v]])
            .collect()
    }

    /// All assignments of the unmarked variables that are not surely free.
    fn assignments(&self, free: &[bool]) -> Result<Vec<Vec<bool>>, OrderError> {
        let marked: Vec<bool> = self
            .variables
            .iter()
            .map(|variable| variable.odd == Some(true))
            .collect();
        let listed: Vec<usize> = (0..free.len())
            .filter(|&v| !free[v] && self.variables[v].odd.is_none())
            .collect();
        if listed.len() > self.limits.open_elements.min(MOST_OPEN) as usize {
            return Err(OrderError::TooManyOpenElements {
                limit: self.limits.open_elements,
            });
        }
        Ok((0u64..1 << listed.len())
            .map(|bits| {
                let mut assignment = marked.clone();
                for (at, &variable) in listed.iter().enumerate() {
                    assignment[variable] = bits >> at & 1 == 1;
                }
                assignment
            })
            .collect())
    }

    /// Labels each assignment and keeps one for each certificate, sorted.
    fn distinct(
        &mut self,
        assignments: Vec<Vec<bool>>,
        free: &[bool],
        bare: &Labelling,
    ) -> Result<Vec<Member>, OrderError> {
        if free.iter().all(|&free| free) {
            let assignment = assignments.into_iter().next().unwrap_or_default();
            return Ok(vec![Member {
                assignment,
                labelling: bare.clone(),
            }]);
        }
        let mut found = Vec::with_capacity(assignments.len());
        for assignment in assignments {
            let labelling = self.label(|v| (!free[v]).then(|| assignment[v]))?;
            found.push(Member {
                assignment,
                labelling,
            });
        }
        found.sort_by(|a, b| a.labelling.certificate.cmp(&b.labelling.certificate));
        found.dedup_by(|a, b| a.labelling.certificate == b.labelling.certificate);
        Ok(found)
    }

    /// Orbits of variables whose inversion, one at a time, maps the set onto itself. Inverting
    /// variables that an automorphism of the assignment exchanges gives the same, so one of each
    /// kind is tried.
    fn further_free(
        &mut self,
        found: &[Member],
        orbits: &Orbits,
        free: &[bool],
    ) -> Result<Vec<usize>, OrderError> {
        let mut more = Vec::new();
        for root in 0..free.len() {
            // Where no automorphism inverts an element in place, the number of even ones in its
            // orbit is a property of each stereoisomer, so a mark there is never idle.
            if orbits.root[root] != root || !orbits.inverted[root] || free[root] {
                continue;
            }
            let orbit: Vec<usize> = (0..free.len())
                .filter(|&v| orbits.root[v] == root)
                .collect();
            if self.all_inversions_stay(found, &orbit, free)? {
                more.extend(orbit);
            }
        }
        Ok(more)
    }

    fn all_inversions_stay(
        &mut self,
        found: &[Member],
        orbit: &[usize],
        free: &[bool],
    ) -> Result<bool, OrderError> {
        for member in found {
            let own = Action::of(
                &member.labelling.generators,
                self.perception,
                self.variables,
            );
            let own = Orbits::of(&own, free.len());
            for &v in orbit.iter().filter(|&&v| own.root[v] == v) {
                let flipped =
                    self.label(|w| (!free[w]).then(|| member.assignment[w] ^ (w == v)))?;
                let inside = found
                    .binary_search_by(|m| m.labelling.certificate.cmp(&flipped.certificate))
                    .is_ok();
                if !inside {
                    return Ok(false);
                }
            }
        }
        Ok(true)
    }

    /// The labelling that canonical text is written from: the record's own marks, free ones left
    /// out.
    fn written(
        &mut self,
        bare: &Labelling,
        found: &[Member],
        free: &[bool],
    ) -> Result<Labelling, OrderError> {
        let marked = |v: usize| self.variables[v].odd.filter(|_| !free[v]);
        if (0..free.len()).all(|v| marked(v).is_none()) {
            return Ok(bare.clone());
        }
        if let [only] = found
            && (0..free.len()).all(|v| free[v] || self.variables[v].odd.is_some())
        {
            return Ok(only.labelling.clone());
        }
        let variables = self.variables;
        self.label(|v| variables[v].odd.filter(|_| !free[v]))
    }
}

impl Claims {
    fn clear(&mut self) {
        self.free.clear();
        self.assignments.clear();
        self.certificates.clear();
        self.statuses.clear();
        self.shown.clear();
        self.groups.clear();
        self.open = false;
    }
}

/// One assignment with its labelling.
#[derive(Debug, Clone)]
pub(super) struct Member {
    pub(super) assignment: Vec<bool>,
    pub(super) labelling: Labelling,
}
