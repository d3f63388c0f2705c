//! Hydrogens that aromatic bonds hide.
//!
//! A drawing with aromatic bonds does not say which nitrogen of a pyrrole or imidazole ring has the
//! hydrogen. Where no double bonds fit without one, and with one at just one atom, it is there.

use molkin_graph::{Atom, BondOrder, Element, MoleculeBuilder, PiDemand};

use crate::{
    Note, ReadErrorKind,
    molfile::{
        block::Fault,
        drawing::{BondKind, Drawing, Radical},
        neighbours::Neighbours,
        site::Site,
    },
};

/// Records with more atoms are not searched. With [`TRIALS`] it bounds the work.
const ATOMS: usize = 4096;

/// Placements that are tried for one record.
const TRIALS: usize = 512;

/// Adds a hydrogen to each aromatic system that needs one and has one place for it. False where
/// some system is not helped by that; the sites are then of no use.
///
/// # Errors
/// A system with several such places: which of them is meant cannot be known.
///
/// # Complexity
/// At most [`TRIALS`] matchings of at most [`ATOMS`] atoms.
pub(super) fn place_hydrogens(
    drawing: &Drawing,
    neighbours: &Neighbours,
    sites: &mut [Site],
    notes: &mut Vec<Note>,
) -> Result<bool, Fault> {
    if drawing.atoms.len() > ATOMS {
        return Ok(false);
    }
    let systems = systems(drawing, neighbours);
    let count = systems.iter().flatten().max().map_or(0, |&last| last + 1);
    let mut trials = 0;
    for system in 0..count {
        let members = (0_u32..).zip(&systems);
        let members: Vec<u32> = members
            .filter(|&(_, &of)| of == Some(system))
            .map(|(atom, _)| atom)
            .collect();
        let candidates: Vec<u32> = members
            .iter()
            .copied()
            .filter(|&atom| takes_hydrogen(drawing, neighbours, sites, atom))
            .collect();
        trials += candidates.len() + 1;
        if trials > TRIALS {
            return Ok(false);
        }
        if fits(drawing, sites, &members, None) {
            continue;
        }
        let fitting: Vec<u32> = candidates
            .into_iter()
            .filter(|&atom| fits(drawing, sites, &members, Some(atom)))
            .collect();
        match *fitting {
            [] => return Ok(false),
            [atom] => {
                let site = &mut sites[atom as usize];
                site.hydrogens = 1;
                site.delocalised = false;
                notes.push(note(drawing, atom));
            }
            [first, ..] => {
                let span = drawing.atoms[first as usize].span;
                let atoms = fitting.into();
                return Err(Fault::new(
                    ReadErrorKind::HydrogensUndetermined { atoms },
                    span,
                ));
            }
        }
    }
    Ok(true)
}

/// The aromatic system of every atom, numbered from 0: what aromatic bonds connect.
fn systems(drawing: &Drawing, neighbours: &Neighbours) -> Vec<Option<u32>> {
    let mut systems = vec![None; drawing.atoms.len()];
    let mut count = 0;
    let mut stack = Vec::new();
    let is_aromatic = |bond: u32| drawing.bonds[bond as usize].kind == BondKind::Aromatic;
    for start in (0_u32..).take(drawing.atoms.len()) {
        let mut bonds = neighbours.of(start).iter();
        if systems[start as usize].is_some() || !bonds.any(|&(_, bond)| is_aromatic(bond)) {
            continue;
        }
        systems[start as usize] = Some(count);
        stack.push(start);
        while let Some(here) = stack.pop() {
            for &(there, bond) in neighbours.of(here) {
                if is_aromatic(bond) && systems[there as usize].is_none() {
                    systems[there as usize] = Some(count);
                    stack.push(there);
                }
            }
        }
        count += 1;
    }
    systems
}

/// Whether an atom is a neutral nitrogen with two aromatic bonds and nothing else.
fn takes_hydrogen(drawing: &Drawing, neighbours: &Neighbours, sites: &[Site], atom: u32) -> bool {
    let (found, site) = (&drawing.atoms[atom as usize], &sites[atom as usize]);
    let bonds = neighbours.of(atom);
    found.element == Element::NITROGEN
        && (found.charge, found.radical, found.valence) == (0, Radical::None, None)
        && (site.hydrogens, site.delocalised) == (0, true)
        && bonds.len() == 2
        && bonds
            .iter()
            .all(|&(_, bond)| drawing.bonds[bond as usize].kind == BondKind::Aromatic)
}

/// Whether double bonds can be placed in one system, perhaps with a hydrogen more at one atom.
fn fits(drawing: &Drawing, sites: &[Site], members: &[u32], extra: Option<u32>) -> bool {
    let mut builder = MoleculeBuilder::new();
    for atom in &drawing.atoms {
        builder.add_atom(Atom::new(atom.element));
    }
    for &atom in members {
        if sites[atom as usize].delocalised && extra != Some(atom) {
            builder.set_pi_demand(atom, PiDemand::Needed);
        }
    }
    // All bonds are there, since they decide what is in a ring.
    let added = drawing.bonds.iter().try_for_each(|bond| {
        let [a, b] = bond.ends;
        let inside = bond.kind == BondKind::Aromatic && members.binary_search(&a).is_ok();
        let added = if inside {
            builder.add_delocalised_bond(a, b)
        } else {
            builder.add_bond(a, b, BondOrder::Single)
        };
        added.map(|_| ())
    });
    added.is_ok() && builder.build().is_ok()
}

fn note(drawing: &Drawing, atom: u32) -> Note {
    Note {
        code: "hydrogen-placed",
        atoms: vec![atom],
        span: drawing.atoms.get(atom as usize).map(|atom| atom.span),
        text: format!(
            "the aromatic bonds need one more hydrogen; it is read at atom {}, the only place where it fits",
            atom.saturating_add(1)
        ),
    }
}
