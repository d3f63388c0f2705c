//! The property block: charges, radicals, isotopes, and what is read through.

use crate::{
    Note, ReadErrorKind, Span,
    molfile::{
        block::{Fault, Line, Lines},
        drawing::{Drawing, Radical},
        field::{Field, decode},
        header::Version,
        symbol,
        v2000::{atom::State, entries, ignored},
    },
};

/// What the property lines have said so far.
struct Properties<'d> {
    drawing: &'d mut Drawing,
    states: Vec<State>,
    /// The number of atoms and where the counts line says so.
    declared: (u32, Span),
    charges_stated: bool,
    isotopes_stated: bool,
    unknown_noted: bool,
}

/// Reads property lines through `M  END` and completes the atoms.
///
/// A file without a version may end without `M  END`; in any other that is an error, since lines
/// with charges may have been cut off.
pub(super) fn read(
    lines: &mut Lines<'_>,
    version: Version,
    declared: (u32, Span),
    states: Vec<State>,
    drawing: &mut Drawing,
) -> Result<(), Fault> {
    let mut properties = Properties {
        drawing,
        states,
        declared,
        charges_stated: false,
        isotopes_stated: false,
        unknown_noted: false,
    };
    loop {
        let at_end = lines.peek().is_none_or(|line| line.text.starts_with(b">"));
        if at_end && version == Version::Unstated {
            break;
        }
        let line = lines.demand("M  END")?;
        if line.is_end() {
            break;
        }
        properties.take(line, lines)?;
    }
    properties.finish();
    Ok(())
}

impl Properties<'_> {
    fn take(&mut self, line: Line<'_>, lines: &mut Lines<'_>) -> Result<(), Fault> {
        match line.text {
            [b'M', b' ', b' ', key @ ..] => self.property(key.get(..3).unwrap_or(key), line),
            [b'A', b' ', b' ', ..] => {
                let text = lines.demand("the text of an alias")?;
                self.alias(line.field(4, 3), "an alias", text.text)
            }
            [b'V', b' ', b' ', ..] => self.alias(
                line.field(4, 3),
                "a value",
                line.text.get(7..).unwrap_or_default(),
            ),
            [b'G', b' ', b' ', ..] => {
                let text = lines.demand("the text of an abbreviation")?;
                self.alias(line.field(4, 3), "an abbreviation", text.text)
            }
            [b'S', b' ', b' ', b'S', b'K', b'P', ..] => {
                let skipped = line
                    .field(7, 3)
                    .stated("the number of lines to skip", 0, 999)?;
                for _ in 0..skipped {
                    lines.demand("a line to skip")?;
                }
                Ok(())
            }
            _ => {
                self.unknown(line);
                Ok(())
            }
        }
    }

    fn property(&mut self, key: &[u8], line: Line<'_>) -> Result<(), Fault> {
        match key {
            b"CHG" => self.charges(line),
            b"RAD" => self.radicals(line),
            b"ISO" => self.isotopes(line),
            b"STY" => ignored::group_types(line, &mut self.drawing.notes),
            _ => {
                if let Some(what) = ignored::query(key) {
                    return Err(Fault::new(ReadErrorKind::Query { what }, line.span()));
                }
                if let Some(what) = ignored::extension(key) {
                    return Err(Fault::new(ReadErrorKind::Unsupported { what }, line.span()));
                }
                if !ignored::is_group_detail(key) {
                    self.unknown(line);
                }
                Ok(())
            }
        }
    }

    /// The first charge or radical line makes all charges and radicals of the atom lines void.
    fn override_charges(&mut self) {
        if !self.charges_stated {
            self.charges_stated = true;
            for state in &mut self.states {
                state.charge = 0;
                state.radical = Radical::None;
            }
        }
    }

    fn charges(&mut self, line: Line<'_>) -> Result<(), Fault> {
        self.override_charges();
        for entry in entries::read(line, self.declared)? {
            let entry = entry?;
            let charge = entry.value.stated("the charge", -15, 15)?;
            if let Some(state) = self.states.get_mut(entry.atom as usize) {
                state.charge = i8::try_from(charge).unwrap_or(0);
            }
        }
        Ok(())
    }

    fn radicals(&mut self, line: Line<'_>) -> Result<(), Fault> {
        self.override_charges();
        for entry in entries::read(line, self.declared)? {
            let entry = entry?;
            let code = entry.value.stated("the radical", 0, 3)?;
            if let Some(state) = self.states.get_mut(entry.atom as usize) {
                state.radical = Radical::from_code(code).unwrap_or_default();
            }
        }
        Ok(())
    }

    /// Isotope lines hold mass numbers. Any of them makes all mass differences void, but not the
    /// symbols D and T of atoms it does not name.
    fn isotopes(&mut self, line: Line<'_>) -> Result<(), Fault> {
        self.isotopes_stated = true;
        for entry in entries::read(line, self.declared)? {
            let entry = entry?;
            let mass = entry.value.stated("the mass number", 0, 999)?;
            let Some(atom) = self.drawing.atoms.get_mut(entry.atom as usize) else {
                continue;
            };
            // Zero is how some writers say that an atom has its natural composition.
            atom.isotope = u16::try_from(mass).ok().filter(|&mass| mass > 0);
            self.drawing.notes.extend(symbol::unusual_mass(
                atom.element,
                mass,
                entry.atom,
                entry.value.span(),
            ));
        }
        Ok(())
    }

    fn alias(&mut self, number: Field<'_>, what: &str, text: &[u8]) -> Result<(), Fault> {
        let (declared, counts) = self.declared;
        let named = number.stated("the atom number", 0, 999)?.unsigned_abs();
        if !(1..=declared).contains(&named) {
            let kind = ReadErrorKind::NoSuchAtom { named, declared };
            return Err(number.fault(kind).with_related(counts));
        }
        self.drawing.notes.push(Note {
            code: "alias-ignored",
            atoms: vec![named - 1],
            span: Some(number.span()),
            text: format!(
                "atom {named} has {what}, {:?}, which is not read; it may stand for more than the atom",
                decode(text.trim_ascii())
            ),
        });
        Ok(())
    }

    /// The format says to ignore unknown lines; one note tells of the first.
    fn unknown(&mut self, line: Line<'_>) {
        if self.unknown_noted || line.is_blank() {
            return;
        }
        self.unknown_noted = true;
        self.drawing.notes.push(Note {
            code: "unknown-line",
            atoms: Vec::new(),
            span: Some(line.span()),
            text: "a line of a kind that is not known was not read".to_owned(),
        });
    }

    fn finish(self) {
        for (atom, state) in self.drawing.atoms.iter_mut().zip(self.states) {
            atom.charge = state.charge;
            atom.radical = state.radical;
            if !self.isotopes_stated && state.mass_difference != 0 {
                atom.isotope = symbol::natural_mass(atom.element)
                    .and_then(|natural| u16::try_from(natural + state.mass_difference).ok())
                    .or(atom.isotope);
            }
        }
    }
}
