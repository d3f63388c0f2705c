//! The linear assignment of left to right atoms, element by element, solved again after small changes.
//!
//! Maximises the summed profit of the chosen pairs. Duals and assignment are kept between calls: only atoms whose profits
//! changed are assigned anew, along shortest augmenting paths (Jonker & Volgenant, Computing 38, 325 (1987)). The sum of
//! the duals is at least the profit of any assignment.
//!
//! A column is a right atom; the columns of one element stand side by side.

use super::{
    domain::Domain,
    meter::Meter,
    pairs::{PairIndex, Pairs},
    problem::Problem,
};

const NONE: u32 = u32::MAX;

/// So many pairs looked at count as one step.
const PAIRS_A_STEP: usize = 32;

/// A right atom with its dual, and where the present search for a path stands with it.
#[derive(Debug, Clone, Copy)]
struct Column {
    dual: i64,
    /// The left atom that has it.
    owner: u32,
    /// The left atom from which the path comes.
    before: u32,
    distance: i64,
}

/// What can be put back with [`Assignment::restore`].
#[derive(Debug, Clone)]
pub(super) struct Duals {
    left: Vec<i64>,
    columns: Vec<Column>,
    image: Vec<u32>,
}

/// An assignment with its dual prices: `left + right >= profit` for every possible pair once solved, equal for chosen ones.
#[derive(Debug)]
pub(super) struct Assignment {
    duals: Duals,
    /// Column of each right atom, and right atom of each column.
    column_of: Vec<u32>,
    right_of: Vec<u32>,
    /// What makes a pair of a left atom its column, modulo 2^32.
    offset: Vec<u32>,
    /// Left atoms whose profits or possibilities changed since they were last assigned.
    stale: Vec<bool>,
    any_stale: bool,
    /// Columns at the present distance that are yet to be looked at, and those that were.
    ready: Vec<u32>,
    done: Vec<u32>,
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
    pub(super) fn new(problem: &Problem, pairs: &Pairs) -> Self {
        let atoms = problem.left.atoms();
        let mut column_of = vec![0; atoms];
        let mut offset = vec![0; atoms];
        let mut right_of = Vec::with_capacity(atoms);
        for class in &problem.classes {
            let first = right_of.len() as u32;
            for &left in &class.left {
                offset[left as usize] = first.wrapping_sub(pairs.of(left, class.right[0]));
            }
            for &right in &class.right {
                column_of[right as usize] = right_of.len() as u32;
                right_of.push(right);
            }
        }
        let column = Column {
            dual: 0,
            owner: NONE,
            before: NONE,
            distance: i64::MAX,
        };
        Self {
            duals: Duals {
                left: vec![0; atoms],
                columns: vec![column; atoms],
                image: vec![NONE; atoms],
            },
            column_of,
            right_of,
            offset,
            stale: vec![true; atoms],
            any_stale: true,
            ready: Vec::new(),
            done: Vec::new(),
        }
    }

    /// Notes a new profit of a pair. If it is neither chosen nor above its duals, nothing changes.
    pub(super) fn note_profit(&mut self, atoms: (u32, u32), profit: i64) {
        if self.duals.image[atoms.0 as usize] == atoms.1 || self.slack(atoms, profit) < 0 {
            self.touch(atoms.0);
        }
    }

    /// Notes that a pair is no longer possible.
    pub(super) fn note_removal(&mut self, atoms: (u32, u32)) {
        if self.duals.image[atoms.0 as usize] == atoms.1 {
            self.touch(atoms.0);
        }
    }

    fn touch(&mut self, left: u32) {
        self.stale[left as usize] = true;
        self.any_stale = true;
    }

    pub(super) fn is_stale(&self) -> bool {
        self.any_stale
    }

    /// The sum of the duals: no assignment has a higher profit.
    pub(super) fn value(&self) -> i64 {
        let right = self.duals.columns.iter().map(|column| column.dual);
        self.duals.left.iter().sum::<i64>() + right.sum::<i64>()
    }

    /// The chosen right atom of each left atom. Complete after a successful [`Assignment::solve`].
    pub(super) fn image(&self) -> &[u32] {
        &self.duals.image
    }

    /// By how much the profit of a pair may grow before the bound grows.
    pub(super) fn slack(&self, atoms: (u32, u32), profit: i64) -> i64 {
        let column = self.column_of[atoms.1 as usize];
        self.duals.left[atoms.0 as usize] + self.duals.columns[column as usize].dual - profit
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
        let mut first = 0;
        let mut looked_at = 0;
        let mut possible = true;
        for class in &input.problem.classes {
            let columns = first..first + class.right.len();
            first = columns.end;
            for &left in &class.left {
                if self.stale[left as usize] {
                    self.price(left, input);
                    looked_at += input.domain.pairs_of(left).len();
                }
            }
            for &left in &class.left {
                if std::mem::take(&mut self.stale[left as usize])
                    && self.duals.image[left as usize] == NONE
                {
                    possible &= self.augment(left, columns.clone(), input, &mut looked_at);
                }
            }
        }
        meter.spend(1 + looked_at / PAIRS_A_STEP);
        self.any_stale = false;
        possible
    }

