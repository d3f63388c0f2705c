//! Isotope patterns: how an ion is spread over the nuclides of its elements.
//!
//! Peaks are told apart by their mass number alone: what has as many nucleons is one peak at its mean
//! mass, as an instrument that does not resolve the fine structure shows it. The convolution is exact
//! but for peaks below [`LEAST`] of all ions, which are left out as they arise.

use molkin_graph::Element;

use super::{adduct::Adduct, composition::Composition};

/// Share of all ions below which a peak is left out of the convolution.
const LEAST: f64 = 1e-12;
/// Main peaks are those with this share of the highest one.
const MAIN: f64 = 0.01;

/// A peak of a pattern.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Peak {
    /// Its mean m/z.
    pub mz: f64,
    /// Its height; the highest has 100.
    pub height: f64,
}

/// Ions by the nucleons that they have more than the lightest: each entry has the share of the ions and
/// that share times their mean mass.
#[derive(Debug, Clone, PartialEq)]
struct Spread {
    entries: Vec<(f64, f64)>,
}

impl Spread {
    /// No atoms at all.
    fn nothing() -> Self {
        Self {
            entries: vec![(1.0, 0.0)],
        }
    }

    /// One atom of an element, or of one of its nuclides. An element that has no natural composition is
    /// its most lasting nuclide.
    fn of_atom(element: Element, isotope: u16) -> Option<Self> {
        let single = |isotope| {
            Some(Self {
                entries: vec![(1.0, element.isotope_mass(isotope)?)],
            })
        };
        if isotope > 0 {
            return single(isotope);
        }
        let natural: Vec<(u16, f64, f64)> = element
            .isotopes()
            .filter_map(|nuclide| {
                Some((nuclide.mass_number(), nuclide.mass(), nuclide.abundance()?))
            })
            .collect();
        let (Some(first), Some(last)) = (natural.first(), natural.last()) else {
            return single(element.mass_number_of_longest_lived()?);
        };
        let mut entries = vec![(0.0, 0.0); usize::from(last.0 - first.0) + 1];
        for (number, mass, share) in &natural {
            // Mass numbers rise from the first to the last.
            entries[usize::from(number - first.0)] = (*share, share * mass);
        }
        Some(Self { entries })
    }

    /// Both together.
    fn with(&self, other: &Self) -> Self {
        let mut entries = vec![(0.0, 0.0); self.entries.len() + other.entries.len() - 1];
        for (i, &(share, weighted)) in self.entries.iter().enumerate() {
            for (j, &(other_share, other_weighted)) in other.entries.iter().enumerate() {
                let entry = &mut entries[i + j];
                entry.0 += share * other_share;
                entry.1 += weighted * other_share + share * other_weighted;
            }
        }
        let mut spread = Self { entries };
        spread.prune();
        spread
    }

    fn prune(&mut self) {
        let kept = |entry: &(f64, f64)| entry.0 >= LEAST;
        let ends = (
            self.entries.iter().position(kept),
            self.entries.iter().rposition(kept),
        );
        if let (Some(start), Some(end)) = ends {
            self.entries.truncate(end + 1);
            self.entries.drain(..start);
        }
    }

    /// So many of it, by repeated squaring.
    fn times(&self, mut count: i64) -> Self {
        let (mut all, mut power) = (Self::nothing(), self.clone());
        while count > 0 {
            if count & 1 == 1 {
                all = all.with(&power);
            }
            count >>= 1;
            if count > 0 {
                power = power.with(&power);
            }
        }
        all
    }
}

/// The main peaks of the ion of a molecule by rising m/z: those with at least a hundredth of the height
/// of the highest. Empty where an element has no known mass, or the ion cannot be.
pub(super) fn main_peaks(molecule: &Composition, adduct: &Adduct) -> Vec<Peak> {
    let Some(ion) = adduct.ion(molecule) else {
        return Vec::new();
    };
    let mut all = Spread::nothing();
    for (element, isotope, count) in ion.nuclides() {
        let Some(atom) = Spread::of_atom(element, isotope) else {
            return Vec::new();
        };
        all = all.with(&atom.times(count));
    }
    // The electrons that are missing or on top.
    let electrons = molkin_graph::monoisotopic_mass([], ion.charge());
    let electrons = electrons.map_or(0.0, |mass| mass.dalton());
    let highest = all.entries.iter().map(|entry| entry.0).fold(0.0, f64::max);
    let main = all
        .entries
        .iter()
        .filter(|entry| entry.0 >= MAIN * highest && entry.0 > 0.0);
    main.map(|&(share, weighted)| Peak {
        mz: (weighted / share + electrons) / adduct.charges(),
        height: 100.0 * share / highest,
    })
    .collect()
}

