use molkin_graph::Limits;
use std::io::{self, BufReader, Read};

use crate::smiles::{ReadOptions, Records};

fn outcomes(text: &str, options: ReadOptions) -> Vec<Result<String, String>> {
    Records::new(text.as_bytes(), options)
        .map(|record| {
            record
                .map(|record| record.name)
                .map_err(|error| error.to_string())
        })
        .collect()
}

fn name(name: &str) -> Result<String, String> {
    Ok(name.to_owned())
}

#[test]
fn every_line_is_a_record() {
    let found = outcomes("C one\n\nC( three\r\nN four\n", ReadOptions::default());
    let broken = Err("3:2: the branch is opened and never closed".to_owned());
    assert_eq!(found, [name("one"), name(""), broken, name("four")]);
}

#[test]
fn only_the_text_after_the_last_line_end_does_not_count() {
    for (text, count) in [
        ("", 0),
        ("\n", 1),
        ("C", 1),
        ("C\n", 1),
        ("C\n\n", 2),
        ("C\r\n", 1),
    ] {
        assert_eq!(
            outcomes(text, ReadOptions::default()).len(),
            count,
            "{text:?}"
        );
    }
}

#[test]
fn a_long_line_fails_alone() {
    let limits = Limits {
        line_bytes: 6,
        ..Limits::default()
    };
    let found = outcomes(
        "CCCCCCCC\nC two\n",
        ReadOptions {
            limits,
            ..ReadOptions::default()
        },
    );
    let long = Err("1:7: the line is longer than 6 bytes".to_owned());
    assert_eq!(found, [long, name("two")]);
}

#[test]
fn a_failed_record_still_has_its_name() {
    let mut records = Records::new("C( broken one\nC\n".as_bytes(), ReadOptions::default());
    assert!(records.next().unwrap().is_err());
    assert_eq!(records.title(), "broken one");
    assert!(records.next().unwrap().is_ok());
    assert_eq!((records.title(), records.line()), (String::new(), 2));
}

/// Fails once its text has been read.
struct Failing<'a>(&'a [u8]);

impl Read for Failing<'_> {
    fn read(&mut self, buffer: &mut [u8]) -> io::Result<usize> {
        match self.0.read(buffer)? {
            0 => Err(io::Error::other("the disk is gone")),
            count => Ok(count),
        }
    }
}

#[test]
fn a_failing_source_ends_the_records() {
    let mut records = Records::new(
        BufReader::new(Failing(b"C one\nCC")),
        ReadOptions::default(),
    );
    assert!(records.next().unwrap().is_ok());
    let error = records.next().unwrap().unwrap_err();
    assert_eq!((error.code(), error.span().line), ("io-error", 2));
    assert!(records.next().is_none());
}
