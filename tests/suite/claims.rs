//! What a record claims, against the list of all stereoisomers that it allows.

use std::collections::{BTreeMap, BTreeSet};

use molkin_graph::{Key, Parity};
use molkin_relate::Structure;
use molkin_tests::{Comparer, Markings, Numbers, Tally, completions, mirrored};
use rstest::rstest;

/// A partly marked record, and the keys of the fully marked ones that it allows.
struct Claim {
    structure: Structure,
    isomers: BTreeSet<Key>,
}

/// The verdict as design and definitions have it, from the lists alone; `images` gives the key of
/// the mirror image.
fn expected(a: &Claim, b: &Claim, images: &BTreeMap<Key, Key>) -> (&'static str, bool) {
    if a.isomers == b.isomers {
        return ("identical", a.isomers.len() > 1);
    }
    if !a.isomers.is_disjoint(&b.isomers) {
        return ("undetermined", false);
    }
    let mirrored: BTreeSet<Key> = a.isomers.iter().map(|key| images[key]).collect();
    let kind = if mirrored.is_disjoint(&b.isomers) {
        "diastereomers"
    } else if a.isomers.len() == 1 && b.isomers.len() == 1 {
        "enantiomers"
    } else {
        "unresolved"
    };
    (kind, false)
}

/// All ways to mark each place one way, the other way or not at all.
fn partial_marks(places: usize) -> Vec<Vec<Option<Parity>>> {
    let mut all = vec![Vec::new()];
    for _ in 0..places {
        all = all
            .iter()
            .flat_map(|marks| {
                [None, Some(Parity::Even), Some(Parity::Odd)].map(|mark| {
                    let mut marks = marks.clone();
                    marks.push(mark);
                    marks
                })
            })
            .collect();
    }
    all
}

/// Skeletons with no forced bridgeheads and no labile elements, each with its number of places.
#[rstest]
#[case::tartaric_acid("OC(=O)C(O)C(O)C(=O)O", 2)]
#[case::pseudoasymmetric("OC(=O)C(O)C(O)C(O)C(=O)O", 3)]
#[case::aldopentose("OCC(O)C(O)C(O)C=O", 3)]
#[case::across_a_ring("CC1CCC(C)CC1", 2)]
#[case::three_round_a_ring("CC1CC(C)CC(C)C1", 3)]
#[case::fused_rings("C1CCC2CCCCC2C1", 2)]
#[case::spiro("CC1CC2(C1)CC(C)C2", 3)]
#[case::cyclobutanetetrol("OC1C(O)C(O)C1O", 4)]
#[case::truxillic_acid("OC(=O)C1C(c2ccccc2)C(C(=O)O)C1c1ccccc1", 4)]
#[case::inositol("OC1C(O)C(O)C(O)C(O)C1O", 6)]
#[case::labelled_inositol("OC1C(O)C(O)C([18OH])C(O)C1O", 6)]
#[case::diene("CC=CC=CC", 2)]
#[case::centre_between_double_bonds("CC=CC(O)C=CC", 3)]
#[case::centre_and_double_bond("CC(O)C=CC(O)C", 3)]
#[case::allene("CC=C=CC(O)C", 2)]
#[case::centre_between_allenes("CC=C=CC(O)C=C=CC", 3)]
#[case::two_components("CC(O)C(=O)O.CC(O)C(=O)O", 2)]
fn partly_marked_records(#[case] text: &'static str, #[case] places: usize) {
    let mut comparer = Comparer::default();
    let molecule = comparer.molecule(text).unwrap();
    let elements = comparer.order(&molecule).unwrap().stereo_elements();
    let markings = Markings::new(&molecule, &elements);
    assert_eq!(markings.places(), places);
    let mut images = BTreeMap::new();
    for marks in markings.full() {
        let marked = markings.marked(&marks);
        let image = comparer.key(&mirrored(&marked)).unwrap();
        images.insert(comparer.key(&marked).unwrap(), image);
    }
    let claims: Vec<Claim> = partial_marks(places)
        .iter()
        .map(|marks| Claim {
            structure: comparer.prepare(markings.marked(marks)).unwrap(),
            isomers: completions(marks)
                .map(|full| comparer.key(&markings.marked(&full)).unwrap())
                .collect(),
        })
        .collect();
    let mut tally = Tally::new("claims");
    check_keys(&claims, &mut tally);
    let mut numbers = Numbers::new(9);
    let all = claims.len() * claims.len();
    for pair in 0..all.min(6_000) {
        let pair = if all > 6_000 {
            numbers.below(all)
        } else {
            pair
        };
        let (a, b) = (&claims[pair / claims.len()], &claims[pair % claims.len()]);
        let verdict = comparer.relate(&a.structure, &b.structure).unwrap();
        let found = (
            verdict.relation.kind().unwrap_or(verdict.relation.as_str()),
            verdict.open,
        );
        let expected = expected(a, b, &images);
        tally.case(found == expected, || {
            let [a, b] = [a, b].map(|side| side.structure.canonical().form());
            format!("{found:?}, expected {expected:?}\n{a:?}\n{b:?}")
        });
    }
    tally.finish(81);
}

/// Equal keys exactly for equal lists.
fn check_keys(claims: &[Claim], tally: &mut Tally) {
    let mut by_key: BTreeMap<Key, &BTreeSet<Key>> = BTreeMap::new();
    let mut lists = BTreeSet::new();
    for claim in claims {
        let key = claim.structure.canonical().compound_key();
        let list = by_key.entry(key).or_insert(&claim.isomers);
        tally.case(*list == &claim.isomers, || {
            "one key for two lists".to_owned()
        });
        lists.insert(&claim.isomers);
    }
    tally.case(lists.len() == by_key.len(), || {
        format!("{} keys for {} lists", by_key.len(), lists.len())
    });
}
