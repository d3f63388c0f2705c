//! Molfiles of both versions against published data: ../shared/data/{drawings,cip,ctfile}.

use std::{
    collections::BTreeMap,
    fs::File,
    io::{BufRead, BufReader, Cursor, Read},
    path::Path,
};

use flate2::read::{GzDecoder, MultiGzDecoder};
use molkin_formats::{ReadError, Record, source};
use molkin_graph::{BuildError, Molecule, MoleculeBuilder, Shape};
use molkin_relate::Relation;
use molkin_tests::{Comparer, Table, Tally, first_word, read_text, shared, workspace};
use rstest::rstest;

/// The records of a file.
fn records(path: &Path) -> impl Iterator<Item = Result<Record, String>> {
    let records = source::Records::open(path, source::ReadOptions::default()).unwrap();
    records.map(|outcome| outcome.unwrap().result.map_err(|error| error.to_string()))
}

/// How a molecule and a SMILES are related.
fn relation(comparer: &mut Comparer, drawn: Molecule, smiles: &str) -> Result<Relation, String> {
    let drawn = comparer.prepare(drawn)?;
    let written = comparer.structure(smiles)?;
    Ok(comparer.relate(&drawn, &written)?.relation)
}

fn demand_identical(comparer: &mut Comparer, record: Record, smiles: &str) -> Result<(), String> {
    match relation(comparer, record.molecule, smiles)? {
        Relation::Identical => Ok(()),
        other => Err(format!("{other:?}")),
    }
}

#[rstest]
#[case::version_3000("drawings, version 3000", "v3000.sdf.gz", "2d.smi", 700)]
#[case::in_space("drawings in space", "3d.sdf.gz", "3d.smi", 200)]
fn drawings_say_what_their_smiles_say(
    #[case] name: &'static str,
    #[case] drawings: &str,
    #[case] smiles: &str,
    #[case] count: usize,
) {
    let Some(folder) = shared("drawings") else {
        return;
    };
    let smiles = read_text(&folder.join(smiles));
    let mut comparer = Comparer::default();
    let mut tally = Tally::new(name);
    for (line, record) in smiles.lines().zip(records(&folder.join(drawings))) {
        let good = record.and_then(|record| {
            let smiles = first_word(line);
            demand_identical(&mut comparer, record, smiles)
        });
        tally.value(good.map_err(|error| format!("{line}: {error}")));
    }
    tally.finish(count);
}

/// What a SMILES can say of a molecule: no single bonds about which rotation is hindered, and no
/// groups of centres.
fn sayable(molecule: &Molecule) -> Result<Molecule, BuildError> {
    let mut builder = MoleculeBuilder::new();
    for atom in molecule.atoms() {
        builder.add_atom(*atom);
    }
    for (a, b, order) in molecule.bonds() {
        builder.add_bond(a, b, order)?;
    }
    for mark in molecule.drawn_stereo() {
        let [a, b] = mark.centres;
        let hindered =
            mark.shape == Shape::Axis && molecule.neighbours(a).any(|(atom, _)| atom == b);
        if !hindered {
            builder.add_stereo(*mark);
        }
    }
    for mark in molecule.drawn_coordination() {
        builder.add_coordination(mark.clone());
    }
    builder.build()
}

/// Every structure of the CIP suite is the same as SMILES, flat and in space, where SMILES can say
/// it. Of the hindered axes only the wedges of the flat drawings speak.
#[rstest]
#[case::flat("CIP suite, flat", "compounds_2d.sdf", 7)]
#[case::in_space("CIP suite, in space", "compounds_3d.sdf", 0)]
fn cip_records_say_what_their_smiles_say(
    #[case] name: &'static str,
    #[case] file: &str,
    #[case] axes: usize,
) {
    let Some(folder) = shared("cip") else {
        return;
    };
    let smiles = read_text(&folder.join("compounds.smi"));
    let mut comparer = Comparer::default();
    let mut tally = Tally::new(name);
    let mut marked = 0;
    for (line, record) in smiles.lines().zip(records(&folder.join(file))) {
        let mut check = |mut record: Record| {
            let plain = sayable(&record.molecule).map_err(|error| error.to_string())?;
            let removed = record.molecule.drawn_stereo().len() - plain.drawn_stereo().len();
            let is_atropisomer = line
                .split('\t')
                .nth(4)
                .is_some_and(|kinds| kinds.contains("AT"));
            if removed > usize::from(is_atropisomer) {
                return Err("an axis is marked".to_owned());
            }
            marked += removed;
            record.molecule = plain;
            demand_identical(&mut comparer, record, first_word(line))
        };
        let good = record.and_then(&mut check);
        tally.value(good.map_err(|error| format!("{line}: {error}")));
    }
    assert_eq!(marked, axes, "hindered axes");
    tally.finish(300);
}

