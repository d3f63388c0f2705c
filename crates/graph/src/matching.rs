//! Maximum matching in a general graph: augmenting paths with blossoms.
//!
//! Edmonds, Can. J. Math. 1965, 17, 449. A search from one exposed vertex costs O(vertices × edges)
//! at worst and is close to linear on molecules.

use std::{collections::VecDeque, ops::Range};

/// No vertex: the mate of an exposed vertex.
pub(crate) const NONE: u32 = u32::MAX;

/// A graph with a matching that grows by augmenting paths. All vectors are scratch that is reused.
///
/// A search touches and resets only what it reaches, so that many local questions on a large graph
/// cost what they look at.
#[derive(Debug, Default, Clone)]
pub(crate) struct Matching {
    /// Edges that were added; [`Matching::connect`] sorts them into the lists of neighbours.
    edges: Vec<(u32, u32)>,
    /// Per vertex: where its neighbours begin and end in `arcs`.
    lists: Vec<(u32, u32)>,
    arcs: Vec<u32>,
    vertices: usize,
    mate: Vec<u32>,
    /// Changes of mates since the last reset: vertex and mate before.
    journal: Vec<(u32, u32)>,
    removed: Vec<bool>,
    group: Vec<u32>,
    blocked: Option<(u32, u32)>,
    /// Vertices that need no partner: a search may end by exposing one.
    optional: Vec<bool>,
    parent: Vec<u32>,
    base: Vec<u32>,
    outer: Vec<bool>,
    touched: Vec<u32>,
    /// Stamps of the last path and blossom that a vertex was on.
    on_path: Vec<u32>,
    in_blossom: Vec<u32>,
    stamp: u32,
    queue: VecDeque<u32>,
    /// Edges looked at since the caller last set it to zero.
    pub(crate) work: u64,
    /// Searches give up once `work` has passed this; the caller then has to discard what they say.
    pub(crate) budget: u64,
}

impl Matching {
    /// Whether work went beyond the budget, so that answers since then mean nothing.
    pub(crate) fn is_exhausted(&self) -> bool {
        self.work > self.budget
    }

    /// Empties the graph and gives it `vertices` isolated vertices.
    pub(crate) fn reset(&mut self, vertices: usize) {
        self.edges.clear();
        self.arcs.clear();
        fill(&mut self.lists, vertices, (0, 0));
        self.vertices = vertices;
        fill(&mut self.mate, vertices, NONE);
        fill(&mut self.removed, vertices, false);
        fill(&mut self.optional, vertices, false);
        fill(&mut self.parent, vertices, NONE);
        fill(&mut self.outer, vertices, false);
        fill(&mut self.on_path, vertices, 0);
        fill(&mut self.in_blossom, vertices, 0);
        self.stamp = 0;
        self.journal.clear();
        self.touched.clear();
        for identity in [&mut self.group, &mut self.base] {
            identity.clear();
            identity.extend(0..vertices as u32);
        }
        self.blocked = None;
        self.work += vertices as u64;
    }

    /// Says that a vertex need not be covered.
    pub(crate) fn set_optional(&mut self, vertex: u32) {
        self.optional[vertex as usize] = true;
    }

    /// Puts a vertex into a group, for [`Matching::block`].
    pub(crate) fn set_group(&mut self, vertex: u32, group: u32) {
        self.group[vertex as usize] = group;
    }

    /// The group of a vertex.
    pub(crate) fn group(&self, vertex: u32) -> u32 {
        self.group[vertex as usize]
    }

    /// Hides all edges between two groups from searches, or shows them again.
    pub(crate) fn block(&mut self, groups: Option<(u32, u32)>) {
        self.blocked = groups;
    }

    fn is_blocked(&self, a: u32, b: u32) -> bool {
        self.blocked.is_some_and(|(x, y)| {
            let (p, q) = (self.group[a as usize], self.group[b as usize]);
            (p, q) == (x, y) || (p, q) == (y, x)
        })
    }

    /// Adds an edge. The caller adds each edge once, and connects them when all are there.
    pub(crate) fn add_edge(&mut self, a: u32, b: u32) {
        self.edges.push((a, b));
    }

