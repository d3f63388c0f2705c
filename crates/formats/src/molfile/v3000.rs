//! Version 3000: sections of words and `KEY=value`, each line behind `M  V30`.
//!
//! ```text
//! M  V30 BEGIN CTAB
//! M  V30 COUNTS 3 2 0 0 0                atoms, bonds, groups, objects, chiral flag
//! M  V30 BEGIN ATOM
//! M  V30 1 C -0.7 0.4 0 0                number, symbol, x, y, z, map, then CHG=1 …
//! M  V30 END ATOM
//! M  V30 BEGIN BOND
//! M  V30 1 1 1 2                         number, type, atom, atom, then CFG=1 …
//! M  V30 END BOND
//! M  V30 END CTAB
//! M  END
//! ```

mod atom;
mod bond;
mod collection;
mod counts;
mod group;
mod haptic;
mod line;
mod numbers;
mod section;
mod word;

use molkin_graph::Limits;

use crate::{
    Note, ReadErrorKind,
    molfile::{
        block::{Fault, Lines},
        drawing::Drawing,
        v3000::{
            collection::Collections,
            counts::Counts,
            haptic::Haptic,
            line::{After, Body, Entry, misplaced},
            numbers::{Kind, Numbers},
            section::Section,
        },
    },
};

/// What the sections have said so far.
struct Table<'l> {
    limits: &'l Limits,
    drawing: Drawing,
    atoms: Numbers,
    bonds: Numbers,
    /// The first atom of every bond line.
    starts: Vec<u32>,
    haptic: Vec<Haptic>,
    collections: Collections,
    unknown_noted: bool,
}

/// Reads what follows the counts line of the header, through `M  END`.
///
/// Memory grows with the lines that are there, not with what the counts line claims or with the
/// size of the numbers.
pub(super) fn read(lines: &mut Lines<'_>, limits: &Limits) -> Result<Drawing, Fault> {
    let mut body = Body::new(lines);
    let start = body.demand("M  V30 BEGIN CTAB")?;
    let opened = start.bracket()?;
    if opened.is_none_or(|found| !found.begins || found.name.text() != Section::Table.name()) {
        return Err(misplaced(&start, "M  V30 BEGIN CTAB"));
    }
    let counts = counts::read(&body.demand("M  V30 COUNTS")?, limits)?;
    let mut table = Table {
        limits,
        drawing: Drawing {
            chiral: counts.chiral,
            ..Drawing::default()
        },
        atoms: Numbers::new(Kind::Atom),
        bonds: Numbers::new(Kind::Bond),
        starts: Vec::new(),
        haptic: Vec::new(),
        collections: Collections::default(),
        unknown_noted: false,
    };
    table.sections(&mut body, &counts)?;
    table.after(&mut body)?;
    table.finish()
}

