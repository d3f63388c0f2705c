//! A graph written in the order of its vertices: equal exactly for isomorphic graphs.

use super::coloured::{Coloured, ranked_parity};

/// Stands between the edges and the units of a certificate.
const SEPARATOR: u64 = u64::MAX;

/// Writes colours, edges and units in the given order of the vertices, appending to `words`. `pos`
/// becomes the inverse of `order`.
pub(super) fn write_certificate(
    graph: &Coloured,
    order: &[u32],
    pos: &mut Vec<u32>,
    words: &mut Vec<u64>,
) {
    pos.resize(order.len(), 0);
    for (at, &vertex) in (0..).zip(order) {
        pos[vertex as usize] = at;
    }
    words.push(order.len() as u64);
    words.extend(order.iter().map(|&v| graph.colours[v as usize]));
    for (at, &vertex) in (0..).zip(order) {
        let from = words.len();
        for &(to, class) in graph.arcs(vertex) {
            let position = pos[to as usize];
            if position < at {
                words.push(u64::from(at) << 32 | u64::from(position) << 8 | u64::from(class));
            }
        }
        if words.len() > from + 1 {
            words[from..].sort_unstable();
        }
    }
    words.push(SEPARATOR);
    write_units(graph, pos, words);
}

/// Writes the words on units and placed centres; `pos` is the inverse of the order.
pub(super) fn write_units(graph: &Coloured, pos: &[u32], words: &mut Vec<u64>) {
    let rank = |v: u32| pos.get(v as usize).copied().unwrap_or(v);
    let from = words.len();
    for unit in &graph.units {
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
    if graph.placed.is_empty() {
        return;
    }
    let rows = graph.placed.iter().map(|placed| {
        let mut row = vec![rank(placed.centre).into(), placed.polyhedron as u64];
        row.extend(placed.ranks(rank).into_iter().map(u64::from));
        row
    });
    let mut rows: Vec<Vec<u64>> = rows.collect();
    rows.sort_unstable();
    words.push(SEPARATOR);
    words.extend(rows.into_iter().flatten());
}
