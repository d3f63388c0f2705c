//! How automorphisms of the constitution act on stereo elements.

use crate::{
    order::Permutation,
    stereo::{Candidate, Perception, slot},
};

use super::Variable;

/// What one automorphism does to one variable: its image, and whether the parity is inverted.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(super) struct Move {
    pub(super) from: usize,
    pub(super) to: usize,
    pub(super) inverts: bool,
}

/// The action of a list of automorphisms; per automorphism only what it moves or inverts.
#[derive(Debug, Default, Clone)]
pub(super) struct Action {
    pub(super) moves: Vec<Vec<Move>>,
}

/// For each candidate its variable, and whether it is opposite there.
pub(super) fn membership(candidates: usize, variables: &[Variable]) -> Vec<(usize, bool)> {
    let mut table = vec![(usize::MAX, false); candidates];
    for (index, variable) in variables.iter().enumerate() {
        for &(candidate, opposite) in &variable.members {
            table[candidate] = (index, opposite);
        }
    }
    table
}

impl Action {
    /// Works out the action of automorphisms of the skeleton.
    pub(super) fn of(
        generators: &[Permutation],
        perception: &Perception,
        variables: &[Variable],
    ) -> Self {
        let member = membership(perception.candidates.len(), variables);
        let near = Near::of(perception, &member);
        let moves = generators.iter().map(|generator| {
            // Only variables with an atom that moves can be moved or inverted.
            let mut touched: Vec<usize> = generator
                .moved()
                .iter()
                .flat_map(|&(atom, _)| near.at(atom))
                .collect();
            touched.sort_unstable();
            touched.dedup();
            touched
                .into_iter()
                .filter_map(|from| moved(generator, perception, variables, &member, from))
                .collect()
        });
        Self {
            moves: moves.collect(),
        }
    }

    /// Variables that some automorphism moves or inverts.
    pub(super) fn touched(&self, variables: usize) -> Vec<bool> {
        let mut touched = vec![false; variables];
        for entry in self.moves.iter().flatten() {
            touched[entry.from] = true;
        }
        touched
    }

    /// Variables that some automorphism inverts while it leaves all others as they are: they are
    /// not stereogenic in any record. Removing one may uncover the next.
    pub(super) fn never_stereogenic(&self, variables: usize) -> Vec<bool> {
        let mut never = vec![false; variables];
        loop {
            let mut changed = false;
            for moves in &self.moves {
                let mut real = moves.iter().filter(|m| !never[m.from]);
                if let (Some(only), None) = (real.next(), real.next())
                    && only.from == only.to
                {
                    never[only.from] = true;
                    changed = true;
                }
            }
            if !changed {
                return never;
            }
        }
    }
}

/// Variables by the atoms that are centres or ligands of their first candidates.
struct Near {
    entries: Vec<(u32, usize)>,
}

impl Near {
    fn of(perception: &Perception, member: &[(usize, bool)]) -> Self {
        let mut entries = Vec::new();
        for (candidate, &(variable, _)) in perception.candidates.iter().zip(member) {
            let atoms = candidate.centres.iter().chain(&candidate.ligands);
            let atoms = atoms.filter(|&&atom| atom < slot::HYDROGEN);
            entries.extend(atoms.map(|&atom| (atom, variable)));
        }
        entries.sort_unstable();
        entries.dedup();
        Self { entries }
    }

    fn at(&self, atom: u32) -> impl Iterator<Item = usize> + '_ {
        let from = self.entries.partition_point(|&(other, _)| other < atom);
        let own = self.entries[from..]
            .iter()
            .take_while(move |&&(other, _)| other == atom);
        own.map(|&(_, variable)| variable)
    }
}

/// What an automorphism does to a variable, if anything.
fn moved(
    generator: &Permutation,
    perception: &Perception,
    variables: &[Variable],
    member: &[(usize, bool)],
    from: usize,
) -> Option<Move> {
    let image = |vertex: u32| generator.image(vertex);
    let &(index, opposite) = variables[from].members.first()?;
    let candidate = &perception.candidates[index];
    let target = perception.candidate_at(candidate.centres.map(image))?;
    let inverts = inverts(candidate, &perception.candidates[target], image);
    let (to, target_opposite) = member[target];
    let inverts = inverts ^ opposite ^ target_opposite;
    (to != from || inverts).then_some(Move { from, to, inverts })
}

/// Whether the images of a candidate's ligands are an odd permutation of the target's.
fn inverts(candidate: &Candidate, target: &Candidate, image: impl Fn(u32) -> u32) -> bool {
    let mut ligands = candidate
        .ligands
        .map(|l| if l < slot::HYDROGEN { image(l) } else { l });
    let one_centre = candidate.centres[0] == candidate.centres[1];
    if !one_centre && image(candidate.centres[0]) != target.centres[0] {
        ligands = [ligands[2], ligands[3], ligands[0], ligands[1]];
    }
    let mut order = [0usize; 4];
    for (at, (place, ligand)) in order.iter_mut().zip(ligands).enumerate() {
        // Both ends of a double bond may have a hydrogen; look within the end.
        let range = if one_centre {
            0..4
        } else {
            at / 2 * 2..at / 2 * 2 + 2
        };
        *place = range
            .clone()
            .find(|&i| target.ligands[i] == ligand)
            .unwrap_or(at);
    }
    let mut odd = false;
    for i in 0..4 {
        for j in i + 1..4 {
            odd ^= order[i] > order[j];
        }
    }
    odd
}
