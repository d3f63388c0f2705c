//! What is kept of each record, on disk: its name, its text, and what is wrong with it.

use std::{io, sync::Arc};

use super::store::{Store, Stored};

/// What is kept of a record.
#[derive(Debug, Clone, Default, PartialEq, Eq)]
pub(super) struct Entry {
    pub(super) name: String,
    /// What is wrong with it, or empty.
    pub(super) message: String,
    /// What is parsed when the record is needed again
    /// ([`RawRecord::keep`](molkin_formats::source::RawRecord::keep)); empty where it cannot be read.
    pub(super) structure: Vec<u8>,
}

/// The lengths of an entry's three parts stand before them.
const HEAD: usize = 12;

/// Keeps one record after another.
pub(super) struct Keeper {
    entries: Store,
    /// Where each entry starts.
    places: Store,
}

impl Keeper {
    pub(super) fn new() -> io::Result<Self> {
        Ok(Self {
            entries: Store::new()?,
            places: Store::new()?,
        })
    }

    pub(super) fn push(&mut self, entry: &Entry) -> io::Result<()> {
        let place = self.entries.length();
        self.places.write(&place.to_le_bytes())?;
        let parts = [
            entry.name.as_bytes(),
            entry.message.as_bytes(),
            &entry.structure,
        ];
        for part in parts {
            let length = u32::try_from(part.len()).map_err(io::Error::other)?;
            self.entries.write(&length.to_le_bytes())?;
        }
        parts.iter().try_for_each(|part| self.entries.write(part))
    }

    pub(super) fn finish(self) -> io::Result<Kept> {
        Ok(Kept {
            entries: self.entries.finish()?,
            places: self.places.finish()?,
        })
    }
}

/// All records that were kept; several threads may read them.
pub(super) struct Kept {
    entries: Stored,
    places: Stored,
}

impl Kept {
    /// That of a record.
    pub(super) fn get(&self, record: u64) -> io::Result<Entry> {
        let mut place = [0; 8];
        self.places.read(record * 8, &mut place)?;
        let mut place = u64::from_le_bytes(place);
        read(|bytes| {
            self.entries.read(place, bytes)?;
            place += bytes.len() as u64;
            Ok(())
        })
    }
}

fn read(mut fill: impl FnMut(&mut [u8]) -> io::Result<()>) -> io::Result<Entry> {
    let mut head = [0; HEAD];
    fill(&mut head)?;
    let mut lengths = head
        .as_chunks()
        .0
        .iter()
        .map(|length| u32::from_le_bytes(*length));
    let mut part = || -> io::Result<Vec<u8>> {
        let mut bytes = vec![0; lengths.next().unwrap_or_default() as usize];
        fill(&mut bytes)?;
        Ok(bytes)
    };
    let mut text = || String::from_utf8(part()?).map_err(io::Error::other);
    Ok(Entry {
        name: text()?,
        message: text()?,
        structure: part()?,
    })
}

/// Bytes that are read at once.
const WINDOW: u64 = 1 << 18;

/// Entries in the order of the records.
pub(super) struct InOrder {
    kept: Arc<Kept>,
    /// Where the window ends.
    next: u64,
    window: Vec<u8>,
    at: usize,
}

impl InOrder {
    pub(super) fn new(kept: Arc<Kept>) -> Self {
        Self {
            kept,
            next: 0,
            window: Vec::new(),
            at: 0,
        }
    }

    /// Fills the bytes with what comes next.
    fn fill(&mut self, mut bytes: &mut [u8]) -> io::Result<()> {
        while !bytes.is_empty() {
            if self.at == self.window.len() {
                let length = WINDOW.min(self.kept.entries.length() - self.next);
                if length == 0 {
                    return Err(io::ErrorKind::UnexpectedEof.into());
                }
                self.window.resize(length as usize, 0);
                self.kept.entries.read(self.next, &mut self.window)?;
                self.next += length;
                self.at = 0;
            }
            let there = &self.window[self.at..];
            let (now, later) = bytes.split_at_mut(there.len().min(bytes.len()));
            now.copy_from_slice(&there[..now.len()]);
            self.at += now.len();
            bytes = later;
        }
        Ok(())
    }
}

impl Iterator for InOrder {
    type Item = io::Result<Entry>;

    fn next(&mut self) -> Option<Self::Item> {
        let ended = self.at == self.window.len() && self.next == self.kept.entries.length();
        (!ended).then(|| read(|bytes| self.fill(bytes)))
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn entries_are_read_in_order_and_at_any_place() {
        let entries: Vec<Entry> = (0..3_000_usize)
            .map(|number| Entry {
                name: format!("name {number}"),
                message: "é".repeat(number % 5),
                structure: vec![number as u8; number % 400],
            })
            .collect();
        let mut keeper = Keeper::new().unwrap();
        for entry in &entries {
            keeper.push(entry).unwrap();
        }
        let kept = Arc::new(keeper.finish().unwrap());
        assert!(kept.entries.length() > 2 * WINDOW);
        let read: Vec<Entry> = InOrder::new(Arc::clone(&kept))
            .map(Result::unwrap)
            .collect();
        assert!(read == entries);
        for at in [2_999, 0, 1_234] {
            assert_eq!(kept.get(at).unwrap(), entries[at as usize]);
        }
    }
}
