//! Atoms with a stereo tag: tetrahedral centres, and the middle of an even number of cumulated
//! double bonds.

use molkin_graph::{DrawnStereo, Ligand, Parity, Shape};

use super::{
    cumulene::{self, Row},
    end::End,
};
use crate::smiles::{
    remarks::{Fault, Remarks},
    syntax::{StereoTag, Syntax, TagClass},
    valence,
};

/// What a tag says; `None`, with a remark, where it can say nothing. `allenes` are those of the whole
/// record.
pub(super) fn mark(
    syntax: &Syntax,
    allenes: &[Row],
    atom: u32,
    tag: StereoTag,
    remarks: &mut Remarks,
) -> Result<Option<DrawnStereo>, Fault> {
    let here = &syntax.atoms[atom as usize];
    let meaning = match (syntax.is_cumulated(atom), tag.class) {
        (true, TagClass::Plain | TagClass::Allene) => axis(syntax, allenes, atom),
        (false, TagClass::Plain | TagClass::Tetrahedral) => tetrahedral(syntax, atom),
        (true, TagClass::Tetrahedral) => Err("the atom is part of a row of double bonds"),
        (false, TagClass::Allene) => Err("the atom is not inside a row of double bonds"),
        // Told apart by the caller.
        (_, TagClass::Polyhedral(_)) => return Ok(None),
    };
    match meaning {
        Ok(mark) => Ok(Some(DrawnStereo {
            parity: Some(Parity::from_odd(tag.number == 2)),
            ..mark
        })),
        Err(reason) => super::remark_on_meaningless(atom, here, reason, remarks).map(|()| None),
    }
}

/// Four ligands in text order. A hydrogen, or else a lone pair, that is not an atom of its own
/// stands behind the preceding atom, or first where there is none.
fn tetrahedral(syntax: &Syntax, atom: u32) -> Result<DrawnStereo, &'static str> {
    let here = &syntax.atoms[atom as usize];
    let unwritten = match (here.degree, here.atom.hydrogens) {
        (4, 0) => None,
        (3, 1) => Some(Ligand::Hydrogen),
        (3, 0) => {
            let demand = valence::pi_demand(here).unwrap_or_default();
            if !valence::has_lone_pair(here, demand) {
                return Err("three ligands, and no lone pair to be the fourth");
            }
            Some(Ligand::LonePair)
        }
        (_, 2..) => return Err("two or more hydrogens on the atom"),
        _ => return Err("fewer than three other ligands"),
    };
    let slot = if unwritten.is_some() {
        usize::from(here.preceded)
    } else {
        usize::MAX
    };
    let mut neighbours = syntax
        .neighbours(atom)
        .map(|(other, _)| Ligand::Atom(other));
    let mut ligands = [Ligand::LonePair; 4];
    for (at, ligand) in ligands.iter_mut().enumerate() {
        let next = if at == slot {
            unwritten
        } else {
            neighbours.next()
        };
        *ligand = next.ok_or("fewer than four ligands")?;
    }
    Ok(DrawnStereo {
        shape: Shape::Tetrahedral,
        centres: [atom; 2],
        ligands,
        parity: None,
    })
}

/// The rows of an even number of double bonds, by their middle atoms. Found once for a record, since
/// each of the atoms in a long row may have a tag.
pub(super) fn allenes(syntax: &Syntax) -> Vec<Row> {
    let rows = (0..syntax.bonds.len() as u32).filter_map(|bond| cumulene::row(syntax, bond));
    let mut rows: Vec<Row> = rows.filter(|row| row.length % 2 == 0).collect();
    rows.sort_unstable_by_key(|row| row.middle);
    rows
}

/// The two ligands at each end of the row whose middle the atom is, the end that comes first in
/// the text first. Where the ligands of one end stand between those of the other, the pair is moved
/// as a whole, which is an even permutation.
fn axis(syntax: &Syntax, allenes: &[Row], atom: u32) -> Result<DrawnStereo, &'static str> {
    let row = allenes
        .binary_search_by_key(&atom, |row| row.middle)
        .ok()
        .and_then(|at| allenes.get(at))
        .ok_or("the atom is not the middle of a row of double bonds with two ends")?;
    let [first, last] = row.ends.map(|stop| End::new(syntax, stop));
    let (Some(first), Some(last)) = (first, last) else {
        return Err("an end of the row has not two ligands");
    };
    Ok(DrawnStereo {
        shape: Shape::Axis,
        centres: [first.atom, last.atom],
        ligands: [
            first.ligands[0],
            first.ligands[1],
            last.ligands[0],
            last.ligands[1],
        ],
        parity: None,
    })
}
