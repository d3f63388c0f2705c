//! What may be typed.

use std::{ffi::OsString, num::NonZeroUsize, path::PathBuf, thread};

use clap::{Args, Parser, Subcommand, ValueEnum};
use molkin_relate::{Axes, families::Column};

use crate::output::CAUTION;

const INPUT_HELP: &str = "\
Inputs:
  a name ending in .smi .smiles .mol .sdf .sd .csv .tsv, each also with .gz: that file
  -            standard input
  file:PATH    a file of any other name
  smiles:TEXT  TEXT as a SMILES, whatever it looks like
  else         a SMILES";

const EXIT_HELP: &str = "\
Exit status:
  0  all pairs are identical (keys, families, describe: every record was read)
  1  some pairs differ
  2  trouble: something could not be read, paired or compared";

const SAMPLES_HELP: &str = "\
Exit status:
  0  no sample is flagged
  1  some samples are flagged
  2  trouble: the tray or the held file could not be read";

/// Says how two drawn structures are related, and shows what makes the difference.
#[derive(Debug, Parser)]
#[command(name = "molkin", version, after_help = format!("{INPUT_HELP}\n\n{EXIT_HELP}\n\n{CAUTION}"))]
pub(crate) struct Arguments {
    #[command(subcommand)]
    pub(crate) command: Command,
}

#[derive(Debug, Subcommand)]
pub(crate) enum Command {
    /// Compare two structures, or two files record by record
    Compare(Compare),
    /// Write a table of keys, one line a record
    Keys(Keys),
    /// Group the records of files: duplicates, stereoisomers, isomers
    Families(Families),
    /// Say what is known about each record
    Describe(Describe),
    /// Hold the labels of a tray of samples against what came
    Samples(Box<Samples>),
}

/// Compare two structures, or two files record by record.
///
/// Files of several records are compared in order; where one side has a single record, it is
/// compared with each of the other's.
#[derive(Debug, Args)]
#[command(after_help = format!("{INPUT_HELP}\n\n{EXIT_HELP}\n\n{CAUTION}"))]
pub(crate) struct Compare {
    /// The first structure or file
    pub(crate) a: OsString,
    /// The second structure or file
    pub(crate) b: OsString,
    /// Leave out the atom map and everything that needs it
    #[arg(long)]
    pub(crate) brief: bool,
    /// Show all in the text form: every atom, bond and branch point
    #[arg(long, conflicts_with = "brief")]
    pub(crate) full: bool,
    /// Budget of the search for the atom map, for each pair
    #[arg(long, value_name = "N")]
    pub(crate) steps: Option<u64>,
    /// Pair records by this instead of by their place
    #[arg(long, value_name = "KEY")]
    pub(crate) by: Option<PairBy>,
    /// Form of the output
    #[arg(long, value_enum, default_value_t = Format::Text)]
    pub(crate) format: Format,
    #[command(flatten)]
    pub(crate) forms: Forms,
    #[command(flatten)]
    pub(crate) working: Working,
    #[command(flatten)]
    pub(crate) reading: Reading,
}

/// Write a table of keys, one line a record.
///
/// Records with equal compound keys are identical. Columns: docs/output.md.
#[derive(Debug, Args)]
#[command(after_help = INPUT_HELP)]
pub(crate) struct Keys {
    /// Files or structures
    #[arg(required = true, value_name = "FILE")]
    pub(crate) inputs: Vec<OsString>,
    /// Leave parent_key and tautomer_key empty, which takes less time
    #[arg(long)]
    pub(crate) brief: bool,
    #[command(flatten)]
    pub(crate) table: TableOutput,
    #[command(flatten)]
    pub(crate) forms: Forms,
    #[command(flatten)]
    pub(crate) working: Working,
    #[command(flatten)]
    pub(crate) reading: Reading,
}

/// Group the records of one or many files.
///
/// Tells which records are duplicates, which may be, which are stereoisomers of each other and which are
/// isomers: a row a record, with the numbers of its groups and what it is to the first record of the
/// closest. Columns: docs/output.md. A summary goes to standard error.
#[derive(Debug, Args)]
#[command(after_help = format!("{INPUT_HELP}\n\n{CAUTION}"))]
pub(crate) struct Families {
    /// Files or structures
    #[arg(required = true, value_name = "FILE")]
    pub(crate) inputs: Vec<OsString>,
    /// Say of each record what it is to those of this file, which is held; its own are not listed
    #[arg(long, value_name = "FILE")]
    pub(crate) against: Vec<OsString>,
    /// List only records that are in such groups
    #[arg(long, value_enum, value_name = "GROUPS", value_delimiter = ',')]
    pub(crate) only: Vec<Group>,
    /// Say in sentences what records are to the first of such groups: A is the first, B the record
    #[arg(long, value_enum, value_name = "GROUPS", value_delimiter = ',')]
    pub(crate) explain: Vec<Group>,
    /// The most records that are explained
    #[arg(long, value_name = "N", default_value_t = 1_000)]
    pub(crate) explain_limit: u64,
    /// Write the summary as JSON
    #[arg(long, value_name = "FILE")]
    pub(crate) summary: Option<PathBuf>,
    /// Memory for the rows of records, in MiB; what exceeds it goes to temporary files
    #[arg(long, value_name = "MIB", default_value_t = 1_024)]
    pub(crate) memory: usize,
    #[command(flatten)]
    pub(crate) forms: Forms,
    #[command(flatten)]
    pub(crate) table: TableOutput,
    #[command(flatten)]
    pub(crate) working: Working,
    #[command(flatten)]
    pub(crate) reading: Reading,
}

