//! The linear assignment of left to right atoms, element by element, solved again after small changes.
//!
//! Maximises the summed profit of the chosen pairs. Duals and assignment are kept between calls: only atoms whose profits
//! changed are assigned anew, along shortest augmenting paths (Jonker & Volgenant, Computing 38, 325 (1987)). The sum of
//! the duals is at least the profit of any assignment.

use super::{
    domain::Domain,
    meter::Meter,
    pairs::{PairIndex, Pairs},
    problem::{Class, Problem},
};

const NONE: u32 = u32::MAX;

/// What can be put back with [`Assignment::restore`].
#[derive(Debug, Clone)]
pub(super) struct Duals {
    left: Vec<i64>,
    right: Vec<i64>,
    image: Vec<u32>,
    origin: Vec<u32>,
}

/// An assignment with its dual prices: `left + right >= profit` for every possible pair once solved, equal for chosen ones.
#[derive(Debug)]
pub(super) struct Assignment {
    duals: Duals,
    /// Left atoms whose profits or possibilities changed since they were last assigned.
    stale: Vec<bool>,
    any_stale: bool,
    path: Path,
}

/// Scratch of the shortest-path search, by right atom.
#[derive(Debug)]
struct Path {
    distance: Vec<i64>,
    before: Vec<u32>,
    done: Vec<bool>,
}

/// What the solver reads.
#[derive(Clone, Copy)]
pub(super) struct Input<'p> {
    pub(super) problem: &'p Problem,
    pub(super) pairs: &'p Pairs,
    pub(super) domain: &'p Domain,
    pub(super) profit: &'p [i64],
}

impl Assignment {
    pub(super) fn new(atoms: usize) -> Self {
        Self {
            duals: Duals {
                left: vec![0; atoms],
                right: vec![0; atoms],
                image: vec![NONE; atoms],
                origin: vec![NONE; atoms],
            },
            stale: vec![true; atoms],
            any_stale: true,
            path: Path {
                distance: vec![i64::MAX; atoms],
                before: vec![NONE; atoms],
                done: vec![false; atoms],
            },
        }
    }

    /// Notes that the profits or possibilities of a left atom changed.
    pub(super) fn touch(&mut self, left: u32) {
        self.stale[left as usize] = true;
        self.any_stale = true;
    }

    pub(super) fn is_stale(&self) -> bool {
        self.any_stale
    }

    /// The sum of the duals: no assignment has a higher profit.
    pub(super) fn value(&self) -> i64 {
        self.duals.left.iter().sum::<i64>() + self.duals.right.iter().sum::<i64>()
    }

    /// The chosen right atom of each left atom. Complete after a successful [`Assignment::solve`].
    pub(super) fn image(&self) -> &[u32] {
        &self.duals.image
    }

    /// By how much the profit of a pair may grow before the bound grows.
    pub(super) fn slack(&self, atoms: (u32, u32), profit: i64) -> i64 {
        self.duals.left[atoms.0 as usize] + self.duals.right[atoms.1 as usize] - profit
    }

    pub(super) fn duals(&self) -> &Duals {
        &self.duals
    }

    /// Goes back to an earlier state, in which nothing was stale.
    pub(super) fn restore(&mut self, duals: &Duals) {
        self.duals.clone_from(duals);
        self.stale.fill(false);
        self.any_stale = false;
    }

    /// Assigns all atoms. Returns false if that is impossible.
    pub(super) fn solve(&mut self, input: Input<'_>, meter: &mut Meter<'_>) -> bool {
        for class in &input.problem.classes {
            for &left in &class.left {
                if self.stale[left as usize] {
                    self.price(left, input);
                    meter.spend(1 + input.domain.pairs_of(left).len() / 32);
                }
            }
            for &left in &class.left {
                if self.stale[left as usize] {
                    self.stale[left as usize] = false;
                    if self.duals.image[left as usize] == NONE
                        && !self.augment(left, class, input, meter)
                    {
                        return false;
                    }
                }
            }
        }
        self.any_stale = false;
        true
    }

