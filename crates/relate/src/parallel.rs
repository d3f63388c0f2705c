//! Work on a stream of items by several threads, with the results in the order of the items.
//!
//! The calling thread reads the items and takes the results; the others do the work between. Items go
//! to them in chunks, and only so many chunks are under way at once that memory does not follow the
//! length of the stream. What comes out does not depend on the number of threads.
//!
//! Chunks go round: once its results are taken, a chunk is filled again in the memory it has. So memory
//! is hardly asked for, and none is given back on another thread than that which got it, which costs
//! both of them.

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
    /// What comes in: storage that is filled again and again.
    type Item: Default + Send;
    /// What becomes of it: storage that is filled again and again.
    type Output: Default + Send;
    /// What a thread keeps from one item to the next, such as an
    /// [`Orderer`](molkin_graph::Orderer). No result may depend on it.
    type Scratch;

    /// Scratch for one thread.
    fn scratch(&self) -> Self::Scratch;

    /// Works on an item. `output` holds what became of some item before.
    fn run(&self, scratch: &mut Self::Scratch, item: &mut Self::Item, output: &mut Self::Output);

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
    /// on takes as long as the work. The first chunks are smaller.
    pub chunk: NonZeroUsize,
}

/// A chunk ends where its items have this many bytes.
const CHUNK_BYTES: usize = 1 << 16;
/// Chunks under way for each thread: those behind a chunk that takes long.
const CHUNKS_PER_THREAD: usize = 16;
/// A chunk has at most this part of the items before it, so that the threads come to the end of a short
/// stream at nearly the same time.
const PART: usize = 32;
/// But as many as this.
const SMALLEST_CHUNK: usize = 8;

/// Works on all items and hands each output to `sink`, in the order of the items. The first error of
/// `sink` ends it: no other item is begun then.
///
/// `fill` puts the next item in place of an old one, and gives false where there is none. It and `sink`
/// are called on the calling thread alone, and take turns: results that are there are taken before more
/// items are read. Where the system gives fewer threads than the plan says, it is done with those.
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
///     fn run(&self, orderer: &mut Orderer, text: &mut &'static str, key: &mut Option<String>) {
///         let molecule = smiles::parse(text).ok();
///         let canonical = molecule.and_then(|molecule| orderer.order(&molecule).ok());
///         *key = canonical.map(|canonical| canonical.compound_key().to_string());
///     }
///
///     fn bytes(text: &&'static str) -> usize {
///         text.len()
///     }
/// }
///
/// let plan = Plan { threads: NonZeroUsize::MIN.saturating_add(1), chunk: NonZeroUsize::MIN };
/// let mut texts = ["OCC", "CCO", "C1"].into_iter();
/// let fill = |item: &mut _| texts.next().map(|text| *item = text).is_some();
/// let mut keys = Vec::new();
/// in_order(&Keys, plan, fill, |key| {
///     keys.push(key.take());
///     Ok::<(), ()>(())
/// })?;
/// assert_eq!(keys[0], keys[1]);
/// assert_eq!(keys[2], None);
/// # Ok::<(), ()>(())
/// ```
pub fn in_order<W: Work, E>(
    work: &W,
    plan: Plan,
    fill: impl FnMut(&mut W::Item) -> bool,
    mut sink: impl FnMut(&mut W::Output) -> Result<(), E>,
) -> Result<(), E> {
    if plan.threads.get() == 1 {
        return alone(work, fill, sink);
    }
    let (desk, jobs) = Desk::new(work);
    thread::scope(|scope| match Team::start(scope, &desk, jobs, plan) {
        None => alone(work, fill, sink),
        Some(mut team) => {
            let outcome = share_out(&mut team, Filler::new(plan, fill), &mut sink);
            // After an error there may be chunks that nobody waits for.
            desk.close();
            outcome
        }
    })
}

