//! What was measured on a sample, and whether a structure accounts for it.

use std::{fmt, str::FromStr};

use thiserror::Error;

use crate::Structure;

use super::{
    adduct::Adduct,
    component::{Component, Side},
    composition::Composition,
    pattern::{Peak, highest, main_peaks},
};

/// How far a measured m/z may be off.
#[derive(Debug, Clone, Copy, PartialEq)]
pub enum Tolerance {
    /// Parts per million of the expected m/z.
    Ppm(f64),
    /// Dalton per charge.
    Dalton(f64),
}

impl Default for Tolerance {
    /// 10 ppm.
    fn default() -> Self {
        Self::Ppm(10.0)
    }
}

/// Why a text says no tolerance.
#[derive(Debug, Clone, PartialEq, Eq, Error)]
#[error("no tolerance such as `5 ppm` or `0.01 Da`: {text:?}")]
pub struct ToleranceError {
    /// The text.
    pub text: String,
}

impl Tolerance {
    fn holds(self, measured: f64, expected: f64) -> bool {
        let off = (measured - expected).abs();
        off <= match self {
            Self::Ppm(ppm) => expected * ppm * 1e-6,
            Self::Dalton(dalton) => dalton,
        }
    }

    /// The same for a mass: how far it may be off at this m/z.
    pub(super) fn width(self, mz: f64) -> f64 {
        match self {
            Self::Ppm(ppm) => mz * ppm * 1e-6,
            Self::Dalton(dalton) => dalton,
        }
    }
}

impl FromStr for Tolerance {
    type Err = ToleranceError;

    /// A number with `ppm` (also where no unit stands), `Da`, `mDa`, `u` or `Th` behind it.
    fn from_str(text: &str) -> Result<Self, ToleranceError> {
        let error = || ToleranceError {
            text: text.trim().to_owned(),
        };
        let plain = text
            .trim()
            .trim_start_matches(['±', '\u{2213}'])
            .trim_start();
        let digits = plain.trim_end_matches(char::is_alphabetic);
        let unit = plain[digits.len()..].to_ascii_lowercase();
        let size = parse_number(digits)
            .filter(|size| *size > 0.0)
            .ok_or_else(error)?;
        match unit.as_str() {
            "" | "ppm" => Ok(Self::Ppm(size)),
            "da" | "u" | "th" | "amu" => Ok(Self::Dalton(size)),
            "mda" | "mmu" => Ok(Self::Dalton(size / 1000.0)),
            _ => Err(error()),
        }
    }
}

impl fmt::Display for Tolerance {
    fn fmt(&self, formatter: &mut fmt::Formatter<'_>) -> fmt::Result {
        match self {
            Self::Ppm(ppm) => write!(formatter, "{ppm} ppm"),
            Self::Dalton(dalton) => write!(formatter, "{dalton} Da"),
        }
    }
}

/// A number with a decimal point, or a decimal comma where there is no point.
pub fn parse_number(text: &str) -> Option<f64> {
    let text = text.trim();
    let plain = match text.contains('.') {
        true => text.to_owned(),
        false => text.replacen(',', ".", 1),
    };
    let written = plain
        .bytes()
        .all(|byte| byte.is_ascii_digit() || b".+-eE".contains(&byte));
    plain
        .parse()
        .ok()
        .filter(|value: &f64| written && value.is_finite())
}

/// A measured m/z.
#[derive(Debug, Clone, PartialEq)]
pub struct Measurement {
    /// The m/z.
    pub mz: f64,
    /// The ion; where it is not known, all usual ones are tried.
    pub adduct: Option<Adduct>,
    /// How far it may be off.
    pub tolerance: Tolerance,
}

/// A measured m/z beside that of a structure.
#[derive(Debug, Clone, PartialEq)]
pub struct MassCheck {
    /// The ion; of several that were tried, one that fits or else the nearest.
    pub adduct: String,
    /// The formula of the component that ionises, neutral where protons can make it so.
    pub component: String,
    /// The expected m/z: monoisotopic, or that of the highest peak where only that fits.
    pub expected: f64,
    /// Whether it is that of the highest peak.
    pub is_highest: bool,
    /// How far the measured m/z lies above it, in ppm.
    pub ppm: f64,
    /// Whether that is within the tolerance.
    pub fits: bool,
    /// The main peaks of the ion.
    pub peaks: Vec<Peak>,
}

