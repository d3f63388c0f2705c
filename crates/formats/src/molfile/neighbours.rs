//! Who is bonded to whom in a drawing, and which bonds are in rings.

use crate::molfile::drawing::{BondKind, DrawnBond};

/// The bonds of each atom in the order of the bond lines.
#[derive(Debug)]
pub(super) struct Neighbours {
    /// Where the list of each atom starts in `list`; one entry more than there are atoms.
    starts: Vec<usize>,
    /// The other atom and the bond.
    list: Vec<(u32, u32)>,
    in_ring: Vec<bool>,
}

/// Atoms that the search for a small ring may look at. Diamond holds 239 within six bonds, and no
/// real ring system is denser; a hostile graph gets the answer "no small ring" at a bounded cost.
const REACH: usize = 256;

impl Neighbours {
    /// `atoms` is more than every index in `bonds`. Hydrogen bonds make no neighbours. Linear time.
    pub(super) fn new(atoms: usize, bonds: &[DrawnBond]) -> Self {
        let mut starts = vec![0_usize; atoms + 1];
        let is_hydrogen_bond = |bond: &DrawnBond| bond.kind == BondKind::Hydrogen;
        let counted = bonds.iter().filter(|bond| !is_hydrogen_bond(bond));
        for end in counted.flat_map(|bond| bond.ends) {
            starts[end as usize + 1] += 1;
        }
        for atom in 0..atoms {
            starts[atom + 1] += starts[atom];
        }
        let mut next = starts.clone();
        let mut list = vec![(0, 0); starts[atoms]];
        for (index, bond) in (0_u32..).zip(bonds) {
            if is_hydrogen_bond(bond) {
                continue;
            }
            let [a, b] = bond.ends;
            for (here, there) in [(a, b), (b, a)] {
                list[next[here as usize]] = (there, index);
                next[here as usize] += 1;
            }
        }
        let mut neighbours = Self {
            starts,
            list,
            in_ring: Vec::new(),
        };
        neighbours.in_ring = neighbours.find_ring_bonds(bonds.len());
        for (bond, in_ring) in bonds.iter().zip(&mut neighbours.in_ring) {
            *in_ring &= !is_hydrogen_bond(bond);
        }
        neighbours
    }

    /// The neighbours of an atom and the bonds to them; none for an index out of range.
    pub(super) fn of(&self, atom: u32) -> &[(u32, u32)] {
        let atom = atom as usize;
        match (self.starts.get(atom), self.starts.get(atom + 1)) {
            (Some(&start), Some(&end)) => &self.list[start..end],
            _ => &[],
        }
    }

    /// Whether a bond is in any ring.
    pub(super) fn in_ring(&self, bond: u32) -> bool {
        self.in_ring.get(bond as usize).copied().unwrap_or(false)
    }

    /// Whether the smallest ring through the bond between two atoms has at most `size` members.
    pub(super) fn in_ring_within(&self, size: usize, bond: u32, [from, to]: [u32; 2]) -> bool {
        if !self.in_ring(bond) {
            return false;
        }
        let mut seen = vec![from];
        let mut sphere = 0..1;
        // A ring of n members closes after n - 1 steps that avoid the bond.
        for _ in 1..size {
            for at in sphere.clone() {
                let here = seen[at];
                for &(there, by) in self.of(here) {
                    if by == bond || !self.in_ring(by) {
                        continue;
                    }
                    if there == to {
                        return true;
                    }
                    if !seen.contains(&there) {
                        seen.push(there);
                    }
                }
                if seen.len() > REACH {
                    return false;
                }
            }
            sphere = sphere.end..seen.len();
        }
        false
    }

    /// The bonds that are no bridges (Tarjan 1974), by a depth-first search with a stack of its
    /// own.
    fn find_ring_bonds(&self, bonds: usize) -> Vec<bool> {
        const UNSEEN: usize = usize::MAX;
        let atoms = self.starts.len() - 1;
        let mut in_ring = vec![true; bonds];
        let mut entered = vec![UNSEEN; atoms];
        let mut lowest = vec![UNSEEN; atoms];
        let mut clock = 0;
        // An atom, the bond it was reached by, and the position in its list.
        let mut stack: Vec<(u32, Option<u32>, usize)> = Vec::new();
        for root in 0..atoms as u32 {
            if entered[root as usize] != UNSEEN {
                continue;
            }
            stack.push((root, None, 0));
            while let Some((atom, by, at)) = stack.last_mut() {
                let here = *atom as usize;
                if *at == 0 && entered[here] == UNSEEN {
                    entered[here] = clock;
                    lowest[here] = clock;
                    clock += 1;
                }
                if let Some(&(there, bond)) = self.of(*atom).get(*at) {
                    *at += 1;
                    if Some(bond) == *by {
                        continue;
                    }
                    match entered[there as usize] {
                        UNSEEN => stack.push((there, Some(bond), 0)),
                        time => lowest[here] = lowest[here].min(time),
                    }
                    continue;
                }
                let by = *by;
                stack.pop();
                if let (Some(bond), Some(&(parent, _, _))) = (by, stack.last()) {
                    let parent = parent as usize;
                    lowest[parent] = lowest[parent].min(lowest[here]);
                    if lowest[here] > entered[parent] {
                        in_ring[bond as usize] = false;
                    }
                }
            }
        }
        in_ring
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::{Span, molfile::drawing::BondMark};

    fn neighbours(atoms: usize, bonds: &[[u32; 2]]) -> Neighbours {
        let bonds: Vec<_> = bonds
            .iter()
            .map(|&ends| DrawnBond {
                span: Span::new(1, 1, 0),
                ends,
                kind: BondKind::Single,
                mark: BondMark::Plain,
            })
            .collect();
        Neighbours::new(atoms, &bonds)
    }

    /// A square with a tail and a triangle at its end.
    #[test]
    fn rings_and_bridges() {
        let bonds = [
            [0, 1],
            [1, 2],
            [2, 3],
            [3, 0],
            [3, 4],
            [4, 5],
            [5, 6],
            [6, 4],
        ];
        let found = neighbours(8, &bonds);
        let in_ring: Vec<_> = (0..8).map(|bond| found.in_ring(bond)).collect();
        assert_eq!(in_ring, [true, true, true, true, false, true, true, true]);
        assert!(found.in_ring_within(4, 0, [0, 1]) && !found.in_ring_within(3, 0, [0, 1]));
        assert!(found.in_ring_within(3, 6, [5, 6]));
        assert!(!found.in_ring_within(7, 4, [3, 4]));
        assert_eq!(found.of(3), [(2, 2), (0, 3), (4, 4)]);
        assert!(found.of(7).is_empty() && found.of(99).is_empty());
    }

    #[test]
    fn a_long_ring_needs_no_deep_stack() {
        let bonds: Vec<_> = (0..50_000)
            .map(|atom| [atom, (atom + 1) % 50_000])
            .collect();
        let found = neighbours(50_000, &bonds);
        assert!(found.in_ring(0) && !found.in_ring_within(7, 0, [0, 1]));
    }
}
