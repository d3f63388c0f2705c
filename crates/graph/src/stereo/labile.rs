//! Marks that chemistry does not keep: the table of labile stereo (docs/definitions.md).

use crate::{Element, mesomer::Mesomer, skeleton::Skeleton};

/// Whether the arrangement about phosphorus, sulfur or arsenic depends on which of two like
/// terminal chalcogens bears a hydrogen: P(=O)(OH), S(=O)(OH) and their kin.
pub(super) fn turns_on_mobile_hydrogen(skeleton: &Skeleton, atom: u32) -> bool {
    if !matches!(skeleton.atoms[atom as usize].element.group(), Some(15 | 16)) {
        return false;
    }
    let terminal = |&&(to, _): &&(u32, u32)| {
        skeleton.degree(to) == 1 && skeleton.atoms[to as usize].element.group() == Some(16)
    };
    let arcs = skeleton.arcs(atom);
    arcs.iter().filter(terminal).any(|&(a, _)| {
        let a = &skeleton.atoms[a as usize];
        a.hydrogens > 0
            && arcs.iter().filter(terminal).any(|&(b, _)| {
                let b = &skeleton.atoms[b as usize];
                b.hydrogens == 0 && b.element == a.element && b.isotope == a.isotope
            })
    })
}

/// Whether a C=N bond turns easily: amidines, guanidines, imidates (carbon bears nitrogen with a
/// lone pair, or oxygen), and imines with a hydrogen on nitrogen.
pub(super) fn is_labile_imine(skeleton: &Skeleton, mesomer: &Mesomer, a: u32, b: u32) -> bool {
    let element = |atom: u32| skeleton.atoms[atom as usize].element;
    let (carbon, nitrogen) = match (element(a), element(b)) {
        (Element::CARBON, Element::NITROGEN) => (a, b),
        (Element::NITROGEN, Element::CARBON) => (b, a),
        _ => return false,
    };
    if skeleton.atoms[nitrogen as usize].hydrogens > 0 && skeleton.degree(nitrogen) == 1 {
        return true;
    }
    skeleton.arcs(carbon).iter().any(|&(to, _)| {
        to != nitrogen
            && match element(to) {
                Element::OXYGEN => true,
                Element::NITROGEN => !has_own_double_bond(skeleton, mesomer, to, carbon),
                _ => false,
            }
    })
}

fn has_own_double_bond(skeleton: &Skeleton, mesomer: &Mesomer, atom: u32, except: u32) -> bool {
    mesomer.states[atom as usize].charge > 0
        || skeleton
            .arcs(atom)
            .iter()
            .any(|&(to, bond)| to != except && mesomer.orders[bond as usize] == 2)
}
