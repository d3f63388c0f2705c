//! What identity rests on, atom by atom and bond by bond, packed for the canonical search.

use crate::{OrderError, mesomer::Mesomer, order::Coloured, skeleton::Skeleton};

/// Loads the graph of a molecule: σ skeleton, hydrogens, fixed and mobile bonds, charges and open
/// valences, and isotopes if asked for. No stereo.
///
/// One word an atom, from the low end: element 7 bits, hydrogens 5, charge 8, open valences 4,
/// mobile 1, and for atoms of a mobile system its net charge 8 and open valences 6; then isotope 10
/// and labelled hydrogens 12. Each field is checked, so equal words mean equal atoms.
pub(super) fn load(
    graph: &mut Coloured,
    skeleton: &Skeleton,
    mesomer: &Mesomer,
    isotopes: bool,
) -> Result<(), OrderError> {
    let mut words = Vec::with_capacity(skeleton.len());
    for (atom, state) in skeleton.atoms.iter().zip(&mesomer.states) {
        let range = || OrderError::OutOfRange { atom: atom.source };
        let field = |value: i64, bits: u32, signed: bool| -> Result<u64, OrderError> {
            let shifted = if signed {
                value + (1 << (bits - 1))
            } else {
                value
            };
            u64::try_from(shifted)
                .ok()
                .filter(|v| *v < 1 << bits)
                .ok_or_else(range)
        };
        let mut word = u64::from(atom.element.number());
        word |= field(atom.hydrogens.into(), 5, false)? << 7;
        word |= field(state.charge.into(), 8, true)? << 12;
        word |= field(state.open.into(), 4, false)? << 20;
        word |= u64::from(state.mobile) << 24;
        word |= field(state.system.0.into(), 8, true)? << 25;
        word |= field(state.system.1.into(), 6, false)? << 33;
        if isotopes {
            let isotope = atom.isotope.map_or(0, |mass| i64::from(mass) + 1);
            word |= field(isotope, 10, false)? << 39;
            word |= u64::from(atom.labelled) << 49;
        }
        words.push(word);
    }
    let edges = skeleton
        .bonds
        .iter()
        .zip(&mesomer.orders)
        .map(|(bond, &order)| (bond.a, bond.b, order));
    graph.load(words.into_iter(), edges);
    Ok(())
}