/// Sorts of groups: see docs/output.md.
#[derive(Debug, Clone, Copy, PartialEq, Eq, ValueEnum)]
pub(crate) enum Group {
    /// Identical, and not open
    Duplicates,
    /// Identical but open, or not to be told apart
    PossibleDuplicates,
    /// Stereoisomers
    Stereo,
    /// Forms of one parent
    Forms,
    /// Isomers of one formula
    Isomers,
}

impl From<Group> for Column {
    fn from(group: Group) -> Self {
        match group {
            Group::Duplicates => Self::Duplicates,
            Group::PossibleDuplicates => Self::PossibleDuplicates,
            Group::Stereo => Self::Stereo,
            Group::Forms => Self::Forms,
            Group::Isomers => Self::Isomers,
        }
    }
}

/// How a table is written, and where.
#[derive(Debug, Args)]
pub(crate) struct TableOutput {
    /// Form of the output
    #[arg(long, value_enum, default_value_t = TableFormat::Csv)]
    pub(crate) format: TableFormat,
    /// Write to a file, which is there as a whole or not at all
    #[arg(long, value_name = "FILE")]
    pub(crate) output: Option<PathBuf>,
}

/// Hold the labels of a tray of samples against what came.
///
/// The tray is a table with a header, a row a sample: what the label says, what came, and perhaps what
/// was measured. Columns are found by their titles (docs/output.md) or named.
#[derive(Debug, Args)]
#[command(after_help = format!("{SAMPLES_HELP}\n\n{CAUTION}"))]
pub(crate) struct Samples {
    /// The table, or - for standard input
    #[arg(value_name = "TRAY.csv")]
    pub(crate) tray: OsString,
    /// File of held structures; a label may be the name of one
    #[arg(long, value_name = "FILE")]
    pub(crate) held: Option<OsString>,
    /// Ion of measured m/z that name none, such as [M+H]+ (default: all usual ones are tried)
    #[arg(long, value_name = "ION")]
    pub(crate) ion: Option<String>,
    /// How far a measured m/z may be off where its row does not say
    #[arg(long, value_name = "SIZE", default_value = "10 ppm")]
    pub(crate) within: String,
    /// Leave out what needs an atom map from the sentences
    #[arg(long)]
    pub(crate) brief: bool,
    /// Form of the output
    #[arg(long, value_enum, default_value_t = SamplesFormat::Text)]
    pub(crate) format: SamplesFormat,
    #[command(flatten)]
    pub(crate) columns: TrayColumns,
    #[command(flatten)]
    pub(crate) working: Working,
    #[command(flatten)]
    pub(crate) chemistry: Chemistry,
}

/// Columns of a tray, by title.
#[derive(Debug, Args)]
#[command(next_help_heading = "Columns")]
pub(crate) struct TrayColumns {
    /// What a sample is called
    #[arg(long, value_name = "COLUMN")]
    pub(crate) id: Option<String>,
    /// Its plate
    #[arg(long, value_name = "COLUMN")]
    pub(crate) plate: Option<String>,
    /// Its well, such as B7
    #[arg(long, value_name = "COLUMN")]
    pub(crate) well: Option<String>,
    /// What its label says: SMILES, molfile, name of a file, or name in --held
    #[arg(long, value_name = "COLUMN")]
    pub(crate) label: Option<String>,
    /// What came, in the same ways
    #[arg(long, value_name = "COLUMN")]
    pub(crate) received: Option<String>,
    /// A measured m/z
    #[arg(long, value_name = "COLUMN")]
    pub(crate) mz: Option<String>,
    /// The ion that was measured
    #[arg(long, value_name = "COLUMN")]
    pub(crate) adduct: Option<String>,
    /// How far the m/z may be off
    #[arg(long, value_name = "COLUMN")]
    pub(crate) tolerance: Option<String>,
    /// A measured formula
    #[arg(long, value_name = "COLUMN")]
    pub(crate) formula: Option<String>,
    /// A remark, which is passed on
    #[arg(long, value_name = "COLUMN")]
    pub(crate) remark: Option<String>,
}

