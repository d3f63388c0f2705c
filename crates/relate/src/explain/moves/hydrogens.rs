//! Hydrogens that are neither gained nor lost by what moved.

use super::{
    changes::{Change, Finding},
    frame::{Frame, MOBILE},
};

/// Hydrogens on other atoms, one finding for each pair of atoms. A shift of double bonds among carbons
/// takes its hydrogens along and needs no word.
pub(super) fn moved(frame: &Frame) -> Vec<Finding> {
    let mut open = unexplained(frame);
    if open
        .iter()
        .all(|&(atom, count)| follows_bonds(frame, atom, count))
    {
        return Vec::new();
    }
    let mut found = Vec::new();
    loop {
        let from = open.iter().position(|&(_, count)| count < 0);
        let to = open.iter().position(|&(_, count)| count > 0);
        let (Some(from), Some(to)) = (from, to) else {
            return found;
        };
        let count = open[to].1.min(-open[from].1);
        open[from].1 += count;
        open[to].1 -= count;
        let both = |atom: u32| [0, 1].map(|side| frame.source(side, atom));
        found.push(Finding::without_bonds(Change::Hydrogen {
            from: both(open[from].0),
            to: both(open[to].0),
            count: count as u8,
        }));
    }
}

/// By atom, how many more hydrogens the second record has than bonds of one record only account for.
/// Atoms of which that cannot be said are left out.
fn unexplained(frame: &Frame) -> Vec<(u32, i32)> {
    let [first, second] = &frame.graphs;
    let atoms = 0..first.size() as u32;
    let counts = atoms.filter(|&atom| is_certain(frame, atom)).map(|atom| {
        let hydrogens =
            i32::from(second.atom(atom).hydrogens) - i32::from(first.atom(atom).hydrogens);
        let own = |side: usize| -> i32 {
            let other = &frame.graphs[1 - side];
            let near = frame.graphs[side].near(atom).iter();
            let alone = near.filter(|&&(to, _)| other.order(atom, to).is_none());
            alone.map(|&(_, order)| i32::from(order)).sum()
        };
        (atom, hydrogens + own(1) - own(0))
    });
    counts.filter(|&(_, count)| count != 0).collect()
}

/// Whether it is known how many bonds an atom gives up or takes up: no mobile bond of it is in one record
/// only, nor, of a carbon, mobile in one only.
fn is_certain(frame: &Frame, atom: u32) -> bool {
    let is_carbon = frame.graphs[0].is_carbon(atom);
    (0..2).all(|side| {
        let other = &frame.graphs[1 - side];
        let near = frame.graphs[side].near(atom).iter();
        let mut mobile = near.filter(|&&(_, order)| order == MOBILE);
        mobile.all(|&(to, _)| match other.order(atom, to) {
            None => false,
            Some(order) => order == MOBILE || !is_carbon,
        })
    })
}

/// A mobile bond counts as a single one.
fn valence(order: u8) -> i32 {
    if order == MOBILE { 1 } else { i32::from(order) }
}

/// Whether a carbon has just the hydrogens that its bonds of changed order leave it.
fn follows_bonds(frame: &Frame, atom: u32, count: i32) -> bool {
    let [first, second] = &frame.graphs;
    let kept = first.near(atom).iter();
    let shift = kept.filter_map(|&(to, before)| {
        let after = second.order(atom, to)?;
        Some(valence(before) - valence(after))
    });
    first.is_carbon(atom) && shift.sum::<i32>() == count
}
