//! What CIP labels depend on, and on what not.

use std::collections::BTreeMap;

use molkin_graph::{Canonical, Label, Labelling, Limits, Molecule, MoleculeBuilder};
use molkin_tests::{
    Comparer, Numbers, Tally, all_labels, definition_pairs, first_word, mirrored, read_text,
    renumbered, shared, with_hydrogens_written,
};
use rstest::rstest;

/// Numberings and Kekulé forms of each structure.
const TIMES: usize = 20;

/// Structures: the committed ones, and of the published ones those with stereo marks.
fn structures(each: usize) -> Vec<String> {
    let pairs = definition_pairs();
    let mut texts: Vec<String> = pairs
        .into_iter()
        .flat_map(|pair| [pair.a, pair.b])
        .collect();
    let files = [
        "cip/compounds.smi",
        "collections/chiral.smi.gz",
        "collections/vendor.smi",
        "collections/natural_products.smi.gz",
    ];
    for path in files.into_iter().filter_map(shared) {
        let text = read_text(&path);
        let marked: Vec<&str> = text
            .lines()
            .filter(|line| line.contains(['@', '/']))
            .collect();
        let step = (marked.len() / each).max(1);
        let chosen = marked.into_iter().step_by(step);
        texts.extend(chosen.map(|line| first_word(line).to_owned()));
    }
    texts
}

/// The labels by atoms.
fn labels(canonical: &Canonical) -> BTreeMap<[u32; 2], Label> {
    let elements = canonical.stereo_elements();
    let labels = canonical.labels(&Limits::default());
    elements
        .iter()
        .zip(labels)
        .filter_map(|(element, labelling)| {
            let [a, b] = element.centres;
            Some(([a.min(b), a.max(b)], labelling.label()?))
        })
        .collect()
}

/// The labels of bridgeheads whose marks say nothing about the compound. No rank tells which is which.
fn idle_labels(canonical: &Canonical) -> Vec<Label> {
    let labels = canonical
        .idle_bridgehead_labels(&Limits::default())
        .into_iter();
    let mut labels: Vec<Label> = labels.filter_map(Labelling::label).collect();
    labels.sort_unstable();
    labels
}

/// The labels by canonical rank: equal for two drawings of one compound.
fn ranked_labels(canonical: &Canonical) -> BTreeMap<[u32; 2], Label> {
    let ranks: BTreeMap<u32, u32> = canonical.order().zip(0..).collect();
    labels(canonical)
        .into_iter()
        .map(|(atoms, label)| {
            let [a, b] = atoms.map(|atom| ranks[&atom]);
            ([a.min(b), a.max(b)], label)
        })
        .collect()
}

/// The molecule with its mobile double bonds placed otherwise, if it is uncharged.
fn other_placement(
    molecule: &Molecule,
    canonical: &Canonical,
    numbers: &mut Numbers,
) -> Option<Molecule> {
    let form = canonical.normal_form();
    if molecule.atoms().any(|atom| atom.charge != 0) {
        return None;
    }
    let source = |at: u32| form.atoms[at as usize].source;
    let mobile = form.bonds.iter().filter(|bond| bond.order.is_none());
    let mut edges: Vec<(u32, u32)> = mobile
        .map(|bond| (source(bond.a), source(bond.b)))
        .collect();
    numbers.shuffle(&mut edges);
    let mut mates = BTreeMap::new();
    if edges.is_empty() || !place(&edges, &mut mates) {
        return None;
    }
    let mut builder = MoleculeBuilder::new();
    for atom in molecule.atoms() {
        builder.add_atom(*atom);
    }
    for (a, b, order) in molecule.bonds() {
        let order = match edges.contains(&(a, b)) || edges.contains(&(b, a)) {
            false => order,
            true if mates.get(&a) == Some(&b) => molkin_graph::BondOrder::Double,
            true => molkin_graph::BondOrder::Single,
        };
        builder.add_bond(a, b, order).unwrap();
    }
    for mark in molecule.drawn_stereo() {
        builder.add_stereo(*mark);
    }
    builder.build().ok()
}

