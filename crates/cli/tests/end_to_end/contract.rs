//! docs/output.md against real output.

use std::fs;

use rstest::rstest;
use serde_json::{Value, json};

use crate::{
    runner::{Outcome, demo, repository, run},
    schema::check,
};

/// The fenced JSON of the page.
fn blocks() -> Vec<Value> {
    let page = fs::read_to_string(repository().join("docs/output.md")).unwrap();
    let fenced = page.split("```json\n").skip(1);
    let texts = fenced.map(|rest| rest.split("```").next().unwrap());
    texts
        .map(|text| serde_json::from_str(text).unwrap())
        .collect()
}

fn schema(title: &str) -> Value {
    let found = blocks().into_iter().find(|block| block["title"] == title);
    found.unwrap()
}

fn objects(outcome: &Outcome) -> Vec<Value> {
    let lines = outcome.out.lines();
    lines
        .map(|line| serde_json::from_str(line).unwrap())
        .collect()
}

#[track_caller]
fn check_all(title: &str, outcome: &Outcome, expected: usize) {
    let (schema, objects) = (schema(title), objects(outcome));
    assert_eq!(objects.len(), expected);
    for object in objects {
        check(&schema, &object).unwrap();
    }
}

#[test]
fn a_tray_keeps_to_the_schemas() {
    let arguments = [
        "samples", "tray.csv", "--held", "held.smi", "--format", "jsonl",
    ];
    let objects = objects(&demo(&arguments));
    let types = [
        ("Tray", "tray"),
        ("Sample", "sample"),
        ("Hypothesis", "hypothesis"),
    ];
    let mut checked = 0;
    for (title, own) in types {
        let schema = schema(title);
        for object in objects.iter().filter(|object| object["type"] == own) {
            check(&schema, object).unwrap();
            checked += 1;
        }
    }
    assert_eq!(checked, objects.len());
    assert!(checked > 1 + 96 + 5);
}

#[test]
fn pairs_keep_to_the_schema() {
    let arguments = [
        "compare",
        "held.smi",
        "vendor.sdf",
        "--by",
        "name",
        "--format",
        "jsonl",
    ];
    check_all("Pair", &demo(&arguments), 14);
    check_all("Pair", &demo(&[&arguments[..], &["--brief"]].concat()), 14);
}

#[rstest]
#[case::not_isomers("C", "CC")]
#[case::isotopes("C", "[13CH4]")]
#[case::orders_change("C=CCC", "CC=CC")]
#[case::step_limit("CC(C)CCCO", "CCOCC(C)C")]
#[case::unknown_atom("C*", "CC")]
#[case::both_unreadable("C(", ")")]
#[case::axis("C[C@]=C=C", "CC=[C@@]=CC")]
#[case::metal("C[Zn]C", "C[Zn+].[CH3-]")]
#[case::nothing("[H][H]", "[2H][2H]")]
#[case::note("CCO |$$|", "OCC")]
fn odd_pairs_keep_to_the_schema(#[case] a: &str, #[case] b: &str) {
    let outcome = run(&["compare", a, b, "--steps", "1", "--format", "jsonl"]);
    check_all("Pair", &outcome, 1);
}

#[rstest]
#[case::salt("CCN", "CC[NH3+].[Cl-]", "salt", "identical")]
#[case::all(
    "CCN",
    "[13CH3]C[NH3+].[Cl-]",
    "salt,charge,tautomer,isotope,stereo",
    "identical"
)]
#[case::open("C[C@H](N)O.Cl", "CC(N)O", "salt,open-stereo", "identical")]
#[case::opposed("C[C@@H](N)O", "C[C@H](N)O.Cl", "salt,open-stereo", "stereo")]
#[case::not_enough("CCN", "[13CH3]C[NH3+].[Cl-]", "salt", "not-isomers")]
fn forms_keep_to_the_schema(
    #[case] a: &str,
    #[case] b: &str,
    #[case] axes: &str,
    #[case] relation: &str,
) {
    let outcome = run(&["compare", a, b, "--overlook", axes, "--format", "jsonl"]);
    check_all("Pair", &outcome, 1);
    let pair = &objects(&outcome)[0];
    assert_eq!(pair["relation"], relation);
    assert!(!pair["b"]["form"].as_str().unwrap().contains('.'));
    assert_eq!(outcome.status, i32::from(relation != "identical"));
}

