//! Rings of another size, rings that are open on one side, neighbours that changed places.

use super::{
    changes::{Change, Finding, RingChange},
    frame::{Bond, Frame, bond},
    ledger::Ledger,
};

/// Bonded atoms x and y that stand p–x–y–q in the one and p–y–x–q in the other.
pub(super) fn swapped(frame: &Frame, ledger: &mut Ledger) -> Vec<Finding> {
    let mut found = Vec::new();
    let kept: Vec<Bond> = frame.graphs[0].bonds().map(|(bond, _)| bond).collect();
    for (x, y) in kept {
        let Some([p, q]) = neighbours_of_swapped(frame, ledger, x, y) else {
            continue;
        };
        let only_in = [vec![bond(p, x), bond(y, q)], vec![bond(p, y), bond(x, q)]];
        let in_ring = (0..2).all(|side| frame.graphs[side].in_ring(x, y));
        let change = Change::Swapped {
            atoms: [0, 1].map(|side| [x, y].map(|atom| frame.source(side, atom))),
            beside: [0, 1].map(|side| {
                let beside = if side == 0 { [p, q] } else { [q, p] };
                beside.map(|atom| frame.source(side, atom))
            }),
            in_ring,
        };
        found.push(ledger.settle(frame, change, only_in, &[]));
    }
    found
}

fn neighbours_of_swapped(frame: &Frame, ledger: &Ledger, x: u32, y: u32) -> Option<[u32; 2]> {
    let [first, second] = &frame.graphs;
    second.order(x, y)?;
    for p in first.neighbours(x).filter(|&p| p != y) {
        for q in first.neighbours(y).filter(|&q| q != x && q != p) {
            let lost = ledger.has(0, bond(p, x)) && ledger.has(0, bond(y, q));
            if lost && ledger.has(1, bond(p, y)) && ledger.has(1, bond(x, q)) {
                return Some([p, q]);
            }
        }
    }
    None
}

/// Bonds that close a ring in either record, a lost and a gained one with a common atom together.
pub(super) fn changed(frame: &Frame, ledger: &mut Ledger) -> Vec<Finding> {
    let mut changes = Vec::new();
    for lost in ledger.only_in(0) {
        for gained in ledger.only_in(1) {
            changes.extend(between(frame, lost, gained));
        }
    }
    for side in 0..2 {
        for only in ledger.only_in(side) {
            changes.extend(alone(frame, side, only));
        }
    }
    changes.sort_by_cached_key(Closing::cost);
    let mut found = Vec::new();
    for change in changes {
        let is_open = |side: usize| {
            let bond = change.bonds[side].map(|(a, b)| bond(a, b));
            bond.is_none_or(|bond| ledger.has(side, bond))
        };
        if !(is_open(0) && is_open(1)) {
            continue;
        }
        let only_in = change
            .bonds
            .map(|ends| ends.map(|(a, b)| bond(a, b)).into_iter().collect());
        found.push(ledger.settle(frame, change.tell(frame), only_in, &[]));
    }
    found
}

/// A differing bond on one side or on both, with the ring that it closes there.
struct Closing {
    bonds: [Option<(u32, u32)>; 2],
    rings: [Option<Vec<u32>>; 2],
}

impl Closing {
    /// Best a ring of which the other is a part; a bond by itself last.
    fn cost(&self) -> (bool, bool, usize, [Option<Bond>; 2]) {
        let nested = match &self.rings {
            [Some(a), Some(b)] => {
                let (small, large) = if a.len() < b.len() { (a, b) } else { (b, a) };
                small.iter().all(|atom| large.contains(atom))
            }
            _ => false,
        };
        let alone = self.bonds.contains(&None);
        let size = self.rings.iter().flatten().map(Vec::len).sum();
        (alone, !nested, size, self.bonds)
    }

    fn tell(&self, frame: &Frame) -> Change {
        let source = |side: usize, ends: Option<(u32, u32)>| {
            ends.map(|(a, b)| (frame.source(side, a), frame.source(side, b)))
        };
        Change::Ring(RingChange {
            rings: [0, 1].map(|side| {
                let ring = self.rings[side].as_deref();
                ring.map(|ring| frame.sources(side, ring))
            }),
            alone: [0, 1].map(|side| match &self.rings {
                [Some(first), Some(second)] => {
                    let (own, others) = if side == 0 {
                        (first, second)
                    } else {
                        (second, first)
                    };
                    let alone = own.iter().copied().filter(|atom| !others.contains(atom));
                    frame.sources(side, &alone.collect::<Vec<u32>>())
                }
                _ => Vec::new(),
            }),
            bonds: [0, 1].map(|side| source(side, self.bonds[side])),
            images: [0, 1].map(|side| source(1 - side, self.bonds[side])),
        })
    }
}

fn between(frame: &Frame, lost: Bond, gained: Bond) -> Option<Closing> {
    let ends = |(a, b): Bond| [(a, b), (b, a)];
    let mut shared = ends(lost).into_iter().flat_map(|one| {
        let gained = ends(gained).into_iter();
        gained.filter_map(move |other| (one.0 == other.0).then_some([one, other]))
    });
    let bonds = shared.next()?;
    let rings = [0, 1].map(|side| frame.graphs[side].detour(bonds[side].0, bonds[side].1));
    (rings != [None, None]).then_some(Closing {
        bonds: bonds.map(Some),
        rings,
    })
}

fn alone(frame: &Frame, side: usize, (a, b): Bond) -> Option<Closing> {
    let mut closing = Closing {
        bonds: [None, None],
        rings: [None, None],
    };
    closing.rings[side] = Some(frame.graphs[side].detour(a, b)?);
    closing.bonds[side] = Some((a, b));
    Some(closing)
}
