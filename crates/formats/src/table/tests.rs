//! Tables from their text.
#![cfg(feature = "table")]

use std::io::{BufReader, Read};

use insta::assert_snapshot;
use molkin_graph::Limits;
use rstest::rstest;

use super::{Delimiter, ReadOptions, Records};
use crate::smiles;

fn options(limits: Limits) -> ReadOptions {
    ReadOptions {
        smiles: smiles::ReadOptions {
            limits,
            ..smiles::ReadOptions::default()
        },
        ..ReadOptions::default()
    }
}

/// Each row: title, atoms and properties, or its error.
fn rows(text: &[u8], limits: Limits, piece: usize) -> Vec<String> {
    let source = BufReader::with_capacity(piece, text);
    let mut records = Records::new(source, Delimiter::Detected, &options(limits)).unwrap();
    let mut found = Vec::new();
    while let Some(result) = records.next() {
        let title = records.title();
        found.push(match result {
            Ok(record) => {
                assert_eq!(record.name, title);
                let values: Vec<String> = record
                    .properties
                    .iter()
                    .map(|(name, value)| format!("{name}={value:?}"))
                    .collect();
                let atoms = record.molecule.atom_count();
                format!("{title}: {atoms} {}", values.join(" "))
            }
            Err(error) => format!("{title}! {}: {error}", error.code()),
        });
    }
    found
}

fn read(text: &str) -> String {
    rows(text.as_bytes(), Limits::default(), 64).join("\n")
}

#[rstest]
#[case::comma(",")]
#[case::semicolon(";")]
#[case::tab("\t")]
#[case::bar("|")]
fn rows_whatever_separates_them(
    #[case] delimiter: &str,
    #[values("\n", "\r\n", "\r")] line_end: &str,
    #[values(1, 5, 64)] piece: usize,
) {
    let text = "\u{feff}id,SMILES,batch,\"two words\"\n\nA 1,CCO,x,\"y, \"\"z\"\"\"\n B ,C=O,,\n";
    let text = text
        .replace("y,", "y")
        .replace(',', delimiter)
        .replace('\n', line_end);
    let found = rows(text.as_bytes(), Limits::default(), piece);
    let expected = [
        r#"A 1: 3 batch="x" two words="y \"z\"""#,
        r#"B: 2 batch="" two words="""#,
    ];
    assert_eq!(found, expected);
}

