//! The normal form of a set of stereoisomers.

use crate::{
    Limits, OrderError,
    order::{Coloured, Labeller, Labelling},
    rows::Rows,
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
    pub(crate) assignments: Rows<bool>,
    /// The certificates, sorted; the set is determined by them.
    pub(crate) certificates: Rows<u64>,
    /// Whether the set has more than one stereoisomer, quiet elements aside.
    pub(crate) open: bool,
    pub(crate) statuses: Vec<Status>,
    /// Per variable: the arrangement that canonical text gives it, if any.
    pub(crate) shown: Vec<Option<bool>>,
    /// The stereo groups that make a difference, with the variables that count.
    pub(crate) groups: Vec<Piece>,
}

/// How much of the claims is asked for.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(crate) enum Extent {
    /// What tells compounds apart, and what canonical text shows.
    Identity,
    /// What became of each element, and whether the set is open, as well.
    All,
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

/// Scratch that is reused from one molecule to the next.
#[derive(Debug, Default)]
pub(crate) struct Scratch {
    action: Action,
    orbits: Orbits,
    never: Vec<bool>,
    marked: Vec<bool>,
    found: Vec<Member>,
    spare: Vec<Member>,
    trial: Trial,
}

/// What single inversions of an assignment are tried with; scratch.
#[derive(Debug, Default)]
pub(super) struct Trial {
    /// The automorphisms of the assignment: of inversions that they exchange one is tried.
    action: Action,
    pub(super) orbits: Orbits,
    pub(super) base: Labelling,
    pub(super) flipped: Labelling,
}

impl Trial {
    /// Loads the orbits under the automorphisms of an assignment.
    pub(super) fn load_orbits(&mut self, own: &Labelling, solver: &Solver<'_>) {
        let (perception, variables) = (solver.perception, solver.variables);
        self.action.load(&own.generators, perception, variables);
        self.orbits.load(&self.action, variables.len());
    }
}

/// One assignment with its labelling.
#[derive(Debug, Default)]
pub(super) struct Member {
    pub(super) assignment: Vec<bool>,
    pub(super) labelling: Labelling,
}

