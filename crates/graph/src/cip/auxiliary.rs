//! Auxiliary descriptors: those of stereo units inside a digraph, as seen in that digraph.
//!
//! Each unit is labelled with the path back to the root as one of its ligands, the outermost first, so
//! that rules 3 to 5 find descriptors farther out. One atom may have other descriptors in other
//! branches.

use std::collections::HashMap;

use crate::Shape;

use super::{
    budget::{Budget, Exhausted},
    decision,
    digraph::{Digraph, Kind},
    units::Unit,
};

/// A unit at a node: the node, the unit, and which of its ends lies there.
struct Site {
    node: u32,
    unit: usize,
    end: usize,
}

/// Labels the units at the given nodes.
pub(super) fn describe(
    digraph: &mut Digraph<'_>,
    nodes: impl Iterator<Item = u32>,
    units: &[Unit],
    budget: &mut Budget<'_>,
) -> Result<(), Exhausted> {
    let mut sites = sites(digraph, nodes, units);
    sites.sort_by_key(|site| std::cmp::Reverse(digraph.node(site.node).sphere));
    let spheres = |a: &Site, b: &Site| digraph.node(a.node).sphere == digraph.node(b.node).sphere;
    let lengths: Vec<usize> = sites.chunk_by(spheres).map(<[Site]>::len).collect();
    let mut rest = sites.as_slice();
    for length in lengths {
        let (sphere, farther_in) = rest.split_at(length);
        rest = farther_in;
        // Units of one sphere do not see each other.
        let mut found = Vec::with_capacity(length);
        for site in sphere {
            found.push(label(digraph, site, units, budget)?);
        }
        for (site, label) in sphere.iter().zip(found) {
            let of_bond = units[site.unit].shape == Shape::DoubleBond;
            digraph.node_mut(site.node).labels[usize::from(of_bond)] = label;
        }
    }
    Ok(())
}

fn sites(digraph: &Digraph<'_>, nodes: impl Iterator<Item = u32>, units: &[Unit]) -> Vec<Site> {
    let mut places: HashMap<u32, Vec<(usize, usize)>> = HashMap::new();
    for (unit, of) in units.iter().enumerate() {
        for (end, &atom) in of.ends[..of.end_count()].iter().enumerate() {
            places.entry(atom).or_default().push((unit, end));
        }
    }
    let mut sites = Vec::new();
    for node in nodes {
        let here = digraph.node(node);
        if here.kind != Kind::Atom {
            continue;
        }
        let found = places.get(&here.atom).into_iter().flatten();
        sites.extend(found.map(|&(unit, end)| Site { node, unit, end }));
    }
    sites
}

fn label(
    digraph: &mut Digraph<'_>,
    site: &Site,
    units: &[Unit],
    budget: &mut Budget<'_>,
) -> Result<Option<super::Label>, Exhausted> {
    let unit = &units[site.unit];
    if unit.end_count() == 1 {
        return decision::auxiliary_label(digraph, unit, &[(site.node, 0)], budget);
    }
    // Only the end nearer to the root bears the descriptor of a bond or axis.
    let Some(far) = unit.other_end(digraph, site.node, site.end, budget)? else {
        return Ok(None);
    };
    let nodes = [(site.node, site.end), (far, 1 - site.end)];
    decision::auxiliary_label(digraph, unit, &nodes, budget)
}
