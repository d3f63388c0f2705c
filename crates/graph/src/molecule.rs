//! The molecule: constitution and stereo marks as drawn.

use petgraph::graph::{NodeIndex, UnGraph};

use crate::{Atom, BondOrder, DrawnCoordination, DrawnStereo, Element, Formula, StereoGroup};

/// A molecule, or several components that one record holds, as drawn.
///
/// Atoms are numbered from 0 in input order. Hydrogens are either counted on their atom or atoms of
/// their own, as the record had them; nothing that decides identity depends on which. Bond orders
/// are those of one valence structure; aromatic symbols have been resolved by the builder.
/// Immutable once built.
///
/// # Examples
/// ```
/// use molkin_graph::{Atom, BondOrder, Element, MoleculeBuilder};
///
/// let mut builder = MoleculeBuilder::new();
/// let carbon = builder.add_atom(Atom { hydrogens: 3, ..Atom::new(Element::CARBON) });
/// let oxygen = builder.add_atom(Atom { hydrogens: 1, ..Atom::new(Element::OXYGEN) });
/// builder.add_bond(carbon, oxygen, BondOrder::Single)?;
/// let methanol = builder.build()?;
/// assert_eq!(methanol.formula().to_string(), "CH4O");
/// # Ok::<(), molkin_graph::BuildError>(())
/// ```
#[derive(Debug, Clone, Default)]
pub struct Molecule {
    pub(crate) graph: UnGraph<Atom, BondOrder, u32>,
    /// Per bond: in a ring. Found once, by the builder, for Kekulé structures and for all later work.
    pub(crate) ring: Vec<bool>,
    pub(crate) stereo: Vec<DrawnStereo>,
    pub(crate) coordination: Vec<DrawnCoordination>,
    pub(crate) groups: Vec<StereoGroup>,
    pub(crate) remembered: Vec<DrawnStereo>,
    /// For each number of the record that belongs to no atom, how many atoms come before it.
    pub(crate) skipped: Vec<u32>,
}

impl Molecule {
    /// The number of atoms, hydrogens that are atoms of their own included.
    pub fn atom_count(&self) -> usize {
        self.graph.node_count()
    }

    /// The atom with this index, if there is one.
    pub fn atom(&self, index: u32) -> Option<&Atom> {
        self.graph.node_weight(NodeIndex::new(index as usize))
    }

    /// The number of an atom in its record, from 1: the index and one, and one more for each number
    /// before it that the record gives to something that is no atom.
    ///
    /// # Examples
    /// ```
    /// use molkin_graph::{Atom, Element, MoleculeBuilder};
    ///
    /// let mut builder = MoleculeBuilder::new();
    /// let first = builder.add_atom(Atom::new(Element::IRON));
    /// builder.skip_number();
    /// let second = builder.add_atom(Atom::new(Element::CARBON));
    /// let molecule = builder.build()?;
    /// assert_eq!([first, second].map(|atom| molecule.number(atom)), [1, 3]);
    /// # Ok::<(), molkin_graph::BuildError>(())
    /// ```
    pub fn number(&self, index: u32) -> u32 {
        let before = self.skipped.partition_point(|&atoms| atoms <= index);
        index.saturating_add(1).saturating_add(before as u32)
    }

    /// All atoms in input order.
    pub fn atoms(&self) -> impl ExactSizeIterator<Item = &Atom> {
        self.graph.raw_nodes().iter().map(|node| &node.weight)
    }

    /// All bonds in input order: the two atoms and the drawn order.
    pub fn bonds(&self) -> impl ExactSizeIterator<Item = (u32, u32, BondOrder)> {
        self.graph.raw_edges().iter().map(|edge| {
            (
                edge.source().index() as u32,
                edge.target().index() as u32,
                edge.weight,
            )
        })
    }

    /// The atoms bonded to an atom, with the drawn bond orders; empty for an index out of range.
    pub fn neighbours(&self, index: u32) -> impl Iterator<Item = (u32, BondOrder)> {
        use petgraph::visit::EdgeRef;
        let here = NodeIndex::new(index as usize);
        self.graph.edges(here).map(move |edge| {
            let other = if edge.source() == here {
                edge.target()
            } else {
                edge.source()
            };
            (other.index() as u32, *edge.weight())
        })
    }

    /// The stereo marks as drawn.
    pub fn drawn_stereo(&self) -> &[DrawnStereo] {
        &self.stereo
    }

    /// Centres that are not tetrahedral, with the arrangement that the record gives.
    pub fn drawn_coordination(&self) -> &[DrawnCoordination] {
        &self.coordination
    }

    /// Marks of places that a revision has erased. A record has none. They count for identity and are
    /// never written: two molecules that differ in them alone are different.
    pub fn remembered_stereo(&self) -> &[DrawnStereo] {
        &self.remembered
    }

    /// Groups of stereo elements whose marks are meant relative to each other.
    pub fn stereo_groups(&self) -> &[StereoGroup] {
        &self.groups
    }

    /// The graph itself, for callers who run other graph algorithms on it.
    pub fn graph(&self) -> &UnGraph<Atom, BondOrder, u32> {
        &self.graph
    }

    /// The molecular formula, hydrogens that are only counted included.
    pub fn formula(&self) -> Formula {
        let mut formula = Formula::default();
        self.formula_into(&mut formula);
        formula
    }

    /// As [`Molecule::formula`], in place of a formula whose memory is reused.
    pub fn formula_into(&self, formula: &mut Formula) {
        let heavy = self.atoms().map(|atom| (atom.element, 1));
        let hydrogens = self
            .atoms()
            .map(|atom| (Element::HYDROGEN, u32::from(atom.hydrogens)));
        formula.refill(heavy.chain(hydrogens), self.charge());
    }

    /// The net charge.
    pub fn charge(&self) -> i32 {
        self.atoms().map(|atom| i32::from(atom.charge)).sum()
    }
}
