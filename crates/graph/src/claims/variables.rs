//! The independent stereo elements: single candidates, and cages of bridgeheads.

use crate::stereo::Perception;

/// One independent element.
#[derive(Debug, Clone, PartialEq, Eq)]
pub(crate) struct Variable {
    /// Candidates and whether their parity is opposite to the variable's.
    pub(crate) members: Vec<(usize, bool)>,
    /// The mark.
    pub(crate) odd: Option<bool>,
    /// Its absence leaves nothing open.
    pub(crate) quiet: bool,
}

/// Groups candidates into variables.
pub(crate) fn variables(perception: &Perception) -> Vec<Variable> {
    let mut in_cage = vec![false; perception.candidates.len()];
    let mut found = Vec::new();
    let mut add = |members: Vec<(usize, bool)>| {
        let Some(&(first, opposite)) = members.first() else {
            return;
        };
        let candidate = &perception.candidates[first];
        found.push(Variable {
            odd: candidate.parity.map(|parity| parity.is_odd() != opposite),
            quiet: members
                .iter()
                .all(|&(index, _)| perception.candidates[index].quiet),
            members,
        });
    };
    for cage in &perception.cages {
        for &(index, _) in &cage.members {
            in_cage[index] = true;
        }
        add(cage.members.clone());
    }
    for index in (0..perception.candidates.len()).filter(|&index| !in_cage[index]) {
        add(vec![(index, false)]);
    }
    found
}
