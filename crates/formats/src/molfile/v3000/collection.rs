//! Collections: named sets of atoms and bonds, of which stereo groups say something.

use std::collections::BTreeMap;

use molkin_graph::{GroupKind, StereoGroup};

use crate::{
    ReadErrorKind, Span,
    molfile::{
        block::Fault,
        drawing::Drawing,
        field::Field,
        v3000::{line::Entry, numbers::Numbers},
    },
};

/// What a stereo collection says of its centres: nothing beyond the drawing (`None`), or that they
/// belong to the group of a kind and number.
type Meaning = Option<(GroupKind, u32)>;

/// The stereo collections read so far.
#[derive(Debug, Default)]
pub(super) struct Collections {
    members: BTreeMap<Meaning, Vec<(u32, Span)>>,
}

impl Collections {
    /// Reads one line; false where the collection is of an unknown kind.
    pub(super) fn read(
        &mut self,
        entry: &Entry<'_>,
        atoms: &Numbers,
        bonds: &Numbers,
        starts: &[u32],
    ) -> Result<bool, Fault> {
        let mut words = entry.words();
        let name = words.demand("the name of the collection")?.value();
        let meaning = match name.text() {
            // Values that later collections share, and what is to be shown in colour.
            b"DEFAULT" | b"MDLV30/HILITE" => return Ok(true),
            _ => match meaning(name)? {
                Some(meaning) => meaning,
                None => return Ok(false),
            },
        };
        let members = self.members.entry(meaning).or_default();
        for word in words {
            let word = word?;
            match word.key() {
                b"ATOMS" => {
                    for field in word.list()? {
                        members.push((atoms.place(field)?, field.span()));
                    }
                }
                b"BONDS" => {
                    for field in word.list()? {
                        let bond = bonds.place(field)?;
                        // One start for each bond line.
                        members.push((starts[bond as usize], field.span()));
                    }
                }
                _ => {}
            }
        }
        Ok(true)
    }

    /// Gives the groups to the drawing.
    pub(super) fn finish(self, drawing: &mut Drawing) -> Result<(), Fault> {
        let mut owner: Vec<Option<Meaning>> = vec![None; drawing.atoms.len()];
        for (meaning, members) in self.members {
            drawing.grouped |= !members.is_empty();
            let mut atoms = Vec::new();
            for (atom, span) in members {
                let expected = "an atom of the structure in no other stereo collection";
                let fault = || Fault::new(ReadErrorKind::Malformed { expected }, span);
                match owner.get_mut(atom as usize) {
                    Some(slot @ None) => *slot = Some(meaning),
                    // Named twice, as a bond to a centre and by itself.
                    Some(Some(known)) if *known == meaning => continue,
                    _ => return Err(fault()),
                }
                atoms.push(atom);
            }
            if let Some((kind, _)) = meaning.filter(|_| !atoms.is_empty()) {
                drawing.groups.push(StereoGroup { kind, atoms });
            }
        }
        Ok(())
    }
}

/// What a name says; `None` for a collection that is not about stereo.
fn meaning(name: Field<'_>) -> Result<Option<Meaning>, Fault> {
    let Some(kind) = name.text().strip_prefix(b"MDLV30/STE") else {
        return Ok(None);
    };
    let (kind, number) = match kind {
        b"ABS" => return Ok(Some(None)),
        [b'R', b'A', b'C', number @ ..] => (GroupKind::And, number),
        [b'R', b'E', b'L', number @ ..] => (GroupKind::Or, number),
        _ => {
            let expected = "STEABS, STERAC or STEREL";
            return Err(name.fault(ReadErrorKind::Malformed { expected }));
        }
    };
    let number = Field::new(number, name.span());
    let number = number.stated("the number of the stereo group", 1, i32::MAX)?;
    Ok(Some(Some((kind, number.unsigned_abs()))))
}
