//! Pairs and keys whose answers are known: from the definitions, or from how they are built.

use molkin_graph::{GroupKind, StereoGroup};
use molkin_tests::{Comparer, Markings, Numbers, Tally, grouped, grouped_pairs};

use super::statement::{Statement, Word};

/// What the key holds beside the groups: the constitution, and arrangements about metals.
#[test]
fn keys_of_groups_on_unlike_compounds() {
    let mut comparer = Comparer::default();
    let mut tally = Tally::new("unlike compounds");
    let texts = [
        ("C[C@H](F)Cl", 1),
        ("C[C@H](F)Br", 1),
        ("C[C@H](N)C(=O)O", 1),
        ("C[C@H](F)C[C@H](C)F", 1),
        ("C[C@H](Cl)C[C@H](C)Cl", 1),
        ("[13CH3][C@H](F)C[C@H](C)F", 1),
        ("N[Pt@SP1](Cl)(N)OC[C@H](C)F", 6),
        ("N[Pt@SP2](Cl)(N)OC[C@H](C)F", 6),
        ("N[Pt](Cl)(N)OC[C@H](C)F", 6),
    ];
    for kind in [GroupKind::And, GroupKind::Or] {
        let keys = texts.map(|(text, atom)| {
            let molecule = comparer.molecule(text).unwrap();
            let atoms = vec![atom];
            comparer
                .key(&grouped(&molecule, &[StereoGroup { kind, atoms }]))
                .unwrap()
        });
        for (at, key) in keys.iter().enumerate() {
            tally.case(!keys[..at].contains(key), || texts[at].0.to_owned());
        }
    }
    tally.finish(2 * texts.len());
}

/// Chains of forty centres: the answers follow from how they are built.
#[test]
fn forty_centres_and_ten_groups() {
    // Forty centres in a chain with unlike ends, and forty in a chain that reads the same both ways.
    let unlike = format!("CC{}", "C(O)".repeat(40)) + "F";
    let alike = format!("C{}", "C(O)".repeat(40)) + "C";
    let mut comparer = Comparer::default();
    let mut tally = Tally::new("forty centres");
    for text in [unlike, alike] {
        let molecule = comparer.molecule(&text).unwrap();
        let elements = comparer.order(&molecule).unwrap().stereo_elements();
        let markings = Markings::new(&molecule, &elements);
        assert_eq!(markings.places(), 40, "{text}");
        // Ten groups of three, and ten centres that are absolute; no two alike.
        let words = |odd: &dyn Fn(usize) -> bool| -> Vec<Word> {
            (0..40)
                .map(|at| match at {
                    0..30 => Word::Grouped(at % 10, odd(at)),
                    _ => Word::Absolute(odd(at)),
                })
                .collect()
        };
        let pattern = |at: usize| at * at % 7 < 3;
        let statement = |kind: GroupKind, odd: &dyn Fn(usize) -> bool| Statement {
            words: words(odd),
            kinds: vec![kind; 10],
        };
        let mut numbers = Numbers::new(1);
        let mut side = |said: &Statement| {
            let molecule = said.molecule(&markings, &mut numbers);
            comparer.prepare(molecule).unwrap()
        };
        let own = side(&statement(GroupKind::Or, &pattern));
        let turned = side(&statement(GroupKind::Or, &|at| {
            pattern(at) ^ (at < 30 && matches!(at % 10, 2 | 7))
        }));
        let mixture = side(&statement(GroupKind::And, &pattern));
        let other = side(&statement(GroupKind::And, &|at| pattern(at) ^ (at == 3)));
        let mut absolute = statement(GroupKind::Or, &pattern);
        for word in &mut absolute.words {
            if let Word::Grouped(_, odd) = *word {
                *word = Word::Absolute(odd);
            }
        }
        let absolute = side(&absolute);
        let image = side(&statement(GroupKind::And, &|at| !pattern(at)));
        let tail = side(&statement(GroupKind::Or, &|at| pattern(at) ^ (at == 35)));
        let cases = [
            (&own, &turned, "identical", true),
            (&mixture, &mixture, "identical", false),
            (&own, &absolute, "undetermined", false),
            (&own, &mixture, "composition", false),
            (&mixture, &absolute, "composition", false),
            (&mixture, &other, "diastereomers", false),
            (&mixture, &image, "enantiomers", false),
            (&own, &tail, "diastereomers", false),
        ];
        for (a, b, kind, open) in cases {
            for (a, b) in [(a, b), (b, a)] {
                let verdict = comparer.relate(a, b).unwrap();
                let found = (
                    verdict.relation.kind().unwrap_or(verdict.relation.as_str()),
                    verdict.open,
                );
                tally.case(found == (kind, open), || {
                    format!("{text}: {found:?}, expected {kind}")
                });
            }
        }
    }
    tally.finish(32);
}

/// The table of docs/definitions.md, both ways, and each side with itself.
#[test]
fn grouped_pairs_of_the_definitions() {
    let mut comparer = Comparer::default();
    let mut tally = Tally::new("grouped pairs");
    for (pair, groups) in grouped_pairs() {
        let mut side = |text: &str, groups: &[StereoGroup]| {
            let molecule = comparer.molecule(text).unwrap();
            comparer.prepare(grouped(&molecule, groups)).unwrap()
        };
        let (a, b) = (side(&pair.a, &groups[0]), side(&pair.b, &groups[1]));
        for (x, y) in [(&a, &b), (&b, &a)] {
            let verdict = comparer.relate(x, y).unwrap();
            tally.case(pair.expected.holds(&verdict), || {
                format!("{}: {verdict:?}", pair.name)
            });
        }
        for own in [&a, &b] {
            let verdict = comparer.relate(own, own).unwrap();
            let identical = verdict.relation.as_str() == "identical";
            tally.case(identical, || {
                format!("{} and itself: {verdict:?}", pair.name)
            });
        }
        let same_key = a.canonical().compound_key() == b.canonical().compound_key();
        let identical = pair.expected.relation == "identical";
        tally.case(same_key == identical, || {
            format!("{}: keys equal {same_key}", pair.name)
        });
    }
    tally.finish(135);
}
