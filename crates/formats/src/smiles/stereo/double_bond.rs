//! Cis/trans marks: `/` and `\` at both ends of a double bond, or of an odd number of cumulated ones.

use molkin_graph::{DrawnStereo, MoleculeBuilder, Parity, Shape};

use super::{cumulene, end::End};
use crate::smiles::{
    remarks::{Extent, Fault, Remarks},
    syntax::{NONE, Slope, Syntax},
};

/// What the slopes at one end of a double bond say about its first ligand.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
enum Side {
    Unmarked,
    Above,
    Below,
    Contradictory,
}

impl Side {
    fn opposite(self) -> Self {
        match self {
            Self::Above => Self::Below,
            Self::Below => Self::Above,
            other => other,
        }
    }
}

/// Adds one mark for every double bond both ends of which have slopes.
///
/// A slope may serve two double bonds. What serves none, and what contradicts itself, is remarked
/// on and decides nothing.
pub(super) fn add_marks(
    syntax: &mut Syntax,
    builder: &mut MoleculeBuilder,
    remarks: &mut Remarks,
) -> Result<(), Fault> {
    let mut doubly_marked = Vec::new();
    for bond in 0..syntax.bonds.len() as u32 {
        if let Some([one, two]) = ends(syntax, bond)
            && let Some(mark) = mark(syntax, one, two, remarks)?
        {
            builder.add_stereo(mark);
            let both = |end: &End| end.bonds.iter().all(|&bond| has_slope(syntax, bond));
            doubly_marked.extend([one, two].into_iter().filter(both));
        }
    }
    remark_on_redundant(syntax, &doubly_marked, remarks);
    remark_on_unpaired(syntax, remarks)
}

fn has_slope(syntax: &Syntax, bond: u32) -> bool {
    let bond = syntax.bonds.get(bond as usize);
    bond.is_some_and(|bond| bond.slope != Slope::Unmarked)
}

/// The ends of the planar unit whose first bond this is; each unit is found from one of its bonds.
fn ends(syntax: &Syntax, bond: u32) -> Option<[End; 2]> {
    let row = cumulene::row(syntax, bond).filter(|row| row.length % 2 == 1)?;
    let [one, two] = row.ends.map(|stop| End::new(syntax, stop));
    Some([one?, two?])
}

/// The mark that the slopes at both ends make together, if both have any.
fn mark(
    syntax: &mut Syntax,
    one: End,
    two: End,
    remarks: &mut Remarks,
) -> Result<Option<DrawnStereo>, Fault> {
    let sides = [side_of_first(syntax, &one), side_of_first(syntax, &two)];
    if sides.contains(&Side::Unmarked) {
        return Ok(None);
    }
    for bond in [one, two]
        .iter()
        .flat_map(|end| end.bonds)
        .filter(|&bond| bond != NONE)
    {
        syntax.bonds[bond as usize].uses += 1;
    }
    let centres = [one.atom, two.atom];
    if sides.contains(&Side::Contradictory) {
        let text = "the / and \\ at one end of a double bond contradict each other; \
                    its arrangement is taken as not stated";
        let end = if sides[0] == Side::Contradictory {
            &one
        } else {
            &two
        };
        let extent = super::extent_of(&syntax.atoms[end.atom as usize]);
        remarks.note("contradictory-marks", &centres, extent, text)?;
        return Ok(None);
    }
    Ok(Some(DrawnStereo {
        shape: Shape::DoubleBond,
        centres,
        ligands: [
            one.ligands[0],
            one.ligands[1],
            two.ligands[0],
            two.ligands[1],
        ],
        parity: Some(Parity::from_odd(sides[0] != sides[1])),
    }))
}

/// On which side the first ligand of an end lies; the second one lies on the other.
fn side_of_first(syntax: &Syntax, end: &End) -> Side {
    let [first, second] = end.bonds.map(|bond| side(syntax, end.atom, bond));
    match (first, second) {
        (Side::Contradictory, _) | (_, Side::Contradictory) => Side::Contradictory,
        (first, Side::Unmarked) => first,
        (Side::Unmarked, second) => second.opposite(),
        (first, second) if first == second => Side::Contradictory,
        (first, _) => first,
    }
}

/// On which side the other atom of a bond lies, seen from `atom`.
fn side(syntax: &Syntax, atom: u32, bond: u32) -> Side {
    let Some(bond) = syntax.bonds.get(bond as usize) else {
        return Side::Unmarked;
    };
    let side = match bond.slope {
        Slope::Unmarked => Side::Unmarked,
        Slope::Above => Side::Above,
        Slope::Below => Side::Below,
        Slope::Contradictory => Side::Contradictory,
    };
    if bond.ends[0] == atom {
        side
    } else {
        side.opposite()
    }
}

/// One slope at an end says all. A second one is redundant unless it and the first both serve
/// another double bond as well.
fn remark_on_redundant(syntax: &Syntax, doubly_marked: &[End], remarks: &mut Remarks) {
    for end in doubly_marked {
        let bonds = end.bonds.iter().rev();
        let mut bonds = bonds.filter_map(|&bond| syntax.bonds.get(bond as usize));
        if let Some(bond) = bonds.find(|bond| bond.uses < 2) {
            let text = "this / or \\ repeats what another one says";
            let extent = Extent::new(bond.offset as usize, bond.width as usize);
            remarks.note_allowed("redundant-mark", &[end.atom], extent, text);
        }
    }
}

fn remark_on_unpaired(syntax: &Syntax, remarks: &mut Remarks) -> Result<(), Fault> {
    let unpaired = syntax
        .bonds
        .iter()
        .filter(|bond| bond.slope != Slope::Unmarked && bond.uses == 0);
    for bond in unpaired {
        let text = "this / or \\ decides nothing: no double bond has one at both of its ends here";
        let extent = Extent::new(bond.offset as usize, bond.width as usize);
        remarks.note("unpaired-mark", &bond.ends, extent, text)?;
    }
    Ok(())
}
