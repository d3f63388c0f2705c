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
fn unexplained(frame: &Frame) -> Vec<(u32, i32)> {
    let [first, second] = &frame.graphs;
    let atoms = 0..first.size() as u32;
    let counts = atoms
        .map(|atom| i32::from(second.atom(atom).hydrogens) - i32::from(first.atom(atom).hydrogens));
    let mut counts: Vec<i32> = counts.collect();
    for (graph, other, sign) in [(first, second, -1), (second, first, 1)] {
        for ((a, b), order) in graph
            .bonds()
            .filter(|((a, b), _)| other.order(*a, *b).is_none())
        {
            for end in [a, b] {
                counts[end as usize] += sign * valence(order);
            }
        }
    }
    let counts = (0..).zip(counts);
    counts.filter(|&(_, count)| count != 0).collect()
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
