//! Sets of things that are equal to each other or opposite, with a way back.

/// A union-find forest in which each element is equal or opposite to its root. Roots are chosen by
/// size and paths are not shortened, so that unions can be taken back in reverse order.
#[derive(Debug, Default)]
pub(super) struct Forest {
    parent: Vec<u32>,
    /// Whether an element is opposite to its parent.
    odd: Vec<bool>,
    size: Vec<u32>,
    /// The roots that were put under another, latest last.
    joined: Vec<u32>,
}

impl Forest {
    /// Elements 0 to `count`, each alone.
    pub(super) fn new(count: usize) -> Self {
        Self {
            parent: (0..count as u32).collect(),
            odd: vec![false; count],
            size: vec![1; count],
            joined: Vec::new(),
        }
    }

    /// The root of an element and whether the element is opposite to it. Logarithmic.
    pub(super) fn root(&self, mut element: u32) -> (u32, bool) {
        let mut odd = false;
        loop {
            let parent = self.parent[element as usize];
            if parent == element {
                return (element, odd);
            }
            odd ^= self.odd[element as usize];
            element = parent;
        }
    }

    /// Makes two elements equal, or opposite; false if they already are the other.
    pub(super) fn join(&mut self, a: u32, b: u32, opposite: bool) -> bool {
        let ((a, a_odd), (b, b_odd)) = (self.root(a), self.root(b));
        let between = opposite ^ a_odd ^ b_odd;
        if a == b {
            return !between;
        }
        let larger_first = self.size[a as usize] >= self.size[b as usize];
        let (above, below) = if larger_first { (a, b) } else { (b, a) };
        self.parent[below as usize] = above;
        self.odd[below as usize] = between;
        self.size[above as usize] += self.size[below as usize];
        self.joined.push(below);
        true
    }

    /// How many unions have been made.
    pub(super) fn unions(&self) -> usize {
        self.joined.len()
    }

    /// Takes back all unions beyond the first `unions`.
    pub(super) fn undo_to(&mut self, unions: usize) {
        while self.joined.len() > unions {
            let Some(below) = self.joined.pop() else {
                return;
            };
            let above = std::mem::replace(&mut self.parent[below as usize], below);
            self.odd[below as usize] = false;
            self.size[above as usize] -= self.size[below as usize];
        }
    }
}
