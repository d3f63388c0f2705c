//! Which atoms of one structure are alike once some atoms are held fixed.
//!
//! Colour refinement proposes, a verified automorphism decides: two atoms count as alike only if an automorphism was found
//! that moves one to the other, so a missed or wrong proposal costs time, never correctness. That also allows hashes as
//! colours.

use super::problem::Graph;

/// Above this many trials the remaining atoms count as different.
const MOST_TRIALS: usize = 256;

/// Which labels an automorphism has to keep.
#[derive(Debug, Clone, Copy, Default, PartialEq, Eq)]
pub(super) struct Kept {
    pub(super) orders: bool,
    pub(super) hydrogens: bool,
    pub(super) marks: bool,
}

/// The least atom alike to each atom, possibly with some likenesses missed.
#[derive(Debug, Clone, PartialEq, Eq)]
pub(super) struct Orbits {
    least: Vec<u32>,
    trivial: bool,
}

impl Orbits {
    pub(super) fn trivial(atoms: usize) -> Self {
        Self {
            least: (0..atoms as u32).collect(),
            trivial: true,
        }
    }

    /// Orbits of the automorphisms that keep the labels and move none of the `fixed` atoms.
    pub(super) fn new(graph: &Graph, kept: Kept, fixed: &[u32]) -> Self {
        let mut search = Automorphisms::new(graph, kept, fixed);
        search.find();
        let least: Vec<u32> = (0..graph.atoms() as u32)
            .map(|atom| find(&search.parent, atom))
            .collect();
        let trivial = (0..).zip(&least).all(|(atom, &least)| atom == least);
        Self { least, trivial }
    }

    /// Whether each atom is alike to itself only.
    pub(super) fn is_trivial(&self) -> bool {
        self.trivial
    }

    /// The atoms alike to an atom, itself included.
    pub(super) fn of(&self, atom: u32) -> impl Iterator<Item = u32> + '_ {
        let least = self.least[atom as usize];
        (0..)
            .zip(&self.least)
            .filter(move |&(_, &other)| other == least)
            .map(|(atom, _)| atom)
    }
}

struct Automorphisms<'g> {
    graph: &'g Graph,
    kept: Kept,
    fixed: &'g [u32],
    colours: Vec<u64>,
    /// Forest of alike atoms, each root the least of its tree.
    parent: Vec<u32>,
    trials: usize,
}

impl<'g> Automorphisms<'g> {
    fn new(graph: &'g Graph, kept: Kept, fixed: &'g [u32]) -> Self {
        let atoms = 0..graph.atoms() as u32;
        let mut colours: Vec<u64> = atoms.clone().map(|atom| label(graph, kept, atom)).collect();
        for (place, &atom) in (1..).zip(fixed) {
            colours[atom as usize] = mix(colours[atom as usize], place);
        }
        refine(graph, kept, &mut colours);
        Self {
            graph,
            kept,
            fixed,
            colours,
            parent: atoms.collect(),
            trials: 0,
        }
    }

    /// Tries to move every atom to the first of each tree of its colour.
    fn find(&mut self) {
        let mut order: Vec<u32> = (0..self.colours.len() as u32).collect();
        order.sort_by_key(|&atom| (self.colours[atom as usize], atom));
        let colours = self.colours.clone();
        for cell in
            order.chunk_by(|&first, &second| colours[first as usize] == colours[second as usize])
        {
            for (index, &atom) in cell.iter().enumerate() {
                for &other in &cell[..index] {
                    if self.trials >= MOST_TRIALS || find(&self.parent, atom) != atom {
                        break;
                    }
                    if find(&self.parent, other) == other {
                        self.trials += 1;
                        self.try_to_move(other, atom);
                    }
                }
            }
        }
    }

    /// Looks for an automorphism that moves `from` to `to`, without backtracking, and joins what it moves.
    fn try_to_move(&mut self, from: u32, to: u32) {
        let mut domain = self.colours.clone();
        let mut range = self.colours.clone();
        let mut next = (from, to);
        for place in 1.. {
            domain[next.0 as usize] = mix(domain[next.0 as usize], place);
            range[next.1 as usize] = mix(range[next.1 as usize], place);
            refine(self.graph, self.kept, &mut domain);
            refine(self.graph, self.kept, &mut range);
            let (sources, targets) = (sorted(&domain), sorted(&range));
            let colour = |colours: &[u64], atom: u32| colours[atom as usize];
            let agree = sources
                .iter()
                .zip(&targets)
                .all(|(&s, &t)| colour(&domain, s) == colour(&range, t));
            if !agree {
                return;
            }
            let alike = sources
                .windows(2)
                .position(|pair| colour(&domain, pair[0]) == colour(&domain, pair[1]));
            let Some(position) = alike else {
                self.join(&sources, &targets);
                return;
            };
            // An atom is best left where it is: the automorphism then moves little, and later ones add to it.
            let source = sources[position];
            let stays = colour(&range, source) == colour(&domain, source);
            next = (source, if stays { source } else { targets[position] });
        }
    }

