//! What both records are made of, side by side: functional groups, rings, branch points, chains.

use std::{
    collections::{BTreeMap, BTreeSet, HashMap},
    io::{self, Write},
};

use molkin_relate::wire::{BranchPoint, FunctionalGroup, Pair, RingSystem, Sides};

use crate::output::style::Style;

use super::{
    atoms::Labels,
    layout::{COLUMN, Extent, columns, fitting},
};

/// Chains of fewer atoms are not worth a word.
const SHORTEST_CHAIN: usize = 3;

/// Of larger functional groups a screen has the first atom and their number.
const MOST_GROUP_ATOMS: usize = 6;

/// Writes what differs in two columns; with all extent, what agrees as well.
pub(super) fn write(
    out: &mut impl Write,
    style: Style,
    extent: Extent,
    pair: &Pair,
    labels: &[Labels<'_>; 2],
) -> io::Result<()> {
    let sides = Beside {
        labels,
        extent,
        image: pair
            .atom_map
            .iter()
            .flatten()
            .map(|&[a, b]| (a, b))
            .collect(),
    };
    let mut rows = Vec::new();
    if let Some(groups) = &pair.functional_groups {
        rows.push(("groups", sides.groups(groups)));
    }
    if let Some(rings) = &pair.rings {
        rows.push(("rings", sides.rings(rings)));
    }
    // Between rings a chain is short or a part of a branch; there it is for those who ask for all.
    let rings = pair.rings.as_ref();
    let chains_matter = extent == Extent::Full
        || rings.is_none_or(|rings| rings.a.is_empty() || rings.b.is_empty());
    if let Some(branching) = &pair.branch_points {
        rows.push((
            "branch points",
            sides.points([&branching.a.points, &branching.b.points]),
        ));
        if chains_matter {
            let chains = [&branching.a.chains, &branching.b.chains];
            let points = [&branching.a.points, &branching.b.points];
            rows.push(("main chains", sides.chains(chains, points)));
        }
    }
    rows.retain(|(_, items)| items.iter().any(|items| !items.is_empty()));
    if rows.is_empty() {
        return Ok(());
    }
    columns(out, style, "", ["in A", "in B"].map(str::to_owned))?;
    for (label, items) in rows {
        let cells = items.map(|items| match items.is_empty() {
            true => "–".to_owned(),
            false => fitting(items, extent, COLUMN),
        });
        columns(out, style, label, cells)?;
    }
    Ok(())
}

/// Both records with the map between them, in numbers from 1.
struct Beside<'p> {
    labels: &'p [Labels<'p>; 2],
    extent: Extent,
    image: HashMap<u32, u32>,
}