    /// Makes the edges added since the last reset part of the graph.
    pub(crate) fn connect(&mut self) {
        self.work += self.edges.len() as u64;
        self.lists.fill((0, 0));
        for &(a, b) in &self.edges {
            self.lists[a as usize].1 += 1;
            self.lists[b as usize].1 += 1;
        }
        let mut sum = 0;
        for list in &mut self.lists {
            let count = list.1;
            *list = (sum, sum);
            sum += count;
        }
        fill(&mut self.arcs, sum as usize, NONE);
        for &(a, b) in &self.edges {
            for (from, to) in [(a, b), (b, a)] {
                let end = &mut self.lists[from as usize].1;
                self.arcs[*end as usize] = to;
                *end += 1;
            }
        }
    }

    /// Deletes all edges between two ranges of vertices, save those with a kept end.
    pub(crate) fn cut(&mut self, a: Range<u32>, b: Range<u32>, kept: &[bool]) {
        for (from, to) in [(a.clone(), b.clone()), (b, a)] {
            for vertex in from.filter(|&v| !kept[v as usize]) {
                let (start, end) = self.lists[vertex as usize];
                let mut left = start;
                for at in start..end {
                    let other = self.arcs[at as usize];
                    if kept[other as usize] || !to.contains(&other) {
                        self.arcs[left as usize] = other;
                        left += 1;
                    }
                }
                self.lists[vertex as usize].1 = left;
            }
        }
    }

    /// The neighbours of a vertex.
    pub(crate) fn neighbours(&self, vertex: u32) -> &[u32] {
        let (start, end) = self.lists[vertex as usize];
        &self.arcs[start as usize..end as usize]
    }

    /// The partner of a vertex, [`NONE`] if it is exposed.
    pub(crate) fn mate(&self, vertex: u32) -> u32 {
        self.mate[vertex as usize]
    }

    /// Puts an edge into the matching.
    pub(crate) fn join(&mut self, a: u32, b: u32) {
        self.set_mate(a, b);
        self.set_mate(b, a);
    }

    /// Takes the matching edge at a vertex out again and returns the other end.
    pub(crate) fn part(&mut self, a: u32) -> u32 {
        let b = self.mate[a as usize];
        if b != NONE {
            self.set_mate(a, NONE);
            self.set_mate(b, NONE);
        }
        b
    }

    fn set_mate(&mut self, vertex: u32, mate: u32) {
        self.journal.push((vertex, self.mate[vertex as usize]));
        self.mate[vertex as usize] = mate;
    }

    /// How many changes were made so far; [`Matching::undo_to`] goes back to it.
    pub(crate) fn changes(&self) -> usize {
        self.journal.len()
    }

