//! Numbers that look random and are the same in every run.

/// A xorshift generator (Marsaglia, J. Stat. Softw. 2003, 8 (14)) with a fixed seed.
#[derive(Debug, Clone)]
pub struct Numbers(u64);

impl Numbers {
    /// The sequence of a seed. Neighbouring seeds give unlike sequences.
    pub fn new(seed: u64) -> Self {
        // The finaliser of splitmix64 spreads small seeds over all bits; zero is xorshift's one
        // fixed point, so the lowest bit is set.
        let mut state = seed.wrapping_add(0x9e37_79b9_7f4a_7c15);
        state = (state ^ (state >> 30)).wrapping_mul(0xbf58_476d_1ce4_e5b9);
        state = (state ^ (state >> 27)).wrapping_mul(0x94d0_49bb_1331_11eb);
        Self((state ^ (state >> 31)) | 1)
    }

    /// A number below `end`, which is not 0.
    pub fn below(&mut self, end: usize) -> usize {
        self.0 ^= self.0 << 13;
        self.0 ^= self.0 >> 7;
        self.0 ^= self.0 << 17;
        ((self.0 >> 33) % end as u64) as usize
    }

    /// One way or the other.
    pub fn coin(&mut self) -> bool {
        self.below(2) == 1
    }

    /// Puts a slice into some order.
    pub fn shuffle<T>(&mut self, items: &mut [T]) {
        for index in (1..items.len()).rev() {
            items.swap(index, self.below(index + 1));
        }
    }

    /// The numbers below `end` in some order.
    pub fn order(&mut self, end: usize) -> Vec<u32> {
        let mut order: Vec<u32> = (0..end as u32).collect();
        self.shuffle(&mut order);
        order
    }
}
