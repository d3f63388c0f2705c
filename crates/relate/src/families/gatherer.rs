//! Records in, groups out.

use std::{io, sync::Arc};

use molkin_formats::source::ReadOptions;
use molkin_graph::Limits;

use crate::parallel::{Plan, Work, in_order};

use super::{
    Column, Families,
    counts::Counts,
    family::{Found, relate_family},
    kept::{Keeper, Kept},
    kin,
    loader::Loader,
    numbering::number,
    reading::Gathered,
    rows::{Kin, Membership, Relative},
    sorter::{Sorted, Sorter},
};

/// Sorters that may be full at the same time.
const SORTERS: usize = 8;

/// Takes records in their order and groups them in the end.
///
/// # Examples
/// ```
/// use std::num::NonZeroUsize;
/// use molkin_formats::source::{Format, ReadOptions, Records};
/// use molkin_graph::Limits;
/// use molkin_relate::families::{Column, Gatherer, Reading};
/// use molkin_relate::parallel::Plan;
///
/// let (options, limits) = (ReadOptions::default(), Limits::default());
/// let mut reading = Reading::new(&options, limits);
/// let mut gatherer = Gatherer::new(1 << 20)?;
/// let file = "CCO\nCOC\nOCC\n";
/// let mut records = Records::new("a.smi", file.as_bytes(), Format::Smiles, options.clone());
/// while let Some(raw) = records.cut() {
///     gatherer.add(&reading.read(raw?))?;
/// }
/// let plan = Plan { threads: NonZeroUsize::MIN, chunk: NonZeroUsize::MIN };
/// let families = gatherer.group(&options, limits, plan)?;
/// let mut first_of_duplicates = Vec::new();
/// for grouped in families.into_records() {
///     first_of_duplicates.push(grouped?.group(Column::Duplicates).map(|group| group.first));
/// }
/// assert_eq!(first_of_duplicates, [Some(0), None, Some(0)]);
/// # Ok::<(), Box<dyn std::error::Error>>(())
/// ```
pub struct Gatherer {
    /// Bytes for each sorter.
    memory: usize,
    keeper: Keeper,
    relatives: Sorter<Relative>,
    forms: Sorter<Kin>,
    isomers: Sorter<Kin>,
    records: u64,
    failed: u64,
}

impl Gatherer {
    /// A gatherer that keeps rows of records in so many bytes of memory, and others in temporary files.
    /// The groups do not depend on it.
    ///
    /// # Errors
    /// Temporary files cannot be made.
    pub fn new(memory: usize) -> io::Result<Self> {
        let memory = memory / SORTERS;
        Ok(Self {
            memory,
            keeper: Keeper::new()?,
            relatives: Sorter::new(memory),
            forms: Sorter::new(memory),
            isomers: Sorter::new(memory),
            records: 0,
            failed: 0,
        })
    }

    /// How many records there are so far.
    pub fn records(&self) -> u64 {
        self.records
    }

    /// Takes the next record.
    ///
    /// # Errors
    /// A temporary file cannot be written.
    pub fn add(&mut self, gathered: &Gathered) -> io::Result<()> {
        self.keeper.push(&gathered.entry)?;
        let record = self.records;
        self.records += 1;
        let Some(keys) = gathered.keys else {
            self.failed += 1;
            return Ok(());
        };
        self.relatives.push(Relative {
            family: keys.family,
            compound: keys.compound,
            record,
        })?;
        let kin = |key| Kin {
            key,
            record,
            family: keys.family,
            isomers: keys.isomers,
        };
        if let Some(parent) = keys.parent {
            self.forms.push(kin(parent))?;
        }
        self.isomers.push(kin(keys.isomers))
    }

    /// Groups the records. They were read with these options and within these limits.
    ///
    /// # Errors
    /// A temporary file cannot be written or read.
    pub fn group(self, options: &ReadOptions, limits: Limits, plan: Plan) -> io::Result<Families> {
        let memory = self.memory;
        let mut work = Grouping {
            kept: Arc::new(self.keeper.finish()?),
            options,
            limits,
            memory,
            memberships: Column::ALL.map(|_| Sorter::new(memory)),
            undecided: Sorter::new(memory),
            repeats: 0,
        };
        work.relate(self.relatives.finish()?, plan)?;
        work.add_kin(Column::Forms, self.forms)?;
        work.add_kin(Column::Isomers, self.isomers)?;
        let counts = Counts::new(self.records, self.failed, work.repeats);
        work.number(counts)
    }
}

