//! CIP labels against published answers: the validation suite of Hanson et al., J. Chem. Inf. Model.
//! 2018, 58, 1755 (../shared/data/cip), and the labels that the reference library gives to open
//! collections (fixtures/labels).

use std::collections::{BTreeMap, BTreeSet};

use molkin_formats::molfile;
use molkin_graph::{Canonical, Molecule};
use molkin_tests::{Comparer, Table, Tally, all_labels, first_word, read_text, shared, workspace};
use rstest::rstest;

/// The labels as the suite writes them: `<atom><label>`, both ends of a bond or axis.
fn labels(canonical: &Canonical) -> BTreeSet<String> {
    let labelled = all_labels(canonical).into_iter();
    labelled
        .flat_map(|(centres, label)| centres.map(|atom| format!("{}{label}", atom + 1)))
        .collect()
}

fn expected(text: &str) -> BTreeSet<String> {
    text.split_whitespace().map(str::to_owned).collect()
}

/// One structure of the suite: its number, its molecule, its labels.
type Case = (String, Molecule, BTreeSet<String>);

fn from_smiles() -> Option<Vec<Case>> {
    let text = read_text(&shared("cip")?.join("compounds.smi"));
    let mut comparer = Comparer::default();
    let case = |line: &str| {
        let mut fields = line.split('\t');
        let mut field = || fields.next().unwrap_or_default();
        let molecule = comparer.molecule(field()).unwrap();
        (field().to_owned(), molecule, expected(field()))
    };
    // Atropisomers and helicenes cannot be written in SMILES.
    let written = |line: &&str| !line.contains("HE") && !line.contains("AT");
    Some(text.lines().filter(written).map(case).collect())
}

fn from_sdf(name: &str) -> Option<Vec<Case>> {
    let text = read_text(&shared("cip")?.join(name));
    let records = text
        .split("$$$$")
        .filter(|record| record.contains("M  END"));
    let case = |record: &str| {
        let record = record.trim_start_matches(['\r', '\n']);
        let item = |name: &str| {
            let at = record.find(&format!("<{name}>"))?;
            record[at..].lines().nth(1)
        };
        let molecule = molfile::parse(record.as_bytes()).unwrap().molecule;
        let labels = expected(item("CIP_LABELS").unwrap_or_default());
        (item("STRUCTURE_ID").unwrap().to_owned(), molecule, labels)
    };
    Some(records.map(case).collect())
}

/// Structures whose labels differ from the published ones, with the reason; docs/labels.md says more.
/// Drawings do not mark a helix.
const SETTLED_DRAWN: &[(&str, &str)] = &[("VS010", "a helix"), ("VS011", "a helix")];

/// The same for structures in space, of which axes are not read.
const SETTLED_IN_SPACE: &[(&str, &str)] = &[
    ("VS023", "an axis"),
    ("VS055", "an axis"),
    ("VS057", "an axis"),
    ("VS072", "an axis"),
    ("VS073", "an axis"),
    ("VS086", "an axis"),
    ("VS158", "an axis"),
];

#[rstest]
#[case::smiles("suite as SMILES", from_smiles, &[], 291)]
#[case::drawn("suite as drawings", || from_sdf("compounds_2d.sdf"), &[SETTLED_DRAWN], 300)]
#[case::in_space(
    "suite in three dimensions",
    || from_sdf("compounds_3d.sdf"),
    &[SETTLED_DRAWN, SETTLED_IN_SPACE],
    300
)]
fn published_labels(
    #[case] name: &'static str,
    #[case] cases: fn() -> Option<Vec<Case>>,
    #[case] settled: &[&[(&str, &str)]],
    #[case] at_least: usize,
) {
    let Some(cases) = cases() else { return };
    let settled: BTreeMap<&str, &str> = settled.iter().copied().flatten().copied().collect();
    let mut comparer = Comparer::default();
    let mut tally = Tally::new(name);
    for (id, molecule, expected) in cases {
        let found = labels(&comparer.order(&molecule).unwrap());
        // A difference that is settled must be there, or its entry is out of date.
        let good = (found == expected) != settled.contains_key(id.as_str());
        tally.case(good, || {
            let missing: Vec<&String> = expected.difference(&found).collect();
            let unexpected: Vec<&String> = found.difference(&expected).collect();
            format!(
                "{id}: missing {missing:?}, unexpected {unexpected:?}, {:?}",
                settled.get(id.as_str())
            )
        });
    }
    tally.finish(at_least);
}

