//! The verdict: how two records are related.

use molkin_graph::{Arrangement, OrderError, Orderer, arrangement};

use crate::Structure;

/// How two records are related; the first that holds, in this order. Definitions with their
/// sources: docs/definitions.md.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Hash)]
pub enum Relation {
    /// The molecular formulae, isotopes and net charge included, differ.
    NotIsomers,
    /// Same formula, different connectivity.
    Constitutional,
    /// Same connectivity, different arrangement in space or different claims about it.
    Stereo(StereoKind),
    /// The two records say the same, however drawn.
    Identical,
}

/// The kinds of stereo relation.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord, Hash)]
#[non_exhaustive]
pub enum StereoKind {
    /// Mirror images that do not coincide.
    Enantiomers,
    /// Stereoisomers that are not mirror images.
    Diastereomers,
    /// Different mixtures that always have a stereoisomer in common: a racemate and one of its
    /// enantiomers, say.
    Composition,
    /// They may be the same: some sample that one record stands for is one of the other's.
    Undetermined,
    /// Surely different, but how is open.
    Unresolved,
}

impl Relation {
    /// The word of the output contract.
    pub fn as_str(self) -> &'static str {
        match self {
            Self::NotIsomers => "not-isomers",
            Self::Constitutional => "constitutional",
            Self::Stereo(_) => "stereo",
            Self::Identical => "identical",
        }
    }

    /// The kind of a stereo relation, in the words of the output contract. The kinds of the others take
    /// more than a verdict: [`crate::kinds()`].
    pub fn kind(self) -> Option<&'static str> {
        match self {
            Self::Stereo(kind) => Some(kind.as_str()),
            _ => None,
        }
    }
}

impl StereoKind {
    /// The word of the output contract.
    pub fn as_str(self) -> &'static str {
        match self {
            Self::Enantiomers => "enantiomers",
            Self::Diastereomers => "diastereomers",
            Self::Composition => "composition",
            Self::Undetermined => "undetermined",
            Self::Unresolved => "unresolved",
        }
    }
}

/// A relation, and whether it leaves something open.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub struct Verdict {
    /// The relation.
    pub relation: Relation,
    /// Identical records that stand for more than one possible sample: they may still be different
    /// compounds.
    pub open: bool,
}

/// Says how two records are related: formula, then constitution, then claims about stereo.
///
/// Cheap: certificates of both sides are compared; only records of one constitution with different
/// claims need a few further canonical searches. `relate(a, b)` equals `relate(b, a)`.
///
/// # Errors
/// [`OrderError::StepLimit`].
///
/// # Examples
/// ```
/// use molkin_formats::smiles;
/// use molkin_graph::{Limits, Orderer};
/// use molkin_relate::{Relation, StereoKind, Structure, relate};
///
/// let mut orderer = Orderer::new(Limits::default());
/// let a = Structure::new(&mut orderer, smiles::parse("C[C@H](N)C(=O)O")?)?;
/// let b = Structure::new(&mut orderer, smiles::parse("OC(=O)[C@H](N)C")?)?;
/// let verdict = relate(&mut orderer, &a, &b)?;
/// assert_eq!(verdict.relation, Relation::Stereo(StereoKind::Enantiomers));
/// # Ok::<(), Box<dyn std::error::Error>>(())
/// ```
pub fn relate(orderer: &mut Orderer, a: &Structure, b: &Structure) -> Result<Verdict, OrderError> {
    let closed = |relation| Verdict {
        relation,
        open: false,
    };
    if a.formula() != b.formula() || a.isotopes() != b.isotopes() {
        return Ok(closed(Relation::NotIsomers));
    }
    if !a.canonical().same_labelled_constitution(b.canonical()) {
        return Ok(closed(Relation::Constitutional));
    }
    let kind = match arrangement(orderer, a.canonical(), b.canonical())? {
        Arrangement::Same => {
            let open = a.canonical().is_open() || b.canonical().is_open();
            return Ok(Verdict {
                relation: Relation::Identical,
                open,
            });
        }
        Arrangement::Overlapping => StereoKind::Undetermined,
        Arrangement::MirrorImages => StereoKind::Enantiomers,
        Arrangement::Unlike => StereoKind::Diastereomers,
        Arrangement::Composition => StereoKind::Composition,
        Arrangement::Unresolved => StereoKind::Unresolved,
    };
    Ok(closed(Relation::Stereo(kind)))
}
