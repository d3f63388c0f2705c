//! Atom and bond numbers, which need be neither consecutive nor in order.

use crate::{
    ReadErrorKind, Span,
    molfile::{block::Fault, field::Field},
};

/// What is numbered.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(super) enum Kind {
    Atom,
    Bond,
}

/// The numbers of atoms or bonds in the order of their lines.
///
/// Memory follows the lines read, whatever the numbers are.
#[derive(Debug)]
pub(super) struct Numbers {
    kind: Kind,
    /// Where they stand.
    spans: Vec<Span>,
    /// Number and place by number; empty as long as the numbers are 1, 2, 3, …
    sorted: Vec<(u32, u32)>,
}

impl Numbers {
    pub(super) fn new(kind: Kind) -> Self {
        Self {
            kind,
            spans: Vec::new(),
            sorted: Vec::new(),
        }
    }

    pub(super) fn count(&self) -> u32 {
        u32::try_from(self.spans.len()).unwrap_or(u32::MAX)
    }

    /// Reads the number at the start of a line. Repeated ones are found by [`Numbers::finish`].
    pub(super) fn add(&mut self, field: Field<'_>) -> Result<(), Fault> {
        let what = match self.kind {
            Kind::Atom => "the atom number",
            Kind::Bond => "the bond number",
        };
        let number = field.stated(what, 1, i32::MAX)?.unsigned_abs();
        let place = self.count();
        self.spans.push(field.span());
        if self.sorted.is_empty() {
            if number == self.count() {
                return Ok(());
            }
            self.sorted = (0..place).map(|place| (place + 1, place)).collect();
        }
        self.sorted.push((number, place));
        Ok(())
    }

    /// Sorts the numbers for [`Numbers::place`]. Numbers that are given twice are an error.
    pub(super) fn finish(&mut self) -> Result<(), Fault> {
        self.sorted.sort_unstable();
        let repeated = self.sorted.windows(2).find(|pair| pair[0].0 == pair[1].0);
        let Some(&[(number, first), (_, second)]) = repeated else {
            return Ok(());
        };
        // One span for each place.
        let [first, second] = [first, second].map(|place| self.spans[place as usize]);
        let kind = ReadErrorKind::NumberRepeated { number };
        Err(Fault::new(kind, second).with_related(first))
    }

    /// The place of the line whose number a field names.
    pub(super) fn place(&self, field: Field<'_>) -> Result<u32, Fault> {
        let what = match self.kind {
            Kind::Atom => "the number of an atom",
            Kind::Bond => "the number of a bond",
        };
        let number = field.stated(what, 0, i32::MAX)?.unsigned_abs();
        let found = if self.sorted.is_empty() {
            number.checked_sub(1).filter(|&place| place < self.count())
        } else {
            let at = self
                .sorted
                .binary_search_by_key(&number, |&(known, _)| known);
            at.ok()
                .and_then(|at| self.sorted.get(at))
                .map(|&(_, place)| place)
        };
        found.ok_or_else(|| {
            field.fault(match self.kind {
                Kind::Atom => ReadErrorKind::NoAtomNumbered { number },
                Kind::Bond => ReadErrorKind::NoBondNumbered { number },
            })
        })
    }
}

#[cfg(test)]
mod tests {
    use rstest::rstest;

    use super::*;

    fn field(text: &str) -> Field<'_> {
        Field::new(text.as_bytes(), Span::new(1, 1, 1))
    }

    #[rstest]
    #[case::consecutive(&["1", "2", "3"], &[("1", Some(0)), ("3", Some(2)), ("0", None), ("4", None)])]
    #[case::any(&["1", "7", "5", "2147483647"], &[("7", Some(1)), ("2147483647", Some(3)), ("2", None)])]
    #[case::reversed(&["3", "2", "1"], &[("3", Some(0)), ("1", Some(2))])]
    #[case::none(&[], &[("1", None), ("-1", None)])]
    fn places(#[case] lines: &[&str], #[case] expected: &[(&str, Option<u32>)]) {
        let mut numbers = Numbers::new(Kind::Atom);
        for line in lines {
            numbers.add(field(line)).unwrap();
        }
        numbers.finish().unwrap();
        for &(number, place) in expected {
            assert_eq!(numbers.place(field(number)).ok(), place, "{number}");
        }
    }

    #[test]
    fn numbers_are_positive_and_differ() {
        let mut numbers = Numbers::new(Kind::Bond);
        assert!(numbers.add(field("0")).is_err());
        assert!(numbers.add(field("4294967296")).is_err());
        for number in ["1", "2", "1"] {
            numbers.add(field(number)).unwrap();
        }
        assert!(numbers.finish().is_err());
    }
}
