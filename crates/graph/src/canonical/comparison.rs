//! How the stereoisomers that two records of one constitution stand for lie to each other.

use std::collections::BTreeSet;

use crate::{
    Canonical, OrderError, Orderer, Shape,
    claims::{self, Place},
    order::Labelling,
    stereo::Candidate,
};

use super::{colour, samples};

/// How the samples that two records of one constitution stand for lie to each other.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Arrangement {
    /// The same samples.
    Same,
    /// Some sample of one is a sample of the other, but not all are.
    Overlapping,
    /// One sample each, mirror images of each other.
    MirrorImages,
    /// No sample of one shares a stereoisomer with one of the other, or is its mirror image.
    Unlike,
    /// Two samples never the same, but always with a stereoisomer in common.
    Composition,
    /// Surely different, but not in one way: samples of the two may be mirror images, or may have a
    /// stereoisomer in common, or nothing.
    Unresolved,
}

/// Compares the claims of two records of the same labelled constitution.
///
/// # Errors
/// [`OrderError::StepLimit`].
///
/// # Complexity
/// A canonical labelling for each listed assignment of either side; nearly always one.
pub fn arrangement(
    orderer: &mut Orderer,
    a: &Canonical,
    b: &Canonical,
) -> Result<Arrangement, OrderError> {
    if a.same_compound(b) {
        return Ok(Arrangement::Same);
    }
    if !a.claims.groups.is_empty() || !b.claims.groups.is_empty() {
        return samples::compare(orderer, a, b);
    }
    // Elements that either side leaves free agree with anything: the free set of each side is a
    // union of orbits, so only the elements that both fix have to be compared.
    let (in_a, in_b) = (a.fixed_places(b), b.fixed_places(a));
    for (side, fixed) in [(a, &in_a), (b, &in_b)] {
        if !side.perception.placed.is_empty() && !side.is_closed(fixed) {
            return Err(OrderError::PartlyMarkedCentres);
        }
    }
    if a.places_what_is_tetrahedral(b) || b.places_what_is_tetrahedral(a) {
        return Ok(Arrangement::Unlike);
    }
    let common: BTreeSet<Place> = in_a.intersection(&in_b).copied().collect();
    let (metals_a, metals_b) = (a.placed_places(), b.placed_places());
    let metals: BTreeSet<u32> = metals_a.intersection(&metals_b).copied().collect();
    // What only one side fixes leaves open whether mirror images of the rest are mirror images.
    let both_fix_all = in_a == in_b && metals_a == metals_b;
    let common = Common {
        elements: common,
        metals,
    };
    let ours = orderer.certificates(a, &a.assignments(b), &common, false)?;
    let theirs = orderer.certificates(b, &b.assignments(a), &common, false)?;
    if !ours.is_disjoint(&theirs) {
        return Ok(Arrangement::Overlapping);
    }
    let mirrored = orderer.certificates(b, &b.assignments(a), &common, true)?;
    Ok(if ours.is_disjoint(&mirrored) {
        Arrangement::Unlike
    } else if a.claims.open || b.claims.open || !both_fix_all {
        Arrangement::Unresolved
    } else {
        Arrangement::MirrorImages
    })
}

/// What both records fix.
struct Common {
    elements: BTreeSet<Place>,
    /// Canonical places of centres with a polyhedron.
    metals: BTreeSet<u32>,
}

impl Canonical {
    pub(super) fn place(&self, candidate: &Candidate) -> Place {
        claims::place(candidate, &self.bare())
    }

    /// The places of a variable's candidates.
    pub(super) fn candidate_places(&self, variable: usize) -> impl Iterator<Item = Place> {
        let members = self.variables[variable].members.iter();
        members.map(|&(index, _)| self.place(&self.perception.candidates[index]))
    }

