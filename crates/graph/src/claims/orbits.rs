//! Orbits of variables under automorphisms, with signs.

use super::action::Action;

/// Orbits of variables, as a forest with the parity to the root.
#[derive(Debug, Default)]
pub(super) struct Orbits {
    /// Per variable: the least variable of its orbit.
    pub(super) root: Vec<usize>,
    /// Per least variable: whether some automorphism takes a variable of the orbit to itself and
    /// inverts it.
    pub(super) inverted: Vec<bool>,
    /// Per variable: the parity to what it hangs on in the forest.
    odd: Vec<bool>,
}

impl Orbits {
    pub(super) fn of(action: &Action, variables: usize) -> Self {
        let mut orbits = Self::default();
        orbits.load(action, variables);
        orbits
    }

    /// As [`Orbits::of`], in the memory at hand.
    pub(super) fn load(&mut self, action: &Action, variables: usize) {
        self.root.clear();
        self.root.extend(0..variables);
        for table in [&mut self.inverted, &mut self.odd] {
            table.clear();
            table.resize(variables, false);
        }
        for entry in action.moves.iter().flatten() {
            let (a, to_a) = self.find(entry.from);
            let (b, to_b) = self.find(entry.to);
            let between = entry.inverts ^ to_a ^ to_b;
            if a == b {
                self.inverted[a] |= between;
                continue;
            }
            let (low, high) = (a.min(b), a.max(b));
            self.root[high] = low;
            self.odd[high] = between;
            self.inverted[low] |= self.inverted[high];
        }
        for v in 0..variables {
            // Roots are lower than what hangs on them, so one pass settles all.
            self.root[v] = self.root[self.root[v]];
        }
    }

    fn find(&self, mut v: usize) -> (usize, bool) {
        let mut sum = false;
        while self.root[v] != v {
            sum ^= self.odd[v];
            v = self.root[v];
        }
        (v, sum)
    }

    /// Whether some automorphism takes a variable of this one's orbit to itself and inverts it.
    pub(super) fn inverts(&self, v: usize) -> bool {
        self.inverted[self.root[v]]
    }
}
