//! Labelled lines with a hanging indent.

use std::io::{self, Write};

use crate::output::style::{Role, Style};

/// Columns of the label, and of a line altogether.
const LABEL: usize = 17;
const WIDTH: usize = 96;

/// A blank at which no line breaks; it is written as a plain one.
pub(super) const HARD_BLANK: &str = "\u{a0}";

/// Writes `  label           text`, and further lines of the text below the first.
pub(super) fn labelled(
    out: &mut impl Write,
    style: Style,
    (role, label): (Option<Role>, &str),
    text: &str,
) -> io::Result<()> {
    let mut label = label;
    for line in wrapped(text, WIDTH - LABEL - 3) {
        let role = role.filter(|_| !label.is_empty());
        match role {
            Some(role) => write!(out, "  {:<LABEL$} ", style.paint(role, label))?,
            None => write!(out, "  {label:<LABEL$} ")?,
        }
        writeln!(out, "{}", line.replace(HARD_BLANK, " ").trim_end())?;
        label = "";
    }
    Ok(())
}

/// Breaks a text at blanks into lines of at most `width` characters; longer words stay whole.
fn wrapped(text: &str, width: usize) -> Vec<String> {
    let mut lines = vec![String::new()];
    let mut length = 0;
    for word in text.split(' ') {
        let size = word.chars().count();
        if length > 0 && length + 1 + size > width {
            lines.push(String::new());
            length = 0;
        }
        if let Some(line) = lines.last_mut() {
            if length > 0 {
                line.push(' ');
                length += 1;
            }
            line.push_str(word);
            length += size;
        }
    }
    lines
}

/// A capital first and a full stop last, however the reader put it.
pub(super) fn sentence(text: &str) -> String {
    let text = printable(text);
    let mut characters = text.chars();
    let first = characters.next().map(|c| c.to_ascii_uppercase());
    let mut sentence: String = first.into_iter().chain(characters).collect();
    if !sentence.ends_with('.') {
        sentence.push('.');
    }
    sentence
}

/// The text without characters that could steer a terminal: names come from files of any origin.
pub(super) fn printable(text: &str) -> String {
    let shown = |character: char| match character {
        c if c.is_control() => '\u{fffd}',
        // Marks that change the direction of writing make text look like another.
        '\u{200e}' | '\u{200f}' | '\u{202a}'..='\u{202e}' | '\u{2066}'..='\u{2069}' => '\u{fffd}',
        c => c,
    };
    text.chars().map(shown).collect()
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn lines_break_at_blanks() {
        assert_eq!(wrapped("ab cd efgh", 5), ["ab cd", "efgh"]);
        assert_eq!(wrapped("abcdefgh i", 5), ["abcdefgh", "i"]);
        assert_eq!(wrapped("", 5), [""]);
    }

    #[test]
    fn names_cannot_steer_the_terminal() {
        assert_eq!(printable("a\x1b[2Jb\u{202e}"), "a\u{fffd}[2Jb\u{fffd}");
    }
}
