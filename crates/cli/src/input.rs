//! Inputs: what an argument means, and the records it leads to.

use std::{
    collections::VecDeque,
    ffi::OsStr,
    fs,
    io::{self, BufRead, BufReader, Cursor, Read},
    path::Path,
};

use molkin_formats::{
    molfile::{self, ValenceTable},
    smiles,
    source::{Format, RawRecord, ReadOptions, Records, SourceError},
};
use thiserror::Error;

use crate::args::{Chemistry, FlagZero, Reading, Valences};

/// What an argument means.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
enum Meaning<'a> {
    /// A file whose extension tells its format.
    KnownFile(&'a Path),
    /// A file of any name.
    AnyFile(&'a Path),
    /// Standard input.
    Standard,
    /// The argument itself.
    Smiles(&'a str),
}

impl<'a> Meaning<'a> {
    fn of(argument: &'a OsStr) -> Self {
        // No SMILES is anything but ASCII.
        let Some(text) = argument.to_str() else {
            return Self::AnyFile(Path::new(argument));
        };
        if let Some(path) = text.strip_prefix("file:") {
            Self::AnyFile(Path::new(path))
        } else if let Some(smiles) = text.strip_prefix("smiles:") {
            Self::Smiles(smiles)
        } else if text == "-" {
            Self::Standard
        } else if Format::of_name(text).is_some() {
            Self::KnownFile(Path::new(text))
        } else {
            Self::Smiles(text)
        }
    }
}

/// What the arguments ask of the readers.
pub(crate) fn read_options(reading: &Reading) -> ReadOptions {
    let mut options = structure_options(&reading.chemistry);
    // No output has them.
    options.without_properties = true;
    options.columns.structure.clone_from(&reading.structure);
    options.columns.name.clone_from(&reading.name);
    options
}

/// What the arguments ask of the readers of structures.
pub(crate) fn structure_options(chemistry: &Chemistry) -> ReadOptions {
    let mut options = ReadOptions::default();
    options.smiles.strict = chemistry.strict;
    options.molfile.valences = match chemistry.valences {
        Valences::Early => ValenceTable::Early,
        Valences::Late => ValenceTable::Late,
    };
    options.molfile.flag_zero = match chemistry.flag_zero {
        FlagZero::Absolute => molfile::FlagZero::Absolute,
        FlagZero::Mixture => molfile::FlagZero::Mixture,
        FlagZero::Relative => molfile::FlagZero::Relative,
    };
    options
}

/// Whether the argument reads standard input.
pub(crate) fn is_standard(argument: &OsStr) -> bool {
    Meaning::of(argument) == Meaning::Standard
}

/// The length of the file that the argument means, where it is known; 0 where there is no file.
pub(crate) fn length(argument: &OsStr) -> Option<u64> {
    match Meaning::of(argument) {
        Meaning::KnownFile(path) | Meaning::AnyFile(path) => {
            let Ok(metadata) = fs::metadata(path) else {
                return Some(0);
            };
            metadata.is_file().then_some(metadata.len())
        }
        Meaning::Standard => None,
        Meaning::Smiles(_) => Some(0),
    }
}

/// Why an input cannot be opened.
#[derive(Debug, Error)]
pub(crate) enum OpenError {
    /// The file or stream fails.
    #[error(transparent)]
    Source(#[from] SourceError),
    /// No SMILES, but a file has this name.
    #[error("{name} is no SMILES, but there is a file of that name: write file:{name}")]
    FileName {
        /// The argument.
        name: String,
    },
}

/// The records of one input, not parsed yet. They are read as they are asked for, those looked at
/// ahead aside.
///
/// An input that breaks off ends there; [`Input::failure`] then says why.
pub(crate) struct Input {
    name: String,
    records: Records<'static>,
    ahead: VecDeque<RawRecord>,
    failure: Option<SourceError>,
    ended: bool,
}

impl Input {
    /// Opens what an argument means.
    pub(crate) fn open(argument: &OsStr, options: ReadOptions) -> Result<Self, OpenError> {
        let records = match Meaning::of(argument) {
            Meaning::KnownFile(path) => Records::open(path, options)?,
            Meaning::AnyFile(path) => Records::open_any(path, options)?,
            Meaning::Standard => standard(options)?,
            Meaning::Smiles(text) => {
                refuse_file_name(argument, text)?;
                let bytes = Cursor::new(text.as_bytes().to_vec());
                Records::new(text, bytes, Format::Smiles, options)
            }
        };
        Ok(Self {
            name: records.name().to_owned(),
            records,
            ahead: VecDeque::new(),
            failure: None,
            ended: false,
        })
    }

    /// The name of the file, `-`, or the SMILES.
    pub(crate) fn name(&self) -> &str {
        &self.name
    }

    /// Bytes of the file that have been taken; see [`length`].
    pub(crate) fn bytes_taken(&self) -> u64 {
        self.records.bytes_taken()
    }

    /// Why the input broke off, once it has.
    pub(crate) fn failure(&self) -> Option<&SourceError> {
        self.failure.as_ref()
    }

    /// How many records are still to come, if fewer than `most`; otherwise `most`.
    pub(crate) fn look_ahead(&mut self, most: usize) -> usize {
        while self.ahead.len() < most
            && let Some(record) = self.read()
        {
            self.ahead.push_back(record);
        }
        self.ahead.len().min(most)
    }

    fn read(&mut self) -> Option<RawRecord> {
        let mut record = RawRecord::default();
        self.read_into(&mut record).then_some(record)
    }

    fn read_into(&mut self, record: &mut RawRecord) -> bool {
        if self.ended {
            return false;
        }
        match self.records.cut_into(record) {
            Ok(true) => return true,
            Ok(false) => {}
            Err(failure) => self.failure = Some(failure),
        }
        self.ended = true;
        false
    }

    /// As the iterator, in place of a record that is done with; false where there is no other.
    pub(crate) fn next_into(&mut self, record: &mut RawRecord) -> bool {
        match self.ahead.pop_front() {
            Some(next) => {
                *record = next;
                true
            }
            None => self.read_into(record),
        }
    }
}

impl Iterator for Input {
    type Item = RawRecord;

    fn next(&mut self) -> Option<RawRecord> {
        self.ahead.pop_front().or_else(|| self.read())
    }
}

/// A mistyped file name should not turn into as many errors as the other file has records.
fn refuse_file_name(argument: &OsStr, text: &str) -> Result<(), OpenError> {
    let bare = argument == text;
    if bare && Path::new(text).exists() && smiles::parse(text).is_err() {
        let name = text.to_owned();
        return Err(OpenError::FileName { name });
    }
    Ok(())
}

/// The lines that decide the format of a stream without a name.
const TELLING_LINES: usize = 4;
/// As far as they are looked for.
const TELLING_BYTES: u64 = 1 << 16;

fn standard(options: ReadOptions) -> Result<Records<'static>, SourceError> {
    let mut stream = BufReader::new(io::stdin());
    // A pipe delivers in pieces of any size, so the first piece need not hold the telling lines.
    let mut start = Vec::new();
    let mut limited = stream.by_ref().take(TELLING_BYTES);
    for _ in 0..TELLING_LINES {
        let outcome = limited.read_until(b'\n', &mut start);
        if let Err(error) = outcome {
            return Err(SourceError::Open {
                name: "-".to_owned(),
                error,
            });
        }
    }
    let format = Format::guess(&start);
    let stream = Cursor::new(start).chain(stream);
    Ok(Records::new("-", stream, format, options))
}

#[cfg(test)]
mod tests {
    use super::*;

    #[track_caller]
    fn check(argument: &str, meaning: Meaning<'_>) {
        assert_eq!(Meaning::of(OsStr::new(argument)), meaning);
    }

    #[test]
    fn what_arguments_mean() {
        check("a.smi", Meaning::KnownFile(Path::new("a.smi")));
        check(
            "dir/B.SDF.gz",
            Meaning::KnownFile(Path::new("dir/B.SDF.gz")),
        );
        check("t.csv", Meaning::KnownFile(Path::new("t.csv")));
        check("file:CCO", Meaning::AnyFile(Path::new("CCO")));
        check("-", Meaning::Standard);
        check("CCO", Meaning::Smiles("CCO"));
        check("C.O", Meaning::Smiles("C.O"));
        check("smiles:a.smi", Meaning::Smiles("a.smi"));
        check("", Meaning::Smiles(""));
    }
}
