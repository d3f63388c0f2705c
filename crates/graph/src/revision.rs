//! Changes to a molecule that is there already.

use crate::{
    Atom, BondOrder, BuildError, DrawnCoordination, DrawnStereo, Element, Ligand, Molecule,
    MoleculeBuilder, StereoGroup,
};

/// A molecule under revision. Atoms keep their indices until [`Revision::finish`], and the numbers that
/// they have in the record for ever: see [`Molecule::number`].
///
/// # Examples
/// ```
/// use molkin_graph::{Atom, Element, MoleculeBuilder, Revision};
///
/// let mut builder = MoleculeBuilder::new();
/// builder.add_atom(Atom { charge: 1, ..Atom::new(Element::SODIUM) });
/// builder.add_atom(Atom { charge: -1, hydrogens: 1, ..Atom::new(Element::OXYGEN) });
/// let hydroxide = builder.build()?;
///
/// let mut revision = Revision::of(&hydroxide);
/// revision.remove_atom(0);
/// revision.set_protons(1, 1);
/// let water = revision.finish()?;
/// assert_eq!(water.molecule.formula().to_string(), "H2O");
/// assert_eq!((water.sources, water.molecule.number(0)), (vec![1], 2));
/// # Ok::<(), molkin_graph::BuildError>(())
/// ```
#[derive(Debug, Clone)]
pub struct Revision {
    atoms: Vec<Atom>,
    kept: Vec<bool>,
    /// Both ends and the order; `None` for a bond that is gone.
    bonds: Vec<(u32, u32, Option<BondOrder>)>,
    stereo: Vec<DrawnStereo>,
    coordination: Vec<DrawnCoordination>,
    groups: Vec<StereoGroup>,
    remembered: Vec<DrawnStereo>,
    skipped: Vec<u32>,
}

/// A molecule that was revised.
#[derive(Debug, Clone, Default)]
pub struct Revised {
    /// The molecule.
    pub molecule: Molecule,
    /// For each of its atoms the index of that atom before.
    pub sources: Vec<u32>,
}

impl Molecule {
    /// The components, each as a molecule of its own, in the order of their first atoms. Hydrogen bonds
    /// join nothing. Marks go with their centres; stereo groups are left out.
    ///
    /// # Errors
    /// None that a molecule from a builder can have.
    pub fn components(&self) -> Result<Vec<Revised>, BuildError> {
        let component = self.component_numbers();
        let count = component.iter().max().map_or(0, |&last| last as usize + 1);
        let mut parts: Vec<Part> = (0..count).map(|_| Part::default()).collect();
        let mut place = Vec::with_capacity(component.len());
        for ((index, atom), &own) in (0..).zip(self.atoms()).zip(&component) {
            let part = &mut parts[own as usize];
            place.push(part.builder.add_atom(*atom));
            part.sources.push(index);
        }
        let at = |atom: u32| place[atom as usize];
        let moved = |ligand: Ligand| match ligand {
            Ligand::Atom(atom) => Ligand::Atom(at(atom)),
            other => other,
        };
        for (a, b, order) in self.bonds() {
            if component[a as usize] == component[b as usize] {
                let builder = &mut parts[component[a as usize] as usize].builder;
                builder.add_bond(at(a), at(b), order)?;
            }
        }
        let mark = |own: &DrawnStereo| DrawnStereo {
            centres: own.centres.map(at),
            ligands: own.ligands.map(moved),
            ..*own
        };
        for own in &self.stereo {
            let part = &mut parts[component[own.centres[0] as usize] as usize];
            part.builder.add_stereo(mark(own));
        }
        for own in &self.remembered {
            let part = &mut parts[component[own.centres[0] as usize] as usize];
            part.builder.add_remembered(mark(own));
        }
        for own in &self.coordination {
            let part = &mut parts[component[own.centre as usize] as usize];
            part.builder.add_coordination(DrawnCoordination {
                centre: at(own.centre),
                ligands: own.ligands.iter().map(|&ligand| moved(ligand)).collect(),
                ..own.clone()
            });
        }
        parts.into_iter().map(Part::finish).collect()
    }

    /// Whether there is one component at most, hydrogen bonds left aside.
    pub fn is_connected(&self) -> bool {
        let (atoms, bonds) = (self.atom_count(), self.bonds().len());
        // A graph with fewer bonds falls apart.
        bonds + 1 >= atoms && self.component_numbers().iter().all(|&number| number == 0)
    }

