//! Atoms that can be tetrahedral centres.

use crate::{
    BondOrder, Element, Shape,
    mesomer::Mesomer,
    skeleton::{Skeleton, SkeletonAtom},
};

use super::{Candidate, Perception, bridgehead, labile, marks::Mark, slot};

/// What an atom is as a possible centre.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(super) enum Eligible {
    /// Configurationally stable.
    Stable,
    /// Nitrogen that is stable only where its ligands are held back: a bridgehead.
    HeldNitrogen,
    /// Nitrogen in a three-membered ring.
    SmallRingNitrogen,
    /// Four ligands on an element without a rule: only marks count.
    Unruled,
}

/// Adds the tetrahedral candidates, and lists in `bridgeheads` which atoms determine each other.
/// `eligibles` is scratch.
pub(super) fn find(
    perception: &mut Perception,
    skeleton: &Skeleton,
    mesomer: &Mesomer,
    marks: &[Mark],
    eligibles: &mut Vec<Option<Eligible>>,
    bridgeheads: &mut bridgehead::Scratch,
) {
    let atoms = 0..skeleton.len() as u32;
    eligibles.clear();
    eligibles.extend(atoms.clone().map(|atom| eligible(skeleton, mesomer, atom)));
    let is = |atom: u32, kind: Eligible| eligibles.get(atom as usize) == Some(&Some(kind));
    let unruled_marks = marks.iter().any(|mark| {
        mark.shape == Shape::Tetrahedral
            && mark.parity.is_some()
            && is(mark.centres[0], Eligible::Unruled)
    });
    let can_be = |atom| is(atom, Eligible::Stable) || is(atom, Eligible::HeldNitrogen);
    bridgehead::find_thetas(skeleton, can_be, bridgeheads);
    let thetas = &bridgeheads.thetas;
    for atom in atoms {
        let quiet = match eligibles[atom as usize] {
            Some(Eligible::Stable) => false,
            Some(Eligible::HeldNitrogen) if thetas.iter().any(|t| t.ends.contains(&atom)) => false,
            Some(Eligible::SmallRingNitrogen) => true,
            Some(Eligible::Unruled) if unruled_marks => true,
            _ => continue,
        };
        let Some(ligands) = ligands(skeleton, atom) else {
            continue;
        };
        if labile::turns_on_mobile_hydrogen(skeleton, atom) {
            continue;
        }
        perception.candidates.push(Candidate {
            shape: Shape::Tetrahedral,
            centres: [atom, atom],
            ligands,
            parity: None,
            quiet,
            remembered: false,
        });
    }
}

fn eligible(skeleton: &Skeleton, mesomer: &Mesomer, atom: u32) -> Option<Eligible> {
    let record = &skeleton.atoms[atom as usize];
    let state = &mesomer.states[atom as usize];
    // Most carbon atoms: not four ligands, or two hydrogens that are alike.
    let alike = record.hydrogens > 1 && record.labelled == 0;
    let degree = skeleton.degree(atom);
    if record.element == Element::CARBON && (alike || degree + usize::from(record.hydrogens) != 4) {
        return None;
    }
    if degree + usize::from(record.hydrogens) > 4
        || degree == 0
        || state.mobile
        || skeleton
            .arcs(atom)
            .iter()
            .any(|&(_, bond)| !matches!(mesomer.orders[bond as usize], 1 | COORDINATION))
    {
        return None;
    }
    let sigma = degree + usize::from(record.hydrogens);
    match (record.element, sigma, state.charge) {
        (Element::CARBON | Element::SILICON | Element::GERMANIUM, 4, 0) => Some(Eligible::Stable),
        (Element::TIN | Element::LEAD, 4, 0) | (Element::BORON, 4, -1) => Some(Eligible::Stable),
        (Element::NITROGEN, 4, 1) if record.hydrogens == 0 => Some(Eligible::Stable),
        // A donor on a metal: the metal is its fourth ligand, drawn as a bond of either kind.
        (Element::NITROGEN | Element::PHOSPHORUS | Element::ARSENIC | Element::ANTIMONY, 4, 0)
        | (Element::SULFUR | Element::SELENIUM | Element::TELLURIUM, 3, 0)
            if record.hydrogens == 0 && is_on_metal(skeleton, atom) =>
        {
            Some(Eligible::Stable)
        }
        (Element::NITROGEN, 4, 1) | (Element::NITROGEN, 3, 0) => {
            Some(if (in_three_ring(skeleton, atom)) && record.charge == 0 {
                Eligible::SmallRingNitrogen
            } else {
                Eligible::HeldNitrogen
            })
        }
        (Element::PHOSPHORUS | Element::ARSENIC | Element::ANTIMONY, 4, 1)
        | (Element::PHOSPHORUS | Element::ARSENIC | Element::ANTIMONY, 3, 0)
        | (Element::SULFUR | Element::SELENIUM | Element::TELLURIUM, 3, 1)
        | (Element::SULFUR | Element::SELENIUM | Element::TELLURIUM, 4, 2) => {
            Some(Eligible::Stable)
        }
        (element, 4, _) if !is_ruled(element) => Some(Eligible::Unruled),
        _ => None,
    }
}

