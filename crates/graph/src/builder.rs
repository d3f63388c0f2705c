//! Builds molecules atom by atom; the only way to make one.

use petgraph::{
    graph::{EdgeIndex, NodeIndex},
    visit::EdgeRef,
};
use thiserror::Error;

use crate::{
    Atom, BondOrder, DrawnCoordination, DrawnStereo, Ligand, Molecule, PiDemand, StereoGroup,
    kekule::{Delocalised, Kekule},
    rings::RingBonds,
};

/// Why a molecule could not be built. Atoms are indices from 0.
#[derive(Debug, Clone, PartialEq, Eq, Error)]
#[non_exhaustive]
pub enum BuildError {
    /// A bond or mark names an atom that does not exist.
    #[error("there is no atom {atom}")]
    NoSuchAtom {
        /// The index.
        atom: u32,
    },
    /// A bond joins an atom to itself.
    #[error("atom {atom} is bonded to itself")]
    SelfBond {
        /// The atom.
        atom: u32,
    },
    /// Two bonds join the same two atoms.
    #[error("atoms {a} and {b} are bonded twice")]
    DuplicateBond {
        /// One atom.
        a: u32,
        /// The other.
        b: u32,
    },
    /// An aromatic symbol or bond outside any ring.
    #[error("atom {atom} is aromatic but in no ring")]
    AromaticOutsideRing {
        /// The atom.
        atom: u32,
    },
    /// No choice of double bonds satisfies all aromatic atoms.
    #[error("no Kekulé structure: atoms {atoms:?} are left without a double bond")]
    NoKekuleStructure {
        /// The atoms left over in one largest choice.
        atoms: Vec<u32>,
    },
    /// A stereo mark names a ligand that is not attached where it says.
    #[error("the stereo mark at atom {atom} does not fit its ligands")]
    BadStereo {
        /// The (first) centre.
        atom: u32,
    },
}

/// Collects atoms, bonds and stereo marks. Reusable: [`MoleculeBuilder::build`] leaves it empty.
#[derive(Debug, Default)]
pub struct MoleculeBuilder {
    molecule: Molecule,
    demand: Vec<PiDemand>,
    delocalised: Vec<Delocalised>,
    rings: RingBonds,
    kekule: Kekule,
}

impl MoleculeBuilder {
    /// An empty builder.
    pub fn new() -> Self {
        Self::default()
    }

    /// Forgets everything added so far.
    pub fn clear(&mut self) {
        self.molecule.graph.clear();
        self.molecule.ring.clear();
        self.molecule.stereo.clear();
        self.molecule.coordination.clear();
        self.molecule.groups.clear();
        self.molecule.remembered.clear();
        self.molecule.skipped.clear();
        self.demand.clear();
        self.delocalised.clear();
    }

    /// Makes room for a molecule of known size.
    pub fn reserve(&mut self, atoms: usize, bonds: usize) {
        self.molecule.graph.reserve_nodes(atoms);
        self.molecule.graph.reserve_edges(bonds);
        self.demand.reserve(atoms);
    }

    /// The number of atoms added.
    pub fn atom_count(&self) -> usize {
        self.molecule.graph.node_count()
    }

    /// Adds an atom and returns its index.
    pub fn add_atom(&mut self, atom: Atom) -> u32 {
        self.demand.push(PiDemand::Excluded);
        self.molecule.graph.add_node(atom).index() as u32
    }

    /// Leaves out the number of the next atom, which the record gives to something that is no atom;
    /// see [`Molecule::number`].
    pub fn skip_number(&mut self) {
        let before = self.atom_count() as u32;
        self.molecule.skipped.push(before);
    }

    /// An atom added before, to be completed.
    pub fn atom_mut(&mut self, index: u32) -> Option<&mut Atom> {
        self.molecule
            .graph
            .node_weight_mut(NodeIndex::new(index as usize))
    }

    /// Adds a bond of known order and returns its index.
    ///
    /// # Errors
    /// [`BuildError::NoSuchAtom`], [`BuildError::SelfBond`], [`BuildError::DuplicateBond`].
    pub fn add_bond(&mut self, a: u32, b: u32, order: BondOrder) -> Result<u32, BuildError> {
        for atom in [a, b] {
            if atom as usize >= self.atom_count() {
                return Err(BuildError::NoSuchAtom { atom });
            }
        }
        if a == b {
            return Err(BuildError::SelfBond { atom: a });
        }
        let (from, to) = (NodeIndex::new(a as usize), NodeIndex::new(b as usize));
        // Both lists are walked at once and the shorter one decides: a hub atom costs no more than
        // its neighbours do, so adding bonds stays linear.
        let graph = &self.molecule.graph;
        if graph
            .neighbors(from)
            .zip(graph.neighbors(to))
            .any(|(x, y)| x == to || y == from)
        {
            return Err(BuildError::DuplicateBond { a, b });
        }
        Ok(self.molecule.graph.add_edge(from, to, order).index() as u32)
    }

    /// Adds a bond whose order the record leaves to the aromatic system. [`MoleculeBuilder::build`]
    /// makes it single or double.
    ///
    /// # Errors
    /// As [`MoleculeBuilder::add_bond`].
    pub fn add_delocalised_bond(&mut self, a: u32, b: u32) -> Result<u32, BuildError> {
        let bond = self.add_bond(a, b, BondOrder::Single)?;
        self.delocalised.push((bond, a, b));
        Ok(bond)
    }