/// What is overlooked when records are compared or keyed.
#[derive(Debug, Args)]
#[command(next_help_heading = "Forms of one compound")]
pub(crate) struct Forms {
    /// Axes to overlook, separated by commas: salt, charge, tautomer (provisional), isotope, stereo,
    /// open-stereo (compare only)
    #[arg(long, value_name = "AXES")]
    pub(crate) overlook: Option<Axes>,
    /// Table of further counter-ions and solvents (tab-separated: salt, structure, kind)
    #[arg(long, value_name = "FILE")]
    pub(crate) counter_ions: Option<PathBuf>,
}

/// How the work is done.
#[derive(Debug, Args)]
pub(crate) struct Working {
    /// Threads that work; the output does not depend on it (default: one for each core)
    #[arg(long, value_name = "N")]
    threads: Option<NonZeroUsize>,
}

impl Working {
    /// Threads that work.
    pub(crate) fn threads(&self) -> NonZeroUsize {
        self.threads
            .or_else(|| thread::available_parallelism().ok())
            .unwrap_or(NonZeroUsize::MIN)
    }
}

/// How inputs are read.
#[derive(Debug, Args)]
#[command(next_help_heading = "Reading")]
pub(crate) struct Reading {
    #[command(flatten)]
    pub(crate) chemistry: Chemistry,
    /// Column of a table that holds the structures (default: found by its title)
    #[arg(long, value_name = "COLUMN")]
    pub(crate) structure: Option<String>,
    /// Column of a table that holds the names (default: found by its title)
    #[arg(long, value_name = "COLUMN")]
    pub(crate) name: Option<String>,
}

/// How structures are read.
#[derive(Debug, Args)]
#[command(next_help_heading = "Reading")]
pub(crate) struct Chemistry {
    /// Refuse SMILES against the standard that are read with a note otherwise
    #[arg(long)]
    pub(crate) strict: bool,
    /// Table of valences from which the hydrogens of a molfile follow that it doesn't write
    #[arg(long, value_enum, default_value_t = Valences::Early)]
    pub(crate) valences: Valences,
    /// What the marks of a molfile mean whose chiral flag isn't set
    #[arg(long, value_enum, default_value_t = FlagZero::Absolute)]
    pub(crate) flag_zero: FlagZero,
}

/// Tables of valences: see docs/formats.md.
#[derive(Debug, Clone, Copy, PartialEq, Eq, ValueEnum)]
pub(crate) enum Valences {
    /// That in use before 2014
    Early,
    /// That in use since 2014
    Late,
}

/// Readings of a chiral flag that isn't set.
#[derive(Debug, Clone, Copy, PartialEq, Eq, ValueEnum)]
pub(crate) enum FlagZero {
    /// The arrangement drawn
    Absolute,
    /// A mixture of that and its mirror image
    Mixture,
    /// That, its mirror image, or both
    Relative,
}

/// Say what is known about each record.
#[derive(Debug, Args)]
#[command(after_help = INPUT_HELP)]
pub(crate) struct Describe {
    /// Files or structures
    #[arg(required = true, value_name = "FILE")]
    pub(crate) inputs: Vec<OsString>,
    /// Form of the output
    #[arg(long, value_enum, default_value_t = Format::Text)]
    pub(crate) format: Format,
    #[command(flatten)]
    pub(crate) working: Working,
    #[command(flatten)]
    pub(crate) reading: Reading,
}

/// How results are written.
#[derive(Debug, Clone, Copy, PartialEq, Eq, ValueEnum)]
pub(crate) enum Format {
    /// For reading
    Text,
    /// One array of objects
    Json,
    /// One object a line
    Jsonl,
}

/// How results about a tray are written.
#[derive(Debug, Clone, Copy, PartialEq, Eq, ValueEnum)]
pub(crate) enum SamplesFormat {
    /// For reading, what needs a person first
    Text,
    /// A row a sample
    Csv,
    /// One object a line
    Jsonl,
}

/// How tables are written.
#[derive(Debug, Clone, Copy, PartialEq, Eq, ValueEnum)]
pub(crate) enum TableFormat {
    /// Comma-separated values with a header
    Csv,
    /// One object a line
    Jsonl,
    /// Columns, for engines that read many files at once
    Parquet,
}

/// What decides which records are compared with each other.
#[derive(Debug, Clone, Copy, PartialEq, Eq, ValueEnum)]
pub(crate) enum PairBy {
    /// The record's name or title
    Name,
}

#[cfg(test)]
mod tests {
    use clap::CommandFactory;

    use super::*;

    #[test]
    fn the_definition_is_sound() {
        Arguments::command().debug_assert();
    }
}
