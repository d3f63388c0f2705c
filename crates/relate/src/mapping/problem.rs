//! The two graphs, checked, and the distance of a map between them.

use super::{Arm, Arrangement, Distance, MappingError, Side, coherence::bridges};

/// Up to this many atoms a graph keeps a square table of its bonds.
const TABLED: usize = 256;

/// Stands for no bond in the table.
const NO_BOND: u16 = u16::MAX;

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
    /// Functional groups, 0 for none.
    groups: Vec<u32>,
    pub(super) stereo: Vec<Arrangement>,
    pub(super) symmetries: Vec<Vec<(u32, u32)>>,
    /// Atom `u` owns `neighbours[start[u]..start[u + 1]]`.
    start: Vec<u32>,
    neighbours: Vec<Neighbour>,
    /// Atoms from here on stand for what only the other side has: they have no bonds, and cost nothing.
    present: usize,
    /// Bonds outside rings, lower atom first, sorted.
    bridges: Vec<(u32, u32)>,
    /// The number of bonds within functional groups.
    group_bonds: u32,
    /// The class of the bond between any two atoms, row by row; empty for large graphs.
    table: Vec<u16>,
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
    /// Builds the graph of a side in its [`normal`] form, with the elements that it lacks of the other.
    fn new(side: &Side, lacking: &[u8]) -> Result<Self, MappingError> {
        check(side)?;
        let present = side.elements.len();
        let atoms = present + lacking.len();
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
        let mut table = Vec::new();
        if atoms <= TABLED {
            table.resize(atoms * atoms, NO_BOND);
            for &(first, second, class) in &side.bonds {
                table[first as usize * atoms + second as usize] = u16::from(class);
                table[second as usize * atoms + first as usize] = u16::from(class);
            }
        }
        let mut graph = Self {
            table,
            elements: side.elements.iter().chain(lacking).copied().collect(),
            hydrogens: side.hydrogens.clone(),
            marks: side.marks.clone(),
            groups: side.groups.clone(),
            stereo: side.stereo.clone(),
            symmetries: side.symmetries.clone(),
            start,
            neighbours,
            present,
            bridges: Vec::new(),
            group_bonds: 0,
        };
        graph.hydrogens.resize(atoms, 0);
        graph.marks.resize(atoms, 0);
        graph.groups.resize(atoms, 0);
        graph.bridges = bridges(&graph);
        let within = side.bonds.iter();
        let within = within.filter(|&&(a, b, _)| graph.group(a) > 0 && graph.group(b) > 0);
        graph.group_bonds = within.count() as u32;
        Ok(graph)
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

    /// The number of atoms that are really there; they come first.
    pub(super) fn present(&self) -> usize {
        self.present
    }

    /// Whether an atom stands for one that only the other side has.
    pub(super) fn is_absent(&self, atom: u32) -> bool {
        atom as usize >= self.present
    }

    /// Whether the bond between two atoms lies in a ring.
    pub(super) fn in_ring(&self, first: u32, second: u32) -> bool {
        let bond = (first.min(second), first.max(second));
        self.bridges.binary_search(&bond).is_err()
    }

    /// The number of bonds in rings.
    pub(super) fn ring_bonds(&self) -> u32 {
        (self.bonds() - self.bridges.len()) as u32
    }

    /// The number of bonds within functional groups.
    pub(super) fn group_bonds(&self) -> u32 {
        self.group_bonds
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

    /// The label of the functional group of an atom, 0 for none.
    pub(super) fn group(&self, atom: u32) -> u32 {
        self.groups[atom as usize]
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
        if self.table.is_empty() {
            let near = self.neighbours(first);
            let place = near.binary_search_by_key(&second, |near| near.atom);
            return place.ok().map(|place| near[place].class);
        }
        let class = self.table[first as usize * self.atoms() + second as usize];
        u8::try_from(class).ok()
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
    if let Some(atom) = named(side).find(|&atom| atom as usize >= elements) {
        return Err(MappingError::NoSuchAtom { atom });
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

/// The atoms that stereo elements and symmetries name.
fn named(side: &Side) -> impl Iterator<Item = u32> {
    let stereo = side.stereo.iter().flat_map(|element| {
        let arms = element.arms.iter().filter_map(|arm| match arm {
            Arm::Atom(atom) => Some(*atom),
            Arm::Hydrogen(_) | Arm::LonePair => None,
        });
        arms.chain(element.centres)
    });
    let moved = side.symmetries.iter().flatten();
    stereo.chain(moved.flat_map(|&(from, to)| [from, to]))
}

/// The elements that a side has fewer of than the other, as often as they are missing.
fn lacking(side: &Side, other: &Side) -> Vec<u8> {
    let mut counts = [0_usize; 256];
    for &element in &other.elements {
        counts[usize::from(element)] += 1;
    }
    for &element in &side.elements {
        let count = &mut counts[usize::from(element)];
        *count = count.saturating_sub(1);
    }
    (0..=u8::MAX)
        .zip(counts)
        .flat_map(|(element, count)| std::iter::repeat_n(element, count))
        .collect()
}

impl Problem {
    /// Builds the problem of two sides in their [`normal`] form.
    pub(super) fn new(left: &Side, right: &Side) -> Result<Self, MappingError> {
        let (left, right) = (
            Graph::new(left, &lacking(left, right))?,
            Graph::new(right, &lacking(right, left))?,
        );
        let (left_atoms, right_atoms) = (left.by_element(), right.by_element());
        let element = |&atom: &u32| left.element(atom);
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

    /// Whether atoms are left over on either side.
    pub(super) fn leaves_over(&self) -> bool {
        self.left.present() < self.left.atoms() || self.right.present() < self.right.atoms()
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
        if self.left.is_absent(left) || self.right.is_absent(right) {
            return (0, 0);
        }
        let hydrogens = self
            .left
            .hydrogens(left)
            .abs_diff(self.right.hydrogens(right));
        let marks_differ = self.left.mark(left) != self.right.mark(right);
        (u32::from(hydrogens), u32::from(marks_differ))
    }
}