    /// Says whether an atom takes one of the double bonds among its delocalised bonds.
    pub fn set_pi_demand(&mut self, atom: u32, demand: PiDemand) {
        if let Some(slot) = self.demand.get_mut(atom as usize) {
            *slot = demand;
        }
    }

    /// Adds a stereo mark; it is checked by [`MoleculeBuilder::build`].
    pub fn add_stereo(&mut self, mark: DrawnStereo) {
        self.molecule.stereo.push(mark);
    }

    /// Adds the arrangement about a centre that is not tetrahedral; it is checked by
    /// [`MoleculeBuilder::build`].
    pub fn add_coordination(&mut self, mark: DrawnCoordination) {
        self.molecule.coordination.push(mark);
    }

    /// Adds a mark that was erased where it was drawn; see [`Molecule::remembered_stereo`].
    pub(crate) fn add_remembered(&mut self, mark: DrawnStereo) {
        self.molecule.remembered.push(mark);
    }

    /// Whether a mark fits its ligands.
    pub(crate) fn fits(&self, mark: &DrawnStereo) -> bool {
        self.check_stereo(mark).is_ok()
    }

    /// Whether an arrangement fits its ligands.
    pub(crate) fn fits_coordination(&self, mark: &DrawnCoordination) -> bool {
        self.check_coordination(mark).is_ok()
    }

    /// Adds a group of stereo elements.
    pub fn add_group(&mut self, group: StereoGroup) {
        self.molecule.groups.push(group);
    }

    /// Resolves delocalised bonds, checks the stereo marks and returns the molecule.
    ///
    /// # Errors
    /// [`BuildError::AromaticOutsideRing`], [`BuildError::NoKekuleStructure`],
    /// [`BuildError::BadStereo`]. The builder is empty afterwards in any case.
    ///
    /// # Complexity
    /// Linear in atoms and bonds, save for aromatic systems (maximum matching).
    pub fn build(&mut self) -> Result<Molecule, BuildError> {
        let mut molecule = Molecule::default();
        self.build_into(&mut molecule)?;
        Ok(molecule)
    }

    /// As [`MoleculeBuilder::build`], into a molecule whose storage is used for the next one.
    ///
    /// # Errors
    /// As [`MoleculeBuilder::build`]; the molecule is empty then.
    pub fn build_into(&mut self, molecule: &mut Molecule) -> Result<(), BuildError> {
        let outcome = self.finish();
        if outcome.is_err() {
            self.clear();
        }
        std::mem::swap(&mut self.molecule, molecule);
        self.clear();
        outcome
    }

    fn finish(&mut self) -> Result<(), BuildError> {
        let Molecule { graph, ring, .. } = &mut self.molecule;
        let ends = graph
            .raw_edges()
            .iter()
            .map(|edge| (edge.source().index() as u32, edge.target().index() as u32));
        self.rings.find(graph.node_count(), ends, ring);
        if !self.delocalised.is_empty() {
            self.resolve_delocalised()?;
        }
        self.molecule
            .stereo
            .iter()
            .try_for_each(|mark| self.check_stereo(mark))?;
        self.molecule
            .coordination
            .iter()
            .try_for_each(|mark| self.check_coordination(mark))
    }

    fn resolve_delocalised(&mut self) -> Result<(), BuildError> {
        let Molecule { graph, ring, .. } = &mut self.molecule;
        for &(bond, a, b) in &self.delocalised {
            // Both atoms of a ring bond are in a ring; only bonds between rings need a look.
            if ring[bond as usize] {
                continue;
            }
            let in_ring = |&atom: &u32| {
                let mut bonds = graph.edges(NodeIndex::new(atom as usize));
                bonds.any(|bond| ring[bond.id().index()])
            };
            if let Some(atom) = [a, b].into_iter().find(|atom| !in_ring(atom)) {
                return Err(BuildError::AromaticOutsideRing { atom });
            }
        }
        self.kekule.assign(&self.demand, ring, &self.delocalised)?;
        for &(bond, a, b) in &self.delocalised {
            if self.kekule.is_double(a, b) {
                graph[EdgeIndex::new(bond as usize)] = BondOrder::Double;
            }
        }
        Ok(())
    }

    fn check_coordination(&self, mark: &DrawnCoordination) -> Result<(), BuildError> {
        let bad = BuildError::BadStereo { atom: mark.centre };
        if mark.centre as usize >= self.atom_count()
            || mark.ligands.len() != mark.polyhedron.positions()
        {
            return Err(bad);
        }
        for (at, ligand) in mark.ligands.iter().enumerate() {
            if let Ligand::Atom(atom) = *ligand {
                let attached = self
                    .molecule
                    .neighbours(mark.centre)
                    .any(|(n, _)| n == atom);
                if !attached || mark.ligands[..at].contains(ligand) {
                    return Err(bad);
                }
            }
        }
        Ok(())
    }

    fn check_stereo(&self, mark: &DrawnStereo) -> Result<(), BuildError> {
        let [first, second] = mark.centres;
        let bad = BuildError::BadStereo { atom: first };
        if [first, second]
            .iter()
            .any(|&atom| atom as usize >= self.atom_count())
        {
            return Err(bad);
        }
        for (at, ligand) in mark.ligands.iter().enumerate() {
            let (centre, from) = if at < 2 { (first, 0) } else { (second, 2) };
            let from = if first == second { 0 } else { from };
            if let Ligand::Atom(atom) = *ligand {
                let attached = self.molecule.neighbours(centre).any(|(n, _)| n == atom);
                if !attached || mark.ligands[from..at].contains(ligand) {
                    return Err(bad);
                }
            }
        }
        Ok(())
    }
}
