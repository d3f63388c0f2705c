//! Closed walks: compounds that changed places.

use std::collections::{BTreeMap, VecDeque};

/// A sample whose label says one compound, and which holds another that the tray has a label for.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(super) struct Edge {
    pub(super) from: u32,
    pub(super) to: u32,
    pub(super) sample: usize,
}

/// Samples among which compounds changed places.
#[derive(Debug, Clone, PartialEq, Eq)]
pub(super) struct Exchange {
    /// In the order of the walk, where there is one.
    pub(super) samples: Vec<usize>,
    pub(super) ways: Ways,
}

/// In how many ways the parts of an exchange can have been taken; no more than are told apart here.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(super) struct Ways {
    pub(super) count: usize,
    /// All exchanges were of two compounds.
    pub(super) is_swap: bool,
}

/// A walk that does not close.
#[derive(Debug, Clone, PartialEq, Eq)]
pub(super) struct Chain {
    pub(super) samples: Vec<usize>,
    /// The compound that its last sample holds, whose own sample is not on the walk.
    pub(super) end: u32,
}

/// The exchanges that edges make up, and the edges that belong to none.
pub(super) fn exchanges(edges: Vec<Edge>) -> (Vec<Exchange>, Vec<Edge>) {
    let (mut found, rest) = swaps(edges);
    let (core, rest) = peel(rest);
    found.extend(circles(&core));
    (found, rest)
}

/// Pairs of compounds that changed places.
fn swaps(edges: Vec<Edge>) -> (Vec<Exchange>, Vec<Edge>) {
    let mut between: BTreeMap<(u32, u32), Vec<usize>> = BTreeMap::new();
    for edge in &edges {
        between
            .entry((edge.from, edge.to))
            .or_default()
            .push(edge.sample);
    }
    let mut found = Vec::new();
    for (&(from, to), samples) in between.range(..) {
        let Some(back) = between.get(&(to, from)).filter(|_| from < to) else {
            continue;
        };
        let all: Vec<usize> = samples.iter().chain(back).copied().collect();
        let ways = Ways {
            count: samples.len().max(back.len()),
            is_swap: true,
        };
        found.push(Exchange { samples: all, ways });
    }
    let is_swapped = |edge: &Edge| between.contains_key(&(edge.to, edge.from));
    let rest = edges.into_iter().filter(|edge| !is_swapped(edge));
    (found, rest.collect())
}

/// Takes away edges that are on no closed walk, as far as that shows at their ends: those from a vertex
/// that none leads to, or to one that none leaves, again and again. What stays, and what went.
fn peel(edges: Vec<Edge>) -> (Vec<Edge>, Vec<Edge>) {
    let mut at: BTreeMap<u32, [Vec<usize>; 2]> = BTreeMap::new();
    for (index, edge) in edges.iter().enumerate() {
        at.entry(edge.from).or_default()[0].push(index);
        at.entry(edge.to).or_default()[1].push(index);
    }
    let mut degrees: BTreeMap<u32, [usize; 2]> = at
        .iter()
        .map(|(&vertex, lists)| (vertex, [lists[0].len(), lists[1].len()]))
        .collect();
    let mut gone = vec![false; edges.len()];
    let is_end = |degree: [usize; 2]| degree.contains(&0);
    let ends = degrees.iter().filter(|(_, degree)| is_end(**degree));
    let mut queue: VecDeque<u32> = ends.map(|(&vertex, _)| vertex).collect();
    while let Some(vertex) = queue.pop_front() {
        for index in at[&vertex].iter().flatten().copied() {
            if std::mem::replace(&mut gone[index], true) {
                continue;
            }
            let Edge { from, to, .. } = edges[index];
            for (end, side) in [(from, 0), (to, 1)] {
                let degree = degrees.entry(end).or_default();
                degree[side] -= 1;
                if end != vertex && degree[side] == 0 {
                    queue.push_back(end);
                }
            }
        }
    }
    let mut kept = gone.iter().map(|&gone| !gone);
    edges.into_iter().partition(|_| kept.next() == Some(true))
}

