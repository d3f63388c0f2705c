//! Atom lines.

use crate::{
    Note, ReadErrorKind,
    molfile::{
        block::Fault,
        drawing::{DrawnAtom, Radical},
        field::Field,
        symbol,
        v3000::word::{Word, Words},
    },
};

/// Reads an atom line behind its number, and whether it has a key that the format does not.
pub(super) fn read(
    mut words: Words<'_>,
    index: u32,
    notes: &mut Vec<Note>,
) -> Result<(DrawnAtom, bool), Fault> {
    let symbol = words.demand("the atom symbol")?.value();
    let mut position = [0.0; 3];
    for coordinate in &mut position {
        *coordinate = words.demand("the coordinate")?.value().coordinate()?;
    }
    let map = words.demand("the atom-atom mapping number")?.value();
    map.stated("the atom-atom mapping number", 0, i32::MAX)?;
    let mut details = Details::default();
    for word in words {
        details.read(&word?)?;
    }
    if is_list(symbol.text()) {
        let what = "an atom list";
        return Err(symbol.fault(ReadErrorKind::Query { what }));
    }
    let (element, isotope) = symbol::element(symbol)?;
    let mass = details.mass;
    if let Some((mass, field)) = mass {
        notes.extend(symbol::unusual_mass(element, mass, index, field.span()));
    }
    if let Some(field) = details.query {
        notes.push(Note {
            code: "query-field-ignored",
            atoms: vec![index],
            span: Some(field.span()),
            text: format!(
                "atom {} has a hydrogen count for searching, which is not read",
                index.saturating_add(1)
            ),
        });
    }
    let atom = DrawnAtom {
        span: symbol.span(),
        position,
        element,
        isotope: match mass {
            Some((mass, _)) => u16::try_from(mass).ok().filter(|&mass| mass > 0),
            None => isotope,
        },
        charge: details.charge,
        radical: details.radical,
        valence: details.valence,
    };
    Ok((atom, details.unknown))
}

/// `[C,N]` or `NOT[C,N]`, also in quotation marks.
fn is_list(symbol: &[u8]) -> bool {
    let symbol = symbol.strip_prefix(b"\"").unwrap_or(symbol);
    symbol.starts_with(b"[") || symbol.starts_with(b"NOT")
}

/// What the keys say.
#[derive(Debug, Default)]
struct Details<'e> {
    charge: i8,
    radical: Radical,
    mass: Option<(i32, Field<'e>)>,
    valence: Option<u8>,
    query: Option<Field<'e>>,
    unknown: bool,
}

impl<'e> Details<'e> {
    fn read(&mut self, word: &Word<'e>) -> Result<(), Fault> {
        let value = word.value();
        match word.key() {
            b"CHG" => {
                let charge = value.stated("the charge", -15, 15)?;
                self.charge = i8::try_from(charge).unwrap_or(0);
            }
            b"RAD" => {
                let code = value.stated("the radical", 0, 3)?;
                self.radical = Radical::from_code(code).unwrap_or_default();
            }
            b"MASS" => self.mass = Some((value.stated("the mass number", 0, 999)?, value)),
            b"VAL" => {
                self.valence = match value.stated("the valence", -1, 14)? {
                    0 => None,
                    stated => Some(u8::try_from(stated).unwrap_or(0)),
                };
            }
            b"HCOUNT" if value.text() != b"0" => self.query = Some(value),
            // The parity follows from the drawing, and the others concern reactions and searches.
            b"CFG" | b"HCOUNT" | b"STBOX" | b"INVRET" | b"EXACHG" => {}
            key => match refused(key) {
                Some(_) if value.text() == b"0" => {}
                Some(kind) => return Err(value.fault(kind)),
                None => self.unknown = true,
            },
        }
        Ok(())
    }
}

/// Keys with which an atom stands for no one atom, unless their value is 0.
fn refused(key: &[u8]) -> Option<ReadErrorKind> {
    let what = match key {
        b"SUBST" => "a substitution count for searching",
        b"UNSAT" => "an unsaturation condition for searching",
        b"RBCNT" => "a ring bond count for searching",
        b"ATTCHPT" => "an attachment point",
        b"RGROUPS" => "an R group",
        b"ATTCHORD" => "an attachment order",
        b"CLASS" | b"SEQID" => {
            let what = "an atom that stands for a template";
            return Some(ReadErrorKind::Unsupported { what });
        }
        _ => return None,
    };
    Some(ReadErrorKind::Query { what })
}
