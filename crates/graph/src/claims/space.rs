//! Vectors over the field of two elements, and the spaces they span.

/// A vector: the places where it is one, as bits.
#[derive(Debug, Clone, Default, PartialEq, Eq)]
pub(crate) struct Vector(Vec<u64>);

impl Vector {
    /// A vector of that many places, all zero.
    pub(crate) fn zero(places: usize) -> Self {
        Self(vec![0; places.div_ceil(64)])
    }

    /// Adds one at a place.
    pub(crate) fn flip(&mut self, place: usize) {
        self.0[place / 64] ^= 1 << (place % 64);
    }

    /// Adds another vector of as many places.
    pub(crate) fn add(&mut self, other: &Self) {
        for (own, other) in self.0.iter_mut().zip(&other.0) {
            *own ^= other;
        }
    }

    /// The lowest place where it is one.
    fn leading(&self) -> Option<usize> {
        let (word, bits) = self.0.iter().enumerate().find(|(_, bits)| **bits != 0)?;
        Some(64 * word + bits.trailing_zeros() as usize)
    }

    fn has(&self, place: usize) -> bool {
        self.0[place / 64] >> (place % 64) & 1 == 1
    }
}

/// A space of vectors, as a basis in echelon form.
#[derive(Debug, Clone, Default)]
pub(crate) struct Space {
    /// Leading places and vectors, in the order in which they came.
    basis: Vec<(usize, Vector)>,
}

impl Space {
    /// The space that all vectors span.
    pub(crate) fn of<'v>(vectors: impl IntoIterator<Item = &'v Vector>) -> Self {
        let mut space = Self::default();
        for vector in vectors {
            let rest = space.rest(vector);
            if let Some(leading) = rest.leading() {
                space.basis.push((leading, rest));
            }
        }
        space
    }

    /// What is left of a vector when all leading places are cleared.
    fn rest(&self, vector: &Vector) -> Vector {
        let mut rest = vector.clone();
        for (leading, own) in &self.basis {
            if rest.has(*leading) {
                rest.add(own);
            }
        }
        rest
    }

    /// Whether a vector lies in the space.
    pub(crate) fn contains(&self, vector: &Vector) -> bool {
        self.rest(vector).leading().is_none()
    }

    /// Whether all vectors lie in the space.
    pub(crate) fn contains_all<'v>(&self, vectors: impl IntoIterator<Item = &'v Vector>) -> bool {
        vectors.into_iter().all(|vector| self.contains(vector))
    }

    /// The number of vectors in a basis.
    pub(crate) fn dimension(&self) -> usize {
        self.basis.len()
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn vector(places: &[usize]) -> Vector {
        let mut vector = Vector::zero(70);
        for &place in places {
            vector.flip(place);
        }
        vector
    }

    #[test]
    fn sums_lie_in_the_space_and_others_do_not() {
        let vectors = [vector(&[0, 1]), vector(&[1, 69]), vector(&[0, 69])];
        let space = Space::of(&vectors);
        assert_eq!(space.dimension(), 2);
        assert!(space.contains_all(&vectors));
        assert!(space.contains(&vector(&[])));
        assert!(!space.contains(&vector(&[0])));
    }
}
