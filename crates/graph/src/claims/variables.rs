//! The independent stereo elements: single candidates, and cages of bridgeheads.

use std::{ops::Deref, slice};

use crate::stereo::Perception;

/// One independent element.
#[derive(Debug, Clone, PartialEq, Eq)]
pub(crate) struct Variable {
    /// Candidates and whether their parity is opposite to the variable's.
    pub(crate) members: Members,
    /// The mark.
    pub(crate) odd: Option<bool>,
    /// Its absence leaves nothing open.
    pub(crate) quiet: bool,
}

/// The candidates of a variable: nearly always one, which takes no memory of its own.
#[derive(Debug, Clone, PartialEq, Eq)]
pub(crate) enum Members {
    One([(usize, bool); 1]),
    Cage(Vec<(usize, bool)>),
}

impl Deref for Members {
    type Target = [(usize, bool)];

    fn deref(&self) -> &Self::Target {
        match self {
            Self::One(only) => only,
            Self::Cage(all) => all,
        }
    }
}

impl<'a> IntoIterator for &'a Members {
    type Item = &'a (usize, bool);
    type IntoIter = slice::Iter<'a, (usize, bool)>;

    fn into_iter(self) -> Self::IntoIter {
        self.iter()
    }
}

impl Variable {
    fn of(members: Members, perception: &Perception) -> Option<Self> {
        let candidates = &perception.candidates;
        let &(first, opposite) = members.first()?;
        let parity = candidates[first].parity;
        Some(Self {
            odd: parity.map(|parity| parity.is_odd() != opposite),
            quiet: members.iter().all(|&(index, _)| candidates[index].quiet),
            members,
        })
    }
}

/// Groups candidates into variables.
pub(crate) fn list_variables(perception: &Perception, variables: &mut Vec<Variable>) {
    variables.clear();
    let cages = perception.cages.iter();
    let mut caged: Vec<usize> = Vec::new();
    for cage in cages {
        caged.extend(cage.members.iter().map(|&(index, _)| index));
        variables.extend(Variable::of(
            Members::Cage(cage.members.clone()),
            perception,
        ));
    }
    caged.sort_unstable();
    let single = (0..perception.candidates.len()).filter(|at| caged.binary_search(at).is_err());
    variables.extend(
        single.filter_map(|index| Variable::of(Members::One([(index, false)]), perception)),
    );
}