impl Beside<'_> {
    /// "aldehyde (C7, O8)".
    fn groups(&self, groups: &Sides<Vec<FunctionalGroup>>) -> [Vec<String>; 2] {
        let named = |side: usize, groups: &[FunctionalGroup]| {
            let groups = groups.iter().map(|group| {
                let atoms = group.atoms.iter().map(|&atom| self.labels[side].atom(atom));
                let mut atoms: Vec<String> = atoms.collect();
                if self.extent == Extent::Screen && atoms.len() > MOST_GROUP_ATOMS {
                    let count = atoms.len();
                    atoms.truncate(1);
                    atoms.push(format!("… {count} atoms"));
                }
                format!("{} ({})", group.name.unwrap_or("unnamed"), atoms.join(", "))
            });
            groups.collect()
        };
        [named(0, &groups.a), named(1, &groups.b)]
    }

    /// "2 × 6", "5+6 fused".
    fn rings(&self, rings: &Sides<Vec<RingSystem>>) -> [Vec<String>; 2] {
        let counted = [&rings.a, &rings.b].map(|systems| {
            let mut counts: BTreeMap<String, usize> = BTreeMap::new();
            for system in systems {
                *counts.entry(ring_system(system)).or_default() += 1;
            }
            counts
        });
        if self.extent == Extent::Screen && counted[0] == counted[1] {
            return [Vec::new(), Vec::new()];
        }
        counted.map(|counts| {
            let words = counts.into_iter().map(|(system, count)| match count {
                1 => system,
                _ => format!("{count} × {system}"),
            });
            words.collect()
        })
    }

    /// "C3 (ring + 2)": a branch of two atoms outside the ring.
    fn points(&self, points: [&Vec<BranchPoint>; 2]) -> [Vec<String>; 2] {
        let alike = |a: &BranchPoint, b: &BranchPoint| {
            self.image.get(&a.atom) == Some(&b.atom)
                && (&a.branches, a.ring_bonds) == (&b.branches, b.ring_bonds)
        };
        let [own, others] = points;
        let same: BTreeSet<(u32, u32)> = match self.extent {
            Extent::Full => BTreeSet::new(),
            Extent::Screen => own
                .iter()
                .flat_map(|a| {
                    let partner = others.iter().find(|b| alike(a, b));
                    partner.map(|b| (a.atom, b.atom))
                })
                .collect(),
        };
        let said = |side: usize, points: &[BranchPoint], is_same: &dyn Fn(u32) -> bool| {
            let points = points.iter().filter(|point| !is_same(point.atom));
            points
                .map(|point| branch_point(&self.labels[side], point))
                .collect()
        };
        [
            said(0, own, &|atom| same.iter().any(|pair| pair.0 == atom)),
            said(1, others, &|atom| same.iter().any(|pair| pair.1 == atom)),
        ]
    }

    /// "5 atoms, C1 to C5, branches at C2".
    fn chains(
        &self,
        chains: [&Vec<Vec<u32>>; 2],
        points: [&Vec<BranchPoint>; 2],
    ) -> [Vec<String>; 2] {
        let laid = |chain: &Vec<u32>| -> Option<Vec<u32>> {
            let images: Option<Vec<u32>> = chain
                .iter()
                .map(|atom| self.image.get(atom).copied())
                .collect();
            images.map(lower_end_first)
        };
        let is_kept =
            |chain: &Vec<u32>| laid(chain).is_some_and(|images| chains[1].contains(&images));
        let kept: Vec<Vec<u32>> = match self.extent {
            Extent::Full => Vec::new(),
            Extent::Screen => chains[0]
                .iter()
                .filter(|chain| is_kept(chain))
                .cloned()
                .collect(),
        };
        let laid_kept: Vec<Vec<u32>> = kept.iter().filter_map(laid).collect();
        let said = |side: usize, kept: &[Vec<u32>]| {
            let chains = chains[side].iter();
            let chains =
                chains.filter(|chain| chain.len() >= SHORTEST_CHAIN && !kept.contains(chain));
            chains
                .map(|chain| self.chain(side, chain, points[side]))
                .collect()
        };
        [said(0, &kept), said(1, &laid_kept)]
    }

    fn chain(&self, side: usize, chain: &[u32], points: &[BranchPoint]) -> String {
        let labels = &self.labels[side];
        let atoms = match (self.extent, chain) {
            (Extent::Screen, [first, .., last]) => {
                format!("{} to {}", labels.atom(*first), labels.atom(*last))
            }
            _ => labels.chain(chain).replace('–', "– "),
        };
        let branching = points.iter().filter(|point| chain.contains(&point.atom));
        let branching: Vec<String> = branching.map(|point| labels.atom(point.atom)).collect();
        let branches = match branching.split_last() {
            None => String::new(),
            Some((last, [])) => format!(", branches at {last}"),
            Some((last, rest)) => format!(", branches at {} and {last}", rest.join(", ")),
        };
        format!("{} atoms, {atoms}{branches}", chain.len())
    }
}

fn lower_end_first(mut chain: Vec<u32>) -> Vec<u32> {
    if chain.first() > chain.last() {
        chain.reverse();
    }
    chain
}

fn ring_system(system: &RingSystem) -> String {
    if system.sizes.is_empty() {
        return format!("system of {} atoms", system.atoms.len());
    }
    let sizes: Vec<String> = system.sizes.iter().map(usize::to_string).collect();
    let joins: String = system.joins.iter().map(|join| format!(" {join}")).collect();
    format!("{}{joins}", sizes.join("+"))
}

fn branch_point(labels: &Labels<'_>, point: &BranchPoint) -> String {
    let ring = match point.ring_bonds {
        0 => None,
        2 => Some("ring".to_owned()),
        bonds => Some(format!("{bonds} ring bonds")),
    };
    let sizes = point.branches.iter().map(usize::to_string);
    let parts: Vec<String> = ring.into_iter().chain(sizes).collect();
    format!("{} ({})", labels.atom(point.atom), parts.join(" + "))
}
