//! Plain graphs in graph6: ../shared/data/graphs. Without MOLKIN_FULL a sample of each family.

use std::{
    collections::{BTreeMap, HashMap},
    path::{Path, PathBuf},
};

use molkin_graph::{GraphOrderer, Limits};
use molkin_tests::{Graph, Numbers, Table, Tally, read_text, shared};
use rstest::rstest;

/// Random renumberings of each graph.
const COPIES: usize = 20;

/// Steps within which a graph has to be ordered to count as finished: a tenth of the default limit.
const STEPS: u64 = 10_000_000;

fn full() -> bool {
    std::env::var_os("MOLKIN_FULL").is_some()
}

fn orderer() -> GraphOrderer {
    GraphOrderer::new(Limits {
        order_steps: STEPS,
        ..Limits::default()
    })
}

fn certificate(orderer: &mut GraphOrderer, graph: &Graph) -> Option<Vec<u64>> {
    let colours = vec![0; graph.vertices as usize];
    let order = orderer.order(&colours, &graph.edges).ok()?;
    Some(order.certificate.to_vec())
}

fn files(folder: &Path) -> Vec<PathBuf> {
    let entries = std::fs::read_dir(folder).unwrap();
    let mut files: Vec<_> = entries.map(|entry| entry.unwrap().path()).collect();
    files.retain(|path| path.to_string_lossy().contains(".g6"));
    files.sort();
    files
}

/// Every renumbered copy has the same certificate, and different graphs of a file have different
/// ones: the files list each graph once.
#[rstest]
#[case::fullerenes("fullerenes", 40, 900)]
#[case::regular("regular", 7, 750)]
#[case::strongly_regular("srg", 9, 60)]
fn each_graph_has_one_certificate(
    #[case] family: &'static str,
    #[case] every: usize,
    #[case] at_least: usize,
) {
    let Some(folder) = shared("graphs") else {
        return;
    };
    let every = if full() { 1 } else { every };
    let mut orderer = orderer();
    let mut numbers = Numbers::new(31);
    let mut tally = Tally::new(family);
    for path in files(&folder.join(family)) {
        let mut known = HashMap::new();
        for (at, graph) in Graph::read(&path).iter().enumerate().step_by(every) {
            let name = || format!("{} graph {at}", path.display());
            let own = certificate(&mut orderer, graph);
            let copies = if full() { COPIES } else { 3 };
            let same = (0..copies)
                .all(|_| certificate(&mut orderer, &graph.renumbered(&mut numbers)) == own);
            tally.case(own.is_some(), || format!("{}: step limit", name()));
            tally.case(same, || format!("{}: a copy differs", name()));
            let earlier = known.insert(own, at);
            tally.case(earlier.is_none(), || format!("{} is {earlier:?}", name()));
        }
    }
    tally.finish(at_least);
}

/// Pairs that are hard to tell apart (BREC): isomorphic or not as nauty says.
#[test]
fn pairs_that_are_hard_to_tell_apart() {
    let Some(folder) = shared("graphs") else {
        return;
    };
    let table = Table::read(&folder.join("brec_pairs.tsv"));
    let mut orderer = orderer();
    let mut numbers = Numbers::new(37);
    let mut tally = Tally::new("BREC pairs");
    let columns = ["category", "pair", "relation_by_nauty", "g6_a", "g6_b"];
    for [category, pair, relation, a, b] in table.columns(columns) {
        let [a, b] = [a, b].map(Graph::parse);
        let [own, other] = [&a, &b].map(|graph| certificate(&mut orderer, graph));
        let equal = relation == "isomorphic";
        tally.case(own.is_some() && (own == other) == equal, || {
            format!("{category} {pair}: wrong")
        });
        let copies = if full() { COPIES } else { 2 };
        let same =
            (0..copies).all(|_| certificate(&mut orderer, &a.renumbered(&mut numbers)) == own);
        tally.case(same, || format!("{category} {pair}: a copy differs"));
    }
    tally.finish(800);
}

/// Graphs made to be hard (Cai, Fürer & Immerman 1992, and others), few of them of molecular degree.
/// Whatever the numbering, a graph has one certificate or reaches the limit; of degree four or less
/// it never does.
#[test]
fn graphs_made_to_be_hard() {
    let Some(folder) = shared("graphs/cfi") else {
        return;
    };
    let mut orderer = orderer();
    let mut numbers = Numbers::new(41);
    let mut tally = Tally::new("graphs made to be hard");
    let mut found = BTreeMap::new();
    let mut shares: BTreeMap<String, (usize, usize)> = BTreeMap::new();
    for path in files(&folder) {
        let name = path.file_stem().unwrap().to_string_lossy().into_owned();
        let graph = &Graph::read(&path)[0];
        if !full() && graph.vertices > 120 {
            continue;
        }
        let own = certificate(&mut orderer, graph);
        let copies = if full() { COPIES } else { 2 };
        for _ in 0..copies {
            let copy = certificate(&mut orderer, &graph.renumbered(&mut numbers));
            let agrees = copy.is_none() || own.is_none() || copy == own;
            tally.case(agrees, || format!("{name}: a copy differs"));
        }
        tally.case(own.is_some() || graph.degree() > 4, || {
            format!("{name}: step limit at degree {}", graph.degree())
        });
        let family = name.split(['_', '-']).next().unwrap().to_owned();
        let share = shares.entry(family).or_default();
        share.0 += usize::from(own.is_some());
        share.1 += 1;
        found.insert(name, own);
    }
    eprintln!("within {STEPS} steps: {shares:?}");
    for line in read_text(&folder.join("pairs.tsv")).lines().skip(1) {
        let mut names = line.split('\t').map(|name| name.trim_end_matches(".mat"));
        let (a, b) = (names.next().unwrap(), names.next().unwrap());
        if let (Some(Some(a_own)), Some(Some(b_own))) = (found.get(a), found.get(b)) {
            tally.case(a_own != b_own, || format!("{a} and {b} are not isomorphic"));
        }
    }
    tally.finish(100);
}
