//! Tetrahedral centres from wedges in a flat drawing.

use molkin_graph::{DrawnStereo, Parity};

use crate::{
    Note,
    molfile::{
        drawing::BondMark,
        stereo::{
            Scene,
            acceptable::{self, Stroke, Unclear},
            centre,
            chain::Chain,
            vector::Vector,
        },
    },
};

/// The least volume of drawn bonds. Small, for what is unclear has been sorted out by angles: two
/// plain bonds a few degrees apart still have an order.
const FLAT: f64 = 0.02;

/// Marks every atom at which a wedge or wavy bond starts. Only the narrow end counts (ST-0.5).
pub(super) fn centres(
    scene: &Scene<'_>,
    chains: &[Chain],
    notes: &mut Vec<Note>,
) -> Vec<DrawnStereo> {
    let mut starts: Vec<u32> = scene
        .drawing
        .bonds
        .iter()
        .map(|bond| bond.ends[0])
        .zip(0_u32..)
        .filter(|&(atom, bond)| scene.mark_from(atom, bond) != BondMark::Plain)
        .map(|(atom, _)| atom)
        .collect();
    starts.sort_unstable();
    starts.dedup();
    // Wedges and wavy bonds at the end of a chain of double bonds are read with the chain.
    let mut ends: Vec<(u32, bool)> = chains
        .iter()
        .flat_map(|chain| chain.ends.map(|end| (end, chain.is_axis())))
        .collect();
    ends.sort_unstable();
    let in_chain = |atom: u32, axis: bool| ends.binary_search(&(atom, axis)).is_ok();
    let mut marks = Vec::new();
    for atom in starts {
        if in_chain(atom, true) {
            continue;
        }
        let wavy = scene
            .strokes(atom)
            .any(|(mark, _)| mark == BondMark::Either);
        let ligands = scene.ligands(atom);
        if let Some(ligands) = ligands.filter(|_| !scene.is_transition_metal(atom)) {
            let parity = if wavy {
                None
            } else {
                scene.parity_from_wedges(atom, notes)
            };
            marks.push(centre::mark(atom, ligands, parity));
        } else if !(wavy && in_chain(atom, false)) {
            scene.note_no_centre(atom, notes);
        }
    }
    marks
}

impl Scene<'_> {
    /// How each bond of an atom is drawn there, and the neighbour it leads to.
    fn strokes(&self, atom: u32) -> impl Iterator<Item = (BondMark, u32)> {
        let neighbours = self.neighbours.of(atom).iter();
        neighbours.map(move |&(there, bond)| (self.mark_from(atom, bond), there))
    }

    fn parity_from_wedges(&self, atom: u32, notes: &mut Vec<Note>) -> Option<Parity> {
        match self.read_wedges(atom) {
            Ok(parity) => Some(parity),
            Err(unclear) => {
                notes.push(Note {
                    code: unclear.code(),
                    atoms: vec![atom],
                    span: self.drawing.atoms.get(atom as usize).map(|atom| atom.span),
                    text: format!(
                        "the wedges at atom {} are not read: {unclear}",
                        atom.saturating_add(1)
                    ),
                });
                None
            }
        }
    }

    fn read_wedges(&self, atom: u32) -> Result<Parity, Unclear> {
        let mut strokes = Vec::with_capacity(4);
        for (mark, there) in self.strokes(atom) {
            let flat = self.direction(atom, there).unit().ok_or(Unclear::Overlap)?;
            let height = match mark {
                BondMark::Up => 1,
                BondMark::Down => -1,
                BondMark::Plain | BondMark::Either => 0,
            };
            strokes.push(Stroke {
                angle: flat.0[1].atan2(flat.0[0]).to_degrees(),
                flat,
                height,
            });
        }
        let ring_bonds = self.neighbours.of(atom).iter();
        let ring_bonds = ring_bonds
            .filter(|&&(_, bond)| self.neighbours.in_ring(bond))
            .count();
        acceptable::check(&strokes, ring_bonds)?;
        let raised = |stroke: &Stroke| stroke.flat + Vector([0.0, 0.0, f64::from(stroke.height)]);
        let directions: Vec<Vector> = strokes.iter().map(raised).collect();
        centre::parity(&directions, FLAT).ok_or(Unclear::Flat)
    }

    /// A wedge at an atom that can be no centre and no end of an axis.
    fn note_no_centre(&self, atom: u32, notes: &mut Vec<Note>) {
        let metal = self.is_transition_metal(atom);
        let number = atom.saturating_add(1);
        notes.push(Note {
            code: if metal { "metal-wedges-ignored" } else { "stereo-bond-ignored" },
            atoms: vec![atom],
            span: self.drawing.atoms.get(atom as usize).map(|atom| atom.span),
            text: if metal {
                format!("wedges start at the metal atom {number}; a flat drawing does not say how its ligands are arranged")
            } else {
                format!("a wedge or wavy bond starts at atom {number}, which cannot be a stereocentre")
            },
        });
    }
}
