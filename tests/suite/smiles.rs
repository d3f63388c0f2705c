//! The SMILES reader against the specification and against what other readers agree on.

use std::collections::{BTreeMap, BTreeSet};

use molkin_formats::smiles::{ReadOptions, Reader};
use molkin_graph::Molecule;
use molkin_tests::{Comparer, Table, Tally, first_word, is_full_run, read_text, shared, workspace};
use rstest::rstest;

/// Of the records in the big files the default run reads one in so many; `MOLKIN_FULL=1` all.
const SAMPLE: usize = 20;

fn stride() -> usize {
    if is_full_run() { 1 } else { SAMPLE }
}

/// Everything that the specification sets as code behind its grammar, each text once. Characters in
/// quotes are terminals, not examples.
fn specified_texts() -> Option<Vec<String>> {
    let document = read_text(&shared("smiles/opensmiles.asciidoc")?);
    let lines = document.lines();
    let body = lines.skip_while(|line| *line != "Reading SMILES");
    let spans = body.flat_map(|line| line.split('`').skip(1).step_by(2));
    let mut seen = BTreeSet::new();
    let texts = spans.filter(|text| !text.is_empty() && !text.starts_with('\''));
    Some(
        texts
            .filter(|&text| seen.insert(text))
            .map(str::to_owned)
            .collect(),
    )
}

/// `read`, or the code of the error.
fn outcome(text: &str, strict: bool) -> &'static str {
    let options = ReadOptions {
        strict,
        ..ReadOptions::default()
    };
    match Reader::new(options).read(text, 1) {
        Ok(_) => "read",
        Err(error) => error.code(),
    }
}

#[test]
fn every_example_of_the_specification() {
    let Some(texts) = specified_texts() else {
        return;
    };
    let expected = Table::read(&workspace("fixtures/standard/opensmiles.tsv"));
    let expected: BTreeMap<&str, [&str; 2]> = expected
        .columns(["text", "default", "strict"])
        .map(|[text, default, strict]| (text, [default, strict]))
        .collect();
    let mut tally = Tally::new("examples of OpenSMILES");
    for text in &texts {
        let Some(expected) = expected.get(text.as_str()) else {
            tally.case(false, || format!("{text} is not in the list"));
            continue;
        };
        if expected != &["-", "-"] {
            let found = [outcome(text, false), outcome(text, true)];
            let differs = || format!("{text}: {found:?} instead of {expected:?}");
            tally.case(&found == expected, differs);
        }
    }
    tally.finish(225);
}

/// Texts that the specification gives for one molecule, and the class that each belongs to.
#[test]
fn texts_that_the_specification_calls_equal() {
    let list = Table::read(&workspace("fixtures/standard/opensmiles.tsv"));
    let texts = list.columns(["text", "same"]);
    let texts = texts.filter(|[_, class]| *class != "-");
    classes_agree(
        Tally::new("equal texts of OpenSMILES"),
        texts.map(|[text, class]| (text, class)),
        120,
    );
}

/// One class has one key, and no other class has it.
fn classes_agree<'a>(
    mut tally: Tally,
    texts: impl Iterator<Item = (&'a str, &'a str)>,
    at_least: usize,
) {
    let mut comparer = Comparer::default();
    let mut keys: BTreeMap<&str, String> = BTreeMap::new();
    for (text, class) in texts {
        let key = comparer.canonical(text);
        let Some(key) = tally.value(key.map(|view| view.compound_key().to_string())) else {
            continue;
        };
        let known = keys.entry(class).or_insert_with(|| key.clone());
        let same = *known == key;
        tally.case(same, || {
            format!("{text} is not the compound of class {class}")
        });
    }
    let distinct: BTreeSet<&String> = keys.values().collect();
    let (classes, distinct) = (keys.len(), distinct.len());
    tally.case(distinct == classes, || {
        format!("{classes} classes have {distinct} keys")
    });
    tally.finish(2 * at_least + 1);
}

#[rstest]
#[case("cistrans.smi", 126)]
#[case("cistrans_nitrogen.smi", 12)]
#[case("tetrahedral.smi", 66)]
#[case("tetrahedral_distantbcdigit.smi", 12)]
fn spellings_of_one_stereoisomer(#[case] file: &'static str, #[case] lines: usize) {
    let Some(folder) = shared("smiles/stereo_spellings") else {
        return;
    };
    let text = read_text(&folder.join(file));
    let pairs = text.lines().filter_map(|line| line.split_once(' '));
    classes_agree(Tally::new(file), pairs, lines);
}

fn hydrogens(molecule: &Molecule) -> Vec<u8> {
    molecule.atoms().map(|atom| atom.hydrogens).collect()
}

/// Bare symbols get the hydrogens that brackets state in the other file, line by line.
#[test]
fn valences_of_bare_symbols() {
    let Some(folder) = shared("smiles") else {
        return;
    };
    let [bare, stated] =
        ["smilesvalence.smi", "explicitvalence.smi"].map(|file| read_text(&folder.join(file)));
    let mut comparer = Comparer::default();
    let mut tally = Tally::new("valences of bare symbols");
    for (bare, stated) in bare.lines().zip(stated.lines()) {
        let pair = [bare, stated].map(first_word);
        let [Some(own), Some(other)] = pair.map(|text| comparer.molecule(text).ok()) else {
            tally.case(false, || format!("{bare}: not read"));
            continue;
        };
        tally.case(hydrogens(&own) == hydrogens(&other), || {
            format!("{bare}: {:?}", hydrogens(&own))
        });
    }
    tally.finish(61);
}

