//! The marked stereo elements of a record, on the atoms of its skeleton.

use crate::{
    Canonical, Ligand, Mark, Shape, StereoElement,
    skeleton::{NO_ATOM, Skeleton},
};

use super::{
    budget::{Budget, Exhausted},
    digraph::{Digraph, Kind, NONE},
};

/// A ligand of a unit.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(super) enum Place {
    Atom(u32),
    /// A hydrogen of this mass number, 0 if natural.
    Hydrogen(u8),
    LonePair,
}

/// A marked stereo element.
#[derive(Debug, Clone)]
pub(super) struct Unit {
    pub(super) shape: Shape,
    /// Skeleton atoms: the centre twice, or the two ends.
    pub(super) ends: [u32; 2],
    pub(super) ligands: [Place; 4],
    pub(super) odd: bool,
    /// A bridgehead whose mark says nothing about the compound.
    pub(super) idle: bool,
    /// The atoms from the first end to the second, these left out.
    chain: Vec<u32>,
}

impl Unit {
    /// The unit of an element, if it is marked.
    pub(super) fn new(canonical: &Canonical, element: &StereoElement, idle: bool) -> Option<Self> {
        let Mark::Given(parity) = element.mark else {
            return None;
        };
        let skeleton = &canonical.skeleton;
        let ends = element.centres.map(|atom| skeleton.home[atom as usize]);
        let ligands = element.ligands.map(|ligand| place(skeleton, ligand));
        Some(Self {
            shape: element.shape,
            ends,
            ligands,
            odd: parity.is_odd(),
            idle,
            chain: chain(skeleton, ends, &ligands)?,
        })
    }

    /// The ligands at one end; all of them for a tetrahedral centre.
    pub(super) fn ligands_at(&self, end: usize) -> &[Place] {
        match self.shape {
            Shape::Tetrahedral => &self.ligands,
            Shape::DoubleBond | Shape::Axis => &self.ligands[2 * end..2 * end + 2],
        }
    }

    /// How many ends it has.
    pub(super) fn end_count(&self) -> usize {
        match self.shape {
            Shape::Tetrahedral => 1,
            Shape::DoubleBond | Shape::Axis => 2,
        }
    }

    /// In the digraph, the node of the other end, outward from a node of one end; `None` where the
    /// path meets itself before.
    pub(super) fn other_end(
        &self,
        digraph: &mut Digraph<'_>,
        near: u32,
        end: usize,
        budget: &mut Budget<'_>,
    ) -> Result<Option<u32>, Exhausted> {
        let far = self.ends[1 - end];
        let forward = self.chain.iter().copied().chain([far]);
        let backward = self.chain.iter().rev().copied().chain([far]);
        let path: Vec<u32> = if end == 0 {
            forward.collect()
        } else {
            backward.collect()
        };
        let mut node = near;
        for atom in path {
            let children = digraph.children(node, budget)?;
            let next = children.into_iter().find(|&child| {
                let child = digraph.node(child);
                child.kind == Kind::Atom && child.atom == atom
            });
            let Some(next) = next else { return Ok(None) };
            node = next;
        }
        Ok(Some(node))
    }
}

/// The nodes about a node that are the given ligands; lone pairs have none.
pub(super) fn ligand_nodes(
    digraph: &mut Digraph<'_>,
    centre: u32,
    ligands: &[Place],
    budget: &mut Budget<'_>,
) -> Result<Vec<Option<u32>>, Exhausted> {
    let children = digraph.children(centre, budget)?;
    let parent = digraph.node(centre).parent;
    let inward = (parent != NONE).then_some(parent);
    let find = |ligand: &Place| {
        children.clone().chain(inward).find(|&node| {
            let node = digraph.node(node);
            match *ligand {
                Place::Atom(atom) => node.atom == atom && node.kind != Kind::MultipleBond,
                Place::Hydrogen(mass) => node.kind == Kind::Hydrogen(mass),
                Place::LonePair => false,
            }
        })
    };
    Ok(ligands.iter().map(find).collect())
}

fn place(skeleton: &Skeleton, ligand: Ligand) -> Place {
    match ligand {
        Ligand::LonePair => Place::LonePair,
        Ligand::Hydrogen => Place::Hydrogen(0),
        Ligand::Atom(atom) => match skeleton.folded[atom as usize] {
            Some(mass) => Place::Hydrogen(mass),
            None => Place::Atom(skeleton.home[atom as usize]),
        },
    }
}

/// The inner atoms of a cumulene; none for other units. `None` if the ends are not joined so.
fn chain(skeleton: &Skeleton, [first, last]: [u32; 2], ligands: &[Place; 4]) -> Option<Vec<u32>> {
    let mut chain = Vec::new();
    if first == last || skeleton.bond_between(first, last).is_some() {
        return Some(chain);
    }
    let is_ligand = |atom: u32| ligands[..2].contains(&Place::Atom(atom));
    let mut arcs = skeleton.arcs(first).iter().map(|&(to, _)| to);
    let mut before = first;
    let mut atom = arcs.find(|&to| !is_ligand(to))?;
    while atom != last {
        if chain.len() > skeleton.len() || atom == NO_ATOM {
            return None;
        }
        chain.push(atom);
        let next = skeleton
            .arcs(atom)
            .iter()
            .map(|&(to, _)| to)
            .find(|&to| to != before)?;
        (before, atom) = (atom, next);
    }
    Some(chain)
}
