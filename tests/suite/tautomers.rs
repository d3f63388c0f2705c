//! The axis `tautomer` on published pairs, and its laws.

use std::collections::BTreeMap;

use molkin_formats::smiles;
use molkin_graph::{Key, Limits, Molecule};
use molkin_relate::{Axes, Axis, Normaliser, same_apart_from};
use molkin_tests::{Comparer, Numbers, Tally, first_word, read_text, renumbered, shared, shifted};
use rstest::rstest;

/// Columns of a set with the two structures of a pair.
#[rstest]
// Tautobase: Wahl & Sander, J. Chem. Inf. Model. 2020, 60, 1085. Rows are prototropic pairs.
#[case("tautobase_pairs.tsv", ["smiles_a", "smiles_b"], 1_680, TAUTOBASE)]
// Dhaked, Guasch & Nicklaus, J. Chem. Inf. Model. 2020, 60, 1253.
#[case("nicklaus_pairs.tsv", ["smiles_a", "smiles_b"], 2_157, RULES)]
fn published_pairs(
    #[case] file: &str,
    #[case] columns: [&str; 2],
    #[case] pairs: usize,
    #[case] at_least: usize,
) {
    let Some(folder) = shared("tautomers") else {
        return;
    };
    let text = read_text(&folder.join(file));
    let mut rows = text
        .lines()
        .map(|line| line.split('\t').collect::<Vec<_>>());
    let titles = rows.next().unwrap();
    let places = columns.map(|name| titles.iter().position(|&title| title == name).unwrap());
    let mut comparer = Comparer::default();
    let mut normaliser = Normaliser::new(Limits::default());
    let mut counts: BTreeMap<String, usize> = BTreeMap::new();
    for row in rows {
        let apart = apart(&mut comparer, &mut normaliser, places.map(|at| row[at]));
        *counts.entry(apart).or_default() += 1;
    }
    assert_eq!(counts.values().sum::<usize>(), pairs);
    let told = counts.get("tautomer").copied().unwrap_or_default();
    assert!(told >= at_least, "{told} of {pairs}: {counts:?}");
}

/// Pairs told apart by `tautomer` alone; may not fall.
const TAUTOBASE: usize = 1_638;
const RULES: usize = 1_673;

fn apart(comparer: &mut Comparer, normaliser: &mut Normaliser, texts: [&str; 2]) -> String {
    let sides = texts.map(|text| comparer.structure(text));
    let [Ok(a), Ok(b)] = &sides else {
        return "unread".to_owned();
    };
    let relation = comparer.relate(a, b).unwrap().relation;
    match same_apart_from(normaliser, relation, a, b) {
        Ok(axes) => axes.map_or("null".to_owned(), |axes| axes.to_string()),
        Err(error) => error.code().to_owned(),
    }
}

/// The tautomer key depends neither on numbering nor on which of the tautomers that single shifts
/// reach was drawn. Where it does, no form should be given; the counts of what is not caught may not
/// grow.
#[rstest]
#[case("vendor.smi", 20, 500, 3)]
#[case("natural_products.smi.gz", 50, 1_000, 4)]
fn laws(#[case] file: &str, #[case] step: usize, #[case] at_least: usize, #[case] known: usize) {
    let Some(path) = shared(&format!("collections/{file}")) else {
        return;
    };
    let mut laws = Laws::new();
    let mut tally = Tally::new("laws of tautomers");
    let mut broken = Vec::new();
    for line in read_text(&path).lines().step_by(step) {
        let text = first_word(line);
        let Ok(molecule) = smiles::parse(text) else {
            continue;
        };
        tally.case(true, String::new);
        broken.extend(laws.broken(&molecule).map(|law| format!("{law}: {text}")));
    }
    tally.finish(at_least);
    assert!(broken.len() <= known, "{}: {broken:#?}", broken.len());
}

struct Laws {
    comparer: Comparer,
    normaliser: Normaliser,
    numbers: Numbers,
}

impl Laws {
    fn new() -> Self {
        Self {
            comparer: Comparer::default(),
            normaliser: Normaliser::new(Limits::default()),
            numbers: Numbers::new(7),
        }
    }

    /// The law that a structure breaks, if it has a form.
    fn broken(&mut self, molecule: &Molecule) -> Option<&'static str> {
        let tautomer = Axes::from([Axis::Tautomer]);
        let key = self.key(molecule.clone(), tautomer)?;
        for _ in 0..3 {
            let other = renumbered(molecule, &mut self.numbers);
            if self.key(other, tautomer) != Some(key) {
                return Some("renumbered");
            }
        }
        // A shift leaves marks out.
        let bare = tautomer.with(Axis::Stereo);
        let key = self.key(molecule.clone(), bare)?;
        let mut others = shifted(molecule).into_iter();
        let differs = others.any(|other| self.key(other, bare).is_some_and(|own| own != key));
        differs.then_some("another tautomer")
    }

    fn key(&mut self, molecule: Molecule, axes: Axes) -> Option<Key> {
        let structure = self.comparer.prepare(molecule).ok()?;
        let form = self.normaliser.overlook(&structure, axes).ok()?;
        Some(form.structure().canonical().compound_key())
    }
}
