//! Kinds: what sort of isomers, or of other relatives, two records are.
//!
//! Each kind is a predicate on the canonical objects; docs/definitions.md has them with their sources
//! and examples.

mod profile;

use molkin_graph::{Element, Formula, GraphError, GraphOrderer, Limits};

use crate::{Axes, Axis, Relation, StereoKind, Structure};
use profile::Profile;

/// A kind of relation. The order is that of precedence within a relation.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Hash)]
#[non_exhaustive]
pub enum Kind {
    /// Constitutional: the same isotopes in other places.
    Isotopomers,
    /// Constitutional: a proton sits elsewhere, on another site or component.
    ProtonTransfer,
    /// Constitutional: mobile hydrogens sit elsewhere.
    Tautomers,
    /// Constitutional: an open chain of one is closed to a ring in the other.
    RingChain,
    /// Constitutional: other functional groups.
    Functional,
    /// Constitutional: carbon chains or rings of other shapes.
    Skeletal,
    /// Constitutional: the same groups on the same skeleton in other places.
    Positional,
    /// A kind of stereo relation.
    Stereo(StereoKind),
    /// Not isomers: other counter-ions or solvents, or another ratio of them.
    SaltOrSolvate,
    /// Not isomers: another state of protonation.
    ChargeState,
    /// Not isomers: only the isotopic composition differs.
    Isotopologues,
    /// Not isomers: the same functional groups, and formulae that differ by CH2.
    Homologues,
    /// None of these.
    Other,
}

impl Kind {
    /// The word of the output contract.
    pub fn as_str(self) -> &'static str {
        match self {
            Self::Isotopomers => "isotopomers",
            Self::ProtonTransfer => "proton-transfer",
            Self::Tautomers => "tautomers",
            Self::RingChain => "ring-chain",
            Self::Functional => "functional",
            Self::Skeletal => "skeletal",
            Self::Positional => "positional",
            Self::Stereo(kind) => kind.as_str(),
            Self::SaltOrSolvate => "salt-or-solvate",
            Self::ChargeState => "charge-state",
            Self::Isotopologues => "isotopologues",
            Self::Homologues => "homologues",
            Self::Other => "other",
        }
    }
}

/// All kinds that hold of two records with this relation, by precedence: the first is *the* kind. Empty
/// for identical records, which have none. `apart` is what [`crate::same_apart_from`] says of them.
///
/// `kinds` of (a, b) equals that of (b, a).
///
/// # Errors
/// [`GraphError::Order`]: functional groups or skeletons so symmetric that their order takes more
/// steps than the limit.
///
/// # Examples
/// ```
/// use molkin_formats::smiles;
/// use molkin_graph::{Limits, Orderer};
/// use molkin_relate::{Kind, Normaliser, Structure, kinds, relate, same_apart_from};
///
/// let limits = Limits::default();
/// let mut orderer = Orderer::new(limits);
/// let butanol = Structure::new(&mut orderer, smiles::parse("CCCCO")?)?;
/// let ether = Structure::new(&mut orderer, smiles::parse("CCOCC")?)?;
/// let verdict = relate(&mut orderer, &butanol, &ether)?;
/// let apart = same_apart_from(&mut Normaliser::new(limits), verdict.relation, &butanol, &ether)?;
/// let kinds = kinds(verdict.relation, [&butanol, &ether], apart, &limits)?;
/// assert_eq!(kinds, [Kind::Functional]);
/// # Ok::<(), Box<dyn std::error::Error>>(())
/// ```
pub fn kinds(
    relation: Relation,
    [a, b]: [&Structure; 2],
    apart: Option<Axes>,
    limits: &Limits,
) -> Result<Vec<Kind>, GraphError> {
    let apart = apart.unwrap_or(Axes::NONE);
    let mut orderer = GraphOrderer::new(*limits);
    let mut kinds = match relation {
        Relation::Identical => return Ok(Vec::new()),
        Relation::Stereo(kind) => vec![Kind::Stereo(kind)],
        Relation::Constitutional => constitutional([a, b], apart, &mut orderer)?,
        Relation::NotIsomers => not_isomers([a, b], apart, &mut orderer)?,
    };
    if kinds.is_empty() {
        kinds.push(Kind::Other);
    }
    Ok(kinds)
}

