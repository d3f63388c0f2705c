//! Substructure groups.

use crate::{
    Note,
    molfile::{
        block::Fault,
        group_type,
        v3000::{line::Body, section::Section},
    },
};

/// Reads the types of the groups. What else the lines say is how groups are shown.
pub(super) fn read(body: &mut Body<'_, '_>, notes: &mut Vec<Note>) -> Result<(), Fault> {
    while let Some(entry) = body.next_in(Section::Groups)? {
        let mut words = entry.words();
        let number = words.demand("the group number")?.value();
        // Values that later groups share.
        if number.text() == b"DEFAULT" {
            continue;
        }
        number.stated("the group number", 0, i32::MAX)?;
        notes.push(group_type::read(words.demand("the group type")?.value())?);
        for word in words {
            word?;
        }
    }
    Ok(())
}