    /// The changes since, each a vertex and its mate before; some vertices several times.
    pub(crate) fn changes_since(&self, changes: usize) -> impl Iterator<Item = (u32, u32)> + '_ {
        self.journal[changes..].iter().copied()
    }

    /// Takes all changes as made for good: there is nothing to undo any more.
    pub(crate) fn keep_changes(&mut self) {
        self.journal.clear();
    }

    /// The vertices whose mate was changed since; some several times.
    pub(crate) fn changed_since(&self, changes: usize) -> impl Iterator<Item = u32> + '_ {
        self.journal[changes..].iter().map(|&(vertex, _)| vertex)
    }

    /// Undoes changes until only the first `changes` are left.
    pub(crate) fn undo_to(&mut self, changes: usize) {
        while self.journal.len() > changes
            && let Some((vertex, mate)) = self.journal.pop()
        {
            self.mate[vertex as usize] = mate;
        }
    }

    /// Hides a vertex from searches, or shows it again.
    pub(crate) fn set_removed(&mut self, vertex: u32, removed: bool) {
        self.removed[vertex as usize] = removed;
    }

    /// The partners of all vertices, to be put back by [`Matching::restore`].
    pub(crate) fn mates(&self) -> &[u32] {
        &self.mate
    }

    /// Puts a saved matching back.
    pub(crate) fn restore(&mut self, mate: &[u32]) {
        self.mate.clear();
        self.mate.extend_from_slice(mate);
        self.journal.clear();
    }

    /// Matches greedily, then augments until no exposed vertex can be matched. Returns how many are
    /// left; optional vertices do not count.
    pub(crate) fn maximise(&mut self) -> usize {
        for vertex in 0..self.vertices as u32 {
            if self.is_settled(vertex) {
                continue;
            }
            let neighbours = self.neighbours(vertex);
            let free = neighbours
                .iter()
                .copied()
                .filter(|&n| self.mate[n as usize] == NONE && !self.removed[n as usize])
                .min_by_key(|&n| self.neighbours(n).len());
            self.work += neighbours.len() as u64;
            if let Some(other) = free {
                self.join(vertex, other);
            }
        }
        (0..self.vertices as u32)
            .filter(|&v| !self.is_settled(v) && !self.augment(v))
            .count()
    }

    /// Whether nothing is to be done about a vertex: covered, hidden, or optional.
    fn is_settled(&self, vertex: u32) -> bool {
        let at = vertex as usize;
        self.mate[at] != NONE || self.removed[at] || self.optional[at]
    }

    /// Looks for an augmenting path from an exposed vertex and flips it. Covered vertices stay
    /// covered.
    pub(crate) fn augment(&mut self, root: u32) -> bool {
        let Some(end) = self.search(root) else {
            return false;
        };
        let mut vertex = end;
        while vertex != NONE {
            let before = self.parent[vertex as usize];
            let next = self.mate[before as usize];
            self.join(vertex, before);
            vertex = next;
        }
        true
    }

    /// Brings an edge into a perfect matching if some perfect matching has it, else leaves all as it
    /// was.
    pub(crate) fn force(&mut self, x: u32, y: u32) -> bool {
        let before = self.changes();
        let (u, v) = (self.part(x), self.part(y));
        self.set_removed(x, true);
        self.set_removed(y, true);
        let done = u != NONE && v != NONE && self.augment(u) && self.mate(v) != NONE;
        self.set_removed(x, false);
        self.set_removed(y, false);
        if done {
            self.join(x, y);
        } else {
            self.undo_to(before);
        }
        done
    }

    /// Searches from a vertex that is exposed while no other is: afterwards
    /// [`Matching::is_outer`] tells which vertices an even alternating path leads to, that is, which
    /// could be exposed in its stead.
    pub(crate) fn explore(&mut self, root: u32) {
        let end = self.search(root);
        debug_assert!(end.is_none(), "no other vertex is exposed");
    }

    /// Whether the last search reached a vertex by an even alternating path.
    pub(crate) fn is_outer(&self, vertex: u32) -> bool {
        self.outer[vertex as usize]
    }

    /// Breadth-first search with blossom shrinking; returns the far end of an augmenting path.
    fn search(&mut self, root: u32) -> Option<u32> {
        for vertex in self.touched.drain(..) {
            self.parent[vertex as usize] = NONE;
            self.outer[vertex as usize] = false;
            self.base[vertex as usize] = vertex;
        }
        self.queue.clear();
        self.reach(root);
        while let Some(vertex) = self.queue.pop_front() {
            if self.optional[vertex as usize] && vertex != root {
                return Some(self.part(vertex));
            }
            let (start, end) = self.lists[vertex as usize];
            self.work += u64::from(end - start);
            if self.work > self.budget {
                return None;
            }
            for at in start..end {
                let to = self.arcs[at as usize];
                if self.removed[to as usize]
                    || self.base[vertex as usize] == self.base[to as usize]
                    || self.mate[vertex as usize] == to
                    || self.is_blocked(vertex, to)
                {
                    continue;
                }
                let to_mate = self.mate[to as usize];
                if to == root || (to_mate != NONE && self.parent[to_mate as usize] != NONE) {
                    self.shrink(vertex, to);
                } else if self.parent[to as usize] == NONE {
                    self.parent[to as usize] = vertex;
                    self.touched.push(to);
                    if to_mate == NONE {
                        return Some(to);
                    }
                    self.reach(to_mate);
                }
            }
        }
        None
    }

    /// Puts an outer vertex into the queue.
    fn reach(&mut self, vertex: u32) {
        self.outer[vertex as usize] = true;
        self.touched.push(vertex);
        self.queue.push_back(vertex);
    }

    /// Contracts the blossom closed by the edge between two outer vertices.
    fn shrink(&mut self, a: u32, b: u32) {
        let base = self.common_base(a, b);
        self.stamp += 1;
        self.mark_path(a, base, b);
        self.mark_path(b, base, a);
        for at in 0..self.touched.len() {
            let vertex = self.touched[at] as usize;
            if self.in_blossom[self.base[vertex] as usize] == self.stamp {
                self.base[vertex] = base;
                if !self.outer[vertex] {
                    self.outer[vertex] = true;
                    self.queue.push_back(vertex as u32);
                }
            }
        }
        self.work += self.touched.len() as u64;
    }

    /// The lowest common ancestor of two outer vertices in the shrunken tree.
    fn common_base(&mut self, mut a: u32, mut b: u32) -> u32 {
        self.stamp += 1;
        loop {
            a = self.base[a as usize];
            self.on_path[a as usize] = self.stamp;
            if self.mate[a as usize] == NONE {
                break;
            }
            a = self.parent[self.mate[a as usize] as usize];
        }
        loop {
            b = self.base[b as usize];
            if self.on_path[b as usize] == self.stamp {
                return b;
            }
            b = self.parent[self.mate[b as usize] as usize];
        }
    }

    fn mark_path(&mut self, mut vertex: u32, base: u32, mut child: u32) {
        while self.base[vertex as usize] != base {
            let mate = self.mate[vertex as usize];
            self.in_blossom[self.base[vertex as usize] as usize] = self.stamp;
            self.in_blossom[self.base[mate as usize] as usize] = self.stamp;
            self.parent[vertex as usize] = child;
            child = mate;
            vertex = self.parent[mate as usize];
        }
    }
}