/// The files of the collection with their paths.
fn files(archive: &Path) -> Vec<(String, Vec<u8>)> {
    let mut archive = tar::Archive::new(GzDecoder::new(File::open(archive).unwrap()));
    let entries = archive.entries().unwrap().map(|entry| {
        let mut entry = entry.unwrap();
        let path = entry.path().unwrap().to_string_lossy().into_owned();
        let mut bytes = Vec::new();
        entry.read_to_end(&mut bytes).unwrap();
        (path, bytes)
    });
    entries.collect()
}

/// The first record of a file.
fn first_record(path: &str, bytes: Vec<u8>) -> Option<Result<Record, ReadError>> {
    let bytes = Cursor::new(bytes);
    let text: Box<dyn BufRead + Send> = if path.ends_with(".gz") {
        Box::new(BufReader::new(MultiGzDecoder::new(bytes)))
    } else {
        Box::new(bytes)
    };
    let options = source::ReadOptions::default();
    let mut records = source::Records::new(path, text, source::Format::Sdf, options);
    records.next().map(|outcome| outcome.unwrap().result)
}

/// What became of a file, in a few words: `identical`, the relation to the reference's SMILES, the
/// code of an error, or, where the SMILES has signs that ours does not read, how the formulas
/// compare.
fn outcome(
    comparer: &mut Comparer,
    record: Option<Result<Record, ReadError>>,
    smiles: &str,
) -> String {
    let molecule = match record {
        None => return "no record".to_owned(),
        Some(Err(error)) => return format!("refused: {}", error.code()),
        Some(Ok(record)) => sayable(&record.molecule).unwrap(),
    };
    if smiles.is_empty() {
        return "read, no reference".to_owned();
    }
    let drawn = molecule.formula();
    match relation(comparer, molecule, smiles) {
        Ok(Relation::Stereo(kind)) => kind.as_str().to_owned(),
        Ok(relation) => relation.as_str().to_owned(),
        Err(_) => {
            let written = comparer.molecule(&with_plain_bonds(smiles));
            match written.map(|written| written.formula() == drawn) {
                Ok(true) => "same formula".to_owned(),
                Ok(false) => "other formula".to_owned(),
                Err(_) => "reference not read".to_owned(),
            }
        }
    }
}

/// A SMILES with single bonds for the arrows and tildes of extensions, and without placeholders.
fn with_plain_bonds(smiles: &str) -> String {
    let mut text = smiles.to_owned();
    for placeholder in ["[*]->", "(<-[*])", "<-[*]", "([*])", "[*]"] {
        text = text.replace(placeholder, "");
    }
    for bond in ["->", "<-", "~"] {
        text = text.replace(bond, "-");
    }
    text
}

/// Each file of the collection gives the structure of the reference's SMILES, or what
/// fixtures/disputed/ctfile.tsv says of it.
#[test]
fn files_say_what_the_reference_says_or_are_judged() {
    let Some(folder) = shared("ctfile") else {
        return;
    };
    let judged = Table::read(&workspace("fixtures/disputed/ctfile.tsv"));
    let mut judged: BTreeMap<usize, String> = judged
        .columns(["row", "outcome", "reason"])
        .map(|[row, outcome, reason]| {
            assert!(!reason.is_empty(), "row {row} has no reason");
            (row.parse().unwrap(), outcome.to_owned())
        })
        .collect();
    let index = read_text(&folder.join("index.tsv"));
    let mut contents: BTreeMap<String, Vec<u8>> =
        files(&folder.join("files.tar.gz")).into_iter().collect();
    let mut comparer = Comparer::default();
    let mut tally = Tally::new("molfile collection");
    // The first column is the file, the last one the SMILES of the reference.
    for (row, line) in (1..).zip(index.lines().skip(1)) {
        let (path, _) = line.split_once('\t').unwrap();
        let (_, smiles) = line.rsplit_once('\t').unwrap();
        let record = first_record(path, contents.remove(path).unwrap());
        let found = outcome(&mut comparer, record, smiles);
        let expected = judged
            .remove(&row)
            .unwrap_or_else(|| "identical".to_owned());
        tally.case(found == expected, || {
            format!("row {row}, {path}: {found}, expected {expected}")
        });
    }
    assert!(judged.is_empty(), "judged and not there: {judged:?}");
    tally.finish(1750);
}
