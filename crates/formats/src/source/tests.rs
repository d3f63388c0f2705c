//! Files and streams by format.

use std::{
    io::{self, BufReader, Read},
    path::Path,
};

use molkin_graph::{Limits, Orderer};
use rstest::rstest;

use super::{Format, Parser, RawRecord, ReadOptions, Records, SourceError};

#[rstest]
#[case("a.smi", Some((Format::Smiles, false)))]
#[case("a.smiles", Some((Format::Smiles, false)))]
#[case("dir.d/A.MOL", Some((Format::Molfile, false)))]
#[case("a.sd", Some((Format::Sdf, false)))]
#[case("a.sdf.gz", Some((Format::Sdf, true)))]
#[case("a.SMI.GZ", Some((Format::Smiles, true)))]
#[case("a.csv", Some((Format::Csv, false)))]
#[case("a.Tsv.gz", Some((Format::Tsv, true)))]
#[case("a.gz", None)]
#[case("a.txt", None)]
#[case("smi", None)]
#[case("", None)]
fn formats_by_name(#[case] name: &str, #[case] expected: Option<(Format, bool)>) {
    assert_eq!(Format::of_name(name), expected);
}

const WATER: &str = "water\n\n\n  1  0  0  0  0  0            999 V2000\n    0.0000    0.0000    0.0000 O\nM  END\n";

#[rstest]
#[case::sdf(WATER, Format::Sdf)]
#[case::cut_short("water\n\n\n  1  0", Format::Smiles)]
#[case::smiles("CCO\n\n\nC\n", Format::Smiles)]
#[case::heading("SMILES name\nC methane\n", Format::Smiles)]
#[case::empty("", Format::Smiles)]
fn formats_by_content(#[case] text: &str, #[case] expected: Format) {
    assert_eq!(Format::guess(text.as_bytes()), expected);
}

#[cfg(feature = "table")]
#[rstest]
#[case("\u{feff}id;Smiles\r\n1;C\r\n")]
#[case("SMILES\tname\rC\tmethane\r")]
fn tables_by_their_header(#[case] text: &str) {
    assert_eq!(Format::guess(text.as_bytes()), Format::Csv);
}

const DATA_ITEM: &str = ">  <batch>\n17\n\n$$$$\n";

/// The compound key of every record, read at once and read again from what is kept of it; and the
/// bytes that are kept.
fn kept(text: &str, format: Format) -> Vec<u8> {
    let options = ReadOptions::default();
    let mut parser = Parser::new(&options);
    let mut orderer = Orderer::new(Limits::default());
    let mut records = Records::new("test", text.as_bytes(), format, options);
    let mut all = Vec::new();
    while let Some(raw) = records.cut() {
        let raw = raw.unwrap();
        let mut bytes = Vec::new();
        raw.keep(&mut bytes);
        let again = RawRecord::from_kept(raw.index(), &bytes);
        let [first, second] = [raw, again].map(|raw| {
            let molecule = parser.parse(raw).result.unwrap().molecule;
            orderer.order(&molecule).unwrap().compound_key()
        });
        assert_eq!(first, second);
        all.extend_from_slice(&bytes);
    }
    all
}

#[test]
fn structures_are_kept_without_what_stands_beside_them() {
    assert_eq!(
        kept("C[C@H](O)F a b\nC\n", Format::Smiles),
        b"sC[C@H](O)F a bsC"
    );
    let named_like_an_end = WATER.replacen("\n\n", "\nM  END\n", 1);
    let sdf = format!("{WATER}{DATA_ITEM}{named_like_an_end}{DATA_ITEM}");
    let expected = format!("m{WATER}m{named_like_an_end}");
    assert_eq!(kept(&sdf, Format::Sdf), expected.as_bytes());
}

#[cfg(feature = "table")]
#[test]
fn structures_of_tables_are_kept_without_the_other_columns() {
    let table = format!("id,structure\n1, CCO \n2,\"{WATER}\"\n");
    let expected = format!("sCCOm{WATER}");
    assert_eq!(kept(&table, Format::Csv), expected.as_bytes());
}

/// Index, name and success of each record.
fn read(text: &str, format: Format) -> Vec<(u64, String, bool)> {
    Records::new("test", text.as_bytes(), format, ReadOptions::default())
        .map(|outcome| outcome.unwrap())
        .map(|outcome| (outcome.index, outcome.name, outcome.result.is_ok()))
        .collect()
}

#[test]
fn failed_records_count_and_keep_their_names() {
    let smiles = read("CCO ethanol\nC(C broken one\n\nO\n", Format::Smiles);
    let names: Vec<_> = smiles
        .iter()
        .map(|(index, name, _)| (*index, name.as_str()))
        .collect();
    assert_eq!(names, [(1, "ethanol"), (2, "broken one"), (3, ""), (4, "")]);
    assert!(smiles[0].2 && !smiles[1].2 && smiles[3].2);
    let sdf = read(
        &[WATER, "$$$$\nbroken\n$$$$\n", WATER].concat(),
        Format::Sdf,
    );
    let expected = [(1, "water", true), (2, "broken", false), (3, "water", true)];
    assert_eq!(
        sdf,
        expected.map(|(index, name, good)| (index, name.to_owned(), good))
    );
}

#[test]
fn a_molfile_is_at_least_one_record() {
    assert_eq!(read("", Format::Molfile), [(1, String::new(), false)]);
    assert_eq!(
        read(WATER, Format::Molfile),
        [(1, "water".to_owned(), true)]
    );
    assert!(read("", Format::Sdf).is_empty());
}

