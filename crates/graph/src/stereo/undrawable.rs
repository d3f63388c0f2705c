//! What a plain drawing cannot say although it may matter: rules of thumb, which decide a note and
//! whether the record is open, and never a relation.

use crate::{Element, mesomer::Mesomer, order::Generators, skeleton::Skeleton};

use super::Perception;

/// A place whose arrangement the record leaves out because its notation has no plain way to say it.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
#[non_exhaustive]
pub enum Undrawable {
    /// A single bond between two aromatic rings with at least three of the four ortho places
    /// taken: rotation may be hindered (atropisomers).
    HinderedAxis {
        /// The two atoms of the axis.
        atoms: [u32; 2],
    },
    /// A metal with four or more neighbours that are not all alike.
    MetalCentre {
        /// The metal.
        atom: u32,
    },
}

impl Perception {
    /// Lists the places that the record leaves out, as skeleton atoms. `generators` are those of the
    /// automorphisms of the constitution.
    pub(crate) fn find_undrawable(
        &mut self,
        skeleton: &Skeleton,
        mesomer: &Mesomer,
        generators: &Generators,
    ) {
        find(self, skeleton, mesomer);
        self.keep_unequal_axes(skeleton, generators);
    }
}

fn find(perception: &mut Perception, skeleton: &Skeleton, mesomer: &Mesomer) {
    for (index, bond) in skeleton.bonds.iter().enumerate() {
        let axis = mesomer.orders[index] == 1
            && !skeleton.ring[index]
            && is_sp2_ring_atom(skeleton, mesomer, bond.a)
            && is_sp2_ring_atom(skeleton, mesomer, bond.b);
        if !axis || is_marked(perception, [bond.a, bond.b]) {
            continue;
        }
        let (first, second) = (
            ortho(skeleton, bond.a, bond.b),
            ortho(skeleton, bond.b, bond.a),
        );
        if first.min(second) >= 1 && first + second >= 3 {
            perception.undrawable.push(Undrawable::HinderedAxis {
                atoms: [bond.a, bond.b],
            });
        }
    }
    for atom in 0..skeleton.len() as u32 {
        if is_transition_metal(skeleton.atoms[atom as usize].element)
            && skeleton.degree(atom) >= 4
            && !neighbours_alike(skeleton, atom)
            && !is_marked(perception, [atom, atom])
            && !perception.placed.iter().any(|placed| placed.centre == atom)
        {
            perception.undrawable.push(Undrawable::MetalCentre { atom });
        }
    }
}

fn is_marked(perception: &Perception, centres: [u32; 2]) -> bool {
    let candidate = perception.candidate_at(centres);
    candidate.is_some_and(|index| perception.candidates[index].parity.is_some())
}

impl Perception {
    /// Keeps the hindered axes at whose two ends the ortho places differ; the others have a plane
    /// of symmetry through the axis. A rule of thumb like the rest of this file: it asks the
    /// `generators` of the automorphisms of the constitution, not their products.
    fn keep_unequal_axes(&mut self, skeleton: &Skeleton, generators: &Generators) {
        self.undrawable.retain(|place| match *place {
            Undrawable::HinderedAxis { atoms: [a, b] } => {
                // An automorphism that fixes one end and exchanges its ortho places.
                let exchanged = |end: u32, other: u32| {
                    generators.iter().any(|g| {
                        g.image(end) == end
                            && skeleton
                                .arcs(end)
                                .iter()
                                .any(|&(to, _)| to != other && g.image(to) != to)
                    })
                };
                !exchanged(a, b) && !exchanged(b, a)
            }
            Undrawable::MetalCentre { .. } => true,
        });
    }
}

fn is_transition_metal(element: Element) -> bool {
    element.is_metal() && matches!(element.group(), None | Some(3..=12))
}

fn neighbours_alike(skeleton: &Skeleton, atom: u32) -> bool {
    let mut kinds = skeleton.arcs(atom).iter().map(|&(to, _)| {
        let record = &skeleton.atoms[to as usize];
        (record.element, record.isotope, skeleton.degree(to))
    });
    let first = kinds.next();
    kinds.all(|kind| Some(kind) == first)
}

fn is_sp2_ring_atom(skeleton: &Skeleton, mesomer: &Mesomer, atom: u32) -> bool {
    let arcs = skeleton.arcs(atom);
    arcs.len() == 3
        && arcs.iter().any(|&(_, b)| skeleton.ring[b as usize])
        && arcs.iter().any(|&(_, b)| mesomer.orders[b as usize] != 1)
}

/// How many of the ring neighbours of an axis atom carry a further non-hydrogen neighbour outside
/// the plainest ring: a substituent or a fused ring.
fn ortho(skeleton: &Skeleton, atom: u32, other: u32) -> usize {
    let ring_neighbours = skeleton.arcs(atom).iter().filter(|&&(to, _)| to != other);
    ring_neighbours
        .filter(|&&(to, _)| skeleton.degree(to) >= 3)
        .count()
}
