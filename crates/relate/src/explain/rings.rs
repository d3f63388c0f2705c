//! The ring systems of one record: sizes of their rings, and how these share atoms.

use crate::{Structure, constitution::Constitution};

/// Rings that share atoms with each other; a ring of its own is a system too. Atoms from 0.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct RingSystem {
    /// The atoms, ascending.
    pub atoms: Vec<u32>,
    /// Sizes of the rings of a smallest set that all others are sums of, ascending: the same for every
    /// such set. Empty for systems of several rings and more than 256 atoms.
    pub sizes: Vec<usize>,
    /// How rings of the set share atoms.
    pub joins: Vec<RingJoin>,
}

/// How two rings share atoms.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub enum RingJoin {
    /// One atom, the only way from one to the other.
    Spiro,
    /// One bond.
    Fused,
    /// More than one bond.
    Bridged,
}

impl RingJoin {
    /// The word of the output contract.
    pub fn as_str(self) -> &'static str {
        match self {
            Self::Spiro => "spiro",
            Self::Fused => "fused",
            Self::Bridged => "bridged",
        }
    }
}

/// Up to so many atoms the rings of a system are looked for: the work grows with their third power.
const MOST_ATOMS: usize = 256;

/// Describes a record; systems by their lowest atom.
pub(super) fn of(structure: &Structure) -> Vec<RingSystem> {
    let constitution = Constitution::of(structure);
    let (component, count) = constitution.components(|bond| constitution.bond(bond).in_ring);
    let mut bonds = vec![Vec::new(); count as usize];
    for bond in constitution.bonds().iter().filter(|bond| bond.in_ring) {
        bonds[component[bond.a as usize] as usize].push((bond.a, bond.b));
    }
    let systems = bonds.iter().filter(|bonds| !bonds.is_empty());
    let mut found: Vec<RingSystem> = systems
        .map(|bonds| {
            let graph = Graph::new(bonds);
            let source = |&position: &u32| constitution.atom(position).source;
            let mut atoms: Vec<u32> = graph.positions.iter().map(source).collect();
            atoms.sort_unstable();
            let (sizes, joins) = graph.sizes_and_joins();
            RingSystem {
                atoms,
                sizes,
                joins,
            }
        })
        .collect();
    found.sort_unstable_by(|one, other| one.atoms.cmp(&other.atoms));
    found
}

/// One ring system with atoms and bonds of its own numbering. Atoms are in canonical order, so that
/// which of several smallest sets is taken does not depend on how the record was drawn.
struct Graph {
    positions: Vec<u32>,
    bonds: Vec<[usize; 2]>,
    /// For each atom its neighbours, each with the bond.
    neighbours: Vec<Vec<(usize, usize)>>,
}

/// A set of bonds, a bit for each.
type BondSet = Vec<u64>;

impl Graph {
    fn new(bonds: &[(u32, u32)]) -> Self {
        let mut positions: Vec<u32> = bonds.iter().flat_map(|&(a, b)| [a, b]).collect();
        positions.sort_unstable();
        positions.dedup();
        let place = |position| positions.partition_point(|&other| other < position);
        let mut bonds: Vec<[usize; 2]> = bonds
            .iter()
            .map(|&(a, b)| [place(a.min(b)), place(a.max(b))])
            .collect();
        bonds.sort_unstable();
        let mut neighbours = vec![Vec::new(); positions.len()];
        for (bond, &[a, b]) in bonds.iter().enumerate() {
            neighbours[a].push((b, bond));
            neighbours[b].push((a, bond));
        }
        Self {
            positions,
            bonds,
            neighbours,
        }
    }

    fn sizes_and_joins(&self) -> (Vec<usize>, Vec<RingJoin>) {
        let atoms = self.positions.len();
        if self.bonds.len() == atoms {
            return (vec![atoms], Vec::new());
        }
        if atoms > MOST_ATOMS {
            return (Vec::new(), Vec::new());
        }
        let rings = self.smallest_rings();
        let sizes = rings.iter().map(|ring| ones(ring.iter().copied()));
        (sizes.collect(), self.joins(&rings))
    }

    /// A minimum cycle basis by Horton's method (SIAM J. Comput. 16, 358 (1987)): shortest cycles
    /// through each atom and bond, the shortest first, as long as they are independent.
    fn smallest_rings(&self) -> Vec<BondSet> {
        let wanted = self.bonds.len() + 1 - self.positions.len();
        let mut candidates: Vec<(usize, usize, usize)> = Vec::new();
        let trees: Vec<Tree> = (0..self.positions.len())
            .map(|root| self.tree(root))
            .collect();
        for (root, tree) in trees.iter().enumerate() {
            for (bond, &[a, b]) in self.bonds.iter().enumerate() {
                if a != root && b != root && tree.arm[a] != tree.arm[b] {
                    candidates.push((tree.far[a] + tree.far[b] + 1, root, bond));
                }
            }
        }
        candidates.sort_unstable();
        // Each with its lowest bond, which no later one has.
        let mut reduced: Vec<(usize, BondSet)> = Vec::new();
        let mut rings = Vec::new();
        for (_, root, bond) in candidates {
            if rings.len() == wanted {
                break;
            }
            let ring = self.cycle(&trees[root], bond);
            let mut rest = ring.clone();
            for (lowest, row) in &reduced {
                if has(&rest, *lowest) {
                    rest.iter_mut()
                        .zip(row)
                        .for_each(|(word, other)| *word ^= other);
                }
            }
            if let Some(lowest) = (0..self.bonds.len()).find(|&bond| has(&rest, bond)) {
                reduced.push((lowest, rest));
                rings.push(ring);
            }
        }
        rings
    }

