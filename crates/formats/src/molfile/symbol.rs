//! Atom symbols and mass numbers.

use molkin_graph::Element;

use crate::{
    Note, ReadErrorKind, Span,
    molfile::{
        block::Fault,
        field::{Field, decode},
    },
};

/// The element of a symbol, whatever its case, and the isotope that `D` and `T` mean.
pub(super) fn element(field: Field<'_>) -> Result<(Element, Option<u16>), Fault> {
    let text = field.text();
    if let Some(element) = std::str::from_utf8(text)
        .ok()
        .and_then(Element::from_symbol)
    {
        return Ok((element, None));
    }
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

/// The standard weight in whole units, from which mass differences count; that of the longest-lived
/// nuclide where an element has none.
pub(super) fn natural_mass(element: Element) -> Option<i32> {
    let weight = element
        .standard_weight()
        .map(|weight| weight.round() as i32);
    weight.or_else(|| element.mass_number_of_longest_lived().map(i32::from))
}

/// A note on a mass number beyond what the format allows: −18 to +12 of the natural mass.
pub(super) fn unusual_mass(element: Element, mass: i32, atom: u32, span: Span) -> Option<Note> {
    let natural = natural_mass(element)?;
    let unusual = mass > 0 && !(natural - 18..=natural + 12).contains(&mass);
    unusual.then(|| Note {
        code: "isotope-unusual",
        atoms: vec![atom],
        span: Some(span),
        text: format!(
            "the mass number {mass} of atom {} is far from the natural one",
            atom.saturating_add(1)
        ),
    })
}

#[cfg(test)]
mod tests {
    use rstest::rstest;

    use super::*;

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
