//! Names of substituents: a table of fragments, looked up by their graph.

use std::{collections::HashMap, sync::OnceLock};

use molkin_formats::smiles;
use molkin_graph::{Element, Formula, GraphOrderer, Limits, NormalAtom, Orderer};

use crate::mapping::Heavy;

use super::frame::{Frame, Graph, MOBILE};

/// A part of a record that hangs on the rest by one bond.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Substituent {
    /// Its non-hydrogen atoms, sorted.
    pub atoms: Vec<u32>,
    /// What the trade calls it, where the table has it.
    pub name: Option<&'static str>,
    /// Its atoms with their hydrogens; a charge may be shared with the rest and is left out.
    pub formula: Formula,
}

/// Vertex colours and classed edges.
type Coloured = (Vec<u64>, Vec<(u32, u32, u8)>);

impl Substituent {
    /// Atoms of the common numbering that hang on `through`, joined to the rest by a bond of `order`.
    pub(super) fn of(frame: &Frame, side: usize, atoms: &[u32], through: u32, order: u8) -> Self {
        let graph = &frame.graphs[side];
        let mut counts = Vec::new();
        for &atom in atoms {
            let atom = graph.atom(atom);
            counts.push((atom.element, 1));
            counts.push((Element::HYDROGEN, u32::from(atom.hydrogens)));
        }
        let mut sources = frame.sources(side, atoms);
        sources.sort_unstable();
        Self {
            atoms: sources,
            name: named(graph, atoms, through, order),
            formula: Formula::new(counts, 0),
        }
    }
}

/// The name of a part of a record that hangs by `through` on the rest, joined by a bond of `order`; atoms
/// by position.
pub(in crate::explain) fn name(
    heavy: &Heavy,
    atoms: &[u32],
    through: u32,
    order: u8,
) -> Option<&'static str> {
    let graph = Graph::new(heavy.atoms.clone(), heavy.bonds.iter().copied());
    named(&graph, atoms, through, order)
}

fn named(graph: &Graph, atoms: &[u32], through: u32, order: u8) -> Option<&'static str> {
    // The bond of a sulfoxide or nitro group is written in more than one way.
    let separated = |seat: u32| {
        let charge = graph.atom(seat).charge;
        atoms.len() == 1 && !atoms.contains(&seat) && charge.is_some_and(|charge| charge > 0)
    };
    let in_one_way = !graph.neighbours(through).any(separated);
    in_one_way
        .then(|| name_of(&coloured(graph, atoms, through, order)))
        .flatten()
}

fn coloured(graph: &Graph, atoms: &[u32], through: u32, order: u8) -> Coloured {
    let place = |atom: u32| atoms.iter().position(|&other| other == atom);
    // Where the group is conjugated with a charge outside, its bond to there is mobile; of a single
    // oxygen it is then not known whether it is oxido or oxo.
    let is_one_of_two = atoms.len() == 1 && graph.atom(through).element.group() == Some(16);
    let order = if order == MOBILE && !is_one_of_two {
        1
    } else {
        order
    };
    let colours = atoms.iter().map(|&atom| {
        let by = if atom == through { order } else { 0 };
        colour(graph.atom(atom), by)
    });
    let edges = graph
        .bonds()
        .filter_map(|((a, b), order)| Some((place(a)? as u32, place(b)? as u32, order)));
    (colours.collect(), edges.collect())
}

/// Element, hydrogens, fixed charge and isotopes, and the order of the bond to the rest.
fn colour(atom: &NormalAtom, order: u8) -> u64 {
    let charge = atom.charge.unwrap_or(0) as u8;
    let mut colour = u64::from(atom.isotope.unwrap_or(0));
    for part in atom.labelled {
        colour = colour << 4 | u64::from(part);
    }
    for part in [order, charge, atom.hydrogens, atom.element.number()] {
        colour = colour << 8 | u64::from(part);
    }
    colour
}

/// The name of the substituent with this graph.
fn name_of((colours, edges): &Coloured) -> Option<&'static str> {
    static NAMES: OnceLock<(usize, HashMap<Vec<u64>, &'static str>)> = OnceLock::new();
    let (largest, names) = NAMES.get_or_init(|| {
        let mut orderer = Orderer::new(Limits::default());
        let graphs = rows().filter_map(|[name, text]| Some((name, graph_of(&mut orderer, text)?)));
        let graphs: Vec<_> = graphs.collect();
        let largest = graphs.iter().map(|(_, graph)| graph.0.len()).max();
        let named = graphs
            .iter()
            .filter_map(|(name, graph)| Some((certificate(graph)?, *name)));
        (largest.unwrap_or(0), named.collect())
    });
    if colours.len() > *largest {
        return None;
    }
    let own = certificate(&(colours.clone(), edges.clone()))?;
    names.get(&own).copied()
}

fn certificate((colours, edges): &Coloured) -> Option<Vec<u64>> {
    let mut orderer = GraphOrderer::new(Limits::default());
    let order = orderer.order(colours, edges).ok()?;
    Some(order.certificate.to_vec())
}

/// Name and SMILES, in which `*` is the rest of the record.
fn rows() -> impl Iterator<Item = [&'static str; 2]> {
    let table = include_str!("substituents.tsv");
    table.lines().skip(1).filter_map(|line| {
        let mut cells = line.split('\t');
        Some([cells.next()?, cells.next()?])
    })
}

/// The graph of a fragment of the table: the atom on `*` carries the order of that bond.
fn graph_of(orderer: &mut Orderer, text: &str) -> Option<Coloured> {
    let molecule = smiles::parse(text).ok()?;
    let form = orderer.order(&molecule).ok()?.normal_form();
    let rest = form
        .atoms
        .iter()
        .position(|atom| atom.element == Element::WILDCARD)? as u32;
    let skip = |at: u32| if at > rest { at - 1 } else { at };
    let mut by = vec![0; form.atoms.len()];
    let mut edges = Vec::new();
    for bond in &form.bonds {
        let order = bond.order.unwrap_or(MOBILE);
        match (bond.a == rest, bond.b == rest) {
            (true, _) => by[bond.b as usize] = order,
            (_, true) => by[bond.a as usize] = order,
            _ => edges.push((skip(bond.a), skip(bond.b), order)),
        }
    }
    let atoms = form.atoms.iter().zip(by);
    let atoms = atoms.filter(|(atom, _)| atom.element != Element::WILDCARD);
    Some((atoms.map(|(atom, by)| colour(atom, by)).collect(), edges))
}