    /// Shortest paths from an atom.
    fn tree(&self, root: usize) -> Tree {
        let atoms = self.positions.len();
        let mut tree = Tree {
            far: vec![usize::MAX; atoms],
            arm: vec![root; atoms],
            before: vec![None; atoms],
        };
        tree.far[root] = 0;
        let mut order = vec![root];
        let mut at = 0;
        while let Some(&atom) = order.get(at) {
            at += 1;
            for &(to, bond) in &self.neighbours[atom] {
                if tree.far[to] == usize::MAX {
                    tree.far[to] = tree.far[atom] + 1;
                    tree.arm[to] = if atom == root { to } else { tree.arm[atom] };
                    tree.before[to] = Some((atom, bond));
                    order.push(to);
                }
            }
        }
        tree
    }

    /// The bond and the paths from the root to both its ends.
    fn cycle(&self, tree: &Tree, bond: usize) -> BondSet {
        let mut cycle = vec![0; self.bonds.len().div_ceil(64)];
        let mut add = |bond: usize| cycle[bond / 64] |= 1 << (bond % 64);
        add(bond);
        for mut atom in self.bonds[bond] {
            while let Some((before, bond)) = tree.before[atom] {
                add(bond);
                atom = before;
            }
        }
        cycle
    }

    fn joins(&self, rings: &[BondSet]) -> Vec<RingJoin> {
        let mut joins = Vec::new();
        // Bonds of one block are linked by rings of any basis.
        let mut block: Vec<usize> = (0..self.bonds.len()).collect();
        for (at, ring) in rings.iter().enumerate() {
            for other in &rings[..at] {
                joins.extend(match ones(ring.iter().zip(other).map(|(a, b)| a & b)) {
                    0 => None,
                    1 => Some(RingJoin::Fused),
                    _ => Some(RingJoin::Bridged),
                });
            }
            let own: Vec<usize> = (0..self.bonds.len())
                .filter(|&bond| has(ring, bond))
                .collect();
            let linked: Vec<usize> = own.iter().map(|&bond| block[bond]).collect();
            let least = linked.iter().min().copied().unwrap_or_default();
            for slot in block.iter_mut().filter(|slot| linked.contains(slot)) {
                *slot = least;
            }
        }
        let parts = |list: &Vec<(usize, usize)>| {
            let first = list.first().map(|&(_, bond)| block[bond]);
            list.iter().any(|&(_, bond)| Some(block[bond]) != first)
        };
        joins.extend(self.neighbours.iter().any(parts).then_some(RingJoin::Spiro));
        joins.sort_unstable();
        joins.dedup();
        joins
    }
}

/// Shortest paths from one atom to all.
struct Tree {
    far: Vec<usize>,
    /// The neighbour of the root that the path begins with.
    arm: Vec<usize>,
    before: Vec<Option<(usize, usize)>>,
}

fn has(set: &[u64], bond: usize) -> bool {
    set[bond / 64] >> (bond % 64) & 1 == 1
}

fn ones(words: impl Iterator<Item = u64>) -> usize {
    words.map(|word| word.count_ones() as usize).sum()
}

#[cfg(test)]
mod tests {
    use molkin_formats::smiles;
    use molkin_graph::{Limits, Orderer};
    use rstest::rstest;

    use super::*;

    fn described(text: &str) -> Vec<String> {
        let mut orderer = Orderer::new(Limits::default());
        let structure = Structure::new(&mut orderer, smiles::parse(text).unwrap()).unwrap();
        let systems = of(&structure);
        let mut words: Vec<String> = systems
            .iter()
            .map(|system| {
                let sizes: Vec<String> = system.sizes.iter().map(usize::to_string).collect();
                let joins: Vec<&str> = system.joins.iter().map(|join| join.as_str()).collect();
                format!("{} {}", sizes.join("+"), joins.join(" "))
                    .trim()
                    .to_owned()
            })
            .collect();
        words.sort();
        words
    }

    /// Sizes and terms: textbook.
    #[rstest]
    #[case::none("CCO", &[])]
    #[case::biphenyl("c1ccccc1-c1ccccc1", &["6", "6"])]
    #[case::naphthalene("c1ccc2ccccc2c1", &["6+6 fused"])]
    #[case::indole("c1ccc2[nH]ccc2c1", &["5+6 fused"])]
    #[case::pyrene("c1cc2ccc3cccc4ccc(c1)c2c34", &["6+6+6+6 fused"])]
    #[case::norbornane("C1CC2CCC1C2", &["5+5 bridged"])]
    #[case::adamantane("C1C2CC3CC1CC(C2)C3", &["6+6+6 bridged"])]
    #[case::cubane("C12C3C4C1C5C2C3C45", &["4+4+4+4+4 fused"])]
    #[case::spiro("C1CCC2(C1)CCCCC2", &["5+6 spiro"])]
    #[case::spiro_and_fused("C1CCC2(C1)Cc1ccccc1C2", &["5+5+6 spiro fused"])]
    #[case::fenestrane("C1CC2CCC3CCC4CCC1C234", &["5+5+5+5 fused"])]
    #[case::morphine("CN1CCC23C4C1CC5=C2C(=C(C=C5)O)OC3C(C=C4)O", &["5+6+6+6+6 fused bridged"])]
    #[case::crown_ether("C1COCCOCCOCCOCCOCCO1", &["18"])]
    #[case::two_components("C1CC1.C1CCC1", &["3", "4"])]
    fn known_systems(#[case] text: &str, #[case] expected: &[&str]) {
        assert_eq!(described(text), expected);
    }
}
