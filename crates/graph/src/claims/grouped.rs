//! Claims of records with stereo groups: families of samples in normal form, without listing them.
//!
//! Elements that no automorphism moves or inverts are *settled*: their values are told apart by place
//! alone, so groups of settled elements stay symbols. What is listed are the pieces that touch other
//! elements: all their arrangements, up to a limit, as points with the canonical certificate of the
//! elements that are not settled and the values of the settled ones among them.
//!
//! The normal form depends on the family alone:
//!
//! * An element is free when inverting it maps each block, and all stereoisomers of each alternative,
//!   onto itself; free elements belong to no piece.
//! * A piece whose inversion maps the family onto itself when only its settled elements are inverted
//!   is a piece of those; one without any settled element is none.

use std::collections::BTreeMap;

use crate::{Limits, OrderError, order::Labelling};

use super::{
    Claims, Freedom, Piece,
    family::Family,
    place::Place,
    roles::Roles,
    solve::{MOST_OPEN, Solver, Trial},
};

/// First word of what stands for the certificates of a record with effective groups; a certificate
/// starts with the number of its atoms.
const GROUPED: u64 = u64::MAX;

/// A stereoisomer as listed: values of the settled elements of listed pieces, and for the others
/// their least image under all automorphisms, or a certificate if those are many. Which it is depends
/// on the constitution alone.
#[derive(Debug, Clone, PartialEq, Eq, PartialOrd, Ord)]
pub(crate) struct Point {
    pub(crate) settled: Vec<(Place, bool)>,
    pub(crate) certificate: Vec<u64>,
}

/// The listed part of a record.
#[derive(Debug)]
struct Listing {
    points: Vec<Point>,
    /// An assignment for each point.
    assignments: Vec<Vec<bool>>,
    family: Family,
}

/// What is worked on.
struct State {
    /// Variables that are free.
    free: Vec<bool>,
    /// Variables whose marks count.
    marked: Vec<bool>,
    /// The groups.
    groups: Vec<Piece>,
}

/// Groups that touch elements which are not settled, and unmarked elements that are not free.
fn listed(roles: &Roles, state: &State) -> Vec<Piece> {
    let groups = state.groups.iter().filter(|group| !roles.settles(group));
    let unmarked = (0..state.free.len()).filter(|&v| !state.free[v] && !state.marked[v]);
    groups
        .cloned()
        .chain(unmarked.map(Piece::unmarked))
        .collect()
}

/// Pieces that are listed at the most.
pub(crate) fn most_pieces(limits: &Limits) -> u32 {
    limits.stereo_pieces.min(MOST_OPEN)
}

/// An assignment with some variables inverted.
pub(crate) fn inverted(assignment: &[bool], variables: &[usize]) -> Vec<bool> {
    let mut turned = assignment.to_vec();
    for &v in variables {
        turned[v] = !turned[v];
    }
    turned
}

/// The assignment in which the pieces of a mask are inverted.
pub(crate) fn masked(assignment: &[bool], pieces: &[Piece], mask: u64) -> Vec<bool> {
    let chosen = pieces.iter().enumerate();
    let chosen = chosen.filter(|(at, _)| mask >> at & 1 == 1);
    let variables: Vec<usize> = chosen
        .flat_map(|(_, p)| p.variables.iter().copied())
        .collect();
    inverted(assignment, &variables)
}