    /// Per atom the number of its component, from 0.
    fn component_numbers(&self) -> Vec<u32> {
        const NONE: u32 = u32::MAX;
        let mut component = vec![NONE; self.atom_count()];
        let mut count = 0;
        let mut open = Vec::new();
        for root in 0..component.len() as u32 {
            if component[root as usize] != NONE {
                continue;
            }
            open.push(root);
            component[root as usize] = count;
            while let Some(atom) = open.pop() {
                for (to, order) in self.neighbours(atom) {
                    if order != BondOrder::Hydrogen && component[to as usize] == NONE {
                        component[to as usize] = count;
                        open.push(to);
                    }
                }
            }
            count += 1;
        }
        component
    }
}

impl Revised {
    /// The same after a revision before: its sources are atoms of the molecule that one began with.
    #[must_use]
    pub fn traced(mut self, before: &[u32]) -> Self {
        for atom in &mut self.sources {
            *atom = before.get(*atom as usize).copied().unwrap_or(*atom);
        }
        self
    }
}

/// A component under way.
#[derive(Default)]
struct Part {
    builder: MoleculeBuilder,
    sources: Vec<u32>,
}

impl Part {
    fn finish(mut self) -> Result<Revised, BuildError> {
        Ok(Revised {
            molecule: self.builder.build()?,
            sources: self.sources,
        })
    }
}

impl Revision {
    /// Starts from a molecule. Hydrogen atoms that are only counted where nothing else is said about
    /// them (neutral, no mass number, one single bond to another element) are counted on their atom from
    /// the start, so that a proton can be taken away however it was drawn.
    pub fn of(molecule: &Molecule) -> Self {
        let mut revision = Self {
            atoms: molecule.atoms().copied().collect(),
            kept: vec![true; molecule.atom_count()],
            bonds: molecule
                .bonds()
                .map(|(a, b, order)| (a, b, Some(order)))
                .collect(),
            stereo: molecule.stereo.clone(),
            coordination: molecule.coordination.clone(),
            groups: molecule.groups.clone(),
            remembered: molecule.remembered.clone(),
            skipped: molecule.skipped.clone(),
        };
        revision.count_hydrogens(molecule);
        revision
    }

    fn count_hydrogens(&mut self, molecule: &Molecule) {
        for (index, atom) in (0..).zip(molecule.atoms()) {
            let plain = *atom == Atom::new(Element::HYDROGEN);
            let mut bonds = molecule.neighbours(index);
            let (true, Some((host, BondOrder::Single)), None) = (plain, bonds.next(), bonds.next())
            else {
                continue;
            };
            let own = &mut self.atoms[host as usize];
            if own.element == Element::HYDROGEN || own.element == Element::WILDCARD {
                continue;
            }
            if let Some(more) = own.hydrogens.checked_add(1) {
                own.hydrogens = more;
                self.kept[index as usize] = false;
            }
        }
    }

    /// The atom as it stands, with all its plain hydrogens counted; `None` once it is removed.
    pub fn atom(&self, index: u32) -> Option<&Atom> {
        let kept = *self.kept.get(index as usize)?;
        self.atoms.get(index as usize).filter(|_| kept)
    }

    /// The atom, to be changed.
    pub fn atom_mut(&mut self, index: u32) -> Option<&mut Atom> {
        let kept = *self.kept.get(index as usize)?;
        self.atoms.get_mut(index as usize).filter(|_| kept)
    }

    /// Adds protons to an atom, or takes them away: its hydrogens and its charge change by this number.
    /// Whether the atom has as many to give and can bear the charge; if not, nothing changes.
    pub fn set_protons(&mut self, index: u32, change: i8) -> bool {
        let Some(atom) = self.atom_mut(index) else {
            return false;
        };
        let hydrogens = atom.hydrogens.checked_add_signed(change);
        match (hydrogens, atom.charge.checked_add(change)) {
            (Some(hydrogens), Some(charge)) => {
                (atom.hydrogens, atom.charge) = (hydrogens, charge);
                true
            }
            _ => false,
        }
    }

    /// Takes an atom away, with its bonds and every mark about it.
    pub fn remove_atom(&mut self, index: u32) {
        if let Some(kept) = self.kept.get_mut(index as usize) {
            *kept = false;
        }
    }

