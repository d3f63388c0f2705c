//! The quick way to keys and canonical text, held to the general one.

use molkin_formats::smiles::{self, Writer, Written};
use molkin_graph::{CanonicalForm, Identity, Limits, Orderer};

use crate::{Comparer, Numbers, other_kekule_form, renumbered};

/// Compares the two ways; owns the scratch.
#[derive(Debug)]
pub struct Shortcuts {
    comparer: Comparer,
    quick: Orderer,
    /// One identity for all structures, so that what one leaves behind may not show in the next.
    identity: Identity,
    form: CanonicalForm,
    writer: Writer,
    written: Written,
    general: Orderer,
}

impl Default for Shortcuts {
    fn default() -> Self {
        Self {
            comparer: Comparer::default(),
            quick: Orderer::new(Limits::default()),
            identity: Identity::default(),
            form: CanonicalForm::default(),
            writer: Writer::default(),
            written: Written::default(),
            general: Orderer::without_shortcuts(Limits::default()),
        }
    }
}

impl Shortcuts {
    /// Whether a structure has the same keys and canonical text both ways: as it is read, in reused
    /// memory with all shortcuts, and with another Kekulé form and numbering, in fresh memory without.
    /// `None` where it cannot be read or ordered.
    ///
    /// # Errors
    /// A difference.
    pub fn agree_on(&mut self, text: &str, numbers: &mut Numbers) -> Result<Option<()>, String> {
        let Ok(molecule) = self.comparer.molecule(text) else {
            return Ok(None);
        };
        let copy = renumbered(&other_kekule_form(&molecule, numbers), numbers);
        let quick = self.quick.identify_into(&molecule, &mut self.identity);
        let view = match (quick, self.general.order(&copy)) {
            (Ok(()), Ok(view)) => view,
            (Err(_), Err(_)) => return Ok(None),
            (quick, view) => return Err(format!("{text}: {:?} and {:?}", quick, view.err())),
        };
        let (quick, general) = (
            (
                self.identity.constitution_key(),
                self.identity.compound_key(),
            ),
            (view.constitution_key(), view.compound_key()),
        );
        if quick != general {
            return Err(format!("{text}: keys {quick:?} and {general:?}"));
        }
        self.quick
            .identity_form_into(&self.identity, &mut self.form);
        self.writer.write_into(&self.form, &mut self.written);
        let plain = smiles::write(&view.form());
        if self.written != plain {
            return Err(format!("{text}: {} and {}", self.written.text, plain.text));
        }
        Ok(Some(()))
    }
}