impl Solver<'_> {
    /// Finds the normal form of a record with stereo groups, and the labelling to write it from.
    pub(crate) fn solve_groups(
        &mut self,
        bare: &Labelling,
        groups: Vec<Piece>,
        claims: &mut Claims,
        written: &mut Labelling,
    ) -> Result<(), OrderError> {
        let roles = Roles::of(bare, self.perception, self.variables);
        let mut state = State {
            free: roles.never.clone(),
            marked: self.variables.iter().map(|v| v.odd.is_some()).collect(),
            groups,
        };
        let listing = loop {
            self.tidy(&roles, &mut state);
            let listing = self.listing(&roles, &state, |_| false)?;
            if !self.free_more(&roles, &listing, &mut state)?
                && !self.untie(&roles, &listing, &mut state)?
            {
                break listing;
            }
        };
        self.list_statuses(
            &roles.orbits,
            &state.free,
            &roles.never,
            &mut claims.statuses,
        )?;
        claims.open = self.grouped_is_open(&roles, &listing, &state)?;
        (claims.shown, *written) = self.shown(&roles, &state)?;
        claims.certificates = self
            .statement(bare, &roles, &listing, &state)?
            .into_iter()
            .collect();
        claims.assignments = listing.assignments.into_iter().collect();
        claims.free = state.free;
        state.groups.sort_by(|a, b| a.variables.cmp(&b.variables));
        claims.groups = state.groups;
        Ok(())
    }

    /// Drops what is free from the groups; one element of relative configuration is an unmarked one.
    fn tidy(&self, roles: &Roles, state: &mut State) {
        loop {
            for group in &mut state.groups {
                group.variables.retain(|&v| !state.free[v]);
                if let (Freedom::Any, &[only]) = (group.freedom, &group.variables[..]) {
                    state.marked[only] = false;
                    group.variables.clear();
                }
            }
            state.groups.retain(|group| !group.variables.is_empty());
            let before = state.free.clone();
            let mut surely = Vec::new();
            self.surely_free(&roles.orbits, &roles.never, &state.marked, &mut surely);
            for (free, surely) in state.free.iter_mut().zip(surely) {
                *free |= surely;
            }
            if state.free == before {
                return;
            }
        }
    }

    /// Lists the arrangements of the listed pieces; elements that `blind` names are left unmarked.
    fn listing(
        &mut self,
        roles: &Roles,
        state: &State,
        blind: impl Fn(usize) -> bool,
    ) -> Result<Listing, OrderError> {
        let pieces = listed(roles, state);
        let limit = most_pieces(self.limits);
        if pieces.len() > limit as usize {
            return Err(OrderError::TooManyPieces { limit });
        }
        let drawn: Vec<bool> = self.variables.iter().map(|v| v.odd == Some(true)).collect();
        let mut listed = Vec::with_capacity(1 << pieces.len());
        for mask in 0..1u64 << pieces.len() {
            let assignment = masked(&drawn, &pieces, mask);
            let point = self.point(roles, state, &pieces, &assignment, &blind)?;
            listed.push((point, assignment));
        }
        let mut sorted: BTreeMap<&Point, &Vec<bool>> = BTreeMap::new();
        for (point, assignment) in &listed {
            sorted.entry(point).or_insert(assignment);
        }
        let points: Vec<Point> = sorted.keys().map(|&point| point.clone()).collect();
        let assignments = sorted.values().map(|&own| own.clone()).collect();
        let number: Vec<usize> = listed
            .iter()
            .map(|(point, _)| points.partition_point(|other| other < point))
            .collect();
        let family = Family::of(&pieces, |mask| number[mask as usize])?;
        Ok(Listing {
            points,
            assignments,
            family,
        })
    }

    fn point(
        &mut self,
        roles: &Roles,
        state: &State,
        pieces: &[Piece],
        assignment: &[bool],
        blind: &impl Fn(usize) -> bool,
    ) -> Result<Point, OrderError> {
        let value = |v: usize| {
            let counts = !state.free[v] && roles.settled[v].is_none() && !blind(v);
            counts.then(|| assignment[v])
        };
        let certificate = match &roles.symmetries {
            Some(symmetries) => symmetries.least(value),
            None => self.label(value)?.certificate,
        };
        let members = pieces.iter().flat_map(|piece| &piece.variables);
        let settled = members.filter_map(|&v| {
            let (place, odd) = roles.settled[v]?;
            Some((place, odd ^ assignment[v]))
        });
        let mut settled: Vec<(Place, bool)> = settled.collect();
        settled.sort_unstable();
        Ok(Point {
            settled,
            certificate,
        })
    }

    /// Makes orbits free whose elements, inverted one at a time, keep the family.
    fn free_more(
        &mut self,
        roles: &Roles,
        listing: &Listing,
        state: &mut State,
    ) -> Result<bool, OrderError> {
        let pieces = listed(roles, state);
        // As without groups: where no automorphism inverts an element in place, its mark counts,
        // unless a group of relative configuration makes it no more than an unmarked one.
        let relative = pieces
            .iter()
            .any(|p| p.freedom == Freedom::Any && p.variables.len() > 1);
        let mut more = Vec::new();
        for root in (0..state.free.len()).filter(|&v| roles.orbits.root[v] == v) {
            let settled = roles.settled[root].is_some();
            if state.free[root] || settled || !(relative || roles.orbits.inverted[root]) {
                continue;
            }
            let orbit: Vec<usize> = (0..state.free.len())
                .filter(|&v| roles.orbits.root[v] == root)
                .collect();
            if self.keep_sets(roles, listing, state, &pieces, &orbit)? {
                more.extend(orbit);
            }
        }
        for &v in &more {
            state.free[v] = true;
        }
        Ok(!more.is_empty())
    }

    /// Whether inverting one element of an orbit takes each set of the family to itself.
    fn keep_sets(
        &mut self,
        roles: &Roles,
        listing: &Listing,
        state: &State,
        pieces: &[Piece],
        orbit: &[usize],
    ) -> Result<bool, OrderError> {
        let mut images = vec![Vec::new(); listing.points.len()];
        for (own, assignment) in images.iter_mut().zip(&listing.assignments) {
            for &v in orbit {
                let turned = inverted(assignment, &[v]);
                let point = self.point(roles, state, pieces, &turned, &|_| false)?;
                match listing.points.binary_search(&point) {
                    Ok(image) => own.push(image),
                    Err(_) => return Ok(false),
                }
            }
        }
        let mut sets = listing.family.sets();
        Ok(sets.all(|set| {
            let mut inside = set.iter().flat_map(|&isomer| &images[isomer]);
            inside.all(|image| set.contains(image))
        }))
    }

    /// Takes elements out of a group whose inversion makes no difference; true if it found any.
    fn untie(
        &mut self,
        roles: &Roles,
        listing: &Listing,
        state: &mut State,
    ) -> Result<bool, OrderError> {
        for at in 0..state.groups.len() {
            let group = &state.groups[at];
            if roles.settles(group) {
                continue;
            }
            let (settled, rest): (Vec<usize>, Vec<usize>) = group
                .variables
                .iter()
                .partition(|&&v| roles.settled[v].is_some());
            let idle = if settled.is_empty() {
                let mut without = State {
                    free: state.free.clone(),
                    marked: state.marked.clone(),
                    groups: state.groups.clone(),
                };
                without.groups.remove(at);
                let other = self.listing(roles, &without, |_| false)?;
                other.points == listing.points && other.family == listing.family
            } else {
                let places: Vec<Place> = settled
                    .iter()
                    .filter_map(|&v| Some(roles.settled[v]?.0))
                    .collect();
                listing.is_kept_by(group.freedom, &places)
            };
            if idle {
                let group = &mut state.groups[at];
                group.variables.retain(|v| !rest.contains(v));
                return Ok(true);
            }
        }
        Ok(false)
    }

    /// Whether the record stands for more than one sample.
    fn grouped_is_open(
        &mut self,
        roles: &Roles,
        listing: &Listing,
        state: &State,
    ) -> Result<bool, OrderError> {
        let mut settled = state.groups.iter().filter(|group| roles.settles(group));
        if settled.any(|group| group.freedom != Freedom::And) {
            return Ok(true);
        }
        let quiet = |v: usize| self.variables[v].quiet && !state.marked[v] && !state.free[v];
        let quiet: Vec<bool> = (0..state.free.len()).map(quiet).collect();
        let single = if quiet.contains(&true) {
            let seen = self.listing(roles, state, |v| quiet[v])?;
            seen.family.is_single()
        } else {
            listing.family.is_single()
        };
        Ok(!single
            || self.is_open(
                listing.assignments.iter().map(Vec::as_slice),
                &roles.orbits,
                &state.free,
                &roles.never,
                &mut Trial::default(),
            )?)
    }

    /// The marks to write, and the labelling with them: settled groups with their first element even
    /// in canonical order, the others as the least point has them.
    fn shown(
        &mut self,
        roles: &Roles,
        state: &State,
    ) -> Result<(Vec<Option<bool>>, Labelling), OrderError> {
        let drawn: Vec<bool> = self.variables.iter().map(|v| v.odd == Some(true)).collect();
        let mut assignment = drawn;
        for group in state.groups.iter().filter(|group| roles.settles(group)) {
            let places = group
                .variables
                .iter()
                .filter_map(|&v| Some((roles.settled[v]?, v)));
            if let Some(((_, odd), first)) = places.min()
                && odd != assignment[first]
            {
                assignment = inverted(&assignment, &group.variables);
            }
        }
        let listed: Vec<Piece> = state
            .groups
            .iter()
            .filter(|group| !roles.settles(group))
            .cloned()
            .collect();
        // Assignments with the same point are related by an automorphism, so they read the same.
        let mut least: Option<(Point, Vec<bool>)> = None;
        for mask in 0..1u64 << listed.len() {
            let values = masked(&assignment, &listed, mask);
            let unmarked = |v: usize| !state.marked[v];
            let point = self.point(roles, state, &listed, &values, &unmarked)?;
            if least.as_ref().is_none_or(|(other, _)| point < *other) {
                least = Some((point, values));
            }
        }
        let values = least.map_or(assignment, |(_, values)| values);
        let shown: Vec<Option<bool>> = (0..values.len())
            .map(|v| (!state.free[v] && state.marked[v]).then_some(values[v]))
            .collect();
        let labelling = self.label(|v| shown[v])?;
        Ok((shown, labelling))
    }

    /// What equality and keys rest on. Where the samples are all sets of some stereoisomers, that is
    /// their certificates, as without groups; else the settled marks, the groups of settled elements
    /// and the family on the listed points; the certificate of the constitution, with what is given
    /// about metals, in which these have their places; and the points.
    fn statement(
        &mut self,
        bare: &Labelling,
        roles: &Roles,
        listing: &Listing,
        state: &State,
    ) -> Result<Vec<Vec<u64>>, OrderError> {
        let settled: Vec<&Piece> = state
            .groups
            .iter()
            .filter(|group| roles.settles(group))
            .collect();
        if settled.is_empty() && listing.family.one_block().is_some() {
            let mut certificates = Vec::new();
            for assignment in &listing.assignments {
                let labelling = self.label(|v| (!state.free[v]).then(|| assignment[v]))?;
                certificates.push(labelling.certificate);
            }
            certificates.sort_unstable();
            certificates.dedup();
            return Ok(certificates);
        }
        let mut words = vec![GROUPED];
        let listed = listed(roles, state);
        let grouped = |v: usize| {
            settled
                .iter()
                .copied()
                .chain(&listed)
                .any(|p| p.variables.contains(&v))
        };
        let mut marks: Vec<(Place, bool)> = (0..state.free.len())
            .filter(|&v| !state.free[v] && !grouped(v))
            .filter_map(|v| Some((roles.settled[v]?, self.variables[v].odd?)))
            .map(|((place, odd), value)| (place, odd ^ value))
            .collect();
        marks.sort_unstable();
        write_places(&mut words, &marks);
        let mut groups: Vec<(Freedom, Vec<(Place, bool)>)> = settled
            .iter()
            .map(|group| (group.freedom, self.relative(roles, group)))
            .collect();
        groups.sort_unstable();
        words.push(groups.len() as u64);
        for (freedom, places) in &groups {
            words.push(*freedom as u64);
            write_places(&mut words, places);
        }
        listing.write(&mut words);
        let points = listing.points.iter().map(|point| point.certificate.clone());
        let constitution = bare.certificate.clone();
        Ok([words, constitution].into_iter().chain(points).collect())
    }

    /// The elements of a settled group, relative to the first.
    fn relative(&self, roles: &Roles, group: &Piece) -> Vec<(Place, bool)> {
        let mut places: Vec<(Place, bool)> = group
            .variables
            .iter()
            .filter_map(|&v| {
                let (place, odd) = roles.settled[v]?;
                Some((place, odd ^ (self.variables[v].odd == Some(true))))
            })
            .collect();
        places.sort_unstable();
        let first = places.first().is_some_and(|&(_, odd)| odd);
        for (_, odd) in &mut places {
            *odd ^= first;
        }
        places
    }
}

