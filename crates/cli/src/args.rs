//! What may be typed.

use std::ffi::OsString;

use clap::{Args, Parser, Subcommand, ValueEnum};

use crate::output::CAUTION;

const INPUT_HELP: &str = "\
Inputs:
  a name ending in .smi .smiles .mol .sdf .sd, each also with .gz: that file
  -            standard input
  file:PATH    a file of any other name
  smiles:TEXT  TEXT as a SMILES, whatever it looks like
  else         a SMILES";

const EXIT_HELP: &str = "\
Exit status:
  0  all pairs are identical (keys, describe: every record was read)
  1  some pairs differ
  2  trouble: something could not be read, paired or compared";

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
    /// Say what is known about each record
    Describe(Describe),
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
    /// Budget of the search for the atom map, for each pair
    #[arg(long, value_name = "N")]
    pub(crate) steps: Option<u64>,
    /// Pair records by this instead of by their place
    #[arg(long, value_name = "KEY")]
    pub(crate) by: Option<PairBy>,
    /// Form of the output
    #[arg(long, value_enum, default_value_t = Format::Text)]
    pub(crate) format: Format,
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
    /// Form of the output
    #[arg(long, value_enum, default_value_t = TableFormat::Csv)]
    pub(crate) format: TableFormat,
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

/// How tables are written.
#[derive(Debug, Clone, Copy, PartialEq, Eq, ValueEnum)]
pub(crate) enum TableFormat {
    /// Comma-separated values with a header
    Csv,
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
