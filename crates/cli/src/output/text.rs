//! Text for a chemist at a terminal.

mod atoms;
mod beside;
pub(crate) mod describe;
mod layout;
pub(crate) mod pair;
pub(crate) mod samples;

use std::io::{self, Write};

use molkin_formats::source::Format;
use molkin_relate::wire::{Error, Group, Prepared};

pub(crate) use layout::Extent;
use layout::printable;

/// `held.smi, record 3: QM-103`; the record is left out where a source holds one only.
fn place(source: &str, record: u64, name: &str) -> String {
    let many = matches!(
        Format::of_name(source),
        Some((Format::Smiles | Format::Sdf, _))
    );
    let mut text = printable(source);
    if many || source == "-" || record > 1 {
        text.push_str(&format!(", record {record}"));
    }
    // A SMILES that was typed with its name shows it already.
    if !name.is_empty() && !source.ends_with(name) {
        text.push_str(": ");
        text.push_str(&printable(name));
    }
    text
}

/// "AND group 1".
fn group(group: Group) -> String {
    let kind = match group.kind {
        "and" => "AND",
        "or" => "OR",
        other => other,
    };
    format!("{kind} group {}", group.number)
}

/// The code, the place where there is one, and the message.
fn fault(error: &Error) -> String {
    let place = match (error.line, error.column) {
        (Some(line), Some(column)) => format!(" at line {line}, column {column}"),
        _ => String::new(),
    };
    format!("{}{place}: {}", error.code, printable(&error.message))
}

/// The source line that could not be read, with carets under the place.
fn excerpt(out: &mut impl Write, prepared: &Prepared) -> io::Result<()> {
    let Some(error) = prepared.read_error() else {
        return Ok(());
    };
    // The first line repeats the message.
    for line in error.render().to_string().lines().skip(1) {
        writeln!(out, "    {line}")?;
    }
    Ok(())
}
