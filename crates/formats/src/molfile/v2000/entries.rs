//! Property lines that list atoms and values: `M  XXXnn8 aaa vvv …`.

use crate::{
    ReadErrorKind, Span,
    molfile::{
        block::{Fault, Line},
        field::Field,
    },
};

/// One entry: the index of the atom and the field of its value.
pub(super) struct Entry<'a> {
    pub(super) atom: u32,
    pub(super) value: Field<'a>,
}

/// The fields of the entries that a line says it has: a number and what belongs to it.
pub(super) fn pairs<'a>(
    line: Line<'a>,
) -> Result<impl Iterator<Item = (Field<'a>, Field<'a>)>, Fault> {
    let count = line.field(7, 3).stated("the number of entries", 0, 999)?;
    // What is claimed beyond the end of the line comes out as one blank entry, which is an error.
    let held = line
        .text
        .len()
        .saturating_sub(9)
        .div_ceil(8)
        .saturating_add(1);
    let count = usize::try_from(count).unwrap_or(0).min(held);
    Ok((0..count).map(move |entry| (line.field(10 + 8 * entry, 4), line.field(14 + 8 * entry, 4))))
}

/// The entries of a line whose numbers are atoms.
pub(super) fn read<'a>(
    line: Line<'a>,
    (declared, counts): (u32, Span),
) -> Result<impl Iterator<Item = Result<Entry<'a>, Fault>>, Fault> {
    Ok(pairs(line)?.map(move |(number, value)| {
        let named = number.stated("the atom number", 0, 9999)?.unsigned_abs();
        if !(1..=declared).contains(&named) {
            let kind = ReadErrorKind::NoSuchAtom { named, declared };
            return Err(number.fault(kind).with_related(counts));
        }
        Ok(Entry {
            atom: named - 1,
            value,
        })
    }))
}
