//! Ranking of ligands, sphere by sphere.
//!
//! The digraph is looked at from a centre, which may be the root or, for auxiliary descriptors, any
//! other node. Each sphere is an ordered partition of its nodes into ranks. What distinguishes nodes
//! of one sphere is carried inward at once: nodes of equal rank are then split by the ranks of their
//! branches, highest first. So a rank means what P-92.1.5 demands (the nearer sphere before the
//! farther one, the branch of higher rank before the lower one), and later rules only refine it.

use std::ops::Range;

use super::{
    budget::{Budget, Exhausted},
    digraph::{Digraph, NONE, Node},
};

/// A node as seen from the centre.
#[derive(Debug, Clone)]
pub(super) struct Entry {
    pub(super) node: u32,
    /// The node it is reached from.
    from: u32,
    /// The position of the ligand that it belongs to.
    pub(super) ligand: u32,
    /// One more than the number of entries of this sphere that rank lower.
    rank: u32,
    first_child: u32,
    child_count: u32,
}

/// The ligands of a centre and what has been explored of them.
#[derive(Debug, Clone)]
pub(super) struct Ranking {
    /// By sphere, from the ligands outward.
    entries: Vec<Entry>,
    /// Where each sphere begins.
    spheres: Vec<u32>,
    /// The entries of each sphere by rising rank, at the places of the sphere.
    order: Vec<u32>,
    scratch: Scratch,
}

#[derive(Debug, Clone, Default)]
struct Scratch {
    keys: Vec<u32>,
    sorted: Vec<(u32, u32, u32)>,
}

impl Ranking {
    /// Ranks the ligands, nodes next to `centre`, by atomic number as far as needed (Rule 1a).
    pub(super) fn new(
        digraph: &mut Digraph<'_>,
        centre: u32,
        ligands: impl Iterator<Item = u32>,
        budget: &mut Budget<'_>,
    ) -> Result<Self, Exhausted> {
        let entries: Vec<Entry> = (0u32..)
            .zip(ligands)
            .map(|(ligand, node)| Entry {
                node,
                from: centre,
                ligand,
                rank: 1,
                first_child: 0,
                child_count: 0,
            })
            .collect();
        let mut ranking = Self {
            order: (0..entries.len() as u32).collect(),
            entries,
            spheres: vec![0],
            scratch: Scratch::default(),
        };
        let by_number = |entry: &Entry, node: &Node| (entry.rank, u64::from(node.substance.number));
        ranking.sort_sphere(0, digraph, by_number);
        while ranking.is_tied() && ranking.grow(digraph, budget)? {
            let last = ranking.spheres.len() - 1;
            let by_number =
                |entry: &Entry, node: &Node| (entry.rank, u64::from(node.substance.number));
            ranking.sort_sphere(last, digraph, by_number);
            ranking.carry_inward(last, budget)?;
        }
        Ok(ranking)
    }

    /// The number of ligands.
    pub(super) fn ligand_count(&self) -> usize {
        self.sphere(0).len()
    }

    fn ligands(&self) -> Range<u32> {
        0..self.ligand_count() as u32
    }

    /// The rank of a ligand; higher comes first.
    pub(super) fn rank(&self, ligand: u32) -> u32 {
        self.entries[ligand as usize].rank
    }

    /// The node of a ligand.
    pub(super) fn ligand_node(&self, ligand: u32) -> u32 {
        self.entries[ligand as usize].node
    }

    /// Whether two ligands have equal rank.
    pub(super) fn is_tied(&self) -> bool {
        self.ligands().any(|ligand| self.is_ligand_tied(ligand))
    }

    /// The ligands of equal rank, highest first.
    pub(super) fn tied_ligands(&self) -> Vec<Vec<u32>> {
        let order: Vec<u32> = self.order[self.sphere(0)].iter().rev().copied().collect();
        let classes = order.chunk_by(|&a, &b| self.rank(a) == self.rank(b));
        classes
            .filter(|class| class.len() > 1)
            .map(<[u32]>::to_vec)
            .collect()
    }

    /// Whether another ligand has the same rank.
    fn is_ligand_tied(&self, ligand: u32) -> bool {
        let rank = self.rank(ligand);
        self.ligands()
            .any(|other| other != ligand && self.rank(other) == rank)
    }