/// The kinds among `of` whose axes are in a set.
fn on_axes(apart: Axes, of: &[(Axis, Kind)]) -> Vec<Kind> {
    let held = of.iter().filter(|(axis, _)| apart.contains(*axis));
    held.map(|&(_, kind)| kind).collect()
}

fn constitutional(
    [a, b]: [&Structure; 2],
    apart: Axes,
    orderer: &mut GraphOrderer,
) -> Result<Vec<Kind>, GraphError> {
    if a.canonical().same_constitution(b.canonical()) {
        return Ok(vec![Kind::Isotopomers]);
    }
    let mut kinds = on_axes(
        apart,
        &[
            (Axis::Isotope, Kind::Isotopomers),
            (Axis::Charge, Kind::ProtonTransfer),
            (Axis::Tautomer, Kind::Tautomers),
        ],
    );
    let [a, b] = [a, b].map(Profile::of);
    // Mixtures of other components are no isomers of a kind: nothing within a molecule moved.
    if a.components() != b.components() {
        return Ok(kinds);
    }
    if a.closes_a_ring_of(&b) || b.closes_a_ring_of(&a) {
        kinds.push(Kind::RingChain);
    }
    let same_groups = a.has_groups_of(&b, orderer)?;
    if !same_groups {
        kinds.push(Kind::Functional);
    }
    // Where heteroatoms divide the carbons otherwise (metamers) there are no chains to compare.
    let skeletal = a.divides_as(&b) && !a.has_skeleton_of(&b, orderer)?;
    if skeletal {
        kinds.push(Kind::Skeletal);
    }
    if same_groups && !skeletal {
        kinds.push(Kind::Positional);
    }
    Ok(kinds)
}

fn not_isomers(
    [a, b]: [&Structure; 2],
    apart: Axes,
    orderer: &mut GraphOrderer,
) -> Result<Vec<Kind>, GraphError> {
    let mut kinds = on_axes(
        apart,
        &[
            (Axis::Salt, Kind::SaltOrSolvate),
            (Axis::Charge, Kind::ChargeState),
            (Axis::Isotope, Kind::Isotopologues),
        ],
    );
    if a.formula() == b.formula() {
        let same = a.canonical().same_constitution(b.canonical());
        if same && kinds.is_empty() {
            kinds.push(Kind::Isotopologues);
        }
        return Ok(kinds);
    }
    if a.isotopes() != b.isotopes() || !differ_by_methylene(a.formula(), b.formula()) {
        return Ok(kinds);
    }
    let [a, b] = [a, b].map(Profile::of);
    let homologues =
        one_component_grew(a.components(), b.components()) && a.has_groups_of(&b, orderer)?;
    kinds.extend(homologues.then_some(Kind::Homologues));
    Ok(kinds)
}

/// Whether all but one component of each side have a partner of their formula, and those left over
/// differ by CH2 or a multiple of it. Both lists are sorted.
fn one_component_grew(a: &[Formula], b: &[Formula]) -> bool {
    let left_over = |own: &[Formula], other: &[Formula]| {
        let mut other = other.iter().peekable();
        let mut left = Vec::new();
        for formula in own {
            while other.next_if(|&theirs| theirs < formula).is_some() {}
            if other.next_if_eq(&formula).is_none() {
                left.push(formula.clone());
            }
        }
        left
    };
    match (left_over(a, b).as_slice(), left_over(b, a).as_slice()) {
        ([one], [other]) => differ_by_methylene(one, other),
        _ => false,
    }
}

/// Whether two formulae differ by CnH2n, n at least 1, and in nothing else.
fn differ_by_methylene(a: &Formula, b: &Formula) -> bool {
    let own = [Element::CARBON, Element::HYDROGEN];
    let rest = |formula: &Formula| -> Vec<(Element, u32)> {
        let counts = formula.iter();
        counts
            .filter(|(element, _)| !own.contains(element))
            .collect()
    };
    let [carbon, hydrogen] =
        own.map(|element| i64::from(a.count(element)) - i64::from(b.count(element)));
    carbon != 0 && hydrogen == 2 * carbon && a.charge() == b.charge() && rest(a) == rest(b)
}
