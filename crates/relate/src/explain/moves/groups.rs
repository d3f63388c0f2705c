//! Functional groups that have become others.

use std::collections::{BTreeSet, HashMap};

use molkin_graph::Limits;

use crate::{Structure, functional_groups};

use super::{
    changes::{Change, Finding, GroupHere},
    frame::Frame,
};

/// The functional groups of both records, on the common numbering.
pub(super) struct Groups {
    sides: [Vec<Group>; 2],
}

struct Group {
    name: Option<&'static str>,
    atoms: Vec<u32>,
    sources: Vec<u32>,
}

impl Groups {
    /// Without groups where their order takes more steps than the limit.
    pub(super) fn of(frame: &Frame, structures: [&Structure; 2], limits: &Limits) -> Self {
        let sides = [0, 1].map(|side| {
            let atoms = 0..frame.graphs[side].size() as u32;
            let places: HashMap<u32, u32> =
                atoms.map(|atom| (frame.source(side, atom), atom)).collect();
            let found = functional_groups(structures[side], limits).unwrap_or_default();
            let groups = found.into_iter().map(|group| {
                let atoms = group.atoms.iter();
                let mut atoms: Vec<u32> =
                    atoms.filter_map(|atom| places.get(atom).copied()).collect();
                atoms.sort_unstable();
                Group {
                    name: group.name,
                    atoms,
                    sources: group.atoms,
                }
            });
            let mut groups: Vec<Group> = groups.collect();
            groups.sort_by(|one, other| one.atoms.cmp(&other.atoms));
            groups
        });
        Self { sides }
    }

    /// The name of the one group that holds both atoms, if it is the same in both records.
    pub(super) fn name_of_both(&self, atoms: [u32; 2]) -> Option<&'static str> {
        let [first, second] = [0, 1].map(|side: usize| {
            let mut groups = self.sides[side].iter();
            let group = groups.find(|group| atoms.iter().all(|atom| group.atoms.contains(atom)));
            group.and_then(|group| group.name)
        });
        first.filter(|_| first == second)
    }

    /// Sets of groups with atoms in common that have other names in the other record. Every group of a
    /// set has a name.
    pub(super) fn changed(&self) -> Vec<Finding> {
        let [first, second] = &self.sides;
        let mut seen = [vec![false; first.len()], vec![false; second.len()]];
        let mut found = Vec::new();
        for at in 0..first.len() {
            if !seen[0][at] {
                found.extend(self.tell(self.linked(at, &mut seen)));
            }
        }
        found
    }

    /// All groups that a group of the first record is linked to by atoms in common.
    fn linked(&self, start: usize, seen: &mut [Vec<bool>; 2]) -> [BTreeSet<usize>; 2] {
        let mut linked = [BTreeSet::new(), BTreeSet::new()];
        let mut open = vec![(0, start)];
        seen[0][start] = true;
        while let Some((side, at)) = open.pop() {
            linked[side].insert(at);
            let own = &self.sides[side][at].atoms;
            for (other, group) in self.sides[1 - side].iter().enumerate() {
                let meets = group.atoms.iter().any(|atom| own.contains(atom));
                if meets && !seen[1 - side][other] {
                    seen[1 - side][other] = true;
                    open.push((1 - side, other));
                }
            }
        }
        linked
    }

    fn tell(&self, linked: [BTreeSet<usize>; 2]) -> Option<Finding> {
        let mut sides = [Vec::new(), Vec::new()];
        for (side, members) in linked.iter().enumerate() {
            for &at in members {
                let group = &self.sides[side][at];
                sides[side].push(GroupHere {
                    name: group.name?,
                    atoms: group.sources.clone(),
                });
            }
        }
        let names = sides.each_ref().map(|groups| {
            let mut names: Vec<&str> = groups.iter().map(|group| group.name).collect();
            names.sort_unstable();
            names
        });
        // Nitrogens of an aromatic ring are named by what they are in it; that is no group for a sentence.
        let in_words = sides
            .iter()
            .flatten()
            .all(|group| !group.name.contains("-type"));
        let differs =
            in_words && names[0] != names[1] && names.iter().all(|names| !names.is_empty());
        differs.then(|| Finding::without_bonds(Change::Groups(sides)))
    }
}