/// The highest of the peaks, the first of equal ones.
pub(super) fn highest(peaks: &[Peak]) -> Option<Peak> {
    let higher = |best: Option<Peak>, peak: &Peak| match best {
        Some(best) if best.height >= peak.height => Some(best),
        _ => Some(*peak),
    };
    peaks.iter().fold(None, higher)
}

#[cfg(test)]
mod tests {
    use rstest::rstest;

    use super::*;

    fn peaks(formula: &str, adduct: &str) -> Vec<Peak> {
        main_peaks(
            &Composition::parse(formula).unwrap(),
            &adduct.parse().unwrap(),
        )
    }

    // Heights by hand from the abundances of CIAAW 2021: for two bromines (79Br 0.5065, 81Br 0.4935)
    // 0.2565 : 0.4999 : 0.2435; for carbon 60 × 0.0106/0.9894 to first order; for one chlorine 0.2424/0.7576.
    #[rstest]
    #[case("Br2", "[M]+", &[51.3, 100.0, 48.7])]
    #[case("Cl", "[M]-", &[100.0, 0.0, 32.0])]
    #[case("C60", "[M]+", &[100.0, 64.3, 20.3, 4.2])]
    fn heights(#[case] formula: &str, #[case] adduct: &str, #[case] expected: &[f64]) {
        let found = peaks(formula, adduct);
        let expected: Vec<f64> = expected
            .iter()
            .copied()
            .filter(|&height| height > 0.0)
            .collect();
        assert_eq!(found.len(), expected.len(), "{found:?}");
        for (peak, expected) in found.iter().zip(expected) {
            assert!((peak.height - expected).abs() < 0.1, "{found:?}");
        }
    }

    #[test]
    fn without_rare_isotopes_the_pattern_is_the_monoisotopic_ion() {
        // Fluorine, phosphorus and iodine have one nuclide each. 19F 18.99840316207, 31P 30.973761998,
        // 127I 126.9044719 (AME2020), electron 0.000548579909.
        let found = peaks("PF5I", "[M]+");
        assert_eq!(found.len(), 1);
        assert!((found[0].mz - 252.869_700_8).abs() < 1e-5, "{found:?}");
        assert_eq!(found[0].height, 100.0);
    }

    #[test]
    fn labelled_atoms_do_not_spread() {
        assert_eq!(peaks("[13C]6F6", "[M]+").len(), 1);
        assert!(peaks("C6F6", "[M]+").len() > 1);
    }

    /// The mean over the whole pattern is the average mass: 12C, 13C and so on with their shares.
    #[test]
    fn the_mean_of_a_spread_is_the_average_mass() {
        for symbol in ["C", "Cl", "Sn", "Hg"] {
            let element = Element::from_symbol(symbol).unwrap();
            let spread = Spread::of_atom(element, 0).unwrap().times(7);
            let (shares, mass) = spread
                .entries
                .iter()
                .fold((0.0, 0.0), |sum, entry| (sum.0 + entry.0, sum.1 + entry.1));
            let weight = 7.0 * element.standard_weight().unwrap();
            assert!((shares - 1.0).abs() < 1e-9);
            assert!(
                (mass / weight - 1.0).abs() < 2e-4,
                "{symbol}: {mass} {weight}"
            );
        }
    }

    /// The number of ways to take k of n heavy nuclides: the binomial law against the convolution.
    #[test]
    fn two_nuclides_follow_the_binomial_law() {
        let spread = Spread::of_atom(Element::CHLORINE, 0).unwrap().times(10);
        let heavy = Element::CHLORINE
            .isotopes()
            .find(|n| n.mass_number() == 37)
            .unwrap();
        let p = heavy.abundance().unwrap();
        let mut expected = (1.0 - p).powi(10);
        for k in 0..=10_u32 {
            let found = spread.entries[2 * k as usize].0;
            assert!((found - expected).abs() < 1e-12, "{k}: {found} {expected}");
            expected *= f64::from(10 - k) / f64::from(k + 1) * p / (1.0 - p);
        }
    }
}
