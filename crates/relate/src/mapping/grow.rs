//! Good maps without a proof: grown from a first pair along the bonds.

use super::{
    problem::{Graph, Neighbour, Problem},
    symmetry::mix,
};

const NONE: u32 = u32::MAX;

/// Surroundings are compared up to this many bonds away.
const RADIUS: usize = 6;

/// At most so many free neighbours on either side are compared at a time.
const CHOICE: usize = 16;

/// Grows maps; holds what all of them need.
#[derive(Debug)]
pub(super) struct Grower<'p> {
    problem: &'p Problem,
    /// Levels of radius 0 to [`RADIUS`].
    levels: Vec<Level>,
}

/// The surroundings of all atoms up to one radius, as hashes (element and bonds only), and the atoms in their order.
#[derive(Debug)]
struct Level {
    left: Vec<u64>,
    right: Vec<u64>,
    left_order: Vec<u32>,
    right_order: Vec<u32>,
}

/// A map that is not complete yet.
struct Partial {
    image: Vec<u32>,
    taken: Vec<bool>,
    /// Pairs whose neighbours are yet to be laid.
    open: Vec<(u32, u32)>,
}

impl<'p> Grower<'p> {
    /// Compares the surroundings. Linear in the bonds, apart from sorting.
    pub(super) fn new(problem: &'p Problem) -> Self {
        let start = |graph: &Graph| {
            (0..graph.atoms() as u32)
                .map(|atom| u64::from(graph.element(atom)))
                .collect()
        };
        let mut levels = vec![Level::new(start(&problem.left), start(&problem.right))];
        for radius in 0..RADIUS {
            let inner = &levels[radius];
            let next = Level::new(
                widen(&problem.left, &inner.left),
                widen(&problem.right, &inner.right),
            );
            levels.push(next);
        }
        Self { problem, levels }
    }

    /// A map that lays like surroundings on each other, the widest first.
    pub(super) fn outline(&self) -> Vec<u32> {
        self.complete(Partial::new(self.problem.left.atoms()))
    }

    /// A map that holds the given pair.
    pub(super) fn around_pair(&self, left: u32, right: u32) -> Vec<u32> {
        let mut partial = Partial::new(self.problem.left.atoms());
        self.grow(&mut partial, left, right);
        self.complete(partial)
    }

    fn complete(&self, mut partial: Partial) -> Vec<u32> {
        for level in self.levels.iter().rev() {
            let mut others = level.right_order.iter().copied().peekable();
            for &left in &level.left_order {
                if partial.image[left as usize] != NONE {
                    continue;
                }
                let colour = level.left[left as usize];
                let useless = |&right: &u32| {
                    let other = level.right[right as usize];
                    other < colour || (other == colour && partial.taken[right as usize])
                };
                while others.next_if(useless).is_some() {}
                if let Some(&right) = others.peek()
                    && level.right[right as usize] == colour
                {
                    self.grow(&mut partial, left, right);
                }
            }
        }
        partial.image
    }

    /// Lays a pair and, from there outwards, the best pairs of neighbours.
    fn grow(&self, partial: &mut Partial, left: u32, right: u32) {
        partial.lay(left, right);
        let mut next = 0;
        while let Some(&(left, right)) = partial.open.get(next) {
            next += 1;
            while let Some((near, far)) = self.best_neighbours(partial, left, right) {
                partial.lay(near, far);
            }
        }
        partial.open.clear();
    }

    /// The free neighbours of a pair that fit best on each other.
    fn best_neighbours(&self, partial: &Partial, left: u32, right: u32) -> Option<(u32, u32)> {
        let mut best = None;
        let free = |near: &&Neighbour| partial.image[near.atom as usize] == NONE;
        let near = self.problem.left.neighbours(left).iter().filter(free);
        for near in near.take(CHOICE) {
            let free = |far: &&Neighbour| !partial.taken[far.atom as usize];
            let far = self.problem.right.neighbours(right).iter().filter(free);
            for far in far.take(CHOICE) {
                if self.problem.left.element(near.atom) != self.problem.right.element(far.atom) {
                    continue;
                }
                let fit = (
                    self.kept(partial, near.atom, far.atom),
                    self.likeness(near.atom, far.atom),
                    near.class == far.class,
                    std::cmp::Reverse(self.problem.atom_cost(near.atom, far.atom)),
                );
                if best.as_ref().is_none_or(|(least, _)| fit > *least) {
                    best = Some((fit, (near.atom, far.atom)));
                }
            }
        }
        best.map(|(_, pair)| pair)
    }

    /// The bonds to laid atoms that a pair would keep.
    fn kept(&self, partial: &Partial, left: u32, right: u32) -> usize {
        let near = self.problem.left.neighbours(left).iter();
        near.map(|near| partial.image[near.atom as usize])
            .filter(|&image| {
                image != NONE && self.problem.right.class_between(right, image).is_some()
            })
            .count()
    }

    /// Up to what radius the surroundings of two atoms are alike.
    fn likeness(&self, left: u32, right: u32) -> usize {
        let alike = |level: &&Level| level.left[left as usize] == level.right[right as usize];
        self.levels.iter().take_while(alike).count()
    }
}

impl Level {
    fn new(left: Vec<u64>, right: Vec<u64>) -> Self {
        Self {
            left_order: order(&left),
            right_order: order(&right),
            left,
            right,
        }
    }
}

impl Partial {
    fn new(atoms: usize) -> Self {
        Self {
            image: vec![NONE; atoms],
            taken: vec![false; atoms],
            open: Vec::new(),
        }
    }

    fn lay(&mut self, left: u32, right: u32) {
        self.image[left as usize] = right;
        self.taken[right as usize] = true;
        self.open.push((left, right));
    }
}

fn order(colours: &[u64]) -> Vec<u32> {
    let mut order: Vec<u32> = (0..colours.len() as u32).collect();
    order.sort_by_key(|&atom| colours[atom as usize]);
    order
}

/// The surroundings of one bond more.
fn widen(graph: &Graph, colours: &[u64]) -> Vec<u64> {
    let around = |atom: u32| {
        let near = graph.neighbours(atom).iter();
        near.fold(0_u64, |sum, near| {
            sum.wrapping_add(mix(colours[near.atom as usize], 1))
        })
    };
    (0..)
        .zip(colours)
        .map(|(atom, &colour)| mix(colour, around(atom)))
        .collect()
}
