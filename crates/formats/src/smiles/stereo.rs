//! Stereo marks: tags on atoms, slopes of bonds.

use molkin_graph::MoleculeBuilder;

use super::{
    remarks::{Extent, Fault, Remarks},
    syntax::{AtomSyntax, Syntax, TagClass},
};

mod coordination;
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
        add_tags(syntax, builder, remarks)?;
    }
    if syntax.has_slopes {
        double_bond::add_marks(syntax, builder, remarks)?;
    }
    Ok(())
}

fn add_tags(
    syntax: &Syntax,
    builder: &mut MoleculeBuilder,
    remarks: &mut Remarks,
) -> Result<(), Fault> {
    let tagged = (0..).zip(&syntax.atoms);
    let tagged = tagged.filter_map(|(atom, here)| here.tag.map(|tag| (atom, here, tag)));
    let in_row = tagged.clone().any(|(atom, ..)| syntax.is_cumulated(atom));
    let allenes = if in_row {
        tagged::allenes(syntax)
    } else {
        Vec::new()
    };
    for (atom, here, tag) in tagged {
        if let Some(polyhedron) = coordination::polyhedron(here, tag) {
            coordination::mark(syntax, polyhedron, atom, tag, remarks)?
                .into_iter()
                .for_each(|mark| builder.add_coordination(mark));
        } else if tag.class != TagClass::Allene && coordination::ligand_count(here) > 4 {
            return Err(coordination::too_many(atom, here));
        } else {
            tagged::mark(syntax, &allenes, atom, tag, remarks)?
                .into_iter()
                .for_each(|mark| builder.add_stereo(mark));
        }
    }
    Ok(())
}

/// A tag that says nothing at its atom.
fn remark_on_meaningless(
    atom: u32,
    here: &AtomSyntax,
    reason: &str,
    remarks: &mut Remarks,
) -> Result<(), Fault> {
    let text = format!("the stereo tag has no meaning and is left out: {reason}");
    remarks.note("meaningless-stereo-tag", &[atom], extent_of(here), text)
}

/// Where an atom stands in the text.
fn extent_of(atom: &AtomSyntax) -> Extent {
    Extent::new(atom.offset as usize, atom.width as usize)
}
