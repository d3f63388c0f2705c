//! Tetrahedral centres from coordinates in space.

use molkin_graph::{DrawnStereo, Element, Ligand};

use crate::molfile::{
    drawing::BondMark,
    stereo::{Scene, centre, metal, vector::Vector},
};

/// Marks every atom with four ligands in space that are not flat, unless two of them are plain
/// hydrogens. Wedges are not looked at, since the coordinates say more; a wavy bond still says that
/// the configuration is unknown.
pub(super) fn centres(scene: &Scene<'_>) -> Vec<DrawnStereo> {
    (0_u32..)
        .zip(&scene.drawing.atoms)
        .filter(|&(atom, _)| !metal::is_arranged(scene, atom))
        .filter_map(|(atom, _)| centre(scene, atom))
        .collect()
}

fn centre(scene: &Scene<'_>, atom: u32) -> Option<DrawnStereo> {
    let ligands = scene.ligands(atom)?;
    if ligands
        .iter()
        .filter(|&&ligand| scene.is_plain_hydrogen(ligand))
        .count()
        > 1
    {
        return None;
    }
    if ligands[0] == Ligand::LonePair && !scene.holds_its_lone_pair(atom) {
        return None;
    }
    let neighbours = scene.neighbours.of(atom);
    let directions: Option<Vec<Vector>> = neighbours
        .iter()
        .map(|&(there, _)| scene.direction(atom, there).unit())
        .collect();
    let parity = centre::parity(&directions?, centre::FLAT)?;
    let wavy = neighbours
        .iter()
        .any(|&(_, bond)| scene.mark_from(atom, bond) == BondMark::Either);
    Some(centre::mark(atom, ligands, (!wavy).then_some(parity)))
}

impl Scene<'_> {
    fn is_plain_hydrogen(&self, ligand: Ligand) -> bool {
        match ligand {
            Ligand::Hydrogen => true,
            Ligand::LonePair => false,
            Ligand::Atom(atom) => self.drawing.atoms.get(atom as usize).is_some_and(|found| {
                found.element == Element::HYDROGEN
                    && found.isotope.is_none()
                    && found.charge == 0
                    && self.neighbours.of(atom).len() == 1
            }),
        }
    }

    /// Whether an atom's lone pair keeps its side: on P, As, Sb, S, Se and Te, and on nitrogen that
    /// a three-membered ring or a bridgehead holds. Other nitrogen inverts, so its drawn shape says
    /// nothing.
    fn holds_its_lone_pair(&self, atom: u32) -> bool {
        let Some(element) = self
            .drawing
            .atoms
            .get(atom as usize)
            .map(|atom| atom.element)
        else {
            return false;
        };
        let neighbours = self.neighbours.of(atom);
        match element {
            Element::NITROGEN => {
                neighbours
                    .iter()
                    .all(|&(_, bond)| self.neighbours.in_ring(bond))
                    || neighbours.iter().any(|&(there, bond)| {
                        self.neighbours.in_ring_within(3, bond, [atom, there])
                    })
            }
            _ => matches!(element.number(), 15 | 33 | 51 | 16 | 34 | 52),
        }
    }
}