#[test]
fn places_are_those_of_the_file() {
    let text = "id,smiles,remark\n\
        a,C1CC,plain\n\
        b, CC)C ,blanks\n\
        c,\"C%12\",quoted\n\
        \"d\nd\",CXC,\"after a field\nof two lines\"\n\
        e,\"C\"\"C\",doubled quotes\n\
        f,C\n\
        g\n\
        h,C,,\n\
        i,C,fine\n";
    assert_snapshot!(read(text), @r#"
    a! ring-not-closed: 2:4: ring label 1 is opened and never closed
    b! branch-not-opened: 3:6: a branch is closed that was never opened
    c! ring-not-closed: 4:5: ring label 12 is opened and never closed
    d
    d! unexpected-character: 6:5: unexpected 'X' where an atom, a bond, a ring label, a branch or a dot is expected
    e! unexpected-character: 8:3: unexpected '"' where an atom, a bond, a ring label, a branch or a dot is expected
    f! field-count: 9:4: the row has 2 fields, but the header names 3
    g! field-count: 10:2: the row has 1 field, but the header names 3
    h! field-count: 11:6: the row has 4 fields, but the header names 3
    i: 1 remark="fine"
    "#);
}

/// Water of version 2000, methylamine of version 3000 with a doubled quote, both without a name.
const MOLFILES: &str = "remark,molfile,id
,\"

  first comment
  1  0  0  0  0  0            999 V2000
    0.0000    0.0000    0.0000 O   0  0
M  END
\",a
,\"

a \"\"quoted\"\" comment
  0  0  0     0  0            999 V3000
M  V30 BEGIN CTAB
M  V30 COUNTS 2 1 0 0 0
M  V30 BEGIN ATOM
M  V30 1 C 0 0 0 0
M  V30 2 N 1 0 0 0
M  V30 END ATOM
M  V30 BEGIN BOND
M  V30 1 1 1 2
M  V30 END BOND
M  V30 END CTAB
M  END\",b
";

#[rstest]
fn molfiles_in_fields(#[values("\n", "\r\n", "\r")] line_end: &str, #[values(5, 64)] piece: usize) {
    let text = MOLFILES.replace('\n', line_end);
    let found = rows(text.as_bytes(), Limits::default(), piece);
    assert_eq!(found, [r#"a: 1 remark="""#, r#"b: 2 remark="""#]);
}

/// The title of a molfile is the name where no column has names; places are lines of the file.
#[test]
fn molfiles_have_names_and_places() {
    let text = "x,mol\n1,\"water\n\n\n  1  0  0  0  0  0            999 V2000\n    0.0000    0.0000    0.0000 O   0  0\nM  END\"\n\
        2,\"none\n\n\n  1  0  0  0  0  0            999 V2000\n    0.0000    0.0000    0.0000 Xx  0  0\nM  END\"\n\
        3,\"a \"\"b\"\"\n\n\n  1  0  0  0  0  0            999 V2000\n    0.0000    0.0000    0.0000 Xx  0  0\nM  END\"\n\
        4,\"\n\n  0  0  0  0  0  0            999 V2000\nM  END\"\n\
        5,\"$RXN\n\n\n\nM  END\"\n\
        6,\"C\nM  EN\"\n";
    assert_snapshot!(read(text), @r#"
    water: 1 x="1"
    ! unknown-element: 12:32: "Xx" is not the symbol of an element
    ! unknown-element: 14:3: "Xx" is not the symbol of an element
    ! header-line-missing: 22:1: this is the counts line, but three lines belong before it: is a blank first line missing?
    ! unsupported: 24:4: a reaction file is not read
    M  EN: 1 x="6"
    "#);
}

#[test]
fn text_after_a_structure_is_a_name_only_without_a_column_of_names() {
    assert_snapshot!(read("smiles,x\nCCO ethanol,1\n,2\n"), @r#"
    ethanol: 3 x="1"
    : 0 x="2"
    "#);
    assert_snapshot!(read("smiles,id\nCCO ethanol,1\n"), @"1: 3 ");
}

#[test]
fn text_of_any_encoding_is_read() {
    let text = b"smiles,t / \xb0C,name\nC,-5 \xb1 1,caf\xc3\xa9\n";
    let found = rows(text, Limits::default(), 64);
    assert_eq!(found, [r#"café: 1 t / °C="-5 ± 1""#]);
    let found = rows(b"smiles,name\nC\xff,a\n", Limits::default(), 64);
    assert!(
        found[0].starts_with("a! unexpected-character: 2:2:"),
        "{found:?}"
    );
}

#[test]
fn a_quote_that_is_never_closed_costs_its_row_only() {
    let text = "smiles,name\nC,a\nCC,\"b\nCCC,c\nCCCC,\"d\"\n";
    assert_snapshot!(read(text), @r#"
    a: 1 
    ! quote-not-closed: 3:4: the quote is opened and not closed
    c: 3 
    d: 4 
    "#);
    let text = "smiles,name\nC,a\nCC,\"b\nCCC,c\n";
    assert_snapshot!(read(text), @r#"
    a: 1 
    ! quote-not-closed: 3:4: the quote is opened and not closed
    c: 3 
    "#);
    let text = "smiles,name\nC,\"a\nCC,b\nCCC,c\nCCCC,d\n";
    let limits = Limits {
        record_bytes: 12,
        ..Limits::default()
    };
    assert_snapshot!(rows(text.as_bytes(), limits, 64).join("\n"), @r#"
    ! record-too-long: 2:3: the record is longer than 12 bytes
    b: 2 
    c: 3 
    d: 4 
    "#);
}

#[test]
fn a_line_beyond_the_limit_leaves_the_next_ones_alone() {
    let limits = Limits {
        line_bytes: 12,
        ..Limits::default()
    };
    let text = "smiles,name\nCCCCCCCCCCC,a\nC,b\nCC,\"c\nCCCCCCCCCCCCCC\nC,d\n";
    assert_snapshot!(rows(text.as_bytes(), limits, 64).join("\n"), @r#"
    ! line-too-long: 2:13: the line is longer than 12 bytes
    b: 1 
    ! line-too-long: 5:13: the line is longer than 12 bytes
    d: 1 
    "#);
}

/// Every line opens a quote as a row of its own, and within a quoted field closes that and opens
/// another. Each could take all that follows; but lines are read twice at most.
#[test]
fn quotes_that_never_end_take_linear_time() {
    let rows = 100_000;
    let text = "smiles,name\n".to_owned() + &"\",x\",x\",\"\n".repeat(rows);
    let limits = Limits {
        record_bytes: 1 << 19,
        ..Limits::default()
    };
    let records = Records::new(text.as_bytes(), Delimiter::Detected, &options(limits)).unwrap();
    let outcomes: Vec<_> = records
        .map(|record| record.map_err(|error| error.code()))
        .collect();
    assert!(outcomes.iter().all(|outcome| outcome.is_err()));
    assert!(outcomes.len() >= 2, "{}", outcomes.len());
}

/// A million fields in a row are counted and not kept; so many columns are refused.
#[test]
fn fields_beyond_the_header_take_no_memory() {
    let text = format!("smiles,name\nC,a{}\nC,b\n", ",".repeat(1_000_000));
    let mut records = Records::new(
        text.as_bytes(),
        Delimiter::Detected,
        &ReadOptions::default(),
    )
    .unwrap();
    let error = records.next().unwrap().unwrap_err();
    assert_eq!(
        error.to_string(),
        "2:5: the row has 1000002 fields, but the header names 2"
    );
    assert!(
        records.rows.capacity() < 8 << 20,
        "{}",
        records.rows.capacity()
    );
    assert!(records.next().unwrap().is_ok());
    let text = format!("smiles{}\n", ",".repeat(20_000));
    let error = Records::new(
        text.as_bytes(),
        Delimiter::Detected,
        &ReadOptions::default(),
    );
    assert_eq!(
        error.err().map(|error| error.to_string()).as_deref(),
        Some("the table has more than 16384 columns")
    );
}

/// Millions of lines in one quoted field are refused within the limit of memory.
#[test]
fn memory_follows_the_limit() {
    let head = &b"smiles,name\nC,\""[..];
    let endless = std::io::repeat(b'\n').take(1 << 22);
    let limits = Limits {
        record_bytes: 1 << 16,
        ..Limits::default()
    };
    let source = BufReader::new(head.chain(endless));
    let mut records = Records::new(source, Delimiter::Detected, &options(limits)).unwrap();
    assert_eq!(
        records.next().unwrap().unwrap_err().code(),
        "record-too-long"
    );
    assert!(
        records.rows.capacity() <= 1 << 19,
        "{}",
        records.rows.capacity()
    );
    assert!(records.next().is_none());
}
