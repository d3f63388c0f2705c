//! The symbol of a bracket atom.

use molkin_graph::Element;

use super::{Refusal, Token};
use crate::ReadErrorKind;

/// Reads a symbol and says whether it is an aromatic one.
///
/// Whatever follows a symbol in a bracket is no lower-case letter, so two letters are taken where
/// two stand.
pub(super) fn symbol(input: &[u8]) -> Token<'_, (Element, bool)> {
    if let Some(rest) = input.strip_prefix(b"*") {
        return Ok((rest, (Element::WILDCARD, false)));
    }
    let letters = input
        .iter()
        .enumerate()
        .take_while(|&(at, byte)| byte.is_ascii_lowercase() || at == 0 && byte.is_ascii_uppercase())
        .count();
    if letters == 0 {
        return Err(Refusal::unexpected(
            input,
            "the symbol of an element or `*`",
        ));
    }
    let (symbol, rest) = input.split_at(letters);
    let aromatic = symbol.iter().all(u8::is_ascii_lowercase);
    let element = if aromatic {
        aromatic_element(symbol)
    } else {
        any_element(symbol)
    };
    element
        .map(|element| (rest, (element, aromatic)))
        .ok_or_else(|| {
            let symbol = String::from_utf8_lossy(&symbol[..letters.min(8)]).into();
            let kind = if aromatic {
                ReadErrorKind::NotAromatic { symbol }
            } else {
                ReadErrorKind::UnknownElement { symbol }
            };
            Refusal::failure(input, letters, kind)
        })
}

fn any_element(symbol: &[u8]) -> Option<Element> {
    std::str::from_utf8(symbol)
        .ok()
        .and_then(Element::from_symbol)
}

/// The aromatic symbols of OpenSMILES, and two more that are seen and cannot be mistaken.
fn aromatic_element(symbol: &[u8]) -> Option<Element> {
    Some(match symbol {
        b"b" => Element::BORON,
        b"c" => Element::CARBON,
        b"n" => Element::NITROGEN,
        b"o" => Element::OXYGEN,
        b"p" => Element::PHOSPHORUS,
        b"s" => Element::SULFUR,
        b"se" => Element::SELENIUM,
        b"as" => Element::ARSENIC,
        b"te" => Element::TELLURIUM,
        b"si" => Element::SILICON,
        _ => return None,
    })
}
