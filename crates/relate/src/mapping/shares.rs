//! The shares of the rewards and the profits of the pairs, with their past.

use super::{
    goal::Weights,
    pairs::{PairIndex, Pairs},
};

/// What can be put back with [`Shares::undo`].
#[derive(Debug, Clone, Copy)]
pub(super) struct Mark {
    saved: usize,
}

/// A share for each slot and a profit for each pair; every change can be undone.
#[derive(Debug)]
pub(super) struct Shares<'p> {
    pairs: &'p Pairs,
    /// By slot, not negative; a slot and its mirror add up to the reward.
    share: Vec<i32>,
    profit: Vec<i64>,
    /// Pairs with their old profit, oldest first.
    old_profits: Vec<(PairIndex, i64)>,
    /// The old shares of these pairs, block after block.
    old_shares: Vec<i32>,
    /// By pair: the epoch in which it was last saved. An epoch ends with each mark and undoing.
    epoch_of: Vec<u64>,
    epoch: u64,
}

impl<'p> Shares<'p> {
    /// Splits the rewards half and half, or in proportion to earlier shares under other weights.
    pub(super) fn new(
        pairs: &'p Pairs,
        weights: Weights,
        earlier: Option<(&[i32], Weights)>,
    ) -> Self {
        let mut share = vec![0; pairs.slots()];
        for slot in 0..pairs.slots() {
            let mirror = pairs.mirror(slot);
            if pairs.partner(slot) == pairs.none() || mirror < slot {
                continue;
            }
            let reward = weights.reward(pairs.same(slot));
            let own = earlier.map_or(reward / 2, |(shares, earlier)| {
                let whole = i64::from(earlier.reward(pairs.same(slot)));
                // At most the reward, as the earlier share was at most the whole.
                (i64::from(shares[slot]) * i64::from(reward) / whole) as i32
            });
            share[slot] = own;
            share[mirror] = reward - own;
        }
        Self {
            pairs,
            share,
            profit: vec![0; pairs.len()],
            old_profits: Vec::new(),
            old_shares: Vec::new(),
            epoch_of: vec![0; pairs.len()],
            epoch: 0,
        }
    }

    /// The shares of all slots.
    pub(super) fn shares(&self) -> &[i32] {
        &self.share
    }

    /// The profits of all pairs.
    pub(super) fn profits(&self) -> &[i64] {
        &self.profit
    }

    pub(super) fn share(&self, slot: usize) -> i32 {
        self.share[slot]
    }

    pub(super) fn profit(&self, pair: PairIndex) -> i64 {
        self.profit[pair as usize]
    }

    pub(super) fn set_profit(&mut self, pair: PairIndex, profit: i64) {
        self.save(pair);
        self.profit[pair as usize] = profit;
    }

    /// Moves a part of the reward to a slot of `pair` from the mirror of the slot.
    pub(super) fn take(&mut self, pair: PairIndex, slot: usize, part: i32) {
        self.save(pair);
        self.save(self.pairs.partner(slot));
        self.share[slot] += part;
        self.share[self.pairs.mirror(slot)] -= part;
    }

    pub(super) fn mark(&mut self) -> Mark {
        self.epoch += 1;
        Mark {
            saved: self.old_profits.len(),
        }
    }

    /// Goes back to a mark.
    pub(super) fn undo(&mut self, mark: Mark) {
        self.epoch += 1;
        for (pair, profit) in self.old_profits.drain(mark.saved..).rev() {
            self.profit[pair as usize] = profit;
            let block = self.pairs.block(pair);
            let from = self.old_shares.len() - block.len();
            self.share[block].copy_from_slice(&self.old_shares[from..]);
            self.old_shares.truncate(from);
        }
    }

    /// Keeps the profit and shares of a pair, once an epoch. Before the first mark there is nothing to go back to.
    fn save(&mut self, pair: PairIndex) {
        if self.epoch_of[pair as usize] == self.epoch {
            return;
        }
        self.epoch_of[pair as usize] = self.epoch;
        self.old_profits.push((pair, self.profit[pair as usize]));
        self.old_shares
            .extend_from_slice(&self.share[self.pairs.block(pair)]);
    }
}