impl Measurement {
    /// The ions that it may be of.
    pub(super) fn adducts(&self) -> Vec<Adduct> {
        match &self.adduct {
            Some(adduct) => vec![adduct.clone()],
            None => Adduct::usual(),
        }
    }

    /// Holds the measurement against a structure. `None` where no ion of it has a known mass.
    ///
    /// Of each component that may ionise and each ion that may have been seen the monoisotopic m/z is
    /// looked at first, then that of the highest peak, which is another one where an element has no
    /// light nuclide that prevails, or very many atoms.
    pub(super) fn check(&self, side: &Side) -> Option<MassCheck> {
        let adducts = self.adducts();
        let mut best: Option<(MassCheck, Composition, Adduct)> = None;
        for Component { neutral, .. } in &side.components {
            for adduct in &adducts {
                for by_highest in [false, true] {
                    let Some(check) = self.against(neutral, adduct, by_highest) else {
                        continue;
                    };
                    let rank = |check: &MassCheck| (!check.fits, check.is_highest);
                    let better = best.as_ref().is_none_or(|(old, ..)| {
                        let nearer = check.ppm.abs() < old.ppm.abs();
                        rank(&check) < rank(old) || rank(&check) == rank(old) && nearer
                    });
                    let fits = check.fits;
                    if better {
                        best = Some((check, neutral.clone(), adduct.clone()));
                    }
                    if fits {
                        break;
                    }
                }
            }
        }
        let (check, neutral, adduct) = best?;
        Some(MassCheck {
            peaks: main_peaks(&neutral, &adduct),
            ..check
        })
    }

    fn against(
        &self,
        neutral: &Composition,
        adduct: &Adduct,
        by_highest: bool,
    ) -> Option<MassCheck> {
        let expected = if by_highest {
            highest(&main_peaks(neutral, adduct))?.mz
        } else {
            adduct.ion(neutral)?.monoisotopic().ok()? / adduct.charges()
        };
        Some(MassCheck {
            adduct: adduct.to_string(),
            component: neutral.formula().to_string(),
            expected,
            is_highest: by_highest,
            ppm: (self.mz - expected) / expected * 1e6,
            fits: self.tolerance.holds(self.mz, expected),
            peaks: Vec::new(),
        })
    }
}

/// Whether a measured formula is that of a record: of the whole, or of a component that may ionise, with
/// a proton for each charge or without. Isotopes count as their element unless the formula names them.
pub(super) fn formula_fits(measured: &Composition, structure: &Structure, side: &Side) -> bool {
    let whole = Composition::of_atoms(structure.molecule().atoms());
    let components = side.components.iter().map(|component| &component.neutral);
    let neutral = measured.clone().with_protons(-measured.charge());
    let names_isotopes = measured.nuclides().any(|(_, isotope, _)| isotope > 0);
    let same = |own: &Composition, measured: &Composition| match names_isotopes {
        true => own == measured,
        false => own.formula() == measured.formula(),
    };
    let mut all = components.chain([&whole]);
    all.any(|own| same(own, measured) || same(own, &neutral))
}

#[cfg(test)]
mod tests {
    use molkin_formats::smiles;
    use molkin_graph::{Limits, Orderer};
    use rstest::rstest;

    use crate::Normaliser;

    use super::*;

    fn side(text: &str) -> (Structure, Side) {
        let mut orderer = Orderer::new(Limits::default());
        let structure = Structure::new(&mut orderer, smiles::parse(text).unwrap()).unwrap();
        let side = Side::of(&mut Normaliser::new(Limits::default()), &structure);
        (structure, side)
    }

    fn check(structure: &str, mz: f64, adduct: &str) -> MassCheck {
        let measurement = Measurement {
            mz,
            adduct: (!adduct.is_empty()).then(|| adduct.parse().unwrap()),
            tolerance: Tolerance::Ppm(5.0),
        };
        measurement.check(&side(structure).1).unwrap()
    }

