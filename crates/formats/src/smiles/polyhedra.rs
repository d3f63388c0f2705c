//! The tags of square-planar, trigonal-bipyramidal and octahedral centres: which written ligand
//! sits where.
//!
//! Written ligands are numbered from 0 in text order. A placement lists them by position, in the
//! order that [`Polyhedron`] gives its positions; entries beyond their number are not looked at.
//!
//! Source: OpenSMILES 1.0, "Square Planar Centers", "Trigonal Bipyramidal Centers", "Octahedral
//! Centers". The tables are the specification's own, row by row.

use molkin_graph::Polyhedron;

/// Which ligand sits at each position.
pub(super) type Placement = [u8; 6];

/// The two tags of a row: the other ligands run anticlockwise, or clockwise.
type Pair = [u8; 2];

/// Ligand across from the first one, for `@SP1` to `@SP3`.
const ACROSS_FIRST: [u8; 3] = [2, 1, 3];

/// The axis, from and to, and the tags by which way the other three run as seen from its start.
const BIPYRAMIDAL: [([u8; 2], Pair); 10] = [
    ([0, 4], [1, 2]),
    ([0, 3], [3, 4]),
    ([0, 2], [5, 6]),
    ([0, 1], [7, 8]),
    ([1, 4], [9, 11]),
    ([1, 3], [10, 12]),
    ([1, 2], [13, 14]),
    ([2, 4], [15, 20]),
    ([2, 3], [16, 19]),
    ([3, 4], [17, 18]),
];

/// The path by which the four ligands about the axis of an octahedron follow each other in text
/// order, named for the letter that it draws.
const SHAPES: [Shape; 3] = [Shape::U, Shape::Z, Shape::Four];

#[derive(Debug, Clone, Copy, PartialEq, Eq)]
enum Shape {
    /// Round the square.
    U,
    /// An edge, a diagonal, an edge.
    Z,
    /// A diagonal, an edge, a diagonal.
    Four,
}

impl Shape {
    /// The ranks of the four ligands in text order, as they run round the square anticlockwise where
    /// the tag says so. That is read off the first edge of the path.
    fn round(self) -> [usize; 4] {
        match self {
            Self::U => [0, 1, 2, 3],
            Self::Z => [0, 1, 3, 2],
            Self::Four => [0, 3, 1, 2],
        }
    }
}

/// The ligand across from the first one, and the tags by shape and by which way it runs as seen from
/// the first ligand.
const OCTAHEDRAL: [(u8, [Pair; 3]); 5] = [
    (5, [[1, 2], [4, 14], [10, 8]]),
    (4, [[3, 16], [5, 15], [11, 9]]),
    (3, [[6, 18], [7, 17], [13, 12]]),
    (2, [[19, 24], [20, 23], [22, 21]]),
    (1, [[25, 30], [26, 29], [28, 27]]),
];

/// Where a tag puts the ligands; `None` for a number that does not exist.
pub(super) fn placement(polyhedron: Polyhedron, tag: u8) -> Option<Placement> {
    match polyhedron {
        Polyhedron::SquarePlanar => {
            let across = *ACROSS_FIRST.get(usize::from(tag.checked_sub(1)?))?;
            let [one, other] = others(&[0, across]);
            Some([0, one, across, other, 0, 0])
        }
        Polyhedron::TrigonalBipyramidal => {
            let (axis, pair) = BIPYRAMIDAL.iter().find(|(_, pair)| pair.contains(&tag))?;
            let [b, c, d] = others(axis);
            let [c, d] = if pair[0] == tag { [c, d] } else { [d, c] };
            Some([axis[0], axis[1], b, c, d, 0])
        }
        Polyhedron::Octahedral => OCTAHEDRAL.iter().find_map(|&(across, pairs)| {
            let (pair, shape) = pairs
                .iter()
                .zip(SHAPES)
                .find(|(pair, _)| pair.contains(&tag))?;
            let ring: [u8; 4] = others(&[0, across]);
            let [a, b, c, d] = shape.round().map(|rank| ring[rank]);
            let [b, d] = if pair[0] == tag { [b, d] } else { [d, b] };
            Some([0, across, a, b, c, d])
        }),
    }
}

/// The tag that says a placement, the inverse of [`placement`] up to rotations of the polyhedron;
/// `None` where the entries are not the ligands, each once.
pub(super) fn tag(polyhedron: Polyhedron, placement: Placement) -> Option<u8> {
    match polyhedron {
        Polyhedron::SquarePlanar => square_tag(placement),
        Polyhedron::TrigonalBipyramidal => bipyramidal_tag(placement),
        Polyhedron::Octahedral => octahedral_tag(placement),
    }
}

fn square_tag([a, b, c, d, ..]: Placement) -> Option<u8> {
    let first = [a, b, c, d].iter().position(|&ligand| ligand == 0)?;
    let across = [c, d, a, b][first];
    let at = ACROSS_FIRST.iter().position(|&other| other == across)?;
    u8::try_from(at + 1).ok()
}

fn bipyramidal_tag([top, bottom, a, b, c, _]: Placement) -> Option<u8> {
    // Half a turn about an equatorial ligand: the axis and the other two change places.
    let (axis, ring) = if top < bottom {
        ([top, bottom], [a, b, c])
    } else {
        ([bottom, top], [a, c, b])
    };
    let (_, pair) = BIPYRAMIDAL.iter().find(|(own, _)| *own == axis)?;
    let sorted: [u8; 3] = others(&axis);
    let at = ring.iter().position(|&ligand| ligand == sorted[0])?;
    let second = ring[(at + 1) % ring.len()];
    Some(pair[usize::from(second != sorted[1])])
}

fn octahedral_tag(placement: Placement) -> Option<u8> {
    let [top, bottom, a, b, c, d] = placement;
    // The first ligand is turned to the top. Seen from one of the four about the axis, what follows
    // it there, the top, what precedes it and the bottom run anticlockwise.
    let (across, ring) = match placement.iter().position(|&ligand| ligand == 0)? {
        0 => (bottom, [a, b, c, d]),
        1 => (top, [a, d, c, b]),
        2 => (c, [b, top, d, bottom]),
        3 => (d, [c, top, a, bottom]),
        4 => (a, [d, top, b, bottom]),
        _ => (b, [a, top, c, bottom]),
    };
    let (_, pairs) = OCTAHEDRAL.iter().find(|(own, _)| *own == across)?;
    let sorted: [u8; 4] = others(&[0, across]);
    let at = ring.iter().position(|&ligand| ligand == sorted[0])?;
    let turned = |step: usize| ring[(at + step) % ring.len()];
    pairs.iter().zip(SHAPES).find_map(|(pair, shape)| {
        let [_, b, c, d] = shape.round().map(|rank| sorted[rank]);
        if turned(2) != c {
            return None;
        }
        Some(pair[usize::from([turned(1), turned(3)] != [b, d])])
    })
}

/// The ligands that are not on the axis, in text order.
fn others<const COUNT: usize>(axis: &[u8; 2]) -> [u8; COUNT] {
    let mut rest = (0..6).filter(|ligand| !axis.contains(ligand));
    std::array::from_fn(|_| rest.next().unwrap_or_default())
}

#[cfg(test)]
mod tests;
