//! The arrangement of ligands about metals in space.

use molkin_graph::{DrawnCoordination, Ligand, Polyhedron};

use crate::{
    Note,
    molfile::{
        drawing::BondMark,
        stereo::{
            Marks, Scene, centre,
            vector::{Vector, volume},
        },
    },
};

/// The least angle between ligands opposite to each other, in degrees.
const OPPOSITE: f64 = 150.0;

/// The angles between ligands beside each other, in degrees.
const BESIDE: std::ops::RangeInclusive<f64> = 60.0..=120.0;

/// Four ligands are a square up to this value of τ₄, and a tetrahedron from [`TETRAHEDRON`] on
/// (L. Yang, D. R. Powell, R. P. Houser, Dalton Trans. 2007, 955: 0 for a square, 1 for a regular
/// tetrahedron).
const SQUARE: f64 = 0.35;

/// See [`SQUARE`].
const TETRAHEDRON: f64 = 0.65;

/// Five ligands are a trigonal bipyramid from this value of τ₅ on (A. W. Addison et al., J. Chem.
/// Soc., Dalton Trans. 1984, 1349: 0 for a square pyramid, 1 for a trigonal bipyramid).
const BIPYRAMID: f64 = 0.6;

/// Ligands with more neighbours than this are no real ones. It bounds the time for hostile input.
const CROWD: usize = 64;

/// Whether an atom is a metal with ligands whose arrangement is read here, not as that of carbon.
pub(super) fn is_arranged(scene: &Scene<'_>, atom: u32) -> bool {
    scene.neighbours.of(atom).len() >= 4 && scene.is_metal(atom)
}

/// Marks metals with four to six ligands; what is none of the known arrangements gets a note.
pub(super) fn read(scene: &Scene<'_>, marks: &mut Marks, notes: &mut Vec<Note>) {
    for atom in (0_u32..).take(scene.drawing.atoms.len()) {
        if !is_arranged(scene, atom) {
            continue;
        }
        let neighbours = scene.neighbours.of(atom).iter();
        let wavy = neighbours
            .clone()
            .any(|&(_, bond)| scene.mark_from(atom, bond) == BondMark::Either);
        match directions(scene, atom).and_then(|found| Ligands(&found).arrangement()) {
            // A wavy bond says that the arrangement is unknown.
            _ if wavy => {}
            Some(Arrangement::Tetrahedral) => marks.elements.extend(tetrahedral(scene, atom)),
            Some(Arrangement::Polyhedron(polyhedron, order)) => {
                let atoms: Vec<u32> = neighbours.map(|&(there, _)| there).collect();
                marks.coordination.push(DrawnCoordination {
                    polyhedron,
                    centre: atom,
                    ligands: order.iter().map(|&at| Ligand::Atom(atoms[at])).collect(),
                });
            }
            None => notes.push(Note {
                code: "metal-arrangement-unclear",
                atoms: vec![atom],
                span: scene.drawing.atoms.get(atom as usize).map(|atom| atom.span),
                text: format!(
                    "the ligands of the metal atom {} are not at the corners of a tetrahedron, square, trigonal bipyramid or octahedron",
                    atom.saturating_add(1)
                ),
            }),
        }
    }
}

fn tetrahedral(scene: &Scene<'_>, atom: u32) -> Option<molkin_graph::DrawnStereo> {
    let parity = centre::parity(&directions(scene, atom)?, centre::FLAT)?;
    Some(centre::mark(atom, scene.ligands(atom)?, Some(parity)))
}

/// The directions of the ligands of a metal that has at most six, all of them atoms and no two of
/// them bonded to each other: π ligands are at no corner.
fn directions(scene: &Scene<'_>, metal: u32) -> Option<Vec<Vector>> {
    let neighbours = scene.neighbours.of(metal);
    let is_ligand = |atom: u32| neighbours.iter().any(|&(there, _)| there == atom);
    if neighbours.len() > 6 || scene.site(metal).hydrogens > 0 {
        return None;
    }
    for &(ligand, _) in neighbours {
        let around = scene.neighbours.of(ligand);
        if around.len() > CROWD || around.iter().any(|&(atom, _)| is_ligand(atom)) {
            return None;
        }
    }
    let directions = neighbours
        .iter()
        .map(|&(there, _)| scene.direction(metal, there).unit());
    directions.collect()
}

