//! The threads that work, and the queue from which they take chunks.

use std::{
    num::NonZeroUsize,
    sync::{
        Mutex,
        atomic::{AtomicBool, Ordering},
        mpsc::{self, Receiver, Sender, SyncSender},
    },
    thread::{Builder, Scope},
};

use super::{Chunk, Plan, Work};

/// A chunk of items, and where its results are waited for.
pub(super) struct Job<W: Work> {
    chunk: Chunk<W>,
    reply: SyncSender<Chunk<W>>,
}

/// Where the threads take their work from.
pub(super) struct Desk<'w, W: Work> {
    work: &'w W,
    queue: Mutex<Receiver<Job<W>>>,
    closed: AtomicBool,
}

impl<'w, W: Work> Desk<'w, W> {
    /// A desk, and the way to it. The threads go on until that is dropped.
    pub(super) fn new(work: &'w W) -> (Self, Sender<Job<W>>) {
        let (jobs, queue) = mpsc::channel();
        let desk = Self {
            work,
            queue: Mutex::new(queue),
            closed: AtomicBool::new(false),
        };
        (desk, jobs)
    }

    /// From here on no item is begun.
    pub(super) fn close(&self) {
        self.closed.store(true, Ordering::Relaxed);
    }

    fn serve(&self) {
        let mut scratch = self.work.scratch();
        while let Some(Job { mut chunk, reply }) = self.next() {
            for (item, output) in &mut chunk.places[..chunk.taken] {
                if self.closed.load(Ordering::Relaxed) {
                    return;
                }
                self.work.run(&mut scratch, item, output);
            }
            // After an error of the sink nobody waits.
            let _ = reply.send(chunk);
        }
    }

    /// The next job; none when there will be no more.
    fn next(&self) -> Option<Job<W>> {
        // Nothing panics while it holds the lock.
        self.queue.lock().ok()?.recv().ok()
    }
}

/// The threads, for the one that hands out the work.
pub(super) struct Team<'scope, 'env, W: Work> {
    scope: &'scope Scope<'scope, 'env>,
    desk: &'scope Desk<'scope, W>,
    jobs: Sender<Job<W>>,
    plan: Plan,
    started: usize,
}

impl<'scope, 'env, W: Work> Team<'scope, 'env, W> {
    /// Starts a first thread; `None` if there can be none.
    pub(super) fn start(
        scope: &'scope Scope<'scope, 'env>,
        desk: &'scope Desk<'scope, W>,
        jobs: Sender<Job<W>>,
        plan: Plan,
    ) -> Option<Self> {
        let mut team = Self {
            scope,
            desk,
            jobs,
            plan,
            started: 0,
        };
        team.grow().then_some(team)
    }

    /// How many threads there can be.
    pub(super) fn threads(&self) -> NonZeroUsize {
        self.plan.threads
    }

    /// Hands out a chunk, with so many others under way; its results come from the receiver.
    pub(super) fn submit(&mut self, chunk: Chunk<W>, under_way: usize) -> Receiver<Chunk<W>> {
        let wanted = under_way >= self.started && self.started < self.plan.threads.get();
        if wanted && !self.grow() {
            // The system gives no more.
            self.plan.threads = NonZeroUsize::new(self.started).unwrap_or(NonZeroUsize::MIN);
        }
        let (reply, results) = mpsc::sync_channel(1);
        // If no thread is left to take it, that shows where the results are waited for.
        let _ = self.jobs.send(Job { chunk, reply });
        results
    }

    fn grow(&mut self) -> bool {
        let desk = self.desk;
        let grown = Builder::new()
            .spawn_scoped(self.scope, || desk.serve())
            .is_ok();
        self.started += usize::from(grown);
        grown
    }
}
