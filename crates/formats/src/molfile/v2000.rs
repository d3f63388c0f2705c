//! Version 2000: atom lines, bond lines and property lines in fixed columns.

mod atom;
mod bond;
mod entries;
mod ignored;
mod property;

use crate::{
    ReadErrorKind, Span,
    molfile::{
        block::{Fault, Line, Lines},
        drawing::Drawing,
        header::Version,
    },
};
use molkin_graph::Limits;

/// Reads what follows a counts line, through `M  END`.
///
/// Memory grows with the lines that are there, not with what the counts line claims.
pub(super) fn read(
    lines: &mut Lines<'_>,
    counts: Line<'_>,
    version: Version,
    limits: &Limits,
) -> Result<Drawing, Fault> {
    let (atoms, bonds, lists) = (counts.field(1, 3), counts.field(4, 3), counts.field(7, 3));
    let atom_count = atoms.stated("the number of atoms", 0, 999)?;
    let bond_count = bonds.stated("the number of bonds", 0, 999)?;
    if lists.number("the number of atom lists", 0, 999)? > 0 {
        return Err(lists.fault(ReadErrorKind::Query {
            what: "an atom list",
        }));
    }
    if usize::try_from(atom_count).is_ok_and(|count| count > limits.atoms) {
        return Err(atoms.fault(ReadErrorKind::TooManyAtoms {
            limit: limits.atoms,
        }));
    }
    let mut drawing = Drawing {
        chiral: counts.field(13, 3).number("the chiral flag", -999, 999)? == 1,
        ..Drawing::default()
    };
    // Room for what is claimed, if there is as much text. An atom line has 34 bytes or more.
    let room = usize::try_from(atom_count)
        .unwrap_or(0)
        .min(lines.at_most(34));
    drawing.atoms.reserve_exact(room);
    let mut states = Vec::with_capacity(room);
    for _ in 0..atom_count {
        let line = counted(lines, "an atom line", atoms.span())?;
        let (atom, state) = atom::read(line, states.len(), &mut drawing.notes)?;
        drawing.atoms.push(atom);
        states.push(state);
    }
    let declared = (u32::try_from(atom_count).unwrap_or(0), atoms.span());
    let room = usize::try_from(bond_count)
        .unwrap_or(0)
        .min(lines.at_most(9));
    drawing.bonds.reserve_exact(room);
    for _ in 0..bond_count {
        let line = counted(lines, "a bond line", bonds.span())?;
        let bond = bond::read(line, declared, &mut drawing.notes)?;
        drawing.bonds.push(bond);
    }
    property::read(lines, version, declared, states, &mut drawing)?;
    Ok(drawing)
}

/// The next of the lines that the counts line announces at `counts`. `M  END` is none of them.
fn counted<'a>(
    lines: &mut Lines<'a>,
    expected: &'static str,
    counts: Span,
) -> Result<Line<'a>, Fault> {
    let line = lines.demand(expected)?;
    if line.is_end() {
        let fault = Fault::new(ReadErrorKind::UnexpectedEnd { expected }, line.span());
        return Err(fault.with_related(counts));
    }
    Ok(line)
}
