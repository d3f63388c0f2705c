//! The part of a canonical view that says which compound a record is.

use crate::{Canonical, CanonicalForm, Key, Molecule, OrderError, Orderer, claims::Extent};

/// Keys and canonical form of a molecule, without the list of its stereo elements.
///
/// A record without marks allows every arrangement of every element, so its constitution with isotopes
/// says which set of stereoisomers it stands for, and nothing is asked about its elements. In other
/// records it is not asked what becomes of the unmarked ones. Keys and form are those of [`Canonical`].
///
/// # Examples
/// ```
/// use molkin_graph::{Atom, BondOrder, Element, Identity, Limits, MoleculeBuilder, Orderer};
///
/// let mut builder = MoleculeBuilder::new();
/// let carbon = builder.add_atom(Atom { hydrogens: 3, ..Atom::new(Element::CARBON) });
/// let oxygen = builder.add_atom(Atom { hydrogens: 1, ..Atom::new(Element::OXYGEN) });
/// builder.add_bond(carbon, oxygen, BondOrder::Single)?;
/// let methanol = builder.build()?;
///
/// let mut orderer = Orderer::new(Limits::default());
/// let mut identity = Identity::default();
/// orderer.identify_into(&methanol, &mut identity)?;
/// assert_eq!(identity.compound_key(), orderer.order(&methanol)?.compound_key());
/// # Ok::<(), Box<dyn std::error::Error>>(())
/// ```
#[derive(Debug, Clone, Default)]
pub struct Identity {
    /// Without what is not asked for.
    view: Canonical,
}

impl Identity {
    /// The key of the constitution: no stereo, no isotopes.
    pub fn constitution_key(&self) -> Key {
        self.view.constitution_key()
    }

    /// The key of the constitution with its isotopes, no stereo.
    pub fn labelled_constitution_key(&self) -> Key {
        self.view.labelled_constitution_key()
    }

    /// The key of the compound: isotopes and everything the record claims about stereo.
    pub fn compound_key(&self) -> Key {
        self.view.compound_key()
    }
}

impl Orderer {
    /// Finds the keys and the canonical order of a molecule, in place of an identity whose memory is
    /// reused. After an error it holds nothing of use.
    ///
    /// # Errors
    /// As [`Orderer::order`].
    pub fn identify_into(
        &mut self,
        molecule: &Molecule,
        identity: &mut Identity,
    ) -> Result<(), OrderError> {
        let view = &mut identity.view;
        if self.mesomer.no_shortcuts {
            return self.order_into(molecule, view);
        }
        let steps = self.order_constitution(molecule, view)?;
        let marked = molecule.stereo.iter().any(|mark| mark.parity.is_some())
            || !molecule.remembered.is_empty();
        if marked || !molecule.coordination.is_empty() || !molecule.groups.is_empty() {
            self.order_stereo(molecule, view, steps, Extent::Identity)?;
        } else {
            view.forget_stereo();
        }
        self.set_keys(view);
        Ok(())
    }

    /// The canonical form of the record identified last, in place of one whose memory is reused.
    pub fn identity_form_into(&mut self, identity: &Identity, form: &mut CanonicalForm) {
        self.form_into(&identity.view, form);
    }
}
