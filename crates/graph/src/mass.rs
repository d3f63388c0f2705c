//! Masses of molecules and ions.
//!
//! Sums are made in whole units of 10⁻¹² dalton, so that they don't depend on the order of the atoms:
//! a renumbered drawing has the same mass to the last digit.

use thiserror::Error;

use crate::Element;

/// Units in a dalton. The tables have at most twelve decimals.
const UNITS: f64 = 1e12;

/// The mass of the electron in units: 0.000548579909 Da (CODATA 2018, 5.48579909065(16)e-4).
const ELECTRON: i128 = 548_579_909;

/// A mass, and how much of it is convention.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Mass {
    dalton: f64,
    uses_longest_lived: bool,
}

impl Mass {
    /// The mass of one molecule or ion in dalton; for an average, also the molar mass in g/mol.
    #[must_use]
    pub const fn dalton(self) -> f64 {
        self.dalton
    }

    /// Whether an element without natural composition took part by its longest-lived nuclide.
    #[must_use]
    pub const fn uses_longest_lived(self) -> bool {
        self.uses_longest_lived
    }
}

/// Why a set of atoms has no mass.
#[derive(Clone, Copy, Debug, Error, PartialEq, Eq)]
#[non_exhaustive]
pub enum MassError {
    /// An atom doesn't say which element it is.
    #[error("an atom of unknown element has no mass")]
    UnknownElement,
    /// An atom is labelled with a mass number that no known nuclide of its element has.
    #[error("no mass is known for {element} with mass number {mass_number}")]
    UnknownIsotope {
        /// The element of the atom.
        element: Element,
        /// Its label.
        mass_number: u16,
    },
}

/// The average mass: standard atomic weights, but the nuclide's own mass for labelled atoms.
///
/// `atoms` are element, isotope label and count, in any order and any number of times. The mass of
/// `charge` electrons is taken off (added for anions), so the result is that of the ion.
///
/// # Errors
/// [`MassError`] for a wildcard, or a label that AME2020 doesn't list; never for an element without
/// standard weight: then the mass of its longest-lived nuclide is used, and the result says so.
///
/// # Complexity
/// Linear in the items of `atoms`.
///
/// # Source
/// CIAAW 2021: Prohaska et al., Pure Appl. Chem. 2022, 94, 573.
///
/// # Examples
/// ```
/// use molkin_graph::{Element, average_mass};
///
/// let water = [(Element::HYDROGEN, None, 2), (Element::OXYGEN, None, 1)];
/// assert_eq!(average_mass(water, 0)?.dalton(), 18.015);
/// # Ok::<(), molkin_graph::MassError>(())
/// ```
pub fn average_mass(
    atoms: impl IntoIterator<Item = (Element, Option<u16>, u32)>,
    charge: i32,
) -> Result<Mass, MassError> {
    sum(atoms, charge, Element::standard_weight)
}

/// The monoisotopic mass: of each element the nuclide most abundant in nature, unless labelled.
///
/// Arguments, errors, complexity and the treatment of charge are those of [`average_mass`].
///
/// # Source
/// AME2020: Wang et al., Chin. Phys. C 2021, 45, 030003. Abundances: CIAAW 2021.
///
/// # Examples
/// ```
/// use molkin_graph::{Element, monoisotopic_mass};
///
/// let chloroform_d = [(Element::CARBON, None, 1), (Element::HYDROGEN, Some(2), 1), (Element::CHLORINE, None, 3)];
/// assert_eq!(monoisotopic_mass(chloroform_d, 0)?.dalton(), 118.920659859844);
/// # Ok::<(), molkin_graph::MassError>(())
/// ```
pub fn monoisotopic_mass(
    atoms: impl IntoIterator<Item = (Element, Option<u16>, u32)>,
    charge: i32,
) -> Result<Mass, MassError> {
    sum(atoms, charge, |element| {
        element.isotope_mass(element.most_abundant_isotope()?)
    })
}

/// Adds up the atoms; `unlabelled` gives the mass of an atom without label where nature defines one.
fn sum(
    atoms: impl IntoIterator<Item = (Element, Option<u16>, u32)>,
    charge: i32,
    unlabelled: impl Fn(Element) -> Option<f64>,
) -> Result<Mass, MassError> {
    let mut total = -i128::from(charge) * ELECTRON;
    let mut uses_longest_lived = false;
    for (element, label, count) in atoms {
        let mass = match label {
            Some(mass_number) => labelled(element, mass_number)?,
            None => match unlabelled(element) {
                Some(mass) => mass,
                None => {
                    uses_longest_lived |= count > 0;
                    longest_lived(element)?
                }
            },
        };
        // An atom is below 300 Da, 3e14 units, exact in a double; a u32 of them is below 2e24, and
        // i128 holds more than 1e13 such items.
        total = total.saturating_add((mass * UNITS).round() as i128 * i128::from(count));
    }
    Ok(Mass {
        dalton: total as f64 / UNITS,
        uses_longest_lived,
    })
}

fn labelled(element: Element, mass_number: u16) -> Result<f64, MassError> {
    if element == Element::WILDCARD {
        return Err(MassError::UnknownElement);
    }
    element
        .isotope_mass(mass_number)
        .ok_or(MassError::UnknownIsotope {
            element,
            mass_number,
        })
}

