//! Temporary files that are read at any place.

use std::{
    fs::File,
    io::{self, BufWriter, Read, Seek, SeekFrom, Write},
    sync::{Mutex, PoisonError},
};

/// Bytes that go to the file at once.
const BUFFER: usize = 1 << 18;

/// A file without a name in the system's folder for temporary files: it is gone when the process is,
/// however that ends.
pub(super) struct Store {
    file: BufWriter<File>,
    length: u64,
}

impl Store {
    pub(super) fn new() -> io::Result<Self> {
        Ok(Self {
            file: BufWriter::with_capacity(BUFFER, tempfile::tempfile()?),
            length: 0,
        })
    }

    /// Bytes written so far.
    pub(super) fn length(&self) -> u64 {
        self.length
    }

    pub(super) fn write(&mut self, bytes: &[u8]) -> io::Result<()> {
        self.length += bytes.len() as u64;
        self.file.write_all(bytes)
    }

    /// Ends the writing.
    pub(super) fn finish(self) -> io::Result<Stored> {
        let Self { file, length } = self;
        let file = file.into_inner().map_err(|error| error.into_error())?;
        Ok(Stored {
            file: Mutex::new(file),
            length,
        })
    }
}

/// A temporary file that has been written; several threads may read it.
pub(super) struct Stored {
    file: Mutex<File>,
    length: u64,
}

impl Stored {
    pub(super) fn length(&self) -> u64 {
        self.length
    }

    /// Fills the bytes from a place of the file on.
    pub(super) fn read(&self, place: u64, bytes: &mut [u8]) -> io::Result<()> {
        // Each use begins with a seek, so one that broke off leaves nothing behind.
        let mut file = self.file.lock().unwrap_or_else(PoisonError::into_inner);
        file.seek(SeekFrom::Start(place))?;
        file.read_exact(bytes)
    }
}
