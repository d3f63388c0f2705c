//! The stereo elements of a record as callers see them, on the atoms of the molecule.

use crate::{
    Canonical, DrawnCoordination, GroupKind, Ligand, Parity, Shape, Undrawable,
    claims::{Status, Variable},
    stereo::{Candidate, slot},
};

pub use crate::stereo::Dropped;

/// What a record says at a stereo element.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub enum Mark {
    /// The arrangement is given.
    Given(Parity),
    /// No arrangement is given, or "either" is.
    Absent,
}

/// A stereogenic place of a molecule.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct StereoElement {
    /// Its geometry.
    pub shape: Shape,
    /// The centre twice, or the two ends; atoms of the molecule, from 0.
    pub centres: [u32; 2],
    /// Its ligands in the order that the parity refers to. Hydrogens are `Ligand::Hydrogen` whether
    /// or not the record writes them as atoms.
    pub ligands: [Ligand; 4],
    /// The mark. Bridgeheads that another bridgehead determines carry the mark implied by it.
    pub mark: Mark,
    /// The absence of a mark leaves nothing open here (nitrogen in a three-membered ring, a mobile
    /// bond).
    pub quiet: bool,
    /// Elements with the same number are bridgeheads that determine each other.
    pub variable: usize,
    /// The stereo group that its mark belongs to, if that makes a difference: its kind, and a number
    /// that elements of one group share.
    pub group: Option<(GroupKind, usize)>,
}

/// What is to be said about a record beside its stereo elements. Atoms count from 0.
#[derive(Debug, Clone, PartialEq, Eq)]
#[non_exhaustive]
pub enum Remark {
    /// A mark counts for nothing.
    MarkDropped {
        /// Why.
        reason: Dropped,
        /// The centre, or both ends.
        atoms: Vec<u32>,
    },
    /// A mark says nothing, since symmetry makes both arrangements one or the rest leaves them open.
    MarkIdle {
        /// The centre, or both ends.
        atoms: Vec<u32>,
    },
    /// Bridgeheads are marked in a way that no cage of this size can have; the marks count as drawn.
    ImpossibleCage {
        /// The bridgeheads.
        atoms: Vec<u32>,
    },
    /// Of the mobile double bonds, whose geometry counts only where it is marked, some are marked
    /// and these are not.
    PartlyMarkedMobileBonds {
        /// The ends of the unmarked bonds.
        atoms: Vec<u32>,
    },
    /// A ring of 4n mobile bonds: its two bond-shift forms count as one structure.
    BondShiftRing {
        /// The ring's atoms.
        atoms: Vec<u32>,
    },
    /// Something that the record's notation leaves out although it may matter.
    NotDrawn(Undrawable),
}

impl Canonical {
    /// The stereo elements: those that are marked to effect, and the unmarked ones that are
    /// stereogenic.
    pub fn stereo_elements(&self) -> Vec<StereoElement> {
        self.elements(|number, variable| match self.claims.statuses[number] {
            Status::NotStereogenic => None,
            Status::Marked => Some(variable.odd),
            Status::Unmarked => Some(None),
        })
    }

    /// Bridgeheads that determine each other, with marks that say nothing about the compound: both
    /// arrangements are one, as in norbornene, or the rest of the record leaves them open. Their marks
    /// say which of two like places is which in this drawing, and that is what their labels tell.
    pub fn idle_bridgeheads(&self) -> Vec<StereoElement> {
        self.elements(|number, variable| {
            let idle = self.claims.statuses[number] != Status::Marked && variable.members.len() > 1;
            (idle && variable.odd.is_some()).then_some(variable.odd)
        })
    }

    /// The elements of the variables for which there is a word on whether, and how, they are marked.
    fn elements(
        &self,
        given: impl Fn(usize, &Variable) -> Option<Option<bool>>,
    ) -> Vec<StereoElement> {
        let mut found = Vec::new();
        for (number, variable) in self.variables.iter().enumerate() {
            let Some(given) = given(number, variable) else {
                continue;
            };
            for &(index, opposite) in &variable.members {
                let candidate = &self.perception.candidates[index];
                if candidate.remembered {
                    continue;
                }
                let ligands = self.ligands(candidate);
                let mark = given.map_or(Mark::Absent, |odd| {
                    Mark::Given(Parity::from_odd(odd ^ opposite))
                });
                found.push(StereoElement {
                    shape: candidate.shape,
                    centres: candidate.centres.map(|atom| self.source(atom)),
                    ligands,
                    mark,
                    quiet: candidate.quiet,
                    variable: number,
                    group: self.group_of(number),
                });
            }
        }
        found.sort_by_key(|element| element.centres);
        found
    }

    /// The stereo group of a variable, with its place among the groups.
    pub(super) fn group_of(&self, variable: usize) -> Option<(GroupKind, usize)> {
        let mut groups = self.claims.groups.iter().zip(0..);
        let (group, number) = groups.find(|(group, _)| group.variables.contains(&variable))?;
        Some((group.freedom.group(), number))
    }