fn fill<T: Clone>(list: &mut Vec<T>, length: usize, value: T) {
    list.clear();
    list.resize(length, value);
}

#[cfg(test)]
mod tests {
    use super::*;

    fn exposed(vertices: usize, edges: &[(u32, u32)]) -> usize {
        let mut matching = Matching {
            budget: u64::MAX,
            ..Matching::default()
        };
        matching.reset(vertices);
        for &(a, b) in edges {
            matching.add_edge(a, b);
        }
        matching.connect();
        matching.maximise()
    }

    #[test]
    fn odd_cycles_need_blossoms() {
        assert_eq!(exposed(5, &[(0, 1), (1, 2), (2, 3), (3, 4), (4, 0)]), 1);
        let two_triangles = [(0, 1), (1, 2), (2, 0), (2, 3), (3, 4), (4, 5), (5, 3)];
        assert_eq!(exposed(6, &two_triangles), 0);
    }

    /// Compares with a search over all matchings on every graph of five vertices.
    #[test]
    fn all_graphs_of_five_vertices() {
        let pairs: Vec<(u32, u32)> = (0..5)
            .flat_map(|a| (a + 1..5).map(move |b| (a, b)))
            .collect();
        for mask in 0u32..1 << pairs.len() {
            let edges: Vec<_> = pairs
                .iter()
                .enumerate()
                .filter(|(i, _)| mask >> i & 1 == 1)
                .map(|(_, &edge)| edge)
                .collect();
            let best = (0u32..1 << edges.len())
                .filter_map(|chosen| {
                    let mut used = 0u32;
                    let mut size = 0;
                    for (i, &(a, b)) in edges.iter().enumerate() {
                        if chosen >> i & 1 == 1 {
                            if used & (1 << a | 1 << b) != 0 {
                                return None;
                            }
                            used |= 1 << a | 1 << b;
                            size += 1;
                        }
                    }
                    Some(size)
                })
                .max()
                .unwrap_or(0);
            assert_eq!(exposed(5, &edges), 5 - 2 * best, "{edges:?}");
        }
    }
}