/// The order of a coordination bond.
const COORDINATION: u8 = BondOrder::Coordination as u8;

fn is_on_metal(skeleton: &Skeleton, atom: u32) -> bool {
    skeleton
        .arcs(atom)
        .iter()
        .any(|&(to, _)| skeleton.atoms[to as usize].element.is_metal())
}

/// Elements whose four-ligand forms the rules above settle, for or against.
fn is_ruled(element: Element) -> bool {
    matches!(
        element,
        Element::HYDROGEN
            | Element::BORON
            | Element::CARBON
            | Element::NITROGEN
            | Element::OXYGEN
            | Element::FLUORINE
            | Element::CHLORINE
            | Element::BROMINE
    )
}

fn in_three_ring(skeleton: &Skeleton, atom: u32) -> bool {
    let arcs = skeleton.arcs(atom);
    arcs.iter().enumerate().any(|(at, &(a, _))| {
        let mut others = arcs[..at].iter();
        others.any(|&(b, _)| skeleton.bond_between(a, b).is_some())
    })
}

/// The four ligands of an atom, or `None` if it has not four or two of them are alike at sight.
fn ligands(skeleton: &Skeleton, atom: u32) -> Option<[u32; 4]> {
    let record = &skeleton.atoms[atom as usize];
    let arcs = skeleton.arcs(atom);
    let hydrogens = usize::from(record.hydrogens);
    if !matches!(arcs.len() + hydrogens, 3 | 4) {
        return None;
    }
    let mut found = [slot::LONE_PAIR; 4];
    for (ligand, &(to, _)) in found.iter_mut().zip(arcs) {
        *ligand = to;
    }
    let slots = &mut found[arcs.len()..arcs.len() + hydrogens];
    put_hydrogens(slots, record);
    let alike = slots.windows(2).any(|pair| pair[0] == pair[1]);
    (!alike).then_some(found)
}

/// Writes the slots of an atom's hydrogens, those of one kind together, as far as there is room.
pub(super) fn put_hydrogens(slots: &mut [u32], record: &SkeletonAtom) {
    if record.labelled == 0 {
        // Nearly always: hydrogens of natural composition only.
        let count = slots.len().min(record.hydrogens.into());
        slots[..count].fill(slot::HYDROGEN);
        return;
    }
    let hydrogens = hydrogen_slots(record.hydrogens, record.labelled);
    for (slot, hydrogen) in slots.iter_mut().zip(hydrogens) {
        *slot = hydrogen;
    }
}

/// The slots of counted and folded hydrogens.
pub(super) fn hydrogen_slots(hydrogens: u8, labelled: u16) -> impl Iterator<Item = u32> {
    let count = move |mass: u32| u32::from(labelled >> (4 * (mass - 1)) & 15);
    let natural = u32::from(hydrogens).saturating_sub((1..=3).map(count).sum());
    std::iter::once((0, natural))
        .chain((1..=3).map(move |mass| (mass, count(mass))))
        .flat_map(|(mass, count)| std::iter::repeat_n(slot::HYDROGEN + mass, count as usize))
}
