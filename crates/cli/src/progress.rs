//! How far long work has come, on a terminal.

use std::{
    cell::Cell,
    io::{self, IsTerminal},
    rc::Rc,
    time::{Duration, Instant},
};

use indicatif::{HumanCount, ProgressBar, ProgressDrawTarget, ProgressStyle};

/// Work that is done before this shows nothing.
const PATIENCE: Duration = Duration::from_secs(1);

/// A bar on standard error. It is shown where that is a terminal and standard output is not: results
/// that go to the terminal show themselves how far the work is.
#[derive(Clone)]
pub(crate) struct Progress {
    bar: ProgressBar,
    wanted: bool,
    shown: Rc<Cell<bool>>,
    done: Rc<Cell<u64>>,
    start: Instant,
}

impl Progress {
    /// Progress that shows itself where somebody looks.
    pub(crate) fn new() -> Self {
        let wanted = io::stderr().is_terminal() && !io::stdout().is_terminal();
        Self {
            bar: ProgressBar::hidden(),
            wanted,
            shown: Rc::default(),
            done: Rc::default(),
            start: Instant::now(),
        }
    }

    /// How many bytes are to be read, where that is known.
    pub(crate) fn expect(&self, bytes: Option<u64>) {
        if let Some(bytes) = bytes {
            self.bar.set_length(bytes);
        }
        let template = match bytes {
            Some(_) => "{bar:30} {percent:>3} %  {msg}, {eta} left",
            None => "{spinner} {msg}, {elapsed} so far",
        };
        // The templates are known to be sound.
        if let Ok(style) = ProgressStyle::with_template(template) {
            self.bar.set_style(style.progress_chars("=> "));
        }
    }

    /// So many bytes have been read.
    pub(crate) fn reach(&self, bytes: u64) {
        if self.shown.get() {
            self.bar.set_position(bytes);
        }
    }

    /// One more result is there.
    pub(crate) fn done(&self) {
        let done = self.done.get() + 1;
        self.done.set(done);
        if !self.wanted {
            return;
        }
        if !self.shown.get() && self.start.elapsed() >= PATIENCE {
            self.shown.set(true);
            self.bar.set_draw_target(ProgressDrawTarget::stderr());
        }
        if self.shown.get() {
            self.bar.set_message(format!("{} done", HumanCount(done)));
        }
    }

    /// Takes the bar out of the way while something is said.
    pub(crate) fn aside(&self, say: impl FnOnce()) {
        self.bar.suspend(say);
    }

    /// Takes the bar away.
    pub(crate) fn end(&self) {
        self.bar.finish_and_clear();
    }
}
