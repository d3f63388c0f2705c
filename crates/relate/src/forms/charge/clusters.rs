//! Charges that belong together: a mobile charge with all places it can be at, and opposite charges on
//! neighbours (nitro groups, N-oxides, azides, ylides), which cancel.

use super::view::View;

/// Atoms among which charges are settled.
#[derive(Debug)]
pub(super) struct Cluster {
    /// Atoms that bear a charge in some best placement.
    pub(super) atoms: Vec<u32>,
    /// Net charge.
    pub(super) charge: i32,
}

/// All clusters, in canonical order of their first atoms.
pub(super) fn clusters(view: &View) -> Vec<Cluster> {
    let bears = |at: u32| view.site(at).charge != 0 || view.site(at).mobile;
    let mut sets = Sets::new(view.sites.len());
    for at in view.positions() {
        for bond in &view.site(at).bonds {
            // Both ends of a mobile bond, the carbon of a carboxylate among them.
            if bond.mobile {
                sets.join(at, bond.to);
            }
        }
    }
    let regions = charges(view, &mut sets);
    let mut joined = sets.clone();
    for at in view.positions().filter(|&at| bears(at)) {
        for bond in &view.site(at).bonds {
            let signs = [at, bond.to].map(|end| regions[sets.root(end) as usize].signum());
            if bears(bond.to) && signs[0] * signs[1] < 0 {
                joined.join(at, bond.to);
            }
        }
    }
    let charges = charges(view, &mut joined);
    let mut found: Vec<(u32, Cluster)> = Vec::new();
    for at in view.positions().filter(|&at| bears(at)) {
        let root = joined.root(at);
        match found.iter_mut().find(|(known, _)| *known == root) {
            Some((_, cluster)) => cluster.atoms.push(at),
            None => found.push((
                root,
                Cluster {
                    atoms: vec![at],
                    charge: charges[root as usize],
                },
            )),
        }
    }
    found.into_iter().map(|(_, cluster)| cluster).collect()
}

/// Net charge of each set, at its root.
fn charges(view: &View, sets: &mut Sets) -> Vec<i32> {
    let mut charges = vec![0; view.sites.len()];
    for at in view.positions() {
        charges[sets.root(at) as usize] += i32::from(view.site(at).charge);
    }
    charges
}

/// Disjoint sets of positions.
#[derive(Debug, Clone)]
struct Sets {
    parent: Vec<u32>,
}

impl Sets {
    fn new(count: usize) -> Self {
        Self {
            parent: (0..count as u32).collect(),
        }
    }

    fn root(&mut self, mut at: u32) -> u32 {
        while self.parent[at as usize] != at {
            let next = self.parent[at as usize];
            self.parent[at as usize] = self.parent[next as usize];
            at = next;
        }
        at
    }

    fn join(&mut self, a: u32, b: u32) {
        let (a, b) = (self.root(a), self.root(b));
        self.parent[a.max(b) as usize] = a.min(b);
    }
}
