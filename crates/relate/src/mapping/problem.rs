//! The two graphs, checked, and the distance of a map between them.

use super::{Distance, MappingError, Side};

/// Neighbours are looked through one by one up to this number; beyond it, they are halved, as they are sorted.
const SHORT: usize = 8;

/// One end of a bond, seen from the other.
#[derive(Debug, Clone, Copy)]
pub(super) struct Neighbour {
    pub(super) atom: u32,
    pub(super) class: u8,
}

/// One structure with the neighbours of each atom side by side in one list.
#[derive(Debug)]
pub(super) struct Graph {
    elements: Vec<u8>,
    hydrogens: Vec<u8>,
    marks: Vec<u32>,
    /// Atom `u` owns `neighbours[start[u]..start[u + 1]]`.
    start: Vec<u32>,
    neighbours: Vec<Neighbour>,
}

/// The atoms of one element on both sides, equally many.
#[derive(Debug)]
pub(super) struct Class {
    pub(super) left: Vec<u32>,
    pub(super) right: Vec<u32>,
}

/// Two structures that can be laid on each other.
#[derive(Debug)]
pub(super) struct Problem {
    pub(super) left: Graph,
    pub(super) right: Graph,
    pub(super) classes: Vec<Class>,
}

/// The same side with its bonds written in one way: lower atom first, sorted.
pub(super) fn normal(side: &Side) -> Side {
    let mut normal = side.clone();
    for bond in &mut normal.bonds {
        *bond = (bond.0.min(bond.1), bond.0.max(bond.1), bond.2);
    }
    normal.bonds.sort_unstable();
    normal
}

impl Graph {
    /// Builds the graph of a side in its [`normal`] form.
    fn new(side: &Side) -> Result<Self, MappingError> {
        check(side)?;
        let atoms = side.elements.len();
        let mut start = vec![0_u32; atoms + 1];
        for &(first, second, _) in &side.bonds {
            start[first as usize + 1] += 1;
            start[second as usize + 1] += 1;
        }
        for atom in 0..atoms {
            start[atom + 1] += start[atom];
        }
        let mut next = start.clone();
        let mut neighbours = vec![Neighbour { atom: 0, class: 0 }; 2 * side.bonds.len()];
        for &(first, second, class) in &side.bonds {
            for (from, to) in [(first, second), (second, first)] {
                neighbours[next[from as usize] as usize] = Neighbour { atom: to, class };
                next[from as usize] += 1;
            }
        }
        Ok(Self {
            elements: side.elements.clone(),
            hydrogens: side.hydrogens.clone(),
            marks: side.marks.clone(),
            start,
            neighbours,
        })
    }

    /// All atoms, those of one element together and in order.
    fn by_element(&self) -> Vec<u32> {
        let mut atoms: Vec<u32> = (0..self.elements.len() as u32).collect();
        atoms.sort_by_key(|&atom| self.element(atom));
        atoms
    }

    pub(super) fn atoms(&self) -> usize {
        self.elements.len()
    }

    pub(super) fn bonds(&self) -> usize {
        self.neighbours.len() / 2
    }

    pub(super) fn element(&self, atom: u32) -> u8 {
        self.elements[atom as usize]
    }

    pub(super) fn hydrogens(&self, atom: u32) -> u8 {
        self.hydrogens[atom as usize]
    }

    pub(super) fn mark(&self, atom: u32) -> u32 {
        self.marks[atom as usize]
    }

    pub(super) fn neighbours(&self, atom: u32) -> &[Neighbour] {
        let atom = atom as usize;
        &self.neighbours[self.start[atom] as usize..self.start[atom + 1] as usize]
    }

    pub(super) fn degree(&self, atom: u32) -> usize {
        self.neighbours(atom).len()
    }

    /// The order class of the bond between two atoms, if there is one.
    pub(super) fn class_between(&self, first: u32, second: u32) -> Option<u8> {
        let near = self.neighbours(first);
        let found = if near.len() <= SHORT {
            near.iter().find(|near| near.atom == second)
        } else {
            let place = near.binary_search_by_key(&second, |near| near.atom);
            place.ok().and_then(|place| near.get(place))
        };
        found.map(|near| near.class)
    }
}

/// Sides must have lists of one length and simple bonds between atoms that exist.
fn check(side: &Side) -> Result<(), MappingError> {
    let (elements, hydrogens, marks) =
        (side.elements.len(), side.hydrogens.len(), side.marks.len());
    if hydrogens != elements || marks != elements {
        return Err(MappingError::UnequalLists {
            elements,
            hydrogens,
            marks,
        });
    }
    for (index, &(first, second, _)) in side.bonds.iter().enumerate() {
        let repeated = index
            .checked_sub(1)
            .and_then(|before| side.bonds.get(before))
            .is_some_and(|&(a, b, _)| (a, b) == (first, second));
        if first == second || second as usize >= elements || repeated {
            return Err(MappingError::BadBond {
                index,
                first,
                second,
            });
        }
    }
    Ok(())
}

impl Problem {
    /// Builds the problem of two sides in their [`normal`] form.
    pub(super) fn new(left: &Side, right: &Side) -> Result<Self, MappingError> {
        let (left, right) = (Graph::new(left)?, Graph::new(right)?);
        let (left_atoms, right_atoms) = (left.by_element(), right.by_element());
        let element = |&atom: &u32| left.element(atom);
        if !left_atoms
            .iter()
            .map(element)
            .eq(right_atoms.iter().map(|&atom| right.element(atom)))
        {
            return Err(MappingError::ElementsDiffer);
        }
        let mut classes = Vec::new();
        let mut rest = right_atoms.as_slice();
        for group in left_atoms.chunk_by(|first, second| element(first) == element(second)) {
            let (own, others) = rest.split_at(group.len());
            classes.push(Class {
                left: group.to_vec(),
                right: own.to_vec(),
            });
            rest = others;
        }
        Ok(Self {
            left,
            right,
            classes,
        })
    }

    /// The number of bonds on both sides together, the distance (i) of a map that keeps none.
    pub(super) fn all_bonds(&self) -> usize {
        self.left.bonds() + self.right.bonds()
    }

    /// The distance of a map that keeps the elements.
    pub(super) fn distance(&self, map: &[u32]) -> Distance {
        let mut doubly_kept = 0;
        let mut doubly_changed = 0;
        let mut distance = Distance::default();
        for (atom, &image) in (0..).zip(map) {
            let (hydrogens, mark) = self.atom_cost(atom, image);
            distance.hydrogens = distance.hydrogens.saturating_add(hydrogens);
            distance.marks += mark;
            for neighbour in self.left.neighbours(atom) {
                let class = self
                    .right
                    .class_between(image, map[neighbour.atom as usize]);
                doubly_kept += usize::from(class.is_some());
                doubly_changed += u32::from(class.is_some_and(|class| class != neighbour.class));
            }
        }
        distance.bonds = (self.all_bonds() - doubly_kept) as u32;
        distance.orders = doubly_changed / 2;
        distance
    }

    /// What laying one atom on another adds to (iii) and (iv).
    pub(super) fn atom_cost(&self, left: u32, right: u32) -> (u32, u32) {
        let hydrogens = self
            .left
            .hydrogens(left)
            .abs_diff(self.right.hydrogens(right));
        let marks_differ = self.left.mark(left) != self.right.mark(right);
        (u32::from(hydrogens), u32::from(marks_differ))
    }
}
