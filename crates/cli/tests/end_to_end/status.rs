//! Exit status.

use rstest::rstest;

use crate::runner::{demo, run, with_input};

#[rstest]
#[case::same(&["compare", "CCO", "OCC"], 0)]
#[case::open(&["compare", "CC(N)O", "OC(N)C"], 0)]
#[case::differ(&["compare", "CCO", "COC"], 1)]
#[case::unreadable(&["compare", "CCO", "C1CC"], 2)]
#[case::unordered(&["compare", "C*", "C*"], 2)]
#[case::no_records(&["compare", "", ""], 2)]
#[case::no_file(&["compare", "none.mol", "C"], 2)]
#[case::table(&["compare", "none.csv", "C"], 2)]
#[case::argument_missing(&["compare", "C"], 2)]
#[case::argument_wrong(&["compare", "C", "C", "--by", "weight"], 2)]
#[case::keys(&["keys", "C", "CC"], 0)]
#[case::keys_failed(&["keys", "C", "C1"], 2)]
#[case::keys_no_file(&["keys", "none.smi", "C"], 2)]
#[case::describe(&["describe", "C"], 0)]
#[case::describe_failed(&["describe", "C("], 2)]
#[case::help(&["compare", "--help"], 0)]
#[case::version(&["--version"], 0)]
fn status(#[case] arguments: &[&str], #[case] expected: i32) {
    let outcome = run(arguments);
    assert_eq!(outcome.status, expected, "{outcome:?}");
}

#[rstest]
#[case("label.mol", "arrived.mol", 1)]
#[case("hand-label.mol", "hand-arrived.mol", 1)]
#[case("ring-label.mol", "ring-arrived.mol", 1)]
#[case("crossed-label.mol", "crossed-arrived.mol", 1)]
#[case("half-label.mol", "half-arrived.mol", 1)]
#[case("nitro-label.mol", "nitro-arrived.mol", 0)]
#[case("wavy-label.mol", "wavy-arrived.mol", 0)]
#[case("salt-label.mol", "salt-arrived.mol", 1)]
fn demo_pairs(#[case] a: &str, #[case] b: &str, #[case] expected: i32) {
    assert_eq!(demo(&["compare", a, b]).status, expected);
}

#[test]
fn one_pair_of_many_decides() {
    let same = with_input(&["compare", "-", "CCO"], "CCO\nOCC\n");
    assert_eq!(same.status, 0);
    let one_differs = with_input(&["compare", "-", "CCO"], "CCO\nCOC\n");
    assert_eq!(one_differs.status, 1);
    let one_fails = with_input(&["compare", "-", "CCO"], "CCO\nCOC\nC1\n");
    assert_eq!(one_fails.status, 2);
}
