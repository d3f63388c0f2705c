//! The smallest set of axes apart from which two records are the same.

use std::collections::BTreeMap;

use crate::{Relation, Structure};

use super::{Axes, Axis, Form, FormError, Normaliser};

/// By preference among sets of one size: the axis that overlooks less, or says more, comes first.
const BY_PREFERENCE: [Axis; 5] = [
    Axis::Stereo,
    Axis::Charge,
    Axis::Salt,
    Axis::Tautomer,
    Axis::Isotope,
];

/// The smallest set of axes which, overlooked, makes two records identical: none for identical records,
/// `None` where no axes do. Among sets of one size stereo comes before charge, charge before salt, salt
/// before tautomer and tautomer before isotope; so two drawings of ammonium chloride differ in charge
/// alone. [`Axis::RingChain`] is not switched on.
///
/// What `same_apart_from` says of (a, b) it says of (b, a).
///
/// # Errors
/// [`FormError`] where no set was found and some could not be looked at.
///
/// # Examples
/// ```
/// use molkin_formats::smiles;
/// use molkin_graph::{Limits, Orderer};
/// use molkin_relate::{Normaliser, Structure, relate, same_apart_from};
///
/// let mut orderer = Orderer::new(Limits::default());
/// let a = Structure::new(&mut orderer, smiles::parse("C[C@H](N)CC")?)?;
/// let b = Structure::new(&mut orderer, smiles::parse("CC([NH3+])CC.[Cl-]")?)?;
/// let relation = relate(&mut orderer, &a, &b)?.relation;
/// let mut normaliser = Normaliser::new(Limits::default());
/// let apart = same_apart_from(&mut normaliser, relation, &a, &b)?;
/// assert_eq!(apart.map(|axes| axes.to_string()).as_deref(), Some("salt,stereo"));
/// # Ok::<(), Box<dyn std::error::Error>>(())
/// ```
pub fn same_apart_from(
    normaliser: &mut Normaliser,
    relation: Relation,
    a: &Structure,
    b: &Structure,
) -> Result<Option<Axes>, FormError> {
    match relation {
        Relation::Identical => return Ok(Some(Axes::NONE)),
        // The same connectivity: what is left is stereo.
        Relation::Stereo(_) => return Ok(Some(Axes::from([Axis::Stereo]))),
        Relation::Constitutional | Relation::NotIsomers => {}
    }
    let open: Vec<Axis> = BY_PREFERENCE
        .into_iter()
        .filter(|&axis| may_change(a, axis) || may_change(b, axis))
        .collect();
    let mut pair = Pair {
        normaliser,
        sides: [a, b],
        forms: BTreeMap::new(),
    };
    // Overlooking more never tells records apart that were the same: most pairs end here.
    let all: Axes = open.iter().copied().collect();
    let mut failed = None;
    match pair.same(all) {
        Ok(false) => return Ok(None),
        Ok(true) => {}
        Err(error) => failed = Some(error),
    }
    for size in 1..=open.len() {
        for axes in subsets(&open, size) {
            match pair.same(axes) {
                Ok(true) => return Ok(Some(axes)),
                Ok(false) => {}
                Err(error) => failed = Some(error),
            }
        }
    }
    match failed {
        Some(error) => Err(error),
        None => Ok(None),
    }
}

/// Whether overlooking an axis may change a record at all; cheap.
fn may_change(structure: &Structure, axis: Axis) -> bool {
    let molecule = structure.molecule();
    match axis {
        Axis::Salt => !molecule.is_connected(),
        Axis::Charge => molecule.atoms().any(|atom| atom.charge != 0),
        Axis::Tautomer | Axis::RingChain => true,
        Axis::Isotope => !structure.isotopes().is_empty(),
        Axis::OpenStereo => false,
        Axis::Stereo => {
            !molecule.drawn_stereo().is_empty() || !molecule.drawn_coordination().is_empty()
        }
    }
}