    /// Gives a left atom the least valid dual and frees it if its chosen pair is no longer the best.
    fn price(&mut self, left: u32, input: Input<'_>) {
        let offset = self.offset[left as usize];
        let mut best = i64::MIN;
        for &pair in input.domain.pairs_of(left) {
            let column = &self.duals.columns[pair.wrapping_add(offset) as usize];
            best = best.max(input.profit[pair as usize] - column.dual);
        }
        let image = self.duals.image[left as usize];
        if image != NONE {
            let pair = input.pairs.of(left, image);
            let column = &mut self.duals.columns[self.column_of[image as usize] as usize];
            let own = input.profit[pair as usize] - column.dual;
            if !input.domain.contains(pair) || own < best {
                self.duals.image[left as usize] = NONE;
                column.owner = NONE;
            }
        }
        // An atom without possibilities makes the augmentation fail; its dual is of no use then.
        self.duals.left[left as usize] = best.max(i64::MIN / 4);
    }

    /// Finds the cheapest way to give a free left atom a column and moves the atoms on that way.
    fn augment(
        &mut self,
        left: u32,
        columns: std::ops::Range<usize>,
        input: Input<'_>,
        looked_at: &mut usize,
    ) -> bool {
        for column in &mut self.duals.columns[columns.clone()] {
            column.distance = i64::MAX;
        }
        *looked_at += columns.len() / 2;
        self.ready.clear();
        self.done.clear();
        let mut current = left;
        let mut reached = 0;
        loop {
            *looked_at += input.domain.pairs_of(current).len();
            let mut free = self.relax(current, reached, input);
            if free.is_none() && self.ready.is_empty() {
                *looked_at += columns.len();
                let Some(next) = self.next_distance(columns.clone(), reached) else {
                    return false;
                };
                reached = next;
                free = self.make_ready(columns.clone(), reached);
            }
            if let Some(free) = free {
                self.move_duals(left, reached);
                self.flip(free);
                return true;
            }
            let Some(column) = self.ready.pop() else {
                return false;
            };
            self.done.push(column);
            current = self.duals.columns[column as usize].owner;
        }
    }

    /// Shortens the ways to columns by going over `current`, which is `reached` away. Returns a free column at that
    /// distance; the others there become ready.
    fn relax(&mut self, current: u32, reached: i64, input: Input<'_>) -> Option<u32> {
        let dual = self.duals.left[current as usize] + reached;
        let offset = self.offset[current as usize];
        for &pair in input.domain.pairs_of(current) {
            let index = pair.wrapping_add(offset);
            let column = &mut self.duals.columns[index as usize];
            let distance = dual + column.dual - input.profit[pair as usize];
            if distance < column.distance {
                column.distance = distance;
                column.before = current;
                if distance == reached {
                    if column.owner == NONE {
                        return Some(index);
                    }
                    self.ready.push(index);
                }
            }
        }
        None
    }

    /// The least distance beyond `reached`, up to which all columns are done.
    fn next_distance(&self, columns: std::ops::Range<usize>, reached: i64) -> Option<i64> {
        let distances = self.duals.columns[columns]
            .iter()
            .map(|column| column.distance);
        let next = distances.filter(|&distance| distance > reached).min();
        next.filter(|&next| next < i64::MAX)
    }

    /// Returns a free column at a distance, or makes all columns there ready.
    fn make_ready(&mut self, columns: std::ops::Range<usize>, distance: i64) -> Option<u32> {
        let first = columns.start as u32;
        for (index, column) in (first..).zip(&self.duals.columns[columns]) {
            if column.distance == distance {
                if column.owner == NONE {
                    return Some(index);
                }
                self.ready.push(index);
            }
        }
        None
    }

    /// Makes the pairs on all shortest ways up to `reached` tight.
    fn move_duals(&mut self, left: u32, reached: i64) {
        self.duals.left[left as usize] -= reached;
        for &column in &self.done {
            let column = &mut self.duals.columns[column as usize];
            let by = reached - column.distance;
            column.dual += by;
            self.duals.left[column.owner as usize] -= by;
        }
    }

    /// Moves every left atom on the way to a column one step on.
    fn flip(&mut self, column: u32) {
        let mut column = column;
        loop {
            let left = self.duals.columns[column as usize].before;
            self.duals.columns[column as usize].owner = left;
            let right = self.right_of[column as usize];
            let old = std::mem::replace(&mut self.duals.image[left as usize], right);
            if old == NONE {
                return;
            }
            column = self.column_of[old as usize];
        }
    }
}

/// The pair that the assignment chose for a left atom.
pub(super) fn chosen(assignment: &Assignment, pairs: &Pairs, left: u32) -> PairIndex {
    pairs.of(left, assignment.duals.image[left as usize])
}