#[test]
fn described_records_keep_to_the_schema() {
    let arguments = [
        "describe",
        "held.smi",
        "vendor.sdf",
        "C[13CH3]",
        "C[C@H](O)C(O)[C@H](O)C",
        "[Og]",
        "[300C]",
        "C*",
        "C(",
        "--format",
        "jsonl",
    ];
    check_all("Describe", &demo(&arguments), 36);
}

#[test]
fn the_example_is_real() {
    let example = blocks()
        .into_iter()
        .find(|block| block.get("title").is_none());
    let example = example.unwrap();
    let (a, b) = (&example["a"]["source"], &example["b"]["source"]);
    let outcome = run(&[
        "compare",
        a.as_str().unwrap(),
        b.as_str().unwrap(),
        "--format",
        "jsonl",
    ]);
    assert_eq!(objects(&outcome), [example]);
}

#[test]
fn an_array_holds_the_same_objects() {
    for command in [
        &["compare", "held.smi", "vendor.sdf", "--by", "name"][..],
        &["describe", "held.smi"],
    ] {
        let lines = objects(&demo(&[command, &["--format", "jsonl"]].concat()));
        let array = demo(&[command, &["--format", "json"]].concat()).out;
        let array: Vec<Value> = serde_json::from_str(&array).unwrap();
        assert_eq!(array, lines);
    }
}

/// The checker is worth something only if it refuses.
#[rstest]
#[case::missing("/open", None)]
#[case::unlisted("/a/colour", Some(json!("red")))]
#[case::type_of("/open", Some(json!("no")))]
#[case::word("/relation", Some(json!("cousins")))]
#[case::from_zero("/atom_map/0", Some(json!([0, 1])))]
#[case::too_long("/atom_map/0", Some(json!([1, 2, 3])))]
#[case::both("/errors", Some(json!([{"code": "x", "message": "y"}])))]
fn the_checker_refuses(#[case] pointer: &str, #[case] value: Option<Value>) {
    let mut object = blocks()
        .into_iter()
        .find(|block| block.get("title").is_none())
        .unwrap();
    let schema = schema("Pair");
    check(&schema, &object).unwrap();
    let (parent, key) = pointer.rsplit_once('/').unwrap();
    match (object.pointer_mut(parent).unwrap(), value) {
        (Value::Object(fields), Some(value)) => drop(fields.insert(key.to_owned(), value)),
        (Value::Object(fields), None) => drop(fields.remove(key)),
        (Value::Array(items), Some(value)) => items[key.parse::<usize>().unwrap()] = value,
        (place, _) => panic!("{place}"),
    }
    check(&schema, &object).unwrap_err();
}

/// The columns that the first table of a section lists.
fn listed(section: &str) -> String {
    let page = fs::read_to_string(repository().join("docs/output.md")).unwrap();
    let (_, section) = page.split_once(&format!("## {section}\n")).unwrap();
    let (_, table) = section.split_once("\n|---|---|\n").unwrap();
    let rows = table.lines().map_while(|line| line.strip_prefix("| `"));
    let columns: Vec<&str> = rows.filter_map(|row| row.split('`').next()).collect();
    columns.join(",")
}

#[test]
fn the_columns_are_those_of_the_page() {
    let header = |command| run(&[command, "C"]).out.lines().next().unwrap().to_owned();
    assert_eq!(header("keys"), listed("CSV of keys"));
    assert_eq!(
        header("keys"),
        "source,record,name,status,formula,smiles,constitution_key,compound_key,message,\
         parent_key,tautomer_key,open,labelled_constitution_key,isomer_key"
    );
    assert_eq!(header("families"), listed("Families"));
    assert_eq!(
        header("families"),
        "source,record,name,status,duplicates,possible_duplicates,stereo,forms,isomers,\
         first_source,first_record,relation,kind,open,message,explanation"
    );
}
