//! The chemical elements: symbols, places in the periodic table, weights and nuclides.

mod isotopes;
mod nuclide;
mod place;
mod symbol;
mod table;
mod weights;

use std::fmt;

pub use nuclide::Nuclide;
use nuclide::{natural, trace};

/// A chemical element, held as its atomic number.
///
/// Values are 1..=118, and 0 for [`Element::WILDCARD`], the atom whose element isn't stated (`*` in
/// SMILES). Elements order by atomic number, the wildcard first.
///
/// # Examples
/// ```
/// use molkin_graph::Element;
///
/// let chlorine = Element::from_symbol("Cl").ok_or("no such symbol")?;
/// assert_eq!(chlorine, Element::CHLORINE);
/// assert_eq!((chlorine.number(), chlorine.group(), chlorine.period()), (17, Some(17), 3));
/// assert_eq!(chlorine.standard_weight(), Some(35.45));
/// assert_eq!(chlorine.isotope_mass(37), Some(36.965902573));
/// # Ok::<(), &str>(())
/// ```
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub struct Element(u8);

/// What an element weighs on average.
#[derive(Clone, Copy, Debug)]
enum Weight {
    /// The wildcard: nothing is known.
    Unknown,
    /// The standard atomic weight.
    Standard(f64),
    /// No characteristic terrestrial composition; the mass number of the longest-lived nuclide.
    LongestLived(u16),
}

impl Element {
    /// The atom whose element isn't stated, `*` in SMILES. It has number 0, no group, no period, no
    /// weight and no nuclides.
    pub const WILDCARD: Element = Element(0);

    /// The heaviest element that has a name, oganesson.
    pub(crate) const LAST: u8 = 118;

    /// How many values there are, the wildcard included.
    pub(crate) const COUNT: usize = Element::LAST as usize + 1;

    /// The element of a symbol in its exact case (`C`, `Cl`), or `None`.
    ///
    /// Only element symbols are known: `*`, `D` and `T` are not among them. Constant time.
    #[must_use]
    pub fn from_symbol(symbol: &str) -> Option<Element> {
        symbol::number(symbol.as_bytes()).map(Element)
    }

    /// The element of an atomic number in 1..=118, or `None`. 0 gives `None`: the wildcard is no
    /// element and has to be asked for by name.
    #[must_use]
    pub const fn from_number(number: u8) -> Option<Element> {
        match number {
            1..=Element::LAST => Some(Element(number)),
            _ => None,
        }
    }

    /// The atomic number; 0 for the wildcard.
    #[must_use]
    pub const fn number(self) -> u8 {
        self.0
    }

