//! One atom as text.

use std::fmt::Write;

use molkin_graph::{Element, FormAtom};

use crate::smiles::{
    syntax::{AtomSyntax, AtomToken},
    valence,
};

/// The most hydrogens that brackets can count.
const MOST_COUNTED: u8 = 9;

/// How many hydrogens of an atom are written as atoms for lack of another way: those of hydrogen
/// itself (`[HH]` is not in the standard), and those beyond one digit.
pub(super) fn shown_hydrogens(atom: &FormAtom) -> u8 {
    if atom.element == Element::HYDROGEN {
        atom.hydrogens
    } else {
        atom.hydrogens.saturating_sub(MOST_COUNTED)
    }
}

/// Writes an atom: the bare symbol where that gives exactly its hydrogens, and brackets otherwise.
///
/// `counted` are the hydrogens that are not atoms of their own in the text, `order_sum` the orders of
/// all bonds that are, and `clockwise` is the stereo tag.
pub(super) fn write(
    text: &mut String,
    atom: &FormAtom,
    counted: u8,
    order_sum: u32,
    clockwise: Option<bool>,
) {
    let symbol = atom.element.symbol();
    let plain = atom.charge == 0 && atom.isotope.is_none() && clockwise.is_none();
    if plain && counted_when_bare(atom.element, order_sum) == Some(counted) {
        text.push_str(symbol);
        return;
    }
    text.push('[');
    if let Some(isotope) = atom.isotope {
        push_number(text, u32::from(isotope));
    }
    text.push_str(symbol);
    match clockwise {
        Some(true) => text.push_str("@@"),
        Some(false) => text.push('@'),
        None => {}
    }
    if counted > 0 {
        text.push('H');
    }
    if counted > 1 {
        push_number(text, u32::from(counted));
    }
    if atom.charge != 0 {
        text.push(if atom.charge > 0 { '+' } else { '-' });
    }
    if atom.charge.unsigned_abs() > 1 {
        push_number(text, u32::from(atom.charge.unsigned_abs()));
    }
    text.push(']');
}

/// Writes a number in decimal digits.
pub(super) fn push_number(text: &mut String, number: u32) {
    // Writing to a string does not fail.
    let _ = write!(text, "{number}");
}

/// The hydrogens that a reader gives to the bare symbol; `None` where the element always needs
/// brackets. The rule is the reader's own, so that the two cannot drift apart.
fn counted_when_bare(element: Element, order_sum: u32) -> Option<u8> {
    let organic = matches!(
        element,
        Element::WILDCARD
            | Element::BORON
            | Element::CARBON
            | Element::NITROGEN
            | Element::OXYGEN
            | Element::PHOSPHORUS
            | Element::SULFUR
            | Element::FLUORINE
            | Element::CHLORINE
            | Element::BROMINE
            | Element::IODINE
    );
    organic.then(|| {
        let mut syntax = AtomSyntax::new(AtomToken::bare(element, false), false, (0, 0));
        syntax.order_sum = order_sum;
        valence::implicit_hydrogens(&syntax)
    })
}