fn write_places(words: &mut Vec<u64>, places: &[(Place, bool)]) {
    words.push(places.len() as u64);
    for &((shape, a, b), odd) in places {
        words.push(u64::from(a) << 32 | u64::from(b));
        words.push((shape as u64) << 1 | u64::from(odd));
    }
}

impl Listing {
    /// Whether inverting settled elements keeps the family.
    fn is_kept_by(&self, freedom: Freedom, places: &[Place]) -> bool {
        let images: Option<Vec<usize>> = self
            .points
            .iter()
            .map(|point| {
                let mut point = point.clone();
                for (place, odd) in &mut point.settled {
                    *odd ^= places.contains(place);
                }
                self.points.binary_search(&point).ok()
            })
            .collect();
        images.is_some_and(|images| self.family.is_kept_by(freedom, &|isomer| images[isomer]))
    }

    fn write(&self, words: &mut Vec<u64>) {
        words.push(self.points.len() as u64);
        for point in &self.points {
            write_places(words, &point.settled);
        }
        words.push(self.family.alternatives.len() as u64);
        for alternative in &self.family.alternatives {
            words.push(alternative.blocks.len() as u64);
            for set in alternative.blocks.iter().chain([&alternative.all]) {
                words.push(set.len() as u64);
                words.extend(set.iter().map(|&isomer| isomer as u64));
            }
        }
    }
}