/// The connected parts of edges each of which may be on a closed walk: some edge leaves each vertex, and
/// some leads to it.
fn circles(core: &[Edge]) -> Vec<Exchange> {
    let mut out: BTreeMap<u32, Vec<usize>> = BTreeMap::new();
    let mut about: BTreeMap<u32, Vec<usize>> = BTreeMap::new();
    for (index, edge) in core.iter().enumerate() {
        out.entry(edge.from).or_default().push(index);
        about.entry(edge.from).or_default().push(index);
        about.entry(edge.to).or_default().push(index);
    }
    let mut seen = vec![false; core.len()];
    let mut found = Vec::new();
    for start in 0..core.len() {
        if std::mem::replace(&mut seen[start], true) {
            continue;
        }
        let mut part = vec![start];
        let mut at = 0;
        while let Some(&index) = part.get(at) {
            at += 1;
            // Along the walk first, so that a plain circle comes in its order.
            let ahead = &out[&core[index].to];
            let beside = about[&core[index].from].iter();
            for &next in ahead.iter().chain(beside) {
                if !std::mem::replace(&mut seen[next], true) {
                    part.push(next);
                }
            }
        }
        let is_plain = part.iter().all(|&index| out[&core[index].from].len() == 1);
        let most = part.iter().map(|&index| out[&core[index].from].len()).max();
        found.push(Exchange {
            samples: part.iter().map(|&index| core[index].sample).collect(),
            ways: Ways {
                count: if is_plain {
                    1
                } else {
                    most.unwrap_or(1).max(2)
                },
                is_swap: false,
            },
        });
    }
    found
}

/// Walks among edges that make up no closed one, each as long as it has no side road.
pub(super) fn chains(edges: &[Edge]) -> Vec<Chain> {
    let mut degrees: BTreeMap<u32, [usize; 2]> = BTreeMap::new();
    let mut out: BTreeMap<u32, usize> = BTreeMap::new();
    for (index, edge) in edges.iter().enumerate() {
        degrees.entry(edge.from).or_default()[0] += 1;
        degrees.entry(edge.to).or_default()[1] += 1;
        out.insert(edge.from, index);
    }
    let is_inner = |vertex: u32| degrees.get(&vertex) == Some(&[1, 1]);
    let starts = edges.iter().filter(|edge| !is_inner(edge.from));
    let walk = |start: &Edge| {
        let mut samples = vec![start.sample];
        let mut end = start.to;
        while is_inner(end)
            && let Some(next) = out.get(&end).and_then(|&index| edges.get(index))
            && samples.len() < edges.len()
        {
            samples.push(next.sample);
            end = next.to;
        }
        Chain { samples, end }
    };
    starts.map(walk).collect()
}

#[cfg(test)]
mod tests {
    use super::*;

    fn edges(list: &[(u32, u32)]) -> Vec<Edge> {
        let edge = |(sample, &(from, to))| Edge { from, to, sample };
        list.iter().enumerate().map(edge).collect()
    }

    fn samples(list: &[(u32, u32)]) -> (Vec<(Vec<usize>, usize)>, Vec<usize>) {
        let (found, rest) = exchanges(edges(list));
        let found = found.into_iter().map(|e| (e.samples, e.ways.count));
        (
            found.collect(),
            rest.iter().map(|edge| edge.sample).collect(),
        )
    }

    #[test]
    fn plain_exchanges() {
        assert_eq!(samples(&[(1, 2), (2, 1)]), (vec![(vec![0, 1], 1)], vec![]));
        let (found, rest) = samples(&[(1, 2), (3, 1), (2, 3), (4, 5)]);
        assert_eq!(found, [(vec![0, 2, 1], 1)]);
        assert_eq!(rest, [3]);
    }

    #[test]
    fn exchanges_of_like_samples_are_ambiguous() {
        // Two samples labelled 1 hold 2, one labelled 2 holds 1.
        assert_eq!(samples(&[(1, 2), (1, 2), (2, 1)]).0, [(vec![0, 1, 2], 2)]);
        // Two circles through one compound.
        let (found, _) = samples(&[(1, 2), (2, 3), (3, 1), (1, 4), (4, 5), (5, 1)]);
        assert_eq!(found.len(), 1);
        assert_eq!(found[0].1, 2);
    }

    #[test]
    fn a_tail_is_no_part_of_the_circle() {
        let (found, rest) = samples(&[(1, 2), (2, 3), (3, 1), (9, 1), (8, 9)]);
        assert_eq!(found, [(vec![0, 1, 2], 1)]);
        assert_eq!(rest, [3, 4]);
    }

    #[test]
    fn open_walks() {
        let found = chains(&edges(&[(1, 2), (3, 4), (2, 3), (7, 8), (9, 8)]));
        let found: Vec<(Vec<usize>, u32)> = found.into_iter().map(|c| (c.samples, c.end)).collect();
        assert_eq!(found, [(vec![0, 2, 1], 4), (vec![3], 8), (vec![4], 8)]);
    }
}
