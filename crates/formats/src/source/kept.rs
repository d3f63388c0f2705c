//! A record's structure kept as bytes, to be parsed again later.

use super::{RawRecord, raw::Cut};
use crate::raw::RawText;

const SMILES: u8 = b's';
const MOLFILE: u8 = b'm';

impl RawRecord {
    /// Appends what a parser needs to read the structure again; [`RawRecord::from_kept`] turns it back
    /// into a record. Data items of an SDF record and the other columns of a table are left out, and
    /// places in the source are forgotten. Of a record that cannot be read nothing useful is kept.
    ///
    /// # Examples
    /// ```
    /// use molkin_formats::source::{Format, Parser, RawRecord, ReadOptions, Records};
    ///
    /// let options = ReadOptions::default();
    /// let mut records = Records::new("stdin", &b"CCO ethanol\n"[..], Format::Smiles, options.clone());
    /// let mut bytes = Vec::new();
    /// records.cut().ok_or("a record")??.keep(&mut bytes);
    /// let again = Parser::new(&options).parse(RawRecord::from_kept(1, &bytes));
    /// assert_eq!((again.index, again.name.as_str()), (1, "ethanol"));
    /// assert_eq!(again.result?.molecule.atom_count(), 3);
    /// # Ok::<(), Box<dyn std::error::Error>>(())
    /// ```
    pub fn keep(&self, bytes: &mut Vec<u8>) {
        match &self.cut {
            Cut::Smiles(raw) => {
                bytes.push(SMILES);
                bytes.extend_from_slice(&raw.text);
            }
            Cut::Molfile(raw) => {
                bytes.push(MOLFILE);
                bytes.extend_from_slice(without_data_items(&raw.text));
            }
            #[cfg(feature = "table")]
            Cut::Row(raw) => {
                let (molfile, text) = raw.structure_text();
                bytes.push(if molfile { MOLFILE } else { SMILES });
                bytes.extend_from_slice(text);
            }
        }
    }

    /// A record from the bytes that [`RawRecord::keep`] made of one.
    pub fn from_kept(index: u64, bytes: &[u8]) -> Self {
        let (form, text) = bytes.split_first().unwrap_or((&SMILES, bytes));
        let raw = RawText {
            text: text.to_vec(),
            first_line: 1,
            fault: None,
        };
        let cut = match *form {
            MOLFILE => Cut::Molfile(raw),
            _ => Cut::Smiles(raw),
        };
        Self { index, cut }
    }
}

/// The lines up to the one that ends the molfile.
fn without_data_items(text: &[u8]) -> &[u8] {
    // Whatever the header says belongs to it.
    const HEADER_LINES: usize = 4;
    let mut length = 0;
    for (number, line) in text.split_inclusive(|&byte| byte == b'\n').enumerate() {
        length += line.len();
        if number >= HEADER_LINES && line.trim_ascii_end() == b"M  END" {
            break;
        }
    }
    &text[..length]
}
