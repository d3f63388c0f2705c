//! One compared pair.

use molkin_graph::{Label, Limits, Molecule, OrderError, Orderer};
use serde::Serialize;

use crate::{
    Axes, Axis, Branching as DomainBranching, Explanation, Normaliser, PrepareError, Relation,
    StereoKind, Structure, Verdict, explain, kinds, relate,
    remarks::{self, Noted},
    same_apart_from, words,
};

use super::{
    Error, Finding, FunctionalGroup, Group, Input, Note, Prepared, RingSystem, Sides, Surplus,
    VERSION, Which, findings, numbers,
};

/// The result for one pair. Either `errors` or the fields from `relation` on are there.
#[derive(Debug, Clone, PartialEq, Eq, Serialize)]
pub struct Pair {
    /// Contract version.
    pub version: u32,
    /// The first record.
    pub a: Input,
    /// The second record.
    pub b: Input,
    /// `identical`, `stereo`, `constitutional` or `not-isomers`.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub relation: Option<&'static str>,
    /// The kind: the first that holds.
    #[serde(skip_serializing_if = "is_error")]
    pub kind: Kind,
    /// All kinds that hold.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub aspects: Option<Vec<&'static str>>,
    /// The axes that were overlooked; absent where none were.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub overlooked: Option<Vec<&'static str>>,
    /// The smallest set of axes apart from which the two are the same.
    #[serde(skip_serializing_if = "is_not_settled")]
    pub same_apart_from: Apart,
    /// Identical, but more than one sample fits.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub open: Option<bool>,
    /// One or two plain sentences.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub summary: Option<String>,
    /// Non-hydrogen atoms of A and B.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub atom_map: Option<Vec<[u32; 2]>>,
    /// Bonds under the map.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub bonds: Option<Bonds>,
    /// Mapped atoms with different hydrogen counts.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub hydrogens: Option<Vec<Hydrogens>>,
    /// What moved.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub findings: Option<Vec<Finding>>,
    /// What only one formula has, and where.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub left_over: Option<Sides<Surplus>>,
    /// How both records branch.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub branch_points: Option<Sides<Branching>>,
    /// The ring systems of both.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub rings: Option<Sides<Vec<RingSystem>>>,
    /// Functional groups that one has more often than the other.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub functional_groups: Option<Sides<Vec<FunctionalGroup>>>,
    /// Stereo elements that differ.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub stereo: Option<Vec<StereoEntry>>,
    /// On which everyday analysis the two can be told apart: common practice.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub analysis: Option<String>,
    /// Remarks.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub notes: Option<Vec<Note>>,
    /// Why there is no verdict.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub errors: Option<Vec<Error>>,
}

/// Axes, or null where no axes make the two the same; absent beside errors.
#[derive(Debug, Clone, PartialEq, Eq, Serialize)]
#[serde(untagged)]
pub enum Apart {
    /// Axes, or null.
    Axes(Option<Vec<&'static str>>),
    /// No verdict at all, or none found within the limits.
    NotSettled,
}

fn is_not_settled(apart: &Apart) -> bool {
    *apart == Apart::NotSettled
}

fn words_of(axes: Axes) -> Vec<&'static str> {
    axes.iter().map(Axis::as_str).collect()
}

