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
    let differs = |sample: usize| holdings.samples[sample].differs;
    // Each with the one in the place before.
    let pairs: Vec<(usize, usize)> = line
        .windows(2)
        .filter(|pair| pair[0].0 + 1 == pair[1].0)
        .map(|pair| (pair[1].1, pair[0].1))
        .collect();
    let is_moved = |&(sample, before): &(usize, usize)| {
        differs(sample) && holdings.strength(sample, before) > 0.0
    };
    let first = pairs.iter().position(is_moved)?;
    let last = pairs.iter().rposition(is_moved)?;
    let span = &pairs[first..=last];
    let mut explains: Vec<usize> = span.iter().filter(|p| is_moved(p)).map(|p| p.0).collect();
    let mut involves = Vec::new();
    let (mut sum, mut count) = (0.0, 0);
    for &(sample, before) in span {
        let holding = &holdings.samples[sample];
        match holding.content {
            Content::Unknown => involves.push(sample),
            // Equal labels beside each other: nothing is seen of the move, and nothing speaks against it.
            _ if holding.label == holdings.samples[before].label => continue,
            _ => {
                sum += if differs(sample) {
                    holdings.strength(sample, before)
                } else {
                    0.0
                }
            }
        }
        count += 1;
    }
    // What sat in the last place may have come round to the first; what was there first went on.
    let tail = span[span.len() - 1].0;
    let head = head(holdings, &pairs[..first], span[0].1);
    for (at, &sample) in head.iter().enumerate() {
        let round = match at + 1 == head.len() {
            true => holdings.strength(sample, tail),
            false => 0.0,
        };
        match differs(sample) && round > 0.0 {
            true => explains.insert(0, sample),
            false => involves.push(sample),
        }
        sum += round;
        count += 1;
    }
    let score = sum / f64::from(count.max(1));
    let by_mass = |&at: &usize| matches!(holdings.samples[at].content, Content::ByMass(_));
    let evidence = match explains.iter().any(by_mass) {
        true => Evidence::Mass,
        false => Evidence::Structure,
    };
    let is_seen = explains.len() >= LEAST_MOVED && score >= LEAST_SCORE;
    is_seen.then(|| Hypothesis {
        involves,
        evidence,
        score,
        ..Hypothesis::new(Cause::Shift, explains)
    })
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
