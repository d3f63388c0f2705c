//! Tables as comma-separated values (RFC 4180, but lines end in LF).

use std::io::{self, Write};

use csv::{Terminator, WriterBuilder};
use molkin_relate::wire::KeyRow;
use serde::Serialize;

/// The columns of `molkin keys`: the fields of [`KeyRow`]. New ones go to the end.
pub(crate) const HEADER: &[u8] = b"source,record,name,status,formula,smiles,constitution_key,\
    compound_key,message,parent_key,tautomer_key\n";

/// Appends a row to a text. Fields go in one by one, as nothing but text and one number needs
/// the generality of a serializer, which took longer than reading a record does.
pub(crate) fn write_row(text: &mut Vec<u8>, row: &KeyRow) -> io::Result<()> {
    write_field(text, &row.source);
    write!(text, ",{},", row.record)?;
    write_field(text, &row.name);
    // None of these has a comma, a quote or a line end in its alphabet, so they are not searched for it.
    for field in [
        row.status,
        &row.formula,
        &row.smiles,
        &row.constitution_key,
        &row.compound_key,
    ] {
        text.push(b',');
        text.extend_from_slice(field.as_bytes());
    }
    text.push(b',');
    write_field(text, &row.message);
    for key in [&row.parent_key, &row.tautomer_key] {
        text.push(b',');
        text.extend_from_slice(key.as_bytes());
    }
    text.push(b'\n');
    Ok(())
}

/// The columns of `molkin samples`: the fields of [`molkin_relate::wire::SampleRow`]. New ones go to the
/// end.
pub(crate) const SAMPLE_COLUMNS: [&str; 21] = [
    "line",
    "id",
    "plate",
    "well",
    "verdict",
    "flagged",
    "relation",
    "kind",
    "same_apart_from",
    "label_smiles",
    "received_smiles",
    "mz",
    "adduct",
    "mz_expected",
    "ppm",
    "mz_fits",
    "formula_fits",
    "hypotheses",
    "sentence",
    "remark",
    "message",
];

/// Writes a header and rows.
pub(crate) fn write_rows(
    out: &mut impl Write,
    columns: &[&str],
    rows: impl Iterator<Item = impl Serialize>,
) -> io::Result<()> {
    let mut writer = WriterBuilder::new()
        .terminator(Terminator::Any(b'\n'))
        .has_headers(false)
        .from_writer(out);
    writer.write_record(columns)?;
    for row in rows {
        writer.serialize(row)?;
    }
    writer.flush()
}

/// A field as it is, or in quotes where a byte in it would end it.
fn write_field(text: &mut Vec<u8>, field: &str) {
    if !field
        .bytes()
        .any(|byte| matches!(byte, b',' | b'"' | b'\n' | b'\r'))
    {
        text.extend_from_slice(field.as_bytes());
        return;
    }
    text.push(b'"');
    for (at, piece) in field.split('"').enumerate() {
        if at > 0 {
            text.extend_from_slice(b"\"\"");
        }
        text.extend_from_slice(piece.as_bytes());
    }
    text.push(b'"');
}

#[cfg(test)]
mod tests {
    use super::*;

    /// The writer of the csv crate, serializing the row, is the reference.
    #[test]
    fn rows_are_those_of_a_general_writer() {
        let texts = [
            "",
            "a",
            "a b",
            "a,b",
            "\"",
            "say \"no\", he",
            "two\nlines",
            "\r",
            "é;'\t#",
            "x\"y\"\"",
        ];
        let mut text = HEADER.to_vec();
        let mut writer = csv::WriterBuilder::new().from_writer(Vec::new());
        for (at, first) in texts.into_iter().enumerate() {
            for second in texts {
                let row = KeyRow {
                    source: first.to_owned(),
                    record: (at * 1_000) as u64,
                    name: second.to_owned(),
                    status: "ok",
                    formula: "CH4".to_owned(),
                    smiles: "C[C@H](O)/C=C/F".to_owned(),
                    constitution_key: "1-00".to_owned(),
                    compound_key: String::new(),
                    message: first.to_owned(),
                    parent_key: "1-11".to_owned(),
                    tautomer_key: String::new(),
                };
                write_row(&mut text, &row).unwrap();
                writer.serialize(&row).unwrap();
            }
        }
        let expected = String::from_utf8(writer.into_inner().unwrap()).unwrap();
        assert_eq!(String::from_utf8(text).unwrap(), expected);
    }
}
