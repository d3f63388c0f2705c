//! The rotations of the coordination polyhedra.

use std::sync::OnceLock;

use crate::Polyhedron;

/// An arrangement moved: position `i` takes the ligand that was at `permutation[i]`.
type Permutation = Vec<usize>;

impl Polyhedron {
    /// Permutations that generate the rotations.
    fn generators(self) -> &'static [&'static [usize]] {
        match self {
            Self::SquarePlanar => &[&[1, 2, 3, 0], &[0, 3, 2, 1]],
            Self::TrigonalBipyramidal => &[&[0, 1, 3, 4, 2], &[1, 0, 2, 4, 3]],
            Self::Octahedral => &[&[0, 1, 3, 4, 5, 2], &[3, 5, 2, 1, 4, 0]],
        }
    }

    /// All rotations: 8 for the square (turning it over included), 6 for the trigonal bipyramid and
    /// 24 for the octahedron.
    pub(crate) fn rotations(self) -> &'static [Permutation] {
        static TABLES: [OnceLock<Vec<Permutation>>; 3] =
            [OnceLock::new(), OnceLock::new(), OnceLock::new()];
        let table = match self {
            Self::SquarePlanar => &TABLES[0],
            Self::TrigonalBipyramidal => &TABLES[1],
            Self::Octahedral => &TABLES[2],
        };
        table.get_or_init(|| {
            let mut group: Vec<Permutation> = vec![(0..self.positions()).collect()];
            let mut at = 0;
            while at < group.len() {
                for generator in self.generators() {
                    let product: Permutation = generator.iter().map(|&i| group[at][i]).collect();
                    if !group.contains(&product) {
                        group.push(product);
                    }
                }
                at += 1;
            }
            group
        })
    }

    /// The mirror image of an arrangement. A square is its own.
    pub(crate) fn mirrored<T: Copy>(self, ligands: &[T]) -> Vec<T> {
        let mut image = ligands.to_vec();
        match self {
            Self::SquarePlanar => {}
            Self::TrigonalBipyramidal => image.swap(3, 4),
            Self::Octahedral => image.swap(3, 5),
        }
        image
    }

    /// Whether two arrangements are the same up to rotation.
    ///
    /// # Examples
    /// ```
    /// use molkin_graph::Polyhedron;
    ///
    /// // cis and trans on a square.
    /// assert!(Polyhedron::SquarePlanar.is_same(&['a', 'a', 'b', 'b'], &['b', 'a', 'a', 'b']));
    /// assert!(!Polyhedron::SquarePlanar.is_same(&['a', 'a', 'b', 'b'], &['a', 'b', 'a', 'b']));
    /// ```
    pub fn is_same<T: PartialEq>(self, a: &[T], b: &[T]) -> bool {
        a.len() == self.positions()
            && b.len() == self.positions()
            && self.rotations().iter().any(|rotation| {
                rotation
                    .iter()
                    .zip(b)
                    .all(|(&from, ligand)| a[from] == *ligand)
            })
    }

    /// The least sequence of ranks among all rotations of an arrangement: equal for two
    /// arrangements exactly when they are the same. Ligands may share ranks.
    pub(crate) fn least(self, ranks: &[u32]) -> Vec<u32> {
        let turned = self.rotations().iter().map(|rotation| {
            rotation
                .iter()
                .map(|&from| ranks.get(from).copied().unwrap_or(u32::MAX))
                .collect()
        });
        turned.min().unwrap_or_default()
    }

    /// One arrangement of each class that the ligands can have: 3, 20 or 30 if all differ.
    pub(crate) fn arrangements(self, ligands: &[u32]) -> Vec<Vec<u32>> {
        let mut seen = std::collections::BTreeSet::new();
        let mut pending = vec![ligands.to_vec()];
        while let Some(next) = pending.pop() {
            if !seen.insert(self.least(&next)) {
                continue;
            }
            for i in 0..next.len() {
                for j in i + 1..next.len() {
                    let mut swapped = next.clone();
                    swapped.swap(i, j);
                    pending.push(swapped);
                }
            }
        }
        seen.into_iter().collect()
    }
}

#[cfg(test)]
mod tests {
    use rstest::rstest;

    use super::*;

    /// Group orders and numbers of classes as OpenSMILES tabulates them.
    #[rstest]
    #[case(Polyhedron::SquarePlanar, 8, 3)]
    #[case(Polyhedron::TrigonalBipyramidal, 6, 20)]
    #[case(Polyhedron::Octahedral, 24, 30)]
    fn orders_and_classes(
        #[case] polyhedron: Polyhedron,
        #[case] rotations: usize,
        #[case] classes: usize,
    ) {
        assert_eq!(polyhedron.rotations().len(), rotations);
        let ligands: Vec<u32> = (0..polyhedron.positions() as u32).collect();
        assert_eq!(polyhedron.arrangements(&ligands).len(), classes);
    }

    /// MA2B2C2 has six stereoisomers, of which two are mirror images: five geometric ones (textbook
    /// inorganic chemistry; Pólya counts of the octahedron).
    #[test]
    fn octahedral_pairs() {
        let arrangements = Polyhedron::Octahedral.arrangements(&[1, 1, 2, 2, 3, 3]);
        assert_eq!(arrangements.len(), 6);
        let chiral = arrangements
            .iter()
            .filter(|a| {
                let mirrored = Polyhedron::Octahedral.mirrored(a);
                !Polyhedron::Octahedral.is_same(a, &mirrored)
            })
            .count();
        assert_eq!(chiral, 2);
    }
}
