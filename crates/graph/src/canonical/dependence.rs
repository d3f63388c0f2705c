//! What the automorphisms of the constitution say about stereo elements: which are stereogenic only
//! because others are, and whether an achiral record belongs to a set with chiral members.

use std::collections::BTreeSet;

use crate::{
    Canonical, Shape,
    claims::{Roles, Status, Symmetries},
};

/// Members of the set of stereoisomers that [`Canonical::is_meso`] looks at: 2 to this power.
const MOST_INVERTED: usize = 16;

impl Canonical {
    /// For each of [`Canonical::stereo_elements`], the centres or ends of the elements that it depends
    /// on, sorted. `None` where that is not worked out: beside arrangements about centres that are not
    /// tetrahedral, and where more than 512 automorphisms act on the elements.
    ///
    /// An element depends on others if some automorphism of the constitution leaves it in its place
    /// and inverts it. It is stereogenic only because each such automorphism also moves or inverts
    /// others; it depends on those of the automorphisms that move or invert a smallest set of others,
    /// smallest by inclusion.
    pub fn dependences(&self) -> Option<Vec<Vec<[u32; 2]>>> {
        let symmetries = self.symmetries()?;
        let elements = self.stereo_elements();
        let of_element = elements.iter().map(|element| {
            let supports = supports(&symmetries, element.variable);
            let members = supports.iter().flat_map(|&v| &self.variables[v].members);
            let centres = members.map(|&(index, _)| self.perception.candidates[index].centres);
            let mut centres: Vec<[u32; 2]> = centres
                .map(|centres| {
                    let mut atoms = centres.map(|atom| self.source(atom));
                    atoms.sort_unstable();
                    atoms
                })
                .collect();
            centres.sort_unstable();
            centres
        });
        Some(of_element.collect())
    }

    /// Whether the record is a meso compound: achiral, with marked tetrahedral centres, in a set of
    /// stereoisomers that has chiral members. `None` where that is not worked out: where
    /// [`Canonical::dependences`] has no answer, and where none of 65,536 members of a larger set is
    /// chiral. A record that is open or has stereo groups is none.
    ///
    /// # Source
    /// IUPAC Basic Terminology of Stereochemistry, Pure Appl. Chem. 1996, 68, 2193: meso-compound.
    pub fn is_meso(&self) -> Option<bool> {
        let marked = |v: usize| self.claims.statuses[v] == Status::Marked;
        let mut centres = (0..self.variables.len()).filter(|&v| marked(v));
        let tetrahedral = |v| self.shape(&self.variables[v]) == Shape::Tetrahedral;
        if self.is_open() || !self.claims.groups.is_empty() || !centres.any(tetrahedral) {
            return Some(false);
        }
        let symmetries = self.symmetries()?;
        let moving: Vec<usize> = symmetries.variables().collect();
        let own = |v: usize| self.variables[v].odd.filter(|_| marked(v));
        let fixed = (0..self.variables.len()).filter(|v| marked(*v) && !moving.contains(v));
        if fixed.into_iter().any(|v| self.is_chiral(v)) || self.is_chiral_as(&symmetries, own) {
            return Some(false);
        }
        let listed = &moving[..moving.len().min(MOST_INVERTED)];
        let found = (1u32..1 << listed.len()).any(|inverted| {
            self.is_chiral_as(&symmetries, |v| {
                let at = listed.iter().position(|&other| other == v);
                let turned = at.is_some_and(|at| inverted >> at & 1 == 1);
                Some((self.variables[v].odd == Some(true)) ^ turned)
            })
        });
        (found || listed.len() == moving.len()).then_some(found)
    }

    /// Whether no automorphism takes an assignment of the variables to its mirror image.
    fn is_chiral_as(&self, symmetries: &Symmetries, value: impl Fn(usize) -> Option<bool>) -> bool {
        let mirrored = |v: usize| value(v).map(|odd| odd ^ self.is_chiral(v));
        symmetries.least(&value) != symmetries.least(mirrored)
    }

    fn symmetries(&self) -> Option<Symmetries> {
        if !self.perception.placed.is_empty() {
            return None;
        }
        Roles::of(&self.bare(), &self.perception, &self.variables).symmetries
    }
}

/// The variables that a variable depends on.
fn supports(symmetries: &Symmetries, variable: usize) -> BTreeSet<usize> {
    let mut changed: Vec<BTreeSet<usize>> = symmetries.inverting(variable).collect();
    changed.sort_unstable();
    changed.dedup();
    let is_least = |set: &&BTreeSet<usize>| {
        let smaller = |other: &BTreeSet<usize>| other != *set && other.is_subset(set);
        !changed.iter().any(smaller)
    };
    changed.iter().filter(is_least).flatten().copied().collect()
}
