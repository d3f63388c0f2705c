//! Electrons and valences: implicit hydrogens, what an aromatic atom gives to its ring, lone pairs.

use molkin_graph::{Atom, Element, PiDemand};

use super::syntax::AtomSyntax;

/// The valences from which implicit hydrogens follow (OpenSMILES, organic subset).
const fn listed(element: Element) -> &'static [u32] {
    match element {
        Element::BORON => &[3],
        Element::CARBON => &[4],
        Element::NITROGEN | Element::PHOSPHORUS => &[3, 5],
        Element::OXYGEN => &[2],
        Element::SULFUR => &[2, 4, 6],
        Element::FLUORINE | Element::CHLORINE | Element::BROMINE | Element::IODINE => &[1],
        _ => &[],
    }
}

/// The first of the listed valences, 0 where there is none: a table, as each atom of a record asks for
/// it several times and comparing elements one after another is slower.
fn lowest(element: Element) -> u32 {
    static LOWEST: [u8; 54] = {
        let mut lowest = [0; 54];
        let mut number = 0;
        while number < lowest.len() {
            if let Some(element) = Element::from_number(number as u8)
                && let [first, ..] = listed(element)
            {
                lowest[number] = *first as u8;
            }
            number += 1;
        }
        lowest
    };
    let lowest = LOWEST.get(usize::from(element.number()));
    lowest.copied().map_or(0, u32::from)
}

/// The hydrogens of an atom that is written without brackets.
///
/// They fill the smallest listed valence that the bonds do not exceed. An aromatic atom uses its
/// lowest valence only, one unit of which goes to the ring unless a multiple bond has taken it.
pub(super) fn implicit_hydrogens(atom: &AtomSyntax) -> u8 {
    if !atom.aromatic {
        return hydrogens_beside(atom.atom.element, atom.order_sum);
    }
    let ring = u32::from(!atom.multiple);
    lowest(atom.atom.element).saturating_sub(atom.order_sum + ring) as u8
}

/// The hydrogens of a bare symbol that is not aromatic, beside bonds whose orders have this sum.
pub(super) fn hydrogens_beside(element: Element, order_sum: u32) -> u8 {
    // Nearly all atoms are within their lowest valence.
    if let Some(left) = lowest(element).checked_sub(order_sum) {
        return left as u8;
    }
    let mut valences = listed(element).iter();
    let fits = valences.find(|&&valence| valence >= order_sum);
    fits.map_or(0, |valence| valence - order_sum) as u8
}

/// What the valences of an atom call for as a remark, if anything.
///
/// Neutral atoms of the organic subset are looked at; `demand` is what the atom gives to its ring.
/// Heavy halogens count up to 7, since perchlorates and periodinanes are customary.
pub(super) fn oddity(atom: &AtomSyntax, demand: PiDemand) -> Option<&'static str> {
    let Atom {
        element,
        charge,
        hydrogens,
        ..
    } = atom.atom;
    // By far most atoms are bare and within the first valence, a bond of the ring included.
    if charge != 0 || !atom.bracket && atom.order_sum <= lowest(element) {
        return None;
    }
    let listed = listed(element);
    let most = match element {
        Element::CHLORINE | Element::BROMINE | Element::IODINE => 7,
        _ => *listed.last()?,
    };
    let ring = u32::from(atom.aromatic && demand == PiDemand::Needed);
    if atom.order_sum + u32::from(hydrogens) + ring > most {
        return Some("has more bonds than is usual for it");
    }
    let chalcogen = element == Element::OXYGEN || element == Element::SULFUR;
    if chalcogen && atom.aromatic && !atom.bracket && atom.order_sum == 3 {
        return Some("is aromatic, uncharged and has three bonds");
    }
    if element == Element::NITROGEN && !atom.bracket && atom.order_sum == 4 && hydrogens == 1 {
        return Some("is given a hydrogen to reach valence 5");
    }
    None
}

/// Valence electrons of a main-group element.
fn valence_electrons(element: Element) -> Option<i64> {
    match element.group()? {
        group @ 1..=2 => Some(i64::from(group)),
        group @ 13..=18 => Some(i64::from(group) - 10),
        _ => None,
    }
}

/// Valence electrons of an atom that are in none of its written bonds; negative where it has more
/// bonds than electrons. `None` for wildcards and elements outside the main groups.
fn electrons_left(atom: &AtomSyntax) -> Option<i64> {
    let Atom {
        element,
        charge,
        hydrogens,
        ..
    } = atom.atom;
    let bonds = i64::from(atom.order_sum) + i64::from(hydrogens);
    Some(valence_electrons(element)? - i64::from(charge) - bonds)
}

/// Whether an atom has a lone pair beside its bonds.
pub(super) fn has_lone_pair(atom: &AtomSyntax, demand: PiDemand) -> bool {
    let ring = i64::from(atom.aromatic && demand == PiDemand::Needed);
    electrons_left(atom).is_some_and(|left| left - ring >= 2)
}

/// Whether a site of a coordination polyhedron can be without a ligand: a lone pair is in its place,
/// or on transition metals and atoms of unknown element nothing that can be told.
pub(super) fn may_have_lone_pair(atom: &AtomSyntax) -> bool {
    electrons_left(atom).is_none_or(|left| left >= 2)
}

/// Whether an aromatic atom takes part in a double bond of its ring.
///
/// Single bonds leave an odd electron to an atom that gives one to the ring (`c`, pyridine `n`,
/// `[n+]` with three bonds, `n(=O)`), and an even number to one that gives a pair or nothing
/// (`[nH]`, `o`, `s`, `[cH-]`, `[cH+]`, `[bH]`). Two left on an atom with two bonds, as in `[c]`,
/// can be either: σ radical or carbene. `None` where the atom has more bonds than electrons.
pub(super) fn pi_demand(atom: &AtomSyntax) -> Option<PiDemand> {
    if atom.atom.element == Element::WILDCARD {
        return Some(PiDemand::Optional);
    }
    let Some(left) = electrons_left(atom) else {
        return Some(PiDemand::Excluded);
    };
    // One multiple bond is all that an atom without an expanded octet has a p orbital for.
    let expanded = atom.atom.charge == 0 && atom.atom.element.group() > Some(14);
    if left < 0 {
        return None;
    }
    if atom.multiple && !expanded {
        return Some(PiDemand::Excluded);
    }
    let two_bonds = atom.order_sum + u32::from(atom.atom.hydrogens) == 2;
    let carbon_like = two_bonds && left == 2;
    Some(match (left % 2, carbon_like) {
        (1, _) => PiDemand::Needed,
        (_, true) => PiDemand::Optional,
        _ => PiDemand::Excluded,
    })
}
