//! Ions as a mass spectrometer makes them: a molecule with something added or taken away.

use std::fmt;

use thiserror::Error;

use super::composition::Composition;

/// How an ion comes from a molecule M: `[M+H]+`, `[2M+Na]+`, `[M-H2O+H]+`, `M+`.
///
/// # Examples
/// ```
/// use molkin_relate::samples::Adduct;
///
/// let sodium: Adduct = "[M+Na]+".parse()?;
/// assert_eq!(sodium.to_string(), "[M+Na]+");
/// assert_eq!("M−H".parse::<Adduct>()?.to_string(), "[M-H]-");
/// # Ok::<(), molkin_relate::samples::AdductError>(())
/// ```
#[derive(Debug, Clone, PartialEq, Eq, Hash)]
pub struct Adduct {
    /// Molecules in the ion.
    molecules: u16,
    /// Atoms that come on top; fewer than none are taken away.
    change: Composition,
    /// The charge of the ion, not 0.
    charge: i32,
    text: String,
}

/// Why a text names no ion.
#[derive(Debug, Clone, PartialEq, Eq, Error)]
#[error("no ion such as [M+H]+: {text:?}")]
pub struct AdductError {
    /// The text.
    pub text: String,
}

/// The ions that are tried where the record does not name one, positive ones first.
const USUAL: [&str; 9] = [
    "[M+H]+",
    "[M+Na]+",
    "[M+K]+",
    "[M+NH4]+",
    "[M+2H]2+",
    "[M]+",
    "[M-H]-",
    "[M+Cl]-",
    "[M+HCOO]-",
];

/// No ion has more molecules, or more of one group.
const MOST_MOLECULES: u16 = 100;
const MOST_TIMES: u16 = 1_000;

/// Names of what is added that are no formulae.
const NAMES: [(&str, &str); 6] = [
    ("ACN", "C2H3N"),
    ("DMSO", "C2H6OS"),
    ("FA", "CH2O2"),
    ("MeOH", "CH4O"),
    ("MeCN", "C2H3N"),
    ("TFA", "C2HF3O2"),
];

impl Adduct {
    /// The usual ions: those of protonation, sodium, potassium and ammonium, the doubly protonated one,
    /// the molecular ion, and those of deprotonation, chloride and formate.
    pub fn usual() -> Vec<Self> {
        let parsed = USUAL.iter().filter_map(|text| text.parse().ok());
        parsed.collect()
    }

    /// The ion of a molecule; `None` where it lacks the atoms to be taken away.
    ///
    /// A component that has a charge of its own, which no proton settles, is the ion `M+` or `M-` as it
    /// stands.
    pub(super) fn ion(&self, molecule: &Composition) -> Option<Composition> {
        let atoms = Composition::default().plus(molecule, i64::from(self.molecules));
        let ion = atoms.plus(&self.change, 1).with_charge(self.charge);
        ion.is_possible().then_some(ion)
    }

    /// The size of the charge, by which a mass is divided.
    pub(super) fn charges(&self) -> f64 {
        f64::from(self.charge.unsigned_abs())
    }

    /// How far the mass of M may be off where the m/z may be off so much.
    pub(super) fn width_of_molecule(&self, width: f64) -> f64 {
        width * self.charges() / f64::from(self.molecules)
    }

    /// The mass of the atoms of M, without a thought to electrons, of an ion with this m/z; what
    /// [`Composition::monoisotopic`] says of M with the charge 0.
    pub(super) fn mass_of_molecule(&self, mz: f64) -> Option<f64> {
        let gained = self.change.nuclides().map(|(element, isotope, count)| {
            let isotope = (isotope > 0).then_some(isotope);
            let mass = molkin_graph::monoisotopic_mass([(element, isotope, 1)], 0).ok()?;
            Some(mass.dalton() * count as f64)
        });
        let gained: f64 = gained.sum::<Option<f64>>()?;
        let electrons = molkin_graph::monoisotopic_mass([], self.charge)
            .ok()?
            .dalton();
        Some((mz * self.charges() - gained - electrons) / f64::from(self.molecules))
    }
}

