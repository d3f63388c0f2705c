//! Bonds from a metal to several atoms at once, drawn to a placeholder in their midst.

use molkin_graph::Element;

use crate::{
    ReadErrorKind, Span,
    molfile::{
        block::Fault,
        drawing::{BondKind, BondMark, Drawing, DrawnBond, Radical},
    },
};

/// A coordination bond between a metal and the atoms of `targets`, all at once.
#[derive(Debug)]
pub(super) struct Haptic {
    pub(super) span: Span,
    /// The metal and the placeholder, in either order.
    pub(super) ends: [u32; 2],
    pub(super) targets: Vec<u32>,
}

impl Haptic {
    fn unsupported(&self, what: &'static str) -> Fault {
        Fault::new(ReadErrorKind::Unsupported { what }, self.span)
    }
}

/// Puts a coordination bond to each of the atoms in the place of every such bond and lists the
/// placeholders. They stay among the atoms until there is a molecule, so that all others have the
/// numbers of their lines in whatever is said about them; where they are drawn says nothing.
///
/// Memory and time follow the lists that were read.
pub(super) fn expand(drawing: &mut Drawing, bonds: &[Haptic]) -> Result<(), Fault> {
    if bonds.is_empty() {
        return Ok(());
    }
    for bond in bonds {
        let [first, second] = bond.ends;
        let (placeholder, metal) = match bond.ends.map(|end| is_placeholder(drawing, end)) {
            [true, false] => (first, second),
            [false, true] => (second, first),
            _ => return Err(bond.unsupported("a bond to several atoms without one placeholder")),
        };
        drawing.placeholders.push(placeholder);
        for &target in &bond.targets {
            drawing.bonds.push(DrawnBond {
                span: bond.span,
                ends: [target, metal],
                kind: BondKind::Coordination,
                mark: BondMark::Plain,
            });
        }
    }
    drawing.placeholders.sort_unstable();
    drawing.placeholders.dedup();
    let dangling = |bond: &&DrawnBond| {
        let mut ends = bond.ends.iter();
        ends.any(|end| drawing.placeholders.binary_search(end).is_ok())
    };
    if let Some(bond) = drawing.bonds.iter().find(dangling) {
        let what = "a further bond to the placeholder of a bond to several atoms";
        return Err(Fault::new(ReadErrorKind::Unsupported { what }, bond.span));
    }
    for &placeholder in &drawing.placeholders {
        drawing.atoms[placeholder as usize].position = [0.0; 3];
    }
    Ok(())
}

/// An atom of no element, charge or anything else that would be lost.
fn is_placeholder(drawing: &Drawing, atom: u32) -> bool {
    drawing.atoms.get(atom as usize).is_some_and(|atom| {
        atom.element == Element::WILDCARD
            && (atom.charge, atom.radical) == (0, Radical::None)
            && atom.isotope.is_none()
    })
}
