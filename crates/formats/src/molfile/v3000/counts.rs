//! The `COUNTS` line.

use molkin_graph::Limits;

use crate::{
    ReadErrorKind, Span,
    molfile::{
        block::Fault,
        v3000::line::{Entry, misplaced},
    },
};

/// A number that is declared, of what, and where.
#[derive(Debug, Clone, Copy)]
pub(super) struct Count {
    what: &'static str,
    declared: u32,
    span: Span,
}

/// What the line declares.
#[derive(Debug, Clone, Copy)]
pub(super) struct Counts {
    pub(super) atoms: Count,
    pub(super) bonds: Count,
    pub(super) chiral: bool,
    span: Span,
}

/// Reads the line. Of the numbers of groups and objects only the form is looked at, since many
/// writers leave them at 0.
pub(super) fn read(entry: &Entry<'_>, limits: &Limits) -> Result<Counts, Fault> {
    let mut words = entry.words();
    if words.demand("M  V30 COUNTS")?.value().text() != b"COUNTS" {
        return Err(misplaced(entry, "M  V30 COUNTS"));
    }
    let mut number = |what: &'static str| {
        let field = words.demand(what)?.value();
        let declared = field.stated(what, 0, i32::MAX)?.unsigned_abs();
        Ok((declared, field))
    };
    let (atoms, field) = number("the number of atoms")?;
    if atoms as usize > limits.atoms {
        let limit = limits.atoms;
        return Err(field.fault(ReadErrorKind::TooManyAtoms { limit }));
    }
    let atoms = Count {
        what: "atoms",
        declared: atoms,
        span: field.span(),
    };
    let (declared, field) = number("the number of bonds")?;
    let bonds = Count {
        what: "bonds",
        declared,
        span: field.span(),
    };
    number("the number of groups")?;
    number("the number of objects")?;
    let (chiral, _) = number("the chiral flag")?;
    Ok(Counts {
        atoms,
        bonds,
        chiral: chiral == 1,
        span: entry.span(),
    })
}

impl Counts {
    /// Compares a declared number with that of the lines.
    pub(super) fn check(&self, count: Count, found: u32) -> Result<(), Fault> {
        let Count {
            what,
            declared,
            span,
        } = count;
        if declared == found {
            return Ok(());
        }
        let kind = ReadErrorKind::CountMismatch {
            what,
            declared,
            found,
        };
        Err(Fault::new(kind, span).with_related(self.span))
    }
}
