//! The three header lines and the counts line.

use crate::{
    ReadErrorKind,
    molfile::{
        block::{Fault, Line, Lines},
        field::decode,
    },
};

/// The version that a counts line states.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(super) enum Version {
    /// Written before versions were: V2000 in all but the name.
    Unstated,
    V2000,
    V3000,
}

/// What the first four lines say.
#[derive(Debug)]
pub(super) struct Header<'a> {
    pub(super) name: String,
    pub(super) counts: Line<'a>,
    pub(super) version: Version,
}

const COUNTS: &str = "a counts line";

/// Takes the header lines. The second and third say nothing about the structure: whether a drawing
/// is flat follows from its coordinates.
pub(super) fn read<'a>(lines: &mut Lines<'a>) -> Result<Header<'a>, Fault> {
    let name = lines.demand("the name line of a molfile")?;
    if let Some(what) = other_format(name.text) {
        return Err(Fault::new(ReadErrorKind::Unsupported { what }, name.span()));
    }
    lines.demand("the program line of a molfile")?;
    let comment = lines.demand("the comment line of a molfile")?;
    let early = looks_like_counts(comment);
    let counts = match lines.peek() {
        Some(line) if looks_like_counts(line) => lines.demand(COUNTS)?,
        _ if early => {
            return Err(Fault::new(ReadErrorKind::HeaderLineMissing, comment.span()));
        }
        Some(line) => {
            return Err(Fault::new(
                ReadErrorKind::Malformed { expected: COUNTS },
                line.span(),
            ));
        }
        None => lines.demand(COUNTS)?,
    };
    Ok(Header {
        name: decode(name.text.trim_ascii()),
        counts,
        version: version(counts)?,
    })
}

/// Formats of the same family that begin with a name of their own.
fn other_format(first: &[u8]) -> Option<&'static str> {
    Some(match first {
        [b'$', b'R', b'X', b'N', ..] => "a reaction file",
        [b'$', b'R', b'D', b'F', b'I', b'L', b'E', ..] => "a file of reactions or data (RDF)",
        [b'$', b'M', b'D', b'L', ..] => "a file of R groups (RGF)",
        _ => return None,
    })
}

/// Two counts in their columns, and a version or at least no other text.
fn looks_like_counts(line: Line<'_>) -> bool {
    let count = |column| {
        let text = line.field(column, 3).text();
        !text.is_empty() && text.iter().all(u8::is_ascii_digit)
    };
    let stated = line.field(34, 6).text();
    count(1) && count(4) && (stated.is_empty() || stated.starts_with(b"V"))
}

/// Whether a line states a version of the format where a counts line has it.
pub(crate) fn states_version(line: Line<'_>) -> bool {
    matches!(line.field(34, 6).text(), b"V2000" | b"V3000")
}

fn version(counts: Line<'_>) -> Result<Version, Fault> {
    let field = counts.field(34, 6);
    match field.text() {
        b"" => Ok(Version::Unstated),
        b"V2000" => Ok(Version::V2000),
        b"V3000" => Ok(Version::V3000),
        _ => Err(field.fault(ReadErrorKind::Malformed {
            expected: "V2000 or V3000",
        })),
    }
}
