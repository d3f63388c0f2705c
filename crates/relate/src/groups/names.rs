//! Names of functional groups: a table of examples, looked up by the graph of the group.

use std::{collections::HashMap, sync::OnceLock};

use molkin_formats::{Record, smiles};
use molkin_graph::{GraphOrderer, Limits, Orderer};

use crate::{Structure, constitution::Constitution};

use super::Marked;

/// A name, a structure that has the group and no other, and a near miss: one that has no such group.
fn rows() -> impl Iterator<Item = [&'static str; 3]> {
    let table = include_str!("names.tsv");
    table.lines().skip(1).filter_map(|line| {
        let mut cells = line.split('\t');
        Some([cells.next()?, cells.next()?, cells.next()?])
    })
}

/// The name of the group with this certificate.
pub(super) fn of(certificate: &[u64]) -> Option<&'static str> {
    static NAMES: OnceLock<HashMap<Vec<u64>, &'static str>> = OnceLock::new();
    let names = NAMES.get_or_init(|| {
        let mut examples = Examples::new();
        rows()
            .filter_map(|[name, example, _]| Some((examples.certificate(example)?, name)))
            .collect()
    });
    names.get(certificate).copied()
}

/// Works on one example after another in the same memory: the table is most of what a single pair
/// costs.
struct Examples {
    reader: smiles::Reader,
    record: Record,
    orderer: Orderer,
    graphs: GraphOrderer,
}

impl Examples {
    fn new() -> Self {
        Self {
            reader: smiles::Reader::default(),
            record: Record::default(),
            orderer: Orderer::new(Limits::default()),
            graphs: GraphOrderer::new(Limits::default()),
        }
    }

    /// The certificate of the one group of a structure.
    fn certificate(&mut self, example: &str) -> Option<Vec<u64>> {
        self.reader.read_into(example, 1, &mut self.record).ok()?;
        let molecule = std::mem::take(&mut self.record.molecule);
        let structure = Structure::new(&mut self.orderer, molecule).ok()?;
        let constitution = Constitution::of(&structure);
        let marked = Marked::of(&constitution);
        let groups = marked.groups();
        let [group] = groups.as_slice() else {
            return None;
        };
        let (colours, edges) = marked.graph(group);
        let order = self.graphs.order(&colours, &edges).ok()?;
        Some(order.certificate.to_vec())
    }
}

#[cfg(test)]
mod tests {
    use std::collections::BTreeSet;

    use molkin_graph::Orderer;

    use super::*;
    use crate::{Structure, functional_groups};

    fn names_in(smiles: &str) -> Vec<Option<&'static str>> {
        let limits = Limits::default();
        let mut orderer = Orderer::new(limits);
        let molecule = smiles::parse(smiles).unwrap_or_else(|error| panic!("{smiles}: {error}"));
        let structure = Structure::new(&mut orderer, molecule).unwrap();
        let groups = functional_groups(&structure, &limits).unwrap();
        groups.iter().map(|group| group.name).collect()
    }

    #[test]
    fn every_example_has_its_name_alone_and_no_near_miss_has_it() {
        let mut faults = Vec::new();
        let mut seen = BTreeSet::new();
        for [name, example, near_miss] in rows() {
            assert!(seen.insert(name), "{name} twice");
            let (own, other) = (names_in(example), names_in(near_miss));
            if own != [Some(name)] || other.contains(&Some(name)) {
                faults.push(format!("{name}: {example} {own:?}, {near_miss} {other:?}"));
            }
        }
        assert!(faults.is_empty(), "{}", faults.join("\n"));
        assert!(seen.len() >= 80, "{} names", seen.len());
    }
}