impl fmt::Display for Adduct {
    fn fmt(&self, formatter: &mut fmt::Formatter<'_>) -> fmt::Result {
        formatter.pad(&self.text)
    }
}

impl std::str::FromStr for Adduct {
    type Err = AdductError;

    fn from_str(text: &str) -> Result<Self, AdductError> {
        parse(&plain(text)).ok_or_else(|| AdductError {
            text: text.trim().to_owned(),
        })
    }
}

/// The text in plain characters: hyphens, signs and digits on the line, no blanks, no dot of a radical.
fn plain(text: &str) -> String {
    let plain = |character| match character {
        '\u{2212}' | '\u{2013}' | '\u{2010}' | '\u{2011}' | '\u{207b}' => Some('-'),
        '\u{207a}' => Some('+'),
        '\u{00b2}' => Some('2'),
        '\u{00b3}' => Some('3'),
        '\u{2022}' | '\u{00b7}' | '.' | '*' | '^' => None,
        c if c.is_whitespace() => None,
        c => Some(c),
    };
    text.chars().filter_map(plain).collect()
}

fn parse(text: &str) -> Option<Adduct> {
    let Some(rest) = text.strip_prefix('[') else {
        // Without brackets: one of the usual ions, whose charge is known.
        let bare = |usual: &&&str| {
            let inner = usual
                .trim_start_matches('[')
                .trim_end_matches(['+', '-', '2']);
            let inner = inner.trim_end_matches(']');
            let charge = if usual.ends_with('+') { '+' } else { '-' };
            text == inner && inner != "M" || text.strip_suffix(charge) == Some(inner)
        };
        return USUAL.iter().find(bare).and_then(|usual| parse(usual));
    };
    let (inner, charge) = rest.rsplit_once(']')?;
    let charge = parse_charge(charge)?;
    let (molecules, terms) = inner.split_once('M')?;
    let molecules = match molecules {
        "" => 1,
        digits => digits
            .parse()
            .ok()
            .filter(|count| (1..=MOST_MOLECULES).contains(count))?,
    };
    Some(Adduct {
        molecules,
        change: parse_terms(terms)?,
        charge,
        text: text.to_owned(),
    })
}

/// `+2H`, `+Na-H2O`: what is added and what is taken away.
fn parse_terms(mut terms: &str) -> Option<Composition> {
    let mut change = Composition::default();
    while !terms.is_empty() {
        let sign = match terms.as_bytes().first()? {
            b'+' => 1,
            b'-' => -1,
            _ => return None,
        };
        let end = terms[1..]
            .find(['+', '-'])
            .map_or(terms.len(), |end| end + 1);
        let term = &terms[1..end];
        let digits = term.len() - term.trim_start_matches(|c: char| c.is_ascii_digit()).len();
        let (times, group) = term.split_at(digits);
        let times: u16 = match digits {
            0 => 1,
            _ => times.parse().ok().filter(|&times| times <= MOST_TIMES)?,
        };
        let named = NAMES.iter().find(|(name, _)| *name == group);
        let group = Composition::parse(named.map_or(group, |(_, formula)| formula)).ok()?;
        change = change.plus(&group, sign * i64::from(times));
        terms = &terms[end..];
    }
    Some(change)
}

/// `+`, `2+`, `+2`, `++` and the same with minus.
fn parse_charge(text: &str) -> Option<i32> {
    let sign = match (text.contains('+'), text.contains('-')) {
        (true, false) => '+',
        (false, true) => '-',
        _ => return None,
    };
    let size = match text.trim_matches(sign) {
        "" => i32::try_from(text.len()).ok()?,
        digits if text.len() == digits.len() + 1 => digits.parse().ok()?,
        _ => return None,
    };
    (size > 0).then_some(if sign == '+' { size } else { -size })
}

#[cfg(test)]
mod tests {
    use rstest::rstest;

    use super::*;

    #[track_caller]
    fn mz(adduct: &str, formula: &str) -> f64 {
        let adduct: Adduct = adduct.parse().unwrap();
        let ion = adduct.ion(&Composition::parse(formula).unwrap()).unwrap();
        ion.monoisotopic().unwrap() / adduct.charges()
    }

