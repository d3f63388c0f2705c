//! Sorting more rows than memory holds.

use std::{cmp::Reverse, collections::BinaryHeap, io, ops::Range, rc::Rc, vec};

use super::store::{Store, Stored};

/// A row of fixed size, which can be written as numbers.
pub(super) trait Row: Ord + Copy {
    /// An array.
    type Numbers: Default + AsRef<[u64]> + AsMut<[u64]>;

    fn numbers(&self) -> Self::Numbers;

    fn of_numbers(numbers: Self::Numbers) -> Self;
}

impl Row for u64 {
    type Numbers = [u64; 1];

    fn numbers(&self) -> [u64; 1] {
        [*self]
    }

    fn of_numbers([number]: [u64; 1]) -> Self {
        number
    }
}

/// The most rows that are sorted at once: a chunk. Chunks are merged in the end.
const CHUNK: usize = 1 << 15;
/// The fewest bytes of a run that are read at once.
const READ_BYTES: usize = 1 << 12;

/// Takes rows in any order. Those that exceed the memory set go to a temporary file as sorted runs.
pub(super) struct Sorter<R> {
    /// Bytes of memory.
    memory: usize,
    chunk_rows: usize,
    open: Vec<R>,
    chunks: Vec<Vec<R>>,
    spilled: Option<(Store, Vec<Range<u64>>)>,
}

impl<R: Row> Sorter<R> {
    pub(super) fn new(memory: usize) -> Self {
        let rows = memory / size_of::<R>();
        Self {
            memory,
            chunk_rows: (rows / 4).clamp(2, CHUNK),
            open: Vec::new(),
            chunks: Vec::new(),
            spilled: None,
        }
    }

    pub(super) fn push(&mut self, row: R) -> io::Result<()> {
        if self.open.capacity() == 0 {
            self.open.reserve_exact(self.chunk_rows);
        }
        self.open.push(row);
        if self.open.len() < self.chunk_rows {
            return Ok(());
        }
        self.close_chunk();
        let rows = (self.chunks.len() + 1) * self.chunk_rows;
        match rows * size_of::<R>() > self.memory {
            true => self.spill(),
            false => Ok(()),
        }
    }

    fn close_chunk(&mut self) {
        let mut chunk = std::mem::take(&mut self.open);
        chunk.sort_unstable();
        self.chunks.push(chunk);
    }

    /// Writes the chunks to the file as one run.
    fn spill(&mut self) -> io::Result<()> {
        let (mut store, mut runs) = match self.spilled.take() {
            Some(spilled) => spilled,
            None => (Store::new()?, Vec::new()),
        };
        let start = store.length();
        for row in Sorted::merge(std::mem::take(&mut self.chunks), Vec::new())? {
            for number in row?.numbers().as_ref() {
                store.write(&number.to_le_bytes())?;
            }
        }
        runs.push(start..store.length());
        self.spilled = Some((store, runs));
        Ok(())
    }

    /// All rows in their order.
    pub(super) fn finish(mut self) -> io::Result<Sorted<R>> {
        self.close_chunk();
        let Some((store, runs)) = self.spilled else {
            return Sorted::merge(self.chunks, Vec::new());
        };
        let stored = Rc::new(store.finish()?);
        let share = (self.memory / runs.len()).max(READ_BYTES);
        let runs = runs.into_iter().map(|place| Run {
            stored: Rc::clone(&stored),
            place,
            bytes: Vec::new(),
            at: 0,
            read_bytes: share - share % size_of::<R::Numbers>(),
        });
        Sorted::merge(self.chunks, runs.collect())
    }
}

/// Rows in their order.
pub(super) struct Sorted<R> {
    sources: Vec<Source<R>>,
    /// The next row of each source that has one.
    next: BinaryHeap<Reverse<(R, usize)>>,
}

