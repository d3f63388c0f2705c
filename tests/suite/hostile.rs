//! Damaged, long and deep input: a result or an error for each, and never a panic.

use std::collections::BTreeSet;

use molkin_formats::{molfile, sdf, smiles};
use molkin_graph::{Limits, Molecule};
use molkin_relate::{Relation, explain};
use molkin_tests::{
    Comparer, Numbers, Tally, definition_pairs, first_word, read_text, shared, workspace,
};
use rstest::rstest;

/// Small budgets, since nobody waits for the answers.
fn comparer() -> Comparer {
    Comparer::new(Limits {
        order_steps: 2_000,
        ..Limits::default()
    })
}

/// Everything that is done with a molecule.
fn use_up(comparer: &mut Comparer, molecule: Molecule) -> &'static str {
    let Ok(structure) = comparer.prepare(molecule) else {
        return "not ordered";
    };
    let canonical = structure.canonical();
    let written = smiles::write(&canonical.form());
    let _ = (canonical.stereo_elements(), canonical.remarks());
    let kept = written.lost.is_empty();
    let Ok(again) = comparer.structure(&written.text) else {
        return if kept {
            "not read back"
        } else {
            "a stated loss"
        };
    };
    let limits = Limits {
        map_steps: 200,
        ..Limits::default()
    };
    let Ok(verdict) = comparer.relate(&structure, &again) else {
        return "not related";
    };
    explain(&structure, &again, verdict.relation, &limits);
    match verdict.relation {
        Relation::Identical => "identical",
        _ if kept => "changed",
        _ => "a stated loss",
    }
}

/// Outcomes that no input may have: what is written without loss must come back as it was.
const WRONG: [&str; 2] = ["changed", "not read back"];

/// One to four changes of single bytes or stretches: overwritten, left out, doubled, cut off.
fn damaged(text: &str, alphabet: &[u8], numbers: &mut Numbers) -> Vec<u8> {
    let mut bytes = text.as_bytes().to_vec();
    for _ in 0..=numbers.below(4) {
        if bytes.is_empty() {
            break;
        }
        let at = numbers.below(bytes.len());
        let end = (at + 1 + numbers.below(6)).min(bytes.len());
        let other = alphabet[numbers.below(alphabet.len())];
        match numbers.below(6) {
            0 | 1 => bytes[at] = other,
            2 => bytes.insert(at, other),
            3 => drop(bytes.drain(at..end)),
            4 => {
                let stretch = bytes[at..end].to_vec();
                let to = numbers.below(bytes.len());
                bytes.splice(to..to, stretch);
            }
            _ if numbers.below(8) == 0 => bytes.truncate(at),
            _ => bytes[at] = numbers.below(256) as u8,
        }
    }
    bytes
}

/// Real records, damaged by bytes that mean something in SMILES.
#[test]
fn damaged_smiles_give_a_result_or_an_error() {
    const ALPHABET: &[u8] = b"CNOcnosSPFIBrl[]()=#$:/\\@+-.%0123456789Hh* \t|";
    let pairs = definition_pairs();
    let mut texts: Vec<String> = pairs
        .into_iter()
        .flat_map(|pair| [pair.a, pair.b])
        .collect();
    if let Some(path) = shared("collections/vendor.smi") {
        let text = read_text(&path);
        texts.extend(
            text.lines()
                .step_by(20)
                .map(|line| first_word(line).to_owned()),
        );
    }
    let mut numbers = Numbers::new(7);
    let mut comparer = comparer();
    let mut reader = smiles::Reader::default();
    let mut tally = Tally::new("damaged SMILES");
    let mut met = BTreeSet::new();
    for _ in 0..20_000 {
        let text = &texts[numbers.below(texts.len())];
        let text = damaged(text, ALPHABET, &mut numbers);
        let outcome = match reader.read(&text, 1) {
            Ok(record) => use_up(&mut comparer, record.molecule),
            Err(error) => {
                assert!(!error.render().to_string().is_empty());
                error.code()
            }
        };
        met.insert(outcome);
        tally.case(!WRONG.contains(&outcome), || {
            String::from_utf8_lossy(&text).into_owned()
        });
    }
    assert!(met.len() > 12, "the damage reaches too little: {met:?}");
    tally.finish(20_000);
}

