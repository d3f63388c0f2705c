//! Property lines that change nothing about the structure, and those that make it none.

use crate::{
    Note,
    molfile::{
        block::{Fault, Line},
        group_type,
        v2000::entries,
    },
};

/// What a property line that holds a query or an R group is called.
pub(super) fn query(key: &[u8]) -> Option<&'static str> {
    Some(match key {
        b"ALS" => "an atom list",
        b"SUB" => "a substitution count for searching",
        b"UNS" => "an unsaturation condition for searching",
        b"RBC" => "a ring bond count for searching",
        b"LIN" => "a link atom",
        b"APO" => "an attachment point",
        b"AAL" => "an attachment order",
        b"RGP" | b"LOG" => "an R group",
        _ => return None,
    })
}

/// Lines beyond the format that change bonds, charges or hydrogens (zero-order bonds: A. M. Clark,
/// J. Chem. Inf. Model. 2011, 51, 3149). Read without them, the structure would be another one.
pub(super) fn extension(key: &[u8]) -> Option<&'static str> {
    Some(match key {
        b"ZBO" => "an extension with bonds of order zero",
        b"ZCH" | b"HYD" => "an extension that goes with bonds of order zero",
        _ => return None,
    })
}

/// The lines with details of substructure groups, whose types the `STY` lines give.
pub(super) fn is_group_detail(key: &[u8]) -> bool {
    const DETAILS: [&[u8]; 20] = [
        b"SST", b"SLB", b"SCN", b"SDS", b"SAL", b"SBL", b"SPA", b"SMT", b"SDI", b"SBV", b"SDT",
        b"SDD", b"SCD", b"SED", b"SPL", b"SNC", b"SCL", b"SAP", b"SBT", b"CRS",
    ];
    DETAILS.contains(&key)
}

/// Reads the types of substructure groups.
pub(super) fn group_types(line: Line<'_>, notes: &mut Vec<Note>) -> Result<(), Fault> {
    for (_, kind) in entries::pairs(line)? {
        notes.push(group_type::read(kind)?);
    }
    Ok(())
}
