//! Property lines that change nothing about the structure, and those that make it none.

use crate::{
    Note, ReadErrorKind,
    molfile::{
        block::{Fault, Line},
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

/// The lines with details of substructure groups, whose types the `STY` lines give.
pub(super) fn is_group_detail(key: &[u8]) -> bool {
    const DETAILS: [&[u8]; 20] = [
        b"SST", b"SLB", b"SCN", b"SDS", b"SAL", b"SBL", b"SPA", b"SMT", b"SDI", b"SBV", b"SDT",
        b"SDD", b"SCD", b"SED", b"SPL", b"SNC", b"SCL", b"SAP", b"SBT", b"CRS",
    ];
    DETAILS.contains(&key)
}

/// Reads the types of substructure groups. A display group is read through with a note: its atoms
/// are all there. A polymer has no one structure.
pub(super) fn group_types(line: Line<'_>, notes: &mut Vec<Note>) -> Result<(), Fault> {
    for (_, kind) in entries::pairs(line)? {
        let what = match kind.text().to_ascii_uppercase().as_slice() {
            b"SUP" => "an abbreviation",
            b"MUL" => "a multiplied group",
            b"DAT" => "attached data",
            b"GEN" => "a generic bracket",
            b"COM" | b"MIX" | b"FOR" => "a mixture",
            b"SRU" | b"MON" | b"MER" | b"COP" | b"CRO" | b"MOD" | b"GRA" | b"ANY" => {
                return Err(kind.fault(ReadErrorKind::Unsupported { what: "a polymer" }));
            }
            _ => {
                return Err(kind.fault(ReadErrorKind::Malformed {
                    expected: "a group type",
                }));
            }
        };
        notes.push(Note {
            code: "group-ignored",
            atoms: Vec::new(),
            span: Some(kind.span()),
            text: format!("{what} is marked; the atoms are read as drawn"),
        });
    }
    Ok(())
}
