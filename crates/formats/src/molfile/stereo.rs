//! Stereo marks from a drawing (G. P. Brecher, IUPAC Recommendations 2006, Pure Appl. Chem. 78,
//! 1897; sections named `ST` below).
//!
//! A mark is reported wherever the drawing makes a statement. Whether the place is stereogenic is
//! decided later, by symmetry.

mod acceptable;
mod axis;
mod centre;
mod chain;
mod hindered;
mod metal;
mod plane;
mod solid;
mod vector;
mod wedge;

use molkin_graph::{
    DrawnCoordination, DrawnStereo, Element, GroupKind, Parity, Shape, StereoGroup,
};

use crate::{
    Note,
    molfile::{
        FlagZero,
        drawing::{BondKind, BondMark, Drawing, DrawnAtom, DrawnBond},
        neighbours::Neighbours,
        site::Site,
        stereo::vector::Vector,
    },
};

/// A z coordinate below this is a plane's rounding, not depth.
const DEPTH: f64 = 1e-3;

/// What the coordinates are good for.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
enum Dimension {
    /// All are zero: there is no drawing.
    None,
    Flat,
    Solid,
}

/// A drawing with all that the stereo readers look up.
struct Scene<'a> {
    drawing: &'a Drawing,
    neighbours: &'a Neighbours,
    sites: &'a [Site],
    dimension: Dimension,
}

/// What a drawing says about arrangement in space.
#[derive(Debug, Default)]
pub(super) struct Marks {
    pub(super) elements: Vec<DrawnStereo>,
    pub(super) coordination: Vec<DrawnCoordination>,
    pub(super) groups: Vec<StereoGroup>,
}

/// Reads all marks, in the order: tetrahedral centres, then double bonds and axes.
pub(super) fn marks(
    drawing: &Drawing,
    neighbours: &Neighbours,
    sites: &[Site],
    flag_zero: FlagZero,
    notes: &mut Vec<Note>,
) -> Marks {
    let dimension = dimension(&drawing.atoms);
    let scene = Scene {
        drawing,
        neighbours,
        sites,
        dimension,
    };
    let mut marks = Marks {
        groups: drawing.groups.clone(),
        ..Marks::default()
    };
    if dimension == Dimension::None {
        scene.note_no_coordinates(notes);
        return marks;
    }
    let mut chains = chain::find(&scene);
    let axes = hindered::find(&scene, &chains);
    chains.extend(axes);
    if dimension == Dimension::Solid {
        marks.elements = solid::centres(&scene);
        metal::read(&scene, &mut marks, notes);
    } else {
        marks.elements = wedge::centres(&scene, &chains, notes);
    }
    for chain in &chains {
        if chain.is_axis() {
            marks.elements.extend(axis::read(&scene, chain, notes));
        } else {
            marks.elements.push(plane::read(&scene, chain, notes));
        }
    }
    if !drawing.chiral && !drawing.grouped {
        let group = read_flag_zero(&marks.elements, flag_zero, notes);
        marks.groups.extend(group);
    }
    marks
}

/// The coordinates decide, not the header's "2D" or "3D": programs often leave that as it was.
fn dimension(atoms: &[DrawnAtom]) -> Dimension {
    if atoms.iter().any(|atom| atom.position[2].abs() >= DEPTH) {
        Dimension::Solid
    } else if atoms
        .iter()
        .any(|atom| atom.position[0] != 0.0 || atom.position[1] != 0.0)
    {
        Dimension::Flat
    } else {
        Dimension::None
    }
}

impl Scene<'_> {
    fn bond(&self, index: u32) -> &DrawnBond {
        // Indices come from the neighbour lists, which were made from the same bonds.
        &self.drawing.bonds[index as usize]
    }

    fn site(&self, atom: u32) -> &Site {
        // One site an atom, and bond lines name atoms that exist.
        &self.sites[atom as usize]
    }

    /// From one atom to another.
    fn direction(&self, from: u32, to: u32) -> Vector {
        let position = |atom: u32| Vector(self.drawing.atoms[atom as usize].position);
        position(to) - position(from)
    }

    /// The mark of a bond whose narrow end is at an atom; plain for one that starts at the other.
    fn mark_from(&self, atom: u32, bond: u32) -> BondMark {
        let bond = self.bond(bond);
        if bond.ends[0] == atom && bond.kind != BondKind::Double {
            bond.mark
        } else {
            BondMark::Plain
        }
    }

    /// Whether an atom is a metal, as far as its neighbours can be arranged in other ways than about
    /// carbon.
    fn is_metal(&self, atom: u32) -> bool {
        let element = self.drawing.atoms[atom as usize].element;
        element.is_metal() && !matches!(element.group(), Some(18)) && element != Element::WILDCARD
    }

    /// Whether an atom is a metal outside groups 13 to 18: wedges at it are no tetrahedron.
    fn is_transition_metal(&self, atom: u32) -> bool {
        let group = self.drawing.atoms[atom as usize].element.group();
        self.is_metal(atom) && group.is_none_or(|group| group <= 12)
    }

    fn note_no_coordinates(&self, notes: &mut Vec<Note>) {
        let marked = |bond: &&DrawnBond| matches!(bond.mark, BondMark::Up | BondMark::Down);
        if let Some(bond) = self.drawing.bonds.iter().find(marked) {
            notes.push(Note {
                code: "stereo-without-coordinates",
                atoms: bond.ends.to_vec(),
                span: Some(bond.span),
                text: "wedges are drawn, but all coordinates are zero: no stereo is read"
                    .to_owned(),
            });
        }
    }
}

/// The chiral flag says whether the drawn configuration is meant as absolute; most writers leave it
/// unset on drawings that are.
fn read_flag_zero(
    marks: &[DrawnStereo],
    flag_zero: FlagZero,
    notes: &mut Vec<Note>,
) -> Option<StereoGroup> {
    let chiral = |mark: &&DrawnStereo| mark.shape != Shape::DoubleBond && mark.parity.is_some();
    let atoms: Vec<u32> = marks
        .iter()
        .filter(chiral)
        .map(|mark| mark.centres[0])
        .collect();
    if atoms.is_empty() {
        return None;
    }
    let reading = match flag_zero {
        FlagZero::Absolute => "as absolute",
        FlagZero::Mixture => "as a mixture with its mirror image",
        FlagZero::Relative => "as relative: this, its mirror image, or both",
    };
    notes.push(Note {
        code: "chiral-flag-unset",
        atoms: atoms.clone(),
        span: None,
        text: format!("the chiral flag is not set; the drawn configuration is read {reading}"),
    });
    let kind = match flag_zero {
        FlagZero::Absolute => return None,
        FlagZero::Mixture => GroupKind::And,
        FlagZero::Relative => GroupKind::Relative,
    };
    Some(StereoGroup { kind, atoms })
}

/// The parity of four ligands from the signed volume of their positions, the first being the
/// origin:
/// `@` where it is negative, in right-handed axes.
fn parity_of_volume(volume: f64) -> Parity {
    Parity::from_odd(volume > 0.0)
}
