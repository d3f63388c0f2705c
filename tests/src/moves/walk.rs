//! One record as a walker sees it, on the numbers of the input.

use std::collections::{BTreeSet, HashMap, VecDeque};

use molkin_graph::{Element, Formula};
use molkin_relate::Structure;

/// Bonds between non-hydrogen atoms, with the order of the normal form: `None` for a mobile bond.
pub(super) struct Walk<'s> {
    pub(super) structure: &'s Structure,
    orders: HashMap<(u32, u32), Option<u8>>,
    near: HashMap<u32, Vec<u32>>,
    hydrogens: HashMap<u32, u8>,
}

impl<'s> Walk<'s> {
    pub(super) fn new(structure: &'s Structure) -> Self {
        let form = structure.canonical().normal_form();
        let mut walk = Self {
            structure,
            orders: HashMap::new(),
            near: HashMap::new(),
            hydrogens: HashMap::new(),
        };
        for atom in &form.atoms {
            walk.hydrogens.insert(atom.source, atom.hydrogens);
        }
        for bond in &form.bonds {
            let [a, b] = [bond.a, bond.b].map(|end| &form.atoms[end as usize]);
            if a.element == Element::HYDROGEN || b.element == Element::HYDROGEN {
                continue;
            }
            for (x, y) in [(a.source, b.source), (b.source, a.source)] {
                walk.orders.insert((x, y), bond.order);
                walk.near.entry(x).or_default().push(y);
            }
        }
        walk
    }

    pub(super) fn near(&self, atom: u32) -> impl Iterator<Item = u32> + '_ {
        self.near.get(&atom).into_iter().flatten().copied()
    }

    pub(super) fn has_bond(&self, a: u32, b: u32) -> bool {
        self.orders.contains_key(&(a, b))
    }

    pub(super) fn order(&self, bond: (u32, u32)) -> Option<Option<u8>> {
        self.orders.get(&bond).copied()
    }

    pub(super) fn hydrogens(&self, atom: u32) -> u8 {
        self.hydrogens.get(&atom).copied().unwrap_or(0)
    }

    pub(super) fn element(&self, atom: u32) -> Option<Element> {
        self.structure
            .molecule()
            .atom(atom)
            .map(|atom| atom.element)
    }

    pub(super) fn is_carbon(&self, atom: u32) -> bool {
        self.element(atom) == Some(Element::CARBON)
    }

    pub(super) fn formula(&self, atoms: &[u32]) -> Formula {
        super::formula_of(self, atoms)
    }

    pub(super) fn atoms(&self) -> impl Iterator<Item = u32> + '_ {
        self.hydrogens.keys().copied()
    }

    /// What some bonds lead to.
    pub(super) fn reach(&self, start: u32, may: impl Fn(u32, u32) -> bool) -> BTreeSet<u32> {
        let mut found = BTreeSet::from([start]);
        let mut open = vec![start];
        while let Some(atom) = open.pop() {
            for to in self.near(atom) {
                if may(atom, to) && found.insert(to) {
                    open.push(to);
                }
            }
        }
        found
    }

    /// What hangs on a bond, sorted; `None` if the bond lies in a ring.
    pub(super) fn beyond(&self, from: u32, to: u32) -> Option<Vec<u32>> {
        let cut = |a: u32, b: u32| (a, b) != (from, to) && (a, b) != (to, from);
        let found = self.reach(to, cut);
        (self.has_bond(from, to) && !found.contains(&from)).then(|| found.into_iter().collect())
    }

    /// Bonds on a shortest way along atoms that may be passed.
    pub(super) fn distance(
        &self,
        from: u32,
        to: u32,
        may: impl Fn(u32, u32) -> bool,
    ) -> Option<usize> {
        let mut seen = HashMap::from([(from, 0)]);
        let mut open = VecDeque::from([from]);
        while let Some(atom) = open.pop_front() {
            if atom == to {
                break;
            }
            for next in self.near(atom).filter(|&next| may(atom, next)) {
                if !seen.contains_key(&next) {
                    seen.insert(next, seen[&atom] + 1);
                    open.push_back(next);
                }
            }
        }
        seen.get(&to).copied()
    }

    /// The size of the smallest ring with a bond.
    pub(super) fn ring_size(&self, a: u32, b: u32) -> Option<usize> {
        let detour = self.distance(a, b, |x, y| (x, y) != (a, b));
        detour.map(|bonds| bonds + 1)
    }
}
