//! JSON: the same objects as one array or one to a line.

use std::io::{self, Write};

use crate::args::Format;

/// Writes objects one after another as they come. Text goes out as it is.
#[derive(Debug)]
pub(crate) struct Objects {
    layout: Layout,
    written: bool,
}

#[derive(Debug, Clone, Copy, PartialEq, Eq)]
enum Layout {
    Array,
    Lines,
    /// Text, no objects.
    Text,
}

impl Objects {
    /// A writer for the format.
    pub(crate) fn new(format: Format) -> Self {
        let layout = match format {
            Format::Json => Layout::Array,
            Format::Jsonl => Layout::Lines,
            Format::Text => Layout::Text,
        };
        Self {
            layout,
            written: false,
        }
    }

    /// Writes an object, which comes as text.
    pub(crate) fn write(&mut self, out: &mut impl Write, object: &[u8]) -> io::Result<()> {
        match (self.layout, self.written) {
            (Layout::Array, false) => out.write_all(b"[\n")?,
            (Layout::Array, true) => out.write_all(b",\n")?,
            (Layout::Lines | Layout::Text, _) => {}
        }
        self.written = true;
        out.write_all(object)?;
        if self.layout == Layout::Lines {
            out.write_all(b"\n")?;
        }
        Ok(())
    }

    /// Ends the output.
    pub(crate) fn finish(self, out: &mut impl Write) -> io::Result<()> {
        match (self.layout, self.written) {
            (Layout::Array, true) => out.write_all(b"\n]\n"),
            (Layout::Array, false) => out.write_all(b"[]\n"),
            (Layout::Lines | Layout::Text, _) => Ok(()),
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn written(format: Format, objects: &[&str]) -> String {
        let mut out = Vec::new();
        let mut writer = Objects::new(format);
        for object in objects {
            writer.write(&mut out, object.as_bytes()).unwrap();
        }
        writer.finish(&mut out).unwrap();
        String::from_utf8(out).unwrap()
    }

    #[test]
    fn arrays_and_lines() {
        assert_eq!(written(Format::Json, &[]), "[]\n");
        assert_eq!(written(Format::Json, &["1", "2"]), "[\n1,\n2\n]\n");
        assert_eq!(written(Format::Jsonl, &["1", "2"]), "1\n2\n");
        assert_eq!(written(Format::Text, &["a\n", "b\n"]), "a\nb\n");
    }
}
