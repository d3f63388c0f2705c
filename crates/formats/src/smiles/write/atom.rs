//! One atom as text.

use std::fmt::Write;

use molkin_graph::{Element, FormAtom, Polyhedron};

use crate::smiles::{
    syntax::{StereoTag, TagClass},
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
/// all bonds that are, all as written.
pub(super) fn write(
    text: &mut String,
    atom: &FormAtom,
    counted: u8,
    order_sum: u32,
    tag: Option<StereoTag>,
) {
    let symbol = atom.element.symbol();
    let plain = atom.charge == 0 && atom.isotope.is_none() && tag.is_none();
    if plain && counted_when_bare(atom.element, order_sum) == Some(counted) {
        // Nearly all symbols are one letter, and copying text of any length takes longer than that.
        match *symbol.as_bytes() {
            [letter] => text.push(char::from(letter)),
            _ => text.push_str(symbol),
        }
        return;
    }
    text.push('[');
    if let Some(isotope) = atom.isotope {
        push_number(text, u32::from(isotope));
    }
    text.push_str(symbol);
    if let Some(tag) = tag {
        write_tag(text, tag);
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

fn write_tag(text: &mut String, StereoTag { class, number }: StereoTag) {
    text.push('@');
    let letters = match class {
        TagClass::Polyhedral(Polyhedron::SquarePlanar) => "SP",
        TagClass::Polyhedral(Polyhedron::TrigonalBipyramidal) => "TB",
        TagClass::Polyhedral(Polyhedron::Octahedral) => "OH",
        TagClass::Plain | TagClass::Tetrahedral | TagClass::Allene => {
            text.push_str(if number > 1 { "@" } else { "" });
            return;
        }
    };
    text.push_str(letters);
    push_number(text, u32::from(number));
}

/// Writes a number in decimal digits.
pub(super) fn push_number(text: &mut String, number: u32) {
    if let Some(digit) = char::from_digit(number, 10) {
        text.push(digit);
    } else {
        // Writing to a string does not fail.
        let _ = write!(text, "{number}");
    }
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
    organic.then(|| valence::hydrogens_beside(element, order_sum))
}
