//! Tables: columns that keep their names and order, whatever form they are written in.

/// What a column holds.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum ColumnKind {
    /// Text.
    Text,
    /// A number from 0 to 2⁶³ − 1.
    Number,
    /// True or false.
    Truth,
}

/// A column of a table.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub struct TableColumn {
    /// Its name.
    pub name: &'static str,
    /// What it holds.
    pub kind: ColumnKind,
}

impl TableColumn {
    pub(super) const fn text(name: &'static str) -> Self {
        let kind = ColumnKind::Text;
        Self { name, kind }
    }

    pub(super) const fn number(name: &'static str) -> Self {
        let kind = ColumnKind::Number;
        Self { name, kind }
    }

    pub(super) const fn truth(name: &'static str) -> Self {
        let kind = ColumnKind::Truth;
        Self { name, kind }
    }
}

/// The value of one column in a row, of the column's kind or absent.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Value<'r> {
    /// The column says nothing of this row.
    Absent,
    /// Text.
    Text(&'r str),
    /// Text that has no comma, quote or line end in its alphabet.
    Word(&'r str),
    /// A number.
    Number(u64),
    /// True or false.
    Truth(bool),
}

impl<'r> Value<'r> {
    /// Text, where empty text says nothing.
    pub(super) fn text(text: &'r str) -> Self {
        match text {
            "" => Self::Absent,
            text => Self::Text(text),
        }
    }

    /// A word, where none says nothing.
    pub(super) fn word(word: &'r str) -> Self {
        match word {
            "" => Self::Absent,
            word => Self::Word(word),
        }
    }
}

impl From<Option<u64>> for Value<'_> {
    fn from(number: Option<u64>) -> Self {
        number.map_or(Self::Absent, Self::Number)
    }
}

impl From<Option<bool>> for Value<'_> {
    fn from(truth: Option<bool>) -> Self {
        truth.map_or(Self::Absent, Self::Truth)
    }
}

impl<'r> From<Option<&'r str>> for Value<'r> {
    fn from(text: Option<&'r str>) -> Self {
        text.map_or(Self::Absent, Self::Text)
    }
}

/// A row of a table.
pub trait TableRow {
    /// The columns. Later ones are added at the end.
    const COLUMNS: &'static [TableColumn];

    /// The values, one for each column.
    fn values(&self) -> impl Iterator<Item = Value<'_>>;
}
