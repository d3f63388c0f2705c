//! Sequence rules 1b to 5 as values of nodes (P-92.2 to P-92.6).
//!
//! Each rule is applied to the whole digraph before the next. Rule 1a is the order in which
//! [`Ranking::new`] explores, Rule 4b is in [`super::likeness`], Rule 6 in [`super::decision`].

use super::{
    Label,
    budget::{Budget, Exhausted},
    digraph::{Digraph, Kind, Node},
    likeness,
    ranking::Ranking,
};

/// Rules 1b and 2, which need no descriptors.
pub(super) fn rank_by_constitution(
    ranking: &mut Ranking,
    digraph: &Digraph<'_>,
    budget: &mut Budget<'_>,
) -> Result<(), Exhausted> {
    ranking.refine(digraph, budget, |_, node| nearness(node))?;
    ranking.refine(digraph, budget, |_, node| node.substance.mass)
}

/// Rules 3 to 4c, on the auxiliary descriptors that the digraph bears.
pub(super) fn rank_by_geometry(
    ranking: &mut Ranking,
    digraph: &Digraph<'_>,
    budget: &mut Budget<'_>,
) -> Result<(), Exhausted> {
    ranking.refine(digraph, budget, |_, node| cis_before_trans(node))?;
    ranking.refine(digraph, budget, |_, node| {
        chiral_before_pseudoasymmetric(node)
    })?;
    likeness::rank(ranking, digraph, budget)?;
    ranking.refine(digraph, budget, |_, node| r_before_s(node))
}

/// Rule 5: R, M and seqCis precede S, P and seqTrans; or as the mirror image has it.
pub(super) fn rank_by_handedness(
    ranking: &mut Ranking,
    digraph: &Digraph<'_>,
    mirrored: bool,
    budget: &mut Budget<'_>,
) -> Result<(), Exhausted> {
    ranking.refine(digraph, budget, |_, node| {
        node.handedness()
            .map_or(0, |first| 1 + u64::from(first != mirrored))
    })
}

/// Rule 6 as proposed by Hanson et al. 2018: what leads to the reference precedes what does not.
pub(super) fn rank_by_reference(
    ranking: &mut Ranking,
    digraph: &Digraph<'_>,
    reference: u32,
    budget: &mut Budget<'_>,
) -> Result<(), Exhausted> {
    ranking.refine(digraph, budget, |_, node| {
        u64::from(node.atom == reference && node.kind != Kind::MultipleBond)
    })
}

/// Rule 1b: of two duplicates that whose original is nearer to the root comes first.
fn nearness(node: &Node) -> u64 {
    match node.kind {
        Kind::Atom | Kind::Hydrogen(_) => u64::MAX,
        Kind::RingClosure | Kind::MultipleBond => u64::MAX - 1 - u64::from(node.distance),
    }
}

/// Rule 3.
fn cis_before_trans(node: &Node) -> u64 {
    match node.labels[1] {
        Some(Label::Z) => 2,
        Some(Label::E) => 1,
        _ => 0,
    }
}

/// Rule 4a.
fn chiral_before_pseudoasymmetric(node: &Node) -> u64 {
    let value = |label: Label| {
        if label.is_chiral() {
            2
        } else {
            u64::from(label.is_pseudoasymmetric())
        }
    };
    node.labels
        .iter()
        .flatten()
        .map(|&label| value(label))
        .sum()
}

/// Rule 4c.
fn r_before_s(node: &Node) -> u64 {
    match node.labels[0] {
        Some(Label::PseudoR | Label::PseudoM) => 2,
        Some(Label::PseudoS | Label::PseudoP) => 1,
        _ => 0,
    }
}
