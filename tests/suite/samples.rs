//! Records with stereo groups, against the list of all samples that they stand for.
//!
//! A sample is a set of stereoisomers. The list follows the definitions in docs/definitions.md to the
//! letter: for each decision of the OR groups every set of assignments in which both arrangements of
//! each AND group are present, then stereoisomers for assignments.

use std::collections::{BTreeMap, BTreeSet};

use molkin_formats::smiles::write;
use molkin_graph::{GroupKind, Key, Molecule, Parity, StereoGroup};
use molkin_relate::Structure;
use molkin_tests::{
    Comparer, Markings, Numbers, Tally, grouped, grouped_pairs, mirrored, renumbered,
};

/// What a record says of one place.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord)]
enum Word {
    Unmarked,
    Absolute(bool),
    /// In a group, by number.
    Grouped(usize, bool),
}

#[derive(Debug, Clone, PartialEq, Eq)]
struct Statement {
    words: Vec<Word>,
    kinds: Vec<GroupKind>,
}

impl Statement {
    fn random(places: usize, numbers: &mut Numbers) -> Self {
        let kind = |numbers: &mut Numbers| {
            [
                GroupKind::And,
                GroupKind::Or,
                GroupKind::And,
                GroupKind::Or,
                GroupKind::Relative,
            ][numbers.below(5)]
        };
        let kinds = (0..1 + numbers.below(3))
            .map(|_| kind(numbers))
            .collect::<Vec<_>>();
        let words = (0..places)
            .map(|_| match numbers.below(8) {
                0 => Word::Unmarked,
                1 | 2 => Word::Absolute(numbers.coin()),
                _ => Word::Grouped(numbers.below(kinds.len()), numbers.coin()),
            })
            .collect();
        Self { words, kinds }
    }

    /// A statement close to this one.
    fn changed(&self, numbers: &mut Numbers) -> Self {
        let mut other = self.clone();
        let at = numbers.below(other.words.len());
        match numbers.below(4) {
            0 => {
                let group = numbers.below(other.kinds.len());
                for word in &mut other.words {
                    if let Word::Grouped(own, odd) = word
                        && *own == group
                    {
                        *odd = !*odd;
                    }
                }
            }
            1 => {
                for word in &mut other.words {
                    if let Word::Grouped(_, odd) | Word::Absolute(odd) = word {
                        *odd = !*odd;
                    }
                }
            }
            2 => other.words[at] = Self::random(1, numbers).words[0],
            _ => {
                let group = numbers.below(other.kinds.len());
                other.kinds[group] = [GroupKind::And, GroupKind::Or][numbers.below(2)];
            }
        }
        for word in &mut other.words {
            if let Word::Grouped(group, _) = word {
                *group %= other.kinds.len();
            }
        }
        other
    }

    fn molecule(&self, markings: &Markings<'_>) -> Molecule {
        let marks: Vec<Option<Parity>> = self
            .words
            .iter()
            .map(|word| match *word {
                Word::Unmarked => None,
                Word::Absolute(odd) | Word::Grouped(_, odd) => Some(Parity::from_odd(odd)),
            })
            .collect();
        let mut groups: Vec<StereoGroup> = Vec::new();
        for (number, &kind) in self.kinds.iter().enumerate() {
            let members = self.words.iter().enumerate();
            let members = members.filter(|(_, w)| matches!(w, Word::Grouped(g, _) if *g == number));
            let atoms: Vec<u32> = members.map(|(at, _)| markings.centre(at)).collect();
            if !atoms.is_empty() {
                groups.push(StereoGroup { kind, atoms });
            }
        }
        markings.grouped(&marks, &groups)
    }