/// The kind field: null for identical records, absent beside errors.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Serialize)]
#[serde(untagged)]
pub enum Kind {
    /// A kind, or null.
    Verdict(Option<&'static str>),
    /// No verdict at all.
    NoVerdict,
}

fn is_error(kind: &Kind) -> bool {
    *kind == Kind::NoVerdict
}

/// A bond of A and the bond of B it is mapped to.
pub type BondPair = [[u32; 2]; 2];

/// Bonds under the map.
#[derive(Debug, Clone, PartialEq, Eq, Serialize)]
pub struct Bonds {
    /// How many both have, changed orders included.
    pub kept: usize,
    /// Bonds that only A has, in A's numbers.
    pub only_in_a: Vec<[u32; 2]>,
    /// Bonds that only B has, in B's numbers.
    pub only_in_b: Vec<[u32; 2]>,
    /// Kept bonds of different order.
    pub order_changed: Vec<BondPair>,
    /// Whether the distance is proved least.
    pub minimal: bool,
    /// Proved lower bound on the bonds that only one has.
    pub at_least: usize,
    /// Whether the two are unrelated in structure; null where the search ended too early to tell.
    pub unrelated: Option<bool>,
}

/// A mapped pair of atoms with different hydrogen counts.
#[derive(Debug, Clone, PartialEq, Eq, Serialize)]
pub struct Hydrogens {
    /// Atom of A.
    pub a: u32,
    /// Atom of B.
    pub b: u32,
    /// Hydrogens in A.
    pub count_a: u8,
    /// Hydrogens in B.
    pub count_b: u8,
}

/// How one record branches.
#[derive(Debug, Clone, PartialEq, Eq, Serialize)]
pub struct Branching {
    /// Atoms with three or more non-hydrogen neighbours.
    pub points: Vec<BranchPoint>,
    /// A longest chain of each part outside rings.
    pub chains: Vec<Vec<u32>>,
}

/// A branch point.
#[derive(Debug, Clone, PartialEq, Eq, Serialize)]
pub struct BranchPoint {
    /// The atom.
    pub atom: u32,
    /// Sizes of the branches outside rings, in non-hydrogen atoms.
    pub branches: Vec<usize>,
    /// Bonds of the atom that lie in rings.
    pub ring_bonds: usize,
}

/// A stereo element that differs.
#[derive(Debug, Clone, PartialEq, Eq, Serialize)]
pub struct StereoEntry {
    /// Centre or ends in A.
    pub a: Vec<u32>,
    /// Centre or ends in B.
    pub b: Vec<u32>,
    /// `tetrahedral`, `double-bond`, `axis`, `square-planar`, `trigonal-bipyramidal` or `octahedral`.
    pub element: &'static str,
    /// CIP label in A, where it has one.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub label_a: Option<&'static str>,
    /// CIP label in B, where it has one.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub label_b: Option<&'static str>,
    /// `inverted`, `rearranged`, `marked-only-in-a`, `marked-only-in-b` or `group-differs`.
    pub change: &'static str,
    /// The stereo group of the mark in A, where it has one.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub group_a: Option<Group>,
    /// The stereo group of the mark in B, where it has one.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub group_b: Option<Group>,
}

/// As [`compare`], with the counter-ions of a normaliser. Records of which axes are overlooked
/// ([`Prepared::overlooking`]) are compared in their forms.
pub fn compare_by(
    normaliser: &mut Normaliser,
    limits: &Limits,
    [a, b]: [&Prepared; 2],
    brief: bool,
) -> Pair {
    let mut pair = Pair::unsettled(a, b);
    match (a.parts(), b.parts()) {
        (Ok(left), Ok(right)) => {
            if let Err(error) = pair.settle(normaliser, limits, [left, right], brief) {
                let code = PrepareError::from(error).code();
                pair.errors = Some(vec![Error::without_place(code, error.to_string())]);
            }
        }
        (left, right) => {
            let errors = [(Which::A, left.err()), (Which::B, right.err())];
            let on_side = |(which, error): (_, Option<&Error>)| Some(error?.clone().on(which));
            pair.errors = Some(errors.into_iter().filter_map(on_side).collect());
        }
    }
    pair
}

/// Compares two records and says it in the terms of the contract. With `brief` the map and all that
/// needs it are left out.
///
/// What cannot be compared comes back with `errors`; this function does not fail.
pub fn compare(orderer: &mut Orderer, limits: &Limits, sides: [&Prepared; 2], brief: bool) -> Pair {
    let mut normaliser = Normaliser::from(std::mem::take(orderer));
    let pair = compare_by(&mut normaliser, limits, sides, brief);
    *orderer = normaliser.into_orderer();
    pair
}

fn overlooked(a: &Prepared, b: &Prepared) -> Option<Vec<&'static str>> {
    let axes: Axes = a.overlooked().iter().chain(b.overlooked().iter()).collect();
    (!axes.is_empty()).then(|| words_of(axes))
}

impl Pair {
    fn unsettled(a: &Prepared, b: &Prepared) -> Self {
        Self {
            version: VERSION,
            a: a.input().clone(),
            b: b.input().clone(),
            relation: None,
            kind: Kind::NoVerdict,
            aspects: None,
            overlooked: overlooked(a, b),
            same_apart_from: Apart::NotSettled,
            open: None,
            summary: None,
            atom_map: None,
            bonds: None,
            hydrogens: None,
            findings: None,
            left_over: None,
            branch_points: None,
            rings: None,
            functional_groups: None,
            stereo: None,
            analysis: None,
            notes: None,
            errors: None,
        }
    }