    // m/z from memory of published mass spectra: diphenhydramine [M+H]+ 256.1696, ibuprofen [M-H]-
    // 205.1234, benzalkonium C12 cation 304.2999, acetylcholine 146.1176.
    #[rstest]
    #[case::salt("CN(C)CCOC(c1ccccc1)c1ccccc1.Cl", 256.1696, "[M+H]+")]
    #[case::ionic_salt("C[NH+](C)CCOC(c1ccccc1)c1ccccc1.[Cl-]", 256.1696, "[M+H]+")]
    #[case::sodium_salt("CC(C)Cc1ccc(cc1)C(C)C(=O)[O-].[Na+]", 205.1234, "[M-H]-")]
    #[case::quaternary("CCCCCCCCCCCC[N+](C)(C)Cc1ccccc1.[Cl-]", 304.2999, "M+")]
    #[case::quaternary_untold("CC(=O)OCC[N+](C)(C)C.[Cl-]", 146.1176, "")]
    fn ions_of_records(#[case] structure: &str, #[case] mz: f64, #[case] adduct: &str) {
        let found = check(structure, mz, adduct);
        assert!(found.fits, "{found:?}");
    }

    #[test]
    fn a_labelled_compound_is_heavier() {
        // Three deuterium atoms for hydrogen: 3 × 1.006276746 (AME2020).
        let plain = check("Cn1cnc2c1c(=O)n(C)c(=O)n2C", 195.087652, "[M+H]+");
        let labelled = check(
            "[2H]C([2H])([2H])n1cnc2c1c(=O)n(C)c(=O)n2C",
            195.087652,
            "[M+H]+",
        );
        assert!(plain.fits && !labelled.fits);
        assert!((labelled.expected - plain.expected - 3.018830).abs() < 1e-5);
    }

    #[test]
    fn where_another_peak_is_the_highest_that_one_fits_too() {
        // Decabromobiphenyl ether: 79Br5 81Br5 is the highest, ten nucleons above the monoisotopic one.
        let text = "Brc1c(Br)c(Br)c(Br)c(Br)c1Oc1c(Br)c(Br)c(Br)c(Br)c1Br";
        let found = check(text, 959.168, "M+");
        assert!(found.is_highest, "{found:?}");
        assert!((found.expected - 959.168).abs() < 0.01, "{found:?}");
    }

    #[test]
    fn without_a_named_ion_the_nearest_is_told() {
        let found = check("CCO", 100.0, "");
        assert!(!found.fits);
        assert_eq!(found.adduct, "[M+HCOO]-");
    }

    #[rstest]
    #[case("5", Tolerance::Ppm(5.0))]
    #[case("± 0,5 ppm", Tolerance::Ppm(0.5))]
    #[case("0.01 Da", Tolerance::Dalton(0.01))]
    #[case("3mDa", Tolerance::Dalton(0.003))]
    fn tolerances(#[case] text: &str, #[case] expected: Tolerance) {
        assert_eq!(text.parse(), Ok(expected));
    }

    #[rstest]
    #[case("")]
    #[case("-5")]
    #[case("5 %")]
    #[case("nan")]
    fn no_tolerances(#[case] text: &str) {
        assert!(text.parse::<Tolerance>().is_err());
    }

    #[rstest]
    #[case("C8H10N4O2", "Cn1cnc2c1c(=O)n(C)c(=O)n2C", true)]
    #[case("C2H7N", "CC[NH3+].[Cl-]", true)]
    #[case("C2H8N+", "CC[NH3+].[Cl-]", true)]
    #[case("C2H8NCl", "CC[NH3+].[Cl-]", true)]
    #[case("C2H6N", "CCN", false)]
    #[case("CH4O", "[2H]C([2H])([2H])O", true)]
    #[case("CD3OH", "[2H]C([2H])([2H])O", true)]
    #[case("CD3OD", "[2H]C([2H])([2H])O", false)]
    fn formulae(#[case] measured: &str, #[case] structure: &str, #[case] expected: bool) {
        let measured = Composition::parse(measured).unwrap();
        let (structure, side) = side(structure);
        assert_eq!(formula_fits(&measured, &structure, &side), expected);
    }
}
