//! Molecular formulae.

use std::fmt;

use crate::Element;

/// A molecular formula: how many atoms of each element, and the net charge.
///
/// Isotopes count as their element. Equal formulae compare equal however they were counted; the
/// order is total and fixed (by the counts from light to heavy elements, then by charge) but has no
/// meaning in chemistry.
///
/// `Display` writes Hill order: with carbon C, then H, then the other symbols by alphabet; without
/// carbon all symbols by alphabet. The wildcard comes last as `*`, then the charge as sign and number,
/// the number left out where it is 1.
///
/// # Source
/// E. A. Hill, J. Am. Chem. Soc. 1900, 22, 478.
///
/// # Examples
/// ```
/// use molkin_graph::{Element, Formula};
///
/// let acetate = Formula::new([(Element::CARBON, 2), (Element::OXYGEN, 2), (Element::HYDROGEN, 3)], -1);
/// assert_eq!(acetate.to_string(), "C2H3O2-");
/// assert_eq!(acetate.count(Element::OXYGEN), 2);
/// assert_eq!(Formula::new([(Element::CALCIUM, 1)], 2).to_string(), "Ca+2");
/// ```
#[derive(Clone, Debug, Default, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub struct Formula {
    /// By rising atomic number, each element once, no count 0: equality needs one form.
    counts: Vec<(Element, u32)>,
    charge: i32,
}

impl Formula {
    /// Counts elements that come in any order and any number of times; counts of 0 add nothing.
    ///
    /// Linear in the items. A count stays at `u32::MAX` once there.
    #[must_use]
    pub fn new(counts: impl IntoIterator<Item = (Element, u32)>, charge: i32) -> Formula {
        let mut formula = Formula::default();
        formula.refill(counts, charge);
        formula
    }

    /// As [`Formula::new`], but puts the result in place of this formula and keeps its memory, so that
    /// counting many molecules allocates once.
    pub fn refill(&mut self, counts: impl IntoIterator<Item = (Element, u32)>, charge: i32) {
        // One place for each element, so that none has to be looked for, and one bit for each that
        // occurs.
        let mut totals = [0u32; Element::COUNT];
        let mut occurring = 0u128;
        counts.into_iter().for_each(|(element, count)| {
            let total = &mut totals[usize::from(element.number())];
            *total = total.saturating_add(count);
            occurring |= u128::from(count > 0) << element.number();
        });
        self.charge = charge;
        self.counts.clear();
        while occurring != 0 {
            let number = occurring.trailing_zeros() as u8;
            occurring &= occurring - 1;
            let element = Element::from_number(number).unwrap_or(Element::WILDCARD);
            self.counts.push((element, totals[usize::from(number)]));
        }
    }

    /// The number of atoms of an element.
    #[must_use]
    pub fn count(&self, element: Element) -> u32 {
        self.iter()
            .find(|&(other, _)| other == element)
            .map_or(0, |(_, count)| count)
    }

    /// The elements that occur, by rising atomic number, the wildcard first, each with its count.
    pub fn iter(&self) -> impl Iterator<Item = (Element, u32)> {
        self.counts.iter().copied()
    }

    /// The net charge.
    #[must_use]
    pub const fn charge(&self) -> i32 {
        self.charge
    }
}

impl fmt::Display for Formula {
    fn fmt(&self, formatter: &mut fmt::Formatter<'_>) -> fmt::Result {
        let organic = self.count(Element::CARBON) > 0;
        // The next one of a handful is looked for each time, since a sorted list would need memory.
        let mut last = 0;
        while let Some((place, element, count)) = self
            .iter()
            .map(|(element, count)| (hill_place(element, organic), element, count))
            .filter(|&(place, ..)| place > last)
            .min()
        {
            last = place;
            formatter.write_str(element.symbol())?;
            if count != 1 {
                write_number(formatter, count)?;
            }
        }
        match self.charge {
            0 => Ok(()),
            1 => formatter.write_str("+"),
            -1 => formatter.write_str("-"),
            charge => write!(formatter, "{charge:+}"),
        }
    }
}