impl Table<'_> {
    /// Reads sections through the end of the table.
    fn sections(&mut self, body: &mut Body<'_, '_>, counts: &Counts) -> Result<(), Fault> {
        loop {
            let entry = body.demand(Section::Table.end())?;
            let Some(bracket) = entry.bracket()? else {
                self.loose(&entry)?;
                continue;
            };
            let section = Section::from_name(bracket.name.text());
            match (bracket.begins, section) {
                (false, Some(Section::Table)) => break,
                (true, Some(Section::Atoms)) => self.read_atoms(body)?,
                (true, Some(Section::Bonds)) => self.read_bonds(body)?,
                (true, Some(Section::Groups)) => group::read(body, &mut self.drawing.notes)?,
                (true, Some(Section::Objects)) => {
                    body.skip(Section::Objects)?;
                    let text = "points and planes in space are not read";
                    self.note("objects-ignored", &entry, text);
                }
                (true, Some(Section::Collections)) => self.read_collections(body)?,
                _ => return Err(misplaced(&entry, "a section of the table, or its end")),
            }
        }
        counts.check(counts.atoms, self.atoms.count())?;
        counts.check(counts.bonds, self.bonds.count())
    }

    fn read_atoms(&mut self, body: &mut Body<'_, '_>) -> Result<(), Fault> {
        while let Some(entry) = body.next_in(Section::Atoms)? {
            let mut words = entry.words();
            self.atoms.add(words.demand("the atom number")?.value())?;
            if self.drawing.atoms.len() >= self.limits.atoms {
                let limit = self.limits.atoms;
                let kind = ReadErrorKind::TooManyAtoms { limit };
                return Err(Fault::new(kind, entry.span()));
            }
            let index = self.atoms.count().saturating_sub(1);
            let (atom, unknown) = atom::read(words, index, &mut self.drawing.notes)?;
            self.drawing.atoms.push(atom);
            if unknown {
                self.note_unknown(&entry);
            }
        }
        self.atoms.finish()
    }

    fn read_bonds(&mut self, body: &mut Body<'_, '_>) -> Result<(), Fault> {
        while let Some(entry) = body.next_in(Section::Bonds)? {
            let mut words = entry.words();
            self.bonds.add(words.demand("the bond number")?.value())?;
            let line = bond::read(&entry, words, &self.atoms, &mut self.drawing.notes)?;
            self.starts.push(line.bond.ends[0]);
            match line.targets {
                Some(targets) => self.haptic.push(Haptic {
                    span: entry.span(),
                    ends: line.bond.ends,
                    targets,
                }),
                None => self.drawing.bonds.push(line.bond),
            }
            if line.unknown {
                self.note_unknown(&entry);
            }
        }
        self.bonds.finish()
    }

    fn read_collections(&mut self, body: &mut Body<'_, '_>) -> Result<(), Fault> {
        while let Some(entry) = body.next_in(Section::Collections)? {
            let known = self
                .collections
                .read(&entry, &self.atoms, &self.bonds, &self.starts)?;
            if !known {
                let text = "a collection of a kind that is not known is not read";
                self.note("collection-ignored", &entry, text);
            }
        }
        Ok(())
    }

    /// A line of the table outside its sections.
    fn loose(&mut self, entry: &Entry<'_>) -> Result<(), Fault> {
        let word = entry.words().demand("the content of the line")?.value();
        if word.text() == b"LINKNODE" {
            return Err(word.fault(ReadErrorKind::Query {
                what: "a link atom",
            }));
        }
        self.note_unknown(entry);
        Ok(())
    }

    /// Reads what stands between the end of the table and `M  END`.
    fn after(&mut self, body: &mut Body<'_, '_>) -> Result<(), Fault> {
        loop {
            let entry = match body.after_table()? {
                After::End => return Ok(()),
                After::Entry(entry) => entry,
                After::Other(line) => {
                    if !line.is_blank() {
                        self.note_unknown_at(line.span());
                    }
                    continue;
                }
            };
            let bracket = entry.bracket()?.filter(|bracket| bracket.begins);
            match bracket.and_then(|bracket| Section::from_name(bracket.name.text())) {
                Some(Section::Members) => {
                    let what = "an R group";
                    return Err(Fault::new(ReadErrorKind::Query { what }, entry.span()));
                }
                Some(Section::Templates) => {
                    body.skip(Section::Templates)?;
                    let text = "templates that no atom uses are not read";
                    self.note("templates-ignored", &entry, text);
                }
                _ => return Err(misplaced(&entry, "M  END")),
            }
        }
    }

    fn finish(mut self) -> Result<Drawing, Fault> {
        haptic::expand(&mut self.drawing, &self.haptic)?;
        self.collections.finish(&mut self.drawing)?;
        Ok(self.drawing)
    }

    fn note(&mut self, code: &'static str, entry: &Entry<'_>, text: &str) {
        self.drawing.notes.push(Note {
            code,
            atoms: Vec::new(),
            span: Some(entry.span()),
            text: text.to_owned(),
        });
    }

    fn note_unknown(&mut self, entry: &Entry<'_>) {
        self.note_unknown_at(entry.span());
    }

    /// The format says to ignore what is not known; one note tells of the first.
    fn note_unknown_at(&mut self, span: crate::Span) {
        if !self.unknown_noted {
            self.unknown_noted = true;
            self.drawing.notes.push(Note {
                code: "unknown-line",
                atoms: Vec::new(),
                span: Some(span),
                text: "a line of a kind that is not known was not read".to_owned(),
            });
        }
    }
}
