//! The verdicts on a sample.

/// What the records say about a sample. The order is that in which a person should look: the gravest
/// first.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub enum Verdict {
    /// What came is neither the compound on the label nor an isomer of it.
    AnotherCompound,
    /// A measured mass or formula is not that of the label or, without one, of what came.
    MeasurementContradicts,
    /// What came is a constitutional isomer of the compound on the label.
    Isomer,
    /// What came has the constitution of the label, but not, or not surely, its arrangement in space.
    StereoDiffers,
    /// Something that is needed could not be read.
    Unreadable,
    /// What came is the compound on the label as another salt, solvate, ion, tautomer or isotopologue.
    AgreesButForm,
    /// There are no two things to hold against each other.
    NothingToCompare,
    /// Both records say the same, but leave stereo open: they may still be different compounds.
    AgreesButOpen,
    /// Whatever was compared agrees.
    Agrees,
}

impl Verdict {
    /// All verdicts, the gravest first.
    pub const ALL: [Self; 9] = [
        Self::AnotherCompound,
        Self::MeasurementContradicts,
        Self::Isomer,
        Self::StereoDiffers,
        Self::Unreadable,
        Self::AgreesButForm,
        Self::NothingToCompare,
        Self::AgreesButOpen,
        Self::Agrees,
    ];

    /// The word of the output contract.
    pub fn as_str(self) -> &'static str {
        match self {
            Self::AnotherCompound => "another-compound",
            Self::MeasurementContradicts => "measurement-contradicts",
            Self::Isomer => "isomer",
            Self::StereoDiffers => "stereo-differs",
            Self::Unreadable => "unreadable",
            Self::AgreesButForm => "agrees-but-form",
            Self::NothingToCompare => "nothing-to-compare",
            Self::AgreesButOpen => "agrees-but-open",
            Self::Agrees => "agrees",
        }
    }

    /// The same in plain words.
    pub fn in_words(self) -> &'static str {
        match self {
            Self::AnotherCompound => "another compound",
            Self::MeasurementContradicts => "measured mass or formula contradicts",
            Self::Isomer => "an isomer of what the label says",
            Self::StereoDiffers => "stereo differs",
            Self::Unreadable => "unreadable",
            Self::AgreesButForm => "agrees but for its form",
            Self::NothingToCompare => "nothing to compare",
            Self::AgreesButOpen => "agrees but open",
            Self::Agrees => "agrees",
        }
    }

    /// Whether the sample is to be treated as unknown until somebody has looked.
    pub fn is_flagged(self) -> bool {
        self <= Self::AgreesButForm
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn the_list_is_in_its_order_and_closed() {
        assert!(Verdict::ALL.is_sorted());
        let flagged = Verdict::ALL.iter().filter(|verdict| verdict.is_flagged());
        assert_eq!(flagged.count(), 6);
        assert_eq!(Verdict::ALL.iter().max(), Some(&Verdict::Agrees));
    }
}
