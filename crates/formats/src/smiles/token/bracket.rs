//! A bracket atom: `[` isotope symbol stereo hydrogens charge class `]`.

use molkin_graph::Atom;
use nom::Parser;
use nom::combinator::opt;

use super::{Refusal, Token, atom_class, charge, hydrogens, number, stereo_tag, symbol};
use crate::smiles::syntax::AtomToken;

/// What stands between the brackets.
#[derive(Debug)]
pub(in crate::smiles) struct BracketAtom {
    pub(in crate::smiles) atom: AtomToken,
    /// How many signs the charge is written with.
    pub(in crate::smiles) signs: usize,
}

/// Mass numbers end here (OpenSMILES asks for 0 to 999).
const MOST_ISOTOPE: u32 = 999;

/// Reads a bracket atom from after its opening bracket through its closing one.
pub(in crate::smiles) fn bracket_atom(input: &[u8]) -> Token<'_, BracketAtom> {
    let (input, isotope) = opt(|text| number(text, "a mass number", MOST_ISOTOPE)).parse(input)?;
    let (input, (element, aromatic)) = symbol::symbol(input)?;
    let (input, tag) = stereo_tag::stereo_tag(input)?;
    let (input, hydrogens) = hydrogens(input)?;
    let (input, (charge, signs)) = charge(input)?;
    let (input, ()) = atom_class(input)?;
    let Some((b']', input)) = input.split_first() else {
        let expected = "`@`, `H`, a charge, `:` or `]`, in this order,";
        return Err(Refusal::unexpected(input, expected));
    };
    let isotope = isotope.and_then(|number| u16::try_from(number).ok());
    let atom = Atom {
        isotope,
        charge,
        hydrogens,
        ..Atom::new(element)
    };
    let atom = AtomToken {
        atom,
        aromatic,
        bracket: true,
        tag,
    };
    Ok((input, BracketAtom { atom, signs }))
}
