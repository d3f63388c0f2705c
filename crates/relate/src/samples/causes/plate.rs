//! What the places on a plate say: lines that moved on, and compounds of wells beside.

use std::collections::BTreeMap;

use crate::samples::Well;

use super::{
    Cause, Evidence, Hypothesis,
    holdings::{Content, Holdings},
};

/// Samples that must be seen one place further before a line is said to have moved.
const LEAST_MOVED: usize = 3;
/// A line moved if at least this part of what that predicts is borne out.
const LEAST_SCORE: f64 = 0.5;

/// Rows and columns whose samples sit one place further than their labels.
pub(super) fn shifts(holdings: &Holdings<'_>) -> Vec<Hypothesis> {
    let mut lines: BTreeMap<(u32, bool, u16), Vec<(u16, usize)>> = BTreeMap::new();
    for (&(plate, Well { row, column }), &sample) in &holdings.seats {
        lines
            .entry((plate, false, row))
            .or_default()
            .push((column, sample));
        lines
            .entry((plate, true, column))
            .or_default()
            .push((row, sample));
    }
    let mut found = Vec::new();
    for mut line in lines.into_values() {
        for _ in 0..2 {
            line.sort_unstable();
            found.extend(moved(holdings, &line));
            // The same line in the other direction.
            let last = line.last().map_or(0, |&(place, _)| place);
            line.iter_mut()
                .for_each(|(place, _)| *place = last - *place);
        }
    }
    found
}

/// Whether the samples of a line, in order of their places, hold what the label one place before says.
fn moved(holdings: &Holdings<'_>, line: &[(u16, usize)]) -> Option<Hypothesis> {
    // Each with the one in the place before.
    let pairs: Vec<(usize, usize)> = line
        .windows(2)
        .filter(|pair| pair[0].0 + 1 == pair[1].0)
        .map(|pair| (pair[1].1, pair[0].1))
        .collect();
    let is_moved = |&(sample, before): &(usize, usize)| {
        holdings.samples[sample].differs && holdings.strength(sample, before) > 0.0
    };
    let first = pairs.iter().position(is_moved)?;
    let last = pairs.iter().rposition(is_moved)?;
    let span = &pairs[first..=last];
    let mut moved = Moved {
        explains: span.iter().filter(|p| is_moved(p)).map(|p| p.0).collect(),
        involves: Vec::new(),
        strengths: Vec::new(),
    };
    moved.follow(holdings, span);
    let (nearest, tail) = (pairs[first].1, pairs[last].0);
    moved.come_round(holdings, &head(holdings, &pairs[..first], nearest), tail);
    moved.hypothesis(holdings)
}

/// A line that may have moved.
struct Moved {
    explains: Vec<usize>,
    involves: Vec<usize>,
    /// Of each sample for which the move predicts something.
    strengths: Vec<f64>,
}

impl Moved {
    /// Weighs what the samples of the span hold.
    fn follow(&mut self, holdings: &Holdings<'_>, span: &[(usize, usize)]) {
        for &(sample, before) in span {
            let holding = &holdings.samples[sample];
            if holding.content == Content::Unknown {
                self.involves.push(sample);
                self.strengths.push(0.0);
            } else if holding.label != holdings.samples[before].label {
                let strength = holdings.strength(sample, before);
                self.strengths
                    .push(if holding.differs { strength } else { 0.0 });
            }
            // Equal labels beside each other: nothing is seen of the move, and nothing speaks against it.
        }
    }

    /// What sat in the last place may have come round to the first; what was there first went on.
    fn come_round(&mut self, holdings: &Holdings<'_>, head: &[usize], tail: usize) {
        for (at, &sample) in head.iter().enumerate() {
            let is_first = at + 1 == head.len() && holdings.samples[sample].differs;
            let round = if is_first {
                holdings.strength(sample, tail)
            } else {
                0.0
            };
            match round > 0.0 {
                true => self.explains.insert(0, sample),
                false => self.involves.push(sample),
            }
            self.strengths.push(round);
        }
    }

    fn hypothesis(self, holdings: &Holdings<'_>) -> Option<Hypothesis> {
        let score = self.strengths.iter().sum::<f64>() / self.strengths.len().max(1) as f64;
        let by_mass = |&at: &usize| matches!(holdings.samples[at].content, Content::ByMass(_));
        let evidence = match self.explains.iter().any(by_mass) {
            true => Evidence::Mass,
            false => Evidence::Structure,
        };
        let is_seen = self.explains.len() >= LEAST_MOVED && score >= LEAST_SCORE;
        is_seen.then(|| Hypothesis {
            involves: self.involves,
            evidence,
            score,
            ..Hypothesis::new(Cause::Shift, self.explains)
        })
    }
}

/// The samples before the first one that is seen to have moved that moved as well, as far as can be said:
/// without a gap, up to the last one that differs from its label. The nearest comes first.
fn head(holdings: &Holdings<'_>, before: &[(usize, usize)], nearest: usize) -> Vec<usize> {
    let differs = |sample: usize| holdings.samples[sample].differs;
    let mut head = vec![nearest];
    for &(sample, earlier) in before.iter().rev() {
        if head.last() != Some(&sample) || !differs(sample) && !holdings.is_unseen(sample) {
            break;
        }
        head.push(earlier);
    }
    while head.pop_if(|sample| !differs(*sample)).is_some() {}
    head
}

/// Samples that hold what the label of a well beside them says.
pub(super) fn neighbours<'h>(
    holdings: &'h Holdings<'_>,
    left: impl Fn(usize) -> bool + 'h,
) -> impl Iterator<Item = Hypothesis> + 'h {
    let candidates = (0..holdings.samples.len()).filter(move |&sample| left(sample));
    candidates.flat_map(move |sample| {
        let holding = &holdings.samples[sample];
        let seat = holding.seat.filter(|_| holding.differs);
        let beside = seat
            .into_iter()
            .flat_map(|(plate, well)| well.neighbours().map(move |well| (plate, well)));
        beside.filter_map(move |seat| {
            let other = *holdings.seats.get(&seat)?;
            let score = holdings.strength(sample, other);
            let own = holdings.strength(sample, sample);
            let evidence = match holding.content {
                Content::ByMass(_) => Evidence::Mass,
                _ if score < 1.0 => Evidence::Form,
                _ => Evidence::Structure,
            };
            (score > own).then(|| Hypothesis {
                involves: vec![other],
                evidence,
                score,
                ..Hypothesis::new(Cause::Neighbour, vec![sample])
            })
        })
    })
}
