//! The quick way to keys and canonical text gives what the general one does. Whole files are compared
//! by the example `shortcuts`.

use molkin_tests::{Numbers, Shortcuts, Table, Tally, read_text, workspace};

#[test]
fn shortcuts_change_nothing() {
    let stability = read_text(&workspace("fixtures/stability/structures.smi"));
    let hard = stability.lines().filter(|line| !line.starts_with('#'));
    let golden = Table::read(&workspace("fixtures/golden/keys.tsv"));
    let golden: Vec<String> = golden
        .columns(["smiles"])
        .map(|[smiles]| smiles.to_owned())
        .collect();
    let mut shortcuts = Shortcuts::default();
    let mut numbers = Numbers::new(5);
    let mut tally = Tally::new("shortcuts");
    for text in hard.chain(golden.iter().map(String::as_str)) {
        for _ in 0..10 {
            let outcome = shortcuts.agree_on(text, &mut numbers);
            let outcome = outcome.and_then(|known| known.ok_or_else(|| format!("{text}: no key")));
            tally.value(outcome);
        }
    }
    tally.finish(3_250);
}