    fn settle(
        &mut self,
        normaliser: &mut Normaliser,
        limits: &Limits,
        [(a, notes_a), (b, notes_b)]: [(&Structure, &[Note]); 2],
        brief: bool,
    ) -> Result<(), OrderError> {
        let mut verdict = relate(normaliser.orderer(), a, b)?;
        if verdict.relation == Relation::Stereo(StereoKind::Undetermined) && self.overlooks_open() {
            verdict = Verdict {
                relation: Relation::Identical,
                open: true,
            };
        }
        let explained = (!brief).then(|| explain(a, b, verdict.relation, limits));
        let mut notes = Vec::new();
        let (apart, substances) = self.forms(normaliser, verdict.relation, [a, b], &mut notes);
        let kinds = kinds(verdict.relation, [a, b], apart, limits).unwrap_or_else(|error| {
            notes.push(Note::of(a.molecule(), remarks::kind_not_found(&error)));
            Vec::new()
        });
        self.relation = Some(verdict.relation.as_str());
        self.kind = Kind::Verdict(kinds.first().map(|kind| kind.as_str()));
        self.aspects = Some(kinds.iter().map(|kind| kind.as_str()).collect());
        self.open = Some(verdict.open);
        let kind = kinds.first().copied();
        let summary = words::summary(
            [a, b],
            &verdict,
            kind,
            substances.as_deref(),
            explained.as_ref(),
        );
        self.summary = Some(match &self.overlooked {
            Some(axes) => format!("With {} overlooked: {summary}", axes.join(", ")),
            None => summary,
        });
        // What is unmarked is why these verdicts are not firmer.
        let unsettled = verdict.open
            || matches!(
                verdict.relation,
                Relation::Stereo(StereoKind::Undetermined | StereoKind::Unresolved)
            );
        for (which, structure, own) in [(Which::A, a, notes_a), (Which::B, b, notes_b)] {
            let unmarked = unsettled.then(|| remarks::unmarked(structure)).flatten();
            let meso = (!brief).then(|| remarks::meso(structure)).flatten();
            let further = unmarked.into_iter().chain(meso);
            let own = own
                .iter()
                .cloned()
                .chain(further.map(|noted| Note::of(structure.molecule(), noted)));
            notes.extend(own.map(|note| note.on(which)));
        }
        let molecules = [a.molecule(), b.molecule()];
        // Notes on the pair name no atoms, so that either molecule will do.
        let of_pair = remarks::of_pair(a, b, verdict.relation).into_iter();
        notes.extend(of_pair.map(|noted| Note::of(molecules[0], noted)));
        if let Some(explained) = explained {
            for (which, structure) in [(Which::A, a), (Which::B, b)] {
                let own = unlabelled(structure, which, &explained, limits);
                let note = |noted| Note::of(structure.molecule(), noted).on(which);
                notes.extend(own.into_iter().map(note));
            }
            self.findings = findings::of([a, b], &explained);
            self.analysis = words::analysis([a, b], &verdict, kind, &explained);
            self.add_explanation(verdict.relation, explained, [a, b], &mut notes);
        }
        self.notes = Some(notes);
        Ok(())
    }

    /// Whether stereo is overlooked where one side leaves it open.
    fn overlooks_open(&self) -> bool {
        let mut axes = self.overlooked.iter().flatten();
        axes.any(|&axis| axis == Axis::OpenStereo.as_str())
    }

    /// Which axes tell the two apart, and what they are as substances.
    fn forms(
        &mut self,
        normaliser: &mut Normaliser,
        relation: Relation,
        [a, b]: [&Structure; 2],
        notes: &mut Vec<Note>,
    ) -> (Option<Axes>, Option<String>) {
        let apart = same_apart_from(normaliser, relation, a, b).and_then(|apart| {
            let substances = match apart {
                Some(axes) => words::forms::substances(normaliser, [a, b], axes)?,
                None => None,
            };
            Ok((apart, substances))
        });
        match apart {
            Ok((apart, substances)) => {
                self.same_apart_from = Apart::Axes(apart.map(words_of));
                (apart, substances)
            }
            Err(error) => {
                notes.push(Note::of(a.molecule(), remarks::forms_not_found(&error)));
                (None, None)
            }
        }
    }

