//! Atom lines.

use molkin_graph::Element;

use crate::{
    Note, ReadErrorKind,
    molfile::{
        block::{Fault, Line},
        drawing::{DrawnAtom, Radical},
        field::{Field, decode},
    },
};

/// What the atom line says and property lines may overrule.
#[derive(Debug, Clone, Copy, Default)]
pub(super) struct State {
    /// The difference from the rounded standard weight; 0 for none.
    pub(super) mass_difference: i32,
    pub(super) charge: i8,
    pub(super) radical: Radical,
}

/// Reads one atom line. The charge, radical and mass difference are returned apart, since any
/// charge, radical or isotope line makes them void for all atoms.
pub(super) fn read(
    line: Line<'_>,
    index: usize,
    notes: &mut Vec<Note>,
) -> Result<(DrawnAtom, State), Fault> {
    let position = [
        line.field(1, 10).coordinate()?,
        line.field(11, 10).coordinate()?,
        line.field(21, 10).coordinate()?,
    ];
    let symbol = line.field(32, 3);
    let (element, isotope) = element(symbol)?;
    let state = State {
        mass_difference: mass_difference(line, index, notes)?,
        ..charge(line.field(37, 3))?
    };
    if line.field(43, 3).number("the hydrogen query", 0, 99)? > 0 {
        notes.push(query_note(index, symbol, "a hydrogen count for searching"));
    }
    let valence = match line.field(49, 3).number("the valence", 0, 15)? {
        0 => None,
        15 => Some(0),
        stated => u8::try_from(stated).ok(),
    };
    let atom = DrawnAtom {
        span: symbol.span(),
        position,
        element,
        isotope,
        charge: 0,
        radical: Radical::None,
        valence,
    };
    Ok((atom, state))
}

/// The element of a symbol, whatever its case, and the isotope that `D` and `T` mean.
fn element(field: Field<'_>) -> Result<(Element, Option<u16>), Fault> {
    let text = field.text();
    match text {
        b"" => {
            return Err(field.fault(ReadErrorKind::MissingField {
                what: "the atom symbol",
            }));
        }
        b"D" => return Ok((Element::HYDROGEN, Some(2))),
        b"T" => return Ok((Element::HYDROGEN, Some(3))),
        b"*" => return Ok((Element::WILDCARD, None)),
        _ => {}
    }
    if let Some(what) = refused(text) {
        return Err(field.fault(ReadErrorKind::Query { what }));
    }
    let mut symbol = decode(text).to_ascii_lowercase();
    if let Some(first) = symbol.get_mut(..1) {
        first.make_ascii_uppercase();
    }
    Element::from_symbol(&symbol)
        .map(|element| (element, None))
        .ok_or_else(|| {
            field.fault(ReadErrorKind::UnknownElement {
                symbol: decode(text).into(),
            })
        })
}

/// Symbols that the format has and that stand for no one atom.
fn refused(symbol: &[u8]) -> Option<&'static str> {
    Some(match symbol {
        b"A" => "any atom (A)",
        b"Q" => "any atom but carbon (Q)",
        b"X" => "any halogen (X)",
        b"M" => "any metal (M)",
        b"AH" | b"QH" | b"XH" | b"MH" => "a generic atom",
        b"L" => "an atom list",
        b"LP" | b"Lp" => "a lone pair drawn as an atom",
        b"Pol" | b"POL" => "a polymer bead",
        [b'R', rest @ ..]
            if rest
                .iter()
                .all(|byte| byte.is_ascii_digit() || *byte == b'#') =>
        {
            "an R group"
        }
        _ => return None,
    })
}

/// The mass difference; the format ignores one outside −3..+4, and so do we, with a note.
fn mass_difference(line: Line<'_>, index: usize, notes: &mut Vec<Note>) -> Result<i32, Fault> {
    let field = line.field(35, 2);
    let difference = field.number("the mass difference", -9, 99)?;
    if (-3..=4).contains(&difference) {
        return Ok(difference);
    }
    notes.push(Note {
        code: "mass-difference-ignored",
        atoms: atoms(index),
        span: Some(field.span()),
        text: format!(
            "the mass difference {difference} of atom {} is outside -3 to 4 and not read",
            index.saturating_add(1)
        ),
    });
    Ok(0)
}

/// The charge field: the charge is 4 less the code, except that 4 is a radical.
fn charge(field: Field<'_>) -> Result<State, Fault> {
    let code = field.number("the charge code", 0, 7)?;
    let (charge, radical) = match code {
        0 => (0, Radical::None),
        4 => (0, Radical::Doublet),
        _ => (i8::try_from(4 - code).unwrap_or(0), Radical::None),
    };
    Ok(State {
        mass_difference: 0,
        charge,
        radical,
    })
}

fn query_note(index: usize, field: Field<'_>, what: &str) -> Note {
    Note {
        code: "query-field-ignored",
        atoms: atoms(index),
        span: Some(field.span()),
        text: format!(
            "atom {} has {what}, which is not read",
            index.saturating_add(1)
        ),
    }
}

fn atoms(index: usize) -> Vec<u32> {
    u32::try_from(index).into_iter().collect()
}

#[cfg(test)]
mod tests {
    use rstest::rstest;

    use super::*;
    use crate::Span;

    #[rstest]
    #[case("C", 6, None)]
    #[case("CL", 17, None)]
    #[case("br", 35, None)]
    #[case("D", 1, Some(2))]
    #[case("T", 1, Some(3))]
    #[case("*", 0, None)]
    #[case("Ra", 88, None)]
    fn symbols(#[case] text: &str, #[case] number: u8, #[case] isotope: Option<u16>) {
        let (element, mass) = element(Field::new(text.as_bytes(), Span::new(1, 1, 3))).unwrap();
        assert_eq!((element.number(), mass), (number, isotope));
    }

    #[rstest]
    #[case("", "missing-field")]
    #[case("A", "query")]
    #[case("QH", "query")]
    #[case("R#", "query")]
    #[case("R", "query")]
    #[case("R12", "query")]
    #[case("L", "query")]
    #[case("Pol", "query")]
    #[case("Xx", "unknown-element")]
    #[case("\u{e9}", "unknown-element")]
    fn symbols_that_are_no_atom(#[case] text: &str, #[case] code: &str) {
        let field = Field::new(text.as_bytes(), Span::new(1, 1, 3));
        let fault = element(field).unwrap_err();
        let block = crate::molfile::block::Block::new(b"", 1);
        assert_eq!(block.error(fault).code(), code);
    }
}
