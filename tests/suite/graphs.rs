//! Graphs that are hard to order: ../shared/data/graphs/molecules.

use std::collections::{BTreeMap, BTreeSet, HashMap};

use molkin_graph::Key;
use molkin_relate::Relation;
use molkin_tests::{Comparer, Numbers, Table, Tally, renumbered, shared};
use rstest::rstest;

/// Each structure and its renumbered copy share a key, different structures differ.
#[rstest]
#[case::cubic("cubic.tsv.gz", ["saturated_smiles", "same_renumbered"], 4_681)]
#[case::quartic("quartic.tsv.gz", ["saturated_smiles", "same_renumbered"], 1_894)]
#[case::fulleranes(
    "fullerenes.tsv.gz",
    ["saturated_smiles_CnHn", "saturated_smiles_renumbered"],
    2_038
)]
#[case::fullerenes("fullerenes.tsv.gz", ["one_kekule_smiles_Cn", "same_kekule_renumbered"], 2_038)]
fn regular_graphs(
    #[case] file: &'static str,
    #[case] columns: [&'static str; 2],
    #[case] stated: usize,
) {
    let Some(folder) = shared("graphs/molecules") else {
        return;
    };
    let table = Table::read(&folder.join(file));
    let mut comparer = Comparer::default();
    let mut tally = Tally::new(columns[0]);
    let mut known: HashMap<Key, &str> = HashMap::new();
    for [text, copy] in table.columns(columns) {
        let mut keys = || -> Result<Key, String> {
            let (own, other) = (comparer.canonical(text)?, comparer.canonical(copy)?);
            if own.compound_key() != other.compound_key() {
                return Err(format!("its copy has another key: {copy}"));
            }
            Ok(own.constitution_key())
        };
        let outcome = keys().and_then(|key| match known.insert(key, text) {
            None => Ok(()),
            Some(earlier) => Err(format!("has the key of {earlier}")),
        });
        tally.value(outcome.map_err(|error| format!("{text}: {error}")));
    }
    tally.finish(stated);
}

#[test]
fn isomers_that_refinement_cannot_tell_apart() {
    let Some(folder) = shared("graphs/molecules") else {
        return;
    };
    let table = Table::read(&folder.join("wl_equivalent_isomers.tsv"));
    let mut groups: BTreeMap<(&str, &str), Vec<&str>> = BTreeMap::new();
    for [formula, group, text] in table.columns(["formula", "group", "smiles"]) {
        groups.entry((formula, group)).or_default().push(text);
    }
    let mut comparer = Comparer::default();
    let mut tally = Tally::new("refinement-equivalent isomers");
    let mut one_structure = Vec::new();
    for members in groups.values() {
        tally.case(members.len() > 1, || format!("alone: {members:?}"));
        let sides: Vec<_> = members
            .iter()
            .map(|text| comparer.structure(text).unwrap())
            .collect();
        for (at, a) in sides.iter().enumerate() {
            for (before, b) in sides[..at].iter().enumerate() {
                let relation = comparer.relate(a, b).unwrap().relation;
                if relation != Relation::Constitutional {
                    one_structure.push((relation, members[before], members[at]));
                }
            }
        }
    }
    // Two pairs of these are bond-shift forms of a 4n ring, which count as one structure.
    let identical = one_structure
        .iter()
        .all(|(relation, ..)| *relation == Relation::Identical);
    assert!(identical && one_structure.len() == 2, "{one_structure:#?}");
    assert_eq!(groups.values().map(Vec::len).sum::<usize>(), 282);
    tally.finish(100);
}

#[test]
fn named_cages_are_all_different() {
    let Some(folder) = shared("graphs/molecules") else {
        return;
    };
    let table = Table::read(&folder.join("named_cages.tsv"));
    let mut comparer = Comparer::default();
    let mut numbers = Numbers::new(4);
    let mut tally = Tally::new("named cages");
    let mut known = BTreeSet::new();
    for [name, text, formula] in table.columns(["name", "smiles", "formula"]) {
        let molecule = comparer.molecule(text).unwrap();
        let canonical = comparer.order(&molecule).unwrap();
        let found = molecule.formula().to_string();
        tally.case(found == formula, || format!("{name}: {found}"));
        tally.case(known.insert(canonical.constitution_key()), || {
            format!("{name} has the key of another")
        });
        let copies = (0..20).all(|_| {
            let copy = renumbered(&molecule, &mut numbers);
            comparer.key(&copy) == Ok(canonical.compound_key())
        });
        tally.case(copies, || format!("{name}: a copy has another key"));
    }
    tally.finish(3 * 29);
}

#[test]
fn dendrimers_are_ordered() {
    let Some(folder) = shared("graphs/molecules") else {
        return;
    };
    let table = Table::read(&folder.join("dendrimers.tsv"));
    let mut comparer = Comparer::default();
    let mut numbers = Numbers::new(5);
    let mut tally = Tally::new("dendrimers");
    for [formula, text] in table.columns(["formula", "smiles"]) {
        let molecule = comparer.molecule(text).unwrap();
        let found = molecule.formula().to_string();
        tally.case(found == formula, || format!("{found}, not {formula}"));
        let copy = renumbered(&molecule, &mut numbers);
        let keys = [comparer.key(&molecule), comparer.key(&copy)];
        tally.case(keys[0].is_ok() && keys[0] == keys[1], || {
            format!("{formula}: {keys:?}")
        });
    }
    tally.finish(2 * 17);
}