    /// The nodes of ligands that are tied.
    pub(super) fn tied_nodes(&self) -> impl Iterator<Item = u32> + '_ {
        self.entries
            .iter()
            .filter(|entry| self.is_ligand_tied(entry.ligand))
            .map(|entry| entry.node)
    }

    /// Applies a rule: nodes of equal rank are told apart by a value, the nearest sphere first.
    pub(super) fn refine(
        &mut self,
        digraph: &Digraph<'_>,
        budget: &mut Budget<'_>,
        value: impl Fn(&Entry, &Node) -> u64,
    ) -> Result<(), Exhausted> {
        for sphere in 0..self.spheres.len() {
            if !self.is_tied() {
                break;
            }
            self.refine_sphere(sphere, digraph, budget, &value)?;
        }
        Ok(())
    }

    /// As [`Ranking::refine`], and does not stop where the ligands are told apart.
    pub(super) fn refine_throughout(
        &mut self,
        digraph: &Digraph<'_>,
        budget: &mut Budget<'_>,
        value: impl Fn(&Entry, &Node) -> u64,
    ) -> Result<(), Exhausted> {
        (0..self.spheres.len())
            .try_for_each(|sphere| self.refine_sphere(sphere, digraph, budget, &value))
    }

    fn refine_sphere(
        &mut self,
        sphere: usize,
        digraph: &Digraph<'_>,
        budget: &mut Budget<'_>,
        value: impl Fn(&Entry, &Node) -> u64,
    ) -> Result<(), Exhausted> {
        budget.spend(self.sphere(sphere).len())?;
        let by_value = |entry: &Entry, node: &Node| (entry.rank, value(entry, node));
        if self.sort_sphere(sphere, digraph, by_value) {
            self.carry_inward(sphere, budget)?;
        }
        Ok(())
    }

    /// Tells tied ligands apart by a key each.
    pub(super) fn split_ligands<K: Ord>(&mut self, keys: &[K]) {
        let mut order: Vec<u32> = self.order[self.sphere(0)].to_vec();
        order.sort_by(|&a, &b| {
            let own = |ligand: u32| (self.rank(ligand), &keys[ligand as usize]);
            own(a).cmp(&own(b))
        });
        let same =
            |a: u32, b: u32| self.rank(a) == self.rank(b) && keys[a as usize] == keys[b as usize];
        let mut ranks = Vec::with_capacity(order.len());
        for (at, &ligand) in order.iter().enumerate() {
            let tied = at > 0 && same(order[at - 1], ligand);
            ranks.push(if tied { ranks[at - 1] } else { at as u32 + 1 });
        }
        for (&ligand, rank) in order.iter().zip(ranks) {
            self.entries[ligand as usize].rank = rank;
        }
        let ligands = self.sphere(0);
        self.order[ligands].copy_from_slice(&order);
    }

    /// The nodes of a ligand sphere by sphere, each sphere in classes of equal rank, highest first.
    pub(super) fn levels(&self, ligand: u32) -> Vec<Vec<Vec<u32>>> {
        let mut levels = vec![vec![vec![ligand]]];
        loop {
            let mut next: Vec<Vec<u32>> = Vec::new();
            for class in levels.iter().next_back().into_iter().flatten() {
                let mut children: Vec<u32> = class
                    .iter()
                    .flat_map(|&entry| self.children(entry))
                    .collect();
                children.sort_by_key(|&child| std::cmp::Reverse(self.rank(child)));
                let classes = children.chunk_by(|&a, &b| self.rank(a) == self.rank(b));
                next.extend(classes.map(<[u32]>::to_vec));
            }
            if next.is_empty() {
                return levels;
            }
            levels.push(next);
        }
    }

    /// The node of an entry.
    pub(super) fn node_of(&self, entry: u32) -> u32 {
        self.entries[entry as usize].node
    }

    fn sphere(&self, sphere: usize) -> Range<usize> {
        let end = self
            .spheres
            .get(sphere + 1)
            .map_or(self.entries.len(), |&end| end as usize);
        self.spheres[sphere] as usize..end
    }

    fn children(&self, entry: u32) -> Range<u32> {
        let entry = &self.entries[entry as usize];
        entry.first_child..entry.first_child + entry.child_count
    }

    /// Adds a sphere below the tied ligands; `false` when there is nothing farther out.
    fn grow(
        &mut self,
        digraph: &mut Digraph<'_>,
        budget: &mut Budget<'_>,
    ) -> Result<bool, Exhausted> {
        let last = self.sphere(self.spheres.len() - 1);
        let start = self.entries.len();
        for index in last {
            let Entry {
                node,
                from,
                ligand,
                rank,
                ..
            } = self.entries[index];
            if !self.is_ligand_tied(ligand) {
                continue;
            }
            let first_child = self.entries.len() as u32;
            let parent = digraph.node(node).parent;
            let inward = (parent != NONE).then_some(parent);
            let outward = digraph.children(node, budget)?;
            for next in outward.chain(inward).filter(|&next| next != from) {
                self.entries.push(Entry {
                    node: next,
                    from: node,
                    ligand,
                    rank,
                    first_child: 0,
                    child_count: 0,
                });
            }
            let child_count = self.entries.len() as u32 - first_child;
            let entry = &mut self.entries[index];
            (entry.first_child, entry.child_count) = (first_child, child_count);
        }
        budget.spend(self.entries.len() - start)?;
        if self.entries.len() == start {
            return Ok(false);
        }
        self.order.extend(start as u32..self.entries.len() as u32);
        self.spheres.push(start as u32);
        Ok(true)
    }

    /// Ranks the entries of a sphere by a key whose first part is their rank so far (for a new sphere,
    /// that of the entry they are reached from). Whether any two were told apart.
    fn sort_sphere(
        &mut self,
        sphere: usize,
        digraph: &Digraph<'_>,
        key: impl Fn(&Entry, &Node) -> (u32, u64),
    ) -> bool {
        let places = self.sphere(sphere);
        let Self { entries, order, .. } = self;
        let order = &mut order[places];
        let key = |entry: u32| {
            let entry = &entries[entry as usize];
            key(entry, digraph.node(entry.node))
        };
        order.sort_by_key(|&entry| key(entry));
        let mut ranks: Vec<u32> = Vec::with_capacity(order.len());
        let mut changed = false;
        for (at, &entry) in order.iter().enumerate() {
            let tied = at > 0 && key(order[at - 1]) == key(entry);
            let rank = if tied { ranks[at - 1] } else { at as u32 + 1 };
            changed |= rank != entries[entry as usize].rank;
            ranks.push(rank);
        }
        for (&entry, rank) in order.iter().zip(ranks) {
            entries[entry as usize].rank = rank;
        }
        changed
    }

    /// Splits ranks by the ranks of the branches, from the sphere inside the given one to the ligands.
    fn carry_inward(&mut self, sphere: usize, budget: &mut Budget<'_>) -> Result<(), Exhausted> {
        for inner in (0..sphere).rev() {
            budget.spend(self.sphere(inner).len())?;
            if !self.split_by_branches(inner) {
                break;
            }
        }
        Ok(())
    }

    fn split_by_branches(&mut self, sphere: usize) -> bool {
        let places = self.sphere(sphere);
        let mut changed = false;
        let mut start = places.start;
        while start < places.end {
            let rank = self.entries[self.order[start] as usize].rank;
            let class = self.order[start..places.end].iter();
            let end = start
                + class
                    .take_while(|&&entry| self.entries[entry as usize].rank == rank)
                    .count();
            if end - start > 1 {
                changed |= self.split_class(start..end);
            }
            start = end;
        }
        changed
    }

    fn split_class(&mut self, class: Range<usize>) -> bool {
        let mut scratch = std::mem::take(&mut self.scratch);
        let Scratch { keys, sorted } = &mut scratch;
        keys.clear();
        sorted.clear();
        for &entry in &self.order[class.clone()] {
            let start = keys.len();
            keys.extend(self.children(entry).map(|child| self.rank(child)));
            keys[start..].sort_unstable_by(|a, b| b.cmp(a));
            sorted.push((entry, start as u32, keys.len() as u32));
        }
        let key = |&(_, start, end): &(u32, u32, u32)| &keys[start as usize..end as usize];
        sorted.sort_by(|a, b| key(a).cmp(key(b)));
        let base = self.entries[sorted[0].0 as usize].rank;
        let mut rank = base;
        let mut changed = false;
        for (at, own) in sorted.iter().enumerate() {
            if at > 0 && key(&sorted[at - 1]) != key(own) {
                rank = base + at as u32;
                changed = true;
            }
            self.order[class.start + at] = own.0;
            self.entries[own.0 as usize].rank = rank;
        }
        self.scratch = scratch;
        changed
    }
}