    /// The symbol; `*` for the wildcard.
    #[must_use]
    pub fn symbol(self) -> &'static str {
        self.entry(&table::SYMBOLS)
    }

    /// The place of the symbol in the alphabet, as a number that has no gaps to speak of; 0 for the
    /// wildcard.
    pub(crate) fn place_in_alphabet(self) -> u16 {
        self.entry(&symbol::PLACES)
    }

    /// The English name in IUPAC spelling, lower case; `unknown` for the wildcard.
    #[must_use]
    pub fn name(self) -> &'static str {
        self.entry(&table::NAMES)
    }

    /// The group 1..=18, or `None` for lanthanides (57–71), actinides (89–103) and the wildcard.
    ///
    /// Lanthanum, lutetium and their heavier congeners have none either, since IUPAC leaves open which
    /// of them stands in group 3.
    #[must_use]
    pub const fn group(self) -> Option<u8> {
        // No constructor lets a number above LAST through.
        place::GROUPS[self.0 as usize]
    }

    /// Whether the element keeps its bonds as drawn: metals, and the few others (noble gases, the
    /// wildcard) of which the octet rule says nothing. Boron, silicon, germanium, arsenic, antimony,
    /// selenium, tellurium and the halogens down to astatine are not among them.
    #[must_use]
    pub const fn is_metal(self) -> bool {
        place::METALS[self.0 as usize]
    }

    /// The period 1..=7; 0 for the wildcard.
    #[must_use]
    pub const fn period(self) -> u8 {
        place::PERIODS[self.0 as usize]
    }

    /// The standard atomic weight, abridged where CIAAW gives an interval; `None` where an element has
    /// none (then see [`Element::mass_number_of_longest_lived`]).
    ///
    /// # Source
    /// CIAAW 2021: Prohaska et al., Pure Appl. Chem. 2022, 94, 573.
    #[must_use]
    pub fn standard_weight(self) -> Option<f64> {
        match self.entry(&weights::WEIGHTS) {
            Weight::Standard(weight) => Some(weight),
            Weight::LongestLived(_) | Weight::Unknown => None,
        }
    }

    /// The mass number of the nuclide with the longest measured half-life, for elements without a
    /// standard atomic weight; `None` for the others and the wildcard.
    ///
    /// # Source
    /// NUBASE2020, ground states: Kondev et al., Chin. Phys. C 2021, 45, 030001.
    #[must_use]
    pub fn mass_number_of_longest_lived(self) -> Option<u16> {
        match self.entry(&weights::WEIGHTS) {
            Weight::LongestLived(mass_number) => Some(mass_number),
            Weight::Standard(_) | Weight::Unknown => None,
        }
    }

    /// The atomic mass of one nuclide in dalton, or `None` where AME2020 doesn't list it. Logarithmic
    /// in the number of nuclides of the element.
    ///
    /// # Source
    /// AME2020: Wang et al., Chin. Phys. C 2021, 45, 030003.
    #[must_use]
    pub fn isotope_mass(self, mass_number: u16) -> Option<f64> {
        let nuclides = self.entry(&isotopes::NUCLIDES);
        let place = nuclides
            .binary_search_by_key(&mass_number, Nuclide::mass_number)
            .ok()?;
        nuclides.get(place).map(Nuclide::mass)
    }

    /// All nuclides that AME2020 lists, by rising mass number.
    pub fn isotopes(self) -> impl Iterator<Item = &'static Nuclide> {
        self.entry(&isotopes::NUCLIDES).iter()
    }

    /// The mass number of the nuclide that is most abundant in nature, or `None` for elements that
    /// nature holds in traces only, and for the wildcard. Linear in the nuclides of the element.
    #[must_use]
    pub fn most_abundant_isotope(self) -> Option<u16> {
        self.isotopes()
            .filter_map(|nuclide| Some((nuclide.abundance()?, nuclide.mass_number())))
            .max_by(|(left, _), (right, _)| left.total_cmp(right))
            .map(|(_, mass_number)| mass_number)
    }

    /// The element's row of a table by atomic number.
    fn entry<T: Copy>(self, table: &[T; Element::LAST as usize + 1]) -> T {
        // No constructor lets a number above LAST through.
        table[usize::from(self.0)]
    }
}

impl fmt::Display for Element {
    /// Writes the symbol.
    fn fmt(&self, formatter: &mut fmt::Formatter<'_>) -> fmt::Result {
        formatter.pad(self.symbol())
    }
}

#[cfg(test)]
mod tests {
    use rstest::rstest;

    use super::Element;

    fn all() -> impl Iterator<Item = Element> {
        (0..=u8::MAX).filter_map(Element::from_number)
    }

    #[test]
    fn symbols_and_numbers_round_trip() {
        assert_eq!(all().count(), 118);
        for element in all() {
            assert_eq!(Element::from_symbol(element.symbol()), Some(element));
            assert_eq!(Element::from_number(element.number()), Some(element));
        }
    }

