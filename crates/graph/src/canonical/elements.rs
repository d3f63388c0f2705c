//! The stereo elements of a record as callers see them, on the atoms of the molecule.

use crate::{Canonical, Ligand, Parity, Shape, Undrawable, claims::Status, stereo::slot};

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
}

/// What is to be said about the stereo of a record beside its elements. Atoms count from 0.
#[derive(Debug, Clone, PartialEq, Eq)]
#[non_exhaustive]
pub enum StereoNote {
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
    /// Something that the record's notation leaves out although it may matter.
    NotDrawn(Undrawable),
}

impl Canonical {
    /// The stereo elements: those that are marked to effect, and the unmarked ones that are
    /// stereogenic.
    pub fn stereo_elements(&self) -> Vec<StereoElement> {
        let mut found = Vec::new();
        for (number, variable) in self.variables.iter().enumerate() {
            let given = match self.claims.statuses[number] {
                Status::NotStereogenic => continue,
                Status::Marked => variable.odd,
                Status::Unmarked => None,
            };
            for &(index, opposite) in &variable.members {
                let candidate = &self.perception.candidates[index];
                let ligands = candidate.ligands.map(|ligand| match ligand {
                    slot::LONE_PAIR => Ligand::LonePair,
                    l if l >= slot::HYDROGEN => Ligand::Hydrogen,
                    atom => Ligand::Atom(self.source(atom)),
                });
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
                });
            }
        }
        found.sort_by_key(|element| element.centres);
        found
    }

    /// What else is to be said about the stereo of the record.
    pub fn stereo_notes(&self) -> Vec<StereoNote> {
        let perception = &self.perception;
        let mut notes = Vec::new();
        for &(reason, centres) in &perception.dropped {
            notes.push(StereoNote::MarkDropped {
                reason,
                atoms: self.sources(centres),
            });
        }
        for (number, variable) in self.variables.iter().enumerate() {
            if self.claims.free[number] && variable.odd.is_some() {
                for &(index, _) in &variable.members {
                    let centres = perception.candidates[index].centres;
                    notes.push(StereoNote::MarkIdle {
                        atoms: self.sources(centres),
                    });
                }
            }
        }
        for cage in &perception.impossible {
            let atoms = cage.iter().map(|&atom| self.source(atom)).collect();
            notes.push(StereoNote::ImpossibleCage { atoms });
        }
        for place in &perception.undrawable {
            notes.push(StereoNote::NotDrawn(match *place {
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

    fn source(&self, atom: u32) -> u32 {
        self.skeleton.atoms[atom as usize].source
    }

    fn sources(&self, [a, b]: [u32; 2]) -> Vec<u32> {
        let mut atoms = vec![self.source(a), self.source(b)];
        atoms.sort_unstable();
        atoms.dedup();
        atoms
    }
}