fn longest_lived(element: Element) -> Result<f64, MassError> {
    let mass_number = element
        .mass_number_of_longest_lived()
        .ok_or(MassError::UnknownElement)?;
    labelled(element, mass_number)
}

#[cfg(test)]
mod tests {
    use rstest::rstest;

    use super::{Mass, MassError, average_mass, monoisotopic_mass};
    use crate::Element;

    /// Reads `C:2 H@2:3 O`: symbol, label after `@`, count after `:`.
    fn atoms(text: &str) -> Vec<(Element, Option<u16>, u32)> {
        text.split_whitespace()
            .map(|word| {
                let (atom, count) = word.split_once(':').unwrap_or((word, "1"));
                let (symbol, label) = match atom.split_once('@') {
                    Some((symbol, label)) => (symbol, Some(label.parse().unwrap())),
                    None => (atom, None),
                };
                let element = Element::from_symbol(symbol).unwrap_or(Element::WILDCARD);
                (element, label, count.parse().unwrap())
            })
            .collect()
    }

    #[track_caller]
    fn check(found: Result<Mass, MassError>, expected: f64) {
        let found = found.unwrap();
        assert!(
            (found.dalton() - expected).abs() < 5e-9,
            "{}",
            found.dalton()
        );
    }

    // Sums by hand of CIAAW 2021 abridged weights, and of AME2020 masses where labelled or charged.
    #[rstest]
    #[case::methane("C H:4", 0, 16.043)]
    #[case::caffeine("C:8 H:10 N:4 O:2", 0, 194.194)]
    #[case::heavy_water("H@2:2 O", 0, 20.027203555688)]
    #[case::sodium_ion("Na", 1, 22.989220700091)]
    #[case::chloride("Cl", -1, 35.450548579909)]
    fn averages(#[case] items: &str, #[case] charge: i32, #[case] expected: f64) {
        check(average_mass(atoms(items), charge), expected);
    }

    // Sums by hand of AME2020 masses, electron 0.000548579909.
    #[rstest]
    #[case::methane("C H:4", 0, 16.031300127592)]
    #[case::caffeine("C:8 H:10 N:4 O:2", 0, 194.0803755745)]
    #[case::carbon_13_methane("C@13 H:4", 0, 17.034654962932)]
    #[case::proton("H", 1, 1.007276451989)]
    #[case::sodium_ion("Na", 1, 22.98922070204)]
    #[case::potassium_ion("K", 1, 38.963157904911)]
    #[case::ammonium("N H:4", 1, 18.033825551933)]
    #[case::formate("C H O:2", -1, 44.998202850327)]
    #[case::chloride("Cl", -1, 34.969401273909)]
    #[case::bromine("Br:2", 0, 157.836675148)]
    #[case::most_abundant_not_lightest("B", 0, 11.009305166)]
    #[case::nothing("", 0, 0.0)]
    fn monoisotopic(#[case] items: &str, #[case] charge: i32, #[case] expected: f64) {
        check(monoisotopic_mass(atoms(items), charge), expected);
    }

    // AME2020: 97Tc 96.906360720.
    #[test]
    fn elements_without_weight_use_the_longest_lived_nuclide_and_say_so() {
        let technetium = average_mass(atoms("Tc"), 0).unwrap();
        assert!(technetium.uses_longest_lived());
        assert!((technetium.dalton() - 96.90636072).abs() < 1e-6);
        assert!(
            monoisotopic_mass(atoms("Tc O:4"), -1)
                .unwrap()
                .uses_longest_lived()
        );
        assert!(
            !monoisotopic_mass(atoms("Tc@99 O:4"), -1)
                .unwrap()
                .uses_longest_lived()
        );
        assert!(
            !average_mass(atoms("U O:2"), 2)
                .unwrap()
                .uses_longest_lived()
        );
    }

    #[rstest]
    #[case("C *", MassError::UnknownElement)]
    #[case("C *@13", MassError::UnknownElement)]
    #[case("C@0 H:4", MassError::UnknownIsotope { element: Element::CARBON, mass_number: 0 })]
    #[case("C@999", MassError::UnknownIsotope { element: Element::CARBON, mass_number: 999 })]
    fn atoms_without_mass(#[case] items: &str, #[case] error: MassError) {
        assert_eq!(average_mass(atoms(items), 0), Err(error));
        assert_eq!(monoisotopic_mass(atoms(items), 0), Err(error));
    }

    #[test]
    fn the_order_of_atoms_does_not_change_a_digit() {
        let mut items = atoms("C:7 H@2 N O Cl@37:3 Se Hg C@13 H:11 Br I:2 C");
        let first = (
            average_mass(items.clone(), 1),
            monoisotopic_mass(items.clone(), 1),
        );
        for _ in 0..items.len() {
            items.rotate_left(1);
            assert_eq!(
                (
                    average_mass(items.clone(), 1),
                    monoisotopic_mass(items.clone(), 1)
                ),
                first
            );
        }
    }

    #[test]
    fn huge_counts_do_not_overflow() {
        let items = vec![(Element::OGANESSON, None, u32::MAX); 1000];
        assert!(average_mass(items, i32::MIN).unwrap().dalton() > 1e15);
    }
}
