//! Atom lines.

use crate::{
    Note,
    molfile::{
        block::{Fault, Line},
        drawing::{DrawnAtom, Radical},
        field::Field,
        symbol,
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
    let (element, isotope) = symbol::element(symbol)?;
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
