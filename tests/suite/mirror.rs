//! Mirror images of real structures: the law, and chirality against the reference library.

use std::collections::{BTreeMap, BTreeSet};

use molkin_graph::{Molecule, Shape};
use molkin_relate::{Relation, StereoKind};
use molkin_tests::{
    Comparer, Table, Tally, collection, is_full_run, mirrored, read_text, shared, workspace,
};
use rstest::rstest;

/// Of the records of a collection the default run takes one in so many.
const SAMPLE: u64 = 20;

fn stride() -> u64 {
    if is_full_run() { 1 } else { SAMPLE }
}

/// The cases that a run meets at least, of those stated for a full one: a part falls on unmarked
/// records.
fn least(stated: usize) -> usize {
    if is_full_run() {
        stated
    } else {
        stated / (2 * SAMPLE as usize)
    }
}

/// Whether a record marks anything.
fn is_marked(molecule: &Molecule) -> bool {
    let mut marks = molecule.drawn_stereo().iter();
    marks.any(|mark| mark.parity.is_some()) || !molecule.drawn_coordination().is_empty()
}

/// Whether a record marks anything that a mirror image changes.
fn is_handed(molecule: &Molecule) -> bool {
    let mut marks = molecule.drawn_stereo().iter();
    marks.any(|mark| mark.parity.is_some() && mark.shape != Shape::DoubleBond)
        || !molecule.drawn_coordination().is_empty()
}

/// What must hold between a record and its mirror image; whether they differ.
fn check(comparer: &mut Comparer, molecule: Molecule) -> Result<bool, String> {
    let image = mirrored(&molecule);
    let back = comparer.key(&mirrored(&image))?;
    let (own, image) = (comparer.prepare(molecule)?, comparer.prepare(image)?);
    let key = own.canonical().compound_key();
    if back != key {
        return Err("mirrored twice it has another key".to_owned());
    }
    let chiral = image.canonical().compound_key() != key;
    let relation = comparer.relate(&own, &image)?.relation;
    let lawful = match relation {
        Relation::Identical => !chiral,
        Relation::Stereo(StereoKind::Enantiomers) => chiral,
        // Where something is left open, samples of the two may be the same.
        Relation::Stereo(StereoKind::Undetermined | StereoKind::Unresolved) => {
            chiral && own.canonical().is_open()
        }
        _ => false,
    };
    if lawful {
        Ok(chiral)
    } else {
        let differ = if chiral { "other" } else { "equal" };
        Err(format!("{relation:?} with {differ} keys"))
    }
}

/// The collections that are left out mark nothing, or eight records of 200.
#[rstest]
#[case::drugs("drugs.csv", 930)]
#[case::chiral("chiral.smi.gz", 81_000)]
#[case::actives("actives.smi.gz", 5_900)]
#[case::vendor("vendor.smi", 6_900)]
#[case::hard("hard.sdf.gz", 680)]
#[case::mols("mols.1000.sdf.gz", 430)]
fn mirror_images_keep_the_law(#[case] file: &'static str, #[case] stated: usize) {
    let Some(records) = collection(file) else {
        return;
    };
    let mut comparer = Comparer::default();
    let mut tally = Tally::new(file);
    let mut chiral = 0;
    for outcome in records {
        let outcome = outcome.unwrap();
        let Ok(record) = outcome.result else {
            continue;
        };
        if outcome.index % stride() != 0 || !is_marked(&record.molecule) {
            continue;
        }
        let result = check(&mut comparer, record.molecule);
        chiral += usize::from(result == Ok(true));
        tally.value(result.map_err(|error| format!("{file} record {}: {error}", outcome.index)));
    }
    eprintln!("{file}: {chiral} differ from their mirror images");
    tally.finish(least(stated));
}

/// The answers of the reference library for the records of a collection, from the first on; `None`
/// where it does not read one. See `tests/scripts/chirality.py`.
fn reference_answers(name: &str) -> Vec<Option<bool>> {
    let text = read_text(&workspace(&format!("fixtures/chirality/{name}.txt")));
    let (unread, digits) = text.split_once('\n').unwrap();
    let unread: BTreeSet<usize> = unread
        .split_ascii_whitespace()
        .map(|word| word.parse().unwrap())
        .collect();
    let digits = digits.bytes().filter(u8::is_ascii_hexdigit);
    let bits = digits.flat_map(|digit| {
        let value = char::from(digit).to_digit(16).unwrap();
        (0..4).rev().map(move |bit| value >> bit & 1 == 1)
    });
    (1..)
        .zip(bits)
        .map(|(record, bit)| (!unread.contains(&record)).then_some(bit))
        .collect()
}

/// The records on which we decide otherwise than the reference library, with our answer.
fn disputed(set: &str) -> BTreeMap<u64, bool> {
    let table = Table::read(&workspace("fixtures/disputed/chirality.tsv"));
    table
        .columns(["set", "row", "chiral", "reason"])
        .filter(|[own, ..]| *own == set)
        .map(|[_, row, chiral, reason]| {
            assert!(!reason.is_empty(), "{set} {row} gives no reason");
            (row.parse().unwrap(), chiral == "yes")
        })
        .collect()
}

#[rstest]
#[case::drugs("drugs.csv", 830)]
#[case::chiral("chiral.smi.gz", 70_000)]
#[case::actives("actives.smi.gz", 5_700)]
#[case::vendor("vendor.smi", 5_600)]
fn chirality_agrees_with_the_reference(#[case] file: &'static str, #[case] stated: usize) {
    if shared("collections").is_none() {
        return;
    }
    let name = file.split('.').next().unwrap();
    let answers = reference_answers(name);
    let disputed = disputed(name);
    let mut comparer = Comparer::default();
    let mut tally = Tally::new(file);
    for outcome in collection(file).unwrap() {
        let outcome = outcome.unwrap();
        let row = outcome.index;
        let (Ok(record), Some(answer)) = (outcome.result, answers[row as usize - 1]) else {
            continue;
        };
        if row % stride() != 0 || !is_handed(&record.molecule) {
            continue;
        }
        let expected = disputed.get(&row).copied().unwrap_or(answer);
        let stale = disputed.get(&row) == Some(&answer);
        let mut chiral = || {
            let image = comparer.key(&mirrored(&record.molecule))?;
            Ok::<bool, String>(image != comparer.key(&record.molecule)?)
        };
        let chiral = chiral();
        tally.case(chiral == Ok(expected) && !stale, || {
            format!("{name}\t{row}\t{chiral:?}, the reference says {answer}")
        });
    }
    tally.finish(least(stated));
}
