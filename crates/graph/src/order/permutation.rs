//! Automorphisms, stored by what they move.

/// A permutation of vertices: the vertices it moves, ascending, each with its image.
#[derive(Debug, Clone, Default, PartialEq, Eq)]
pub(crate) struct Permutation {
    moved: Vec<(u32, u32)>,
}

impl Permutation {
    /// From pairs of vertex and image; vertices that are left out, or map to themselves, stay.
    pub(crate) fn of(pairs: impl Iterator<Item = (u32, u32)>) -> Self {
        let mut moved: Vec<(u32, u32)> = pairs.filter(|(from, to)| from != to).collect();
        moved.sort_unstable();
        Self { moved }
    }

    /// The image of a vertex.
    pub(crate) fn image(&self, vertex: u32) -> u32 {
        match self.moved.binary_search_by_key(&vertex, |&(from, _)| from) {
            Ok(at) => self.moved[at].1,
            Err(_) => vertex,
        }
    }

    /// Whether a vertex stays.
    pub(super) fn fixes(&self, vertex: u32) -> bool {
        self.image(vertex) == vertex
    }

    /// The same with all vertices renamed.
    pub(super) fn renamed(&self, name: impl Fn(u32) -> u32) -> Self {
        Self::of(self.moved.iter().map(|&(from, to)| (name(from), name(to))))
    }

    /// The vertices that are moved, with their images.
    pub(crate) fn moved(&self) -> &[(u32, u32)] {
        &self.moved
    }
}
