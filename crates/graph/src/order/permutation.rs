//! Automorphisms, stored by what they move.

use crate::rows::Rows;

/// A permutation of vertices: the vertices it moves, ascending, each with its image.
#[derive(Debug, Clone, Copy)]
pub(crate) struct Permutation<'a> {
    moved: &'a [(u32, u32)],
}

impl<'a> Permutation<'a> {
    /// The image of a vertex.
    pub(crate) fn image(self, vertex: u32) -> u32 {
        match self.moved.binary_search_by_key(&vertex, |&(from, _)| from) {
            Ok(at) => self.moved[at].1,
            Err(_) => vertex,
        }
    }

    /// Whether a vertex stays.
    pub(super) fn fixes(self, vertex: u32) -> bool {
        self.image(vertex) == vertex
    }

    /// The vertices that are moved, with their images.
    pub(crate) fn moved(self) -> &'a [(u32, u32)] {
        self.moved
    }
}

/// Generators of a group of permutations.
#[derive(Debug, Default)]
pub(crate) struct Generators {
    rows: Rows<(u32, u32)>,
}

impl Clone for Generators {
    fn clone(&self) -> Self {
        Self {
            rows: self.rows.clone(),
        }
    }

    fn clone_from(&mut self, source: &Self) {
        self.rows.clone_from(&source.rows);
    }
}

impl Generators {
    pub(crate) fn clear(&mut self) {
        self.rows.clear();
    }

    pub(crate) fn is_empty(&self) -> bool {
        self.rows.is_empty()
    }

    /// Adds the permutation that pairs of vertex and image give, and returns it; vertices that are
    /// left out, or map to themselves, stay.
    pub(super) fn push(&mut self, pairs: impl Iterator<Item = (u32, u32)>) -> Permutation<'_> {
        let moved = self.rows.push(pairs.filter(|(from, to)| from != to));
        moved.sort_unstable();
        Permutation { moved }
    }

    /// Adds permutations of other vertices, which `name` gives the names of these.
    pub(super) fn extend_renamed(&mut self, other: &Self, name: impl Fn(u32) -> u32) {
        for generator in other.iter() {
            let moved = generator.moved().iter();
            self.push(moved.map(|&(from, to)| (name(from), name(to))));
        }
    }

    /// The permutations.
    pub(crate) fn iter(&self) -> impl ExactSizeIterator<Item = Permutation<'_>> {
        self.rows.iter().map(|moved| Permutation { moved })
    }
}
