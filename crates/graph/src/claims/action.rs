//! How automorphisms of the constitution act on stereo elements.

use crate::{
    order::{Generators, Permutation},
    rows::Rows,
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
#[derive(Debug, Default)]
pub(super) struct Action {
    pub(super) moves: Rows<Move>,
    near: Near,
    touched: Vec<usize>,
}

/// For each candidate its variable, and whether it is opposite there.
pub(super) fn membership(candidates: usize, variables: &[Variable]) -> Vec<(usize, bool)> {
    let mut table = Vec::new();
    list_membership(candidates, variables, &mut table);
    table
}

fn list_membership(candidates: usize, variables: &[Variable], table: &mut Vec<(usize, bool)>) {
    table.clear();
    table.resize(candidates, (usize::MAX, false));
    for (index, variable) in variables.iter().enumerate() {
        for &(candidate, opposite) in &variable.members {
            table[candidate] = (index, opposite);
        }
    }
}

impl Action {
    /// Works out the action of automorphisms of the skeleton.
    pub(super) fn of(
        generators: &Generators,
        perception: &Perception,
        variables: &[Variable],
    ) -> Self {
        let mut action = Self::default();
        action.load(generators, perception, variables);
        action
    }

    /// As [`Action::of`], in the memory at hand.
    pub(super) fn load(
        &mut self,
        generators: &Generators,
        perception: &Perception,
        variables: &[Variable],
    ) {
        let Self {
            moves,
            near,
            touched,
        } = self;
        moves.clear();
        if generators.is_empty() || variables.is_empty() {
            return;
        }
        near.load(perception, variables);
        for generator in generators.iter() {
            // Only variables with an atom that moves can be moved or inverted.
            let atoms = generator.moved().iter();
            touched.clear();
            touched.extend(atoms.flat_map(|&(atom, _)| near.at(atom)));
            touched.sort_unstable();
            touched.dedup();
            let touched = touched.iter();
            moves.push(
                touched.filter_map(|&from| {
                    moved(generator, perception, variables, &near.member, from)
                }),
            );
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
        let mut never = Vec::new();
        self.list_never_stereogenic(variables, &mut never);
        never
    }

    /// As [`Action::never_stereogenic`], in the memory at hand.
    pub(super) fn list_never_stereogenic(&self, variables: usize, never: &mut Vec<bool>) {
        never.clear();
        never.resize(variables, false);
        loop {
            let mut changed = false;
            for moves in self.moves.iter() {
                let mut real = moves.iter().filter(|m| !never[m.from]);
                if let (Some(only), None) = (real.next(), real.next())
                    && only.from == only.to
                {
                    never[only.from] = true;
                    changed = true;
                }
            }
            if !changed {
                return;
            }
        }
    }
}

/// The end of a chain.
const NONE: u32 = u32::MAX;

/// Variables by the atoms that are centres or ligands of their candidates.
#[derive(Debug, Default)]
struct Near {
    /// Per candidate: its variable, and whether it is opposite there.
    member: Vec<(usize, bool)>,
    /// Per atom: the first of its entries.
    first: Vec<u32>,
    /// A variable, and the next entry of the same atom.
    entries: Vec<(usize, u32)>,
}

impl Near {
    fn load(&mut self, perception: &Perception, variables: &[Variable]) {
        list_membership(perception.candidates.len(), variables, &mut self.member);
        self.first.clear();
        self.entries.clear();
        for (candidate, &(variable, _)) in perception.candidates.iter().zip(&self.member) {
            let atoms = candidate.centres.iter().chain(&candidate.ligands);
            for &atom in atoms.filter(|&&atom| atom < slot::HYDROGEN) {
                if self.first.len() <= atom as usize {
                    self.first.resize(atom as usize + 1, NONE);
                }
                let first = &mut self.first[atom as usize];
                let next = std::mem::replace(first, self.entries.len() as u32);
                self.entries.push((variable, next));
            }
        }
    }

    /// The variables at an atom, some more than once.
    fn at(&self, atom: u32) -> impl Iterator<Item = usize> + '_ {
        let mut next = self.first.get(atom as usize).copied().unwrap_or(NONE);
        std::iter::from_fn(move || {
            let &(variable, following) = self.entries.get(next as usize)?;
            next = following;
            Some(variable)
        })
    }
}

/// What an automorphism does to a variable, if anything.
fn moved(
    generator: Permutation<'_>,
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
