//! Work on a stream of items by several threads, with the results in the order of the items.
//!
//! The calling thread reads the items and takes the results; the others do the work between. Items go
//! to them in chunks, and only so many chunks are under way at once that memory does not follow the
//! length of the stream. What comes out does not depend on the number of threads.

mod team;

#[cfg(test)]
mod tests;

use std::{
    collections::VecDeque,
    num::NonZeroUsize,
    sync::mpsc::{Receiver, TryRecvError},
    thread,
};

use team::{Desk, Team};

/// What is done with each item.
pub trait Work: Sync {
    /// What comes in.
    type Item: Send;
    /// What becomes of it.
    type Output: Send;
    /// What a thread keeps from one item to the next, such as an
    /// [`Orderer`](molkin_graph::Orderer). No result may depend on it.
    type Scratch;

    /// Scratch for one thread.
    fn scratch(&self) -> Self::Scratch;

    /// Works on an item.
    fn run(&self, scratch: &mut Self::Scratch, item: Self::Item) -> Self::Output;

    /// The memory an item takes, roughly, in bytes.
    fn bytes(item: &Self::Item) -> usize;
}

/// How work is shared out.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub struct Plan {
    /// Threads that work; that which calls is not counted. One means that the calling thread works
    /// alone.
    pub threads: NonZeroUsize,
    /// The most items that go to a thread at once. Few where an item takes long, many where passing it
    /// on takes as long as the work.
    pub chunk: NonZeroUsize,
}

/// A chunk ends where its items have this many bytes.
const CHUNK_BYTES: usize = 1 << 16;
/// Chunks under way for each thread: those behind a chunk that takes long.
const CHUNKS_PER_THREAD: usize = 16;

/// Works on all items and hands each output to `sink`, in the order of the items. The first error of
/// `sink` ends it: no other item is begun then.
///
/// `items` and `sink` are called on the calling thread alone, and take turns: results that are there
/// are taken before more items are read. Where the system gives fewer threads than the plan says, it
/// is done with those.
///
/// # Errors
/// The error of `sink`.
///
/// # Panics
/// If the work on an item panics.
///
/// # Examples
/// ```
/// use std::num::NonZeroUsize;
/// use molkin_formats::smiles;
/// use molkin_graph::{Limits, Orderer};
/// use molkin_relate::parallel::{Plan, Work, in_order};
///
/// struct Keys;
///
/// impl Work for Keys {
///     type Item = &'static str;
///     type Output = Option<String>;
///     type Scratch = Orderer;
///
///     fn scratch(&self) -> Orderer {
///         Orderer::new(Limits::default())
///     }
///
///     fn run(&self, orderer: &mut Orderer, text: &'static str) -> Option<String> {
///         let molecule = smiles::parse(text).ok()?;
///         Some(orderer.order(&molecule).ok()?.compound_key().to_string())
///     }
///
///     fn bytes(text: &&'static str) -> usize {
///         text.len()
///     }
/// }
///
/// let plan = Plan { threads: NonZeroUsize::MIN.saturating_add(1), chunk: NonZeroUsize::MIN };
/// let mut keys = Vec::new();
/// in_order(&Keys, plan, ["OCC", "CCO", "C1"].into_iter(), |key| {
///     keys.push(key);
///     Ok::<(), ()>(())
/// })?;
/// assert_eq!(keys[0], keys[1]);
/// assert_eq!(keys[2], None);
/// # Ok::<(), ()>(())
/// ```
pub fn in_order<W: Work, E>(
    work: &W,
    plan: Plan,
    items: impl Iterator<Item = W::Item>,
    mut sink: impl FnMut(W::Output) -> Result<(), E>,
) -> Result<(), E> {
    if plan.threads.get() == 1 {
        return alone(work, items, sink);
    }
    let (desk, jobs) = Desk::new(work);
    thread::scope(|scope| match Team::start(scope, &desk, jobs, plan) {
        None => alone(work, items, sink),
        Some(mut team) => {
            let outcome = share_out(&mut team, items.fuse(), &mut sink);
            // After an error there may be chunks that nobody waits for.
            desk.close();
            outcome
        }
    })
}

fn share_out<W: Work, E>(
    team: &mut Team<'_, '_, W>,
    mut items: impl Iterator<Item = W::Item>,
    sink: &mut impl FnMut(W::Output) -> Result<(), E>,
) -> Result<(), E> {
    let Plan { threads, chunk } = team.plan();
    let most = threads.get().saturating_mul(CHUNKS_PER_THREAD);
    let mut waiting = VecDeque::new();
    loop {
        let room = waiting.len() < most;
        let next = room.then(|| next_chunk::<W>(&mut items, chunk)).flatten();
        let idle = next.is_none();
        match next {
            Some(chunk) => waiting.push_back(team.submit(chunk, waiting.len())),
            None if waiting.is_empty() => return Ok(()),
            None => {}
        }
        if let Taken::Lost = take(&mut waiting, idle, sink)? {
            return Ok(());
        }
    }
}

fn alone<W: Work, E>(
    work: &W,
    mut items: impl Iterator<Item = W::Item>,
    mut sink: impl FnMut(W::Output) -> Result<(), E>,
) -> Result<(), E> {
    let mut scratch = work.scratch();
    items.try_for_each(|item| sink(work.run(&mut scratch, item)))
}

fn next_chunk<W: Work>(
    items: &mut impl Iterator<Item = W::Item>,
    most: NonZeroUsize,
) -> Option<Vec<W::Item>> {
    let mut chunk = Vec::new();
    let mut bytes = 0_usize;
    while chunk.len() < most.get()
        && bytes < CHUNK_BYTES
        && let Some(item) = items.next()
    {
        bytes = bytes.saturating_add(W::bytes(&item));
        chunk.push(item);
    }
    (!chunk.is_empty()).then_some(chunk)
}

enum Taken {
    /// All that was there.
    All,
    /// A thread panicked, so a chunk has no results. The scope of the threads passes the panic on
    /// when it ends.
    Lost,
}

/// Takes the results that are there, from the oldest on; `wait`s for that one, if asked.
fn take<T, E>(
    waiting: &mut VecDeque<Receiver<Vec<T>>>,
    mut wait: bool,
    sink: &mut impl FnMut(T) -> Result<(), E>,
) -> Result<Taken, E> {
    while let Some(oldest) = waiting.front() {
        let outputs = match std::mem::take(&mut wait) {
            true => oldest.recv().map_err(TryRecvError::from),
            false => oldest.try_recv(),
        };
        match outputs {
            Ok(outputs) => outputs.into_iter().try_for_each(&mut *sink)?,
            Err(TryRecvError::Empty) => break,
            Err(TryRecvError::Disconnected) => return Ok(Taken::Lost),
        }
        waiting.pop_front();
    }
    Ok(Taken::All)
}
