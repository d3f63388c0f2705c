//! Streams of records.

use molkin_graph::Limits;
use std::io::{self, BufReader, Read};

use insta::assert_snapshot;
use rstest::rstest;

use super::Records;
use crate::molfile::ReadOptions;

const WATER: &str = "water


  1  0  0  0  0  0            999 V2000
    0.0000    0.0000    0.0000 O   0  0
M  END
";

/// What becomes of each record: its name and the number of its properties, or its title and error.
fn outcomes(text: &[u8], limits: Limits) -> Vec<String> {
    let options = ReadOptions {
        limits,
        ..ReadOptions::default()
    };
    let mut records = Records::new(BufReader::with_capacity(7, text), options);
    let mut found = Vec::new();
    while let Some(result) = records.next() {
        found.push(match result {
            Ok(record) => format!("{} {}", record.name, record.properties.len()),
            Err(error) => format!("{}! {error}", records.title()),
        });
    }
    found
}

fn read(text: &str) -> Vec<String> {
    outcomes(text.as_bytes(), Limits::default())
}

#[rstest]
#[case::nothing("", 0)]
#[case::blank_lines("\n \n\n", 0)]
#[case::one("W$$$$\n", 1)]
#[case::last_delimiter_missing("W$$$$\nW", 2)]
#[case::blank_lines_at_the_end("W$$$$\n\n\n", 1)]
#[case::delimiter_with_blanks("W$$$$  \nW$$$$\t\n", 2)]
#[case::data("W> <a>\n1\n\n> <b>\n2\n\n$$$$\n", 1)]
fn all_records_are_read(
    #[case] text: &str,
    #[case] count: usize,
    #[values("\n", "\r\n", "\r")] line_end: &str,
) {
    let found = read(&text.replace('W', WATER).replace('\n', line_end));
    assert_eq!(found.len(), count);
    assert!(
        found.iter().all(|outcome| outcome.starts_with("water ")),
        "{found:?}"
    );
}

#[test]
fn line_ends_may_change_within_a_file() {
    let text = [
        WATER.replace('\n', "\r\n"),
        "$$$$\r".to_owned(),
        WATER.replace('\n', "\r"),
    ]
    .concat();
    assert_eq!(
        read(&(text + "$$$$\n" + WATER)),
        ["water 0", "water 0", "water 0"]
    );
}

#[test]
fn a_failing_record_leaves_the_next_ones_alone() {
    let broken = WATER.replace("water", "broken").replace(" O ", " Ox");
    let text = [&broken, "> <a>\nb\n\n$$$$\n", WATER, "$$$$\n$$$$\n", WATER].concat();
    assert_snapshot!(read(&text).join("\n"), @r#"
    broken! 5:32: "Ox" is not the symbol of an element
    water 0
    ! 18:1: the record ends where the name line of a molfile is expected
    water 0
    "#);
}

/// Lines of an error count from the start of the file, and so do those of a note.
#[test]
fn places_are_those_of_the_file() {
    let text = [WATER, "$$$$\n", &WATER.replace("M  END", "M  ODD\nM  END")].concat();
    let records = Records::new(text.as_bytes(), ReadOptions::default());
    let notes: Vec<_> = records.flat_map(|record| record.unwrap().notes).collect();
    let places: Vec<_> = notes
        .iter()
        .map(|note| (note.code, note.span.unwrap().line))
        .collect();
    assert_eq!(places, [("unknown-line", 13)]);
}

#[test]
fn text_of_any_encoding_is_read() {
    let text = [
        b"\xEF\xBB\xBF".as_slice(),
        WATER.as_bytes(),
        b"> <\xb0C>\n-5 \xb1 1\n\n> <\xc2\xb0C>\n0\n\n",
    ]
    .concat();
    let record = Records::new(&text[..], ReadOptions::default())
        .next()
        .unwrap()
        .unwrap();
    assert_eq!(record.name, "water");
    let expected = [("°C", "-5 ± 1"), ("°C", "0")];
    assert_eq!(
        record.properties,
        expected.map(|(name, value)| (name.to_owned(), value.to_owned()))
    );
}

#[test]
fn what_exceeds_a_limit_fails_alone() {
    let long = WATER.replace("water", &"w".repeat(90));
    let text = [&long, "$$$$\n", WATER, "$$$$\n"].concat();
    let limits = Limits {
        line_bytes: 80,
        ..Limits::default()
    };
    assert_snapshot!(outcomes(text.as_bytes(), limits).join("\n"), @r"
    ! 1:81: the line is longer than 80 bytes
    water 0
    ");
    let long = [WATER, "> <a>\n", &"value\n".repeat(40), "\n$$$$\n", WATER].concat();
    let limits = Limits {
        record_bytes: 200,
        ..Limits::default()
    };
    assert_snapshot!(outcomes(long.as_bytes(), limits).join("\n"), @r"
    water! 24:1: the record is longer than 200 bytes
    water 0
    ");
}

#[test]
fn a_source_that_breaks_off_ends_the_records() {
    struct Broken;
    impl Read for Broken {
        fn read(&mut self, _: &mut [u8]) -> io::Result<usize> {
            Err(io::Error::other("the cable was pulled"))
        }
    }
    let text = [WATER, "$$$$\n", "cut"].concat();
    let source = BufReader::new(text.as_bytes().chain(Broken));
    let results: Vec<_> = Records::new(source, ReadOptions::default()).collect();
    assert_eq!(results.len(), 2);
    assert!(results[0].is_ok());
    assert_eq!(results[1].as_ref().unwrap_err().code(), "io-error");
}
