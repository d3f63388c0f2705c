//! What both records of a pair are made of, side by side: left-over pieces, ring systems, functional
//! groups.

use molkin_graph::Molecule;
use serde::Serialize;

use crate::{
    FunctionalGroup as DomainGroup, LeftOver, RingSystem as DomainSystem, Structure,
    explain::surplus,
};

use super::numbers;

/// The same of both records.
#[derive(Debug, Clone, PartialEq, Eq, Serialize)]
pub struct Sides<T> {
    /// The first record.
    pub a: T,
    /// The second record.
    pub b: T,
}

impl<T> Sides<T> {
    pub(super) fn of<D>(
        domain: &[D; 2],
        molecules: [&Molecule; 2],
        wire: impl Fn(&Molecule, &D) -> T,
    ) -> Self {
        let [a, b] = [0, 1].map(|side| wire(molecules[side], &domain[side]));
        Self { a, b }
    }
}

/// What one record has more than the other.
#[derive(Debug, Clone, PartialEq, Eq, Serialize)]
pub struct Surplus {
    /// Elements that it has more of, in Hill order; empty where there are none.
    pub formula: String,
    /// Atoms without a partner, connected ones together.
    pub pieces: Vec<Piece>,
}

/// Connected atoms without a partner.
#[derive(Debug, Clone, PartialEq, Eq, Serialize)]
pub struct Piece {
    /// The atoms.
    pub atoms: Vec<u32>,
    /// Their formula, hydrogens included.
    pub formula: String,
    /// The mapped atoms that bear the piece; empty for a component of its own.
    pub on: Vec<u32>,
    /// A trivial name, where there is one.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub name: Option<&'static str>,
}

/// Rings that share atoms.
#[derive(Debug, Clone, PartialEq, Eq, Serialize)]
pub struct RingSystem {
    /// The atoms.
    pub atoms: Vec<u32>,
    /// Ring sizes, ascending.
    pub sizes: Vec<usize>,
    /// `spiro`, `fused`, `bridged`.
    pub joins: Vec<&'static str>,
}

/// A functional group that one record has more often than the other.
#[derive(Debug, Clone, PartialEq, Eq, Serialize)]
pub struct FunctionalGroup {
    /// The atoms, without the environment.
    pub atoms: Vec<u32>,
    /// Its name, where the table has one.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub name: Option<&'static str>,
}

impl Sides<Surplus> {
    pub(super) fn left_over(structures: [&Structure; 2], left_over: &[Vec<LeftOver>; 2]) -> Self {
        let formulae = surplus(structures[0].formula(), structures[1].formula());
        let [a, b] = [0, 1].map(|side| {
            let molecule = structures[side].molecule();
            let pieces = left_over[side].iter().map(|piece| Piece {
                atoms: numbers(molecule, &piece.atoms),
                formula: piece.formula.to_string(),
                on: numbers(molecule, &piece.on),
                name: piece.name,
            });
            Surplus {
                formula: formulae[side].to_string(),
                pieces: pieces.collect(),
            }
        });
        Self { a, b }
    }
}

impl RingSystem {
    pub(super) fn list(molecule: &Molecule, systems: &[DomainSystem]) -> Vec<Self> {
        let systems = systems.iter().map(|system| Self {
            atoms: numbers(molecule, &system.atoms),
            sizes: system.sizes.clone(),
            joins: system.joins.iter().map(|join| join.as_str()).collect(),
        });
        systems.collect()
    }
}

impl FunctionalGroup {
    pub(super) fn list(molecule: &Molecule, groups: &[DomainGroup]) -> Vec<Self> {
        let groups = groups.iter().map(|group| Self {
            atoms: numbers(molecule, &group.atoms),
            name: group.name,
        });
        groups.collect()
    }
}
