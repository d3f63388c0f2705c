//! Rule 4b: like descriptor pairs precede unlike ones (P-92.5.2).

use super::{
    budget::{Budget, Exhausted},
    digraph::Digraph,
    ranking::Ranking,
};

/// Whether pairs are formed with R (its class) or with S.
type Reference = bool;

/// Tells tied ligands apart by Rule 4b.
///
/// In each ligand the descriptor of the highest-ranked node, or set of nodes of equal rank, in the
/// nearest sphere that has any is the reference; where a set has as many of both, each is tried. All
/// descriptors of the ligand are paired with it. Ligands are compared by the sequences of pairs, best
/// first. Branches inside a ligand are not ranked by pairs of their own: with what they would be paired
/// depends on the ligand.
pub(super) fn rank(
    ranking: &mut Ranking,
    digraph: &Digraph<'_>,
    budget: &mut Budget<'_>,
) -> Result<(), Exhausted> {
    if !ranking.is_tied() {
        return Ok(());
    }
    let mut keys = vec![Vec::new(); ranking.ligand_count()];
    for class in ranking.tied_ligands() {
        for ligand in class {
            for reference in references(ranking, digraph, ligand) {
                let pairs = sequence(ranking, digraph, ligand, reference, budget)?;
                keys[ligand as usize].push(pairs);
            }
            keys[ligand as usize].sort_by(|a, b| b.cmp(a));
        }
    }
    ranking.split_ligands(&keys);
    Ok(())
}

fn pair(handedness: Option<bool>, reference: Reference) -> u64 {
    handedness.map_or(0, |own| 1 + u64::from(own == reference))
}

fn references(ranking: &Ranking, digraph: &Digraph<'_>, ligand: u32) -> Vec<Reference> {
    for class in ranking.levels(ligand).iter().flatten() {
        let nodes = class
            .iter()
            .map(|&entry| digraph.node(ranking.node_of(entry)));
        let found: Vec<bool> = nodes.filter_map(|node| node.handedness()).collect();
        if !found.is_empty() {
            let first = found.iter().filter(|&&first| first).count();
            return match first.cmp(&(found.len() - first)) {
                std::cmp::Ordering::Greater => vec![true],
                std::cmp::Ordering::Less => vec![false],
                std::cmp::Ordering::Equal => vec![true, false],
            };
        }
    }
    Vec::new()
}

/// The pairs of a ligand in hierarchical order.
fn sequence(
    ranking: &Ranking,
    digraph: &Digraph<'_>,
    ligand: u32,
    reference: Reference,
    budget: &mut Budget<'_>,
) -> Result<Vec<u64>, Exhausted> {
    let mut own = ranking.clone();
    own.refine_throughout(digraph, budget, |entry, node| {
        if entry.ligand == ligand {
            pair(node.handedness(), reference)
        } else {
            0
        }
    })?;
    let levels = own.levels(ligand);
    let entries = levels.iter().flatten().flatten();
    Ok(entries
        .map(|&entry| pair(digraph.node(own.node_of(entry)).handedness(), reference))
        .collect())
}
