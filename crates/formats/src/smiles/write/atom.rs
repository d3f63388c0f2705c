//! One atom as text.

use std::io::Write;

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
    text: &mut Vec<u8>,
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
            [letter] => text.push(letter),
            _ => text.extend_from_slice(symbol.as_bytes()),
        }
        return;
    }
    text.push(b'[');
    if let Some(isotope) = atom.isotope {
        push_number(text, u32::from(isotope));
    }
    text.extend_from_slice(symbol.as_bytes());
    if let Some(tag) = tag {
        write_tag(text, tag);
    }
    if counted > 0 {
        text.push(b'H');
    }
    if counted > 1 {
        push_number(text, u32::from(counted));
    }
    if atom.charge != 0 {
        text.push(if atom.charge > 0 { b'+' } else { b'-' });
    }
    if atom.charge.unsigned_abs() > 1 {
        push_number(text, u32::from(atom.charge.unsigned_abs()));
    }
    text.push(b']');
}

fn write_tag(text: &mut Vec<u8>, StereoTag { class, number }: StereoTag) {
    text.push(b'@');
    let letters = match class {
        TagClass::Polyhedral(Polyhedron::SquarePlanar) => "SP",
        TagClass::Polyhedral(Polyhedron::TrigonalBipyramidal) => "TB",
        TagClass::Polyhedral(Polyhedron::Octahedral) => "OH",
        TagClass::Plain | TagClass::Tetrahedral | TagClass::Allene => {
            if number > 1 {
                text.push(b'@');
            }
            return;
        }
    };
    text.extend_from_slice(letters.as_bytes());
    push_number(text, u32::from(number));
}

/// Writes a number in decimal digits.
pub(super) fn push_number(text: &mut Vec<u8>, number: u32) {
    if number < 10 {
        text.push(b'0' + number as u8);
    } else {
        // Writing to a vector does not fail.
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
