//! The rows of `molkin families`.

use std::io;

use molkin_formats::source::ReadOptions;
use molkin_graph::{Limits, Orderer};
use molkin_relate::{
    families::{Again, Column, Families, Grouped},
    parallel::{Plan, Work, in_order},
    wire::{self, FamilyRow, Prepared, Sources},
};

use crate::{
    args,
    exit::Status,
    output::table::{Made, Table},
    report::Report,
    run::Failure,
};

/// What the rows are made from.
pub(super) struct Listing<'l> {
    pub(super) options: &'l args::Families,
    pub(super) reading: &'l ReadOptions,
    pub(super) plan: Plan,
    pub(super) sources: &'l Sources,
    pub(super) held: Option<u64>,
}

impl Listing<'_> {
    /// Writes one row for each record that is wanted, in order.
    pub(super) fn write(&self, families: Families, report: &mut Report) -> Result<(), Failure> {
        let format = self.options.table.format;
        let mut table = Table::begin::<FamilyRow>(format, report.out())?;
        let work = Rows {
            listing: self,
            again: families.again(),
        };
        let mut explanations = Explanations::new(self.options);
        let first = self.held.unwrap_or(0);
        let mut wanted = families
            .into_records()
            .filter(|grouped| {
                grouped
                    .as_ref()
                    .map_or(true, |grouped| grouped.record >= first)
            })
            .filter(|grouped| {
                grouped
                    .as_ref()
                    .map_or(true, |grouped| self.is_wanted(grouped))
            })
            .map(|grouped| {
                let grouped = grouped.map_err(Failure::Temporary)?;
                let explain = explanations.take(self.closest(&grouped));
                Ok((grouped, explain))
            });
        let next = |item: &mut Option<_>| {
            *item = wanted.next();
            item.is_some()
        };
        in_order(&work, self.plan, next, |row: &mut Row| {
            if let Some(failure) = row.failure.take() {
                return Err(failure);
            }
            if row.lacks {
                report.count(Status::Trouble);
            }
            Ok(table.write(report.out(), &row.made)?)
        })?;
        table.finish(report.out())?;
        explanations.say(report)
    }

    fn is_wanted(&self, grouped: &Grouped) -> bool {
        let only = &self.options.only;
        let is_in = |&group: &args::Group| grouped.group(group.into()).is_some();
        only.is_empty() || only.iter().any(is_in)
    }

    /// Records that are held are what others are told about; otherwise all that come before.
    fn before(&self) -> u64 {
        self.held.unwrap_or(u64::MAX)
    }

    fn closest(&self, grouped: &Grouped) -> Option<Column> {
        grouped.closest(self.before()).map(|(column, _)| column)
    }
}

/// Which records are explained.
struct Explanations {
    columns: Vec<Column>,
    wanted: u64,
    most: u64,
}

impl Explanations {
    fn new(options: &args::Families) -> Self {
        Self {
            columns: options.explain.iter().copied().map(Column::from).collect(),
            wanted: 0,
            most: options.explain_limit,
        }
    }

    /// Whether a record is explained whose closest group is in this column.
    fn take(&mut self, closest: Option<Column>) -> bool {
        let wanted = closest.is_some_and(|column| self.columns.contains(&column));
        self.wanted += u64::from(wanted);
        wanted && self.wanted <= self.most
    }

    fn say(&self, report: &mut Report) -> Result<(), Failure> {
        let Self { wanted, most, .. } = self;
        if wanted > most {
            report.say(format_args!(
                "the first {most} of {wanted} records are explained; --explain-limit N explains more"
            ))?;
        }
        Ok(())
    }
}

/// What becomes of a record.
#[derive(Default)]
struct Row {
    made: Made<FamilyRow>,
    /// Whether something could not be found, or read.
    lacks: bool,
    failure: Option<Failure>,
}

/// From groups to rows.
struct Rows<'l> {
    listing: &'l Listing<'l>,
    again: Again,
}

impl Work for Rows<'_> {
    type Item = Option<Result<(Grouped, bool), Failure>>;
    type Output = Row;
    type Scratch = Orderer;

    fn scratch(&self) -> Orderer {
        Orderer::new(Limits::default())
    }

    fn run(&self, orderer: &mut Orderer, item: &mut Self::Item, row: &mut Row) {
        let made = match item.take() {
            None => Ok(()),
            Some(Err(failure)) => Err(failure),
            Some(Ok((grouped, explain))) => self.make(orderer, &grouped, explain, row),
        };
        row.failure = made.err();
    }

    fn bytes(item: &Self::Item) -> usize {
        // An explanation may take thousands of times as long as a row without one: it goes alone.
        const EXPLANATION: usize = 1 << 16;
        match item {
            Some(Ok((_, true))) => EXPLANATION,
            Some(Ok((grouped, false))) => grouped.name.len() + size_of::<Grouped>(),
            Some(Err(_)) | None => 0,
        }
    }
}

impl Rows<'_> {
    fn make(
        &self,
        orderer: &mut Orderer,
        grouped: &Grouped,
        explain: bool,
        row: &mut Row,
    ) -> Result<(), Failure> {
        let before = self.listing.before();
        let mut facts = FamilyRow::new(grouped, self.listing.sources, before);
        if explain {
            let explanation = self.explain(orderer, grouped);
            facts.explanation = explanation.map_err(Failure::Temporary)?;
        }
        row.lacks = !facts.message.is_empty();
        Ok(row.made.fill(self.listing.options.table.format, &facts)?)
    }

    /// What a record is to the first one of its closest group.
    fn explain(&self, orderer: &mut Orderer, grouped: &Grouped) -> io::Result<Option<String>> {
        let Some((_, group)) = grouped.closest(self.listing.before()) else {
            return Ok(None);
        };
        let mut prepare = |record: u64| -> io::Result<Prepared> {
            let (source, index) = self.listing.sources.find(record);
            let outcome = self.again.read(record, index, self.listing.reading)?;
            Ok(Prepared::new(orderer, source, outcome))
        };
        let (first, own) = (prepare(group.first)?, prepare(grouped.record)?);
        let pair = wire::compare(orderer, &Limits::default(), [&first, &own], false);
        Ok(pair.summary)
    }
}
