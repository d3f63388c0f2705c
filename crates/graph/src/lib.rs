//! Molecules as graphs: perception, canonical order, stereo claims and keys.
//!
//! This crate knows no file format. A reader fills a [`MoleculeBuilder`].
#![forbid(unsafe_code)]

mod atom;
mod bond;
mod builder;
mod canonical;
mod cip;
mod claims;
mod drawn;
mod element;
mod formula;
mod kekule;
mod key;
mod limits;
mod mass;
mod matching;
mod mesomer;
mod molecule;
mod order;
mod polyhedron;
mod revision;
mod rings;
mod rows;
mod skeleton;
#[cfg(test)]
mod sketch;
mod stereo;
mod tautomer;
mod unsaturation;

pub use crate::{
    atom::Atom,
    bond::BondOrder,
    builder::{BuildError, MoleculeBuilder},
    canonical::{
        Arrangement, Canonical, CanonicalForm, Dropped, FormAtom, FormStereo, Identity, Mark,
        NormalAtom, NormalBond, NormalForm, OrderError, Orderer, Remark, StereoElement,
        arrangement,
    },
    cip::{Label, Labelling},
    drawn::{
        DrawnCoordination, DrawnStereo, GroupKind, Ligand, Parity, Polyhedron, Shape, StereoGroup,
    },
    element::{Element, Nuclide},
    formula::Formula,
    kekule::PiDemand,
    key::{KEY_VERSION, Key},
    limits::Limits,
    mass::{Mass, MassError, average_mass, monoisotopic_mass},
    molecule::Molecule,
    order::{GraphError, GraphOrder, GraphOrderer},
    revision::{Revised, Revision},
    stereo::Undrawable,
    tautomer::{Tautomer, TautomerAtom},
    unsaturation::Unsaturation,
};
