//! Atoms with a square-planar, trigonal-bipyramidal or octahedral tag.

use molkin_graph::{DrawnCoordination, Ligand, Polyhedron};

use super::extent_of;
use crate::{
    ReadErrorKind,
    smiles::{
        polyhedra,
        remarks::{Fault, Remarks},
        syntax::{AtomSyntax, StereoTag, Syntax, TagClass},
        valence,
    },
};

/// The polyhedron that a tag speaks of, `None` for tetrahedral atoms and allenes.
///
/// The standard has `@` and `@@` stand for `@TB1`, `@TB2`, `@OH1` and `@OH2` in its examples, though
/// its text keeps them to four ligands; with five or six they can mean nothing else.
pub(super) fn polyhedron(here: &AtomSyntax, tag: StereoTag) -> Option<Polyhedron> {
    match (tag.class, ligand_count(here)) {
        (TagClass::Polyhedral(polyhedron), _) => Some(polyhedron),
        (TagClass::Plain, 5) => Some(Polyhedron::TrigonalBipyramidal),
        (TagClass::Plain, 6) => Some(Polyhedron::Octahedral),
        _ => None,
    }
}

/// Ligands that are written or counted.
pub(super) fn ligand_count(here: &AtomSyntax) -> u32 {
    here.degree.saturating_add(u32::from(here.atom.hydrogens))
}

/// The arrangement that a tag says; `None`, with a remark, where it can say nothing.
pub(super) fn mark(
    syntax: &Syntax,
    polyhedron: Polyhedron,
    atom: u32,
    tag: StereoTag,
    remarks: &mut Remarks,
) -> Result<Option<DrawnCoordination>, Fault> {
    let here = &syntax.atoms[atom as usize];
    if tag.class == TagClass::Plain {
        let text = "@ and @@ are not defined for five or six ligands; \
                    they are read as the first and second tag of the class";
        remarks.note_allowed("stereo-tag-short", &[atom], extent_of(here), text);
    }
    let positions = polyhedron.positions();
    if ligand_count(here) as usize > positions {
        return Err(too_many(atom, here));
    }
    let written = match ligands(syntax, atom, positions) {
        Ok(written) => written,
        Err(reason) => {
            super::remark_on_meaningless(atom, here, reason, remarks)?;
            return Ok(None);
        }
    };
    let placed = polyhedra::placement(polyhedron, tag.number).map(|placement| {
        let at = placement.iter().take(positions);
        at.filter_map(|&ligand| written.get(usize::from(ligand)).copied())
            .collect()
    });
    // The tag was checked when it was read.
    Ok(placed.map(|ligands| DrawnCoordination {
        polyhedron,
        centre: atom,
        ligands,
    }))
}

/// The fault of a tag at an atom with more ligands than its class has.
pub(super) fn too_many(atom: u32, here: &AtomSyntax) -> Fault {
    let kind = ReadErrorKind::BadStereo { atom };
    Fault::new(kind, here.offset as usize, here.width as usize)
}

/// The ligands in text order. Hydrogens that are counted, and a lone pair or empty site where one
/// ligand is wanting, stand behind the preceding atom, or first where there is none.
fn ligands(syntax: &Syntax, atom: u32, positions: usize) -> Result<Vec<Ligand>, &'static str> {
    let here = &syntax.atoms[atom as usize];
    let vacancy = match positions - (ligand_count(here) as usize).min(positions) {
        0 => false,
        1 if valence::may_have_lone_pair(here) => true,
        1 => return Err("a ligand is wanting, and there is no lone pair in its place"),
        _ => return Err("too few ligands"),
    };
    let unwritten = std::iter::repeat_n(Ligand::Hydrogen, usize::from(here.atom.hydrogens))
        .chain(vacancy.then_some(Ligand::LonePair));
    let mut neighbours = syntax
        .neighbours(atom)
        .map(|(other, _)| Ligand::Atom(other));
    let before = here.preceded.then(|| neighbours.next()).flatten();
    Ok(before
        .into_iter()
        .chain(unwritten)
        .chain(neighbours)
        .collect())
}