    /// Bonds by their place in [`Molecule::bonds`], as they stand: both ends and the order, `None` for a
    /// bond that was taken away.
    pub fn bonds(&self) -> &[(u32, u32, Option<BondOrder>)] {
        &self.bonds
    }

    /// Gives a bond another order, or takes it away.
    pub fn set_bond(&mut self, bond: usize, order: Option<BondOrder>) {
        if let Some(own) = self.bonds.get_mut(bond) {
            own.2 = order;
        }
    }

    /// Adds a bond. That it can be there is seen to by [`Revision::finish`].
    pub fn add_bond(&mut self, a: u32, b: u32, order: BondOrder) {
        self.bonds.push((a, b, Some(order)));
    }

    /// Takes all marks of stereo away, remembered ones and groups included.
    pub fn clear_stereo(&mut self) {
        self.stereo.clear();
        self.coordination.clear();
        self.groups.clear();
        self.remembered.clear();
    }

    /// Takes away the marks that are not kept.
    pub fn retain_stereo(&mut self, keep: impl FnMut(&DrawnStereo) -> bool) {
        self.stereo.retain(keep);
    }

    /// Adds a mark that counts even where the revised molecule cannot be stereogenic: see
    /// [`Molecule::remembered_stereo`]. The last one at a place holds.
    pub fn remember(&mut self, mark: DrawnStereo) {
        self.remembered.retain(|own| own.centres != mark.centres);
        self.remembered.push(mark);
    }

    /// The revised molecule.
    ///
    /// # Errors
    /// [`BuildError`] for an added bond that cannot be.
    pub fn finish(self) -> Result<Revised, BuildError> {
        const GONE: u32 = u32::MAX;
        let mut builder = MoleculeBuilder::new();
        let mut sources = Vec::new();
        let mut place = vec![GONE; self.atoms.len()];
        let mut skipped = self.skipped.iter().peekable();
        for (index, atom) in (0..).zip(&self.atoms) {
            while skipped.next_if(|&&before| before <= index).is_some() {
                builder.skip_number();
            }
            if self.kept[index as usize] {
                place[index as usize] = builder.add_atom(*atom);
                sources.push(index);
            } else {
                builder.skip_number();
            }
        }
        let is_there = |atom: u32| place.get(atom as usize).is_none_or(|&at| at != GONE);
        for &(a, b, order) in &self.bonds {
            if let Some(order) = order.filter(|_| is_there(a) && is_there(b)) {
                let at = |atom: u32| place.get(atom as usize).copied().unwrap_or(GONE);
                builder.add_bond(at(a), at(b), order)?;
            }
        }
        self.add_marks(&mut builder, &place);
        let molecule = builder.build()?;
        Ok(Revised { molecule, sources })
    }