    fn add_explanation(
        &mut self,
        relation: Relation,
        explained: Explanation,
        structures: [&Structure; 2],
        notes: &mut Vec<Note>,
    ) {
        if relation == Relation::Identical {
            return;
        }
        let [a, b] = structures.map(Structure::molecule);
        if !explained.stereo_least {
            let noted = Noted {
                code: "stereo-map-limit",
                atoms: Vec::new(),
                text: "There are too many equivalent atom maps to look at all; another may disturb fewer stereo elements.".to_owned(),
            };
            notes.push(Note::of(a, noted));
        }
        self.atom_map = Some(
            explained
                .atom_map
                .iter()
                .map(|&(from, to)| [a.number(from), b.number(to)])
                .collect(),
        );
        let bond_in = |molecule: &Molecule, &(first, second): &(u32, u32)| {
            [first, second].map(|atom| molecule.number(atom))
        };
        self.bonds = explained.bonds.map(|bonds| Bonds {
            kept: bonds.kept,
            only_in_a: bonds
                .only_in_a
                .iter()
                .map(|bond| bond_in(a, bond))
                .collect(),
            only_in_b: bonds
                .only_in_b
                .iter()
                .map(|bond| bond_in(b, bond))
                .collect(),
            order_changed: bonds
                .order_changed
                .iter()
                .map(|(old, new)| [bond_in(a, old), bond_in(b, new)])
                .collect(),
            minimal: bonds.minimal,
            at_least: bonds.at_least,
            unrelated: bonds.unrelated,
        });
        self.hydrogens = Some(
            explained
                .hydrogens
                .iter()
                .map(|h| Hydrogens {
                    a: a.number(h.a),
                    b: b.number(h.b),
                    count_a: h.count_a,
                    count_b: h.count_b,
                })
                .collect(),
        );
        let constitution_differs = !matches!(relation, Relation::Stereo(_));
        if relation == Relation::NotIsomers {
            self.left_over = Some(Sides::left_over(structures, &explained.left_over));
        }
        let both = |branching| Sides::of(branching, [a, b], Branching::of);
        self.branch_points = explained.branching.as_ref().map(both);
        let both = |rings| {
            Sides::of(rings, [a, b], |molecule, rings: &Vec<_>| {
                RingSystem::list(molecule, rings)
            })
        };
        self.rings = explained.rings.as_ref().map(both);
        let both = |groups| {
            Sides::of(groups, [a, b], |molecule, groups: &Vec<_>| {
                FunctionalGroup::list(molecule, groups)
            })
        };
        self.functional_groups = explained.functional_groups.as_ref().map(both);
        if !constitution_differs {
            self.stereo = Some(
                explained
                    .stereo
                    .iter()
                    .map(|difference| StereoEntry {
                        a: numbers(a, &difference.a),
                        b: numbers(b, &difference.b),
                        element: difference.geometry.as_str(),
                        label_a: difference.labels[0].map(Label::as_str),
                        label_b: difference.labels[1].map(Label::as_str),
                        change: difference.change.as_str(),
                        group_a: difference.groups[0].map(Group::of),
                        group_b: difference.groups[1].map(Group::of),
                    })
                    .collect(),
            );
        }
    }
}

/// Why elements of one side that differ have no label.
fn unlabelled(
    structure: &Structure,
    which: Which,
    explained: &Explanation,
    limits: &Limits,
) -> Vec<Noted> {
    let differing = explained.stereo.iter().map(|difference| match which {
        Which::A => (&difference.a, difference.labels[0]),
        Which::B => (&difference.b, difference.labels[1]),
    });
    let without_label = differing.filter(|(_, label)| label.is_none());
    let atoms: Vec<u32> = without_label
        .flat_map(|(atoms, _)| atoms)
        .copied()
        .collect();
    if atoms.is_empty() {
        return Vec::new();
    }
    let mut notes = remarks::unlabelled(structure, &structure.canonical().labels(limits));
    notes.retain(|note| note.atoms.iter().any(|atom| atoms.contains(atom)));
    notes
}

impl Branching {
    fn of(molecule: &Molecule, branching: &DomainBranching) -> Self {
        let points = branching.points.iter().map(|point| BranchPoint {
            atom: molecule.number(point.atom),
            branches: point.branches.clone(),
            ring_bonds: point.ring_bonds,
        });
        let chains = branching.chains.iter();
        let chains = chains.map(|chain| numbers(molecule, chain));
        Self {
            points: points.collect(),
            chains: chains.collect(),
        }
    }
}
