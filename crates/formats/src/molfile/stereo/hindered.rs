//! Single bonds about which rotation is hindered (atropisomers), as wedges at their ends mark them.
//!
//! Whether rotation is hindered is not judged: the drawing says so by its wedges.

use molkin_graph::{Element, Ligand};

use crate::molfile::{
    drawing::{BondKind, BondMark},
    stereo::{Scene, chain::Chain},
};

/// Rings of at most this size hold their bonds in one plane.
const FLAT_RING: usize = 6;

/// The axes at whose ends a wedge starts, in the order of their first atoms. A wavy bond says that
/// an axis is unknown, unless it is about a double bond among `chains`.
pub(super) fn find(scene: &Scene<'_>, chains: &[Chain]) -> Vec<Chain> {
    let mut double: Vec<u32> = chains
        .iter()
        .filter(|chain| !chain.is_axis())
        .flat_map(|chain| chain.ends)
        .collect();
    double.sort_unstable();
    let is_marked = |atom: u32, bond: u32| match scene.mark_from(atom, bond) {
        BondMark::Plain => false,
        BondMark::Either => double.binary_search(&atom).is_err(),
        BondMark::Up | BondMark::Down => true,
    };
    let mut axes: Vec<Chain> = Vec::new();
    for (marked, bond) in (0_u32..).zip(&scene.drawing.bonds) {
        let atom = bond.ends[0];
        if is_marked(atom, marked) {
            axes.extend(axis(scene, atom, marked));
        }
    }
    axes.sort_by_key(|axis| axis.ends);
    axes.dedup_by_key(|axis| axis.ends);
    axes
}

/// The only axis at an atom that a marked bond there can be about.
fn axis(scene: &Scene<'_>, atom: u32, marked: u32) -> Option<Chain> {
    if !is_flat(scene, atom) {
        return None;
    }
    let neighbours = scene.neighbours.of(atom).iter();
    let mut axes = neighbours.filter(|&&(there, bond)| {
        bond != marked
            && scene.bond(bond).kind == BondKind::Single
            && is_flat(scene, there)
            && may_turn(scene, bond, [atom, there])
    });
    let (first, second) = (axes.next(), axes.next());
    let (&(there, bond), None) = (first?, second) else {
        return None;
    };
    let ends = [atom.min(there), atom.max(there)];
    let [a, b] = ends.map(|end| ligands(scene, end, bond));
    Some(Chain::single(ends, [a?, b?]))
}

/// Whether the bonds of an atom lie in a plane: it is unsaturated and no possible centre (as sulfur
/// of a sulfoxide is), or nitrogen with a lone pair between two unsaturated atoms.
fn is_flat(scene: &Scene<'_>, atom: u32) -> bool {
    let neighbours = scene.neighbours.of(atom);
    if neighbours.len() > 3 {
        return false;
    }
    if scene.ligands(atom).is_none() {
        return scene.site(atom).unsaturated;
    }
    let unsaturated = neighbours
        .iter()
        .filter(|&&(there, _)| scene.site(there).unsaturated);
    scene.drawing.atoms[atom as usize].element == Element::NITROGEN && unsaturated.count() > 1
}

/// Whether the ends of a bond can be turned against each other: outside rings, and in larger ones
/// between two flat rings (bridged biaryls). Wedges elsewhere in a ring show it in perspective.
fn may_turn(scene: &Scene<'_>, bond: u32, ends: [u32; 2]) -> bool {
    let in_ring = |bond, ends| scene.neighbours.in_ring_within(FLAT_RING, bond, ends);
    let in_flat_ring = |end: u32| {
        let others = scene.neighbours.of(end).iter();
        let mut others = others.filter(|&&(_, by)| by != bond);
        others.all(|&(there, by)| in_ring(by, [end, there]))
    };
    !scene.neighbours.in_ring(bond) || !in_ring(bond, ends) && ends.into_iter().all(in_flat_ring)
}

/// What an end carries besides the axis: two atoms, or one and a hydrogen or a lone pair.
fn ligands(scene: &Scene<'_>, end: u32, axis: u32) -> Option<[Ligand; 2]> {
    let site = scene.site(end);
    let mut others = scene.neighbours.of(end).iter();
    let mut next = || {
        others
            .find(|&&(_, bond)| bond != axis)
            .map(|&(atom, _)| atom)
    };
    let (first, second, more) = (next()?, next(), next());
    let second = match (second, more, site.hydrogens) {
        (Some(second), None, 0) => Ligand::Atom(second),
        (None, None, 1) => Ligand::Hydrogen,
        (None, None, 0) if site.has_lone_pair() => Ligand::LonePair,
        _ => return None,
    };
    Some([Ligand::Atom(first), second])
}
