//! Axes of chirality: allenes and longer chains of an even number of double bonds, and single bonds
//! about which rotation is hindered.

use molkin_graph::{DrawnStereo, Ligand, Parity, Shape};

use crate::{
    Note,
    molfile::{
        drawing::BondMark,
        stereo::{
            Dimension, Scene,
            chain::Chain,
            parity_of_volume, plane,
            vector::{Vector, volume},
        },
    },
};

/// The least sine of the angle between the planes of the two ends.
const OFF_PLANE: f64 = 0.1;

/// Reads an axis: in space from the coordinates, in a flat drawing from wedges at one of its ends.
/// Without any there is no mark.
pub(super) fn read(scene: &Scene<'_>, chain: &Chain, notes: &mut Vec<Note>) -> Option<DrawnStereo> {
    let wavy = chain.crossed || chain.ends.iter().any(|&end| scene.is_wavy_beside(end));
    let parity = if wavy {
        None
    } else if scene.dimension == Dimension::Solid {
        Some(from_space(scene, chain)?)
    } else {
        let heights = [0, 1].map(|at| height(scene, chain.ends[at], chain.ligands[at]));
        if heights == [Ok(None), Ok(None)] {
            return None;
        }
        let parity = from_wedges(scene, chain, heights);
        if parity.is_none() {
            note(scene, chain, notes);
        }
        parity
    };
    Some(DrawnStereo {
        shape: Shape::Axis,
        centres: chain.ends,
        ligands: chain.all_ligands(),
        parity,
    })
}

/// Wedges of one end that say contrary things.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
struct Contradiction;

/// Whether the first ligand of an end is above the plane (1) or below it (−1), by its own wedge or
/// the contrary of the other's; `None` without wedges.
fn height(scene: &Scene<'_>, end: u32, ligands: [Ligand; 2]) -> Result<Option<f64>, Contradiction> {
    let mut found = None;
    for (ligand, sign) in ligands.into_iter().zip([1.0, -1.0]) {
        let mark = scene
            .neighbours
            .of(end)
            .iter()
            .find(|&&(there, _)| ligand == Ligand::Atom(there));
        let height = match mark.map(|&(_, bond)| scene.mark_from(end, bond)) {
            Some(BondMark::Up) => sign,
            Some(BondMark::Down) => -sign,
            _ => continue,
        };
        if found.is_some_and(|other: f64| other != height) {
            return Err(Contradiction);
        }
        found = Some(height);
    }
    Ok(found)
}

/// The end with wedges stands upright, the other lies in the plane. About a single bond the planes
/// of the ends may be turned by any angle, so wedges at both ends can go together: alike on opposite
/// sides of the axis, contrary on the same side.
fn from_wedges(
    scene: &Scene<'_>,
    chain: &Chain,
    heights: [Result<Option<f64>, Contradiction>; 2],
) -> Option<Parity> {
    let [a, b] = chain.ends;
    let axis = scene.direction(a, b).unit()?;
    let upright = |height: f64| Vector([0.0, 0.0, height]);
    if chain.is_single() {
        let raised = |at: usize| {
            let flat = plane::side(scene, chain.ends[at], chain.ligands[at], axis)?;
            Some(flat + upright(heights[at].ok()?.unwrap_or(0.0)))
        };
        return turn(axis, raised(0)?, raised(1)?);
    }
    match heights {
        [Ok(Some(height)), Ok(None)] => turn(
            axis,
            upright(height),
            plane::side(scene, b, chain.ligands[1], axis)?,
        ),
        [Ok(None), Ok(Some(height))] => turn(
            axis,
            plane::side(scene, a, chain.ligands[0], axis)?,
            upright(height),
        ),
        _ => None,
    }
}

fn from_space(scene: &Scene<'_>, chain: &Chain) -> Option<Parity> {
    let [a, b] = chain.ends;
    let axis = scene.direction(a, b).unit()?;
    let near = plane::side(scene, a, chain.ligands[0], axis)?;
    turn(axis, near, plane::side(scene, b, chain.ligands[1], axis)?)
}

/// The parity from the directions across the axis in which the first ligands of both ends lie; the
/// second ones lie opposite.
fn turn(axis: Vector, near: Vector, far: Vector) -> Option<Parity> {
    // The four ligands relative to the middle of the chain, half an axis out.
    let sine = volume(axis, near, far);
    if sine.abs() < OFF_PLANE {
        return None;
    }
    let first = near - axis;
    let others = [-near - axis, axis + far, axis - far];
    let [b, c, d] = others.map(|ligand| ligand - first);
    Some(parity_of_volume(volume(b, c, d)))
}

fn note(scene: &Scene<'_>, chain: &Chain, notes: &mut Vec<Note>) {
    let [a, b] = chain.ends.map(|end| end.saturating_add(1));
    notes.push(Note {
        code: "axis-unclear",
        atoms: chain.ends.to_vec(),
        span: scene
            .drawing
            .atoms
            .get(chain.ends[0] as usize)
            .map(|atom| atom.span),
        text: format!("the wedges at the axis {a}-{b} do not show how its ends are turned"),
    });
}