    #[rstest]
    fn other_text_is_no_symbol(
        #[values(
            "", "*", "D", "T", "c", "CL", "cl", "lC", "Cl ", "C1", "Xx", "J", "Ä", "Uue", "C\0"
        )]
        text: &str,
    ) {
        assert_eq!(Element::from_symbol(text), None);
    }

    #[test]
    fn wildcard_knows_nothing() {
        let unknown = Element::WILDCARD;
        assert_eq!((unknown.number(), unknown.symbol()), (0, "*"));
        assert_eq!((unknown.group(), unknown.period()), (None, 0));
        assert_eq!(
            (unknown.standard_weight(), unknown.isotopes().count()),
            (None, 0)
        );
        assert_eq!(Element::from_number(0), None);
    }

    // Places: IUPAC Periodic Table of the Elements, 4 May 2022.
    #[rstest]
    #[case(Element::HYDROGEN, Some(1), 1)]
    #[case(Element::HELIUM, Some(18), 1)]
    #[case(Element::BERYLLIUM, Some(2), 2)]
    #[case(Element::BORON, Some(13), 2)]
    #[case(Element::NEON, Some(18), 2)]
    #[case(Element::SODIUM, Some(1), 3)]
    #[case(Element::SULFUR, Some(16), 3)]
    #[case(Element::POTASSIUM, Some(1), 4)]
    #[case(Element::IRON, Some(8), 4)]
    #[case(Element::KRYPTON, Some(18), 4)]
    #[case(Element::RUBIDIUM, Some(1), 5)]
    #[case(Element::TIN, Some(14), 5)]
    #[case(Element::BARIUM, Some(2), 6)]
    #[case(Element::LANTHANUM, None, 6)]
    #[case(Element::LUTETIUM, None, 6)]
    #[case(Element::HAFNIUM, Some(4), 6)]
    #[case(Element::RADON, Some(18), 6)]
    #[case(Element::FRANCIUM, Some(1), 7)]
    #[case(Element::URANIUM, None, 7)]
    #[case(Element::RUTHERFORDIUM, Some(4), 7)]
    #[case(Element::OGANESSON, Some(18), 7)]
    fn places(#[case] element: Element, #[case] group: Option<u8>, #[case] period: u8) {
        assert_eq!((element.group(), element.period()), (group, period));
    }

    // CIAAW 2021, abridged standard atomic weights.
    #[rstest]
    #[case("H", 1.0080)]
    #[case("B", 10.81)]
    #[case("C", 12.011)]
    #[case("N", 14.007)]
    #[case("O", 15.999)]
    #[case("S", 32.06)]
    #[case("Cl", 35.45)]
    #[case("Br", 79.904)]
    fn weights(#[case] symbol: &str, #[case] weight: f64) {
        let element = Element::from_symbol(symbol).unwrap();
        assert_eq!(element.standard_weight(), Some(weight));
    }

    // AME2020, file mass.mas20.
    #[rstest]
    #[case("H", 1, 1.007825031898)]
    #[case("H", 2, 2.014101777844)]
    #[case("C", 12, 12.0)]
    #[case("C", 13, 13.00335483534)]
    #[case("N", 14, 14.00307400425)]
    #[case("O", 16, 15.99491461926)]
    #[case("F", 19, 18.99840316207)]
    #[case("Na", 23, 22.98976928195)]
    #[case("P", 31, 30.97376199768)]
    #[case("S", 32, 31.97207117354)]
    #[case("Cl", 35, 34.968852694)]
    #[case("K", 39, 38.96370648482)]
    #[case("Br", 79, 78.9183376)]
    #[case("I", 127, 126.90447)]
    fn isotope_masses(#[case] symbol: &str, #[case] mass_number: u16, #[case] mass: f64) {
        let element = Element::from_symbol(symbol).unwrap();
        let found = element.isotope_mass(mass_number).unwrap();
        // The sixth decimal is what the quoted iodine and bromine values are good for.
        assert!((found - mass).abs() < 5e-6, "{found}");
        assert_eq!(
            element.most_abundant_isotope().unwrap() == mass_number,
            ![2, 13].contains(&mass_number)
        );
    }

    // Elements without a standard atomic weight: CIAAW 2021; half-lives: NUBASE2020.
    #[test]
    fn every_element_has_a_weight_or_a_longest_lived_nuclide() {
        for element in all() {
            let longest_lived = element.mass_number_of_longest_lived();
            assert_eq!(element.standard_weight().is_none(), longest_lived.is_some());
            assert_eq!(
                element.most_abundant_isotope().is_none(),
                longest_lived.is_some()
            );
            assert!(longest_lived.is_none_or(|number| element.isotope_mass(number).is_some()));
        }
        assert_eq!(all().filter_map(Element::standard_weight).count(), 84);
        assert_eq!(Element::TECHNETIUM.mass_number_of_longest_lived(), Some(97));
        assert_eq!(Element::RADIUM.mass_number_of_longest_lived(), Some(226));
    }

    #[test]
    fn abundances_add_up_and_agree_with_the_weights() {
        for element in all() {
            let natural: Vec<_> = element
                .isotopes()
                .filter_map(|nuclide| Some((nuclide.abundance()?, nuclide.mass())))
                .collect();
            let Some(weight) = element.standard_weight() else {
                assert!(natural.is_empty());
                continue;
            };
            let sum: f64 = natural.iter().map(|(fraction, _)| fraction).sum();
            assert!((sum - 1.0).abs() < 1e-6, "{element}: {sum}");
            let mean: f64 = natural.iter().map(|(fraction, mass)| fraction * mass).sum();
            // Lithium is off by 0.4 %: the middle of its wide interval isn't the customary weight.
            assert!(
                (mean - weight).abs() / weight < 5e-3,
                "{element}: {mean} against {weight}"
            );
        }
    }

    #[test]
    fn nuclides_rise_and_have_masses_near_their_numbers() {
        for element in all() {
            let numbers: Vec<_> = element
                .isotopes()
                .map(|nuclide| nuclide.mass_number())
                .collect();
            assert!(numbers.is_sorted_by(|left, right| left < right));
            for nuclide in element.isotopes() {
                assert!((nuclide.mass() - f64::from(nuclide.mass_number())).abs() < 0.3);
            }
        }
        assert_eq!(
            all()
                .map(|element| element.isotopes().count())
                .sum::<usize>(),
            3557
        );
        assert_eq!(Element::CARBON.isotope_mass(999), None);
        assert_eq!(Element::CARBON.isotope_mass(0), None);
    }
}
