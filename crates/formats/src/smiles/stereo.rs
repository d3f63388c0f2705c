//! Stereo marks: tags on atoms, slopes of bonds.

use molkin_graph::MoleculeBuilder;

use super::{
    remarks::{Extent, Fault, Remarks},
    syntax::{AtomSyntax, Syntax},
};

mod cumulene;
mod double_bond;
mod end;
mod tagged;

/// Adds every mark of the record that has a meaning to the builder, and remarks on the others.
/// Linear in atoms and bonds. Hydrogens must have been settled.
pub(super) fn add_marks(
    syntax: &mut Syntax,
    builder: &mut MoleculeBuilder,
    remarks: &mut Remarks,
) -> Result<(), Fault> {
    if syntax.has_tags {
        let tagged = |atom: &u32| syntax.atoms[*atom as usize].tag.is_some();
        let mut atoms = (0..syntax.atoms.len() as u32).filter(tagged);
        let in_row = atoms.clone().any(|atom| syntax.is_cumulated(atom));
        let allenes = if in_row {
            tagged::allenes(syntax)
        } else {
            Vec::new()
        };
        atoms.try_for_each(|atom| {
            let mark = tagged::mark(syntax, &allenes, atom, remarks)?;
            mark.into_iter().for_each(|mark| builder.add_stereo(mark));
            Ok(())
        })?;
    }
    if syntax.has_slopes {
        double_bond::add_marks(syntax, builder, remarks)?;
    }
    Ok(())
}

/// Where an atom stands in the text.
fn extent_of(atom: &AtomSyntax) -> Extent {
    Extent::new(atom.offset as usize, atom.width as usize)
}
