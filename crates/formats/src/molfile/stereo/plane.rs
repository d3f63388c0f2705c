//! The geometry of double bonds, and of chains of an odd number of them.

use molkin_graph::{DrawnStereo, Ligand, Parity, Shape};

use crate::{
    Note,
    molfile::{
        drawing::BondMark,
        stereo::{Scene, chain::Chain, vector::Vector},
    },
};

/// The least sine of the angle between a ligand and the axis: about six degrees off the line.
const OFF_AXIS: f64 = 0.1;

/// Reads which ligands are on the same side. A crossed bond, or a wavy one beside it, says that
/// this is unknown; so does a drawing with a ligand in line with the bond, which gets a note.
pub(super) fn read(scene: &Scene<'_>, chain: &Chain, notes: &mut Vec<Note>) -> DrawnStereo {
    let unknown = chain.crossed || chain.ends.iter().any(|&end| scene.is_wavy_beside(end));
    let parity = if unknown {
        None
    } else {
        same_side(scene, chain)
    };
    if parity.is_none() && !unknown {
        let [a, b] = chain.ends.map(|end| end.saturating_add(1));
        notes.push(Note {
            code: "double-bond-unclear",
            atoms: chain.ends.to_vec(),
            span: scene.drawing.atoms.get(chain.ends[0] as usize).map(|atom| atom.span),
            text: format!("the drawing does not show on which sides of the double bond {a}-{b} its ligands are"),
        });
    }
    DrawnStereo {
        shape: Shape::DoubleBond,
        centres: chain.ends,
        ligands: chain.all_ligands(),
        parity,
    }
}

fn same_side(scene: &Scene<'_>, chain: &Chain) -> Option<Parity> {
    let [a, b] = chain.ends;
    let axis = scene.direction(a, b).unit()?;
    let cosine =
        side(scene, a, chain.ligands[0], axis)?.dot(side(scene, b, chain.ligands[1], axis)?);
    // In space a bond twisted to a right angle has no sides.
    (cosine.abs() >= OFF_AXIS).then(|| Parity::from_odd(cosine < 0.0))
}

/// The direction across the axis in which the first ligand of an end lies; the second must lie on
/// the other side.
pub(super) fn side(
    scene: &Scene<'_>,
    end: u32,
    ligands: [Ligand; 2],
    axis: Vector,
) -> Option<Vector> {
    let across = |ligand: Ligand| match ligand {
        Ligand::Atom(atom) => {
            let across = scene.direction(end, atom).unit()?.across(axis);
            (across.length() >= OFF_AXIS).then_some(across)?.unit()
        }
        _ => None,
    };
    let first = across(ligands[0])?;
    match ligands[1] {
        Ligand::Atom(_) if across(ligands[1])?.dot(first) >= 0.0 => None,
        _ => Some(first),
    }
}

impl Scene<'_> {
    /// Whether a wavy bond beside a double bond's end says that its geometry is unknown: one that
    /// starts there, or one that ends there and starts at an atom that has no configuration of its
    /// own for it to be about.
    pub(super) fn is_wavy_beside(&self, end: u32) -> bool {
        self.neighbours.of(end).iter().any(|&(there, bond)| {
            self.mark_from(end, bond) == BondMark::Either
                || self.mark_from(there, bond) == BondMark::Either && self.ligands(there).is_none()
        })
    }
}
