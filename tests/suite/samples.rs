//! Records with stereo groups, against the list of all samples that they stand for.
//!
//! A sample is a set of stereoisomers. The list follows the definitions in docs/definitions.md to the
//! letter: for each decision of the OR groups every set of assignments in which both arrangements of
//! each AND group are present, then stereoisomers for assignments.

use std::collections::{BTreeMap, BTreeSet};

use molkin_formats::smiles::write;
use molkin_graph::{GroupKind, Key, Limits, Molecule, Parity, StereoGroup};
use molkin_relate::Structure;
use molkin_tests::{
    Comparer, Markings, Numbers, Tally, grouped, grouped_pairs, is_full_run, mirrored, renumbered,
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

    /// The record. Groups also name atoms that say nothing: unmarked ones, and ones in no element.
    fn molecule(&self, markings: &Markings<'_>, numbers: &mut Numbers) -> Molecule {
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
            let atoms: Vec<u32> = members
                .map(|(at, _)| {
                    let names = markings.names(at);
                    names[numbers.below(names.len())]
                })
                .collect();
            if !atoms.is_empty() {
                groups.push(StereoGroup { kind, atoms });
            }
        }
        let marked = (0..marks.len()).filter(|&at| marks[at].is_some());
        let named: BTreeSet<u32> = marked.flat_map(|at| markings.names(at)).copied().collect();
        for atom in (0..markings.atoms()).filter(|atom| !named.contains(atom)) {
            let to = numbers.below(8);
            if let Some(group) = groups.get_mut(to) {
                group.atoms.push(atom);
            }
        }
        markings.grouped(&marks, &groups)
    }

    /// Whether one of some places is unmarked, or no more than relative to others.
    fn leaves_open(&self, places: &[usize]) -> bool {
        places.iter().any(|&at| match self.words[at] {
            Word::Unmarked => true,
            Word::Absolute(_) => false,
            Word::Grouped(group, _) => self.kinds[group] == GroupKind::Relative,
        })
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
    assembled(&FRAGMENTS, numbers)
}

/// Fragments in a hub, most of them alike.
fn assembled(fragments: &[&str], numbers: &mut Numbers) -> String {
    let (hub, holes) = HUBS[numbers.below(HUBS.len())];
    let first = fragments[numbers.below(fragments.len())];
    let mut text = hub.to_owned();
    for _ in 0..holes {
        let fragment = if numbers.below(4) > 0 {
            first
        } else {
            fragments[numbers.below(fragments.len())]
        };
        text = text.replacen("{}", fragment, 1);
    }
    text
}

/// 300 molecules, or 2,000 with `MOLKIN_FULL` set.
#[test]
fn groups_against_all_samples() {
    let most = if is_full_run() { 2_000 } else { 300 };
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
        compare_all(
            &text,
            &markings,
            &[],
            &mut comparer,
            &mut numbers,
            &mut tally,
        );
    }
    tally.finish(90 * most);
}

/// Fragments with elements of other sorts: cages, nitrogen in a ring of three, axes, double bonds,
/// mobile bonds, sulfur, isotopes.
const SORTS: [&str; 16] = [
    "C1CC2CC1CC2=O",
    "C12CC(=O)C(CC1)C2",
    "N1CC1C",
    "C1CN1C",
    "C=C=CC",
    "C=C=C=CC",
    "C=CC",
    "C=NO",
    "S(=O)C",
    "C([13CH3])C",
    "C([2H])C",
    "C([18OH])O",
    "C(C)O",
    "C(O)C(F)Cl",
    "C=C[CH2]",
    "C1CC(C)C1",
];

/// Seeds of [`sorts_of_elements`]: one, or eight with `MOLKIN_FULL` set.
fn seeds() -> std::ops::Range<u64> {
    5..if is_full_run() { 13 } else { 6 }
}

/// 150 molecules of each seed.
#[test]
fn sorts_of_elements_against_all_samples() {
    let mut comparer = Comparer::default();
    let mut tally = Tally::new("samples of all sorts");
    for seed in seeds() {
        let mut numbers = Numbers::new(seed);
        let mut molecules = 0;
        while molecules < 150 {
            let text = assembled(&SORTS, &mut numbers);
            let Ok(molecule) = comparer.molecule(&text) else {
                continue;
            };
            let elements = comparer.order(&molecule).unwrap().stereo_elements();
            let markings = Markings::independent(&molecule, &elements);
            if !(1..=6).contains(&markings.places()) {
                continue;
            }
            molecules += 1;
            let quiet: BTreeSet<u32> = elements
                .iter()
                .filter(|element| element.quiet)
                .map(|element| element.centres[0])
                .collect();
            let quiet: Vec<usize> = (0..markings.places())
                .filter(|&at| quiet.contains(&markings.centre(at)))
                .collect();
            compare_all(
                &text,
                &markings,
                &quiet,
                &mut comparer,
                &mut numbers,
                &mut tally,
            );
        }
    }
    tally.finish(10_000 * seeds().count());
}

/// Beyond a limit a record or a pair ends in an error, never in another answer.
#[test]
fn limits_end_in_errors() {
    let mut comparer = Comparer::default();
    let mut tally = Tally::new("limits");
    let mut numbers = Numbers::new(6);
    let mut errors = 0;
    for _ in 0..200 {
        let text = random_smiles(&mut numbers);
        let molecule = comparer.molecule(&text).unwrap();
        let elements = comparer.order(&molecule).unwrap().stereo_elements();
        let markings = Markings::new(&molecule, &elements);
        if markings.places() == 0 {
            continue;
        }
        let mut tight = Comparer::new(Limits {
            stereo_pieces: numbers.below(4) as u32,
            open_elements: numbers.below(3) as u32,
            order_steps: [500, 5_000, 100_000_000][numbers.below(3)],
            ..Limits::default()
        });
        let sides: Vec<Structure> = (0..4)
            .map(|_| {
                let said = Statement::random(markings.places(), &mut numbers);
                let molecule = said.molecule(&markings, &mut numbers);
                let side = comparer.prepare(molecule.clone()).unwrap();
                match tight.key(&molecule) {
                    Ok(key) => tally.case(key == side.canonical().compound_key(), || {
                        format!("{text}: {said:?}")
                    }),
                    Err(_) => errors += 1,
                }
                side
            })
            .collect();
        for a in &sides {
            for b in &sides {
                match tight.relate(a, b) {
                    Ok(found) => {
                        let known = comparer.relate(a, b).unwrap();
                        let same = (found.relation, found.open) == (known.relation, known.open);
                        tally.case(same, || format!("{text}: {found:?}, else {known:?}"));
                    }
                    Err(_) => errors += 1,
                }
            }
        }
    }
    assert!(errors > 100, "{errors} errors");
    tally.finish(1_000);
}

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

fn compare_all(
    text: &str,
    markings: &Markings<'_>,
    quiet: &[usize],
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
            let molecule = statement.molecule(markings, numbers);
            let structure = comparer
                .prepare(molecule.clone())
                .unwrap_or_else(|error| panic!("{text}: {error} {statement:?}"));
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
            let good = if [said_a, said_b].iter().any(|said| said.leaves_open(quiet)) {
                // What is quiet and unmarked counts for less than the samples say.
                let decided = |word| matches!(word, "identical" | "undetermined");
                let back = comparer.relate(b, a).unwrap();
                (verdict.relation, verdict.open) == (back.relation, back.open)
                    && (found.0 == wanted.0 || !decided(found.0) && !decided(wanted.0))
            } else {
                found == wanted
            };
            tally.case(good, || {
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
