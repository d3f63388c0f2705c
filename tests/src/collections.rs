//! Open collections of real structures.

use std::io::{Cursor, Read, Seek, SeekFrom};

use molkin_formats::source::{Format, ReadOptions, Records};

use crate::{read_text, shared};

/// The records of a collection, where it is there. That of drugs is a table of one column under a
/// header.
///
/// # Panics
/// If the file cannot be read.
pub fn collection(file: &'static str) -> Option<Records<'static>> {
    let path = shared("collections")?.join(file);
    let options = ReadOptions::default();
    if file.ends_with(".csv") {
        let mut text = Cursor::new(read_text(&path));
        let mut header = [0; 7];
        text.read_exact(&mut header).unwrap();
        assert_eq!(&header, b"smiles\n");
        text.seek(SeekFrom::Start(7)).unwrap();
        return Some(Records::new(file, text, Format::Smiles, options));
    }
    Some(Records::open(&path, options).unwrap())
}
