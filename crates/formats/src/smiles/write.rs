//! Canonical SMILES out.
//!
//! The text is a function of the canonical form and of nothing else, in this order: a spanning tree
//! and the order of its branches ([`layout`]), the bonds that carry `/` or `\` ([`slopes`]), the tags
//! of tetrahedral atoms and allenes ([`tags`]), and last the characters ([`emit`]). Bonds are written
//! as in one Kekulé structure, without aromatic symbols.

mod atom;
mod emit;
mod forest;
mod layout;
mod rows;
mod search;
mod slopes;
mod structure;
mod tags;
mod tree;
mod units;

#[cfg(test)]
mod tests;

use molkin_graph::{BondOrder, CanonicalForm, Polyhedron, Shape};

use self::{
    emit::Emitter,
    layout::Layout,
    rows::Rows,
    slopes::Slopes,
    structure::{ArcTable, Structure},
    tags::Tags,
};

/// A molecule as text.
#[derive(Debug, Clone, Default, PartialEq, Eq)]
pub struct Written {
    /// The SMILES.
    pub text: String,
    /// What the text could not say; empty for nearly all molecules. Reading the text back then gives
    /// the same keys and the same text.
    pub lost: Vec<Lost>,
}

/// Something that the notation has no way to say. Atoms are numbers of the canonical form.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord)]
#[non_exhaustive]
pub enum Lost {
    /// A marked arrangement: one of a mobile double bond that stands as single in the structure that
    /// is written, or of a double bond that cannot get its `/` or `\` without a contradiction or
    /// without marking a neighbour as well, or of an axis that is a single bond. It is left out.
    Arrangement {
        /// The geometry.
        shape: Shape,
        /// The centre twice, or the two ends.
        centres: [u32; 2],
    },
    /// The arrangement about a centre that is not tetrahedral: it has more than one empty site, or a
    /// ligand that is left out. The tag is left out.
    Coordination {
        /// The polyhedron.
        polyhedron: Polyhedron,
        /// The centre.
        centre: u32,
    },
    /// A bond that the notation has no symbol for: a coordination bond, written as single, or a
    /// hydrogen bond, left out.
    Bond {
        /// Its atoms.
        atoms: [u32; 2],
        /// What it is.
        order: BondOrder,
    },
    /// The stereo groups: marks are written as those of an absolute arrangement.
    StereoGroups,
    /// More ring bonds are open at once than there are labels, 1 to 99. Those beyond are written as
    /// `%(100)` and so on, which is outside the standard and is not read back.
    RingLabels {
        /// The highest label.
        highest: u32,
    },
}

/// Writes a canonical form as SMILES.
///
/// Two forms give the same text exactly when they are equal, what is [`Written::lost`] aside, so the
/// text may serve as a name; keys remain what identity is decided by.
///
/// Each component starts at its lowest atom; shorter branches come first and the longest goes on as
/// the chain. Hydrogens are counted on their atoms unless a mass number, or a `/` or `\` that no
/// other bond can carry, asks for an atom.
///
/// # Complexity
/// O(n log n) in atoms and bonds, with a bounded search where marked double bonds are conjugated.
///
/// # Source
/// OpenSMILES 1.0, "Standard Form", "Tetrahedral Chirality", "Cis/Trans Configuration".
///
/// # Examples
/// ```
/// use molkin_formats::smiles;
/// use molkin_graph::{Limits, Orderer};
///
/// let molecule = smiles::parse("OC(=O)\\C=C/C")?;
/// let canonical = Orderer::new(Limits::default()).order(&molecule)?;
/// let written = smiles::write(&canonical.form());
/// assert!(written.lost.is_empty());
///
/// let again = smiles::parse(&written.text)?;
/// let again = Orderer::new(Limits::default()).order(&again)?;
/// assert_eq!(again.compound_key(), canonical.compound_key());
/// assert_eq!(smiles::write(&again.form()), written);
/// # Ok::<(), Box<dyn std::error::Error>>(())
/// ```
pub fn write(form: &CanonicalForm) -> Written {
    Writer::default().write(form)
}

/// Writes canonical forms and reuses its storage from one to the next; see [`write()`].
///
/// # Examples
/// ```
/// use molkin_formats::smiles;
/// use molkin_graph::{Limits, Orderer};
///
/// let mut orderer = Orderer::new(Limits::default());
/// let mut writer = smiles::Writer::default();
/// let mut texts = Vec::new();
/// for text in ["OCC", "C(O)C"] {
///     let canonical = orderer.order(&smiles::parse(text)?)?;
///     texts.push(writer.write(&canonical.form()).text);
/// }
/// assert_eq!(texts[0], texts[1]);
/// # Ok::<(), Box<dyn std::error::Error>>(())
/// ```
#[derive(Debug, Default)]
pub struct Writer {
    arcs: ArcTable,
    layout: Layout,
    rows: Rows,
    /// Per atom: the hydrogens that are written as atoms.
    shown: Vec<u8>,
    tags: Tags,
}

impl Writer {
    /// Writes a canonical form as [`write()`] does.
    pub fn write(&mut self, form: &CanonicalForm) -> Written {
        let mut written = Written::default();
        self.write_into(form, &mut written);
        written
    }

    /// As [`Writer::write`], in place of a text whose storage is reused.
    pub fn write_into(&mut self, form: &CanonicalForm, written: &mut Written) {
        let Written { text, lost } = written;
        text.clear();
        lost.clear();
        let structure = Structure::new(form, &mut self.arcs);
        self.layout.plan(&structure);
        let layout = &self.layout;
        structure.report_lost_bonds(lost);
        if !form.groups.is_empty() {
            lost.push(Lost::StereoGroups);
        }
        let mut elements = form.stereo.iter();
        self.rows.clear();
        if elements.any(|element| element.shape != Shape::Tetrahedral) {
            self.rows.find(&structure);
        }
        let rows = self.rows.all();
        let shown = &mut self.shown;
        shown.clear();
        shown.extend(form.atoms.iter().map(atom::shown_hydrogens));
        let mut slopes = Slopes::solve(&structure, layout, rows, lost);
        slopes.show_hydrogens(&structure, shown);
        tags::show_hydrogens(&form.stereo, shown);
        self.tags.load(&structure, layout, rows, shown, lost);
        if layout.highest_label > layout::LAST_LABEL {
            lost.push(Lost::RingLabels {
                highest: layout.highest_label,
            });
        }
        lost.sort_unstable();
        let mut emitter = Emitter {
            structure: &structure,
            layout,
            shown,
            tags: &self.tags,
            slopes: &mut slopes,
            text,
        };
        emitter.emit();
    }
}
