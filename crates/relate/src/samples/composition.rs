//! What a molecule or ion consists of: counted nuclides and a charge.

use std::collections::BTreeMap;

use molkin_graph::{Atom, Element, Formula, MassError, monoisotopic_mass};
use thiserror::Error;

/// How many atoms of each element and stated mass number, and the charge.
#[derive(Debug, Clone, Default, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub struct Composition {
    /// By element and mass number, which is 0 where none is stated; no count is 0.
    counts: BTreeMap<(Element, u16), i64>,
    charge: i32,
}

/// Why a text is no formula.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Error)]
#[error("no molecular formula: {reason} at character {place}")]
pub struct FormulaError {
    /// The character, from 1.
    pub place: usize,
    /// What is wrong there.
    pub reason: &'static str,
}

impl Composition {
    /// Counts atoms with their hydrogens.
    pub(crate) fn of_atoms<'a>(atoms: impl IntoIterator<Item = &'a Atom>) -> Self {
        let mut composition = Self::default();
        for atom in atoms {
            composition.add_atoms(atom.element, atom.isotope.unwrap_or_default(), 1);
            composition.add_atoms(Element::HYDROGEN, 0, i64::from(atom.hydrogens));
            composition.charge = composition.charge.saturating_add(i32::from(atom.charge));
        }
        composition
    }

    /// Reads a formula: symbols and counts, groups in parentheses, isotopes as `[13C]` (or `D`, `T`),
    /// parts separated by `.` or `·` with a number in front, and a charge as sign and number.
    ///
    /// # Errors
    /// [`FormulaError`] with the place.
    ///
    /// # Examples
    /// ```
    /// use molkin_relate::samples::Composition;
    ///
    /// let hydrate = Composition::parse("CuSO4.5H2O")?;
    /// assert_eq!(hydrate.formula().to_string(), "CuH10O9S");
    /// assert_eq!(Composition::parse("C2H3O2-")?.charge(), -1);
    /// # Ok::<(), molkin_relate::samples::FormulaError>(())
    /// ```
    pub fn parse(text: &str) -> Result<Self, FormulaError> {
        Reader::new(text).formula()
    }

    /// The net charge.
    pub fn charge(&self) -> i32 {
        self.charge
    }

    /// The same atoms with another charge.
    #[must_use]
    pub(super) fn with_charge(mut self, charge: i32) -> Self {
        self.charge = charge;
        self
    }

    /// Adds protons; takes them away where the number is negative.
    #[must_use]
    pub(super) fn with_protons(mut self, protons: i32) -> Self {
        self.add_atoms(Element::HYDROGEN, 0, i64::from(protons));
        self.charge = self.charge.saturating_add(protons);
        self
    }

    /// Adds another so many times; the charge stays.
    #[must_use]
    pub(super) fn plus(mut self, other: &Self, times: i64) -> Self {
        for (&(element, isotope), &count) in &other.counts {
            self.add_atoms(element, isotope, count.saturating_mul(times));
        }
        self
    }

    fn add_atoms(&mut self, element: Element, isotope: u16, count: i64) {
        let entry = self.counts.entry((element, isotope)).or_default();
        *entry = entry.saturating_add(count);
        if *entry == 0 {
            self.counts.remove(&(element, isotope));
        }
    }

    /// Element, mass number (0 where none is stated) and count, by rising atomic number.
    pub(super) fn nuclides(&self) -> impl Iterator<Item = (Element, u16, i64)> + '_ {
        self.counts
            .iter()
            .map(|(&(element, isotope), &count)| (element, isotope, count))
    }

    /// Whether there are no fewer than no atoms of each element.
    pub(super) fn is_possible(&self) -> bool {
        !self.counts.is_empty() && self.counts.values().all(|&count| count > 0)
    }

    /// The formula; isotopes count as their element.
    pub fn formula(&self) -> Formula {
        let counts = self.nuclides();
        let counts = counts.map(|(element, _, count)| (element, u32::try_from(count).unwrap_or(0)));
        Formula::new(counts, self.charge)
    }

    /// The mass of its most abundant nuclides, that of the electrons included.
    pub(super) fn monoisotopic(&self) -> Result<f64, MassError> {
        let atoms = self.nuclides().map(|(element, isotope, count)| {
            let isotope = (isotope > 0).then_some(isotope);
            (element, isotope, u32::try_from(count).unwrap_or(0))
        });
        Ok(monoisotopic_mass(atoms, self.charge)?.dalton())
    }
}

/// The most atoms of an element.
const MOST_ATOMS: i64 = 100_000;

/// Reads a formula from left to right.
struct Reader {
    text: Vec<char>,
    at: usize,
}

impl Reader {
    fn new(text: &str) -> Self {
        Self {
            text: text.trim().chars().collect(),
            at: 0,
        }
    }

    fn formula(mut self) -> Result<Composition, FormulaError> {
        let mut whole = Composition::default();
        loop {
            let times = self.count();
            let part = self.part()?;
            whole = whole.plus(&part, times);
            match self.peek() {
                Some('.' | '·') => self.at += 1,
                Some('+' | '-' | '\u{2212}') => {
                    whole.charge = self.charge();
                    break;
                }
                _ => break,
            }
        }
        match self.peek() {
            Some(_) => Err(self.wrong("unexpected character")),
            None if whole.counts.values().any(|&count| count > MOST_ATOMS) => {
                Err(self.wrong("too many atoms"))
            }
            None if whole.is_possible() => Ok(whole),
            None => Err(self.wrong("no atoms")),
        }
    }