    /// Gives a left atom the least valid dual and frees it if its chosen pair is no longer the best.
    fn price(&mut self, left: u32, input: Input<'_>) {
        let mut best = i64::MIN;
        for &pair in input.domain.pairs_of(left) {
            let (_, right) = input.pairs.atoms(pair);
            best = best.max(input.profit[pair as usize] - self.duals.right[right as usize]);
        }
        let image = self.duals.image[left as usize];
        if image != NONE {
            let pair = input.pairs.of(left, image);
            let own = input.profit[pair as usize] - self.duals.right[image as usize];
            if !input.domain.contains(pair) || own < best {
                self.duals.image[left as usize] = NONE;
                self.duals.origin[image as usize] = NONE;
            }
        }
        // An atom without possibilities makes the augmentation fail; its dual is of no use then.
        self.duals.left[left as usize] = best.max(i64::MIN / 4);
    }

    /// Finds the cheapest way to give a free left atom a right atom and moves the atoms on that way.
    fn augment(
        &mut self,
        left: u32,
        class: &Class,
        input: Input<'_>,
        meter: &mut Meter<'_>,
    ) -> bool {
        for &right in &class.right {
            self.path.distance[right as usize] = i64::MAX;
            self.path.done[right as usize] = false;
        }
        let mut current = left;
        let mut reached = 0;
        loop {
            self.relax(current, reached, input);
            meter.spend(1 + (class.right.len() + input.domain.pairs_of(current).len()) / 32);
            let Some(nearest) = self.nearest(class) else {
                return false;
            };
            reached = self.path.distance[nearest as usize];
            let owner = self.duals.origin[nearest as usize];
            if owner == NONE {
                self.move_duals(left, reached, class);
                self.flip(nearest);
                return true;
            }
            self.path.done[nearest as usize] = true;
            current = owner;
        }
    }

    /// Shortens the ways to right atoms by going over `current`, which is `reached` away.
    fn relax(&mut self, current: u32, reached: i64, input: Input<'_>) {
        let dual = self.duals.left[current as usize] + reached;
        for &pair in input.domain.pairs_of(current) {
            let (_, right) = input.pairs.atoms(pair);
            let right = right as usize;
            let distance = dual + self.duals.right[right] - input.profit[pair as usize];
            if !self.path.done[right] && distance < self.path.distance[right] {
                self.path.distance[right] = distance;
                self.path.before[right] = current;
            }
        }
    }

    /// The nearest right atom that is not done, a free one if several are equally near.
    fn nearest(&self, class: &Class) -> Option<u32> {
        let open = class
            .right
            .iter()
            .copied()
            .filter(|&right| !self.path.done[right as usize]);
        open.map(|right| {
            (
                self.path.distance[right as usize],
                self.duals.origin[right as usize] != NONE,
                right,
            )
        })
        .filter(|&(distance, ..)| distance < i64::MAX)
        .min()
        .map(|(.., right)| right)
    }

    /// Makes the pairs on all shortest ways up to `reached` tight.
    fn move_duals(&mut self, left: u32, reached: i64, class: &Class) {
        self.duals.left[left as usize] -= reached;
        for &right in &class.right {
            if self.path.done[right as usize] {
                let by = reached - self.path.distance[right as usize];
                self.duals.right[right as usize] += by;
                let owner = self.duals.origin[right as usize];
                self.duals.left[owner as usize] -= by;
            }
        }
    }

    /// Moves every left atom on the way to `right` one step on.
    fn flip(&mut self, right: u32) {
        let mut right = right;
        while right != NONE {
            let left = self.path.before[right as usize];
            self.duals.origin[right as usize] = left;
            right = std::mem::replace(&mut self.duals.image[left as usize], right);
        }
    }
}

/// The pair that the assignment chose for a left atom.
pub(super) fn chosen(assignment: &Assignment, pairs: &Pairs, left: u32) -> PairIndex {
    pairs.of(left, assignment.duals.image[left as usize])
}
