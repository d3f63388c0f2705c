//! Plain graphs, and the formats graph6 and sparse6 (McKay, "Description of graph6, sparse6 and
//! digraph6 encodings").

use std::path::Path;

use crate::{Numbers, read_text};

/// A graph without colours.
#[derive(Debug, Clone, Default, PartialEq, Eq)]
pub struct Graph {
    /// The number of vertices.
    pub vertices: u32,
    /// The edges, each once.
    pub edges: Vec<(u32, u32, u8)>,
}

impl Graph {
    /// Reads one line, graph6 or sparse6.
    ///
    /// # Panics
    /// If it is neither.
    pub fn parse(line: &str) -> Self {
        let (sparse, text) = match line.strip_prefix(':') {
            Some(rest) => (true, rest),
            None => (false, line),
        };
        let sixes: Vec<u32> = text.bytes().map(|byte| u32::from(byte) - 63).collect();
        let joined = |from: usize, to: usize| {
            sixes[from..to]
                .iter()
                .fold(0u32, |sum, &six| sum << 6 | six)
        };
        let (vertices, from) = match sixes[..] {
            [63, 63, ..] => (joined(2, 8), 8),
            [63, ..] => (joined(1, 4), 4),
            _ => (sixes[0], 1),
        };
        let bits = sixes[from..]
            .iter()
            .flat_map(|&six| (0..6).rev().map(move |at| six >> at & 1 == 1));
        let edges = if sparse {
            sparse_edges(vertices, bits)
        } else {
            let pairs = (1..vertices).flat_map(|b| (0..b).map(move |a| (a, b, 0)));
            let kept = pairs.zip(bits).filter(|&(_, bit)| bit);
            kept.map(|(edge, _)| edge).collect()
        };
        Self { vertices, edges }
    }

    /// Reads a file of lines, plain or gzip.
    pub fn read(path: &Path) -> Vec<Self> {
        let text = read_text(path);
        let lines = text.lines().filter(|line| !line.is_empty());
        lines.map(Self::parse).collect()
    }

    /// The same graph in another numbering.
    pub fn renumbered(&self, numbers: &mut Numbers) -> Self {
        let image = numbers.order(self.vertices as usize);
        let mut edges: Vec<_> = self.edges.clone();
        numbers.shuffle(&mut edges);
        for (a, b, _) in &mut edges {
            (*a, *b) = (image[*a as usize], image[*b as usize]);
        }
        Self { edges, ..*self }
    }

    /// The largest number of edges at a vertex.
    pub fn degree(&self) -> u32 {
        let mut degrees = vec![0; self.vertices as usize];
        for &(a, b, _) in &self.edges {
            degrees[a as usize] += 1;
            degrees[b as usize] += 1;
        }
        degrees.into_iter().max().unwrap_or(0)
    }
}

fn sparse_edges(vertices: u32, mut bits: impl Iterator<Item = bool>) -> Vec<(u32, u32, u8)> {
    let width = u32::BITS - vertices.saturating_sub(1).leading_zeros();
    let mut edges = Vec::new();
    let mut current = 0;
    while let Some(next) = bits.next() {
        current += u32::from(next);
        let word: Vec<bool> = bits.by_ref().take(width as usize).collect();
        let other = word.iter().fold(0, |sum, &bit| sum << 1 | u32::from(bit));
        if word.len() < width as usize || current >= vertices || other >= vertices {
            break;
        }
        if other > current {
            current = other;
        } else {
            edges.push((other, current, 0));
        }
    }
    edges
}
