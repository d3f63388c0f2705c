//! The validation suite for CIP labels of Hanson et al., J. Chem. Inf. Model. 2018, 58, 1755:
//! ../shared/data/cip.

use std::collections::BTreeSet;

use molkin_formats::molfile;
use molkin_graph::{Canonical, Limits, Molecule};
use molkin_tests::{Comparer, Tally, read_text, shared};
use rstest::rstest;

/// The labels as the suite writes them: `<atom><label>`, both ends of a bond or axis.
fn labels(canonical: &Canonical) -> BTreeSet<String> {
    let elements = canonical.stereo_elements();
    let labels = canonical.labels(&Limits::default());
    let labelled = elements.iter().zip(labels);
    labelled
        .filter_map(|(element, labelling)| Some((element.centres, labelling.label()?)))
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

#[rstest]
#[case::smiles("suite as SMILES", from_smiles, 291)]
#[case::drawn("suite as drawings", || from_sdf("compounds_2d.sdf"), 300)]
#[case::in_space("suite in three dimensions", || from_sdf("compounds_3d.sdf"), 300)]
fn published_labels(
    #[case] name: &'static str,
    #[case] cases: fn() -> Option<Vec<Case>>,
    #[case] at_least: usize,
) {
    let Some(cases) = cases() else { return };
    let mut comparer = Comparer::default();
    let mut tally = Tally::new(name);
    for (id, molecule, expected) in cases {
        let found = labels(&comparer.order(&molecule).unwrap());
        tally.case(found == expected, || {
            let missing: Vec<&String> = expected.difference(&found).collect();
            let unexpected: Vec<&String> = found.difference(&expected).collect();
            format!("{id}: missing {missing:?}, unexpected {unexpected:?}")
        });
    }
    tally.finish(at_least);
}
