//! Findings: what moved between constitutional isomers.

use molkin_graph::Molecule;
use serde::Serialize;

use crate::{
    Explanation, Structure,
    findings::{self as domain, Change, Moved},
    words::moves,
};

use super::{BondPair, numbers};

/// One difference and the bonds that it accounts for. Every bond of one record only, and every one of
/// changed order, is in one finding.
#[derive(Debug, Clone, PartialEq, Eq, Serialize)]
pub struct Finding {
    /// A stable name in kebab-case.
    pub kind: &'static str,
    /// Atoms of A that it is about.
    pub a: Vec<u32>,
    /// Atoms of B.
    pub b: Vec<u32>,
    /// Substituents that it is about.
    #[serde(skip_serializing_if = "Vec::is_empty")]
    pub groups: Vec<FoundGroup>,
    /// Bonds that only A has.
    pub only_in_a: Vec<[u32; 2]>,
    /// Bonds that only B has.
    pub only_in_b: Vec<[u32; 2]>,
    /// Bonds of changed order.
    pub order_changed: Vec<BondPair>,
    /// One sentence.
    pub text: String,
}

/// A substituent in both records.
#[derive(Debug, Clone, PartialEq, Eq, Serialize)]
pub struct FoundGroup {
    /// Its name in A, or its formula.
    pub name_a: String,
    /// Its name in B, or its formula.
    pub name_b: String,
    /// Its atoms in A.
    pub atoms_a: Vec<u32>,
    /// Its atoms in B.
    pub atoms_b: Vec<u32>,
    /// The atom of A that bears it.
    pub on_a: u32,
    /// The atom of B that bears it.
    pub on_b: u32,
}

/// The findings of a pair and a last entry on what is the same; nothing where none were looked for.
pub(super) fn of(structures: [&Structure; 2], explained: &Explanation) -> Option<Vec<Finding>> {
    let molecules = structures.map(Structure::molecule);
    let bonds = explained.bonds.as_ref()?;
    if explained.findings.is_empty() {
        return None;
    }
    let told = explained.findings.iter().map(|finding| {
        let text = moves::sentence(structures, finding);
        Finding::of(molecules, finding, text)
    });
    let same = Finding {
        kind: "same",
        a: Vec::new(),
        b: Vec::new(),
        groups: Vec::new(),
        only_in_a: Vec::new(),
        only_in_b: Vec::new(),
        order_changed: Vec::new(),
        text: moves::same(bonds),
    };
    Some(told.chain([same]).collect())
}

impl Finding {
    fn of(molecules: [&Molecule; 2], finding: &domain::Finding, text: String) -> Self {
        let [a, b] = molecules;
        let bond =
            |side: usize, (x, y): (u32, u32)| [x, y].map(|atom| molecules[side].number(atom));
        let bonds = |side: usize| {
            let bonds = finding.only_in[side].iter();
            bonds.map(|&ends| bond(side, ends)).collect()
        };
        let changed = finding.order_changed.iter();
        let groups: Vec<&Moved> = match &finding.change {
            Change::Moved(moved) | Change::Rehung(moved) => vec![moved],
            Change::Exchanged(both) => both.iter().collect(),
            Change::Chain { chain, within } => vec![chain, within],
            Change::Divided { within, .. } => vec![within],
            _ => Vec::new(),
        };
        Self {
            kind: finding.change.as_str(),
            a: numbers(a, &finding.change.atoms(0)),
            b: numbers(b, &finding.change.atoms(1)),
            groups: groups
                .into_iter()
                .map(|moved| FoundGroup::of(molecules, moved))
                .collect(),
            only_in_a: bonds(0),
            only_in_b: bonds(1),
            order_changed: changed
                .map(|&[old, new]| [bond(0, old), bond(1, new)])
                .collect(),
            text,
        }
    }
}

impl FoundGroup {
    fn of([a, b]: [&Molecule; 2], moved: &Moved) -> Self {
        let [name_a, name_b] = moved.groups.each_ref().map(|group| match group.name {
            Some(name) => name.to_owned(),
            None => group.formula.to_string(),
        });
        Self {
            name_a,
            name_b,
            atoms_a: numbers(a, &moved.groups[0].atoms),
            atoms_b: numbers(b, &moved.groups[1].atoms),
            on_a: a.number(moved.seats[0].atom),
            on_b: b.number(moved.seats[1].atom),
        }
    }
}
