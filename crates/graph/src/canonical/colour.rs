//! What identity rests on, atom by atom and bond by bond, packed for the canonical search.

use crate::{
    OrderError,
    mesomer::{AtomState, Mesomer},
    order::Coloured,
    skeleton::{Skeleton, SkeletonAtom},
};

/// Loads the graph of a molecule: σ skeleton, hydrogens, fixed and mobile bonds, charges and open
/// valences, and isotopes if asked for. No stereo.
pub(super) fn load(
    graph: &mut Coloured,
    skeleton: &Skeleton,
    mesomer: &Mesomer,
    isotopes: bool,
) -> Result<(), OrderError> {
    let mut beyond = None;
    let atoms = skeleton.atoms.iter().zip(&mesomer.states);
    let words = atoms.map(|(atom, state)| {
        if !fits(atom, state, isotopes) {
            beyond.get_or_insert(atom.source);
        }
        word(atom, state, isotopes)
    });
    graph.load_arcs(words, |atom| {
        let arcs = skeleton.arcs(atom).iter();
        arcs.map(|&(to, bond)| (to, mesomer.orders[bond as usize]))
    });
    match beyond {
        Some(atom) => Err(OrderError::OutOfRange { atom }),
        None => Ok(()),
    }
}

/// Whether each number has room in its field of the word; a charge of eight bits always has.
fn fits(atom: &SkeletonAtom, state: &AtomState, isotopes: bool) -> bool {
    atom.hydrogens < 1 << 5
        && state.open < 1 << 4
        && i8::try_from(state.system.0).is_ok()
        && state.system.1 < 1 << 6
        && (!isotopes || atom.isotope.is_none_or(|mass| mass < (1 << 10) - 1))
}

/// An atom in one word, from the low end: element 7 bits, hydrogens 5, charge 8, open valences 4,
/// mobile 1, and for atoms of a mobile system its net charge 8 and open valences 6; then isotope 10
/// and labelled hydrogens 12. Equal words mean equal atoms.
fn word(atom: &SkeletonAtom, state: &AtomState, isotopes: bool) -> u64 {
    // Signed numbers of eight bits, the least as zero.
    let shifted = |value: i16| (i64::from(value) + (1 << 7)) as u64;
    let mut word = u64::from(atom.element.number())
        | u64::from(atom.hydrogens) << 7
        | shifted(state.charge.into()) << 12
        | u64::from(state.open) << 20
        | u64::from(state.mobile) << 24
        | shifted(state.system.0) << 25
        | u64::from(state.system.1) << 33;
    if isotopes {
        let isotope = atom.isotope.map_or(0, |mass| u64::from(mass) + 1);
        word |= isotope << 39 | u64::from(atom.labelled) << 49;
    }
    word
}