/// How ligands are arranged, with their positions in the order of the polyhedron.
#[derive(Debug, Clone, PartialEq, Eq)]
enum Arrangement {
    Tetrahedral,
    Polyhedron(Polyhedron, Vec<usize>),
}

/// Unit vectors from a metal to its ligands.
struct Ligands<'a>(&'a [Vector]);

impl Ligands<'_> {
    fn arrangement(&self) -> Option<Arrangement> {
        match self.0.len() {
            4 => self.four(),
            5 => self.five(),
            6 => self.six(),
            _ => None,
        }
    }

    fn angle(&self, a: usize, b: usize) -> f64 {
        self.0[a]
            .dot(self.0[b])
            .clamp(-1.0, 1.0)
            .acos()
            .to_degrees()
    }

    /// The pairs of ligands, from the largest angle down.
    fn pairs(&self) -> Vec<(f64, usize, usize)> {
        let count = self.0.len();
        let pairs = (0..count).flat_map(|a| (a + 1..count).map(move |b| (a, b)));
        let mut pairs: Vec<_> = pairs.map(|(a, b)| (self.angle(a, b), a, b)).collect();
        pairs.sort_by(|x, y| y.0.total_cmp(&x.0));
        pairs
    }

    /// Whether all of `others` are beside all of `ligands`.
    fn are_beside(&self, ligands: &[usize], others: &[usize]) -> bool {
        let mut pairs = ligands
            .iter()
            .flat_map(|&a| others.iter().map(move |&b| (a, b)));
        pairs.all(|(a, b)| BESIDE.contains(&self.angle(a, b)))
    }

    fn four(&self) -> Option<Arrangement> {
        let pairs = self.pairs();
        let (&(first, a, c), &(second, b, d)) = (pairs.first()?, pairs.get(1)?);
        let tau = (360.0 - (first + second)) / 141.0;
        if tau >= TETRAHEDRON {
            return Some(Arrangement::Tetrahedral);
        }
        let square = tau <= SQUARE && self.are_beside(&[a, c], &[b, d]);
        let order = vec![a, b, c, d];
        square.then_some(Arrangement::Polyhedron(Polyhedron::SquarePlanar, order))
    }

    fn five(&self) -> Option<Arrangement> {
        let pairs = self.pairs();
        let (&(first, top, bottom), &(second, ..)) = (pairs.first()?, pairs.get(1)?);
        let equator: Vec<usize> = (0..5).filter(|&at| at != top && at != bottom).collect();
        let &[a, b, c] = equator.as_slice() else {
            return None;
        };
        let fits = (first - second) / 60.0 >= BIPYRAMID
            && first >= OPPOSITE
            && self.are_beside(&[top, bottom], &equator);
        let [b, c] = if self.runs_anticlockwise(top, a, b) {
            [b, c]
        } else {
            [c, b]
        };
        let order = vec![top, bottom, a, b, c];
        fits.then_some(Arrangement::Polyhedron(
            Polyhedron::TrigonalBipyramidal,
            order,
        ))
    }

    fn six(&self) -> Option<Arrangement> {
        let pairs = self.pairs();
        let opposite = |at: usize| {
            let mut of = pairs.iter().filter(|&&(_, a, b)| a == at || b == at);
            let &(angle, a, b) = of.next()?;
            (angle >= OPPOSITE).then_some(if a == at { b } else { a })
        };
        let mut axes = Vec::new();
        for at in 0..6 {
            let other = opposite(at)?;
            if opposite(other) != Some(at) {
                return None;
            }
            if at < other {
                axes.push([at, other]);
            }
        }
        let &[[top, bottom], [a, c], [b, d]] = axes.as_slice() else {
            return None;
        };
        let fits =
            self.are_beside(&[top, bottom], &[a, b, c, d]) && self.are_beside(&[a, c], &[b, d]);
        let [b, d] = if self.runs_anticlockwise(top, a, b) {
            [b, d]
        } else {
            [d, b]
        };
        let order = vec![top, bottom, a, b, c, d];
        fits.then_some(Arrangement::Polyhedron(Polyhedron::Octahedral, order))
    }

    /// Whether the way from `a` to `b` is anticlockwise as seen from `top`.
    fn runs_anticlockwise(&self, top: usize, a: usize, b: usize) -> bool {
        volume(self.0[top], self.0[a], self.0[b]) > 0.0
    }
}

