//! The two ligands at one end of a double bond or a row of them.

use molkin_graph::Ligand;

use super::cumulene::Stop;
use crate::smiles::syntax::{NONE, Syntax};

/// One end: its atom and its ligands in text order.
#[derive(Debug, Clone, Copy)]
pub(super) struct End {
    pub(super) atom: u32,
    pub(super) ligands: [Ligand; 2],
    /// The bonds to the ligands; [`NONE`] for a hydrogen or lone pair without a bond of its own.
    pub(super) bonds: [u32; 2],
}

impl End {
    /// The ligands of the end of a row beside its bond inward; `None` where it has
    /// not exactly two, a lone pair counted as one if only one more is there.
    ///
    /// An implicit hydrogen or lone pair stands behind the preceding atom and else in front, as at
    /// a tetrahedral atom.
    pub(super) fn new(syntax: &Syntax, stop: Stop) -> Option<Self> {
        let Stop { atom, bond: inward } = stop;
        let here = &syntax.atoms[atom as usize];
        let mut others = syntax.neighbours(atom).filter(|&(_, bond)| bond != inward);
        let (first, first_bond) = others.next()?;
        let first = Ligand::Atom(first);
        let (ligands, bonds) = match (others.next(), here.atom.hydrogens) {
            (Some((second, bond)), 0) => ([first, Ligand::Atom(second)], [first_bond, bond]),
            (None, hydrogens @ 0..=1) => {
                let unwritten = if hydrogens == 1 {
                    Ligand::Hydrogen
                } else {
                    Ligand::LonePair
                };
                let starts = syntax.neighbours(atom).next().map(|(_, bond)| bond);
                if here.preceded && starts == Some(first_bond) {
                    ([first, unwritten], [first_bond, NONE])
                } else {
                    ([unwritten, first], [NONE, first_bond])
                }
            }
            _ => return None,
        };
        others.next().is_none().then_some(Self {
            atom,
            ligands,
            bonds,
        })
    }
}