/// All subsets of one size, in lexicographic order.
fn subsets(axes: &[Axis], size: usize) -> Vec<Axes> {
    match (size, axes) {
        (0, _) => vec![Axes::NONE],
        (_, []) => Vec::new(),
        (_, [first, rest @ ..]) => {
            let with = subsets(rest, size - 1).into_iter();
            let mut found: Vec<Axes> = with.map(|axes| axes.with(*first)).collect();
            found.extend(subsets(rest, size));
            found
        }
    }
}

/// Two records with the forms that were found so far.
struct Pair<'n, 's> {
    normaliser: &'n mut Normaliser,
    sides: [&'s Structure; 2],
    /// By side and axes, those left out that change nothing there.
    forms: BTreeMap<(usize, Axes), Form<'s>>,
}

impl Pair<'_, '_> {
    fn same(&mut self, axes: Axes) -> Result<bool, FormError> {
        let keys = [0, 1].map(|side| {
            let open = axes.iter();
            let open = open.filter(|&axis| may_change(self.sides[side], axis));
            (side, open.collect::<Axes>())
        });
        for key in keys {
            if !self.forms.contains_key(&key) {
                let form = self.normaliser.overlook(self.sides[key.0], key.1)?;
                self.forms.insert(key, form);
            }
        }
        let [a, b] = keys.map(|key| self.forms.get(&key).map(Form::structure));
        Ok(match (a, b) {
            (Some(a), Some(b)) => a.canonical().same_compound(b.canonical()),
            _ => false,
        })
    }
}

#[cfg(test)]
mod tests {
    use rstest::rstest;

    use super::*;
    use crate::{forms::tests::structure, relate};
    use molkin_graph::{Limits, Orderer};

    #[test]
    fn subsets_come_in_order() {
        let words = |size| -> Vec<String> {
            let axes = [Axis::Stereo, Axis::Charge, Axis::Salt];
            let subsets = subsets(&axes, size).into_iter();
            subsets.map(|axes| axes.to_string()).collect()
        };
        assert_eq!(words(1), ["stereo", "charge", "salt"]);
        assert_eq!(words(2), ["charge,stereo", "salt,stereo", "salt,charge"]);
        assert_eq!(words(3), ["salt,charge,stereo"]);
    }

    #[rstest]
    #[case("CCO", "OCC", Some(""))]
    #[case("CCN", "CCN.Cl", Some("salt"))]
    #[case("CCN.Cl", "CC[NH3+].[Cl-]", Some("charge"))]
    #[case("CCN", "CC[NH3+]", Some("charge"))]
    #[case("CC[NH3+]", "CCN.Cl", Some("salt,charge"))]
    #[case("[NH3+]CC(=O)[O-]", "[NH3+]CC(=O)O.[Cl-]", Some("salt,charge"))]
    #[case("NCC(=O)O", "[NH3+]CC(=O)O.[Cl-]", Some("salt"))]
    #[case("C[C@H](N)O", "C[C@@H](N)O", Some("stereo"))]
    #[case("C[C@H](N)O", "[2H]C[C@@H](N)O", Some("isotope,stereo"))]
    #[case("C[C@@H]([2H])O", "C[C@H]([2H])O", Some("stereo"))]
    #[case("C[C@@H]([2H])O", "CCO", Some("isotope"))]
    #[case("CCO", "COC", None)]
    #[case("CC.O", "CCO.O", None)]
    fn smallest_sets(#[case] a: &str, #[case] b: &str, #[case] expected: Option<&str>) {
        let mut orderer = Orderer::new(Limits::default());
        let mut normaliser = Normaliser::new(Limits::default());
        for (a, b) in [(a, b), (b, a)] {
            let (a, b) = (structure(a), structure(b));
            let relation = relate(&mut orderer, &a, &b).unwrap().relation;
            let apart = same_apart_from(&mut normaliser, relation, &a, &b).unwrap();
            assert_eq!(apart.map(|axes| axes.to_string()).as_deref(), expected);
        }
    }
}