/// All that can be streams.
const FORMATS: &[Format] = &[
    Format::Smiles,
    Format::Sdf,
    #[cfg(feature = "table")]
    Format::Csv,
    #[cfg(feature = "table")]
    Format::Tsv,
];

#[test]
fn a_source_that_breaks_off_names_itself() {
    struct Broken;
    impl Read for Broken {
        fn read(&mut self, _: &mut [u8]) -> io::Result<usize> {
            Err(io::Error::other("the cable was pulled"))
        }
    }
    for format in FORMATS {
        let source = BufReader::new(Broken);
        let mut records = Records::new("lot 7", source, *format, ReadOptions::default());
        let error = records.next().unwrap().unwrap_err();
        assert_eq!(error.to_string(), "lot 7, line 1: the cable was pulled");
        assert!(records.next().is_none());
    }
}

#[test]
fn what_cannot_be_opened() {
    let open = |name: &str| Records::open(Path::new(name), ReadOptions::default()).unwrap_err();
    assert!(matches!(open("a.txt"), SourceError::UnknownFormat { .. }));
    assert!(matches!(
        open("no such folder/a.mol"),
        SourceError::Open { .. }
    ));
    assert!(
        open("no such folder/a.mol")
            .to_string()
            .starts_with("no such folder/a.mol: ")
    );
}

#[cfg(not(feature = "table"))]
#[test]
fn tables_need_the_feature() {
    let error = Records::open(Path::new("a.csv"), ReadOptions::default()).unwrap_err();
    assert!(matches!(error, SourceError::NoTables { .. }));
}

#[cfg(feature = "table")]
#[test]
fn a_table_without_structures_ends_with_its_header() {
    let open = |text: &'static str, format| {
        let mut records = Records::new("lot", text.as_bytes(), format, ReadOptions::default());
        let error = records.next().unwrap().unwrap_err();
        assert!(records.next().is_none());
        error.to_string()
    };
    assert_eq!(
        open("CCO,1\nCC,2\n", Format::Csv),
        r#"lot: no column is known to hold structures; there are: "CCO", "1""#
    );
    assert_eq!(
        open("smiles,id\nC,1\n", Format::Tsv),
        r#"lot: no column is known to hold structures; there are: "smiles,id""#
    );
    assert_eq!(
        open("\n\n", Format::Csv),
        "lot: the table is empty; its first line should name the columns"
    );
    assert_eq!(
        open("smiles,\"id\nC,1\n", Format::Csv),
        "lot: the header: 1:8: the quote is opened and not closed"
    );
    let rows = read("name,smiles\na,CC\nb,C(C\n,O\n", Format::Csv);
    let expected = [(1, "a", true), (2, "b", false), (3, "", true)];
    assert_eq!(
        rows,
        expected.map(|(index, name, good)| (index, name.to_owned(), good))
    );
}

#[cfg(not(feature = "gzip"))]
#[test]
fn compressed_files_need_the_feature() {
    let error = Records::open(Path::new("a.sdf.gz"), ReadOptions::default()).unwrap_err();
    assert!(matches!(error, SourceError::NoGzip { .. }));
}

#[cfg(feature = "gzip")]
mod compressed {
    use std::{fs, io::Write};

    use flate2::{Compression, write::GzEncoder};
    use molkin_graph::Shape;

    use super::*;

    fn pack(text: &str) -> Vec<u8> {
        let mut encoder = GzEncoder::new(Vec::new(), Compression::fast());
        encoder.write_all(text.as_bytes()).unwrap();
        encoder.finish().unwrap()
    }

    /// Two compressed streams in a row are one file; a damaged one is an error of the source.
    #[test]
    fn streams_in_a_row_and_damage() {
        let folder = std::env::temp_dir();
        let path = folder.join(format!("molkin-source-{}.smi.gz", std::process::id()));
        let packed = [pack("CCO a\n"), pack("C b\n")].concat();
        fs::write(&path, &packed).unwrap();
        let names: Vec<_> = Records::open(&path, ReadOptions::default())
            .unwrap()
            .map(|outcome| outcome.unwrap().name)
            .collect();
        fs::write(&path, &packed[..packed.len() / 2 - 9]).unwrap();
        let last = Records::open(&path, ReadOptions::default()).unwrap().last();
        fs::remove_file(&path).unwrap();
        assert_eq!(names, ["a", "b"]);
        assert!(matches!(last, Some(Err(SourceError::Read { .. }))));
    }

    /// Where the published drawings are at hand: all 700 are read, with as many centres as the
    /// SMILES of the same row marks.
    #[test]
    fn drawings_have_the_centres_of_their_smiles() {
        let folder = Path::new(env!("CARGO_MANIFEST_DIR")).join("../../../shared/data/drawings");
        if !folder.is_dir() {
            return;
        }
        for (drawings, strings, count) in [
            ("v2000.sdf.gz", "2d.smi", 700),
            ("3d.sdf.gz", "3d.smi", 200),
        ] {
            let open = |name| Records::open(&folder.join(name), ReadOptions::default()).unwrap();
            let mut rows = 0;
            for (drawn, written) in open(drawings).zip(open(strings)) {
                let [drawn, written] = [drawn, written].map(|row| row.unwrap().result.unwrap());
                assert_eq!(drawn.molecule.charge(), written.molecule.charge());
                if drawings.starts_with("v2000") {
                    assert_eq!(centres(&drawn), centres(&written), "row {}", rows + 1);
                }
                rows += 1;
            }
            assert_eq!(rows, count);
        }
    }

    fn centres(record: &crate::Record) -> usize {
        let marks = record.molecule.drawn_stereo().iter();
        marks
            .filter(|mark| mark.shape == Shape::Tetrahedral && mark.parity.is_some())
            .count()
    }
}
