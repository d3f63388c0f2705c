//! Bond lines.

use crate::{
    Note, ReadErrorKind, Span,
    molfile::{
        block::{Fault, Line},
        bond_type,
        drawing::{BondKind, BondMark, DrawnBond},
    },
};

/// Reads one bond line. `declared` is the number of atoms and where the counts line says so.
pub(super) fn read(
    line: Line<'_>,
    declared: (u32, Span),
    notes: &mut Vec<Note>,
) -> Result<DrawnBond, Fault> {
    let ends = [end(line, 1, declared)?, end(line, 4, declared)?];
    if ends[0] == ends[1] {
        return Err(Fault::new(
            ReadErrorKind::SelfBond { atom: ends[0] },
            line.field(4, 3).span(),
        ));
    }
    let kind = bond_type::read(line.field(7, 3))?;
    let stereo = line.field(10, 3);
    let code = stereo.number("the bond stereo code", 0, 99)?;
    let mark = match (kind, code) {
        (_, 0) => BondMark::Plain,
        (BondKind::Single | BondKind::Aromatic, 1) => BondMark::Up,
        (BondKind::Single | BondKind::Aromatic, 6) => BondMark::Down,
        (BondKind::Single | BondKind::Aromatic, 4) | (BondKind::Double, 3) => BondMark::Either,
        _ => {
            notes.push(bond_type::note(
                "stereo-bond-ignored",
                ends,
                stereo.span(),
                "a bond stereo code that its type cannot have",
            ));
            BondMark::Plain
        }
    };
    let topology = line.field(16, 3);
    if topology.number("the bond topology", 0, 99)? > 0 {
        notes.push(bond_type::note(
            "query-field-ignored",
            ends,
            topology.span(),
            "a ring or chain condition for searching",
        ));
    }
    Ok(DrawnBond {
        span: line.span(),
        ends,
        kind,
        mark,
    })
}

/// The index of an atom that a bond line names.
fn end(line: Line<'_>, column: usize, (declared, counts): (u32, Span)) -> Result<u32, Fault> {
    let field = line.field(column, 3);
    let named = field.stated("the atom number", 0, 999)?.unsigned_abs();
    if (1..=declared).contains(&named) {
        return Ok(named - 1);
    }
    Err(field
        .fault(ReadErrorKind::NoSuchAtom { named, declared })
        .with_related(counts))
}
