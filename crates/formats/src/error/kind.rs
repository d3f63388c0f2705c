//! The closed list of faults. Every one has a stable code.

use thiserror::Error;

/// What is wrong with a record.
///
/// Atoms are indices from 0 in the fields and count from 1 in the messages.
#[derive(Debug, Clone, PartialEq, Eq, Error)]
#[non_exhaustive]
pub enum ReadErrorKind {
    /// The source could not be read at all.
    #[error("the source cannot be read: {message}")]
    Io {
        /// The class of the failure.
        kind: std::io::ErrorKind,
        /// What the system says.
        message: Box<str>,
    },
    /// A line is longer than [`molkin_graph::Limits::line_bytes`].
    #[error("the line is longer than {limit} bytes")]
    LineTooLong {
        /// The limit.
        limit: usize,
    },
    /// A record is longer than [`molkin_graph::Limits::record_bytes`].
    #[error("the record is longer than {limit} bytes")]
    RecordTooLong {
        /// The limit.
        limit: usize,
    },
    /// A record has more atoms than [`molkin_graph::Limits::atoms`].
    #[error("the record has more than {limit} atoms")]
    TooManyAtoms {
        /// The limit.
        limit: usize,
    },
    /// The record ends too early.
    #[error("the record ends where {expected} is expected")]
    UnexpectedEnd {
        /// What should follow.
        expected: &'static str,
    },
    /// A character that cannot stand here.
    #[error("unexpected {found:?} where {expected} is expected")]
    Unexpected {
        /// The character.
        found: char,
        /// What should stand here.
        expected: &'static str,
    },
    /// A line or field that does not have the form it should.
    #[error("this is not {expected}")]
    Malformed {
        /// What should stand here.
        expected: &'static str,
    },
    /// A field that should be a number and is not.
    #[error("{what} is not a number")]
    BadNumber {
        /// The field.
        what: &'static str,
    },
    /// A field that has to be filled in and is blank.
    #[error("{what} is missing")]
    MissingField {
        /// The field.
        what: &'static str,
    },
    /// A number outside the range that the format allows.
    #[error("{what} must be from {least} to {most}")]
    NumberOutOfRange {
        /// What the number means.
        what: &'static str,
        /// The least value allowed.
        least: i64,
        /// The greatest value allowed.
        most: i64,
    },
    /// The line has text, but no structure before the first white space.
    #[error("the line starts with white space, so it has no structure but text after it")]
    NoStructure,
    /// The counts line of a molfile stands where its third line should be.
    #[error(
        "this is the counts line, but three lines belong before it: is a blank first line missing?"
    )]
    HeaderLineMissing,
    /// A row of a table has more or fewer fields than the header.
    #[error("the row has {found} {}, but the header names {expected}", fields(*found))]
    FieldCount {
        /// The fields of the row.
        found: usize,
        /// The fields of the header.
        expected: usize,
    },
    /// A quoted field of a table is never closed, or by a quote that was to open another field.
    #[error("the quote is opened and not closed")]
    QuoteNotClosed,
    /// A symbol that is no element.
    #[error("{symbol:?} is not the symbol of an element")]
    UnknownElement {
        /// The symbol.
        symbol: Box<str>,
    },
    /// A lower-case symbol of an element that cannot be aromatic in the format.
    #[error("{symbol:?} is not an aromatic symbol")]
    NotAromatic {
        /// The symbol.
        symbol: Box<str>,
    },
    /// A bracket atom without its closing bracket.
    #[error("the bracket is opened and never closed")]
    BracketNotClosed,
    /// A branch without its closing parenthesis.
    #[error("the branch is opened and never closed")]
    BranchNotClosed,
    /// A closing parenthesis without an opening one.
    #[error("a branch is closed that was never opened")]
    BranchNotOpened,
    /// A branch without an atom.
    #[error("the branch holds no atom")]
    EmptyBranch,
    /// A branch that follows no atom.
    #[error("a branch must follow an atom")]
    BranchWithoutAtom,
    /// A bond symbol that has no atom on one of its sides.
    #[error("the bond symbol is not between two atoms")]
    MisplacedBond,
    /// A dot where components cannot be separated.
    #[error("the dot does not separate two components")]
    MisplacedDot,
    /// A ring label that follows no atom.
    #[error("a ring label must follow an atom")]
    RingLabelWithoutAtom,
    /// A ring label is opened and never closed. The span is the opening label.
    #[error("ring label {label} is opened and never closed")]
    RingNotClosed {
        /// The label.
        label: u8,
    },
    /// The two ends of a ring bond state different orders. The related span is the first end.
    #[error("the two ends of ring label {label} state different bond orders")]
    RingOrderConflict {
        /// The label.
        label: u8,
    },
    /// An atom is bonded to itself.
    #[error("atom {} is bonded to itself", atom.saturating_add(1))]
    SelfBond {
        /// The atom.
        atom: u32,
    },
    /// Two bonds join the same two atoms.
    #[error("atoms {} and {} are bonded twice", a.saturating_add(1), b.saturating_add(1))]
    DuplicateBond {
        /// One atom.
        a: u32,
        /// The other.
        b: u32,
    },
    /// Something names an atom beyond the declared count. The related span is the declaration.
    #[error("atom {named} is named, but {declared} atoms are declared")]
    NoSuchAtom {
        /// The number named, from 1.
        named: u32,
        /// The number of atoms.
        declared: u32,
    },
    /// Something names an atom by a number that no atom has.
    #[error("no atom has the number {number}")]
    NoAtomNumbered {
        /// The number.
        number: u32,
    },
    /// Something names a bond by a number that no bond has.
    #[error("no bond has the number {number}")]
    NoBondNumbered {
        /// The number.
        number: u32,
    },
    /// Two atoms or two bonds have the same number.
    #[error("the number {number} is given twice")]
    NumberRepeated {
        /// The number.
        number: u32,
    },
    /// There are more or fewer lines than the counts line declares. The related span is the
    /// declaration.
    #[error("{declared} {what} are declared, but there are {found}")]
    CountMismatch {
        /// What is counted.
        what: &'static str,
        /// The number declared.
        declared: u32,
        /// The number of lines.
        found: u32,
    },
    /// An aromatic bond symbol at an atom that is not aromatic.
    #[error("an aromatic bond must join two aromatic atoms")]
    AromaticBondOutsideAromatic,
    /// An aromatic symbol without aromatic ring bonds.
    #[error("atom {} is aromatic but in no aromatic ring", atom.saturating_add(1))]
    AromaticOutsideRing {
        /// The atom.
        atom: u32,
    },
    /// An aromatic atom with more bonds than it can have.
    #[error("aromatic atom {} has too many bonds", atom.saturating_add(1))]
    AromaticValence {
        /// The atom.
        atom: u32,
    },
    /// No choice of double bonds satisfies all aromatic atoms.
    #[error(
        "no choice of double bonds fits the aromatic atoms; left over: {}",
        numbers(atoms)
    )]
    NoKekuleStructure {
        /// The atoms left over in one largest choice.
        atoms: Box<[u32]>,
    },
    /// Aromatic bonds that need a hydrogen more on one of several atoms.
    #[error(
        "the aromatic bonds need one more hydrogen, and it fits at each of: {}",
        numbers(atoms)
    )]
    HydrogensUndetermined {
        /// The atoms at which it fits.
        atoms: Box<[u32]>,
    },
    /// A stereo tag that the format does not have.
    #[error("there is no such stereo tag: {expected} is expected")]
    BadStereoTag {
        /// The tags that exist.
        expected: &'static str,
    },
    /// A stereo mark that does not fit the atoms at which it stands.
    #[error("the stereo mark at atom {} does not fit its ligands", atom.saturating_add(1))]
    BadStereo {
        /// The atom.
        atom: u32,
    },
    /// A query: it stands for many structures.
    #[error("{what} makes this a query, not a structure")]
    Query {
        /// The feature.
        what: &'static str,
    },
    /// Valid in the format, or a known extension of it, and refused here. Never read as something
    /// else.
    #[error("{what} is not read")]
    Unsupported {
        /// The feature.
        what: &'static str,
    },
    /// Read with a note by default, and refused because strict reading was asked for.
    #[error("refused in strict reading: {text}")]
    NotStandard {
        /// The code of the note.
        code: &'static str,
        /// The text of the note.
        text: Box<str>,
    },
}

