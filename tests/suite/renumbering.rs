//! One key, whatever the order of atoms: in the molecule, in SMILES and in molfile lines.

use std::collections::BTreeMap;

use molkin_formats::{molfile, smiles};
use molkin_graph::{Atom, BondOrder, Element, Key, Molecule, MoleculeBuilder};
use molkin_tests::{
    Comparer, Numbers, Tally, all_markings, definition_pairs, first_word, molfiles,
    other_kekule_form, random_spelling, read_text, renumbered, renumbered_form, renumbered_molfile,
    shared, with_hydrogens_written,
};
use rstest::rstest;

/// Numberings of each ordinary structure, and of each highly symmetric one.
const TIMES: usize = 20;
const MANY_TIMES: usize = 1_000;

/// Structures to renumber: the committed ones, and real ones up to `count` in all.
fn structures(count: usize) -> Vec<String> {
    let pairs = definition_pairs();
    let mut texts: Vec<String> = pairs
        .into_iter()
        .flat_map(|pair| [pair.a, pair.b])
        .collect();
    let files = [
        "collections/vendor.smi",
        "relations/a.smi",
        "relations/claims_b.smi",
    ];
    for path in files.into_iter().filter_map(shared) {
        let text = read_text(&path);
        let step = text.lines().count() / (count / files.len());
        let lines = text.lines().step_by(step.max(1));
        texts.extend(lines.map(|line| first_word(line).to_owned()));
    }
    texts
}

/// Checks that a molecule and its renumbered copies share their keys.
fn molecule_copies(
    comparer: &mut Comparer,
    molecule: &Molecule,
    numbers: &mut Numbers,
    times: usize,
) -> Result<bool, String> {
    let key = comparer.key(molecule)?;
    for _ in 0..times {
        let copy = renumbered(molecule, numbers);
        if comparer.key(&copy)? != key {
            return Err(format!("another key: {copy:?}"));
        }
    }
    Ok(true)
}

/// The same with double bonds elsewhere in their rings.
fn kekule_forms(
    comparer: &mut Comparer,
    molecule: &Molecule,
    numbers: &mut Numbers,
    times: usize,
) -> Result<bool, String> {
    let key = comparer.key(molecule)?;
    for _ in 0..times {
        let copy = renumbered(&other_kekule_form(molecule, numbers), numbers);
        if comparer.key(&copy)? != key {
            return Err(format!("another key: {copy:?}"));
        }
    }
    Ok(true)
}

/// The same with all hydrogens as atoms.
fn hydrogens(
    comparer: &mut Comparer,
    molecule: &Molecule,
    numbers: &mut Numbers,
    times: usize,
) -> Result<bool, String> {
    let key = comparer.key(molecule)?;
    let written = with_hydrogens_written(molecule);
    if comparer.key(&written)? != key {
        return Err("another key with hydrogens written".to_owned());
    }
    molecule_copies(comparer, &written, numbers, times.div_ceil(TIMES))
}

/// The same with spellings: the canonical form in another order, written and read.
fn spellings(
    comparer: &mut Comparer,
    molecule: &Molecule,
    numbers: &mut Numbers,
    times: usize,
) -> Result<bool, String> {
    let canonical = comparer.order(molecule)?;
    let form = canonical.form();
    if !smiles::write(&form).lost.is_empty() {
        return Ok(false);
    }
    for _ in 0..times {
        let written = smiles::write(&renumbered_form(&form, numbers));
        let again = comparer.canonical(&written.text)?;
        if again.compound_key() != canonical.compound_key() {
            return Err(format!("another key: {}", written.text));
        }
    }
    Ok(true)
}

/// The same with a writer that shares nothing with the library's, where it can spell the structure.
fn random_spellings(
    comparer: &mut Comparer,
    molecule: &Molecule,
    numbers: &mut Numbers,
    times: usize,
) -> Result<bool, String> {
    let canonical = comparer.order(molecule)?;
    let form = canonical.form();
    for _ in 0..times {
        let Some(text) = random_spelling(&form, numbers) else {
            return Ok(false);
        };
        let again = comparer.canonical(&text)?;
        if again.compound_key() != canonical.compound_key() {
            return Err(format!("another key: {text}"));
        }
    }
    Ok(true)
}

/// Says whether it could check the molecule, or what is wrong.
type Check = fn(&mut Comparer, &Molecule, &mut Numbers, usize) -> Result<bool, String>;

#[rstest]
#[case::molecules("renumbered molecules", molecule_copies)]
#[case::kekule_forms("other Kekulé forms", kekule_forms)]
#[case::hydrogens("written hydrogens", hydrogens)]
#[case::spellings("respelled SMILES", spellings)]
#[case::random_spellings("random spellings", random_spellings)]
fn one_key_for_real_structures(#[case] name: &'static str, #[case] check: Check) {
    let mut comparer = Comparer::default();
    let mut numbers = Numbers::new(1);
    let mut tally = Tally::new(name);
    for text in structures(1_800) {
        let outcome = comparer
            .molecule(&text)
            .and_then(|molecule| check(&mut comparer, &molecule, &mut numbers, TIMES));
        if outcome != Ok(false) {
            tally.value(outcome.map_err(|error| format!("{text}: {error}")));
        }
    }
    let there = shared("relations").is_some();
    tally.finish(if there { 2_000 } else { 400 });
}

