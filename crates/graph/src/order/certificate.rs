//! A graph written in the order of its vertices: equal exactly for isomorphic graphs.

use super::{
    coloured::{Coloured, ranked_parity},
    partition::Partition,
    refine::Inside,
};

/// Stands between the edges and the units of a certificate.
const SEPARATOR: u64 = u64::MAX;

/// Writes colours, edges and units in the order of a discrete partition.
pub(super) fn write_certificate(
    graph: &Coloured,
    partition: &Partition,
    inside: &Inside,
    words: &mut Vec<u64>,
) {
    words.clear();
    words.push(partition.lab.len() as u64);
    words.extend(partition.lab.iter().map(|&v| graph.colours[v as usize]));
    for (at, &vertex) in partition.lab.iter().enumerate() {
        let from = words.len();
        for &(to, class) in graph.arcs(vertex) {
            let position = partition.pos[to as usize];
            if (position as usize) < at {
                words.push((at as u64) << 32 | u64::from(position) << 8 | u64::from(class));
            }
        }
        words[from..].sort_unstable();
    }
    words.push(SEPARATOR);
    let from = words.len();
    let vertices = graph.len() as u32;
    let rank = |v: u32| {
        if v < vertices {
            partition.pos[v as usize]
        } else {
            v
        }
    };
    for &index in &inside.units {
        let unit = &graph.units[index as usize];
        let mut ends = unit.centres.map(rank);
        ends.sort_unstable();
        let orientation = match ranked_parity(unit, rank) {
            None => 2,
            Some(odd) => u64::from(odd),
        };
        let colour = u64::from(unit.colour);
        words.push(u64::from(ends[0]) << 36 | u64::from(ends[1]) << 8 | colour << 2 | orientation);
    }
    words[from..].sort_unstable();
    if inside.placed.is_empty() {
        return;
    }
    let mut placed: Vec<Vec<u64>> = inside
        .placed
        .iter()
        .map(|&index| {
            let placed = &graph.placed[index as usize];
            let mut row = vec![rank(placed.centre).into(), placed.polyhedron as u64];
            row.extend(placed.ranks(rank).into_iter().map(u64::from));
            row
        })
        .collect();
    placed.sort_unstable();
    words.push(SEPARATOR);
    words.extend(placed.into_iter().flatten());
}
