//! The cells of one row of a tray, not interpreted yet.

use molkin_formats::ReadError;

/// What a cell may hold.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(super) enum Column {
    Id,
    Plate,
    Well,
    Label,
    Received,
    Mz,
    Adduct,
    Tolerance,
    Formula,
    Remark,
}

impl Column {
    pub(super) const COUNT: usize = 10;
}

/// A row.
#[derive(Debug)]
pub(super) struct Cells {
    /// Its number, from 1.
    pub(super) record: u64,
    /// The line on which it begins.
    pub(super) line: u32,
    /// Why it is no sound row.
    pub(super) fault: Option<ReadError>,
    /// By [`Column`]; empty where there is no such column.
    pub(super) texts: [String; Column::COUNT],
}

impl Cells {
    /// The text of a cell without blanks around it.
    pub(super) fn text(&self, column: Column) -> &str {
        self.texts[column as usize].trim()
    }

    /// The text of a cell as it stands.
    pub(super) fn whole(&self, column: Column) -> &str {
        &self.texts[column as usize]
    }

    /// Memory, roughly.
    pub(super) fn bytes(&self) -> usize {
        self.texts.iter().map(String::len).sum()
    }
}