/// The place of an element in Hill order: numbers above 0 that sort as the order does.
fn hill_place(element: Element, organic: bool) -> u16 {
    match element {
        Element::CARBON if organic => 1,
        Element::HYDROGEN if organic => 2,
        Element::WILDCARD => u16::MAX,
        _ => 3 + element.place_in_alphabet(),
    }
}

/// Writes a number as its digits, which takes a fraction of what formatting it does.
fn write_number(formatter: &mut fmt::Formatter<'_>, mut number: u32) -> fmt::Result {
    let mut digits = [b'0'; 10];
    let mut start = digits.len();
    while number > 0 || start == digits.len() {
        start -= 1;
        digits[start] += (number % 10) as u8;
        number /= 10;
    }
    formatter.write_str(str::from_utf8(&digits[start..]).map_err(|_| fmt::Error)?)
}

#[cfg(test)]
mod tests {
    use rstest::rstest;

    use super::Formula;
    use crate::Element;

    fn counts(text: &str) -> Vec<(Element, u32)> {
        text.split_whitespace()
            .map(|word| {
                let (symbol, count) = word.split_once(':').unwrap_or((word, "1"));
                let element = Element::from_symbol(symbol).unwrap_or(Element::WILDCARD);
                (element, count.parse().unwrap())
            })
            .collect()
    }

    // Hill 1900 for the order; the way charges are written is ours.
    #[rstest]
    #[case::ethanol("O H:6 C:2", 0, "C2H6O")]
    #[case::acetate("H:3 O:2 C:2", -1, "C2H3O2-")]
    #[case::calcium("Ca", 2, "Ca+2")]
    #[case::sulfate("S O:4", -2, "O4S-2")]
    #[case::ammonium("N H:4", 1, "H4N+")]
    #[case::hydrogen_chloride("H Cl", 0, "ClH")]
    #[case::sulfuric_acid("H:2 S O:4", 0, "H2O4S")]
    #[case::bromochloromethane("H:2 Br C Cl", 0, "CH2BrCl")]
    #[case::without_hydrogen("Cl:4 C", 0, "CCl4")]
    #[case::symbols_by_alphabet("Na N Ni Nb C", 0, "CNNaNbNi")]
    #[case::wildcard("* C H:3", 0, "CH3*")]
    #[case::wildcards_without_carbon("*:2 Zn", 0, "Zn*2")]
    #[case::counted_one_by_one("C H C H H C H H", 0, "C3H5")]
    #[case::zeros_are_nothing("C:0 H:2 O", 0, "H2O")]
    #[case::nothing("", 0, "")]
    #[case::electron("", -1, "-")]
    fn display(#[case] items: &str, #[case] charge: i32, #[case] expected: &str) {
        assert_eq!(Formula::new(counts(items), charge).to_string(), expected);
    }

    #[test]
    fn equality_ignores_how_it_was_counted() {
        let once = Formula::new(counts("C:2 H:6 O"), 0);
        assert_eq!(Formula::new(counts("H O C H:5 C S:0"), 0), once);
        assert_ne!(Formula::new(counts("C:2 H:6 O"), 1), once);
        assert_ne!(Formula::new(counts("C:2 H:6 S"), 0), once);
    }

    #[test]
    fn refilling_forgets_what_was_there() {
        let mut formula = Formula::new(counts("C:2 H:6 Hg"), 3);
        formula.refill(counts("H:2 O"), 0);
        assert_eq!(formula, Formula::new(counts("O H:2"), 0));
    }

    #[test]
    fn huge_counts_do_not_overflow() {
        let formula = Formula::new(
            [(Element::CARBON, u32::MAX), (Element::CARBON, 1)],
            i32::MIN,
        );
        assert_eq!(formula.to_string(), "C4294967295-2147483648");
    }
}
