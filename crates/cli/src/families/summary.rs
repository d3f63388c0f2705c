//! How many records and groups there are: in words, and as JSON.

use std::{fmt::Write as _, io::Write as _, path::Path};

use molkin_relate::{
    families::{Column, Counts},
    wire::FamilySummary,
};

use crate::{args, destination::Destination, report::Report, run::Failure};

/// Says the summary, and writes it to a file if that is asked for.
pub(super) fn write(
    options: &args::Families,
    counts: &Counts,
    held: Option<u64>,
    report: &mut Report,
) -> Result<(), Failure> {
    report.say(records_in_words(counts, held))?;
    let overlooked = options.forms.overlook.is_some();
    let columns = Column::ALL.into_iter();
    for column in columns.filter(|&column| column != Column::Forms || overlooked) {
        report.say(groups_in_words(counts, column))?;
    }
    let Some(path) = &options.summary else {
        return Ok(());
    };
    if let Err(error) = write_file(path, &FamilySummary::new(counts, held)) {
        report.trouble(format_args!("{}: {error}", path.display()))?;
    }
    Ok(())
}

fn write_file(path: &Path, summary: &FamilySummary) -> std::io::Result<()> {
    let mut file = Destination::file(path)?;
    serde_json::to_writer(&mut file, summary)?;
    file.write_all(b"\n")?;
    file.finish()
}

fn records_in_words(counts: &Counts, held: Option<u64>) -> String {
    let Counts {
        records,
        failed,
        distinct,
        ..
    } = counts;
    let held = held.map_or_else(String::new, |held| format!(", {held} of them held"));
    let (records, compounds) = (
        counted(*records, "record"),
        counted(*distinct, "different compound"),
    );
    format!("{records}{held}, {failed} failed, {compounds}")
}

fn counted(number: u64, noun: &str) -> String {
    let plural = if number == 1 { "" } else { "s" };
    format!("{number} {noun}{plural}")
}

/// Sizes that are named.
const SIZES: usize = 6;

fn groups_in_words(counts: &Counts, column: Column) -> String {
    let name = match column {
        Column::Duplicates => "duplicates",
        Column::PossibleDuplicates => "possible duplicates",
        Column::Stereo => "stereoisomers",
        Column::Forms => "forms of one parent",
        Column::Isomers => "isomers",
    };
    let groups = counts.groups(column);
    if groups == 0 {
        return format!("{name}: none");
    }
    let members = counts.members(column);
    let (members, number) = (counted(members, "record"), counted(groups, "group"));
    let mut text = format!("{name}: {members} in {number} (");
    for (at, (size, groups)) in counts.sizes(column).take(SIZES).enumerate() {
        let comma = if at > 0 { ", " } else { "" };
        // Writing to a string does not fail.
        let _ = write!(text, "{comma}{groups} of {size}");
    }
    let more = counts.sizes(column).nth(SIZES).is_some();
    text.push_str(if more { ", others larger)" } else { ")" });
    text
}
