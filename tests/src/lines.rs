//! Many lines, on all processors.

use std::{
    ops::AddAssign,
    sync::atomic::{AtomicUsize, Ordering},
    thread,
};

/// Lines that a thread takes at a time.
const CHUNK: usize = 256;

/// Checks lines on as many threads as there are processors, each of which takes the next ones, and adds
/// up what they count. `checker` makes what a thread checks with; it is given the number of a line,
/// from 0, the line and the counts.
pub fn check_lines<C, F>(lines: &[&str], checker: impl Fn() -> F + Sync) -> C
where
    C: Default + AddAssign + Send,
    F: FnMut(usize, &str, &mut C),
{
    let next = AtomicUsize::new(0);
    let threads = thread::available_parallelism().map_or(1, usize::from);
    let work = || {
        let mut check = checker();
        let mut counts = C::default();
        loop {
            let from = next.fetch_add(CHUNK, Ordering::Relaxed).min(lines.len());
            let chunk = &lines[from..lines.len().min(from + CHUNK)];
            if chunk.is_empty() {
                return counts;
            }
            for (number, line) in (from..).zip(chunk) {
                check(number, line, &mut counts);
            }
        }
    };
    let mut all = C::default();
    thread::scope(|scope| {
        let workers: Vec<_> = (0..threads).map(|_| scope.spawn(work)).collect();
        for worker in workers {
            match worker.join() {
                Ok(counts) => all += counts,
                Err(panic) => std::panic::resume_unwind(panic),
            }
        }
    });
    all
}
