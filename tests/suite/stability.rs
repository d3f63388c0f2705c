//! Structures of the kinds on which canonical strings are known to fail.

use molkin_formats::smiles;
use molkin_graph::Canonical;
use molkin_tests::{
    Comparer, Numbers, Tally, other_kekule_form, random_spelling, read_text, renumbered, workspace,
};

/// Copies of each structure.
const TIMES: usize = 200;

/// The canonical string is read as the same compound and written as itself, unless it says that it
/// has lost something.
fn read_back(comparer: &mut Comparer, canonical: &Canonical) -> Result<String, String> {
    let written = smiles::write(&canonical.form());
    if !written.lost.is_empty() {
        return Err(format!("{} loses {:?}", written.text, written.lost));
    }
    let again = comparer.canonical(&written.text)?;
    if again.compound_key() != canonical.compound_key() {
        return Err(format!("{} is read as another compound", written.text));
    }
    let text = smiles::write(&again.form()).text;
    if text != written.text {
        return Err(format!("{} becomes {text}", written.text));
    }
    Ok(text)
}

/// Copies with other spellings, Kekulé forms and orders have the same key and string.
fn check(comparer: &mut Comparer, text: &str, numbers: &mut Numbers) -> Result<(), String> {
    let molecule = comparer.molecule(text)?;
    let canonical = comparer.order(&molecule)?;
    let string = read_back(comparer, &canonical)?;
    let form = canonical.form();
    for _ in 0..TIMES {
        let spelled = match random_spelling(&form, numbers) {
            Some(spelling) => comparer.molecule(&spelling)?,
            None => molecule.clone(),
        };
        let copy = renumbered(&other_kekule_form(&spelled, numbers), numbers);
        let copy = comparer.order(&copy)?;
        if copy.compound_key() != canonical.compound_key() {
            return Err("a copy has another key".to_owned());
        }
        let other = smiles::write(&copy.form()).text;
        if other != string {
            return Err(format!("{string} and {other}"));
        }
    }
    Ok(())
}

#[test]
fn hard_structures_keep_key_and_string() {
    let text = read_text(&workspace("fixtures/stability/structures.smi"));
    let mut comparer = Comparer::default();
    let mut numbers = Numbers::new(7);
    let mut tally = Tally::new("hard structures");
    for line in text.lines().filter(|line| !line.starts_with('#')) {
        let outcome = check(&mut comparer, line, &mut numbers);
        tally.value(outcome.map_err(|error| format!("{line}: {error}")));
    }
    tally.finish(265);
}