    /// The samples: sets of stereoisomers, as bits. `None` where there are too many to list.
    fn samples(&self, isomer: &dyn Fn(u32) -> usize) -> Option<BTreeSet<u64>> {
        let base = self
            .words
            .iter()
            .enumerate()
            .fold(0, |bits, (at, word)| match *word {
                Word::Absolute(odd) | Word::Grouped(_, odd) => bits | u32::from(odd) << at,
                Word::Unmarked => bits,
            });
        let mut pieces: Vec<(GroupKind, u32)> = Vec::new();
        for (number, &kind) in self.kinds.iter().enumerate() {
            let mask = self
                .words
                .iter()
                .enumerate()
                .fold(0, |mask, (at, word)| match word {
                    Word::Grouped(group, _) if *group == number => mask | 1 << at,
                    _ => mask,
                });
            if mask != 0 {
                pieces.push((kind, mask));
            }
        }
        for (at, word) in self.words.iter().enumerate() {
            if *word == Word::Unmarked {
                pieces.push((GroupKind::Relative, 1 << at));
            }
        }
        let of = |kind: GroupKind| -> Vec<u32> {
            let own = pieces.iter().filter(|(own, _)| *own == kind);
            own.map(|&(_, mask)| mask).collect()
        };
        let (or, and, any) = (
            of(GroupKind::Or),
            of(GroupKind::And),
            of(GroupKind::Relative),
        );
        if and.len() + any.len() > 3 {
            return None;
        }
        let mut samples = BTreeSet::new();
        for decided in sums(&or) {
            // All assignments, each with the number of its AND arrangement.
            let assignments: Vec<(usize, u32)> = sums(&and)
                .into_iter()
                .enumerate()
                .flat_map(|(arrangement, present)| {
                    sums(&any)
                        .into_iter()
                        .map(move |left| (arrangement, base ^ decided ^ present ^ left))
                })
                .collect();
            for chosen in 1u32..1 << assignments.len() {
                let own = (0..assignments.len()).filter(|at| chosen >> at & 1 == 1);
                let own: Vec<(usize, u32)> = own.map(|at| assignments[at]).collect();
                let present: BTreeSet<usize> =
                    own.iter().map(|&(arrangement, _)| arrangement).collect();
                if present.len() == 1 << and.len() {
                    samples.insert(own.iter().fold(0, |set, &(_, a)| set | 1 << isomer(a)));
                }
            }
        }
        (samples.len() <= 300).then_some(samples)
    }
}

/// All sums of masks.
fn sums(masks: &[u32]) -> Vec<u32> {
    masks.iter().fold(vec![0], |sums, mask| {
        sums.iter().flat_map(|sum| [*sum, sum ^ mask]).collect()
    })
}

/// The verdict as docs/definitions.md has it.
fn expected(
    a: &BTreeSet<u64>,
    b: &BTreeSet<u64>,
    mirror: &dyn Fn(u64) -> u64,
) -> (&'static str, bool) {
    if a == b {
        return ("identical", a.len() > 1);
    }
    if !a.is_disjoint(b) {
        return ("undetermined", false);
    }
    let mut seen = BTreeSet::new();
    for &x in a {
        for &y in b {
            seen.insert(if mirror(x) == y {
                "enantiomers"
            } else if x & y == 0 {
                "diastereomers"
            } else {
                "composition"
            });
        }
    }
    let only = seen.first().copied().filter(|_| seen.len() == 1);
    (only.unwrap_or("unresolved"), false)
}

const FRAGMENTS: [&str; 12] = [
    "C(C)O",
    "C(F)O",
    "C(C)C(C)O",
    "C(O)C(F)Cl",
    "C",
    "O",
    "C=CC",
    "CC(C)N",
    "C(=O)C(C)O",
    "F",
    "C(C)C",
    "C(O)C=CF",
];

/// Ways to put fragments together; most of them give equal fragments equal places.
const HUBS: [(&str, usize); 17] = [
    ("{}C{}", 2),
    ("N({})({}){}", 3),
    ("C({})({})({})O", 3),
    ("C1({})CC1{}", 2),
    ("C1({})CCC({})CC1", 2),
    ("C1({})C({})C1{}", 3),
    ("C1({})CC({})CC({})C1", 3),
    ("C1({})C({})C({})C1{}", 4),
    ("C({})C=C{}", 2),
    ("c1c({})cc({})cc1{}", 3),
    ("O({}){}", 2),
    ("C({})(O)C({})F", 2),
    ("C{}.C{}", 2),
    ("C1({})CC2(C1)CC({})C2", 2),
    ("C({})(F)O", 1),
    ("C{}.C{}.C{}.C{}.C{}.C{}", 6),
    ("N({})C({})C(O){}", 3),
];

