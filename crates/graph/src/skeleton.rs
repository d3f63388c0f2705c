//! The molecule on flat arrays, terminal hydrogens folded into their atoms.
//!
//! A hydrogen that is an atom of its own and one that is only counted are the same thing; the
//! skeleton makes them so. What cannot be folded (bridging or charged hydrogen, H₂) stays an atom.

use crate::{Atom, Element, Molecule, rings::Adjacency};

/// No skeleton atom.
pub(crate) const NO_ATOM: u32 = u32::MAX;

/// An atom of the skeleton.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(crate) struct SkeletonAtom {
    pub(crate) element: Element,
    pub(crate) isotope: Option<u16>,
    /// All hydrogens, counted and folded.
    pub(crate) hydrogens: u8,
    /// How many of them carry mass number 1, 2 and 3, four bits each from the low end.
    pub(crate) labelled: u16,
    /// Formal charge in the normal form.
    pub(crate) charge: i8,
    /// The atom's index in the molecule.
    pub(crate) source: u32,
}

/// A bond of the skeleton with its drawn order, then its order in the normal form.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(crate) struct SkeletonBond {
    pub(crate) a: u32,
    pub(crate) b: u32,
    pub(crate) order: u8,
}

impl SkeletonBond {
    /// Electron pairs that count as valence: none for coordination and hydrogen bonds.
    pub(crate) fn pairs(&self) -> u8 {
        match self.order {
            order @ 1..=4 => order,
            _ => 0,
        }
    }
}

/// Flat molecule. All vectors are reused from one molecule to the next.
#[derive(Debug, Default, Clone)]
pub(crate) struct Skeleton {
    pub(crate) atoms: Vec<SkeletonAtom>,
    pub(crate) bonds: Vec<SkeletonBond>,
    pub(crate) adjacency: Adjacency,
    /// Per bond: in a ring.
    pub(crate) ring: Vec<bool>,
    /// Per atom of the molecule: its skeleton atom, or that of the atom it is folded into.
    pub(crate) home: Vec<u32>,
    /// Per atom of the molecule: for a hydrogen that is folded away its mass number, 0 if natural.
    pub(crate) folded: Vec<Option<u8>>,
}

impl Skeleton {
    /// Loads a molecule.
    pub(crate) fn load(&mut self, molecule: &Molecule) {
        let folds = self.fold(molecule);
        self.atoms.clear();
        self.bonds.clear();
        self.home.clear();
        self.ring.clear();
        let skeleton_atom = |(source, atom): (u32, &Atom)| SkeletonAtom {
            element: atom.element,
            isotope: atom.isotope,
            hydrogens: atom.hydrogens,
            labelled: 0,
            charge: atom.charge,
            source,
        };
        let atoms = (0..).zip(molecule.atoms());
        if folds {
            for (atom, folded) in atoms.zip(&self.folded) {
                let home = self.atoms.len() as u32;
                self.home
                    .push(if folded.is_some() { NO_ATOM } else { home });
                if folded.is_none() {
                    self.atoms.push(skeleton_atom(atom));
                }
            }
            self.load_bonds(molecule);
        } else {
            // Most records have no hydrogen to fold: plain copies.
            self.atoms.extend(atoms.map(skeleton_atom));
            self.home.extend(0..self.atoms.len() as u32);
            let bonds = molecule.bonds();
            self.bonds.extend(bonds.map(|(a, b, order)| SkeletonBond {
                a,
                b,
                order: order.class(),
            }));
            self.ring.extend_from_slice(&molecule.ring);
        }
        let ends = self.bonds.iter().map(|bond| (bond.a, bond.b));
        self.adjacency.load(self.atoms.len(), ends);
    }

    fn load_bonds(&mut self, molecule: &Molecule) {
        for ((a, b, order), &ring) in molecule.bonds().zip(&molecule.ring) {
            match (self.folded[a as usize], self.folded[b as usize]) {
                (Some(mass), _) => self.absorb(mass, a, b),
                (_, Some(mass)) => self.absorb(mass, b, a),
                _ => {
                    self.bonds.push(SkeletonBond {
                        a: self.home[a as usize],
                        b: self.home[b as usize],
                        order: order.class(),
                    });
                    self.ring.push(ring);
                }
            }
        }
    }

    /// Decides which hydrogen atoms fold: neutral, one single bond, and few enough on their
    /// neighbour to be counted in four bits. Of two hydrogens bonded to each other the heavier
    /// isotope stays an atom, so that H₂, HD and D₂ have one form however they are drawn. Says whether
    /// any folds.
    fn fold(&mut self, molecule: &Molecule) -> bool {
        let mut folds = false;
        self.folded.clear();
        self.folded.resize(molecule.atom_count(), None);
        for (index, atom) in molecule.atoms().enumerate() {
            let index = index as u32;
            if atom.element != Element::HYDROGEN
                || atom.charge != 0
                || atom.hydrogens != 0
                || !matches!(atom.isotope, None | Some(1..=3))
            {
                continue;
            }
            let mut bonds = molecule.neighbours(index);
            let (Some((other, order)), None) = (bonds.next(), bonds.next()) else {
                continue;
            };
            let Some(host) = molecule.atom(other) else {
                continue;
            };
            if order.pairs() != 1 || molecule.neighbours(other).nth(12).is_some() {
                continue;
            }
            let foldable = host.element != Element::HYDROGEN
                || host.charge != 0
                || host.hydrogens != 0
                || molecule.neighbours(other).nth(1).is_some()
                || (self.folded[other as usize].is_none()
                    && (host.isotope, other) > (atom.isotope, index))
                || (host.isotope > Some(3));
            if foldable && host.element != Element::WILDCARD {
                self.folded[index as usize] = Some(atom.isotope.unwrap_or(0) as u8);
                folds = true;
            }
        }
        folds
    }

    fn absorb(&mut self, mass: u8, hydrogen: u32, host: u32) {
        let home = self.home[host as usize];
        self.home[hydrogen as usize] = home;
        let atom = &mut self.atoms[home as usize];
        atom.hydrogens = atom.hydrogens.saturating_add(1);
        if mass > 0 {
            atom.labelled += 1 << (4 * (mass - 1));
        }
    }

    /// Electron pairs of a bond that count as valence: none for coordination and hydrogen bonds.
    pub(crate) fn pairs(&self, bond: u32) -> u8 {
        self.bonds[bond as usize].pairs()
    }

    /// The number of atoms.
    pub(crate) fn len(&self) -> usize {
        self.atoms.len()
    }

    /// The bonds at an atom: neighbour and bond index.
    pub(crate) fn arcs(&self, atom: u32) -> &[(u32, u32)] {
        self.adjacency.of(atom)
    }

    /// The number of bonds at an atom.
    pub(crate) fn degree(&self, atom: u32) -> usize {
        self.adjacency.of(atom).len()
    }

    /// The bond between two atoms.
    pub(crate) fn bond_between(&self, a: u32, b: u32) -> Option<u32> {
        self.arcs(a)
            .iter()
            .find(|&&(to, _)| to == b)
            .map(|&(_, bond)| bond)
    }
}