/// Aromatic symbols where they hardly make sense; docs/formats.md says why each is as it is.
#[rstest]
#[case("c-1-c-c-c-c-c-1", "no-kekule-structure")]
#[case("c:1:c:c:c:c:c:1", "read")]
#[case("C:1:C:C:C:C:C:1", "aromatic-bond-outside-aromatic")]
#[case("c", "aromatic-outside-ring")]
#[case("[c]", "aromatic-outside-ring")]
#[case("cc", "aromatic-outside-ring")]
#[case("cn", "aromatic-outside-ring")]
#[case("c1(c)c(c)c(c)c1c", "aromatic-outside-ring")]
fn corner_cases(#[case] text: &str, #[case] expected: &str) {
    assert_eq!(outcome(text, false), expected);
    let Some(file) = shared("smiles/cornercases.smi") else {
        return;
    };
    let file = read_text(&file);
    assert_eq!(file.lines().count(), 8);
    assert!(file.lines().any(|line| first_word(line) == text));
}

/// For each record on which all readers agree: its number from 0 and the hydrogens of each atom.
/// Where all agree on an error, or the writer gave nothing, there are no counts.
fn agreed_hydrogens(writer: usize) -> Option<Vec<(usize, Vec<u8>)>> {
    let name = format!("smiles/written/writer_{writer:02}.hydrogens.tsv.gz");
    let text = read_text(&shared(&name)?);
    let lines = text.lines().skip(1).filter(|line| !line.contains('!'));
    let counted = lines.map(|line| {
        let (record, counts) = line.split_once('\t').unwrap();
        let counts = counts.split_ascii_whitespace();
        let counts = counts.map(|count| count.parse().unwrap());
        (record.parse().unwrap(), counts.collect())
    });
    Some(counted.collect())
}

/// The SMILES of a file, line by line.
fn structures(file: &str) -> Option<Vec<String>> {
    let text = read_text(&shared(file)?);
    let lines = text.lines().map(|line| first_word(line).to_owned());
    Some(lines.collect())
}

/// At most so many records may differ.
#[track_caller]
fn assert_agreed(name: &str, covered: usize, differing: &[String], at_least: usize, most: usize) {
    eprintln!("{name}: {covered} records, {} differ", differing.len());
    assert!(covered >= at_least, "only {covered} records ran");
    let shown = &differing[..differing.len().min(20)];
    assert!(differing.len() <= most, "{}", shown.join("\n"));
}

/// Hydrogens on each atom of one writer's aromatic SMILES, as all readers of the benchmark have them.
#[rstest]
fn hydrogens_of_aromatic_writings(
    #[values(1, 2, 3, 4, 5, 6, 7, 8, 9, 10, 11, 12, 13)] writer: usize,
) {
    let Some(written) = structures(&format!("smiles/written/writer_{writer:02}.smi.gz")) else {
        return;
    };
    let Some(agreed) = agreed_hydrogens(writer) else {
        return;
    };
    let mut comparer = Comparer::default();
    let stride = stride();
    let (mut covered, mut differing) = (0, Vec::new());
    for (record, expected) in agreed.iter().filter(|(record, _)| record % stride == 0) {
        covered += 1;
        let own = comparer.molecule(&written[*record]);
        let own = own.map(|own| hydrogens(&own));
        if own.as_ref() != Ok(expected) {
            differing.push(format!("{record} {}: {own:?}", written[*record]));
        }
    }
    assert_agreed(
        &format!("writer {writer}"),
        covered,
        &differing,
        42_000 / stride,
        0,
    );
}

/// Hydrogens in sum of the Kekulé structures, as most writings of each have them. Three structures,
/// with nitrogen of five bonds, a sulfur ylide and a hydrogen in a ring, were changed by the writers.
#[test]
fn hydrogens_of_kekule_structures() {
    let Some(source) = structures("smiles/kekule.smi.gz") else {
        return;
    };
    let mut sums: BTreeMap<usize, BTreeMap<u32, usize>> = BTreeMap::new();
    for writer in 1..=13 {
        let Some(agreed) = agreed_hydrogens(writer) else {
            return;
        };
        for (record, counts) in agreed {
            let sum = counts.iter().copied().map(u32::from).sum();
            *sums.entry(record).or_default().entry(sum).or_default() += 1;
        }
    }
    let mut comparer = Comparer::default();
    let stride = stride();
    let (mut covered, mut differing) = (0, Vec::new());
    for (record, sums) in sums.iter().filter(|(record, _)| *record % stride == 0) {
        covered += 1;
        let most = sums
            .iter()
            .max_by_key(|&(_, count)| count)
            .map(|(&sum, _)| sum);
        let own = comparer.molecule(&source[*record]);
        let own = own
            .ok()
            .map(|own| hydrogens(&own).into_iter().map(u32::from).sum());
        if own != most {
            differing.push(format!(
                "{record} {}: {own:?} instead of {most:?}",
                source[*record]
            ));
        }
    }
    assert_agreed("Kekulé structures", covered, &differing, 47_000 / stride, 3);
}
