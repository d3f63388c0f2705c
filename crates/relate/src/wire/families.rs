//! One line of the table of families, and the summary beside it.

use serde::Serialize;

use super::{
    VERSION,
    table::{TableColumn, TableRow, Value},
};
use crate::families::{Column, Counts, Grouped, Kinship, Membership};

impl Column {
    /// The name of the column, as options and the output have it.
    pub fn as_str(self) -> &'static str {
        match self {
            Self::Duplicates => "duplicates",
            Self::PossibleDuplicates => "possible_duplicates",
            Self::Stereo => "stereo",
            Self::Forms => "forms",
            Self::Isomers => "isomers",
        }
    }
}

/// Sources in the order in which their records were read.
#[derive(Debug, Clone, Default)]
pub struct Sources {
    /// The number of the first record of each among all, and its name.
    starts: Vec<(u64, String)>,
}

impl Sources {
    /// A source whose first record has this number among all; these rise.
    pub fn begin(&mut self, first: u64, name: &str) {
        self.starts.push((first, name.to_owned()));
    }

    /// The source of a record, and its place there from 1.
    pub fn find(&self, record: u64) -> (&str, u64) {
        let behind = self.starts.partition_point(|&(first, _)| first <= record);
        let start = behind.checked_sub(1).and_then(|at| self.starts.get(at));
        start.map_or(("", record + 1), |(first, name)| (name, record - first + 1))
    }
}

/// A record and its groups: the columns of `molkin families`, in their order. Later columns are added at
/// the end.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct FamilyRow {
    /// File name, `-`, or the SMILES text as given.
    pub source: String,
    /// Number of the record in its source, from 1.
    pub record: u64,
    /// Name or title; empty where there is none.
    pub name: String,
    /// `ok` or `error`.
    pub status: &'static str,
    /// The number of its group in each column.
    pub groups: [Option<u64>; Column::ALL.len()],
    /// Source and place of the first record of its closest group, unless it is the first itself.
    pub first: Option<(String, u64)>,
    /// What it is to that record.
    pub relation: Option<&'static str>,
    /// The kind of a stereo relation.
    pub kind: Option<&'static str>,
    /// Identical, but more than one sample fits.
    pub open: Option<bool>,
    /// What is wrong.
    pub message: String,
    /// In sentences what it is to that record: A is the first one, B this one.
    pub explanation: Option<String>,
}

const UNDECIDED: &str = "possible-duplicate-limit: whether this record may be a duplicate of others of its constitution was not found within the limits";
const NOT_COMPARED: &str =
    "not-compared: this record could not be compared with the first of its group within the limits";

impl FamilyRow {
    /// The row of a record. What it is to others is told by the closest group whose first record is one of
    /// the first so many `before`.
    pub fn new(grouped: &Grouped, sources: &Sources, before: u64) -> Self {
        let (source, record) = sources.find(grouped.record);
        let closest = grouped.closest(before).map(|(_, group)| group);
        let first = closest.map(|Membership { first, .. }| {
            let (source, record) = sources.find(first);
            (source.to_owned(), record)
        });
        let kinship = closest.map(|group| group.kinship);
        let (relation, kind, open) = kinship.map_or((None, None, None), words);
        let message = match (&grouped.message[..], kinship) {
            ("", Some(Kinship::NotCompared)) => NOT_COMPARED.to_owned(),
            ("", _) if grouped.undecided => UNDECIDED.to_owned(),
            (message, _) => message.to_owned(),
        };
        let number = |column| Some(grouped.group(column)?.number);
        Self {
            source: source.to_owned(),
            record,
            name: grouped.name.clone(),
            status: if grouped.is_fine { "ok" } else { "error" },
            groups: Column::ALL.map(number),
            first,
            relation,
            kind,
            open,
            message,
            explanation: None,
        }
    }
}

