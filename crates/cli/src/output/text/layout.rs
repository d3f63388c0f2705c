//! Labelled lines with a hanging indent.

use std::io::{self, Write};

use crate::output::style::{Role, Style};

/// Columns of the label, and of a line altogether.
const LABEL: usize = 17;
const WIDTH: usize = 96;
/// What a line has beside its label.
pub(super) const LINE: usize = WIDTH - LABEL - 3;

/// Columns of a cell where two stand side by side.
pub(super) const COLUMN: usize = (WIDTH - LABEL - 5) / 2;

/// How much is shown.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(crate) enum Extent {
    /// What fits a screen.
    Screen,
    /// All of it.
    Full,
}

/// Lines of a list on a screen.
const SCREEN_LINES: usize = 2;

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
    for line in wrapped(text, LINE) {
        labelled_line(out, style, (role, label), &line)?;
        label = "";
    }
    Ok(())
}

fn labelled_line(
    out: &mut impl Write,
    style: Style,
    (role, label): (Option<Role>, &str),
    line: &str,
) -> io::Result<()> {
    match role.filter(|_| !label.is_empty()) {
        Some(role) => write!(out, "  {:<LABEL$} ", style.paint(role, label))?,
        None => write!(out, "  {label:<LABEL$} ")?,
    }
    writeln!(out, "{}", line.replace(HARD_BLANK, " ").trim_end())
}

/// Writes a text of its own across the whole width.
pub(super) fn paragraph(
    out: &mut impl Write,
    style: Style,
    role: Role,
    text: &str,
) -> io::Result<()> {
    for line in wrapped(text, WIDTH) {
        writeln!(out, "{}", style.paint(role, &line))?;
    }
    Ok(())
}

/// Writes two cells side by side, each with lines of its own.
pub(super) fn columns(
    out: &mut impl Write,
    style: Style,
    label: &str,
    cells: [String; 2],
) -> io::Result<()> {
    let [left, right] = cells.map(|cell| wrapped(&cell, COLUMN));
    let blank = String::new();
    for line in 0..left.len().max(right.len()) {
        let of = |cell: &Vec<String>| cell.get(line).unwrap_or(&blank).replace(HARD_BLANK, " ");
        let text = format!("{:<COLUMN$}  {}", of(&left), of(&right));
        labelled_line(
            out,
            style,
            (None, if line == 0 { label } else { "" }),
            &text,
        )?;
    }
    Ok(())
}

/// A list as text: all of it, or as many items as fit the lines of a screen and how many there are
/// more.
pub(super) fn fitting(items: Vec<String>, extent: Extent, width: usize) -> String {
    // An item is kept on one line where there is one for it.
    let whole = |item: String| match item.chars().count() < width {
        true => item.replace(' ', HARD_BLANK),
        false => item,
    };
    let items: Vec<String> = items.into_iter().map(whole).collect();
    let first = |count: usize| {
        let rest = match items.len() - count {
            0 => String::new(),
            more => format!(", and {more} more (--full)")
                .replace(' ', HARD_BLANK)
                .replacen(HARD_BLANK, " ", 1),
        };
        format!("{}{rest}", items[..count].join(", "))
    };
    if extent == Extent::Full || wrapped(&first(items.len()), width).len() <= SCREEN_LINES {
        return first(items.len());
    }
    // The more items, the more lines.
    let counts: Vec<usize> = (1..items.len()).collect();
    let fits = |&count: &usize| wrapped(&first(count), width).len() <= SCREEN_LINES;
    first(counts.partition_point(fits).max(1))
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