/// Completes a perfect matching of the edges' atoms by trying.
fn place(edges: &[(u32, u32)], mates: &mut BTreeMap<u32, u32>) -> bool {
    let options = |atom: u32, mates: &BTreeMap<u32, u32>| -> Vec<u32> {
        let other = |&(a, b): &(u32, u32)| match () {
            () if a == atom => Some(b),
            () if b == atom => Some(a),
            () => None,
        };
        let others = edges.iter().filter_map(other);
        others.filter(|other| !mates.contains_key(other)).collect()
    };
    let open = edges.iter().flat_map(|&(a, b)| [a, b]);
    let open = open.filter(|atom| !mates.contains_key(atom));
    let Some(atom) = open.min_by_key(|&atom| options(atom, mates).len()) else {
        return true;
    };
    for other in options(atom, mates) {
        mates.insert(atom, other);
        mates.insert(other, atom);
        if place(edges, mates) {
            return true;
        }
        mates.remove(&atom);
        mates.remove(&other);
    }
    false
}

type Redraw = fn(&Molecule, &Canonical, &mut Numbers) -> Option<Molecule>;

fn other_numbering(molecule: &Molecule, _: &Canonical, numbers: &mut Numbers) -> Option<Molecule> {
    Some(renumbered(molecule, numbers))
}

fn hydrogens_written(molecule: &Molecule, _: &Canonical, _: &mut Numbers) -> Option<Molecule> {
    Some(with_hydrogens_written(molecule))
}

#[rstest]
#[case::numbering("labels of renumbered molecules", other_numbering, 4_000, TIMES)]
#[case::hydrogens("labels with written hydrogens", hydrogens_written, 4_000, 1)]
#[case::kekule("labels of other Kekulé forms", other_placement, 2_000, TIMES)]
fn labels_do_not_depend_on_the_drawing(
    #[case] name: &'static str,
    #[case] redraw: Redraw,
    #[case] at_least: usize,
    #[case] times: usize,
) {
    let mut comparer = Comparer::default();
    let mut numbers = Numbers::new(1);
    let mut tally = Tally::new(name);
    for text in structures(1_200) {
        let molecule = comparer.molecule(&text).unwrap();
        let Ok(canonical) = comparer.order(&molecule) else {
            continue;
        };
        let expected = (ranked_labels(&canonical), idle_labels(&canonical));
        let copies = (0..times).map_while(|_| redraw(&molecule, &canonical, &mut numbers));
        let copies: Vec<Molecule> = copies.collect();
        if copies.is_empty() {
            continue;
        }
        let same = copies.iter().all(|copy| {
            let canonical = comparer.order(copy).unwrap();
            (ranked_labels(&canonical), idle_labels(&canonical)) == expected
        });
        tally.case(same, || text.clone());
    }
    let there = shared("collections").is_some();
    tally.finish(if there { at_least } else { 100 });
}

/// What a label becomes in the mirror.
fn reflected(label: Label) -> Label {
    match label {
        Label::R => Label::S,
        Label::S => Label::R,
        Label::M => Label::P,
        Label::P => Label::M,
        Label::ReflectedE => Label::ReflectedZ,
        Label::ReflectedZ => Label::ReflectedE,
        invariant => invariant,
    }
}

#[test]
fn reflection_exchanges_the_labels_of_chiral_elements_only() {
    let mut comparer = Comparer::default();
    let mut tally = Tally::new("labels of mirror images");
    for text in structures(1_200) {
        let molecule = comparer.molecule(&text).unwrap();
        let image = mirrored(&molecule);
        let (Ok(one), Ok(other)) = (comparer.order(&molecule), comparer.order(&image)) else {
            continue;
        };
        let sorted = |canonical| {
            let mut labels = all_labels(canonical);
            labels.sort_unstable();
            labels
        };
        let mut expected = all_labels(&one);
        for (_, label) in &mut expected {
            *label = reflected(*label);
        }
        expected.sort_unstable();
        tally.case(sorted(&other) == expected, || text.clone());
    }
    let there = shared("collections").is_some();
    tally.finish(if there { 4_000 } else { 100 });
}

/// Pairs of spellings, aromatic and Kekulé, of one structure by other writers.
#[test]
fn spellings_of_one_compound_have_the_same_labels() {
    let Some(folder) = shared("relations") else {
        return;
    };
    let [left, right] = ["a.smi", "b.smi"].map(|name| read_text(&folder.join(name)));
    let mut comparer = Comparer::default();
    let mut tally = Tally::new("labels of identical pairs");
    for (a, b) in left.lines().zip(right.lines()) {
        let canonical = |comparer: &mut Comparer, line| comparer.canonical(first_word(line));
        let (Ok(a_view), Ok(b_view)) = (canonical(&mut comparer, a), canonical(&mut comparer, b))
        else {
            continue;
        };
        if a_view.same_compound(&b_view) {
            let same = ranked_labels(&a_view) == ranked_labels(&b_view);
            tally.case(same, || format!("{a} {b}"));
        }
    }
    tally.finish(2_000);
}