impl Solver<'_> {
    /// Canonical labelling with marks on the variables that `mark` gives one.
    pub(crate) fn label(
        &mut self,
        mark: impl Fn(usize) -> Option<bool>,
    ) -> Result<Labelling, OrderError> {
        let mut labelling = Labelling::default();
        self.label_into(mark, &mut labelling)?;
        Ok(labelling)
    }

    /// As [`Solver::label`], into a labelling whose memory is reused.
    pub(super) fn label_into(
        &mut self,
        mark: impl Fn(usize) -> Option<bool>,
        labelling: &mut Labelling,
    ) -> Result<(), OrderError> {
        self.graph.units.clear();
        for (index, variable) in self.variables.iter().enumerate() {
            if let Some(odd) = mark(index) {
                for &(candidate, opposite) in &variable.members {
                    let unit = self.perception.candidates[candidate].unit(odd ^ opposite);
                    self.graph.units.push(unit);
                }
            }
        }
        self.labeller
            .label(self.graph, self.limits, self.steps, labelling)
    }

    /// Finds the normal form, and the labelling to write the record from. `bare` is the labelling of
    /// the same graph without any marks.
    pub(crate) fn solve(
        &mut self,
        bare: &Labelling,
        extent: Extent,
        scratch: &mut Scratch,
        claims: &mut Claims,
        written: &mut Labelling,
    ) -> Result<(), OrderError> {
        claims.clear();
        let variables = self.variables;
        if variables.is_empty() {
            claims.assignments.push([]);
            claims.certificates.push(bare.certificate.iter().copied());
            written.clone_from(bare);
            return Ok(());
        }
        let Scratch {
            action,
            orbits,
            never,
            marked,
            found,
            spare,
            trial,
        } = scratch;
        action.load(&bare.generators, self.perception, variables);
        orbits.load(action, variables.len());
        action.list_never_stereogenic(variables.len(), never);
        marked.clear();
        marked.extend(variables.iter().map(|v| v.odd.is_some()));
        let free = &mut claims.free;
        self.surely_free(orbits, never, marked, free);
        spare.append(found);
        self.list_assignments(free, found, spare)?;
        self.keep_distinct(found, spare, free, bare)?;
        let more = self.further_free(found, orbits, free, trial)?;
        if !more.is_empty() {
            for variable in more {
                free[variable] = true;
            }
            self.keep_distinct(found, spare, free, bare)?;
        }
        self.write(bare, found, free, written)?;
        for member in &*found {
            claims.assignments.push(member.assignment.iter().copied());
            let words = member.labelling.certificate.iter();
            claims.certificates.push(words.copied());
        }
        if extent == Extent::All {
            self.list_statuses(orbits, free, never, &mut claims.statuses)?;
            // Where the set has several members it is open by that; else the inversions of one tell.
            let first = claims.assignments.iter().take(1);
            claims.open = self.differs_beside_quiet(found, free)?
                || self.is_open(first, orbits, free, never, trial)?;
        }
        let shown = variables.iter().zip(&*free);
        claims
            .shown
            .extend(shown.map(|(variable, &free)| variable.odd.filter(|_| !free)));
        Ok(())
    }

    /// Variables that are free without a doubt: never stereogenic, or unmarked with all their
    /// images.
    pub(super) fn surely_free(
        &self,
        orbits: &Orbits,
        never: &[bool],
        marked: &[bool],
        free: &mut Vec<bool>,
    ) {
        // First, per least variable of an orbit: whether no mark in the orbit counts.
        free.clear();
        free.resize(self.variables.len(), true);
        for v in (0..free.len()).filter(|&v| marked[v] && !never[v]) {
            free[orbits.root[v]] = false;
        }
        // No variable is less than the least of its orbit, so that one is still to be read when the
        // others are written, from the back.
        for v in (0..free.len()).rev() {
            free[v] = never[v] || free[orbits.root[v]];
        }
    }

    /// Lists all assignments of the unmarked variables that are not free, not labelled yet.
    fn list_assignments(
        &self,
        free: &[bool],
        found: &mut Vec<Member>,
        spare: &mut Vec<Member>,
    ) -> Result<(), OrderError> {
        let unmarked = |v: &usize| !free[*v] && self.variables[*v].odd.is_none();
        let listed: Vec<usize> = (0..free.len()).filter(unmarked).collect();
        if listed.len() > self.limits.open_elements.min(MOST_OPEN) as usize {
            return Err(OrderError::TooManyOpenElements {
                limit: self.limits.open_elements,
            });
        }
        for bits in 0u64..1 << listed.len() {
            let mut member = spare.pop().unwrap_or_default();
            let assignment = &mut member.assignment;
            assignment.clear();
            assignment.extend(self.variables.iter().map(|v| v.odd == Some(true)));
            for (at, &variable) in listed.iter().enumerate() {
                assignment[variable] = bits >> at & 1 == 1;
            }
            found.push(member);
        }
        Ok(())
    }

    /// Labels each assignment and keeps one for each certificate, sorted.
    fn keep_distinct(
        &mut self,
        found: &mut Vec<Member>,
        spare: &mut Vec<Member>,
        free: &[bool],
        bare: &Labelling,
    ) -> Result<(), OrderError> {
        if free.iter().all(|&free| free) {
            // There is always one: each set of unmarked variables has assignments.
            spare.extend(found.drain(1..));
            for member in found {
                member.labelling.clone_from(bare);
            }
            return Ok(());
        }
        self.graph.keep_plain(bare);
        for Member {
            assignment,
            labelling,
        } in &mut *found
        {
            self.label_into(|v| (!free[v]).then(|| assignment[v]), labelling)?;
        }
        found.sort_by(|a, b| a.labelling.certificate.cmp(&b.labelling.certificate));
        found.dedup_by(|a, b| a.labelling.certificate == b.labelling.certificate);
        Ok(())
    }

    /// Orbits of variables whose inversion, one at a time, maps the set onto itself. Inverting
    /// variables that an automorphism of the assignment exchanges gives the same, so one of each
    /// kind is tried.
    fn further_free(
        &mut self,
        found: &[Member],
        orbits: &Orbits,
        free: &[bool],
        trial: &mut Trial,
    ) -> Result<Vec<usize>, OrderError> {
        let mut more = Vec::new();
        for root in 0..free.len() {
            // Where no automorphism inverts an element in place, the number of even ones in its
            // orbit is a property of each stereoisomer, so a mark there is never idle.
            if orbits.root[root] != root || !orbits.inverted[root] || free[root] {
                continue;
            }
            let orbit = || (0..free.len()).filter(|&v| orbits.root[v] == root);
            if self.all_inversions_stay(found, orbit, free, trial)? {
                more.extend(orbit());
            }
        }
        Ok(more)
    }

    fn all_inversions_stay<O: Iterator<Item = usize>>(
        &mut self,
        found: &[Member],
        orbit: impl Fn() -> O,
        free: &[bool],
        trial: &mut Trial,
    ) -> Result<bool, OrderError> {
        for member in found {
            trial.load_orbits(&member.labelling, self);
            let Trial {
                orbits: own,
                flipped,
                ..
            } = &mut *trial;
            for v in orbit().filter(|&v| own.root[v] == v) {
                let mark = |w: usize| (!free[w]).then(|| member.assignment[w] ^ (w == v));
                self.label_into(mark, flipped)?;
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
    fn write(
        &mut self,
        bare: &Labelling,
        found: &[Member],
        free: &[bool],
        written: &mut Labelling,
    ) -> Result<(), OrderError> {
        let variables = self.variables;
        let marked = |v: usize| variables[v].odd.filter(|_| !free[v]);
        if (0..free.len()).all(|v| marked(v).is_none()) {
            written.clone_from(bare);
        } else if let [only] = found
            && (0..free.len()).all(|v| free[v] || variables[v].odd.is_some())
        {
            written.clone_from(&only.labelling);
        } else {
            self.label_into(marked, written)?;
        }
        Ok(())
    }
}

impl Claims {
    pub(crate) fn clear(&mut self) {
        self.free.clear();
        self.assignments.clear();
        self.certificates.clear();
        self.statuses.clear();
        self.shown.clear();
        self.groups.clear();
        self.open = false;
    }
}
