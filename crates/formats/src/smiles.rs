//! SMILES in and canonical SMILES out, after the OpenSMILES specification 1.0.
//!
//! ```text
//! smiles  := [chain] end          chain := unit { [bond | '.'] unit }    unit := atom ring* branch*
//! branch  := '(' [bond | '.'] chain ')'        ring := [bond] (d | '%' d d)
//! atom    := bracket | organic | '*'           bond := - = # $ : / \
//! bracket := '[' [number] symbol [stereo] ['H' [d]] [charge] [':' number] ']'
//! ```
//!
//! Text goes through two steps: it is read from left to right into flat arrays that keep the order
//! in which the bonds of each atom are written, and these are made into a molecule: implicit
//! hydrogens, then double bonds of aromatic systems, then stereo marks. Faults keep their place
//! through both.
//!
//! Atoms are numbered from 0 from left to right, hydrogens written as atoms included. Stereo tags of
//! all classes and `/` and `\` become stereo marks whether or not the atoms around them differ.
//! Extensions of particular programs are errors where they stand in the SMILES, and notes where they
//! follow it.

mod file;
mod lower;
mod polyhedra;
mod reader;
mod remarks;
mod ring_bonds;
mod rings;
mod scan;
mod stereo;
mod syntax;
mod token;
mod valence;
mod write;

#[cfg(test)]
mod tests;

use molkin_graph::Molecule;

use crate::ReadError;

pub(crate) use self::file::{parse_line, title};
pub use self::{
    file::Records,
    reader::{ReadOptions, Reader},
    write::{Lost, Writer, Written, write},
};

/// Reads one SMILES with the default options and leaves out name and notes.
///
/// # Errors
/// The first fault, with its place. Use a [`Reader`] for many records or for the notes.
///
/// # Examples
/// ```
/// use molkin_formats::smiles;
///
/// let phenol = smiles::parse("Oc1ccccc1")?;
/// assert_eq!(phenol.formula().to_string(), "C6H6O");
///
/// let error = smiles::parse("CC(=O").unwrap_err();
/// assert_eq!(
///     error.render().to_string(),
///     "1:3: the branch is opened and never closed\n\
///      1 | CC(=O\n  \
///        |   ^"
/// );
/// # Ok::<(), molkin_formats::ReadError>(())
/// ```
pub fn parse(text: &str) -> Result<Molecule, ReadError> {
    Reader::default()
        .read(text, 1)
        .map(|record| record.molecule)
}
