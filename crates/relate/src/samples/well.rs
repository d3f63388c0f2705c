//! Places on a plate.

use std::fmt;

/// A well: row and column, from 0.
///
/// # Examples
/// ```
/// use molkin_relate::samples::Well;
///
/// let well: Option<Well> = Well::parse("b07");
/// assert_eq!(well, Some(Well { row: 1, column: 6 }));
/// assert_eq!(Well { row: 26, column: 0 }.to_string(), "AA1");
/// assert_eq!(Well::parse("rack 4"), None);
/// ```
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub struct Well {
    /// The row, from 0.
    pub row: u16,
    /// The column, from 0.
    pub column: u16,
}

impl Well {
    /// Reads one or two letters and a number, such as `A1`, `a01` or `AF48`.
    pub fn parse(text: &str) -> Option<Self> {
        let text = text.trim();
        let letters = text.len()
            - text
                .trim_start_matches(|c: char| c.is_ascii_alphabetic())
                .len();
        let (row, column) = text.split_at(letters);
        if !(1..=2).contains(&letters) || !(1..=4).contains(&column.len()) {
            return None;
        }
        let digits = column.bytes().all(|byte| byte.is_ascii_digit());
        let column: u16 = column.parse().ok().filter(|&number| digits && number > 0)?;
        // A is 1, Z is 26, AA is 27.
        let row = row.bytes().fold(0, |row, letter| {
            row * 26 + u16::from(letter.to_ascii_uppercase() - b'A' + 1)
        });
        Some(Self {
            row: row - 1,
            column: column - 1,
        })
    }

    /// The wells beside it in its row and its column.
    pub(super) fn neighbours(self) -> impl Iterator<Item = Self> {
        let Self { row, column } = self;
        let left = column.checked_sub(1).map(|column| Self { row, column });
        let above = row.checked_sub(1).map(|row| Self { row, column });
        let right = column.checked_add(1).map(|column| Self { row, column });
        let below = row.checked_add(1).map(|row| Self { row, column });
        [left, right, above, below].into_iter().flatten()
    }
}

impl fmt::Display for Well {
    fn fmt(&self, formatter: &mut fmt::Formatter<'_>) -> fmt::Result {
        let letter = |number: u16| char::from(b'A' + (number % 26) as u8);
        if self.row >= 26 {
            write!(formatter, "{}", letter(self.row / 26 - 1))?;
        }
        write!(formatter, "{}{}", letter(self.row), self.column + 1)
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn every_well_of_the_largest_plate_is_read_as_it_is_written() {
        for row in 0..32 {
            for column in 0..48 {
                let well = Well { row, column };
                assert_eq!(Well::parse(&well.to_string()), Some(well));
            }
        }
        assert_eq!(
            Well {
                row: 31,
                column: 47
            }
            .to_string(),
            "AF48"
        );
    }

    #[test]
    fn what_is_no_well() {
        for text in ["", "A", "7", "A0", "ABC1", "A1b", "A+1", "Ä1", "A12345"] {
            assert_eq!(Well::parse(text), None, "{text}");
        }
    }
}