    // Caffeine C8H10N4O2 from AME2020 masses (12C 12, 1H 1.00782503190, 14N 14.00307400425, 16O
    // 15.99491461926, 23Na 22.98976928195, 39K 38.96370648482, 35Cl 34.968852694) and the electron,
    // 0.000548579909: M = 194.0803755745, by hand. The protonated ion is 195.0877 in textbooks
    // (from memory).
    #[rstest]
    #[case("[M+H]+", 195.087652)]
    #[case("[M+Na]+", 217.069596)]
    #[case("[M+K]+", 233.043533)]
    #[case("[M+NH4]+", 212.114201)]
    #[case("[M+2H]2+", 98.047464)]
    #[case("M+", 194.079827)]
    #[case("[M]+•", 194.079827)]
    #[case("[M−H]−", 193.073099)]
    #[case("[M+Cl]-", 229.049777)]
    #[case("[M+HCOO]-", 239.078578)]
    #[case("[2M+H]+", 389.168028)]
    #[case("[M+ACN+H]+", 236.114201)]
    #[case("[M-H2O+H]+", 177.077088)]
    fn ions_of_caffeine(#[case] adduct: &str, #[case] expected: f64) {
        let found = mz(adduct, "C8H10N4O2");
        assert!((found - expected).abs() < 1e-6, "{found}");
    }

    // Common background ions, from memory of published lists: sodium trifluoroacetate cluster
    // [NaTFA+Na]+ 158.9641, dibutyl phthalate [M+H]+ 279.1591, DMSO [2M+Na]+ 179.0171,
    // trifluoroacetate 112.9856, tetrabutylammonium 242.2842.
    #[rstest]
    #[case("[M+Na]+", "C2F3O2Na", 158.9641)]
    #[case("[M+H]+", "C16H22O4", 279.1591)]
    #[case("[2M+Na]+", "C2H6OS", 179.0171)]
    #[case("[M-H]-", "C2HF3O2", 112.9856)]
    #[case("M+", "C16H36N", 242.2842)]
    fn background_ions(#[case] adduct: &str, #[case] formula: &str, #[case] expected: f64) {
        let found = mz(adduct, formula);
        assert!((found - expected).abs() < 1e-4, "{found}");
    }

    #[rstest]
    #[case("M+H", "[M+H]+")]
    #[case("M+H+", "[M+H]+")]
    #[case("M-H", "[M-H]-")]
    #[case("M+", "[M]+")]
    #[case(" [M + 2H]²⁺ ", "[M+2H]2+")]
    #[case("[M+2H]++", "[M+2H]++")]
    #[case("[M+3H]+3", "[M+3H]+3")]
    fn spellings(#[case] text: &str, #[case] expected: &str) {
        assert_eq!(text.parse::<Adduct>().unwrap().to_string(), expected);
    }

    #[rstest]
    #[case("")]
    #[case("M")]
    #[case("[M+H]")]
    #[case("[M+H]0+")]
    #[case("[M+Q]+")]
    #[case("[0M+H]+")]
    #[case("[H]+")]
    #[case("[M+H]+-")]
    #[case("[MH]+")]
    fn no_ions(#[case] text: &str) {
        assert!(text.parse::<Adduct>().is_err());
    }

    #[test]
    fn there_are_nine_usual_ions_and_each_leads_back_to_its_molecule() {
        let molecule = Composition::parse("C8H10N4O2").unwrap();
        let usual = Adduct::usual();
        assert_eq!(usual.len(), USUAL.len());
        for adduct in usual {
            let mz = adduct.ion(&molecule).unwrap().monoisotopic().unwrap() / adduct.charges();
            let mass = adduct.mass_of_molecule(mz).unwrap();
            assert!((mass - 194.0803755745).abs() < 1e-9, "{adduct}: {mass}");
        }
        let too_much: Adduct = "[M-Br]+".parse().unwrap();
        assert_eq!(too_much.ion(&molecule), None);
    }
}
