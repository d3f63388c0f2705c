//! Rows of cumulated double bonds.

use crate::smiles::syntax::Syntax;

/// An atom, and the double bond of a row by which it is reached.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(super) struct Stop {
    pub(super) atom: u32,
    pub(super) bond: u32,
}

/// A row of double bonds between two atoms that are not inside it.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(super) struct Row {
    /// The ends, the one with the smaller index first, each with the bond that leads inward.
    pub(super) ends: [Stop; 2],
    /// How many bonds the row has.
    pub(super) length: u32,
    /// The atom in the middle, or for an odd length the one before it.
    pub(super) middle: u32,
}

/// The row of which `bond` is the first one as seen from its end with the smaller index; `None` for
/// any other bond, so that each row is found from one bond. Linear in the length of the row.
pub(super) fn row(syntax: &Syntax, bond: u32) -> Option<Row> {
    if !syntax.is_double(bond) {
        return None;
    }
    let [a, b] = syntax.bonds[bond as usize].ends;
    let start = match (syntax.is_cumulated(a), syntax.is_cumulated(b)) {
        (true, true) => return None,
        (true, false) => b,
        (false, true) => a,
        (false, false) => a.min(b),
    };
    let mut length = 1;
    let mut end = step(syntax, start, bond);
    let mut middle = Stop { atom: start, bond };
    // The start is outside the row and every atom inside has two bonds, so no atom is met twice.
    while let Some(next) = onward(syntax, end) {
        end = next;
        length += 1;
        if length % 2 == 0 {
            middle = step(syntax, middle.atom, middle.bond);
            middle.bond = onward(syntax, middle)?.bond;
        }
    }
    let ends = [Stop { atom: start, bond }, end];
    (start < end.atom).then_some(Row {
        ends,
        length,
        middle: middle.atom,
    })
}

/// Across a bond.
fn step(syntax: &Syntax, from: u32, bond: u32) -> Stop {
    let [a, b] = syntax.bonds[bond as usize].ends;
    Stop {
        atom: if a == from { b } else { a },
        bond,
    }
}

/// The next stop of a row, if the atom lies inside it.
fn onward(syntax: &Syntax, stop: Stop) -> Option<Stop> {
    if !syntax.is_cumulated(stop.atom) {
        return None;
    }
    let (_, next) = syntax
        .neighbours(stop.atom)
        .find(|&(_, next)| next != stop.bond)?;
    Some(step(syntax, stop.atom, next))
}
