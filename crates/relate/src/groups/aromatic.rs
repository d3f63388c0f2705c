//! Which bonds count as aromatic when functional groups are looked for, and when a proton is put where it
//! leaves most of a molecule aromatic. Nothing else asks this.

use molkin_graph::Element;

use crate::constitution::Constitution;

/// For each bond whether it is aromatic (docs/definitions.md): in a ring of mobile bonds, unless that
/// is a lone ring of 4n atoms, or in a five-membered ring like those of furan, pyrrole and thiophene.
pub(crate) fn aromatic_bonds(constitution: &Constitution) -> Vec<bool> {
    let mut aromatic = mobile_rings(constitution);
    if aromatic.contains(&true) {
        leave_out_bond_shift_rings(constitution, &mut aromatic);
    }
    add_five_membered_rings(constitution, &mut aromatic);
    aromatic
}

/// Mobile bonds of rings, chains that end between atoms without another stripped off.
fn mobile_rings(constitution: &Constitution) -> Vec<bool> {
    let bonds = constitution.bonds().iter();
    let mut left: Vec<bool> = bonds
        .map(|bond| bond.order.is_none() && bond.in_ring)
        .collect();
    let mut open: Vec<u32> = constitution.positions().collect();
    while let Some(atom) = open.pop() {
        let arcs = constitution.arcs(atom).iter();
        let mut own = arcs.filter(|&&(_, bond)| left[bond as usize]);
        if let (Some(&(to, bond)), None) = (own.next(), own.next()) {
            left[bond as usize] = false;
            open.push(to);
        }
    }
    left
}

/// Cyclobutadiene and cyclooctatetraene shift their bonds and are olefins.
fn leave_out_bond_shift_rings(constitution: &Constitution, aromatic: &mut [bool]) {
    let (component, count) = constitution.components(|bond| aromatic[bond as usize]);
    let mut sizes = vec![(0u32, true); count as usize];
    for atom in constitution.positions() {
        let arcs = constitution.arcs(atom).iter();
        let own = arcs.filter(|&&(_, bond)| aromatic[bond as usize]).count();
        let (size, lone) = &mut sizes[component[atom as usize] as usize];
        *size += 1;
        *lone &= own == 2;
    }
    for (slot, bond) in aromatic.iter_mut().zip(constitution.bonds()) {
        let (size, lone) = sizes[component[bond.a as usize] as usize];
        *slot &= !(lone && size % 4 == 0);
    }
}

/// Rings of a heteroatom that lends its lone pair and two double or mobile bonds.
fn add_five_membered_rings(constitution: &Constitution, aromatic: &mut [bool]) {
    let double = |bond: u32| {
        let bond = constitution.bond(bond);
        bond.in_ring && matches!(bond.order, Some(2) | None)
    };
    // Paths donor – atom = atom.
    let mut arms = Vec::new();
    for donor in constitution.positions() {
        if !can_lend(constitution, donor) {
            continue;
        }
        arms.clear();
        for &(near, first) in constitution.arcs(donor) {
            let arcs = constitution.arcs(near).iter();
            let beyond = arcs.filter(|&&(far, bond)| far != donor && double(bond));
            arms.extend(beyond.map(|&(far, second)| (near, far, [first, second])));
        }
        for (at, &(near, far, bonds)) in arms.iter().enumerate() {
            for &(other_near, other_far, other_bonds) in &arms[at + 1..] {
                if near == other_near || near == other_far || far == other_near {
                    continue;
                }
                let mut arcs = constitution.arcs(far).iter();
                if let Some(&(_, closing)) = arcs.find(|&&(to, _)| to == other_far) {
                    for bond in bonds.into_iter().chain(other_bonds).chain([closing]) {
                        aromatic[bond as usize] = true;
                    }
                }
            }
        }
    }
}

/// Heteroatoms whose lone pair takes part in a five-membered ring.
const LENDERS: [Element; 5] = [
    Element::NITROGEN,
    Element::OXYGEN,
    Element::SULFUR,
    Element::SELENIUM,
    Element::TELLURIUM,
];

/// Whether an atom of a ring is one of these, without a charge or double bond of its own.
fn can_lend(constitution: &Constitution, atom: u32) -> bool {
    let own = constitution.atom(atom);
    let bonds = || {
        let arcs = constitution.arcs(atom).iter();
        arcs.map(|&(_, bond)| constitution.bond(bond))
    };
    LENDERS.contains(&own.element)
        && matches!(own.charge, Some(0) | None)
        && bonds().any(|bond| bond.in_ring)
        && bonds().all(|bond| matches!(bond.order, Some(1) | None))
}