/// Grouping under way.
struct Grouping<'o> {
    kept: Arc<Kept>,
    options: &'o ReadOptions,
    limits: Limits,
    memory: usize,
    memberships: [Sorter<Membership>; Column::ALL.len()],
    undecided: Sorter<u64>,
    repeats: u64,
}

impl Grouping<'_> {
    /// Relates the records of each labelled constitution.
    fn relate(&mut self, relatives: Sorted<Relative>, plan: Plan) -> io::Result<()> {
        let work = Relating {
            kept: &self.kept,
            options: self.options,
            limits: self.limits,
        };
        let (memberships, undecided) = (&mut self.memberships, &mut self.undecided);
        let repeats = &mut self.repeats;
        let mut groups = Groups::new(relatives);
        let next = |run: &mut Option<_>| {
            *run = groups.next();
            run.is_some()
        };
        in_order(&work, plan, next, |found| {
            let Related(found) = std::mem::take(found);
            let found = found?;
            *repeats += found.repeats;
            for (column, membership) in found.memberships {
                memberships[column.place()].push(membership)?;
            }
            found
                .undecided
                .into_iter()
                .try_for_each(|record| undecided.push(record))
        })
    }

    fn add_kin(&mut self, column: Column, kin: Sorter<Kin>) -> io::Result<()> {
        kin::group(kin.finish()?, &mut self.memberships[column.place()])
    }

    fn number(self, mut counts: Counts) -> io::Result<Families> {
        let mut columns = Vec::new();
        for (column, memberships) in Column::ALL.into_iter().zip(self.memberships) {
            let (places, sizes) = number(memberships.finish()?, Sorter::new(self.memory))?;
            columns.push(places.peekable());
            counts.set_sizes(column, sizes);
        }
        Ok(Families {
            kept: self.kept,
            columns,
            undecided: self.undecided.finish()?.peekable(),
            counts,
        })
    }
}

/// Runs of records with one family key, those alone left out.
struct Groups {
    relatives: Sorted<Relative>,
    ahead: Option<Relative>,
}

impl Groups {
    fn new(relatives: Sorted<Relative>) -> Self {
        Self {
            relatives,
            ahead: None,
        }
    }

    /// The next run; empty at the end.
    fn run(&mut self) -> io::Result<Vec<Relative>> {
        let mut run: Vec<Relative> = self.ahead.take().into_iter().collect();
        for relative in &mut self.relatives {
            let relative = relative?;
            match run.first() {
                Some(first) if first.family != relative.family => {
                    self.ahead = Some(relative);
                    break;
                }
                _ => run.push(relative),
            }
        }
        Ok(run)
    }
}

impl Iterator for Groups {
    type Item = io::Result<Vec<Relative>>;

    fn next(&mut self) -> Option<Self::Item> {
        loop {
            match self.run() {
                Ok(run) if run.is_empty() => return None,
                Ok(run) if run.len() == 1 => {}
                other => return Some(other),
            }
        }
    }
}

/// What is done with each run.
struct Relating<'g> {
    kept: &'g Kept,
    options: &'g ReadOptions,
    limits: Limits,
}

/// What was found about a run.
struct Related(io::Result<Found>);

impl Default for Related {
    fn default() -> Self {
        Self(Ok(Found::default()))
    }
}

impl<'g> Work for Relating<'g> {
    type Item = Option<io::Result<Vec<Relative>>>;
    type Output = Related;
    type Scratch = Loader<'g>;

    fn scratch(&self) -> Loader<'g> {
        Loader::new(self.kept, self.options, self.limits)
    }

    fn run(&self, loader: &mut Loader<'g>, run: &mut Self::Item, related: &mut Related) {
        let run = run.take().unwrap_or_else(|| Ok(Vec::new()));
        related.0 = run.and_then(|run| relate_family(loader, &run));
    }

    fn bytes(run: &Self::Item) -> usize {
        // What is kept of a record is read later, so that counts rather than the row.
        const RECORD: usize = 1 << 11;
        match run {
            Some(Ok(run)) => run.len() * RECORD,
            Some(Err(_)) | None => 0,
        }
    }
}
