//! How text looks on a terminal.

use std::{
    ffi::OsString,
    fmt::{self, Display},
};

/// Whether text is coloured. Nothing is said by colour alone.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(crate) struct Style {
    colour: bool,
}

/// What is set off from the rest.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(crate) enum Role {
    /// A verdict.
    Verdict,
    /// What belongs to A. Blue and yellow differ for every kind of colour vision.
    OfA,
    /// What belongs to B.
    OfB,
}

impl Role {
    fn code(self) -> &'static str {
        match self {
            Self::Verdict => "\x1b[1m",
            Self::OfA => "\x1b[34m",
            Self::OfB => "\x1b[33m",
        }
    }
}

impl Style {
    /// Colour on a terminal, unless the environment asks for none (`NO_COLOR` with any value, or
    /// `TERM=dumb`).
    pub(crate) fn choose(
        is_terminal: bool,
        environment: impl Fn(&str) -> Option<OsString>,
    ) -> Self {
        let refused = environment("NO_COLOR").is_some_and(|value| !value.is_empty());
        let dumb = environment("TERM").is_some_and(|value| value == "dumb");
        Self {
            colour: is_terminal && !refused && !dumb,
        }
    }

    /// Text in a role. Padding in the format string counts what is seen.
    pub(crate) fn paint(self, role: Role, text: &str) -> impl Display {
        Painted {
            code: self.colour.then(|| role.code()),
            text,
        }
    }
}

struct Painted<'t> {
    code: Option<&'static str>,
    text: &'t str,
}

impl Display for Painted<'_> {
    fn fmt(&self, out: &mut fmt::Formatter<'_>) -> fmt::Result {
        match self.code {
            None => self.text.fmt(out),
            Some(code) => {
                out.write_str(code)?;
                self.text.fmt(out)?;
                out.write_str("\x1b[0m")
            }
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn chosen(is_terminal: bool, set: &[(&str, &str)]) -> String {
        let environment = |name: &str| {
            let found = set.iter().find(|(known, _)| *known == name);
            found.map(|(_, value)| OsString::from(value))
        };
        let style = Style::choose(is_terminal, environment);
        format!("{:<4}|", style.paint(Role::OfA, "x"))
    }

    #[test]
    fn colour_only_where_it_is_wanted() {
        let (plain, coloured) = ("x   |", "\x1b[34mx   \x1b[0m|");
        assert_eq!(chosen(true, &[]), coloured);
        assert_eq!(
            chosen(true, &[("NO_COLOR", ""), ("TERM", "xterm")]),
            coloured
        );
        assert_eq!(chosen(true, &[("NO_COLOR", "1")]), plain);
        assert_eq!(chosen(true, &[("TERM", "dumb")]), plain);
        assert_eq!(chosen(false, &[]), plain);
    }
}