#[test]
fn damaged_molfiles_give_a_result_or_an_error() {
    const ALPHABET: &[u8] = b" 0123456789-.CNOSPHRXAQLM\n\r\tvV*$>";
    let mut texts: Vec<String> = Vec::new();
    let mut take = |text: String, most: usize| {
        let records = text.split_inclusive("$$$$\n");
        texts.extend(records.map(str::to_owned).take(most));
    };
    for entry in std::fs::read_dir(workspace("fixtures/demo")).unwrap() {
        let path = entry.unwrap().path();
        if path
            .extension()
            .is_some_and(|extension| extension == "mol" || extension == "sdf")
        {
            take(read_text(&path), 100);
        }
    }
    for file in [
        "drawings/3d.sdf.gz",
        "collections/nci200.sdf.gz",
        "collections/hard.sdf.gz",
    ] {
        if let Some(path) = shared(file) {
            take(read_text(&path), 200);
        }
    }
    let mut numbers = Numbers::new(8);
    let mut comparer = comparer();
    let mut tally = Tally::new("damaged molfiles");
    let mut met = BTreeSet::new();
    for _ in 0..8_000 {
        let text = &texts[numbers.below(texts.len())];
        let text = damaged(text, ALPHABET, &mut numbers);
        let outcome = match molfile::parse(&text) {
            Ok(record) => use_up(&mut comparer, record.molecule),
            Err(error) => {
                assert!(!error.render().to_string().is_empty());
                error.code()
            }
        };
        met.insert(outcome);
        tally.case(!WRONG.contains(&outcome), || {
            String::from_utf8_lossy(&text).into_owned()
        });
        let records = sdf::Records::new(&text[..], molfile::ReadOptions::default());
        assert!(records.count() <= 6);
    }
    assert!(met.len() > 12, "the damage reaches too little: {met:?}");
    tally.finish(8_000);
}

/// Four-membered rings fused in a row, two for each turn: over one rung, back over the next.
fn ladder(turns: usize) -> String {
    format!("C1CC2C1{}CC2", "C1C2C2C1".repeat(turns))
}

/// Long and deep texts, read, ordered, written and related to themselves.
#[rstest]
#[case::parentheses("(".repeat(1_000_000), "branch-without-atom")]
#[case::open_branches("C(".repeat(150_000), "branch-not-closed")]
#[case::more_branches("C(".repeat(500_000), "too-many-atoms")]
#[case::ring_openings("C1".repeat(75_000), "duplicate-bond")]
#[case::ring_labels((10..100).map(|label| format!("C%{label}")).collect::<String>(), "ring-not-closed")]
#[case::chain("C".repeat(100_000), "identical")]
#[case::marked_double_bonds(format!("C{}", "/C=C/C".repeat(1_000)), "identical")]
#[case::polyene("C=C".repeat(1_000), "identical")]
#[case::polyyne("C#C".repeat(5_000), "identical")]
#[case::cumulene("C=".repeat(5_000) + "C", "identical")]
#[case::rings("C1CCCCC1".repeat(1_000), "identical")]
#[case::fused_rings(ladder(20), "identical")]
#[case::too_many_fused_rings(ladder(500), "a stated loss")]
#[case::branches("C(".repeat(50_000) + "C" + &")".repeat(50_000), "identical")]
#[case::nested("C(C)(".repeat(120) + "C" + &")".repeat(120), "identical")]
#[case::salts("[Na+].[Cl-].".repeat(2_000) + "O", "identical")]
#[case::waters("O.".repeat(5_000) + "O", "identical")]
#[case::hub(format!("C{}", "(C)".repeat(500)), "identical")]
#[case::great_hub(format!("C{}", "(C)".repeat(20_000)), "not ordered")]
#[case::open_centres(format!("C{}C", "C(F)".repeat(1_000)), "identical")]
#[case::marked_centres(format!("C{}C", "[C@H](F)".repeat(1_000)), "identical")]
fn long_and_deep_texts(#[case] text: String, #[case] expected: &str) {
    let mut comparer = Comparer::default();
    let outcome = match smiles::Reader::default().read(&text, 1) {
        Ok(record) => use_up(&mut comparer, record.molecule),
        Err(error) => error.code(),
    };
    assert_eq!(outcome, expected);
}
