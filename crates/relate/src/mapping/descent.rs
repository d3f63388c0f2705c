//! Steps of the subgradient method: they bring the bound where single shares can no longer.
//!
//! The ascent stops where no share can move for nothing, often well above the least bound that shares can give. There the
//! assignment disagrees with itself: one pair counts on a kept bond whose other pair is not chosen. A step moves shares
//! against all disagreements at once (Held & Karp, Math. Program. 1, 6 (1971)), by Polyak's length, along a direction that
//! keeps a part of the last one where the two oppose each other (Camerini, Fratta & Maffioli, Math. Program. Study 3, 26
//! (1975)). A step may raise the bound; over many it falls to the least.

use super::{assignment, bound::Bound, local, meter::Meter};

/// A disagreement in the direction; parts of it are what is left of earlier ones.
const UNIT: i64 = 256;
/// Parts of a disagreement below this are dropped.
const LEAST_PART: i64 = UNIT / 16;

/// The length of a step, as a part of the length that would reach the target if the bound were linear.
#[derive(Debug, Clone, Copy)]
pub(super) struct Pace(u64);

impl Pace {
    const WHOLE: u64 = 1 << 20;

    /// Twice what would reach the target.
    pub(super) fn start() -> Self {
        Self(2 * Self::WHOLE)
    }

    /// Shorter by one part in `parts`; nothing when steps have become too short to help.
    pub(super) fn shorter(self, parts: u64) -> Option<Self> {
        let pace = self.0 - self.0 / parts;
        (pace >= Self::WHOLE / 32).then_some(Self(pace))
    }

    fn of(self, gap: i64) -> i64 {
        // At most twice the gap, which is far from overflowing.
        (i128::from(gap) * i128::from(self.0) / i128::from(Self::WHOLE)) as i64
    }
}

/// Where the last step went.
#[derive(Debug)]
pub(super) struct Direction {
    /// By slot below its mirror: what it gained from the mirror, in parts of [`UNIT`].
    way: Vec<i32>,
    /// The slots with a way, each once.
    moving: Vec<usize>,
    is_moving: Vec<bool>,
    /// Slots that the assignment counts on, and a list of them.
    used: Vec<bool>,
    used_slots: Vec<usize>,
    /// Scratch of the matching.
    places: Vec<usize>,
}

impl Direction {
    pub(super) fn new(slots: usize) -> Self {
        Self {
            way: vec![0; slots],
            moving: Vec::new(),
            is_moving: vec![false; slots],
            used: vec![false; slots],
            used_slots: Vec::new(),
            places: Vec::new(),
        }
    }

    /// Forgets the last step.
    pub(super) fn forget(&mut self) {
        for slot in self.moving.drain(..) {
            self.way[slot] = 0;
            self.is_moving[slot] = false;
        }
    }

    /// Turns the direction against the disagreements: `slot` of each should lose to its mirror.
    fn turn(&mut self, disagreements: &[(usize, usize)]) {
        let along = |&(slot, mirror): &(usize, usize)| {
            let (key, sign) = key(slot, mirror);
            sign * i64::from(self.way[key])
        };
        let product: i64 = disagreements.iter().map(along).sum();
        let length = self.squared_length();
        for &slot in &self.moving {
            // Deflected by one and a half times what makes the two orthogonal.
            self.way[slot] = if product < 0 {
                (i64::from(self.way[slot]) * (-3 * product * UNIT) / (2 * length)) as i32
            } else {
                0
            };
        }
        for &(slot, mirror) in disagreements {
            let (key, sign) = key(slot, mirror);
            if !std::mem::replace(&mut self.is_moving[key], true) {
                self.moving.push(key);
            }
            self.way[key] += (sign * UNIT) as i32;
        }
        let (way, is_moving) = (&mut self.way, &mut self.is_moving);
        self.moving.retain(|&slot| {
            let stays = i64::from(way[slot]).abs() >= LEAST_PART;
            if !stays {
                way[slot] = 0;
                is_moving[slot] = false;
            }
            stays
        });
    }

    fn squared_length(&self) -> i64 {
        let square = |&slot: &usize| i64::from(self.way[slot]).pow(2);
        self.moving.iter().map(square).sum::<i64>().max(1)
    }
}

/// The slot under which a way is kept, and the sign of a loss of `slot` there.
fn key(slot: usize, mirror: usize) -> (usize, i64) {
    if slot < mirror {
        (slot, -1)
    } else {
        (mirror, 1)
    }
}

impl Bound<'_> {
    /// Takes one step towards `target`. Settle afterwards.
    ///
    /// Returns false if the assignment agrees with itself: then it earns what the bound says.
    pub(super) fn descend(&mut self, target: i64, pace: Pace, meter: &mut Meter<'_>) -> bool {
        self.find_used(meter);
        let used = &self.direction.used;
        let slots = self.direction.used_slots.iter();
        let disagreements: Vec<(usize, usize)> = slots
            .map(|&slot| (slot, self.pairs.mirror(slot)))
            .filter(|&(_, mirror)| !used[mirror])
            .collect();
        if disagreements.is_empty() {
            return false;
        }
        self.direction.turn(&disagreements);
        let length = self.direction.squared_length();
        let gap = pace.of(self.value() - target);
        for index in 0..self.direction.moving.len() {
            let slot = self.direction.moving[index];
            let way = i64::from(self.direction.way[slot]);
            let mirror = self.pairs.mirror(slot);
            let (to, from) = if way > 0 {
                (slot, mirror)
            } else {
                (mirror, slot)
            };
            self.move_share(to, from, gap * way.abs() * UNIT / length);
        }
        true
    }

    /// Lists the slots that the chosen pairs count on; of equal matchings, those that other chosen pairs agree with.
    fn find_used(&mut self, meter: &mut Meter<'_>) {
        for slot in self.direction.used_slots.drain(..) {
            self.direction.used[slot] = false;
        }
        for left in 0..self.problem.left.atoms() as u32 {
            let pair = assignment::chosen(&self.assignment, self.pairs, left);
            let (rows, columns) = self.gather(pair, meter);
            let block = self.pairs.block(pair);
            for (weight, slot) in self.weights.iter_mut().zip(block.clone()) {
                let agreed = self
                    .pairs
                    .partner_atoms(slot)
                    .is_some_and(|(near, far)| self.assignment.image()[near as usize] == far);
                *weight = *weight * 8 + i32::from(agreed);
            }
            local::choose(&self.weights, rows, columns, &mut self.direction.places);
            for &place in &self.direction.places {
                let slot = block.start + place;
                if self.domain.contains(self.pairs.partner(slot)) {
                    self.direction.used[slot] = true;
                    self.direction.used_slots.push(slot);
                }
            }
        }
    }
}
