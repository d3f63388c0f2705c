//! Marks that a revision of the molecule has erased: they count although the place cannot be stereogenic
//! any more.

use crate::{DrawnStereo, order::Generators, skeleton::Skeleton};

use super::{
    Candidate, Perception, ascending,
    marks::{self, Mark},
    slot,
};

impl Perception {
    /// Puts remembered marks where they were drawn, and makes room for such marks at all places that
    /// automorphisms of the constitution relate to these, so that the places are closed under symmetry
    /// as all others are. Their absence leaves nothing open.
    ///
    /// A candidate that the molecule has at such a place takes the mark if it bears none.
    pub(crate) fn remember(
        &mut self,
        skeleton: &Skeleton,
        generators: &Generators,
        remembered: &[DrawnStereo],
    ) {
        if remembered.is_empty() {
            return;
        }
        let mut found = Vec::new();
        marks::on_skeleton(&mut found, skeleton, remembered);
        let own = self.candidates.len();
        for mark in &found {
            self.remember_one(skeleton, mark);
        }
        let mut at = own;
        while let Some(&known) = self.candidates.get(at) {
            at += 1;
            for generator in generators.iter() {
                let image = |atom: u32| generator.image(atom);
                let centres = known.centres.map(image);
                if self.candidate_at(centres).is_none() {
                    let ligands = known.ligands.map(|l| if is_atom(l) { image(l) } else { l });
                    self.add(Candidate {
                        centres,
                        ligands,
                        parity: None,
                        ..known
                    });
                }
            }
        }
    }

    fn remember_one(&mut self, skeleton: &Skeleton, mark: &Mark) {
        if let Some(index) = self.candidate_at(mark.centres) {
            let candidate = &mut self.candidates[index];
            if candidate.parity.is_none() {
                candidate.parity = marks::parity_on(candidate, mark);
            }
            return;
        }
        // What is no atom may have changed: a hydrogen for a lone pair, or for nothing at all.
        let ligands = mark.ligands.map(|l| match l {
            slot::LONE_PAIR => slot::HYDROGEN,
            other => other,
        });
        let atoms = skeleton.len() as u32;
        let inside = |l: u32| !is_atom(l) || l < atoms;
        let ends = if mark.centres[0] == mark.centres[1] {
            4
        } else {
            2
        };
        let differ = ligands.chunks(ends).all(|end| {
            let mut later = end.iter().enumerate();
            later.all(|(at, ligand)| !end[..at].contains(ligand))
        });
        if differ && mark.centres.iter().all(|&c| c < atoms) && ligands.into_iter().all(inside) {
            self.add(Candidate {
                shape: mark.shape,
                centres: mark.centres,
                ligands,
                parity: mark.parity,
                quiet: true,
                remembered: true,
            });
        }
    }

    /// Adds a candidate whose place is free.
    fn add(&mut self, candidate: Candidate) {
        let place = ascending(candidate.centres);
        let at = self.places.partition_point(|known| known.0 < place);
        self.places.insert(at, (place, self.candidates.len()));
        self.candidates.push(candidate);
    }
}

fn is_atom(ligand: u32) -> bool {
    ligand < slot::HYDROGEN
}