    /// Whether automorphisms of the constitution take what is fixed to what is fixed: only then do
    /// canonical places mean the same in both records.
    fn is_closed(&self, fixed: &BTreeSet<Place>) -> bool {
        let rank = |atom: u32| self.bare().rank[atom as usize];
        let metals = self.placed_places();
        self.bare().generators.iter().all(|generator| {
            let moved = |at: u32| rank(generator.image(self.bare().order[at as usize]));
            fixed.iter().all(|&(shape, a, b)| {
                let (a, b) = (moved(a), moved(b));
                fixed.contains(&(shape, a.min(b), a.max(b)))
            }) && metals.iter().all(|&metal| metals.contains(&moved(metal)))
        })
    }

    /// Whether this record puts ligands on a polyhedron where the other marks a tetrahedron.
    fn places_what_is_tetrahedral(&self, other: &Self) -> bool {
        let tetrahedra = other.fixed_places(self);
        let mut metals = self.placed_places().into_iter();
        metals.any(|metal| tetrahedra.contains(&(Shape::Tetrahedral, metal, metal)))
    }

    fn placed_places(&self) -> BTreeSet<u32> {
        self.perception
            .placed
            .iter()
            .map(|placed| self.bare().rank[placed.centre as usize])
            .collect()
    }

    /// Free cages that have to be compared bridgehead by bridgehead, because the other record marks
    /// one in a way that no cage can have: whichever way round, their bridgeheads stay tied.
    fn tied_cages(&self, other: &Self) -> Vec<usize> {
        if other.perception.impossible.is_empty() {
            return Vec::new();
        }
        (0..self.variables.len())
            .filter(|&v| self.claims.free[v] && self.variables[v].members.len() > 1)
            .collect()
    }

    fn fixed_places(&self, other: &Self) -> BTreeSet<Place> {
        let tied = self.tied_cages(other);
        (0..self.variables.len())
            .filter(|v| !self.claims.free[*v] || tied.contains(v))
            .flat_map(|v| self.candidate_places(v))
            .collect()
    }

    /// The listed assignments, with both values of each tied cage.
    fn assignments(&self, other: &Self) -> Vec<Vec<bool>> {
        let own = self.claims.assignments.iter();
        let mut list: Vec<Vec<bool>> = own.map(<[bool]>::to_vec).collect();
        for cage in self.tied_cages(other) {
            let mut turned = list.clone();
            for assignment in &mut turned {
                assignment[cage] = !assignment[cage];
            }
            list.append(&mut turned);
        }
        list
    }
}

impl Orderer {
    /// Certificates of all listed assignments, or of their mirror images, with only the elements that
    /// both records fix marked.
    fn certificates(
        &mut self,
        canonical: &Canonical,
        assignments: &[Vec<bool>],
        common: &Common,
        mirrored: bool,
    ) -> Result<BTreeSet<Vec<u64>>, OrderError> {
        colour::load(
            &mut self.graph,
            &canonical.skeleton,
            &canonical.mesomer,
            true,
        )?;
        let mut steps = 0;
        let mut found = BTreeSet::new();
        let mut labelling = Labelling::default();
        let placed = canonical.perception.placed.iter();
        for own in placed {
            if common
                .metals
                .contains(&canonical.bare().rank[own.centre as usize])
            {
                let mut own = own.clone();
                if mirrored {
                    own.ligands = own.polyhedron.mirrored(&own.ligands);
                }
                self.graph.placed.push(own);
            }
        }
        for assignment in assignments {
            self.graph.units.clear();
            for (variable, &odd) in canonical.variables.iter().zip(assignment) {
                for &(index, opposite) in &variable.members {
                    let candidate = &canonical.perception.candidates[index];
                    if common.elements.contains(&canonical.place(candidate)) {
                        let turned = mirrored && candidate.is_chiral();
                        self.graph
                            .units
                            .push(candidate.unit(odd ^ opposite ^ turned));
                    }
                }
            }
            self.labeller
                .label(&mut self.graph, &self.limits, &mut steps, &mut labelling)?;
            found.insert(labelling.certificate.clone());
        }
        Ok(found)
    }
}
