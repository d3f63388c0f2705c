//! Types of substructure groups, which both versions name alike.

use crate::{
    Note, ReadErrorKind,
    molfile::{block::Fault, field::Field},
};

/// Reads the type of a group. A display group is read through with a note: its atoms are all there.
/// A polymer has no one structure.
pub(super) fn read(kind: Field<'_>) -> Result<Note, Fault> {
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
    Ok(Note {
        code: "group-ignored",
        atoms: Vec::new(),
        span: Some(kind.span()),
        text: format!("{what} is marked; the atoms are read as drawn"),
    })
}
