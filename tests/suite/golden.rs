//! Keys that must not change unless their version does.

use std::fmt::Write;

use molkin_graph::KEY_VERSION;
use molkin_tests::{Comparer, Table, Tally, workspace};

const FILE: &str = "fixtures/golden/keys.tsv";

/// Frozen keys of diverse structures.
///
/// A key is a promise to whoever stored it. Where a change of perception, of the certificate or of
/// the hash is meant, raise `KEY_VERSION`, write the change into docs/changelog.md, and renew the
/// file: `MOLKIN_RENEW_GOLDEN=1 cargo test -p molkin-tests golden`. The structures stay; new ones
/// are added to the file by their SMILES alone and get their keys in the same way.
#[test]
fn keys_are_those_of_before() {
    let path = workspace(FILE);
    let table = Table::read(&path);
    let mut comparer = Comparer::default();
    if std::env::var_os("MOLKIN_RENEW_GOLDEN").is_some() {
        let mut text = "smiles\tconstitution_key\tcompound_key\n".to_owned();
        for [smiles] in table.columns(["smiles"]) {
            let canonical = comparer.canonical(smiles).unwrap();
            let keys = (canonical.constitution_key(), canonical.compound_key());
            writeln!(text, "{smiles}\t{}\t{}", keys.0, keys.1).unwrap();
        }
        std::fs::write(&path, text).unwrap();
        return;
    }
    let mut tally = Tally::new("golden keys");
    let version = format!("{KEY_VERSION}-");
    for [smiles, constitution, compound] in
        table.columns(["smiles", "constitution_key", "compound_key"])
    {
        let outcome = comparer.canonical(smiles).and_then(|canonical| {
            let found = (
                canonical.constitution_key().to_string(),
                canonical.compound_key().to_string(),
            );
            let same = (found.0.as_str(), found.1.as_str()) == (constitution, compound);
            if same && compound.starts_with(&version) {
                Ok(())
            } else {
                Err(format!("{smiles}: {found:?}"))
            }
        });
        tally.value(outcome);
    }
    tally.finish(60);
}