    /// The arrangements about centres that are not tetrahedral, as far as they make a difference, on
    /// the atoms of the molecule.
    pub fn coordination_elements(&self) -> Vec<DrawnCoordination> {
        let placed = self.perception.placed.iter();
        placed
            .map(|placed| DrawnCoordination {
                polyhedron: placed.polyhedron,
                centre: self.source(placed.centre),
                ligands: placed
                    .ligands
                    .iter()
                    .map(|&ligand| self.molecule_ligand(ligand, placed.centre))
                    .collect(),
            })
            .collect()
    }

    /// What else is to be said about the stereo of the record.
    pub fn remarks(&self) -> Vec<Remark> {
        let perception = &self.perception;
        let mut notes = Vec::new();
        for &(reason, centres) in &perception.dropped {
            notes.push(Remark::MarkDropped {
                reason,
                atoms: self.sources(centres),
            });
        }
        for (number, variable) in self.variables.iter().enumerate() {
            // A drawing gives every double bond a geometry, so one that cannot have any is no news.
            let drawn_only = self.claims.statuses[number] == Status::NotStereogenic
                && self.shape(variable) == Shape::DoubleBond;
            let own = !drawn_only && !self.is_remembered(variable);
            if self.claims.free[number] && variable.odd.is_some() && own {
                for &(index, _) in &variable.members {
                    let centres = perception.candidates[index].centres;
                    notes.push(Remark::MarkIdle {
                        atoms: self.sources(centres),
                    });
                }
            }
        }
        for cage in &perception.impossible {
            let atoms = cage.iter().map(|&atom| self.source(atom)).collect();
            notes.push(Remark::ImpossibleCage { atoms });
        }
        notes.extend(self.partly_marked());
        for ring in self.mesomer.bond_shift_rings(&self.skeleton) {
            let atoms = ring.iter().map(|&atom| self.source(atom)).collect();
            notes.push(Remark::BondShiftRing { atoms });
        }
        for place in &perception.undrawable {
            notes.push(Remark::NotDrawn(match *place {
                Undrawable::HinderedAxis { atoms } => Undrawable::HinderedAxis {
                    atoms: atoms.map(|atom| self.source(atom)),
                },
                Undrawable::MetalCentre { atom } => Undrawable::MetalCentre {
                    atom: self.source(atom),
                },
            }));
        }
        notes
    }

    fn partly_marked(&self) -> Option<Remark> {
        let mobile =
            |v: &&Variable| v.quiet && !self.is_remembered(v) && self.shape(v) == Shape::DoubleBond;
        let (marked, unmarked): (Vec<&Variable>, Vec<&Variable>) = self
            .variables
            .iter()
            .filter(mobile)
            .partition(|v| v.odd.is_some());
        if marked.is_empty() || unmarked.is_empty() {
            return None;
        }
        let mut atoms: Vec<u32> = unmarked
            .iter()
            .flat_map(|v| &v.members)
            .flat_map(|&(index, _)| self.sources(self.perception.candidates[index].centres))
            .collect();
        atoms.sort_unstable();
        atoms.dedup();
        Some(Remark::PartlyMarkedMobileBonds { atoms })
    }

    /// Whether a variable is a mark that was erased.
    fn is_remembered(&self, variable: &Variable) -> bool {
        let mut members = variable.members.iter();
        members.any(|&(index, _)| self.perception.candidates[index].remembered)
    }

    pub(super) fn shape(&self, variable: &Variable) -> Shape {
        let first = variable.members.first();
        first.map_or(Shape::Tetrahedral, |&(index, _)| {
            self.perception.candidates[index].shape
        })
    }

    /// Ligands on the atoms of the molecule. A labelled hydrogen is named by its atom, so that it
    /// can be told from others.
    fn ligands(&self, candidate: &Candidate) -> [Ligand; 4] {
        let mut at = 0;
        candidate.ligands.map(|ligand| {
            let centre = candidate.centres[at / 2];
            at += 1;
            self.molecule_ligand(ligand, centre)
        })
    }

    fn molecule_ligand(&self, ligand: u32, centre: u32) -> Ligand {
        match ligand {
            slot::LONE_PAIR => Ligand::LonePair,
            slot::HYDROGEN => Ligand::Hydrogen,
            l if l > slot::HYDROGEN => {
                let mass = (l - slot::HYDROGEN) as u8;
                let own = (0u32..).zip(&self.skeleton.folded).find(|&(atom, folded)| {
                    *folded == Some(mass) && self.skeleton.home[atom as usize] == centre
                });
                own.map_or(Ligand::Hydrogen, |(atom, _)| Ligand::Atom(atom))
            }
            atom => Ligand::Atom(self.source(atom)),
        }
    }

    pub(super) fn source(&self, atom: u32) -> u32 {
        self.skeleton.atoms[atom as usize].source
    }

    fn sources(&self, [a, b]: [u32; 2]) -> Vec<u32> {
        let mut atoms = vec![self.source(a), self.source(b)];
        atoms.sort_unstable();
        atoms.dedup();
        atoms
    }
}
