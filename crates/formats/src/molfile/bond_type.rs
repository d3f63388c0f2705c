//! What both versions say alike about bonds.

use crate::{
    Note, ReadErrorKind, Span,
    molfile::{block::Fault, drawing::BondKind, field::Field},
};

/// The kind of bond that a type stands for. Types for searching are refused by name.
pub(super) fn read(field: Field<'_>) -> Result<BondKind, Fault> {
    let what = match field.stated("the bond type", -99, 999)? {
        1 => return Ok(BondKind::Single),
        2 => return Ok(BondKind::Double),
        3 => return Ok(BondKind::Triple),
        4 => return Ok(BondKind::Aromatic),
        5 => "a single-or-double bond",
        6 => "a single-or-aromatic bond",
        7 => "a double-or-aromatic bond",
        8 => "an any-order bond",
        9 => return Ok(BondKind::Coordination),
        10 => return Ok(BondKind::Hydrogen),
        _ => {
            let kind = ReadErrorKind::NumberOutOfRange {
                what: "the bond type",
                least: 1,
                most: 10,
            };
            return Err(field.fault(kind));
        }
    };
    Err(field.fault(ReadErrorKind::Query { what }))
}

/// A note on something about a bond that is not read.
pub(super) fn note(code: &'static str, ends: [u32; 2], span: Span, what: &str) -> Note {
    let [a, b] = ends.map(|end| end.saturating_add(1));
    Note {
        code,
        atoms: ends.to_vec(),
        span: Some(span),
        text: format!("the bond {a}-{b} has {what}; it is not read"),
    }
}