/// Relation, kind, and whether something is open.
fn words(kinship: Kinship) -> (Option<&'static str>, Option<&'static str>, Option<bool>) {
    match kinship {
        Kinship::First | Kinship::NotCompared => (None, None, None),
        Kinship::Identical { open } => (Some("identical"), None, Some(open)),
        Kinship::Stereo(kind) => (Some("stereo"), Some(kind.as_str()), Some(false)),
        Kinship::Constitutional => (Some("constitutional"), None, Some(false)),
        Kinship::NotIsomers => (Some("not-isomers"), None, Some(false)),
    }
}

impl TableRow for FamilyRow {
    const COLUMNS: &'static [TableColumn] = &[
        TableColumn::text("source"),
        TableColumn::number("record"),
        TableColumn::text("name"),
        TableColumn::text("status"),
        TableColumn::number("duplicates"),
        TableColumn::number("possible_duplicates"),
        TableColumn::number("stereo"),
        TableColumn::number("forms"),
        TableColumn::number("isomers"),
        TableColumn::text("first_source"),
        TableColumn::number("first_record"),
        TableColumn::text("relation"),
        TableColumn::text("kind"),
        TableColumn::truth("open"),
        TableColumn::text("message"),
        TableColumn::text("explanation"),
    ];

    fn values(&self) -> impl Iterator<Item = Value<'_>> {
        let first = self.first.as_ref();
        let head = [
            Value::Text(&self.source),
            Value::Number(self.record),
            Value::Text(&self.name),
            Value::Text(self.status),
        ];
        let tail = [
            Value::from(first.map(|(source, _)| source.as_str())),
            Value::from(first.map(|&(_, record)| record)),
            Value::from(self.relation),
            Value::from(self.kind),
            Value::from(self.open),
            Value::text(&self.message),
            Value::from(self.explanation.as_deref()),
        ];
        let groups = self.groups.map(Value::from);
        head.into_iter().chain(groups).chain(tail)
    }
}

/// How many records and groups there are.
#[derive(Debug, Clone, PartialEq, Eq, Serialize)]
pub struct FamilySummary {
    /// Contract version.
    pub version: u32,
    /// All records.
    pub records: u64,
    /// Those of files held.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub held: Option<u64>,
    /// Those that could not be read or ordered.
    pub failed: u64,
    /// Different compounds among the others.
    pub distinct: u64,
    /// Groups of duplicates.
    pub duplicates: GroupSummary,
    /// Groups of possible duplicates.
    pub possible_duplicates: GroupSummary,
    /// Stereo families.
    pub stereo: GroupSummary,
    /// Groups of forms of one parent.
    pub forms: GroupSummary,
    /// Groups of isomers.
    pub isomers: GroupSummary,
}

/// The groups of one column.
#[derive(Debug, Clone, PartialEq, Eq, Serialize)]
pub struct GroupSummary {
    /// How many there are.
    pub groups: u64,
    /// How many records are in one.
    pub records: u64,
    /// How many there are of each size.
    pub sizes: Vec<SizeSummary>,
}

/// Groups of one size.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Serialize)]
pub struct SizeSummary {
    /// Records in a group.
    pub size: u64,
    /// Groups.
    pub groups: u64,
}

impl FamilySummary {
    /// The summary of counts; `held` is how many of the records belong to files held.
    pub fn new(counts: &Counts, held: Option<u64>) -> Self {
        let group = |column| GroupSummary {
            groups: counts.groups(column),
            records: counts.members(column),
            sizes: counts
                .sizes(column)
                .map(|(size, groups)| SizeSummary { size, groups })
                .collect(),
        };
        Self {
            version: VERSION,
            records: counts.records,
            held,
            failed: counts.failed,
            distinct: counts.distinct,
            duplicates: group(Column::Duplicates),
            possible_duplicates: group(Column::PossibleDuplicates),
            stereo: group(Column::Stereo),
            forms: group(Column::Forms),
            isomers: group(Column::Isomers),
        }
    }
}
