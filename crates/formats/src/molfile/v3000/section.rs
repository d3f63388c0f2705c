//! The sections of a version 3000 table.

/// A stretch of lines between `BEGIN` and `END`.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(super) enum Section {
    /// The connection table, which holds the other ones.
    Table,
    Atoms,
    Bonds,
    /// Substructure groups.
    Groups,
    /// Points, planes and exclusion spheres of a query in space.
    Objects,
    /// Named sets of atoms and bonds, stereo groups among them.
    Collections,
    /// Templates of a macromolecule, behind the table.
    Templates,
    /// The members of an R group, behind the table.
    Members,
}

impl Section {
    pub(super) fn from_name(name: &[u8]) -> Option<Self> {
        const ALL: [Section; 8] = [
            Section::Table,
            Section::Atoms,
            Section::Bonds,
            Section::Groups,
            Section::Objects,
            Section::Collections,
            Section::Templates,
            Section::Members,
        ];
        ALL.into_iter().find(|section| section.name() == name)
    }

    /// The word behind `BEGIN` and `END`.
    pub(super) fn name(self) -> &'static [u8] {
        match self {
            Self::Table => b"CTAB",
            Self::Atoms => b"ATOM",
            Self::Bonds => b"BOND",
            Self::Groups => b"SGROUP",
            Self::Objects => b"OBJ3D",
            Self::Collections => b"COLLECTION",
            Self::Templates => b"TEMPLATE",
            Self::Members => b"RGROUP",
        }
    }

    /// The line that ends the section, as errors call it.
    pub(super) fn end(self) -> &'static str {
        match self {
            Self::Table => "M  V30 END CTAB",
            Self::Atoms => "M  V30 END ATOM",
            Self::Bonds => "M  V30 END BOND",
            Self::Groups => "M  V30 END SGROUP",
            Self::Objects => "M  V30 END OBJ3D",
            Self::Collections => "M  V30 END COLLECTION",
            Self::Templates => "M  V30 END TEMPLATE",
            Self::Members => "M  V30 END RGROUP",
        }
    }
}