impl<R: Row> Sorted<R> {
    fn merge(chunks: Vec<Vec<R>>, runs: Vec<Run>) -> io::Result<Self> {
        let chunks = chunks
            .into_iter()
            .map(|rows| Source::Memory(rows.into_iter()));
        let mut sources: Vec<_> = chunks.chain(runs.into_iter().map(Source::Disk)).collect();
        let mut next = BinaryHeap::with_capacity(sources.len());
        for (index, source) in sources.iter_mut().enumerate() {
            next.extend(source.next()?.map(|row| Reverse((row, index))));
        }
        Ok(Self { sources, next })
    }

    fn step(&mut self) -> io::Result<Option<R>> {
        let Some(mut top) = self.next.peek_mut() else {
            return Ok(None);
        };
        let Reverse((row, index)) = *top;
        match self.sources[index].next()? {
            Some(following) => *top = Reverse((following, index)),
            None => {
                std::collections::binary_heap::PeekMut::pop(top);
            }
        }
        Ok(Some(row))
    }
}

impl<R: Row> Iterator for Sorted<R> {
    type Item = io::Result<R>;

    fn next(&mut self) -> Option<io::Result<R>> {
        self.step().transpose()
    }
}

enum Source<R> {
    Memory(vec::IntoIter<R>),
    Disk(Run),
}

impl<R: Row> Source<R> {
    fn next(&mut self) -> io::Result<Option<R>> {
        match self {
            Self::Memory(rows) => Ok(rows.next()),
            Self::Disk(run) => run.next(),
        }
    }
}

/// Sorted rows in a file.
struct Run {
    stored: Rc<Stored>,
    /// What has not been read yet.
    place: Range<u64>,
    bytes: Vec<u8>,
    at: usize,
    read_bytes: usize,
}

impl Run {
    fn next<R: Row>(&mut self) -> io::Result<Option<R>> {
        if self.at == self.bytes.len() {
            let left = self.place.end - self.place.start;
            let length = left.min(self.read_bytes as u64);
            self.bytes.resize(length as usize, 0);
            self.stored.read(self.place.start, &mut self.bytes)?;
            self.place.start += length;
            self.at = 0;
        }
        let bytes = self.bytes.get(self.at..).unwrap_or_default();
        let mut numbers = R::Numbers::default();
        for (number, eight) in numbers.as_mut().iter_mut().zip(bytes.as_chunks().0) {
            *number = u64::from_le_bytes(*eight);
        }
        let is_row = !bytes.is_empty();
        self.at += if is_row { size_of::<R::Numbers>() } else { 0 };
        Ok(is_row.then(|| R::of_numbers(numbers)))
    }
}

#[cfg(test)]
mod tests {
    use proptest::prelude::*;

    use super::*;

    fn sorted(rows: &[u64], memory: usize) -> (Vec<u64>, usize) {
        let mut sorter = Sorter::new(memory);
        for &row in rows {
            sorter.push(row).unwrap();
        }
        let runs = sorter.spilled.as_ref().map_or(0, |(_, runs)| runs.len());
        let rows = sorter.finish().unwrap().map(Result::unwrap);
        (rows.collect(), runs)
    }

    #[test]
    fn rows_beyond_the_memory_go_to_a_file() {
        let rows: Vec<u64> = (0..10_000).map(|row| row * 7919 % 10_007).collect();
        let (in_memory, no_runs) = sorted(&rows, 1 << 20);
        let (spilled, runs) = sorted(&rows, 1 << 13);
        assert_eq!(no_runs, 0);
        assert!(runs > 5, "{runs} runs");
        assert_eq!(in_memory, spilled);
        assert!(spilled.is_sorted());
    }

    proptest! {
        #[test]
        fn nothing_is_lost(rows in proptest::collection::vec(0..100_u64, 0..400), memory in 0..2_000_usize) {
            let mut expected = rows.clone();
            expected.sort_unstable();
            prop_assert_eq!(sorted(&rows, memory).0, expected);
        }
    }
}
