//! Data items.

use crate::{
    Note, Record,
    molfile::{Line, Lines, decode},
};

/// Reads the data items behind a molfile into the record, in their order. Without `properties` there are
/// only the notes.
pub(super) fn read(lines: &mut Lines<'_>, record: &mut Record, properties: bool) {
    let mut stray_noted = false;
    while let Some(line) = lines.next() {
        if let Some(header) = line.text.strip_prefix(b">") {
            let value = properties.then(|| value(lines));
            let closed = match value {
                Some((_, closed)) => closed,
                None => lines.any(|line| line.is_blank()),
            };
            if !closed {
                record.notes.push(note(
                    "data-item-unclosed",
                    line,
                    "the value of this data item ends with the record, not with a blank line",
                ));
            }
            let value = value.map(|(value, _)| (name(header), value));
            record.properties.extend(value);
        } else if !line.is_blank() && !stray_noted {
            stray_noted = true;
            record.notes.push(note(
                "stray-data-line",
                line,
                "a line that belongs to no data item is not read",
            ));
        }
    }
}

/// The text between the first `<` and the last `>`, the field number (`DT12`) where there is none,
/// or else all there is. Blanks and dots in names are against the format, and common.
fn name(header: &[u8]) -> String {
    let start = header
        .iter()
        .position(|&byte| byte == b'<')
        .map(|at| at + 1);
    let end = header.iter().rposition(|&byte| byte == b'>');
    let named = start
        .zip(end)
        .and_then(|(start, end)| header.get(start..end));
    let numbered = || {
        header.split(u8::is_ascii_whitespace).find(|word| {
            word.strip_prefix(b"DT")
                .is_some_and(|rest| rest.first().is_some_and(u8::is_ascii_digit))
        })
    };
    decode(named.or_else(numbered).unwrap_or(header).trim_ascii())
}

/// The lines up to the first blank one, and whether there was one.
fn value(lines: &mut Lines<'_>) -> (String, bool) {
    let mut value = Vec::new();
    for line in lines.by_ref() {
        if line.is_blank() {
            return (decode(&value), true);
        }
        if !value.is_empty() {
            value.push(b'\n');
        }
        value.extend_from_slice(line.text);
    }
    (decode(&value), false)
}

fn note(code: &'static str, line: Line<'_>, text: &str) -> Note {
    Note {
        code,
        atoms: Vec::new(),
        span: Some(line.span()),
        text: text.to_owned(),
    }
}

#[cfg(test)]
mod tests {
    use rstest::rstest;

    use super::*;
    use crate::molfile::Block;

    #[rstest]
    #[case("  <batch>", "batch")]
    #[case(" <a.b c> (12)", "a.b c")]
    #[case("  25 <melting point> DT3", "melting point")]
    #[case(" <x<y>z>", "x<y>z")]
    #[case("  DT12", "DT12")]
    #[case("  (17) DT4 <>", "")]
    #[case("  loose text", "loose text")]
    #[case(" >a<", ">a<")]
    fn names(#[case] header: &str, #[case] expected: &str) {
        assert_eq!(name(header.as_bytes()), expected);
    }

    #[test]
    fn values_keep_their_lines_and_their_order() {
        let text = b"> <b>\none\ntwo\n\n\nstray\n> <a>\n\n> <b>\ncaf\xe9\n";
        let mut record = Record::default();
        read(&mut Block::new(text, 7).lines(), &mut record, true);
        let expected = [("b", "one\ntwo"), ("a", ""), ("b", "café")];
        assert_eq!(
            record.properties,
            expected.map(|(name, value)| (name.to_owned(), value.to_owned()))
        );
        let notes: Vec<_> = record
            .notes
            .iter()
            .map(|note| (note.code, note.span.map(|span| span.line)))
            .collect();
        assert_eq!(
            notes,
            [
                ("stray-data-line", Some(12)),
                ("data-item-unclosed", Some(15))
            ]
        );
        let mut without = Record::default();
        read(&mut Block::new(text, 7).lines(), &mut without, false);
        assert_eq!((without.notes, without.properties), (record.notes, vec![]));
    }
}
