//! A source that counts what is taken from it.

use std::{
    io::{self, Read},
    sync::{
        Arc,
        atomic::{AtomicU64, Ordering},
    },
};

/// Passes on what it reads.
#[derive(Debug)]
pub(super) struct Counted<R> {
    source: R,
    taken: Taken,
}

/// How much it was so far.
#[derive(Debug, Clone, Default)]
pub(super) struct Taken(Arc<AtomicU64>);

impl Taken {
    pub(super) fn bytes(&self) -> u64 {
        self.0.load(Ordering::Relaxed)
    }
}

impl<R> Counted<R> {
    pub(super) fn new(source: R) -> (Self, Taken) {
        let taken = Taken::default();
        let counted = Self {
            source,
            taken: taken.clone(),
        };
        (counted, taken)
    }
}

impl<R: Read> Read for Counted<R> {
    fn read(&mut self, buffer: &mut [u8]) -> io::Result<usize> {
        let read = self.source.read(buffer)?;
        self.taken.0.fetch_add(read as u64, Ordering::Relaxed);
        Ok(read)
    }
}
