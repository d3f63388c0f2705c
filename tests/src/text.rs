//! Files: where they are and what is in them.

use std::{
    collections::BTreeSet,
    fs::File,
    io::{Read, Write},
    path::{Path, PathBuf},
    sync::{Mutex, PoisonError},
};

/// A path of the repository.
pub fn workspace(path: &str) -> PathBuf {
    Path::new(env!("CARGO_MANIFEST_DIR")).join("..").join(path)
}

/// A path of the published data beside the repository; where it is absent, `None` and a message.
pub fn shared(path: &str) -> Option<PathBuf> {
    let place = workspace("../shared/data").join(path);
    if place.exists() {
        return Some(place);
    }
    say_skipped(path);
    None
}

/// Says once what is skipped, past the capture of test output, so that no run hides it.
fn say_skipped(path: &str) {
    static SAID: Mutex<BTreeSet<String>> = Mutex::new(BTreeSet::new());
    let mut said = SAID.lock().unwrap_or_else(PoisonError::into_inner);
    if said.insert(path.to_owned()) {
        let message = format!("skipped: ../shared/data/{path} is not there\n");
        // A closed error stream is no reason to fail.
        let _ = std::io::stderr().write_all(message.as_bytes());
    }
}

/// A whole file as text, decompressed where its name ends in `.gz`. Bytes that are no UTF-8 are
/// replaced.
///
/// # Panics
/// If the file cannot be read.
pub fn read_text(path: &Path) -> String {
    let mut file = File::open(path).unwrap_or_else(|error| panic!("{}: {error}", path.display()));
    let mut bytes = Vec::new();
    let outcome = if path.extension().is_some_and(|extension| extension == "gz") {
        flate2::read::MultiGzDecoder::new(file).read_to_end(&mut bytes)
    } else {
        file.read_to_end(&mut bytes)
    };
    outcome.unwrap_or_else(|error| panic!("{}: {error}", path.display()));
    String::from_utf8_lossy(&bytes).into_owned()
}

/// A line up to its first white space: the SMILES of a line of a SMILES file.
pub fn first_word(line: &str) -> &str {
    line.split_ascii_whitespace().next().unwrap_or_default()
}

/// A tab-separated table with a header line.
#[derive(Debug, Clone)]
pub struct Table {
    header: Vec<String>,
    rows: Vec<Vec<String>>,
}

impl Table {
    /// Reads a table.
    ///
    /// # Panics
    /// If the file cannot be read or has no line.
    pub fn read(path: &Path) -> Self {
        let text = read_text(path);
        let mut lines = text.lines().map(|line| {
            let fields = line.split('\t').map(str::to_owned);
            fields.collect::<Vec<_>>()
        });
        let header = lines
            .next()
            .unwrap_or_else(|| panic!("{}: no header", path.display()));
        Self {
            header,
            rows: lines.collect(),
        }
    }

    /// The rows, as the fields of the named columns.
    ///
    /// # Panics
    /// If a column or a field is missing.
    pub fn columns<const N: usize>(&self, names: [&str; N]) -> impl Iterator<Item = [&str; N]> {
        let places = names.map(|name| {
            let place = self.header.iter().position(|column| column == name);
            place.unwrap_or_else(|| panic!("no column {name} in {:?}", self.header))
        });
        self.rows
            .iter()
            .map(move |row| places.map(|place| row[place].as_str()))
    }
}
