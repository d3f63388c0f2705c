//! What a tetrahedral centre's ligands are.

use molkin_graph::{DrawnStereo, Ligand, Parity, Shape};

use crate::molfile::stereo::{
    Scene, parity_of_volume,
    vector::{Vector, volume},
};

/// Below this volume of unit vectors three or four ligands in space are as good as flat.
pub(super) const FLAT: f64 = 0.1;

impl Scene<'_> {
    /// The ligands of an atom as a tetrahedral centre: four atoms, or three and a hydrogen or a
    /// lone pair, which then comes first. `None` where it cannot be one.
    pub(super) fn ligands(&self, atom: u32) -> Option<[Ligand; 4]> {
        let (site, neighbours) = (self.site(atom), self.neighbours.of(atom));
        match (neighbours, site.hydrogens) {
            ([a, b, c, d], 0) => Some([a, b, c, d].map(|&(atom, _)| Ligand::Atom(atom))),
            ([a, b, c], hydrogens @ 0..=1) => {
                let fourth = match hydrogens {
                    1 => Ligand::Hydrogen,
                    _ if site.has_lone_pair() => Ligand::LonePair,
                    _ => return None,
                };
                let [a, b, c] = [a, b, c].map(|&(atom, _)| Ligand::Atom(atom));
                Some([fourth, a, b, c])
            }
            _ => None,
        }
    }
}

/// The parity of three or four directions from a centre, in the order of its ligands. Where only
/// three are given, the first ligand lies opposite to them. `None` for a volume below `least`.
pub(super) fn parity(directions: &[Vector], least: f64) -> Option<Parity> {
    let volume = match *directions {
        [a, b, c] => volume(a, b, c),
        [first, a, b, c] => volume(a - first, b - first, c - first),
        _ => return None,
    };
    (volume.abs() >= least).then(|| parity_of_volume(volume))
}

/// A mark at one atom.
pub(super) fn mark(atom: u32, ligands: [Ligand; 4], parity: Option<Parity>) -> DrawnStereo {
    DrawnStereo {
        shape: Shape::Tetrahedral,
        centres: [atom, atom],
        ligands,
        parity,
    }
}
