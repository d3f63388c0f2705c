//! The atoms of functional groups.

use molkin_graph::{Element, NormalAtom};

use crate::constitution::Constitution;

use super::aromatic::aromatic_bonds;

/// Edge class of an aromatic bond; other bonds have their order, mobile ones that of [`MOBILE`].
const AROMATIC: u8 = 0;
const MOBILE: u8 = 5;

/// The atoms of functional groups, marked on a constitution.
pub(crate) struct Marked<'a> {
    constitution: &'a Constitution,
    /// Per bond.
    aromatic_bonds: Vec<bool>,
    /// Per atom: on an aromatic bond.
    aromatic: Vec<bool>,
    /// Per atom: in a functional group.
    marked: Vec<bool>,
}

impl<'a> Marked<'a> {
    pub(crate) fn of(constitution: &'a Constitution) -> Self {
        let aromatic_bonds = aromatic_bonds(constitution);
        let mut aromatic = vec![false; constitution.atoms().len()];
        for (bond, _) in constitution
            .bonds()
            .iter()
            .zip(&aromatic_bonds)
            .filter(|(_, own)| **own)
        {
            aromatic[bond.a as usize] = true;
            aromatic[bond.b as usize] = true;
        }
        let mut marks = Self {
            constitution,
            aromatic_bonds,
            aromatic,
            marked: vec![false; constitution.atoms().len()],
        };
        for atom in constitution.positions() {
            if !constitution.is_carbon(atom) {
                marks.marked[atom as usize] = true;
                marks.mark_small_rings(atom);
            } else if marks.is_functional_carbon(atom) {
                marks.marked[atom as usize] = true;
            }
        }
        marks
    }

    fn is_functional_carbon(&self, atom: u32) -> bool {
        let own = self.constitution.atom(atom);
        let multiple = |&(_, bond): &(u32, u32)| {
            let aromatic = self.aromatic_bonds[bond as usize];
            !aromatic && matches!(self.constitution.bond(bond).order, Some(2..=4) | None)
        };
        let charged = || (own.charge, own.open) != (Some(0), Some(0));
        self.constitution.arcs(atom).iter().any(multiple)
            || (!self.aromatic[atom as usize] && (charged() || self.is_acetal_carbon(atom)))
    }

    /// Single bonds to two or more of O, N and S that themselves have single bonds only.
    fn is_acetal_carbon(&self, atom: u32) -> bool {
        let hetero = |&(to, _): &(u32, u32)| {
            is_small_ring_heteroatom(self.constitution.atom(to))
                && !self.aromatic[to as usize]
                && self.constitution.has_single_bonds_only(to)
        };
        self.constitution.has_single_bonds_only(atom)
            && self
                .constitution
                .arcs(atom)
                .iter()
                .filter(|&arc| hetero(arc))
                .nth(1)
                .is_some()
    }

    /// Oxirane, aziridine and thiirane rings, wholly.
    fn mark_small_rings(&mut self, atom: u32) {
        if !is_small_ring_heteroatom(self.constitution.atom(atom)) {
            return;
        }
        let arcs = self.constitution.arcs(atom);
        for &(one, _) in arcs {
            for &(other, _) in arcs {
                if self
                    .constitution
                    .arcs(one)
                    .iter()
                    .any(|&(to, _)| to == other)
                {
                    self.marked[one as usize] = true;
                    self.marked[other as usize] = true;
                }
            }
        }
    }

    /// Positions of the atoms of each group.
    pub(crate) fn groups(&self) -> Vec<Vec<u32>> {
        let (component, count) = self.constitution.components(|bond| {
            let bond = self.constitution.bond(bond);
            self.marked[bond.a as usize] && self.marked[bond.b as usize]
        });
        let mut groups = vec![Vec::new(); count as usize];
        for atom in self.atoms() {
            groups[component[atom as usize] as usize].push(atom);
        }
        groups.retain(|group| !group.is_empty());
        groups
    }

    /// Positions of the atoms of all groups.
    pub(crate) fn atoms(&self) -> Vec<u32> {
        let atoms = self.constitution.positions();
        atoms.filter(|&atom| self.marked[atom as usize]).collect()
    }

    /// The graph of some groups: equal ones are isomorphic, and so are equal multisets of them.
    /// Colours of the atoms, and edges with their classes.
    pub(crate) fn graph(&self, atoms: &[u32]) -> (Vec<u64>, Vec<(u32, u32, u8)>) {
        let colours = atoms.iter().map(|&atom| self.colour(atom)).collect();
        let mut edges = Vec::new();
        for (place, &atom) in (0..).zip(atoms) {
            for &(to, bond) in self.constitution.arcs(atom) {
                // Positions ascend, so that the place of a neighbour can be looked up.
                if let (true, Ok(other)) = (to > atom, atoms.binary_search(&to)) {
                    edges.push((place, other as u32, self.class(bond)));
                }
            }
        }
        (colours, edges)
    }

    fn class(&self, bond: u32) -> u8 {
        if self.aromatic_bonds[bond as usize] {
            return AROMATIC;
        }
        self.constitution.bond(bond).order.unwrap_or(MOBILE)
    }

    /// What an atom is in its group. Of the environment only this counts: how many atoms a
    /// heteroatom binds, whether a carbonyl carbon bears hydrogen, and whether a hydroxy or thiol
    /// group sits on an aromatic ring.
    fn colour(&self, atom: u32) -> u64 {
        let own = self.constitution.atom(atom);
        let of_place = if self.constitution.is_carbon(atom) {
            u64::from(self.is_aldehyde_like(atom))
        } else {
            let neighbours = self.constitution.arcs(atom).len() as u64;
            neighbours << 9 | u64::from(self.is_phenolic(atom)) << 8 | u64::from(own.hydrogens)
        };
        let charge = own.charge.map_or(256, |charge| u64::from(charge as u8));
        let open = own.open.map_or(256, u64::from);
        let aromatic = u64::from(self.aromatic[atom as usize]);
        // 7, 9, 9 and 1 bits, then the place.
        u64::from(own.element.number()) | charge << 7 | open << 16 | aromatic << 25 | of_place << 26
    }

    /// A carbon with hydrogen and a double bond to a heteroatom, and no other heteroatom.
    fn is_aldehyde_like(&self, atom: u32) -> bool {
        let arcs = self.constitution.arcs(atom).iter();
        let mut hetero = arcs.filter(|&&(to, _)| !self.constitution.is_carbon(to));
        let (Some(&(_, bond)), None) = (hetero.next(), hetero.next()) else {
            return false;
        };
        self.constitution.atom(atom).hydrogens > 0
            && matches!(self.constitution.bond(bond).order, Some(2) | None)
    }

    /// A chalcogen whose only neighbour is an aromatic atom.
    fn is_phenolic(&self, atom: u32) -> bool {
        let group = self.constitution.atom(atom).element.group();
        let [(to, _)] = *self.constitution.arcs(atom) else {
            return false;
        };
        group == Some(16) && self.aromatic[to as usize]
    }
}

fn is_small_ring_heteroatom(atom: &NormalAtom) -> bool {
    [Element::OXYGEN, Element::NITROGEN, Element::SULFUR].contains(&atom.element)
}