#[cfg(test)]
mod tests {
    use rstest::rstest;

    use super::*;

    fn arrangement(positions: &[[f64; 3]]) -> Option<Arrangement> {
        let units: Vec<Vector> = positions
            .iter()
            .map(|&p| Vector(p).unit().unwrap())
            .collect();
        Ligands(&units).arrangement()
    }

    const UP: [f64; 3] = [0.0, 0.0, 1.0];
    const DOWN: [f64; 3] = [0.1, 0.0, -1.0];
    const EAST: [f64; 3] = [1.0, 0.1, 0.0];
    const NORTH: [f64; 3] = [0.1, 1.0, 0.1];
    const WEST: [f64; 3] = [-1.0, 0.0, 0.1];
    const SOUTH: [f64; 3] = [0.0, -1.0, 0.0];

    #[rstest]
    #[case::square(&[EAST, WEST, NORTH, SOUTH], Polyhedron::SquarePlanar, &[2, 0, 3, 1])]
    #[case::square_in_turn(&[EAST, NORTH, WEST, SOUTH], Polyhedron::SquarePlanar, &[1, 0, 3, 2])]
    #[case::octahedron(&[UP, DOWN, EAST, NORTH, WEST, SOUTH], Polyhedron::Octahedral, &[0, 1, 2, 3, 4, 5])]
    #[case::octahedron_inverted(&[UP, DOWN, EAST, SOUTH, WEST, NORTH], Polyhedron::Octahedral, &[0, 1, 2, 5, 4, 3])]
    #[case::octahedron_mixed(&[EAST, UP, NORTH, WEST, DOWN, SOUTH], Polyhedron::Octahedral, &[0, 3, 1, 5, 4, 2])]
    #[case::bipyramid(&[UP, EAST, [-0.5, 0.87, 0.0], [-0.5, -0.87, 0.0], DOWN], Polyhedron::TrigonalBipyramidal, &[0, 4, 1, 2, 3])]
    #[case::bipyramid_inverted(&[UP, EAST, [-0.5, -0.87, 0.0], [-0.5, 0.87, 0.0], DOWN], Polyhedron::TrigonalBipyramidal, &[0, 4, 1, 3, 2])]
    fn polyhedra(
        #[case] positions: &[[f64; 3]],
        #[case] polyhedron: Polyhedron,
        #[case] order: &[usize],
    ) {
        let expected = Arrangement::Polyhedron(polyhedron, order.to_vec());
        assert_eq!(arrangement(positions), Some(expected));
    }

    #[rstest]
    #[case::tetrahedron(&[[1.0, 1.0, 1.0], [1.0, -1.0, -1.0], [-1.0, 1.0, -1.0], [-1.0, -1.0, 1.0]], Some(Arrangement::Tetrahedral))]
    #[case::seesaw(&[UP, DOWN, EAST, [-0.5, 0.87, 0.0]], None)]
    #[case::square_pyramid(&[UP, EAST, NORTH, WEST, SOUTH], None)]
    #[case::prism(&[[1.0, 0.0, 0.8], [-0.5, 0.87, 0.8], [-0.5, -0.87, 0.8], [1.0, 0.0, -0.8], [-0.5, 0.87, -0.8], [-0.5, -0.87, -0.8]], None)]
    #[case::three(&[UP, EAST, NORTH], None)]
    fn others(#[case] positions: &[[f64; 3]], #[case] expected: Option<Arrangement>) {
        assert_eq!(arrangement(positions), expected);
    }
}
