//! Tables as comma-separated values (RFC 4180, but lines end in LF).

use std::io::{self, Write};

use csv::{Terminator, WriterBuilder};
use serde::Serialize;

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
pub(crate) fn write_field(text: &mut Vec<u8>, field: &str) {
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
