//! Orbits of variables under automorphisms, with signs.

use super::action::Action;

/// Orbits of variables, as a forest with the parity to the root.
#[derive(Debug, Clone)]
pub(super) struct Orbits {
    /// Per variable: the least variable of its orbit.
    pub(super) root: Vec<usize>,
    /// Per least variable: whether some automorphism takes a variable of the orbit to itself and
    /// inverts it.
    pub(super) inverted: Vec<bool>,
}

impl Orbits {
    pub(super) fn of(action: &Action, variables: usize) -> Self {
        let mut forest = Self {
            root: (0..variables).collect(),
            inverted: vec![false; variables],
        };
        let mut odd = vec![false; variables];
        let find = |root: &[usize], odd: &[bool], mut v: usize| {
            let mut sum = false;
            while root[v] != v {
                sum ^= odd[v];
                v = root[v];
            }
            (v, sum)
        };
        for entry in action.moves.iter().flatten() {
            let (a, to_a) = find(&forest.root, &odd, entry.from);
            let (b, to_b) = find(&forest.root, &odd, entry.to);
            let between = entry.inverts ^ to_a ^ to_b;
            if a == b {
                forest.inverted[a] |= between;
                continue;
            }
            let (low, high) = (a.min(b), a.max(b));
            forest.root[high] = low;
            odd[high] = between;
            forest.inverted[low] |= forest.inverted[high];
        }
        for v in 0..variables {
            // Roots are lower than what hangs on them, so one pass settles all.
            forest.root[v] = forest.root[forest.root[v]];
        }
        forest
    }
}