fn random_smiles(numbers: &mut Numbers) -> String {
    let (hub, holes) = HUBS[numbers.below(HUBS.len())];
    let first = FRAGMENTS[numbers.below(FRAGMENTS.len())];
    let mut text = hub.to_owned();
    for _ in 0..holes {
        let fragment = if numbers.below(4) > 0 {
            first
        } else {
            FRAGMENTS[numbers.below(FRAGMENTS.len())]
        };
        text = text.replacen("{}", fragment, 1);
    }
    text
}

/// 300 molecules, or 2,000 with `MOLKIN_FULL` set.
#[test]
fn groups_against_all_samples() {
    let most = if std::env::var_os("MOLKIN_FULL").is_some() {
        2_000
    } else {
        300
    };
    let mut comparer = Comparer::default();
    let mut numbers = Numbers::new(4);
    let mut tally = Tally::new("samples");
    let mut molecules = 0;
    while molecules < most {
        let text = random_smiles(&mut numbers);
        let molecule = comparer.molecule(&text).unwrap();
        let elements = comparer.order(&molecule).unwrap().stereo_elements();
        let markings = Markings::new(&molecule, &elements);
        // A cage's bridgeheads are one element, which the list does not know.
        let cages = elements
            .iter()
            .map(|e| e.variable)
            .collect::<BTreeSet<_>>()
            .len()
            < elements.len();
        if cages || elements.iter().any(|e| e.quiet) || !(1..=6).contains(&markings.places()) {
            continue;
        }
        molecules += 1;
        compare_all(&text, &markings, &mut comparer, &mut numbers, &mut tally);
    }
    tally.finish(90 * most);
}

fn compare_all(
    text: &str,
    markings: &Markings<'_>,
    comparer: &mut Comparer,
    numbers: &mut Numbers,
    tally: &mut Tally,
) {
    let places = markings.places();
    let mut keys: BTreeMap<Key, usize> = BTreeMap::new();
    let mut isomers = Vec::new();
    let mut images: BTreeMap<usize, Key> = BTreeMap::new();
    for bits in 0u32..1 << places {
        let marks: Vec<_> = (0..places)
            .map(|at| Some(Parity::from_odd(bits >> at & 1 == 1)))
            .collect();
        let marked = markings.marked(&marks);
        let next = keys.len();
        let number = *keys.entry(comparer.key(&marked).unwrap()).or_insert(next);
        images.insert(number, comparer.key(&mirrored(&marked)).unwrap());
        isomers.push(number);
    }
    let mirror = |set: u64| -> u64 {
        (0..64)
            .filter(|at| set >> at & 1 == 1)
            .fold(0, |sum, at| sum | 1 << keys[&images[&at]])
    };
    let mut statements: Vec<Statement> =
        (0..4).map(|_| Statement::random(places, numbers)).collect();
    for _ in 0..8 {
        let from = numbers.below(statements.len());
        statements.push(statements[from].changed(numbers));
    }
    let listed: Vec<(Statement, Structure, BTreeSet<u64>)> = statements
        .into_iter()
        .filter_map(|statement| {
            let samples = statement.samples(&|bits| isomers[bits as usize])?;
            let molecule = statement.molecule(markings);
            let structure = comparer.prepare(molecule.clone()).unwrap();
            let other = comparer.order(&renumbered(&molecule, numbers)).unwrap();
            let own = structure.canonical();
            let said = [own, &other].map(|view| {
                let form = view.form();
                (view.compound_key(), write(&form).text, form.groups)
            });
            let kept = said[0] == said[1];
            tally.case(kept, || format!("{text}, renumbered: {statement:?}"));
            Some((statement, structure, samples))
        })
        .collect();
    for (said_a, a, samples_a) in &listed {
        for (said_b, b, samples_b) in &listed {
            let verdict = comparer.relate(a, b).unwrap();
            let found = (
                verdict.relation.kind().unwrap_or(verdict.relation.as_str()),
                verdict.open,
            );
            let wanted = expected(samples_a, samples_b, &mirror);
            tally.case(found == wanted, || {
                format!("{text}: {found:?}, expected {wanted:?}\n{said_a:?}\n{said_b:?}")
            });
            let same_key = a.canonical().compound_key() == b.canonical().compound_key();
            tally.case(same_key == (samples_a == samples_b), || {
                format!("{text}: keys equal {same_key}\n{said_a:?}\n{said_b:?}")
            });
        }
    }
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
        let mut side = |said: &Statement| comparer.prepare(said.molecule(&markings)).unwrap();
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
