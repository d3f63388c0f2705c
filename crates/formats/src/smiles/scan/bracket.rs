//! Bracket atoms, and what is remarkable about them.

use molkin_graph::{Atom, Element};

use super::Scanner;
use crate::smiles::{
    remarks::{Extent, Fault},
    token::{self, BracketAtom},
};

impl Scanner<'_> {
    pub(super) fn bracket(&mut self) -> Result<(), Fault> {
        let start = self.at;
        let inside = &self.text[start + 1..];
        let (rest, token) =
            token::bracket_atom(inside).map_err(|error| self.refused(error, Some(start)))?;
        let width = self.text.len() - rest.len() - start;
        self.atom(token.atom, width)?;
        let extent = Extent::new(start, width);
        self.remark_on_bracket(&token, extent)
    }

    fn remark_on_bracket(&mut self, token: &BracketAtom, extent: Extent) -> Result<(), Fault> {
        let Atom {
            element,
            isotope,
            hydrogens,
            ..
        } = token.atom.atom;
        let here = [self.previous];
        if token.signs > 2 {
            let text = "the charge is written with more than two signs";
            self.remarks
                .note("repeated-charge-sign", &here, extent, text)?;
        } else if token.signs == 2 {
            let text = "the charge is written with two signs, which is outdated";
            self.remarks
                .note_allowed("repeated-charge-sign", &here, extent, text);
        }
        if element == Element::HYDROGEN && hydrogens > 0 {
            let text = "a hydrogen that counts hydrogens is read as bonded to them";
            self.remarks
                .note("hydrogen-on-hydrogen", &here, extent, text)?;
        }
        if token.atom.aromatic && (element == Element::TELLURIUM || element == Element::SILICON) {
            let text = format!("{} has no aromatic symbol in the standard", element.name());
            self.remarks
                .note("nonstandard-aromatic-symbol", &here, extent, text)?;
        }
        match isotope {
            Some(0) => {
                let text = "mass number 0 is kept and differs from none at all";
                self.remarks
                    .note_allowed("isotope-zero", &here, extent, text);
            }
            Some(mass) if element != Element::WILDCARD && element.isotope_mass(mass).is_none() => {
                let text = format!("no nuclide {mass}{} is known", element.symbol());
                self.remarks
                    .note_allowed("unknown-isotope", &here, extent, text);
            }
            _ => {}
        }
        Ok(())
    }
}