/// A molfile with a wedge beside the axis between two atoms, which says that rotation is hindered.
fn with_marked_axis(record: &str, [a, b]: [usize; 2]) -> String {
    let mut lines: Vec<String> = record.lines().map(str::to_owned).collect();
    let count = |from: usize| lines[3][from..from + 3].trim().parse::<usize>().unwrap();
    let (first, bonds) = (4 + count(0), count(3));
    for line in &mut lines[first..first + bonds] {
        let field = |at: usize| line[at..at + 3].trim().parse::<usize>().unwrap();
        let (from, to, order) = (field(0), field(3), field(6));
        let other = match a {
            _ if from == a && to != b => to,
            _ if to == a && from != b => from,
            _ => continue,
        };
        if order == 1 {
            *line = format!("{a:>3}{other:>3}  1  1");
            break;
        }
    }
    lines.join("\n")
}

/// In space an axis is read where a wedge says that there is one. The files have none, so it is put
/// there; the coordinates then say how the ends are turned.
#[test]
fn published_labels_of_axes_in_space() {
    let Some(folder) = shared("cip") else { return };
    let text = read_text(&folder.join("compounds_3d.sdf"));
    let mut comparer = Comparer::default();
    let mut tally = Tally::new("suite, axes in three dimensions");
    for record in text.split("$$$$") {
        let record = record.trim_start_matches(['\r', '\n']);
        let Some((id, _)) = SETTLED_IN_SPACE
            .iter()
            .find(|(id, _)| record.starts_with(id))
        else {
            continue;
        };
        let at = record.find("<CIP_LABELS>").unwrap();
        let expected = expected(record[at..].lines().nth(1).unwrap());
        let of_axis = expected.iter().filter(|label| label.ends_with(['M', 'P']));
        let ends: Vec<usize> = of_axis
            .map(|label| label[..label.len() - 1].parse().unwrap())
            .collect();
        let marked = with_marked_axis(record, ends.try_into().unwrap());
        let molecule = molfile::parse(marked.as_bytes()).unwrap().molecule;
        let found = labels(&comparer.order(&molecule).unwrap());
        tally.case(found == expected, || {
            format!("{id}: {found:?}, not {expected:?}")
        });
    }
    tally.finish(7);
}

/// FNV-1a, 32 bits, both halves folded into 16, as tests/scripts/cip_labels.py has it.
fn digest(text: &str) -> String {
    let fold = |value: u32, byte| (value ^ u32::from(byte)).wrapping_mul(0x0100_0193);
    let value = text.bytes().fold(0x811c_9dc5, fold);
    format!("{:04x}", (value >> 16) ^ (value & 0xffff))
}

/// The labels by atom, in the form that is digested.
fn written_labels(canonical: &Canonical) -> String {
    let mut labels: Vec<(u32, String)> = labels(canonical)
        .into_iter()
        .map(|label| {
            let digits = label.trim_end_matches(char::is_alphabetic).len();
            (label[..digits].parse().unwrap(), label)
        })
        .collect();
    labels.sort();
    let labels: Vec<String> = labels.into_iter().map(|(_, label)| label).collect();
    labels.join(" ")
}

#[rstest]
#[case::chiral("chiral", 39_989)]
#[case::natural_products("natural_products", 12_272)]
fn labels_of_collections(#[case] collection: &'static str, #[case] at_least: usize) {
    let Some(path) = shared(&format!("collections/{collection}.smi.gz")) else {
        return;
    };
    let structures = read_text(&path);
    let structures: Vec<&str> = structures.lines().map(first_word).collect();
    let settled = Table::read(&workspace("fixtures/labels/settled.tsv"));
    let settled: BTreeMap<&str, &str> = settled
        .columns(["collection", "record", "cause"])
        .filter(|row| row[0] == collection)
        .map(|[_, record, cause]| (record, cause))
        .collect();
    let digests = Table::read(&workspace("fixtures/labels/digests.tsv.gz"));
    let mut comparer = Comparer::default();
    let mut tally = Tally::new(collection);
    for [own, record, reference] in digests.columns(["collection", "record", "digest"]) {
        if own != collection {
            continue;
        }
        let text = structures[record.parse::<usize>().unwrap() - 1];
        let canonical = comparer.canonical(text).unwrap();
        let found = written_labels(&canonical);
        let agrees = digest(&found) == reference;
        // A record whose difference is settled must differ, or its entry is out of date.
        tally.case(agrees != settled.contains_key(record), || {
            format!("{record} ({:?}): {found} {text}", settled.get(record))
        });
    }
    tally.finish(at_least);
}
