//! Where results and words go, and what the run has come to so far.

use std::{
    fmt::Display,
    io::{self, IsTerminal, Write},
};

use crate::{
    args::{TableFormat, TableOutput},
    destination::Destination,
    exit::Status,
    output::Style,
    progress::Progress,
};

/// One run: where results go, standard error, and the status earned so far.
pub(crate) struct Report {
    out: Destination,
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
            out: Destination::standard(),
            style,
            status: Status::Same,
            progress: Progress::new(),
        }
    }

    /// Sends a table where it is wanted. Whether that can be; if not, it has been said.
    pub(crate) fn prepare_table(&mut self, table: &TableOutput) -> io::Result<bool> {
        if let Some(path) = &table.output {
            match Destination::file(path) {
                Ok(file) => self.out = file,
                Err(error) => {
                    self.trouble(format_args!("{}: {error}", path.display()))?;
                    return Ok(false);
                }
            }
        }
        if table.format == TableFormat::Parquet && self.out.is_terminal() {
            self.trouble("columns are nothing to read on a terminal: write to a file (--output)")?;
            return Ok(false);
        }
        Ok(true)
    }

    /// What results go to, for words.
    pub(crate) fn destination(&self) -> String {
        self.out.name()
    }

    /// Where results go.
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

    /// Writes out what is buffered and puts a file in its place.
    pub(crate) fn finish(&mut self) -> io::Result<()> {
        self.out.finish()
    }
}

/// Says something on standard error.
pub(crate) fn words(message: impl Display) {
    // Nobody can be told that standard error is closed.
    let _ = writeln!(io::stderr(), "molkin: {message}");
}
