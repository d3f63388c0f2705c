//! The text form, as a chemist sees it.

use insta::assert_snapshot;

use crate::runner::{demo, run};

/// Without the caution, which is the same everywhere.
fn compared(a: &str, b: &str) -> String {
    let out = demo(&["compare", a, b]).out;
    let (text, _) = out.split_once("\nThis compares").unwrap();
    text.to_owned()
}

#[test]
fn constitutional() {
    assert_snapshot!(compared("label.mol", "arrived.mol"), @"");
}

#[test]
fn bond_orders() {
    assert_snapshot!(compared("C=CCc1ccccc1 allylbenzene", "C/C=C/c1ccccc1 trans-1-propenylbenzene"), @"");
}

#[test]
fn chains() {
    assert_snapshot!(compared("CC(C)CC", "CCCCC"), @"");
}

#[test]
fn enantiomers() {
    assert_snapshot!(compared("hand-label.mol", "hand-arrived.mol"), @"");
}

#[test]
fn diastereomers() {
    assert_snapshot!(compared("O=C/C=C(C)/CCC=C(C)C geranial", "O=C/C=C(C)\\CCC=C(C)C neral"), @"");
}

#[test]
fn undetermined() {
    assert_snapshot!(compared("crossed-label.mol", "crossed-arrived.mol"), @"");
}

#[test]
fn unresolved() {
    assert_snapshot!(compared("half-label.mol", "half-arrived.mol"), @"");
}

#[test]
fn identical() {
    assert_snapshot!(compared("nitro-label.mol", "nitro-arrived.mol"), @"");
}

#[test]
fn identical_but_open() {
    assert_snapshot!(compared("wavy-label.mol", "wavy-arrived.mol"), @"");
}

#[test]
fn not_isomers() {
    assert_snapshot!(compared("salt-label.mol", "salt-arrived.mol"), @"");
}

#[test]
fn unreadable() {
    assert_snapshot!(compared("CCOC(=O)c1ccccc1", "CCOC(=O)c1cccc1"), @"");
}

#[test]
fn budget_ended() {
    let outcome = run(&["compare", "OCC=C=CO", "O=CC=CCO", "--steps", "1"]);
    let (text, _) = outcome.out.split_once("\nThis compares").unwrap();
    assert_snapshot!(text, @"");
}

#[test]
fn described() {
    assert_snapshot!(demo(&["describe", "half-label.mol", "CC[O-] ethoxide", "C1CC"]).out, @"");
}

#[test]
fn counted() {
    let outcome = demo(&["compare", "held.smi", "vendor.sdf", "--by", "name"]);
    let tally = outcome.out.lines().rev().nth(2).unwrap();
    assert_snapshot!(tally, @"");
}
