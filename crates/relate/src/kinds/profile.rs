//! What the kinds compare: components, rings, functional groups and skeleton of one record.

use molkin_graph::{Element, Formula, GraphError, GraphOrderer};

use crate::{Structure, constitution::Constitution, groups::Marked};

/// A graph with coloured vertices and classed edges.
type Graph = (Vec<u64>, Vec<(u32, u32, u8)>);

/// One side of a comparison.
pub(super) struct Profile {
    constitution: Constitution,
    /// Formulae of the components, sorted.
    components: Vec<Formula>,
    rings: usize,
    ring_atoms: usize,
    frame: Frame,
}

impl Profile {
    pub(super) fn of(structure: &Structure) -> Self {
        let constitution = Constitution::of(structure);
        let components = component_formulae(structure, &constitution);
        let frame = Frame::of(&constitution);
        Self {
            rings: constitution.bonds().len() + components.len() - constitution.atoms().len(),
            ring_atoms: frame.on_ring.iter().filter(|&&ring| ring).count(),
            components,
            frame,
            constitution,
        }
    }

    pub(super) fn components(&self) -> &[Formula] {
        &self.components
    }

    /// Whether it has more rings and more atoms in rings: a bond across a ring closes none of a chain.
    pub(super) fn closes_a_ring_of(&self, other: &Self) -> bool {
        self.rings > other.rings && self.ring_atoms > other.ring_atoms
    }

    /// Whether both have the same functional groups, each the same number of times.
    pub(super) fn has_groups_of(
        &self,
        other: &Self,
        orderer: &mut GraphOrderer,
    ) -> Result<bool, GraphError> {
        let [own, others] = [self, other].map(|profile| {
            let marked = Marked::of(&profile.constitution);
            marked.graph(&marked.atoms())
        });
        isomorphic(&own, &others, orderer)
    }

    /// Whether heteroatoms outside rings divide the frame into pieces of the same sizes.
    pub(super) fn divides_as(&self, other: &Self) -> bool {
        let [own, others] =
            [self, other].map(|profile| profile.frame.piece_sizes(&profile.constitution));
        own == others
    }

    /// Whether both have the same skeleton.
    pub(super) fn has_skeleton_of(
        &self,
        other: &Self,
        orderer: &mut GraphOrderer,
    ) -> Result<bool, GraphError> {
        let [own, others] =
            [self, other].map(|profile| profile.frame.skeleton(&profile.constitution));
        isomorphic(&own, &others, orderer)
    }
}

/// The formulae of the components, sorted.
fn component_formulae(structure: &Structure, constitution: &Constitution) -> Vec<Formula> {
    let (component, count) = constitution.components(|_| true);
    if count == 1 {
        return vec![structure.formula().clone()];
    }
    let mut parts = vec![(Vec::new(), 0); count as usize];
    for (&of, atom) in component.iter().zip(constitution.atoms()) {
        let (counts, charge) = &mut parts[of as usize];
        counts.push((atom.element, 1));
        counts.push((Element::HYDROGEN, u32::from(atom.hydrogens)));
        // The charge as drawn: mesomers move it within a component only.
        let drawn = structure.molecule().atom(atom.source);
        *charge += drawn.map_or(0, |drawn| i32::from(drawn.charge));
    }
    let formulae = parts.into_iter();
    let mut formulae: Vec<Formula> = formulae
        .map(|(counts, charge)| Formula::new(counts, charge))
        .collect();
    formulae.sort_unstable();
    formulae
}

/// Carbons, and heteroatoms of rings.
struct Frame {
    /// Per atom.
    within: Vec<bool>,
    /// Per atom: in a ring.
    on_ring: Vec<bool>,
}

impl Frame {
    fn of(constitution: &Constitution) -> Self {
        let mut on_ring = vec![false; constitution.atoms().len()];
        for bond in constitution.bonds().iter().filter(|bond| bond.in_ring) {
            on_ring[bond.a as usize] = true;
            on_ring[bond.b as usize] = true;
        }
        let within = constitution.atoms().iter().zip(&on_ring);
        let within = within.map(|(atom, &ring)| ring || atom.element == Element::CARBON);
        Self {
            within: within.collect(),
            on_ring,
        }
    }

    fn holds(&self, constitution: &Constitution, bond: u32) -> bool {
        let bond = constitution.bond(bond);
        self.within[bond.a as usize] && self.within[bond.b as usize]
    }

    /// Numbers of atoms of the connected pieces, ascending.
    fn piece_sizes(&self, constitution: &Constitution) -> Vec<u32> {
        let (component, count) = constitution.components(|bond| self.holds(constitution, bond));
        let mut sizes = vec![0; count as usize];
        for (&of, &within) in component.iter().zip(&self.within) {
            sizes[of as usize] += u32::from(within);
        }
        sizes.sort_unstable();
        sizes.retain(|&size| size > 0);
        sizes
    }

    /// The pieces cut where chains meet rings, elements and orders left out. An atom of a chain keeps
    /// the number of rings it sits on; an atom of a ring keeps nothing, so that places on a ring are
    /// equal.
    fn skeleton(&self, constitution: &Constitution) -> Graph {
        let mut place = vec![0; self.within.len()];
        let mut colours = Vec::new();
        for atom in constitution
            .positions()
            .filter(|&atom| self.within[atom as usize])
        {
            place[atom as usize] = colours.len() as u32;
            let ring = self.on_ring[atom as usize];
            let arcs = constitution.arcs(atom).iter();
            let on_rings = arcs.filter(|&&(to, _)| !ring && self.on_ring[to as usize]);
            colours.push((on_rings.count() as u64) << 1 | u64::from(ring));
        }
        let kept = (0..).zip(constitution.bonds()).filter(|&(index, bond)| {
            let touches_ring = self.on_ring[bond.a as usize] || self.on_ring[bond.b as usize];
            self.holds(constitution, index) && (bond.in_ring || !touches_ring)
        });
        let edges = kept.map(|(_, bond)| (place[bond.a as usize], place[bond.b as usize], 0));
        let edges = edges.collect();
        (colours, edges)
    }
}

/// Whether two graphs are the same. Most that differ do so in their colours or edge classes.
fn isomorphic(own: &Graph, other: &Graph, orderer: &mut GraphOrderer) -> Result<bool, GraphError> {
    if census(own) != census(other) {
        return Ok(false);
    }
    let certificate = orderer.order(&own.0, &own.1)?.certificate.to_vec();
    Ok(certificate == orderer.order(&other.0, &other.1)?.certificate)
}

/// Colours, and edges by class and the colours of their ends; sorted.
fn census((colours, edges): &Graph) -> (Vec<u64>, Vec<(u8, u64, u64)>) {
    let mut vertices = colours.clone();
    vertices.sort_unstable();
    let mut ends = Vec::with_capacity(edges.len());
    for &(a, b, class) in edges {
        let (a, b) = (colours[a as usize], colours[b as usize]);
        ends.push((class, a.min(b), a.max(b)));
    }
    ends.sort_unstable();
    (vertices, ends)
}