    /// Adds the marks whose atoms are all there, hydrogens aside.
    fn add_marks(&self, builder: &mut MoleculeBuilder, place: &[u32]) {
        let at = |atom: u32| {
            place
                .get(atom as usize)
                .copied()
                .filter(|&at| at != u32::MAX)
        };
        let moved = |ligand: Ligand| match ligand {
            Ligand::Atom(atom) => match at(atom) {
                Some(atom) => Some(Ligand::Atom(atom)),
                // The only atoms that go while their neighbours stay are hydrogens that are counted now.
                None => Some(Ligand::Hydrogen),
            },
            other => Some(other),
        };
        let mark = |own: &DrawnStereo| {
            let [a, b] = own.centres;
            let [c, d, e, f] = own.ligands;
            Some(DrawnStereo {
                centres: [at(a)?, at(b)?],
                ligands: [moved(c)?, moved(d)?, moved(e)?, moved(f)?],
                ..*own
            })
        };
        for own in self.stereo.iter().filter_map(mark) {
            if builder.fits(&own) {
                builder.add_stereo(own);
            }
        }
        for own in self.remembered.iter().filter_map(mark) {
            builder.add_remembered(own);
        }
        for own in &self.coordination {
            let ligands: Option<Vec<Ligand>> = own.ligands.iter().map(|&l| moved(l)).collect();
            if let (Some(centre), Some(ligands)) = (at(own.centre), ligands) {
                let own = DrawnCoordination {
                    centre,
                    ligands,
                    ..own.clone()
                };
                if builder.fits_coordination(&own) {
                    builder.add_coordination(own);
                }
            }
        }
        for group in &self.groups {
            let atoms: Vec<u32> = group.atoms.iter().filter_map(|&atom| at(atom)).collect();
            if !atoms.is_empty() {
                let kind = group.kind;
                builder.add_group(StereoGroup { kind, atoms });
            }
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::{Orderer, Parity, Shape, sketch::molecule};

    /// Alanine's centre with all hydrogens but one counted, sodium beside it.
    fn record() -> Molecule {
        molecule(
            &[
                ("Na", 1, 0),
                ("C", 0, 3),
                ("C", 0, 0),
                ("H", 0, 0),
                ("N", 0, 2),
                ("F", 0, 0),
            ],
            &[(1, 2, 1), (2, 3, 1), (2, 4, 1), (2, 5, 1)],
        )
    }

    fn mark(parity: Parity) -> DrawnStereo {
        DrawnStereo {
            shape: Shape::Tetrahedral,
            centres: [2, 2],
            ligands: [1, 3, 4, 5].map(Ligand::Atom),
            parity: Some(parity),
        }
    }

    #[test]
    fn atoms_keep_the_numbers_of_the_record() {
        let mut revision = Revision::of(&record());
        assert_eq!(revision.atom(3), None, "the hydrogen is counted");
        assert_eq!(revision.atom(2).map(|atom| atom.hydrogens), Some(1));
        revision.remove_atom(0);
        let revised = revision.finish().unwrap();
        assert_eq!(revised.sources, [1, 2, 4, 5]);
        let numbers: Vec<u32> = (0..4).map(|atom| revised.molecule.number(atom)).collect();
        assert_eq!(numbers, [2, 3, 5, 6]);
        // A second revision keeps them too.
        let mut again = Revision::of(&revised.molecule);
        again.remove_atom(0);
        let again = again.finish().unwrap();
        assert_eq!(again.molecule.number(0), 3);
        assert_eq!(again.traced(&revised.sources).sources, [2, 4, 5]);
    }

    #[test]
    fn protons_are_taken_as_far_as_there_are_some() {
        let mut revision = Revision::of(&record());
        assert!(revision.set_protons(4, -2));
        assert!(!revision.set_protons(4, -1));
        assert!(!revision.set_protons(3, 1));
        assert_eq!(revision.finish().unwrap().molecule.charge(), -1);
    }

    #[test]
    fn a_mark_on_a_counted_hydrogen_stays_and_one_on_a_lost_bond_goes() {
        let mut drawn = MoleculeBuilder::new();
        record().atoms().for_each(|&atom| {
            drawn.add_atom(atom);
        });
        for (a, b, order) in record().bonds() {
            drawn.add_bond(a, b, order).unwrap();
        }
        drawn.add_stereo(mark(Parity::Odd));
        let drawn = drawn.build().unwrap();
        let kept = Revision::of(&drawn).finish().unwrap().molecule;
        assert_eq!(kept.drawn_stereo()[0].ligands[1], Ligand::Hydrogen);
        let mut cut = Revision::of(&drawn);
        cut.set_bond(3, None);
        assert!(cut.finish().unwrap().molecule.drawn_stereo().is_empty());
    }

    #[test]
    fn remembered_marks_count_and_are_opposed() {
        let key = |parity| {
            let mut revision = Revision::of(&record());
            // With three ligands and an open valence it cannot be a centre.
            revision.atom_mut(2).unwrap().hydrogens = 0;
            if let Some(parity) = parity {
                revision.remember(mark(parity));
            }
            let molecule = revision.finish().unwrap().molecule;
            let canonical = Orderer::default().order(&molecule).unwrap();
            assert!(canonical.stereo_elements().is_empty());
            canonical.compound_key()
        };
        let keys = [Some(Parity::Even), Some(Parity::Odd), None].map(key);
        assert!(keys[0] != keys[1] && keys[0] != keys[2] && keys[1] != keys[2]);
    }

    #[test]
    fn components_are_molecules_of_their_own() {
        let record = record();
        assert!(!record.is_connected());
        let parts = record.components().unwrap();
        let formulae = parts.iter().map(|part| part.molecule.formula().to_string());
        assert_eq!(formulae.collect::<Vec<_>>(), ["Na+", "C2H6FN"]);
        assert_eq!(parts[1].sources, [1, 2, 3, 4, 5]);
        assert!(parts.iter().all(|part| part.molecule.is_connected()));
        assert!(Molecule::default().is_connected());
    }
}