    /// Symbols and groups up to a dot, a sign or the end. Open groups are held in a list, so that depth
    /// costs nothing.
    fn part(&mut self) -> Result<Composition, FormulaError> {
        let mut open = vec![Composition::default()];
        while let Some(character) = self.peek() {
            let item = match character {
                '(' => {
                    self.at += 1;
                    open.push(Composition::default());
                    continue;
                }
                ')' if open.len() > 1 => {
                    self.at += 1;
                    open.pop().unwrap_or_default()
                }
                '[' | 'A'..='Z' => self.atom()?,
                _ => break,
            };
            let times = self.count();
            if let Some(outer) = open.pop() {
                open.push(outer.plus(&item, times));
            }
        }
        match (open.pop(), open.is_empty()) {
            (Some(part), true) => Ok(part),
            _ => Err(self.wrong("a parenthesis is not closed")),
        }
    }

    /// `C`, `Cl`, `D` or `[13C]`.
    fn atom(&mut self) -> Result<Composition, FormulaError> {
        let bracket = self.peek() == Some('[');
        let mut isotope = 0;
        if bracket {
            self.at += 1;
            isotope = u16::try_from(self.count()).unwrap_or(0);
        }
        let (element, own) = self.symbol().ok_or(self.wrong("no element"))?;
        if bracket {
            if self.peek() != Some(']') {
                return Err(self.wrong("']' is missing"));
            }
            self.at += 1;
        }
        let isotope = if own > 0 { own } else { isotope };
        let mut atom = Composition::default();
        atom.add_atoms(element, isotope, 1);
        Ok(atom)
    }

    fn symbol(&mut self) -> Option<(Element, u16)> {
        let first = self.peek().filter(char::is_ascii_uppercase)?;
        let second = self
            .text
            .get(self.at + 1)
            .filter(|c| c.is_ascii_lowercase());
        if let Some(second) = second
            && let Some(element) = Element::from_symbol(&format!("{first}{second}"))
        {
            self.at += 2;
            return Some((element, 0));
        }
        let found = match first {
            'D' => (Element::HYDROGEN, 2),
            'T' => (Element::HYDROGEN, 3),
            _ => (Element::from_symbol(&first.to_string())?, 0),
        };
        self.at += 1;
        Some(found)
    }

    /// A number; 1 where there is none.
    fn count(&mut self) -> i64 {
        let mut number = None;
        while let Some(digit) = self.peek().and_then(|c| c.to_digit(10)) {
            let more = number.unwrap_or(0_i64).saturating_mul(10);
            number = Some(more.saturating_add(i64::from(digit)).min(MOST_ATOMS + 1));
            self.at += 1;
        }
        number.unwrap_or(1)
    }

    fn charge(&mut self) -> i32 {
        let negative = self.peek() != Some('+');
        self.at += 1;
        let size = i32::try_from(self.count()).unwrap_or(0);
        if negative { -size } else { size }
    }

    fn peek(&self) -> Option<char> {
        self.text.get(self.at).copied()
    }

    fn wrong(&self, reason: &'static str) -> FormulaError {
        FormulaError {
            place: self.at + 1,
            reason,
        }
    }
}

#[cfg(test)]
mod tests {
    use rstest::rstest;

    use super::*;

    #[rstest]
    #[case("C8H10N4O2", "C8H10N4O2")]
    #[case("Ca(OH)2", "CaH2O2")]
    #[case("C6H8O7·H2O", "C6H10O8")]
    #[case("K3(Fe(CN)6)", "C6FeK3N6")]
    #[case("CD3OD", "CH4O")]
    #[case("[13C]2H6O", "C2H6O")]
    #[case("C2H3O2\u{2212}", "C2H3O2-")]
    #[case("Ca+2", "Ca+2")]
    #[case("CoCl2", "Cl2Co")]
    #[case("COCl2", "CCl2O")]
    fn formulae(#[case] text: &str, #[case] expected: &str) {
        assert_eq!(
            Composition::parse(text).unwrap().formula().to_string(),
            expected
        );
    }

    #[test]
    fn isotopes_are_kept() {
        let labelled = Composition::parse("CD3OH").unwrap();
        let counts: Vec<_> = labelled
            .nuclides()
            .map(|(e, m, n)| (e.symbol(), m, n))
            .collect();
        assert_eq!(counts, [("H", 0, 1), ("H", 2, 3), ("C", 0, 1), ("O", 0, 1)]);
    }

    #[rstest]
    #[case("", "no molecular formula: no atoms at character 1")]
    #[case("C2Q", "no molecular formula: no element at character 3")]
    #[case(
        "(CH2",
        "no molecular formula: a parenthesis is not closed at character 5"
    )]
    #[case("C2)", "no molecular formula: unexpected character at character 3")]
    #[case("[13C", "no molecular formula: ']' is missing at character 5")]
    #[case(
        "(C99999)99999",
        "no molecular formula: too many atoms at character 14"
    )]
    #[case("c6h6", "no molecular formula: unexpected character at character 1")]
    fn no_formulae(#[case] text: &str, #[case] expected: &str) {
        assert_eq!(Composition::parse(text).unwrap_err().to_string(), expected);
    }
}