impl ReadErrorKind {
    /// The stable name of this kind of fault, in kebab-case. For [`ReadErrorKind::NotStandard`] the
    /// code of the note that it replaces.
    pub fn code(&self) -> &'static str {
        match self {
            Self::Io { .. } => "io-error",
            Self::LineTooLong { .. } => "line-too-long",
            Self::RecordTooLong { .. } => "record-too-long",
            Self::TooManyAtoms { .. } => "too-many-atoms",
            Self::UnexpectedEnd { .. } => "unexpected-end",
            Self::Unexpected { .. } => "unexpected-character",
            Self::Malformed { .. } => "malformed",
            Self::BadNumber { .. } => "bad-number",
            Self::MissingField { .. } => "missing-field",
            Self::NumberOutOfRange { .. } => "number-out-of-range",
            Self::NoStructure => "no-structure",
            Self::HeaderLineMissing => "header-line-missing",
            Self::FieldCount { .. } => "field-count",
            Self::QuoteNotClosed => "quote-not-closed",
            Self::UnknownElement { .. } => "unknown-element",
            Self::NotAromatic { .. } => "not-aromatic",
            Self::BracketNotClosed => "bracket-not-closed",
            Self::BranchNotClosed => "branch-not-closed",
            Self::BranchNotOpened => "branch-not-opened",
            Self::EmptyBranch => "empty-branch",
            Self::BranchWithoutAtom => "branch-without-atom",
            Self::MisplacedBond => "misplaced-bond",
            Self::MisplacedDot => "misplaced-dot",
            Self::RingLabelWithoutAtom => "ring-label-without-atom",
            Self::RingNotClosed { .. } => "ring-not-closed",
            Self::RingOrderConflict { .. } => "ring-order-conflict",
            Self::SelfBond { .. } => "self-bond",
            Self::DuplicateBond { .. } => "duplicate-bond",
            Self::NoSuchAtom { .. } => "no-such-atom",
            Self::NoAtomNumbered { .. } => "no-such-atom",
            Self::NoBondNumbered { .. } => "no-such-bond",
            Self::NumberRepeated { .. } => "number-repeated",
            Self::CountMismatch { .. } => "count-mismatch",
            Self::AromaticBondOutsideAromatic => "aromatic-bond-outside-aromatic",
            Self::AromaticOutsideRing { .. } => "aromatic-outside-ring",
            Self::AromaticValence { .. } => "aromatic-valence",
            Self::NoKekuleStructure { .. } => "no-kekule-structure",
            Self::HydrogensUndetermined { .. } => "hydrogens-undetermined",
            Self::BadStereoTag { .. } => "bad-stereo-tag",
            Self::BadStereo { .. } => "bad-stereo",
            Self::Query { .. } => "query",
            Self::Unsupported { .. } => "unsupported",
            Self::NotStandard { code, .. } => code,
        }
    }

    /// What the format asks for, where that can be said in a few words.
    pub fn expected(&self) -> Option<&'static str> {
        match self {
            Self::UnexpectedEnd { expected }
            | Self::Unexpected { expected, .. }
            | Self::Malformed { expected }
            | Self::BadStereoTag { expected } => Some(expected),
            Self::UnknownElement { .. } => Some("the symbol of an element"),
            Self::NotAromatic { .. } => Some("b, c, n, o, p, s, se or as"),
            Self::BadNumber { .. } => Some("a number"),
            _ => None,
        }
    }
}

/// Atom numbers from 1, a long list cut short.
fn numbers(atoms: &[u32]) -> String {
    const SHOWN: usize = 8;
    let mut list: Vec<String> = atoms
        .iter()
        .take(SHOWN)
        .map(|&atom| (u64::from(atom) + 1).to_string())
        .collect();
    if atoms.len() > SHOWN {
        list.push(format!("and {} more", atoms.len() - SHOWN));
    }
    format!("atom {}", list.join(", "))
}

fn fields(count: usize) -> &'static str {
    if count == 1 { "field" } else { "fields" }
}
