//! From ranked ligands to a label.

use crate::Shape;

use super::{
    Label, auxiliary,
    budget::{Budget, Exhausted},
    digraph::{Digraph, NONE},
    ranking::Ranking,
    rules,
    units::{Place, Unit, ligand_nodes},
};

/// One end of a unit, or a tetrahedral centre, with its ranked ligands.
#[derive(Debug, Clone)]
struct End {
    ranking: Ranking,
    /// For each ligand of the unit at this end its position in the ranking; `None` for a lone pair.
    places: Vec<Option<u32>>,
}

/// A unit in its digraphs: one for each end of a unit that is labelled itself, one for both ends of a
/// unit inside the digraph of another.
#[derive(Debug, Clone)]
struct Contest {
    ends: Vec<End>,
}

/// Labels the unit that the digraphs, one for each end, are rooted at.
pub(super) fn label(
    digraphs: &mut [Digraph<'_>],
    unit: &Unit,
    units: &[Unit],
    budget: &mut Budget<'_>,
) -> Result<Option<Label>, Exhausted> {
    let mut ends = Vec::with_capacity(digraphs.len());
    for (index, digraph) in digraphs.iter_mut().enumerate() {
        ends.push(End::new(
            digraph,
            Digraph::ROOT,
            unit.ligands_at(index),
            budget,
        )?);
    }
    if units.len() > 1 {
        for (digraph, end) in digraphs.iter_mut().zip(&ends) {
            if end.ranking.is_tied() {
                auxiliary::describe(digraph, end.ranking.tied_nodes(), units, budget)?;
            }
        }
    }
    let digraphs: Vec<&Digraph<'_>> = digraphs.iter().collect();
    Contest { ends }.decide(&digraphs, unit, budget)
}

/// Labels a unit at nodes inside a digraph, with the descriptors found so far farther out.
pub(super) fn auxiliary_label(
    digraph: &mut Digraph<'_>,
    unit: &Unit,
    nodes: &[(u32, usize)],
    budget: &mut Budget<'_>,
) -> Result<Option<Label>, Exhausted> {
    let mut ends = Vec::with_capacity(nodes.len());
    for &(node, index) in nodes {
        ends.push(End::new(digraph, node, unit.ligands_at(index), budget)?);
    }
    Contest { ends }.decide(&vec![&*digraph; nodes.len()], unit, budget)
}

impl End {
    /// Ranks ligands by rules 1 and 2.
    fn new(
        digraph: &mut Digraph<'_>,
        centre: u32,
        ligands: &[Place],
        budget: &mut Budget<'_>,
    ) -> Result<Self, Exhausted> {
        let nodes = ligand_nodes(digraph, centre, ligands, budget)?;
        let present = nodes.iter().flatten().copied();
        let mut ranking = Ranking::new(digraph, centre, present, budget)?;
        rules::rank_by_constitution(&mut ranking, digraph, budget)?;
        let mut count = 0;
        let places = nodes
            .iter()
            .map(|node| {
                node.map(|_| {
                    count += 1;
                    count - 1
                })
            })
            .collect();
        Ok(Self { ranking, places })
    }

    /// Whether an odd permutation brings the ligands into falling order. A lone pair comes last.
    fn is_odd(&self) -> bool {
        let rank = |place: Option<u32>| place.map_or(0, |ligand| self.ranking.rank(ligand));
        let mut odd = false;
        for (at, &first) in self.places.iter().enumerate() {
            for &second in &self.places[at + 1..] {
                odd ^= rank(first) < rank(second);
            }
        }
        odd
    }
}

impl Contest {
    fn is_tied(&self) -> bool {
        self.ends.iter().any(|end| end.ranking.is_tied())
    }

    fn decide(
        mut self,
        digraphs: &[&Digraph<'_>],
        unit: &Unit,
        budget: &mut Budget<'_>,
    ) -> Result<Option<Label>, Exhausted> {
        for (end, digraph) in self.ends.iter_mut().zip(digraphs) {
            rules::rank_by_geometry(&mut end.ranking, digraph, budget)?;
        }
        if !self.is_tied() {
            return Ok(Some(Label::new(
                unit.shape,
                unit.odd ^ self.is_odd(),
                false,
            )));
        }
        // Rule 5 is the one rule that reflection reverses. A label that the mirror image would share is
        // reflection-invariant.
        let mut image = self.clone();
        let odd = self.finish(digraphs, unit, false, budget)?;
        let reflected = image.finish(digraphs, unit, true, budget)?;
        Ok(odd
            .zip(reflected)
            .map(|(odd, reflected)| Label::new(unit.shape, unit.odd ^ odd, odd != reflected)))
    }

    fn is_odd(&self) -> bool {
        self.ends.iter().fold(false, |odd, end| odd ^ end.is_odd())
    }

    /// Rules 5 and 6. Whether an odd permutation brings the ligands into falling order. Rule 6 is for
    /// what is stereogenic although ligands are alike: a bridgehead with an idle mark and like
    /// ligands, as in adamantane, has no label.
    fn finish(
        &mut self,
        digraphs: &[&Digraph<'_>],
        unit: &Unit,
        mirrored: bool,
        budget: &mut Budget<'_>,
    ) -> Result<Option<bool>, Exhausted> {
        for (end, digraph) in self.ends.iter_mut().zip(digraphs) {
            rules::rank_by_handedness(&mut end.ranking, digraph, mirrored, budget)?;
        }
        if unit.idle && self.is_tied() {
            return Ok(None);
        }
        self.break_symmetry(digraphs, budget)
    }

    /// Rule 6 with each of the highest tied ligands as the reference. They are alike in all rules, so
    /// where they do not lead to one answer, there is none.
    fn break_symmetry(
        &self,
        digraphs: &[&Digraph<'_>],
        budget: &mut Budget<'_>,
    ) -> Result<Option<bool>, Exhausted> {
        let tied = self.ends.iter().zip(digraphs).find_map(|(end, digraph)| {
            let class = end.ranking.tied_ligands().into_iter().next()?;
            let atom = |&ligand: &u32| digraph.node(end.ranking.ligand_node(ligand)).atom;
            Some(class.iter().map(atom).collect::<Vec<u32>>())
        });
        let Some(references) = tied else {
            return Ok(Some(self.is_odd()));
        };
        let mut answer = None;
        for reference in references {
            if reference == NONE {
                return Ok(None);
            }
            let mut broken = self.clone();
            for (end, digraph) in broken.ends.iter_mut().zip(digraphs) {
                rules::rank_by_reference(&mut end.ranking, digraph, reference, budget)?;
            }
            let odd = broken.break_symmetry(digraphs, budget)?;
            if odd.is_none() || answer.is_some_and(|answer| Some(answer) != odd) {
                return Ok(None);
            }
            answer = odd;
        }
        Ok(answer)
    }
}

impl Label {
    /// The label for an arrangement of ligands in falling order.
    fn new(shape: Shape, odd: bool, reflected_differently: bool) -> Self {
        match (shape, odd, reflected_differently) {
            (Shape::Tetrahedral, true, false) => Self::R,
            (Shape::Tetrahedral, false, false) => Self::S,
            (Shape::Tetrahedral, true, true) => Self::PseudoR,
            (Shape::Tetrahedral, false, true) => Self::PseudoS,
            (Shape::Axis, true, false) => Self::M,
            (Shape::Axis, false, false) => Self::P,
            (Shape::Axis, true, true) => Self::PseudoM,
            (Shape::Axis, false, true) => Self::PseudoP,
            (Shape::DoubleBond, false, false) => Self::Z,
            (Shape::DoubleBond, true, false) => Self::E,
            (Shape::DoubleBond, false, true) => Self::ReflectedZ,
            (Shape::DoubleBond, true, true) => Self::ReflectedE,
        }
    }
}
