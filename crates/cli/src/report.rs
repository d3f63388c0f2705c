//! Where results and words go, and what the run has come to so far.

use std::{
    fmt::Display,
    io::{self, BufWriter, IsTerminal, StdoutLock, Write},
};

use crate::{exit::Status, output::Style, progress::Progress};

/// One run: buffered standard output, standard error, and the status earned so far.
pub(crate) struct Report {
    out: BufWriter<StdoutLock<'static>>,
    style: Style,
    status: Status,
    progress: Progress,
}

impl Report {
    /// A report to the standard streams.
    pub(crate) fn new() -> Self {
        let stdout = io::stdout();
        let style = Style::choose(stdout.is_terminal(), |name| std::env::var_os(name));
        Self {
            out: BufWriter::with_capacity(1 << 16, stdout.lock()),
            style,
            status: Status::Same,
            progress: Progress::new(),
        }
    }

    /// Standard output.
    pub(crate) fn out(&mut self) -> &mut impl Write {
        &mut self.out
    }

    /// How text on standard output looks.
    pub(crate) fn style(&self) -> Style {
        self.style
    }

    /// How far the work has come.
    pub(crate) fn progress(&self) -> &Progress {
        &self.progress
    }

    /// What the run has come to so far.
    pub(crate) fn status(&self) -> Status {
        self.status
    }

    /// Notes an outcome; a worse one stays.
    pub(crate) fn count(&mut self, status: Status) {
        self.status = self.status.max(status);
    }

    /// Says something on standard error, after everything written so far.
    pub(crate) fn say(&mut self, message: impl Display) -> io::Result<()> {
        // On a terminal both streams meet; their order should be that of the events.
        self.out.flush()?;
        self.progress.aside(|| words(message));
        Ok(())
    }

    /// Says what went wrong; the status is trouble from here on.
    pub(crate) fn trouble(&mut self, message: impl Display) -> io::Result<()> {
        self.count(Status::Trouble);
        self.say(message)
    }

    /// Writes out what is buffered.
    pub(crate) fn flush(&mut self) -> io::Result<()> {
        self.out.flush()
    }
}

/// Says something on standard error.
pub(crate) fn words(message: impl Display) {
    // Nobody can be told that standard error is closed.
    let _ = writeln!(io::stderr(), "molkin: {message}");
}
