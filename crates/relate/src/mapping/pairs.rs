//! Which atom may be laid on which, and which pairs share the reward of a kept bond.

use super::problem::Problem;

/// Stands for "no pair" in [`Pairs::partner`]; one past the last pair, so that a table of pairs can hold an entry for it.
pub(super) type PairIndex = u32;

/// All pairs (left atom, right atom) of one element, with a block of slots for each.
///
/// The slots of a pair form a matrix of its left atom's neighbours against its right atom's neighbours. A slot stands for
/// the bond to the one neighbour laid on the bond to the other; the pair of the two neighbours has a slot for the same two
/// bonds, the mirror.
#[derive(Debug)]
pub(super) struct Pairs {
    /// Left and right atom of each pair.
    atoms: Vec<(u32, u32)>,
    /// First pair of each left atom; its other pairs follow.
    first: Vec<u32>,
    /// Place of each right atom among those of its element.
    rank: Vec<u32>,
    /// Pair `p` owns the slots `block[p]..block[p + 1]`.
    block: Vec<u32>,
    /// The pair of the two neighbours, or [`Pairs::none`] if their elements differ.
    partner: Vec<PairIndex>,
    /// The slot of the partner for the same two bonds.
    mirror: Vec<u32>,
    /// Whether the two bonds have the same order class.
    same: Vec<bool>,
}

impl Pairs {
    /// Lists all pairs, or nothing if they or their slots are more than the limits.
    pub(super) fn new(problem: &Problem, most_pairs: usize, most_slots: usize) -> Option<Self> {
        let (pairs, slots) = size(problem)?;
        if pairs > most_pairs || slots > most_slots {
            return None;
        }
        let mut table = Self {
            atoms: Vec::with_capacity(pairs),
            first: vec![0; problem.left.atoms()],
            rank: vec![0; problem.right.atoms()],
            block: Vec::with_capacity(pairs + 1),
            partner: Vec::with_capacity(slots),
            mirror: Vec::with_capacity(slots),
            same: Vec::with_capacity(slots),
        };
        let mut next_slot = 0;
        for class in &problem.classes {
            for (rank, &right) in (0..).zip(&class.right) {
                table.rank[right as usize] = rank;
            }
            for &left in &class.left {
                table.first[left as usize] = table.atoms.len() as u32;
                for &right in &class.right {
                    table.atoms.push((left, right));
                    table.block.push(next_slot);
                    next_slot += (problem.left.degree(left) * problem.right.degree(right)) as u32;
                }
            }
        }
        table.block.push(next_slot);
        table.fill_slots(problem);
        Some(table)
    }

    fn fill_slots(&mut self, problem: &Problem) {
        for pair in 0..self.atoms.len() {
            let (left, right) = self.atoms[pair];
            for near in problem.left.neighbours(left) {
                for far in problem.right.neighbours(right) {
                    let fits = problem.left.element(near.atom) == problem.right.element(far.atom);
                    let partner = if fits {
                        self.of(near.atom, far.atom)
                    } else {
                        self.none()
                    };
                    let mirror = if fits {
                        self.slot_of(problem, partner, left, right)
                    } else {
                        0
                    };
                    self.partner.push(partner);
                    self.mirror.push(mirror);
                    self.same.push(near.class == far.class);
                }
            }
        }
    }

    /// The slot of `pair` that stands for the bonds to `left` and `right`.
    fn slot_of(&self, problem: &Problem, pair: PairIndex, left: u32, right: u32) -> u32 {
        let (own_left, own_right) = self.atoms(pair);
        let row = problem
            .left
            .neighbours(own_left)
            .partition_point(|near| near.atom < left);
        let column = problem
            .right
            .neighbours(own_right)
            .partition_point(|far| far.atom < right);
        self.block[pair as usize] + (row * problem.right.degree(own_right) + column) as u32
    }

    pub(super) fn len(&self) -> usize {
        self.atoms.len()
    }

    pub(super) fn slots(&self) -> usize {
        self.partner.len()
    }

    /// The index that stands for no pair.
    pub(super) fn none(&self) -> PairIndex {
        self.atoms.len() as PairIndex
    }

    /// The pair of two atoms of one element.
    pub(super) fn of(&self, left: u32, right: u32) -> PairIndex {
        self.first[left as usize] + self.rank[right as usize]
    }

    pub(super) fn atoms(&self, pair: PairIndex) -> (u32, u32) {
        self.atoms[pair as usize]
    }

    /// The partners of all slots of a pair.
    pub(super) fn partners(&self, pair: PairIndex) -> &[PairIndex] {
        &self.partner[self.block(pair)]
    }

    /// The slots of a pair, row by row.
    pub(super) fn block(&self, pair: PairIndex) -> std::ops::Range<usize> {
        self.block[pair as usize] as usize..self.block[pair as usize + 1] as usize
    }

    /// The pair that shares the reward of a slot, or [`Pairs::none`].
    pub(super) fn partner(&self, slot: usize) -> PairIndex {
        self.partner[slot]
    }

    /// The two neighbours of a slot, if they can be laid on each other.
    pub(super) fn partner_atoms(&self, slot: usize) -> Option<(u32, u32)> {
        self.atoms.get(self.partner[slot] as usize).copied()
    }

    /// The partner's slot for the same two bonds. Meaningless without a partner.
    pub(super) fn mirror(&self, slot: usize) -> usize {
        self.mirror[slot] as usize
    }

    /// Whether the two bonds of a slot have the same order class.
    pub(super) fn same(&self, slot: usize) -> bool {
        self.same[slot]
    }
}

/// The number of pairs and of slots, if they can be counted.
fn size(problem: &Problem) -> Option<(usize, usize)> {
    let mut pairs = 0_usize;
    let mut slots = 0_usize;
    for class in &problem.classes {
        let left: usize = class
            .left
            .iter()
            .map(|&atom| problem.left.degree(atom))
            .sum();
        let right: usize = class
            .right
            .iter()
            .map(|&atom| problem.right.degree(atom))
            .sum();
        pairs = pairs.checked_add(class.left.len().checked_mul(class.right.len())?)?;
        slots = slots.checked_add(left.checked_mul(right)?)?;
    }
    Some((pairs, slots))
}