/// The neighbours of each corner of an icosahedron: a top, an upper and a lower ring, a bottom.
fn icosahedron() -> [[u32; 5]; 12] {
    std::array::from_fn(|corner| {
        let upper = |at: usize| 1 + (at % 5) as u32;
        let lower = |at: usize| 6 + (at % 5) as u32;
        let ring = (corner + 4) % 5;
        match corner {
            0 => [0, 1, 2, 3, 4].map(upper),
            11 => [0, 1, 2, 3, 4].map(lower),
            1..6 => [
                0,
                upper(ring + 1),
                upper(ring + 4),
                lower(ring),
                lower(ring + 4),
            ],
            _ => [
                11,
                lower(ring + 1),
                lower(ring + 4),
                upper(ring),
                upper(ring + 1),
            ],
        }
    })
}

/// C60 as a truncated icosahedron: an atom at each corner for each edge that leaves it, double
/// bonds along the edges, single bonds round the corners.
fn buckminsterfullerene() -> Molecule {
    let neighbours = icosahedron();
    let index = |from: u32, to: u32| {
        let place = neighbours[from as usize].iter().position(|&n| n == to);
        5 * from + place.unwrap() as u32
    };
    let mut builder = MoleculeBuilder::new();
    (0..60).for_each(|_| {
        builder.add_atom(Atom::new(Element::CARBON));
    });
    for from in 0..12 {
        for &to in &neighbours[from as usize] {
            if from < to {
                let (a, b) = (index(from, to), index(to, from));
                builder.add_bond(a, b, BondOrder::Double).unwrap();
            }
            for &next in &neighbours[from as usize] {
                if to < next && neighbours[to as usize].contains(&next) {
                    let (a, b) = (index(from, to), index(from, next));
                    builder.add_bond(a, b, BondOrder::Single).unwrap();
                }
            }
        }
    }
    let molecule = builder.build().unwrap();
    assert_eq!(molecule.bonds().len(), 90);
    molecule
}

#[rstest]
#[case::molecules("renumbered cages", molecule_copies)]
#[case::kekule_forms("Kekulé forms of cages", kekule_forms)]
#[case::hydrogens("cages with written hydrogens", hydrogens)]
#[case::spellings("respelled cages", spellings)]
#[case::random_spellings("random spellings of cages", random_spellings)]
fn one_key_for_symmetric_structures(#[case] name: &'static str, #[case] check: Check) {
    let mut comparer = Comparer::default();
    let mut numbers = Numbers::new(2);
    let mut tally = Tally::new(name);
    let cages = [
        "C12C3C4C1C5C2C3C45",
        "C12C3C4C5C1C1C6C2C2C3C3C4C4C5C1C1C6C2C3C41",
        "C1C2CC3CC1CC(C2)C3",
    ];
    let mut cages = Vec::from(cages.map(|text| comparer.molecule(text).unwrap()));
    cages.push(buckminsterfullerene());
    let inositols = inositols(&mut comparer);
    for molecule in cages.iter().chain(inositols.values()) {
        let outcome = check(&mut comparer, molecule, &mut numbers, MANY_TIMES);
        tally.value(outcome.map(|checked| assert!(checked)));
    }
    tally.finish(13);
}

/// A molecule for each key of cyclohexane-1,2,3,4,5,6-hexol.
fn inositols(comparer: &mut Comparer) -> BTreeMap<Key, Molecule> {
    let flat = comparer.molecule("OC1C(O)C(O)C(O)C(O)C1O").unwrap();
    let found: BTreeMap<Key, Molecule> = all_markings(&flat)
        .iter()
        .map(|molecule| (comparer.key(molecule).unwrap(), molecule.clone()))
        .collect();
    assert_eq!(found.len(), 9);
    found
}

/// Checks a molfile with its lines in other orders; see [`Check`].
fn molfile_copies(
    comparer: &mut Comparer,
    text: &str,
    numbers: &mut Numbers,
) -> Result<bool, String> {
    let Ok(record) = molfile::parse(text.as_bytes()) else {
        return Ok(false);
    };
    let key = comparer.key(&record.molecule)?;
    for _ in 0..TIMES {
        let Some(copy) = renumbered_molfile(text, numbers) else {
            return Ok(false);
        };
        let record = molfile::parse(copy.as_bytes());
        let record = record.map_err(|error| format!("{error}\n{copy}"))?;
        if comparer.key(&record.molecule)? != key {
            return Err(format!("another key\n{copy}"));
        }
    }
    Ok(true)
}

#[test]
fn one_key_for_molfiles() {
    let mut comparer = Comparer::default();
    let mut numbers = Numbers::new(3);
    let mut tally = Tally::new("renumbered molfiles");
    let published = [
        "drawings/v2000.sdf.gz",
        "collections/hard.sdf.gz",
        "collections/mols.1000.sdf.gz",
    ];
    for text in molfiles(&published) {
        let outcome = molfile_copies(&mut comparer, &text, &mut numbers);
        if outcome != Ok(false) {
            tally.value(outcome);
        }
    }
    let there = shared("drawings").is_some();
    tally.finish(if there { 2_000 } else { 25 });
}