    /// Joins the cycles of a permutation if it is an automorphism.
    fn join(&mut self, sources: &[u32], targets: &[u32]) {
        let mut image = vec![0; sources.len()];
        for (&source, &target) in sources.iter().zip(targets) {
            image[source as usize] = target;
        }
        let rests = self.fixed.iter().all(|&atom| image[atom as usize] == atom);
        let valid = rests
            && sources.iter().all(|&atom| {
                label(self.graph, self.kept, atom)
                    == label(self.graph, self.kept, image[atom as usize])
                    && self.graph.degree(atom) == self.graph.degree(image[atom as usize])
                    && self.graph.neighbours(atom).iter().all(|near| {
                        let class = self
                            .graph
                            .class_between(image[atom as usize], image[near.atom as usize]);
                        class.is_some_and(|class| !self.kept.orders || class == near.class)
                    })
            });
        if valid {
            for (&source, &target) in sources.iter().zip(targets) {
                let (first, second) = (find(&self.parent, source), find(&self.parent, target));
                self.parent[first.max(second) as usize] = first.min(second);
            }
        }
    }
}

fn find(parent: &[u32], atom: u32) -> u32 {
    let mut root = atom;
    while parent[root as usize] != root {
        root = parent[root as usize];
    }
    root
}

/// Atoms by colour, then number.
fn sorted(colours: &[u64]) -> Vec<u32> {
    let mut atoms: Vec<u32> = (0..colours.len() as u32).collect();
    atoms.sort_unstable_by_key(|&atom| (colours[atom as usize], atom));
    atoms
}

/// The labels of an atom that count, as one number without loss.
fn label(graph: &Graph, kept: Kept, atom: u32) -> u64 {
    let hydrogens = if kept.hydrogens {
        graph.hydrogens(atom)
    } else {
        0
    };
    let mark = if kept.marks { graph.mark(atom) } else { 0 };
    u64::from(graph.is_absent(atom)) << 48
        | u64::from(mark) << 16
        | u64::from(hydrogens) << 8
        | u64::from(graph.element(atom))
}

/// Mixes neighbours into the colours until the number of colours stands still.
fn refine(graph: &Graph, kept: Kept, colours: &mut Vec<u64>) {
    let mut next = colours.clone();
    let mut scratch = colours.clone();
    let mut number = count(colours, &mut scratch);
    while number < colours.len() {
        for (atom, next) in (0..).zip(&mut next) {
            let around = graph.neighbours(atom).iter().fold(0_u64, |sum, near| {
                let class = if kept.orders {
                    u64::from(near.class)
                } else {
                    0
                };
                sum.wrapping_add(mix(colours[near.atom as usize], class))
            });
            *next = mix(colours[atom as usize], around);
        }
        let refined = count(&next, &mut scratch);
        if refined <= number {
            return;
        }
        number = refined;
        std::mem::swap(colours, &mut next);
    }
}

/// The number of different colours.
fn count(colours: &[u64], scratch: &mut [u64]) -> usize {
    scratch.copy_from_slice(colours);
    scratch.sort_unstable();
    scratch.chunk_by(|first, second| first == second).count()
}

/// A fixed bijective mixing of the sum, after the finaliser of Steele, Lea & Flood's SplitMix (OOPSLA 2014).
pub(super) fn mix(colour: u64, other: u64) -> u64 {
    let mut mixed = colour
        .wrapping_mul(0x9e37_79b9_7f4a_7c15)
        .wrapping_add(other ^ 0x2545_f491_4f6c_dd1d);
    mixed = (mixed ^ (mixed >> 30)).wrapping_mul(0xbf58_476d_1ce4_e5b9);
    mixed = (mixed ^ (mixed >> 27)).wrapping_mul(0x94d0_49bb_1331_11eb);
    mixed ^ (mixed >> 31)
}