fn share_out<W: Work, E>(
    team: &mut Team<'_, '_, W>,
    mut filler: Filler<W, impl FnMut(&mut W::Item) -> bool>,
    sink: &mut impl FnMut(&mut W::Output) -> Result<(), E>,
) -> Result<(), E> {
    let most = team.threads().get().saturating_mul(CHUNKS_PER_THREAD);
    let mut waiting = VecDeque::new();
    loop {
        let room = waiting.len() < most;
        let next = room.then(|| filler.next()).flatten();
        let idle = next.is_none();
        match next {
            Some(chunk) => waiting.push_back(team.submit(chunk, waiting.len())),
            None if waiting.is_empty() => return Ok(()),
            None => {}
        }
        if let Taken::Lost = take(&mut waiting, idle, &mut filler.spare, sink)? {
            return Ok(());
        }
    }
}

fn alone<W: Work, E>(
    work: &W,
    mut fill: impl FnMut(&mut W::Item) -> bool,
    mut sink: impl FnMut(&mut W::Output) -> Result<(), E>,
) -> Result<(), E> {
    let mut scratch = work.scratch();
    let (mut item, mut output) = (W::Item::default(), W::Output::default());
    while fill(&mut item) {
        work.run(&mut scratch, &mut item, &mut output);
        sink(&mut output)?;
    }
    Ok(())
}

/// Items on their way together, each with the place for its output.
struct Chunk<W: Work> {
    places: Vec<(W::Item, W::Output)>,
    /// How many places are taken.
    taken: usize,
}

/// Fills chunks.
struct Filler<W: Work, F> {
    fill: F,
    /// Chunks that are done with.
    spare: Vec<Chunk<W>>,
    /// The most items of a chunk.
    most: usize,
    /// Items so far.
    items: usize,
    ended: bool,
}

impl<W: Work, F: FnMut(&mut W::Item) -> bool> Filler<W, F> {
    fn new(plan: Plan, fill: F) -> Self {
        Self {
            fill,
            spare: Vec::new(),
            most: plan.chunk.get(),
            items: 0,
            ended: false,
        }
    }

    /// The next chunk; `None` where there are no more items.
    fn next(&mut self) -> Option<Chunk<W>> {
        let mut chunk = self.spare.pop().unwrap_or(Chunk {
            places: Vec::new(),
            taken: 0,
        });
        chunk.taken = 0;
        let most = self.most.min(SMALLEST_CHUNK.max(self.items / PART));
        let mut bytes = 0_usize;
        while chunk.taken < most && bytes < CHUNK_BYTES && !self.ended {
            if chunk.taken == chunk.places.len() {
                chunk.places.push(Default::default());
            }
            let item = &mut chunk.places[chunk.taken].0;
            if (self.fill)(item) {
                bytes = bytes.saturating_add(W::bytes(item));
                chunk.taken += 1;
            } else {
                self.ended = true;
            }
        }
        self.items = self.items.saturating_add(chunk.taken);
        (chunk.taken > 0).then_some(chunk)
    }
}

enum Taken {
    /// All that was there.
    All,
    /// A thread panicked, so a chunk has no results. The scope of the threads passes the panic on
    /// when it ends.
    Lost,
}

/// Takes the results that are there, from the oldest on; `wait`s for that one, if asked.
fn take<W: Work, E>(
    waiting: &mut VecDeque<Receiver<Chunk<W>>>,
    mut wait: bool,
    spare: &mut Vec<Chunk<W>>,
    sink: &mut impl FnMut(&mut W::Output) -> Result<(), E>,
) -> Result<Taken, E> {
    while let Some(oldest) = waiting.front() {
        let chunk = match std::mem::take(&mut wait) {
            true => oldest.recv().map_err(TryRecvError::from),
            false => oldest.try_recv(),
        };
        match chunk {
            Ok(mut chunk) => {
                let done = &mut chunk.places[..chunk.taken];
                done.iter_mut().try_for_each(|(_, output)| sink(output))?;
                spare.push(chunk);
            }
            Err(TryRecvError::Empty) => break,
            Err(TryRecvError::Disconnected) => return Ok(Taken::Lost),
        }
        waiting.pop_front();
    }
    Ok(Taken::All)
}
