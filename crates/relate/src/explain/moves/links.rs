//! Pieces that join two others: between other atoms, or put into a bond, or taken out.

use std::collections::BTreeMap;

use molkin_graph::{Element, Formula};

use super::{
    changes::{Change, Finding, Link},
    frame::{Bond, Frame, bond},
    ledger::Ledger,
    substituent::Substituent,
};

/// A piece that the kept bonds leave, with the bonds of one record only that leave it: the atom of the
/// piece, the atom outside.
struct Piece {
    atoms: Vec<u32>,
    leaving: [Vec<(u32, u32)>; 2],
}

/// Takes pieces out of the ledger that join two atoms in at least one record, the smallest first.
pub(super) fn moved(frame: &Frame, ledger: &mut Ledger) -> Vec<Finding> {
    let mut pieces = pieces(frame, ledger);
    pieces.sort_by_cached_key(|piece| (piece.atoms.len(), piece.atoms[0]));
    let mut found = Vec::new();
    for piece in &pieces {
        if 2 * piece.atoms.len() <= frame.graphs[0].size() {
            found.extend(tell(frame, ledger, piece));
        }
    }
    found
}

fn pieces(frame: &Frame, ledger: &Ledger) -> Vec<Piece> {
    let mut members: BTreeMap<u32, Vec<u32>> = BTreeMap::new();
    for (atom, piece) in (0..).zip(frame.pieces()) {
        members.entry(piece).or_default().push(atom);
    }
    let pieces = members.into_values().map(|atoms| {
        let leaving = [0, 1].map(|side| {
            let ends = ledger.only_in(side).flat_map(|(a, b)| [(a, b), (b, a)]);
            ends.filter(|(inside, _)| atoms.contains(inside)).collect()
        });
        Piece { atoms, leaving }
    });
    pieces.collect()
}

fn tell(frame: &Frame, ledger: &mut Ledger, piece: &Piece) -> Option<Finding> {
    let outside = piece.leaving.each_ref().map(|ends| {
        let outside = ends.iter().map(|&(_, outside)| outside);
        outside.collect::<Vec<u32>>()
    });
    let elsewhere = outside[0].iter().all(|atom| !outside[1].contains(atom));
    let leaves = outside
        .iter()
        .flatten()
        .all(|atom| !piece.atoms.contains(atom));
    // Two atoms that the piece joins in one record may be bonded to each other in the other.
    let joined = [0, 1].map(|side| match outside[side][..] {
        [x, y] => Some(bond(x, y)).filter(|&bond| ledger.has(1 - side, bond)),
        _ => None,
    });
    let fits = match [outside[0].len(), outside[1].len()] {
        [2, 2] => true,
        [1, 2] => joined[1].is_some(),
        [2, 1] => joined[0].is_some(),
        _ => false,
    };
    let mut only_in: [Vec<Bond>; 2] = piece
        .leaving
        .each_ref()
        .map(|ends| ends.iter().map(|&(a, b)| bond(a, b)).collect());
    for (side, joined) in joined.iter().enumerate() {
        only_in[1 - side].extend(joined);
    }
    let is_open = (0..2).all(|side| only_in[side].iter().all(|&bond| ledger.has(side, bond)));
    if !(elsewhere && leaves && fits && is_open) {
        return None;
    }
    let link = Link {
        groups: [0, 1].map(|side| group(frame, side, piece)),
        ends: [0, 1].map(|side| {
            let ends = piece.leaving[side].iter();
            let ends = ends.map(|&(a, b)| (frame.source(side, a), frame.source(side, b)));
            ends.collect()
        }),
        joined: [0, 1].map(|side| joined[side].map(|bond| frame.source_bond(1 - side, bond))),
    };
    Some(ledger.settle(frame, Change::Link(link), only_in, &[]))
}

/// The piece as it is in one record: a substituent on one atom, or named as what joins two.
fn group(frame: &Frame, side: usize, piece: &Piece) -> Substituent {
    let graph = &frame.graphs[side];
    if let [(through, seat)] = piece.leaving[side][..] {
        let order = graph.order(seat, through).unwrap_or(1);
        return Substituent::of(frame, side, &piece.atoms, through, order);
    }
    let mut group = Substituent::of(frame, side, &piece.atoms, piece.atoms[0], 0);
    group.name = joining(frame, side, &piece.atoms, &group.formula);
    group
}

/// What joins two others, where it has a name.
fn joining(frame: &Frame, side: usize, atoms: &[u32], formula: &Formula) -> Option<&'static str> {
    let graph = &frame.graphs[side];
    let has = |element: Element| {
        atoms
            .iter()
            .any(|&atom| graph.atom(atom).element == element)
    };
    let all_mobile = atoms.len() == 6 && graph.mobile_six_ring(atoms[0]).is_some();
    match (formula.to_string().as_str(), atoms.len()) {
        ("CH2", 1) => Some("methylene group"),
        ("O", 1) => Some("oxygen"),
        ("S", 1) => Some("sulfur"),
        ("HN", 1) => Some("NH group"),
        ("CO", 2) => Some("carbonyl group"),
        ("CS", 2) => Some("thiocarbonyl group"),
        ("O2S", 3) if has(Element::SULFUR) => Some("sulfonyl group"),
        ("C6H4", 6) if all_mobile => Some("phenylene group"),
        _ => None,
    }
}
